//! A small reader of expressions over types: `30[N·m]` is a literal, `30` a plain number, names stand for
//! values of a kind. It stands in for the language, so that the algebra is tested on formulas as people write
//! them.

use layshaft_units::{
    Function, Refusal, TurnWarning, Type, add, apply, compare, demand, divide, kind, multiply, negate,
    parse_unit, raise, subtract,
};

/// What became of a formula in its place.
#[derive(Debug, PartialEq)]
pub enum Outcome {
    Fits,
    Warned(TurnWarning),
    Refused(String),
}

/// A type with its value where that is a constant.
#[derive(Clone, Copy)]
struct Value {
    ty: Type,
    constant: Option<f64>,
}

/// A formula cannot be read: a mistake of the test.
#[derive(Debug)]
pub enum Fault {
    Text(String),
    Refused(Refusal),
}

impl From<Refusal> for Fault {
    fn from(refusal: Refusal) -> Self {
        Fault::Refused(refusal)
    }
}

/// Judges `formula` where `wanted` is wanted; `names` gives the kind of each name.
pub fn judge(formula: &str, wanted: &str, names: &[(&str, &str)]) -> Outcome {
    let place = kind(wanted).unwrap_or_else(|| panic!("no kind {wanted}"));
    let mut reader = Reader { text: formula, at: 0, names };
    let result = reader.comparison().and_then(|value| {
        reader.blanks();
        if reader.at < formula.len() {
            return Err(Fault::Text(format!("left over: {}", &formula[reader.at..])));
        }
        Ok(demand(&value.ty, place)?)
    });
    match result {
        Ok(None) => Outcome::Fits,
        Ok(Some(warning)) => Outcome::Warned(warning),
        Err(Fault::Refused(refusal)) => Outcome::Refused(refusal.message()),
        Err(Fault::Text(text)) => panic!("{formula}: {text}"),
    }
}

struct Reader<'a> {
    text: &'a str,
    at: usize,
    names: &'a [(&'a str, &'a str)],
}

impl<'a> Reader<'a> {
    fn blanks(&mut self) {
        while self.text[self.at..].starts_with(' ') {
            self.at += 1;
        }
    }

    fn take(&mut self, mark: &str) -> bool {
        self.blanks();
        let there = self.text[self.at..].starts_with(mark);
        if there {
            self.at += mark.len();
        }
        there
    }

    fn take_while(&mut self, fits: impl Fn(char) -> bool) -> &'a str {
        let rest = &self.text[self.at..];
        let end = rest.find(|c| !fits(c)).unwrap_or(rest.len());
        self.at += end;
        &rest[..end]
    }

    fn comparison(&mut self) -> Result<Value, Fault> {
        let left = self.sum()?;
        for mark in [">=", "<=", ">", "<"] {
            if self.take(mark) {
                let right = self.sum()?;
                compare(&left.ty, &right.ty)?;
                return Ok(Value { ty: Type::number(), constant: None });
            }
        }
        Ok(left)
    }

    fn sum(&mut self) -> Result<Value, Fault> {
        let mut left = self.product()?;
        loop {
            if self.take("+") {
                let right = self.product()?;
                left = Value { ty: add(&left.ty, &right.ty)?, constant: both(left, right, |a, b| a + b) };
            } else if self.take("-") {
                let right = self.product()?;
                left =
                    Value { ty: subtract(&left.ty, &right.ty)?, constant: both(left, right, |a, b| a - b) };
            } else {
                return Ok(left);
            }
        }
    }

    fn product(&mut self) -> Result<Value, Fault> {
        let mut left = self.unary()?;
        loop {
            if self.take("*") {
                let right = self.unary()?;
                left =
                    Value { ty: multiply(&left.ty, &right.ty)?, constant: both(left, right, |a, b| a * b) };
            } else if self.take("/") {
                let right = self.unary()?;
                left = Value { ty: divide(&left.ty, &right.ty)?, constant: both(left, right, |a, b| a / b) };
            } else {
                return Ok(left);
            }
        }
    }

    fn unary(&mut self) -> Result<Value, Fault> {
        if self.take("-") {
            let value = self.unary()?;
            return Ok(Value { ty: negate(&value.ty)?, constant: value.constant.map(|x| -x) });
        }
        let base = self.primary()?;
        if !self.take("^") {
            return Ok(base);
        }
        let exponent = self.unary()?;
        Ok(Value { ty: raise(&base.ty, &exponent.ty, exponent.constant)?, constant: None })
    }

    fn primary(&mut self) -> Result<Value, Fault> {
        if self.take("(") {
            let value = self.comparison()?;
            return if self.take(")") { Ok(value) } else { Err(Fault::Text("bracket".to_owned())) };
        }
        self.blanks();
        let digits = self.take_while(|c| c.is_ascii_digit() || c == '.');
        if !digits.is_empty() {
            return self.literal(digits);
        }
        let name = self.take_while(|c| c.is_alphanumeric() || c == '_');
        if let Some(function) = Function::from_name(name)
            && self.take("(")
        {
            return self.call(function);
        }
        if name == "pi" {
            return Ok(Value { ty: Type::pi(), constant: None });
        }
        let known = self.names.iter().find(|(known, _)| *known == name).and_then(|(_, of)| kind(of));
        known
            .map(|kind| Value { ty: kind.ty(), constant: None })
            .ok_or_else(|| Fault::Text(format!("name `{name}`")))
    }

    fn literal(&mut self, digits: &str) -> Result<Value, Fault> {
        let mut text = digits.to_owned();
        if self.text[self.at..].starts_with("e-") {
            self.at += 2;
            text = format!("{digits}e-{}", self.take_while(|c| c.is_ascii_digit()));
        }
        let value: f64 = text.parse().map_err(|_| Fault::Text(format!("number {text}")))?;
        if !self.text[self.at..].starts_with('[') {
            return Ok(Value { ty: Type::of_number_literal(value), constant: Some(value) });
        }
        self.at += 1;
        let unit = self.take_while(|c| c != ']');
        self.at += 1;
        let unit = parse_unit(unit).map_err(|error| Fault::Text(format!("unit {unit}: {error:?}")))?;
        Ok(Value { ty: unit.ty, constant: None })
    }

    fn call(&mut self, function: Function) -> Result<Value, Fault> {
        let mut arguments = vec![self.comparison()?.ty];
        while self.take(",") {
            arguments.push(self.comparison()?.ty);
        }
        if !self.take(")") {
            return Err(Fault::Text("bracket of a call".to_owned()));
        }
        Ok(Value { ty: apply(function, &arguments)?, constant: None })
    }
}

fn both(a: Value, b: Value, operation: impl Fn(f64, f64) -> f64) -> Option<f64> {
    Some(operation(a.constant?, b.constant?))
}
