//! Reads EBNF (ISO/IEC 14977, the part of it that `grammar/layshaft.ebnf` uses) and expands it to plain productions.

use std::collections::BTreeMap;

/// The right side of a rule.
#[derive(Clone, Debug)]
enum Body {
    /// A token between quotes.
    Literal(String),
    /// A rule or a class of tokens.
    Name(String),
    /// One behind the other.
    Sequence(Vec<Body>),
    /// One of several.
    Choice(Vec<Body>),
    /// `[ … ]`
    Option(Box<Body>),
    /// `{ … }`
    Repeat(Box<Body>),
    /// `? … ?`: said in words; the rule's name is a class of tokens.
    Words(String),
}

/// A grammar in plain productions; a symbol is a terminal unless it has productions.
#[derive(Debug, Default)]
pub struct Grammar {
    /// Left side and right side, in the order of the text; the first left side is the start.
    pub productions: Vec<(String, Vec<String>)>,
    /// What is said in words about classes of tokens and lists of words.
    pub words: BTreeMap<String, String>,
}

impl Grammar {
    /// Reads a grammar; an error says where.
    pub fn read(text: &str) -> Result<Self, String> {
        let rules = Reader { tokens: scan(text)?, at: 0 }.rules()?;
        let mut grammar = Self::default();
        for (name, body) in &rules {
            if let Body::Words(said) = body {
                grammar.words.insert(name.clone(), said.clone());
            }
        }
        for (name, body) in rules {
            if !matches!(body, Body::Words(_)) {
                let mut helpers = Vec::new();
                for right in expand(&name, &body, &mut helpers) {
                    grammar.productions.push((name.clone(), right));
                }
                grammar.productions.extend(helpers);
            }
        }
        grammar.check()?;
        Ok(grammar)
    }

    /// The words listed under `name`.
    pub fn list(&self, name: &str) -> Vec<&str> {
        self.words.get(name).map(|text| text.split_whitespace().collect()).unwrap_or_default()
    }

    /// Every name is a rule or a class, every rule is reached, and no rule is empty.
    fn check(&self) -> Result<(), String> {
        let lefts: Vec<&str> = self.productions.iter().map(|(left, _)| left.as_str()).collect();
        for (left, right) in &self.productions {
            if right.is_empty() && *left != lefts[0] {
                return Err(format!("`{left}` can be empty: write an option where it is used"));
            }
            for symbol in right.iter().filter(|symbol| !symbol.starts_with('"')) {
                if !lefts.contains(&symbol.as_str()) && !self.words.contains_key(symbol) {
                    return Err(format!("`{symbol}` in `{left}` is neither a rule nor a class of tokens"));
                }
            }
        }
        for (index, left) in lefts.iter().enumerate().skip(1) {
            let used = self.productions.iter().any(|(_, right)| right.iter().any(|symbol| symbol == left));
            if !used && lefts[0] != *left {
                return Err(format!("rule {index}, `{left}`, is used nowhere"));
            }
        }
        Ok(())
    }
}

/// All right sides of a body. Options are written out and a repetition becomes a list of one or more, so that no
/// empty rule is made: those cause conflicts that the grammar itself does not have.
fn expand(rule: &str, body: &Body, helpers: &mut Vec<(String, Vec<String>)>) -> Vec<Vec<String>> {
    match body {
        Body::Literal(text) => vec![vec![format!("\"{text}\"")]],
        Body::Name(name) => vec![vec![name.clone()]],
        Body::Words(_) => Vec::new(),
        Body::Choice(all) => all.iter().flat_map(|one| expand(rule, one, helpers)).collect(),
        Body::Option(inner) => {
            let mut all = vec![Vec::new()];
            all.extend(expand(rule, inner, helpers));
            all
        }
        Body::Repeat(inner) => {
            let once = expand(rule, inner, helpers);
            let name = format!("{rule}'{}", helpers.iter().filter(|(_, right)| right.len() > 1).count() + 1);
            for right in &once {
                helpers.push((name.clone(), right.clone()));
                let more = std::iter::once(name.clone()).chain(right.iter().cloned()).collect();
                helpers.push((name.clone(), more));
            }
            vec![Vec::new(), vec![name]]
        }
        Body::Sequence(all) => all.iter().fold(vec![Vec::new()], |done, one| {
            let next = expand(rule, one, helpers);
            done.iter()
                .flat_map(|left| next.iter().map(move |right| [left.as_slice(), right.as_slice()].concat()))
                .collect()
        }),
    }
}

