//! Reading the text of a unit into a tree, and writing a tree in the one spelling of the formatter.

use super::error::UnitError;
use super::refused;
use super::suggest::suggestions;
use super::symbols::{Symbol, find};
use crate::dimension::superscript;

/// Longest text of a unit, in bytes.
const LONGEST: usize = 256;
/// Brackets within brackets.
const DEEPEST: usize = 8;
/// Largest power.
const HIGHEST: i32 = 9;

/// Terms that are multiplied or divided, with the bytes they stand on.
#[derive(Clone, Debug, PartialEq)]
pub(crate) struct Level {
    pub terms: Vec<Term>,
}

/// One term of a level.
#[derive(Clone, Debug, PartialEq)]
pub(crate) struct Term {
    /// Stands behind a `/`.
    pub below: bool,
    pub factor: Factor,
    pub power: i32,
}

#[derive(Clone, Debug, PartialEq)]
pub(crate) enum Factor {
    /// The 1 of `1/min`.
    One,
    Symbol(Symbol),
    /// `Nm` written together: two symbols, of which the second alone would take a power.
    Joined(Symbol, Symbol),
    Group(Level),
}

/// Reads the whole text.
pub(crate) fn read(text: &str) -> Result<Level, UnitError> {
    if text.len() > LONGEST {
        return syntax((0, text.len()), "no unit is as long as this");
    }
    let mut reader = Reader { text, at: 0 };
    let level = reader.level(0)?;
    match reader.peek() {
        None => Ok(level),
        Some(')') => syntax((reader.at, reader.at + 1), "this bracket closes nothing"),
        Some(c) if c.is_whitespace() => syntax(
            (reader.at, text.len()),
            "no blank stands inside a unit: join symbols with `·` or `*`, as in `N·m`",
        ),
        Some(c) => {
            let what = if c == '-' {
                "`-` is no sign inside a unit, write `·` or `/`"
            } else {
                "no unit is written so"
            };
            syntax((reader.at, reader.at + c.len_utf8()), what)
        }
    }
}

fn syntax<T>(at: (usize, usize), message: &str) -> Result<T, UnitError> {
    Err(UnitError::Syntax { at, message: message.to_owned() })
}

struct Reader<'a> {
    text: &'a str,
    at: usize,
}

