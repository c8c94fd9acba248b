//! What a state has computed, by item: dense, since nearly every item is asked for.

use crate::defs::SlotName;
use crate::world::ItemRef;

use super::Slot;

/// A value asked for: on its way, or there.
#[derive(Clone, Debug)]
pub(super) enum Memo<T> {
    Busy,
    Done(T),
}

/// Something for some items. Items are met in their order, so that what is asked together lies together.
#[derive(Debug)]
pub(super) struct ByItem<T> {
    /// By file and item: one more than the place of its value, 0 where there is none.
    places: Vec<Vec<u32>>,
    values: Vec<T>,
}

impl<T> Default for ByItem<T> {
    fn default() -> Self {
        Self { places: Vec::new(), values: Vec::new() }
    }
}

impl<T> ByItem<T> {
    pub fn get(&self, at: ItemRef) -> Option<&T> {
        let place = *self.places.get(at.file as usize)?.get(at.item as usize)?;
        self.values.get((place as usize).checked_sub(1)?)
    }

    /// The value of an item, one that is new where there was none.
    fn slot(&mut self, at: ItemRef, new: impl FnOnce() -> T) -> Option<&mut T> {
        let (file, item) = (at.file as usize, at.item as usize);
        if self.places.len() <= file {
            self.places.resize_with(file + 1, Vec::new);
        }
        let places = self.places.get_mut(file)?;
        if places.len() <= item {
            places.resize(item + 1, 0);
        }
        let place = places.get_mut(item)?;
        if *place == 0 {
            self.values.push(new());
            *place = self.values.len() as u32;
        }
        self.values.get_mut((*place as usize).checked_sub(1)?)
    }
}

/// What is computed once for each key.
pub(super) trait Once<K, T> {
    fn get(&self, key: &K) -> Option<&Memo<T>>;
    fn set(&mut self, key: &K, memo: Memo<T>);
}

impl<T> Once<ItemRef, T> for ByItem<Memo<T>> {
    fn get(&self, at: &ItemRef) -> Option<&Memo<T>> {
        Self::get(self, *at)
    }

    fn set(&mut self, at: &ItemRef, memo: Memo<T>) {
        if let Some(slot) = self.slot(*at, || Memo::Busy) {
            *slot = memo;
        }
    }
}

/// The fields of every part and drive.
pub(super) type Fields<T> = ByItem<Vec<(SlotName, Memo<T>)>>;

impl<T> Once<Slot, T> for Fields<T> {
    fn get(&self, key: &Slot) -> Option<&Memo<T>> {
        let Slot::Field(at, name) = key else { return None };
        let fields = Self::get(self, *at)?;
        fields.iter().find(|(known, _)| known == name).map(|(_, memo)| memo)
    }

    fn set(&mut self, key: &Slot, memo: Memo<T>) {
        let Slot::Field(at, name) = key else { return };
        let Some(fields) = self.slot(*at, Vec::new) else { return };
        match fields.iter_mut().find(|(known, _)| known == name) {
            Some((_, known)) => *known = memo,
            None => fields.push((name.clone(), memo)),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::{ByItem, Memo, Once};
    use crate::world::ItemRef;

    #[test]
    fn items_keep_what_they_were_given() {
        let mut all: ByItem<Memo<u32>> = ByItem::default();
        let at = |file, item| ItemRef { file, item };
        let value = |all: &ByItem<Memo<u32>>, at: ItemRef| match Once::get(all, &at) {
            Some(Memo::Done(value)) => Some(*value),
            _ => None,
        };
        all.set(&at(2, 7), Memo::Done(27));
        all.set(&at(0, 3), Memo::Busy);
        all.set(&at(0, 3), Memo::Done(3));
        all.set(&at(0, 0), Memo::Done(1));
        assert_eq!(value(&all, at(2, 7)), Some(27));
        assert_eq!(value(&all, at(0, 3)), Some(3));
        assert_eq!(value(&all, at(0, 0)), Some(1));
        for free in [at(0, 1), at(1, 0), at(2, 6), at(2, 8), at(3, 0)] {
            assert_eq!(value(&all, free), None);
        }
    }
}