/// A token of EBNF itself.
#[derive(Clone, Debug, PartialEq)]
enum Token {
    Name(String),
    Literal(String),
    Words(String),
    Sign(char),
}

fn scan(text: &str) -> Result<Vec<Token>, String> {
    let mut tokens = Vec::new();
    let mut rest = text;
    while let Some(first) = rest.chars().next() {
        if let Some(comment) = rest.strip_prefix("(*") {
            let end = comment.find("*)").ok_or("a comment is not closed")?;
            rest = &comment[end + 2..];
        } else if first.is_whitespace() {
            rest = &rest[first.len_utf8()..];
        } else if first == '"' || first == '?' {
            let inner = &rest[1..];
            let end = inner.find(first).ok_or_else(|| format!("{first} is not closed"))?;
            let inside = inner[..end].trim().to_string();
            tokens.push(if first == '"' { Token::Literal(inside) } else { Token::Words(inside) });
            rest = &inner[end + 1..];
        } else if first.is_alphanumeric() {
            let end = rest.find(|c: char| !(c.is_alphanumeric() || c == '_')).unwrap_or(rest.len());
            tokens.push(Token::Name(rest[..end].to_string()));
            rest = &rest[end..];
        } else {
            tokens.push(Token::Sign(first));
            rest = &rest[first.len_utf8()..];
        }
    }
    Ok(tokens)
}

/// Recursive descent over the tokens of EBNF.
struct Reader {
    tokens: Vec<Token>,
    at: usize,
}

impl Reader {
    fn rules(mut self) -> Result<Vec<(String, Body)>, String> {
        let mut rules: Vec<(String, Body)> = Vec::new();
        while self.at < self.tokens.len() {
            let Some(Token::Name(name)) = self.next() else {
                return Err(format!("a rule begins with its name, behind {:?}", rules.last().map(|r| &r.0)));
            };
            if rules.iter().any(|(known, _)| *known == name) {
                return Err(format!("`{name}` is defined twice"));
            }
            self.sign('=')?;
            let body = self.choice()?;
            self.sign(';').map_err(|error| format!("{error} in `{name}`"))?;
            rules.push((name, body));
        }
        Ok(rules)
    }

    fn next(&mut self) -> Option<Token> {
        self.at += 1;
        self.tokens.get(self.at - 1).cloned()
    }

    fn sign(&mut self, sign: char) -> Result<(), String> {
        match self.next() {
            Some(Token::Sign(found)) if found == sign => Ok(()),
            other => Err(format!("{sign} expected, {other:?} found")),
        }
    }

    fn takes(&mut self, sign: char) -> bool {
        let found = self.tokens.get(self.at) == Some(&Token::Sign(sign));
        self.at += usize::from(found);
        found
    }

    fn choice(&mut self) -> Result<Body, String> {
        let mut all = vec![self.sequence()?];
        while self.takes('|') {
            all.push(self.sequence()?);
        }
        Ok(if all.len() == 1 { all.remove(0) } else { Body::Choice(all) })
    }

    fn sequence(&mut self) -> Result<Body, String> {
        let mut all = vec![self.factor()?];
        while self.takes(',') {
            all.push(self.factor()?);
        }
        Ok(if all.len() == 1 { all.remove(0) } else { Body::Sequence(all) })
    }

    fn factor(&mut self) -> Result<Body, String> {
        let close = |reader: &mut Self, sign| {
            let inner = reader.choice()?;
            reader.sign(sign).map(|()| inner)
        };
        match self.next() {
            Some(Token::Name(name)) => Ok(Body::Name(name)),
            Some(Token::Literal(text)) => Ok(Body::Literal(text)),
            Some(Token::Words(said)) => Ok(Body::Words(said)),
            Some(Token::Sign('(')) => close(self, ')'),
            Some(Token::Sign('[')) => close(self, ']').map(|inner| Body::Option(Box::new(inner))),
            Some(Token::Sign('{')) => close(self, '}').map(|inner| Body::Repeat(Box::new(inner))),
            other => Err(format!("{other:?} where a part of a rule was expected")),
        }
    }
}
