//! Cuts a SMILES into tokens.
//!
//! The tokens are those of `grammar/smiles.abnf`; a production there and the function here have
//! the same name. How atoms hang together is not asked here.
//!
//! Invariant: spans are in order, touch, and cover the text.

use std::ops::Range;

use nom::branch::alt;
use nom::bytes::complete::tag;
use nom::character::complete::{char, one_of};
use nom::combinator::{map, opt, value};
use nom::{IResult, Parser};

use super::error::{Kind, LONGEST_TEXT, ReadError};
use crate::molecule::{BondOrder, Element, Handedness};

/// A token and where it stands.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Token {
    /// What it is.
    pub kind: TokenKind,
    /// Where, in bytes.
    pub span: Range<usize>,
}

/// What a token can be.
#[derive(Debug, Clone, PartialEq, Eq)]
#[allow(missing_docs)]
pub enum TokenKind {
    Atom(AtomText),
    Bond(BondText),
    Ring(u32),
    BranchStart,
    BranchEnd,
}

/// A bond symbol.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum BondText {
    /// `-`, `=`, `#` or `:`.
    Order(BondOrder),
    /// `/`: the second atom lies above the first.
    Up,
    /// `\`: the second atom lies below the first.
    Down,
}

/// An atom as written.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct AtomText {
    /// The element; none for a hydrogen written as an atom.
    pub element: Option<Element>,
    /// Whether it was in lower case.
    pub is_aromatic: bool,
    /// What its bracket says, if it has one.
    pub bracket: Option<Bracket>,
}

/// The inside of a bracket besides the element.
#[derive(Debug, Clone, PartialEq, Eq)]
#[allow(missing_docs)]
pub struct Bracket {
    pub handedness: Option<Handedness>,
    pub n_hydrogens: u8,
    pub charge: i8,
}

type Read<'a, T> = IResult<&'a str, T>;

/// Cuts a text into tokens.
///
/// # Errors
/// * empty or too long a text, or a character that begins no token: with its place
pub fn tokens(text: &str) -> Result<Vec<Token>, ReadError> {
    if text.is_empty() {
        return Err(ReadError::new(Kind::Empty, 0..0));
    }
    if text.len() > LONGEST_TEXT {
        return Err(ReadError::new(Kind::TooLong { length: text.len() }, 0..first_char(text)));
    }
    let mut found = Vec::new();
    let mut rest = text;
    while !rest.is_empty() {
        let start = text.len() - rest.len();
        let (after, kind) = if rest.starts_with('[') {
            bracket_atom(rest).map_err(|(kind, span)| ReadError::new(kind, start + span.start..start + span.end))?
        } else {
            token(rest).map_err(|_| stray(rest, start))?
        };
        found.push(Token { kind, span: start..text.len() - after.len() });
        rest = after;
    }
    Ok(found)
}

fn first_char(text: &str) -> usize {
    text.chars().next().map_or(0, char::len_utf8)
}

/// What to say of a character that begins no token.
fn stray(rest: &str, start: usize) -> ReadError {
    let span = start..start + first_char(rest);
    let first = rest.chars().next().unwrap_or(' ');
    let kind = match first {
        '.' => Kind::SeveralComponents,
        '*' => Kind::Wildcard,
        '$' => Kind::QuadrupleBond,
        '%' => Kind::RingNumber { found: shown(&rest[1..]) },
        c if c.is_ascii_digit() => Kind::Unexpected { found: format!("`{c}`") },
        _ => Kind::Unexpected { found: shown(rest) },
    };
    ReadError::new(kind, span)
}

/// A character as a message shows it.
fn shown(rest: &str) -> String {
    rest.chars().next().map_or_else(|| "the end of the text".to_owned(), |c| format!("`{}`", c.escape_debug()))
}

fn token(input: &str) -> Read<'_, TokenKind> {
    alt((
        map(organic_atom, TokenKind::Atom),
        map(bond, TokenKind::Bond),
        map(ring_number, TokenKind::Ring),
        value(TokenKind::BranchStart, char('(')),
        value(TokenKind::BranchEnd, char(')')),
    ))
    .parse(input)
}

fn organic_atom(input: &str) -> Read<'_, AtomText> {
    let plain = |element, is_aromatic| AtomText { element: Some(element), is_aromatic, bracket: None };
    alt((
        value(plain(Element::Cl, false), tag("Cl")),
        value(plain(Element::Br, false), tag("Br")),
        value(plain(Element::B, false), char('B')),
        value(plain(Element::C, false), char('C')),
        value(plain(Element::N, false), char('N')),
        value(plain(Element::O, false), char('O')),
        value(plain(Element::P, false), char('P')),
        value(plain(Element::S, false), char('S')),
        value(plain(Element::F, false), char('F')),
        value(plain(Element::I, false), char('I')),
        value(plain(Element::B, true), char('b')),
        value(plain(Element::C, true), char('c')),
        value(plain(Element::N, true), char('n')),
        value(plain(Element::O, true), char('o')),
        value(plain(Element::P, true), char('p')),
        value(plain(Element::S, true), char('s')),
    ))
    .parse(input)
}

