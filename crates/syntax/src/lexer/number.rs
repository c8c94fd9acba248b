//! Numbers and the unit behind them.

use layshaft_diagnostics::{Code, Span};

use super::Lexer;
use super::fold::{Role, role};
use super::unit::unit_end;
use crate::token::TokenKind;
use crate::tree::Problem;

impl Lexer<'_> {
    /// A number whose digits begin at `digits`; its sign, if any, at the current place.
    pub(super) fn number(&mut self, digits: usize) {
        let start = self.at;
        let (end, grouped) = self.number_end(digits);
        let signed = digits > start;
        let kind = if signed { TokenKind::SignedNumber } else { TokenKind::Number };
        if grouped {
            self.grouped_digits(start, digits, end);
        } else if !self.finite(digits, end) {
            let span = Span::new(start as u32, end as u32);
            let message = "the number is too large to be reckoned with";
            let help = "numbers reach up to about 1.8e308";
            self.report(Problem::new(Code::BadNumber, span, message).help(help));
            self.push(TokenKind::Bad, start, end);
        } else {
            self.push(kind, start, end);
        }
        self.behind_number(start, end);
    }

    /// Where the number ends, and whether `_` stands in it.
    fn number_end(&self, digits: usize) -> (usize, bool) {
        let bytes = self.bytes;
        let run = |mut at: usize| {
            while bytes.get(at).is_some_and(u8::is_ascii_digit) {
                at += 1;
            }
            at
        };
        let mut end = run(digits);
        let mut grouped = false;
        while bytes.get(end) == Some(&b'_') && bytes.get(end + 1).is_some_and(u8::is_ascii_digit) {
            grouped = true;
            end = run(end + 1);
        }
        if bytes.get(end) == Some(&b'.') && bytes.get(end + 1).is_some_and(u8::is_ascii_digit) {
            end = run(end + 1);
        }
        if matches!(bytes.get(end), Some(b'e' | b'E')) {
            let sign = usize::from(matches!(bytes.get(end + 1), Some(b'+' | b'-')));
            if bytes.get(end + 1 + sign).is_some_and(u8::is_ascii_digit) {
                end = run(end + 1 + sign);
            }
        }
        (end, grouped)
    }

    /// Whether the number can be held: only an exponent or hundreds of digits can make it too large.
    fn finite(&self, digits: usize, end: usize) -> bool {
        let text = &self.text[digits..end];
        if text.len() < 300 && !text.bytes().any(|byte| byte == b'e' || byte == b'E') {
            return true;
        }
        text.parse::<f64>().is_ok_and(f64::is_finite)
    }

    fn grouped_digits(&mut self, start: usize, digits: usize, end: usize) {
        let span = Span::new(start as u32, end as u32);
        let plain: String = self.text[digits..end].chars().filter(|&c| c != '_').collect();
        let sign = if digits > start { "-" } else { "" };
        let problem = Problem::new(Code::BadNumber, span, "a number is written without separators").fix(
            format!("write `{sign}{plain}`"),
            span,
            format!("{sign}{plain}"),
        );
        self.report(problem);
        self.push(TokenKind::Bad, start, end);
    }

    /// What stands directly behind a number: a unit, or a sign that two trades read differently.
    fn behind_number(&mut self, start: usize, end: usize) {
        match self.bytes.get(end) {
            Some(0x80..) => match self.char_at(end).map(|c| (c, role(c))) {
                Some((c, Role::Prime | Role::DoublePrime)) => return self.prime(start, end, c),
                Some((c, Role::Fraction(decimal))) => return self.mixed_fraction(start, end, c, decimal),
                _ => {}
            },
            Some(b'\'') => return self.prime(start, end, '\''),
            _ => {}
        }
        let at = self.after_blanks(end);
        let Some(unit) = unit_end(self.text, at, at > end) else { return };
        self.push(TokenKind::Unit, at, unit);
        // `6°30′`
        let degrees = self.text[..unit].ends_with('°') && self.peek(0).is_ascii_digit();
        if degrees {
            self.minutes(start, end);
        }
    }

    /// `5′` and `3″`: minute or foot, second or inch?
    fn prime(&mut self, start: usize, end: usize, c: char) {
        let stop = end + c.len_utf8();
        let span = Span::new(start as u32, stop as u32);
        let number = &self.text[start..end];
        let (choices, unit) = if matches!(role(c), Role::Prime) || c == '\'' {
            ("minutes of arc or feet", "ft")
        } else {
            ("seconds of arc or inches", "in")
        };
        let problem = Problem::new(Code::BadNumber, span, format!("`{c}` is read as {choices}"))
            .help(format!("write `{number} {unit}`, or the angle in degrees with decimals, such as `6.5°`"))
            .fix(format!("write `{number} {unit}`"), span, format!("{number} {unit}"));
        self.tokens.truncate(self.tokens.len().saturating_sub(1));
        self.report(problem);
        self.push(TokenKind::Bad, start, stop);
    }

    /// `6°30′15″`: an angle is one number.
    fn minutes(&mut self, start: usize, end: usize) {
        let digits = |from: usize| {
            from + self.bytes[from..].iter().take_while(|b| b.is_ascii_digit() || **b == b'.').count()
        };
        let minutes_end = digits(self.at);
        let Some(prime) =
            self.char_at(minutes_end).filter(|&c| matches!(role(c), Role::Prime | Role::DoublePrime))
        else {
            return;
        };
        let mut stop = minutes_end + prime.len_utf8();
        let mut seconds = 0.0;
        let seconds_end = digits(stop);
        if let Some(c) = self.char_at(seconds_end).filter(|&c| matches!(role(c), Role::DoublePrime))
            && seconds_end > stop
        {
            seconds = self.text[stop..seconds_end].parse().unwrap_or(0.0);
            stop = seconds_end + c.len_utf8();
        }
        let whole: f64 = self.text[start..end].parse().unwrap_or(0.0);
        let minutes: f64 = self.text[self.at..minutes_end].parse().unwrap_or(0.0);
        let part = minutes / 60.0 + seconds / 3600.0;
        let degrees = if whole < 0.0 { whole - part } else { whole + part };
        let shown = format!("{:.6}", degrees);
        let shown = shown.trim_end_matches('0').trim_end_matches('.');
        let span = Span::new(start as u32, stop as u32);
        let problem = Problem::new(Code::BadNumber, span, "an angle is written as one number of degrees")
            .fix(format!("write `{shown}°`"), span, format!("{shown}°"));
        self.report(problem);
        self.tokens.truncate(self.tokens.len().saturating_sub(2));
        self.push(TokenKind::Bad, start, stop);
    }

    /// `1½`
    fn mixed_fraction(&mut self, start: usize, end: usize, c: char, decimal: &str) {
        let number = &self.text[start..end];
        let text = match decimal.strip_prefix("0") {
            Some(part) if number.bytes().all(|byte| byte.is_ascii_digit()) => format!("{number}{part}"),
            _ => format!("({number} + {decimal})"),
        };
        self.tokens.truncate(self.tokens.len().saturating_sub(1));
        self.fraction(start, end - start + c.len_utf8(), &text);
    }

    /// `½`
    pub(super) fn fraction(&mut self, start: usize, length: usize, decimal: &str) {
        let span = Span::new(start as u32, (start + length) as u32);
        let problem =
            Problem::new(Code::BadNumber, span, "a number is written with decimals, not as a fraction sign")
                .fix(format!("write `{decimal}`"), span, decimal);
        self.report(problem);
        self.push(TokenKind::Bad, start, start + length);
        let at = self.after_blanks(self.at);
        if let Some(unit) = unit_end(self.text, at, at > self.at) {
            self.push(TokenKind::Unit, at, unit);
        }
    }
}