impl Reader<'_> {
    fn peek(&self) -> Option<char> {
        self.text.get(self.at..).and_then(|rest| rest.chars().next())
    }

    fn skip(&mut self, c: char) {
        self.at += c.len_utf8();
    }

    /// Terms up to a closing bracket, the end, or what is no operator.
    fn level(&mut self, depth: usize) -> Result<Level, UnitError> {
        let start = self.at;
        let mut terms = vec![self.term(false, true, depth)?];
        while let Some(c) = self.peek() {
            match c {
                '·' | '*' | '⋅' | '∙' | '•' | '×' | '\u{387}' => {
                    self.skip(c);
                    terms.push(self.term(false, false, depth)?);
                }
                '/' | '÷' | '∕' | '⁄' => {
                    self.skip(c);
                    terms.push(self.term(true, false, depth)?);
                }
                _ => break,
            }
        }
        let level = Level { terms };
        two_readings(&level, (start, self.at))?;
        Ok(level)
    }

    fn term(&mut self, below: bool, first: bool, depth: usize) -> Result<Term, UnitError> {
        let start = self.at;
        let factor = match self.peek() {
            Some('(') if depth >= DEEPEST => {
                return syntax(
                    (self.at, self.at + 1),
                    "the brackets of this unit stand too deep in one another",
                );
            }
            Some('(') => {
                self.at += 1;
                let level = self.level(depth + 1)?;
                if self.peek() != Some(')') {
                    return syntax((start, self.at), "this bracket is not closed");
                }
                self.at += 1;
                Factor::Group(level)
            }
            Some('1') if first => {
                self.at += 1;
                Factor::One
            }
            Some(c) if starts_symbol(c) => self.symbol()?,
            _ => {
                let end = self.peek().map_or(self.at, |c| self.at + c.len_utf8());
                return syntax((self.at, end), "a unit symbol is missing here");
            }
        };
        let power = self.power()?;
        if power != 1 && matches!(factor, Factor::Joined(..)) {
            return syntax(
                (start, self.at),
                "the power of a joined symbol is unclear: write `N·m` with its dot",
            );
        }
        Ok(Term { below, factor, power })
    }

    fn symbol(&mut self) -> Result<Factor, UnitError> {
        let start = self.at;
        while let Some(c) = self.peek() {
            let digit = c.is_ascii_digit() && self.at > start;
            if !starts_symbol(c) && !digit {
                break;
            }
            self.skip(c);
        }
        let at = (start, self.at);
        let symbol = self.text.get(start..self.at).unwrap_or_default();
        if let Some(found) = find(symbol) {
            return Ok(Factor::Symbol(found));
        }
        if let Some((newton, metre)) = joined(symbol) {
            return Ok(Factor::Joined(newton, metre));
        }
        if let Some(choices) = refused::symbol(symbol) {
            return Err(UnitError::Ambiguous { symbol: symbol.to_owned(), at, choices });
        }
        Err(UnitError::Unknown { symbol: symbol.to_owned(), at, suggestions: suggestions(symbol) })
    }

    /// `²`, `⁻¹`, `^2`, `^-1`, or nothing for 1.
    fn power(&mut self) -> Result<i32, UnitError> {
        let start = self.at;
        let mut digits = String::new();
        if self.peek() == Some('^') {
            self.at += 1;
            if let Some(sign @ ('-' | '−')) = self.peek() {
                self.skip(sign);
                digits.push('-');
            }
            while let Some(digit) = self.peek().filter(|c| c.is_ascii_digit() || *c == '.') {
                self.at += 1;
                digits.push(digit);
            }
        } else {
            while let Some((c, plain)) =
                self.peek().and_then(|c| superscript_digit(c).map(|plain| (c, plain)))
            {
                self.skip(c);
                digits.push(plain);
            }
        }
        if self.at == start {
            return Ok(1);
        }
        match digits.parse::<i32>() {
            Ok(0) => syntax((start, self.at), "a unit to the power 0 is none: leave it out"),
            Ok(power) if power.abs() <= HIGHEST => Ok(power),
            Ok(_) => syntax((start, self.at), "no unit has so high a power"),
            Err(_) => {
                syntax((start, self.at), "the power of a unit is a whole number, as in `m²`, `m^2`, `min⁻¹`")
            }
        }
    }
}

fn starts_symbol(c: char) -> bool {
    c.is_alphabetic() && c != '\u{387}'
        || matches!(c, '%' | '‰' | '°' | '_' | '\u{2da}' | '\u{2103}' | '\u{2109}')
}

fn superscript_digit(c: char) -> Option<char> {
    match c {
        '⁻' => Some('-'),
        '¹' => Some('1'),
        '²' => Some('2'),
        '³' => Some('3'),
        '⁰' | '⁴'..='⁹' => char::from_digit(u32::from(c) - 0x2070, 10),
        _ => None,
    }
}

/// `Nm` with a prefix on the newton. Unlike other symbols run together it has one reading and is in every
/// catalogue; the formatter puts the dot.
fn joined(symbol: &str) -> Option<(Symbol, Symbol)> {
    let newton = symbol.strip_suffix('m').filter(|rest| rest.ends_with('N'))?;
    Some((find(newton)?, find("m")?))
}