fn bond(input: &str) -> Read<'_, BondText> {
    alt((
        value(BondText::Order(BondOrder::Single), char('-')),
        value(BondText::Order(BondOrder::Double), char('=')),
        value(BondText::Order(BondOrder::Triple), char('#')),
        value(BondText::Order(BondOrder::Aromatic), char(':')),
        value(BondText::Up, char('/')),
        value(BondText::Down, char('\\')),
    ))
    .parse(input)
}

fn ring_number(input: &str) -> Read<'_, u32> {
    let digit = |input| map(one_of("0123456789"), |c| c.to_digit(10).unwrap_or(0)).parse(input);
    alt((map((char('%'), digit, digit), |(_, tens, ones)| 10 * tens + ones), digit)).parse(input)
}

/// A bracket atom; what is wrong is told with its place from the bracket on.
fn bracket_atom(input: &str) -> Result<(&str, TokenKind), (Kind, Range<usize>)> {
    let Some(end) = input.find(']') else { return Err((Kind::OpenBracket, 0..1)) };
    let inside = &input[1..end];
    let at = |rest: &str| 1 + inside.len() - rest.len();
    if inside.starts_with(|c: char| c.is_ascii_digit()) {
        let n = inside.bytes().take_while(u8::is_ascii_digit).count();
        let end = 1 + n;
        return Err((Kind::Isotope, 1..end));
    }
    let (rest, (element, is_aromatic)) = bracket_symbol(inside).map_err(|kind| {
        let n = first_char(inside);
        (kind, 1..1 + n.max(1))
    })?;
    let (rest, handedness) = handedness(rest).unwrap_or((rest, None));
    let (rest, n_hydrogens) = hydrogen_count(rest).unwrap_or((rest, 0));
    let (rest, charge) = charge(rest).unwrap_or((rest, 0));
    if !rest.is_empty() {
        let kind = if rest.starts_with(':') {
            Kind::AtomClass
        } else {
            Kind::InBracket { expected: "`]`", found: shown(rest) }
        };
        return Err((kind, at(rest)..at(rest) + first_char(rest)));
    }
    let bracket = Bracket { handedness, n_hydrogens, charge };
    Ok((&input[end + 1..], TokenKind::Atom(AtomText { element, is_aromatic, bracket: Some(bracket) })))
}

/// The symbol that begins the inside of a bracket: element (none for hydrogen) and case.
fn bracket_symbol(inside: &str) -> Result<(&str, (Option<Element>, bool)), Kind> {
    let letters: String = inside.chars().take_while(char::is_ascii_alphabetic).collect();
    for n in [2, 1] {
        let Some(symbol) = letters.get(..n) else { continue };
        if let Some(element) = Element::from_symbol(symbol) {
            return Ok((&inside[n..], (Some(element), false)));
        }
        if n == 1 && symbol == "H" {
            return Ok((&inside[1..], (None, false)));
        }
        let aromatic = ["b", "c", "n", "o", "p", "s"].contains(&symbol);
        if n == 1 && aromatic {
            return Ok((&inside[1..], (Element::from_symbol(&symbol.to_uppercase()), true)));
        }
    }
    Err(match inside.chars().next() {
        Some('*') => Kind::Wildcard,
        Some(c) if c.is_ascii_alphabetic() => {
            let known_start = letters.chars().take(2).enumerate().take_while(|&(i, c)| i == 0 || c.is_lowercase());
            Kind::UnsupportedElement { symbol: known_start.map(|(_, c)| c).collect() }
        }
        _ => Kind::InBracket { expected: "an element", found: shown(inside) },
    })
}

fn handedness(input: &str) -> Read<'_, Option<Handedness>> {
    opt(alt((value(Handedness::Clockwise, tag("@@")), value(Handedness::Anticlockwise, char('@'))))).parse(input)
}

fn hydrogen_count(input: &str) -> Read<'_, u8> {
    map((char('H'), opt(one_of("0123456789"))), |(_, n)| n.and_then(|c| c.to_digit(10)).map_or(1, |n| n as u8))
        .parse(input)
}

fn charge(input: &str) -> Read<'_, i8> {
    let digit = |input| map(one_of("0123456789"), |c: char| c.to_digit(10).map_or(1, |n| n as i8)).parse(input);
    alt((
        value(2, tag("++")),
        value(-2, tag("--")),
        map((char('+'), opt(digit)), |(_, n)| n.unwrap_or(1)),
        map((char('-'), opt(digit)), |(_, n)| -n.unwrap_or(1)),
    ))
    .parse(input)
}
