//! Builds the LALR(1) automaton of a grammar, lists its conflicts and takes sentences through it.
//!
//! A grammar without a conflict here is unambiguous: for every sentence there is one reading.

use std::collections::{BTreeMap, VecDeque};

use crate::ebnf::Grammar;

/// A set of terminals.
type Set = u128;
/// A production and how far it is read.
type Item = (usize, usize);

/// What a state does with a token.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Action {
    /// Takes it and goes on in that state.
    Shift(usize),
    /// Closes the production.
    Reduce(usize),
    /// The sentence is complete.
    Accept,
}

/// Two readings of one beginning.
#[derive(Debug)]
pub struct Conflict {
    /// The token at which the readings part.
    pub token: String,
    /// What was read before it, as short as possible.
    pub before: Vec<String>,
    /// The readings: productions with a point where the reader stands.
    pub readings: Vec<String>,
}

impl std::fmt::Display for Conflict {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        writeln!(f, "behind   {}\nbefore   {}", self.before.join(" "), self.token)?;
        self.readings.iter().try_for_each(|reading| writeln!(f, "  either {reading}"))
    }
}

/// The automaton.
pub struct Automaton {
    /// Names of the symbols, terminals first; the first terminal is the end of the text.
    symbols: Vec<String>,
    terminals: usize,
    productions: Vec<(usize, Vec<usize>)>,
    /// Every production by its left side.
    by_left: BTreeMap<usize, Vec<usize>>,
    first: Vec<Set>,
    states: Vec<State>,
    conflicts: Vec<Conflict>,
}

#[derive(Default)]
struct State {
    /// The items the state is entered with, and what may follow each.
    kernel: BTreeMap<Item, Set>,
    goto: BTreeMap<usize, usize>,
    actions: BTreeMap<usize, Action>,
    /// The state from which it was first reached, and by which symbol.
    from: Option<(usize, usize)>,
}

const END: &str = "end of the text";

impl Automaton {
    /// Builds the LALR(1) automaton.
    pub fn new(grammar: &Grammar) -> Self {
        Self::build(grammar, true)
    }

    /// Builds the canonical LR(1) automaton: many more states, and what a state reads can really stand there.
    pub fn canonical(grammar: &Grammar) -> Self {
        Self::build(grammar, false)
    }

    fn build(grammar: &Grammar, merged: bool) -> Self {
        let mut automaton = Self::with_symbols(grammar);
        automaton.find_first();
        automaton.find_states(merged);
        automaton.find_actions();
        automaton
    }

    /// Beginnings with two readings.
    pub fn conflicts(&self) -> &[Conflict] {
        &self.conflicts
    }

    /// How many states there are.
    pub fn size(&self) -> usize {
        self.states.len()
    }

    fn with_symbols(grammar: &Grammar) -> Self {
        let is_rule = |name: &str| grammar.productions.iter().any(|(left, _)| left == name);
        let mut symbols = vec![END.to_string()];
        let add = |symbols: &mut Vec<String>, name: &String| {
            if !symbols.contains(name) {
                symbols.push(name.clone());
            }
        };
        for name in grammar.productions.iter().flat_map(|(_, right)| right).filter(|name| !is_rule(name)) {
            add(&mut symbols, name);
        }
        let terminals = symbols.len();
        assert!(terminals <= Set::BITS as usize, "{terminals} terminals do not fit into the set");
        symbols.push("start".into());
        for (left, _) in &grammar.productions {
            add(&mut symbols, left);
        }
        let place = |name: &String| symbols.iter().position(|known| known == name).unwrap();
        let mut productions = vec![(terminals, vec![terminals + 1])];
        for (left, right) in &grammar.productions {
            productions.push((place(left), right.iter().map(place).collect()));
        }
        let mut by_left: BTreeMap<usize, Vec<usize>> = BTreeMap::new();
        for (index, (left, _)) in productions.iter().enumerate() {
            by_left.entry(*left).or_default().push(index);
        }
        let (first, states, conflicts) = (Vec::new(), Vec::new(), Vec::new());
        Self { symbols, terminals, productions, by_left, first, states, conflicts }
    }

    /// FIRST of every symbol. Only the start rule may be empty and nothing refers to it, so that a sequence
    /// begins with what its first symbol begins with.
    fn find_first(&mut self) {
        self.first = (0..self.symbols.len()).map(|s| if s < self.terminals { 1 << s } else { 0 }).collect();
        loop {
            let before = self.first.clone();
            for (left, right) in &self.productions {
                if let Some(head) = right.first() {
                    self.first[*left] |= self.first[*head];
                }
            }
            if before == self.first {
                return;
            }
        }
    }

    fn closure(&self, kernel: &BTreeMap<Item, Set>) -> BTreeMap<Item, Set> {
        let mut items = kernel.clone();
        let mut open: VecDeque<Item> = items.keys().copied().collect();
        while let Some((production, dot)) = open.pop_front() {
            let right = &self.productions[production].1;
            let Some(rules) = right.get(dot).and_then(|symbol| self.by_left.get(symbol)) else { continue };
            let follow = right.get(dot + 1).map_or(items[&(production, dot)], |next| self.first[*next]);
            for rule in rules {
                let known = items.entry((*rule, 0)).or_default();
                if *known | follow != *known {
                    *known |= follow;
                    open.push_back((*rule, 0));
                }
            }
        }
        items
    }

