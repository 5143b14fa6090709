//! Makes sentences of a language from its grammar in ABNF.
//!
//! A sentence is drawn by walking the grammar with a budget of bytes of luck: each choice
//! takes one. When the budget is used up the walk takes the shortest way out, so every walk
//! ends, and a shrunk seed is a shorter sentence.

use std::collections::BTreeMap;

use abnf::types::{Kind, Node, Repeat, TerminalValues};
use proptest::collection::vec;
use proptest::prelude::*;

/// Most repetitions of a part beyond those that its grammar asks for.
const MOST_MORE: usize = 3;

/// Sentences of `abnf_text` that begin at the production `start`.
///
/// # Panics
/// If the text is no ABNF, or a production is used that is neither in it nor in the core rules.
pub(crate) fn sentences(abnf_text: &str, start: &str) -> impl Strategy<Value = String> + use<> {
    let grammar = Grammar::of(abnf_text);
    let start = start.to_owned();
    vec(any::<u8>(), 0..200).prop_map(move |luck| {
        let mut walk = Walk { grammar: &grammar, luck: &luck, next: 0, sentence: String::new() };
        walk.rule(&start);
        walk.sentence
    })
}

#[derive(Clone, Debug)]
struct Grammar {
    rules: BTreeMap<String, Node>,
    /// Depth of the flattest tree of each production.
    depths: BTreeMap<String, usize>,
}

impl Grammar {
    fn of(abnf_text: &str) -> Grammar {
        let core = "DIGIT = %x30-39\nALPHA = %x41-5A / %x61-7A\nDQUOTE = %x22\nSP = %x20\nHTAB = %x09\n\
                    WSP = SP / HTAB\nLF = %x0A\nCR = %x0D\nCRLF = CR LF\nVCHAR = %x21-7E\n";
        let text = format!("{core}{}\n", abnf_text.trim_end()).replace("\r\n", "\n").replace('\n', "\r\n");
        let mut rules: BTreeMap<String, Node> = BTreeMap::new();
        for rule in abnf::rulelist(&text).expect("the grammar is ABNF") {
            let name = rule.name().to_lowercase();
            let node = match (rule.kind(), rules.remove(&name)) {
                (Kind::Incremental, Some(earlier)) => Node::alternatives(&[earlier, rule.node().clone()]),
                _ => rule.node().clone(),
            };
            rules.insert(name, node);
        }
        let mut grammar = Grammar { rules, depths: BTreeMap::new() };
        grammar.measure();
        grammar
    }

    /// Finds the depths, from the flattest production up.
    fn measure(&mut self) {
        while let Some((name, depth)) = self.rules.iter().find_map(|(name, node)| {
            let known = self.depths.contains_key(name);
            (!known).then(|| self.depth(node)).flatten().map(|depth| (name.clone(), depth + 1))
        }) {
            self.depths.insert(name, depth);
        }
        let endless: Vec<&String> = self.rules.keys().filter(|name| !self.depths.contains_key(*name)).collect();
        assert!(endless.is_empty(), "productions without an end or with an unknown part: {endless:?}");
    }

    fn depth(&self, node: &Node) -> Option<usize> {
        match node {
            Node::Alternatives(nodes) => nodes.iter().filter_map(|n| self.depth(n)).min(),
            Node::Concatenation(nodes) => nodes.iter().try_fold(0, |most, n| Some(self.depth(n)?.max(most))),
            Node::Repetition { repeat, node } => {
                if least(repeat) == 0 {
                    Some(0)
                } else {
                    self.depth(node)
                }
            }
            Node::Rulename(name) => self.depths.get(&name.to_lowercase()).copied(),
            Node::Group(node) => self.depth(node),
            Node::Optional(_) | Node::String(_) | Node::TerminalValues(_) => Some(0),
            Node::Prose(_) => None,
        }
    }
}

fn least(repeat: &Repeat) -> usize {
    match repeat {
        Repeat::Specific(n) => *n,
        Repeat::Variable { min, .. } => min.unwrap_or(0),
    }
}

fn most(repeat: &Repeat) -> usize {
    match repeat {
        Repeat::Specific(n) => *n,
        Repeat::Variable { max, .. } => max.unwrap_or(usize::MAX),
    }
}

struct Walk<'a> {
    grammar: &'a Grammar,
    luck: &'a [u8],
    next: usize,
    sentence: String,
}

impl Walk<'_> {
    /// A number below `n`, or nothing when the luck is used up.
    fn draw(&mut self, n: usize) -> Option<usize> {
        let byte = *self.luck.get(self.next)?;
        self.next += 1;
        Some(usize::from(byte) % n)
    }

    fn rule(&mut self, name: &str) {
        let grammar = self.grammar;
        let node = grammar.rules.get(&name.to_lowercase()).unwrap_or_else(|| panic!("no production `{name}`"));
        self.node(node);
    }

    fn node(&mut self, node: &Node) {
        match node {
            Node::Alternatives(nodes) => {
                let flattest = || nodes.iter().min_by_key(|n| self.grammar.depth(n).unwrap_or(usize::MAX));
                let choice = match flattest() {
                    Some(flattest) => self.draw(nodes.len()).map_or(flattest, |i| &nodes[i]),
                    None => return,
                };
                self.node(choice);
            }
            Node::Concatenation(nodes) => nodes.iter().for_each(|n| self.node(n)),
            Node::Repetition { repeat, node } => {
                let least = least(repeat);
                let more = (most(repeat) - least).min(MOST_MORE);
                let n = least + self.draw(more + 1).unwrap_or(0);
                (0..n).for_each(|_| self.node(node));
            }
            Node::Rulename(name) => self.rule(name),
            Node::Group(node) => self.node(node),
            Node::Optional(node) => {
                if self.draw(2) == Some(1) {
                    self.node(node);
                }
            }
            Node::String(literal) => self.string(literal.value(), literal.is_case_sensitive()),
            Node::TerminalValues(values) => self.values(values),
            Node::Prose(prose) => panic!("prose makes no sentence: {prose}"),
        }
    }

    fn string(&mut self, text: &str, is_case_sensitive: bool) {
        let in_capitals = !is_case_sensitive && text.contains(char::is_alphabetic) && self.draw(2) == Some(1);
        if in_capitals { self.sentence.push_str(&text.to_uppercase()) } else { self.sentence.push_str(text) }
    }

    fn values(&mut self, values: &TerminalValues) {
        match values {
            TerminalValues::Range(from, to) => {
                let offset = self.draw((to - from) as usize + 1).unwrap_or(0);
                self.sentence.extend(char::from_u32(from + offset as u32));
            }
            TerminalValues::Concatenation(codes) => {
                self.sentence.extend(codes.iter().filter_map(|&c| char::from_u32(c)));
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    proptest! {
        #[test]
        fn a_small_language_is_spoken(sentence in sentences("list = \"(\" *item \")\"\nitem = DIGIT / list\n", "list")) {
            let mut depth = 0;
            for c in sentence.chars() {
                match c {
                    '(' => depth += 1,
                    ')' => depth -= 1,
                    c => prop_assert!(c.is_ascii_digit() && depth > 0),
                }
            }
            prop_assert!(depth == 0 && sentence.starts_with('('));
        }
    }
}
