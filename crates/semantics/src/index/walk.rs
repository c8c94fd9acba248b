//! Walks the trees and notes every name.

use layshaft_diagnostics::{FileId, FileSpan, Span};
use layshaft_mechanics::registry::{self, Role};
use layshaft_syntax::{
    At, Block, CaseRef, Chain, ChainKind, Entry, Expr, ExprKind, ItemKind, ItemTree, Name, PartBase, Path,
    Scope, ScopeKind, Text, Value, ValueKind,
};

use super::{Reference, Target};
use crate::world::{Declared, ItemRef, World};

pub(super) fn walk(world: &World) -> Vec<Reference> {
    let mut walker = Walker { world, found: Vec::new() };
    for file in 0..world.files.len() as u32 {
        for (at, tree) in world.items(file) {
            walker.item(at, tree);
        }
    }
    walker.found
}

struct Walker<'w> {
    world: &'w World,
    found: Vec<Reference>,
}

/// Whose fields the keys of a block are.
#[derive(Clone, Copy)]
enum Owner {
    /// A part or drive by the place of its name.
    Own(FileSpan),
    /// Paths from the top: a case.
    Paths,
}

impl Walker<'_> {
    fn note(&mut self, at: ItemRef, span: Span, target: Target, declares: bool) {
        let place = self.world.place(at, span);
        self.found.push(Reference { place, target, declares });
    }

    fn item(&mut self, at: ItemRef, tree: &ItemTree) {
        match &tree.kind {
            ItemKind::Use { path, alias } => self.used(at, path, alias.as_ref()),
            ItemKind::Let { name, kind, value } => {
                let place = self.world.place(at, name.span);
                self.note(at, name.span, Target::Let(place), true);
                if let Some(kind) = kind {
                    self.note(at, kind.span, Target::QuantityKind(kind.text.to_string()), false);
                }
                self.value(at, value);
            }
            ItemKind::Part { role, name, base, block, .. } => {
                let place = self.world.place(at, name.span);
                self.note(at, name.span, Target::Part(place), true);
                match base {
                    PartBase::Kind(kind) => {
                        let role = crate::defs::role_of(*role);
                        self.note(at, kind.span, Target::PartKind(role, kind.text.to_string()), false);
                    }
                    PartBase::Variant(path) => self.path(at, path),
                }
                self.block(at, block, Owner::Own(place));
            }
            ItemKind::Drive { name, chain, block } => {
                let place = self.world.place(at, name.span);
                self.note(at, name.span, Target::Drive(place), true);
                self.chain(at, chain);
                if let Some(block) = block {
                    self.block(at, block, Owner::Own(place));
                }
            }
            ItemKind::Case { name, bases, block } => {
                let place = self.world.place(at, name.span);
                self.note(at, name.span, Target::Case(place), true);
                for base in bases {
                    self.case(at, base);
                }
                if let Some(block) = block {
                    self.block(at, block, Owner::Paths);
                }
            }
            ItemKind::Require { condition, at: asked, probability, scopes, .. } => {
                self.asked(at, condition, asked.as_ref(), scopes);
                if let Some(probability) = probability {
                    self.expr(at, probability);
                }
            }
            ItemKind::Show { value, at: asked, scopes, .. } => self.asked(at, value, asked.as_ref(), scopes),
            ItemKind::Allow(allow) => {
                self.note(at, allow.code.span, Target::Code(allow.code.text.to_string()), false);
            }
            _ => {}
        }
    }

    /// What is asked, at which speed and in which cases.
    fn asked(&mut self, at: ItemRef, expr: &Expr, asked: Option<&At>, scopes: &[Scope]) {
        self.expr(at, expr);
        if let Some(asked) = asked {
            self.path(at, &asked.path);
            self.value(at, &asked.value);
        }
        self.scopes(at, scopes);
    }

    fn used(&mut self, at: ItemRef, path: &Text, alias: Option<&Name>) {
        let own = alias.map_or(path.span, |alias| alias.span);
        let place = self.world.place(at, own);
        let name = match alias {
            Some(alias) => alias.text.to_string(),
            None => crate::load::stem(&path.value).to_owned(),
        };
        let file = match self.world.find(at.file, &name) {
            Some((Declared::File(file), _)) => file.map(FileId),
            _ => None,
        };
        if let Some(alias) = alias {
            self.note(at, alias.span, Target::File(place, file), true);
        }
        self.note(at, path.span, Target::Path(path.value.to_string()), false);
    }

    fn case(&mut self, at: ItemRef, name: &Name) {
        if &*name.text == "plain" {
            self.note(at, name.span, Target::Plain, false);
        } else if let Some((Declared::Case, case)) = self.world.find(at.file, &name.text)
            && let Some(declared) = self.world.name(case)
        {
            let target = Target::Case(self.world.place(case, declared.span));
            self.note(at, name.span, target, false);
        }
    }

    fn scopes(&mut self, at: ItemRef, scopes: &[Scope]) {
        for scope in scopes {
            match &scope.kind {
                ScopeKind::OnlyIn(cases) | ScopeKind::NotIn(cases) => {
                    for case in cases {
                        self.case_ref(at, case);
                    }
                }
                ScopeKind::OnlyWhere(entry) => self.entry(at, entry, Owner::Paths, false),
            }
        }
    }

    fn case_ref(&mut self, at: ItemRef, case: &CaseRef) {
        self.case(at, &case.name);
        for member in &case.members {
            self.value(at, member);
        }
        if let Some(block) = &case.with {
            self.block(at, block, Owner::Paths);
        }
    }

    fn chain(&mut self, at: ItemRef, chain: &Chain) {
        match &chain.kind {
            ChainKind::Part { path, .. } => self.path(at, path),
            ChainKind::Times { inner, .. } => self.chain(at, inner),
            ChainKind::Series(chains) | ChainKind::Joined(chains) => {
                for chain in chains {
                    self.chain(at, chain);
                }
            }
            ChainKind::Broken => {}
        }
    }

    fn block(&mut self, at: ItemRef, block: &Block, owner: Owner) {
        for entry in &block.entries {
            self.entry(at, entry, owner, true);
        }
        for allow in &block.allows {
            self.note(at, allow.code.span, Target::Code(allow.code.text.to_string()), false);
        }
    }

    fn entry(&mut self, at: ItemRef, entry: &Entry, owner: Owner, declares: bool) {
        match owner {
            Owner::Own(place) => {
                let name = crate::defs::slot_text(&crate::defs::slot_of(entry));
                let last = entry.member.as_ref().map_or(entry.key.span, |member| member.span);
                self.note(at, entry.key.span.cover(last), Target::Field(place, name), declares);
            }
            Owner::Paths => self.path(at, &entry.key),
        }
        self.value(at, &entry.value);
    }

    fn value(&mut self, at: ItemRef, value: &Value) {
        match &value.kind {
            ValueKind::Expr(expr) => self.expr(at, expr),
            ValueKind::Range { low, high } => {
                self.expr(at, low);
                self.expr(at, high);
            }
            ValueKind::Each(values) => {
                for value in values {
                    self.value(at, value);
                }
            }
            ValueKind::Pairs(pairs) => {
                for expr in pairs.iter().flat_map(|pair| &pair.values) {
                    self.expr(at, expr);
                }
            }
            ValueKind::Points(points) => {
                for expr in &points.at {
                    self.expr(at, expr);
                }
            }
            ValueKind::Csv(csv) => {
                self.note(at, csv.path.span, Target::Path(csv.path.value.to_string()), false);
                for expr in &csv.at {
                    self.expr(at, expr);
                }
            }
            ValueKind::Teeth { driver, driven } => {
                self.expr(at, driver);
                self.expr(at, driven);
            }
            ValueKind::Ratio { value, .. } => self.expr(at, value),
            ValueKind::Duty { value: Some(value), .. } => self.expr(at, value),
            ValueKind::Duty { .. } | ValueKind::Absent | ValueKind::Missing => {}
        }
    }

    fn expr(&mut self, at: ItemRef, expr: &Expr) {
        match &expr.kind {
            ExprKind::Path(path) => self.path(at, path),
            ExprKind::Call { function, args } => {
                self.note(at, function.span, Target::Function(function.text.to_string()), false);
                for arg in args {
                    self.expr(at, arg);
                }
            }
            ExprKind::Unary { arg, .. } | ExprKind::Paren(arg) => self.expr(at, arg),
            ExprKind::Binary { left, right, .. } => {
                self.expr(at, left);
                self.expr(at, right);
            }
            ExprKind::Power { base, exponent } => {
                self.expr(at, base);
                self.expr(at, exponent);
            }
            ExprKind::Compare { first, rest } => {
                self.expr(at, first);
                for (_, _, expr) in rest {
                    self.expr(at, expr);
                }
            }
            ExprKind::If { condition, then, otherwise } => {
                for expr in [condition, then, otherwise] {
                    self.expr(at, expr);
                }
            }
            ExprKind::Tolerance { value, tolerance, confidence, .. } => {
                self.expr(at, value);
                self.expr(at, tolerance);
                if let Some(confidence) = confidence {
                    self.expr(at, confidence);
                }
            }
            ExprKind::Within { value, low, high } => {
                for expr in [value, low, high] {
                    self.expr(at, expr);
                }
            }
            ExprKind::Quantity { .. }
            | ExprKind::Text(_)
            | ExprKind::Flag(_)
            | ExprKind::Rated
            | ExprKind::Broken => {}
        }
    }

    /// Each name of a path by itself: `parts.motor.torque` is a file, a part and a field.
    fn path(&mut self, at: ItemRef, path: &Path) {
        let names = &path.names;
        let Some(first) = names.first() else { return };
        let Some((declared, _)) = self.world.find(at.file, &first.text) else {
            if names.len() == 1 {
                let text = first.text.to_string();
                let constant = crate::eval::is_constant(&text);
                let target = if constant { Target::Constant(text) } else { Target::Word(text) };
                self.note(at, first.span, target, false);
            }
            return;
        };
        if let Declared::File(file) = declared
            && let Some((_, alias)) = self.world.find(at.file, &first.text)
        {
            let own = match &self.world.tree(alias).kind {
                ItemKind::Use { path, alias } => alias.as_ref().map_or(path.span, |alias| alias.span),
                _ => return,
            };
            let target = Target::File(self.world.place(alias, own), file.map(FileId));
            self.note(at, first.span, target, false);
        }
        let Some((declared, item, used)) = self.world.head(at.file, names) else { return };
        let Some(name) = self.world.name(item) else { return };
        let place = self.world.place(item, name.span);
        let head = match declared {
            Declared::Let => Target::Let(place),
            Declared::Part => Target::Part(place),
            Declared::Drive => Target::Drive(place),
            Declared::Case => Target::Case(place),
            Declared::File(_) => return,
        };
        self.note(at, names[used - 1].span, head, false);
        match declared {
            Declared::Part => self.field(at, place, &names[used..]),
            Declared::Drive => self.in_drive(at, place, &names[used..]),
            _ => {}
        }
    }

    fn field(&mut self, at: ItemRef, owner: FileSpan, names: &[Name]) {
        let [name] = names else { return };
        let known =
            registry::rows().iter().any(|row| row.fields.iter().any(|field| *field.name == *name.text))
                || [Role::Supply, Role::Source, Role::Transmission, Role::Load]
                    .iter()
                    .any(|role| registry::common_fields(*role).iter().any(|field| *field.name == *name.text));
        let target = if known {
            Target::Field(owner, name.text.to_string())
        } else {
            Target::Result { drive: None, part: Some(owner), port: None, name: name.text.to_string() }
        };
        self.note(at, name.span, target, false);
    }

    fn in_drive(&mut self, at: ItemRef, drive: FileSpan, names: &[Name]) {
        let Some((last, middle)) = names.split_last() else { return };
        let setting = registry::DRIVE_FIELDS.iter().any(|field| *field.name == *last.text);
        let result = registry::DRIVE_RESULTS.iter().any(|row| *row.name == *last.text);
        if middle.is_empty() && setting && !result {
            self.note(at, last.span, Target::Field(drive, last.text.to_string()), false);
            return;
        }
        let (port, middle) = match middle.split_last() {
            Some((port, rest)) if matches!(&*port.text, "input" | "output") && !rest.is_empty() => {
                self.note(at, port.span, Target::Word(port.text.to_string()), false);
                (Some(port.text.to_string()), rest)
            }
            _ => (None, middle),
        };
        let mut part = None;
        if let Some((Declared::Part, item, used)) = self.world.head(at.file, middle)
            && let Some(name) = self.world.name(item)
        {
            let place = self.world.place(item, name.span);
            self.note(at, middle[used - 1].span, Target::Part(place), false);
            part = Some(place);
        }
        if part.is_some() != middle.is_empty() {
            let target = Target::Result { drive: Some(drive), part, port, name: last.text.to_string() };
            self.note(at, last.span, target, false);
        }
    }
}