    /// If merged, states of equal kernels are one state whose lookaheads grow until nothing changes.
    fn find_states(&mut self, merged: bool) {
        let key = |(item, follow): (&Item, &Set)| (*item, if merged { 0 } else { *follow });
        let mut known: BTreeMap<Vec<(Item, Set)>, usize> = BTreeMap::new();
        known.insert(vec![key((&(0, 0), &1))], 0);
        self.states.push(State { kernel: [((0, 0), 1)].into(), ..State::default() });
        let mut open = VecDeque::from([0]);
        while let Some(index) = open.pop_front() {
            let mut targets: BTreeMap<usize, BTreeMap<Item, Set>> = BTreeMap::new();
            for ((production, dot), follow) in self.closure(&self.states[index].kernel) {
                if let Some(symbol) = self.productions[production].1.get(dot) {
                    targets.entry(*symbol).or_default().insert((production, dot + 1), follow);
                }
            }
            for (symbol, kernel) in targets {
                let core = kernel.iter().map(key).collect();
                let target = *known.entry(core).or_insert_with(|| {
                    self.states.push(State { from: Some((index, symbol)), ..State::default() });
                    self.states.len() - 1
                });
                self.states[index].goto.insert(symbol, target);
                let mut grew = self.states[target].kernel.is_empty();
                for (item, follow) in kernel {
                    let set = self.states[target].kernel.entry(item).or_default();
                    grew |= *set | follow != *set;
                    *set |= follow;
                }
                if grew {
                    open.push_back(target);
                }
            }
        }
    }

    fn find_actions(&mut self) {
        for index in 0..self.states.len() {
            let items = self.closure(&self.states[index].kernel);
            let mut actions: BTreeMap<usize, Vec<(Action, String)>> = BTreeMap::new();
            for ((production, dot), follow) in &items {
                let right = &self.productions[*production].1;
                let reading = self.reading(*production, *dot);
                match right.get(*dot) {
                    Some(symbol) if *symbol < self.terminals => {
                        let action = Action::Shift(self.states[index].goto[symbol]);
                        actions.entry(*symbol).or_default().push((action, reading));
                    }
                    Some(_) => {}
                    None => {
                        let action =
                            if *production == 0 { Action::Accept } else { Action::Reduce(*production) };
                        for symbol in (0..self.terminals).filter(|symbol| follow >> symbol & 1 == 1) {
                            actions.entry(symbol).or_default().push((action, reading.clone()));
                        }
                    }
                }
            }
            for (symbol, all) in actions {
                if all.iter().any(|(action, _)| *action != all[0].0) {
                    let mut readings: Vec<String> = all.iter().map(|(_, reading)| reading.clone()).collect();
                    readings.sort();
                    let before = self.shortest_way(index);
                    let token = self.symbols[symbol].clone();
                    self.conflicts.push(Conflict { token, before, readings });
                }
                self.states[index].actions.insert(symbol, all[0].0);
            }
        }
    }

    fn reading(&self, production: usize, dot: usize) -> String {
        let (left, right) = &self.productions[production];
        let mut words: Vec<&str> = right.iter().map(|symbol| self.symbols[*symbol].as_str()).collect();
        words.insert(dot, "•");
        format!("{} = {}", self.symbols[*left], words.join(" "))
    }

    fn shortest_way(&self, mut state: usize) -> Vec<String> {
        let mut way = Vec::new();
        while let Some((from, symbol)) = self.states[state].from {
            way.push(self.symbols[symbol].clone());
            state = from;
        }
        way.reverse();
        way
    }

    /// The terminals by name.
    pub fn terminals(&self) -> &[String] {
        &self.symbols[..self.terminals]
    }

    /// Whether a state reads both terminals, so that a lexer could not tell which one is meant.
    pub fn reads_both(&self, one: &str, other: &str) -> Option<Vec<String>> {
        let place = |name: &str| self.terminals().iter().position(|known| known == name);
        let (one, other) = (place(one)?, place(other)?);
        let both = |state: &State| state.actions.contains_key(&one) && state.actions.contains_key(&other);
        self.states.iter().position(both).map(|state| self.shortest_way(state))
    }

    /// Takes a sentence through the automaton. Each token is a list of terminals it may be, the first that the
    /// state reads is taken. An error is the index of the first token that cannot stand where it stands.
    pub fn accept(&self, sentence: &[Vec<String>]) -> Result<(), usize> {
        let place = |name: &String| self.terminals().iter().position(|known| known == name);
        let mut stack = vec![0];
        let end = vec![END.to_string()];
        for (index, token) in sentence.iter().chain(std::iter::once(&end)).enumerate() {
            loop {
                let actions = &self.states[*stack.last().ok_or(index)?].actions;
                match token.iter().filter_map(place).find_map(|terminal| actions.get(&terminal)) {
                    Some(Action::Shift(state)) => {
                        stack.push(*state);
                        break;
                    }
                    Some(Action::Reduce(production)) => {
                        let (left, right) = &self.productions[*production];
                        stack.truncate(stack.len() - right.len());
                        let below = *stack.last().ok_or(index)?;
                        stack.push(*self.states[below].goto.get(left).ok_or(index)?);
                    }
                    Some(Action::Accept) => return Ok(()),
                    None => return Err(index),
                }
            }
        }
        Err(sentence.len())
    }
}
