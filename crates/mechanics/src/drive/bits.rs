//! The exact bits of a drive, by which its solution is remembered.
//!
//! Two drives with equal bits are the same question to the solver, to the last bit of every number: 0.0 and -0.0 are
//! two. Everything in a [`DriveSpec`] goes in, each piece behind a mark or its length, so that no two drives share
//! their bits by running together.

use super::{Chain, Direction, DriveSpec, PartSpec, Port, Settings, StatedSpeed};
use crate::values::{Duty, FieldValue, Gear, Table};

/// The exact bits of a drive or of a question about it.
#[derive(Clone, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Bits(Vec<u8>);

impl DriveSpec {
    /// The exact bits of this drive.
    #[must_use]
    pub fn bits(&self) -> Bits {
        // Room for a drive of a few parts without growing.
        let mut bits = Bits(Vec::with_capacity(1024));
        bits.chain(&self.chain);
        bits.settings(&self.settings);
        bits.count(self.parts.len());
        self.parts.iter().for_each(|part| bits.part(part));
        bits
    }
}

impl StatedSpeed {
    /// The exact bits of this speed.
    #[must_use]
    pub fn bits(&self) -> Bits {
        let mut bits = Bits::default();
        bits.stated(self);
        bits
    }
}

impl Bits {
    fn mark(&mut self, mark: u8) {
        self.0.push(mark);
    }

    fn count(&mut self, count: usize) {
        self.0.extend_from_slice(&(count as u64).to_le_bytes());
    }

    fn number(&mut self, number: f64) {
        self.0.extend_from_slice(&number.to_bits().to_le_bytes());
    }

    fn numbers(&mut self, numbers: &[f64]) {
        self.count(numbers.len());
        numbers.iter().for_each(|number| self.number(*number));
    }

    fn text(&mut self, text: &str) {
        self.count(text.len());
        self.0.extend_from_slice(text.as_bytes());
    }

    fn maybe<T>(&mut self, value: Option<T>, put: impl FnOnce(&mut Self, T)) {
        match value {
            None => self.mark(0),
            Some(value) => {
                self.mark(1);
                put(self, value);
            }
        }
    }

    fn part(&mut self, part: &PartSpec) {
        self.text(&part.name);
        self.mark(part.row.role as u8);
        self.text(part.row.name);
        self.mark(u8::from(part.on));
        self.count(part.values.iter().count());
        for (name, value) in part.values.iter() {
            self.text(name);
            self.value(value);
        }
    }

    fn value(&mut self, value: &FieldValue) {
        match value {
            FieldValue::Si(si) => {
                self.mark(0);
                self.number(*si);
            }
            FieldValue::OfRated(times) => {
                self.mark(1);
                self.number(*times);
            }
            FieldValue::Interval(low, high) => {
                self.mark(2);
                self.numbers(&[*low, *high]);
            }
            FieldValue::Word(word) => {
                self.mark(3);
                self.text(word);
            }
            FieldValue::Flag(flag) => {
                self.mark(4);
                self.mark(u8::from(*flag));
            }
            FieldValue::Part(index) => {
                self.mark(5);
                self.count(*index);
            }
            FieldValue::Points(table) => {
                self.mark(6);
                self.table(table);
            }
            FieldValue::Ratio { driver, driven } => {
                self.mark(7);
                self.numbers(&[*driver, *driven]);
            }
            FieldValue::Gears(gears) => {
                self.mark(8);
                self.count(gears.len());
                gears.iter().for_each(|gear| self.gear(gear));
            }
            FieldValue::Duty(duty) => {
                self.mark(9);
                self.duty(*duty);
            }
        }
    }

    fn gear(&mut self, gear: &Gear) {
        let Gear { name, reduction, efficiency, efficiency_backward } = gear;
        self.text(name);
        for value in [reduction, efficiency, efficiency_backward] {
            self.maybe(*value, Self::number);
        }
    }

    fn table(&mut self, table: &Table) {
        self.count(table.columns.len());
        for (name, values) in &table.columns {
            self.text(name);
            self.numbers(values);
        }
        self.count(table.at.len());
        for (name, value) in &table.at {
            self.text(name);
            self.number(*value);
        }
    }

    fn duty(&mut self, duty: Duty) {
        self.mark(duty.class);
        self.maybe(duty.value, Self::number);
    }

    fn chain(&mut self, chain: &Chain) {
        let several = |bits: &mut Self, mark, chains: &[Chain]| {
            bits.mark(mark);
            bits.count(chains.len());
            chains.iter().for_each(|chain| bits.chain(chain));
        };
        match chain {
            Chain::Part { index, count } => {
                self.mark(0);
                self.count(*index);
                self.count(*count as usize);
            }
            Chain::Series(chains) => several(self, 1, chains),
            Chain::Joined(chains) => several(self, 2, chains),
        }
    }