/// Refuses a second operator behind a `/`, for some read on from left to right and some take all that follows
/// as divided.
fn two_readings(level: &Level, at: (usize, usize)) -> Result<(), UnitError> {
    let Some(slash) = level.terms.iter().position(|term| term.below) else { return Ok(()) };
    if slash + 1 == level.terms.len() {
        return Ok(());
    }
    let all: Vec<String> = level.terms.iter().map(Term::text).collect();
    let (above, below) = all.split_at(slash);
    let bracketed = format!("{}/({})", above.join("·"), below.join("·"));
    let over = |below: bool| -> Vec<&str> {
        level
            .terms
            .iter()
            .zip(&all)
            .filter(|(t, _)| t.below == below)
            .map(|(_, text)| text.as_str())
            .collect()
    };
    let (top, bottom) = (over(false), over(true));
    let running = format!("{}/{}", top.join("·"), bracket(&bottom));
    // `a/b/c` is `a/(b·c)` in both ways of reading; it is refused all the same, for people do not agree on it.
    let other = if bracketed == running {
        let rest = below.get(1..).unwrap_or_default();
        (
            format!("{}/({}/{})", above.join("·"), below[0], bracket(rest)),
            "what follows the second `/` multiplies",
        )
    } else {
        (running, "read from left to right")
    };
    let choices =
        vec![(bracketed, "all that follows the first `/` divides".to_owned()), (other.0, other.1.to_owned())];
    Err(UnitError::TwoReadings { at, choices })
}

fn bracket<T: AsRef<str>>(terms: &[T]) -> String {
    match terms {
        [one] => one.as_ref().to_owned(),
        many => format!("({})", many.iter().map(AsRef::as_ref).collect::<Vec<&str>>().join("·")),
    }
}

impl Term {
    /// The spelling of the formatter, without the operator before it.
    pub fn text(&self) -> String {
        self.text_with(&|symbol| symbol.text())
    }

    fn text_with(&self, spell: &impl Fn(&Symbol) -> String) -> String {
        let power = if self.power == 1 { String::new() } else { superscript(self.power) };
        match &self.factor {
            Factor::One => "1".to_owned(),
            Factor::Symbol(symbol) => format!("{}{power}", spell(symbol)),
            Factor::Joined(newton, metre) => format!("{}·{}", spell(newton), spell(metre)),
            Factor::Group(level) => match level.terms.as_slice() {
                // Brackets round one term say nothing.
                [only] if only.power == 1 && !matches!(only.factor, Factor::Joined(..)) => {
                    Term { power: self.power, ..only.clone() }.text_with(spell)
                }
                _ => format!("({}){power}", level.text_with(spell)),
            },
        }
    }
}

impl Level {
    /// The spelling of the formatter.
    pub fn text(&self) -> String {
        self.text_with(&|symbol| symbol.text())
    }

    /// The same with each symbol spelled by `spell`.
    pub fn text_with(&self, spell: &impl Fn(&Symbol) -> String) -> String {
        if let [Term { factor: Factor::Group(inner), power: 1, below: false }] = self.terms.as_slice() {
            return inner.text_with(spell);
        }
        let mut out = String::new();
        for (index, term) in self.terms.iter().enumerate() {
            if index > 0 {
                out.push(if term.below { '/' } else { '·' });
            }
            match &term.factor {
                // `N/Nm` is newton over newton metres.
                Factor::Joined(..) if term.below => out.push_str(&format!("({})", term.text_with(spell))),
                // Brackets round a product within a product say nothing.
                Factor::Group(inner) if !term.below && term.power == 1 && inner.is_product() => {
                    out.push_str(&inner.text_with(spell));
                }
                _ => out.push_str(&term.text_with(spell)),
            }
        }
        out
    }

    fn is_product(&self) -> bool {
        self.terms.iter().all(|term| !term.below)
    }

    /// Every symbol with its power, brackets worked out.
    pub fn components(&self) -> Vec<(Symbol, i32)> {
        let mut out = Vec::new();
        self.collect(1, &mut out);
        out
    }

    fn collect(&self, outer: i32, out: &mut Vec<(Symbol, i32)>) {
        for term in &self.terms {
            let power = outer.saturating_mul(term.power).saturating_mul(if term.below { -1 } else { 1 });
            match &term.factor {
                Factor::One => {}
                Factor::Symbol(symbol) => out.push((*symbol, power)),
                Factor::Joined(newton, metre) => out.extend([(*newton, power), (*metre, power)]),
                Factor::Group(level) => level.collect(power, out),
            }
        }
    }
}