    fn settings(&mut self, settings: &Settings) {
        let Settings {
            direction,
            gear,
            set_speed,
            droop,
            run_up_to,
            duty,
            application_factor,
            ambient,
            altitude,
        } = settings;
        self.mark(match direction {
            Direction::Forward => 0,
            Direction::Reverse => 1,
        });
        self.maybe(gear.as_deref(), Self::text);
        self.maybe(set_speed.as_ref(), Self::stated);
        self.number(*droop);
        self.number(*run_up_to);
        self.maybe(*duty, Self::duty);
        self.number(*application_factor);
        self.maybe(*ambient, Self::number);
        self.maybe(*altitude, Self::number);
    }

    fn stated(&mut self, speed: &StatedSpeed) {
        let StatedSpeed { part, port, speed } = speed;
        self.maybe(*part, Self::count);
        self.mark(match port {
            None => 0,
            Some(Port::Input) => 1,
            Some(Port::Output) => 2,
        });
        self.number(*speed);
    }
}

#[cfg(test)]
mod tests {
    use super::super::{Chain, DriveSpec, PartSpec, Port, Settings, StatedSpeed};
    use crate::registry::{Role, row};
    use crate::values::{FieldValue, Gear, Table, Values};

    fn part(name: &str, role: Role, kind: &str, values: Values) -> PartSpec {
        PartSpec { name: name.to_owned(), row: row(role, kind).expect("a kind"), values, on: true }
    }

    fn drive(stall: FieldValue) -> DriveSpec {
        let source =
            Values::default().with("stall_torque", stall).with("no_load_speed", FieldValue::Si(300.0));
        let load = Values::default().with("torque", FieldValue::Si(2.0));
        let at = |index| Chain::Part { index, count: 1 };
        DriveSpec {
            parts: vec![
                part("m", Role::Source, "straight_line", source),
                part("f", Role::Load, "constant", load),
            ],
            chain: Chain::Series(vec![at(0), at(1)]),
            settings: Settings::default(),
        }
    }

    #[test]
    fn equal_drives_have_equal_bits() {
        let plain = || drive(FieldValue::Si(5.0));
        assert_eq!(plain().bits(), plain().bits());
    }

    #[test]
    fn whatever_differs_is_seen() {
        let plain = || drive(FieldValue::Si(5.0));
        let changed = |change: &dyn Fn(&mut DriveSpec)| {
            let mut drive = plain();
            change(&mut drive);
            drive
        };
        let table = |column: &[f64], at: &[(&'static str, f64)]| {
            FieldValue::Points(Table { columns: vec![("speed", column.to_vec())], at: at.to_vec() })
        };
        let all = [
            plain(),
            drive(FieldValue::Si(0.0)),
            drive(FieldValue::Si(-0.0)),
            drive(FieldValue::Si(f64::from_bits(5.0f64.to_bits() + 1))),
            drive(FieldValue::OfRated(5.0)),
            drive(FieldValue::Interval(5.0, 5.0)),
            drive(FieldValue::Ratio { driver: 5.0, driven: 5.0 }),
            drive(FieldValue::Word("none")),
            drive(FieldValue::Flag(true)),
            drive(FieldValue::Part(1)),
            drive(FieldValue::Gears(vec![Gear::of("1", 2.0)])),
            drive(FieldValue::Gears(vec![Gear { efficiency: Some(0.9), ..Gear::of("1", 2.0) }])),
            drive(table(&[1.0, 2.0], &[])),
            drive(table(&[1.0], &[("at", 2.0)])),
            changed(&|drive| drive.parts[0].name.push('x')),
            changed(&|drive| drive.parts[0].on = false),
            changed(&|drive| drive.chain = Chain::Joined(vec![drive.chain.clone()])),
            changed(&|drive| drive.chain = Chain::Series(vec![drive.chain.clone()])),
            changed(&|drive| drive.settings.direction = crate::drive::Direction::Reverse),
            changed(&|drive| drive.settings.gear = Some(String::new())),
            changed(&|drive| drive.settings.droop = 0.1),
            changed(&|drive| drive.settings.ambient = Some(0.0)),
            changed(&|drive| drive.settings.altitude = Some(0.0)),
        ];
        for (a, one) in all.iter().enumerate() {
            for (b, other) in all.iter().enumerate() {
                assert_eq!(one.bits() == other.bits(), a == b, "{one:?} {other:?}");
            }
        }
    }

    #[test]
    fn stated_speeds_are_told_apart() {
        let speed = |part, port, speed| StatedSpeed { part, port, speed };
        let all = [
            speed(None, None, 1.0),
            speed(None, None, -1.0),
            speed(Some(0), None, 1.0),
            speed(Some(1), None, 1.0),
            speed(Some(1), Some(Port::Input), 1.0),
            speed(Some(1), Some(Port::Output), 1.0),
        ];
        for (a, one) in all.iter().enumerate() {
            for (b, other) in all.iter().enumerate() {
                assert_eq!(one.bits() == other.bits(), a == b, "{one:?} {other:?}");
            }
        }
    }
}
