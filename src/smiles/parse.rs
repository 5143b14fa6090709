//! Parses a SMILES text into its tree.
//!
//! The language is `grammar/smiles.abnf`; a production there and the function here have the
//! same name. Nothing is counted and nothing is joined: whether the tree is a molecule is
//! asked by `build`.
//!
//! A parser of an optional part fails softly and another is tried; once a part has begun that
//! can be nothing else (a bracket, a branch, a `%`), it fails for good and says why.
//!
//! Invariant: every span lies inside the text, on character boundaries.

use std::ops::Range;

use nom::branch::alt;
use nom::bytes::complete::tag;
use nom::character::complete::{char, one_of, satisfy};
use nom::combinator::{opt, value};
use nom::error::{ErrorKind, ParseError};
use nom::multi::many0;
use nom::{Err, IResult, Parser};

use crate::molecule::{Element, Handedness};

use super::error::{ReadError, ReadErrorKind};
use super::syntax::{AtomText, BondSymbol, Bracket, BranchedAtom, Chain, RingBond, SmilesText, Spanned, Symbol};

/// Most bytes that a text may have.
pub const LONGEST_TEXT: usize = 10_000;
/// Most branches that may be open at once.
pub const DEEPEST_BRANCH: usize = 100;

/// Why a parser failed; nothing in particular when it failed softly.
#[derive(Debug)]
struct Fault(Option<ReadError>);

impl ParseError<&str> for Fault {
    fn from_error_kind(_: &str, _: ErrorKind) -> Fault {
        Fault(None)
    }

    fn append(_: &str, _: ErrorKind, other: Fault) -> Fault {
        other
    }
}

type Parsed<'a, T> = IResult<&'a str, T, Fault>;

/// Parses a text as far as its grammar goes.
///
/// # Errors
/// * the text is empty or longer than [`LONGEST_TEXT`]
/// * the text does not follow `grammar/smiles.abnf`, or nests branches deeper than [`DEEPEST_BRANCH`]
///
/// # Example
/// ```
/// let tree = haloshed::smiles::parse("ClC=C(Cl)Cl").unwrap();
/// assert_eq!(tree.chain.atoms.len(), 4);
/// assert_eq!(haloshed::smiles::parse("ClC=").unwrap_err().span, 3..4);
/// ```
pub fn parse(text: &str) -> Result<SmilesText, ReadError> {
    if text.is_empty() {
        return Err(ReadError { kind: ReadErrorKind::EmptyText, span: 0..0 });
    }
    if text.len() > LONGEST_TEXT {
        let end = (0..=LONGEST_TEXT).rfind(|&end| text.is_char_boundary(end)).unwrap_or(0);
        return Err(ReadError { kind: ReadErrorKind::TooLong { length: text.len() }, span: end..text.len() });
    }
    match (Source { text }).smiles(text) {
        Ok((_, tree)) => Ok(tree),
        Err(Err::Failure(Fault(Some(error)))) => Err(error),
        Err(_) => unreachable!("`smiles` fails for good, with a reason"),
    }
}

/// The whole text: tells where a rest of it begins.
#[derive(Clone, Copy)]
struct Source<'a> {
    text: &'a str,
}

impl<'a> Source<'a> {
    fn smiles(self, input: &'a str) -> Parsed<'a, SmilesText> {
        let (rest, chain) = self.chain(input, 0)?;
        if rest.is_empty() { Ok((rest, SmilesText { chain })) } else { Err(self.stray(rest)) }
    }

    fn chain(self, input: &'a str, depth: usize) -> Parsed<'a, Chain> {
        let (mut rest, first) = self.required_atom(input, depth)?;
        let mut atoms = vec![first];
        loop {
            let (after_bond, bond) = opt(|i| self.bond(i)).parse(rest)?;
            match self.branched_atom(after_bond, depth) {
                Ok((after, atom)) => {
                    atoms.push(BranchedAtom { bond, ..atom });
                    rest = after;
                }
                Err(Err::Error(_)) if bond.is_none() => return Ok((rest, Chain { atoms })),
                Err(Err::Error(_)) => return Err(self.no_atom(rest, after_bond)),
                Err(hard) => return Err(hard),
            }
        }
    }

    /// The first atom of a chain, whose absence is an error.
    fn required_atom(self, input: &'a str, depth: usize) -> Parsed<'a, BranchedAtom> {
        match self.branched_atom(input, depth) {
            Err(Err::Error(_)) => Err(self.unexpected(input, |found| ReadErrorKind::ExpectedAtom { found })),
            other => other,
        }
    }

    fn branched_atom(self, input: &'a str, depth: usize) -> Parsed<'a, BranchedAtom> {
        let (rest, atom) = self.atom(input)?;
        let (rest, ring_bonds) = many0(|i| self.ring_bond(i)).parse(rest)?;
        let (rest, branches) = many0(|i| self.branch(i, depth + 1)).parse(rest)?;
        Ok((rest, BranchedAtom { bond: None, atom, ring_bonds, branches }))
    }

    fn branch(self, input: &'a str, depth: usize) -> Parsed<'a, Chain> {
        let (inside, _) = char('(').parse(input)?;
        let opening = self.span(input, inside);
        if depth > DEEPEST_BRANCH {
            return Err(fail(ReadErrorKind::TooDeep, opening));
        }
        if inside.is_empty() {
            return Err(fail(ReadErrorKind::OpenBranch, opening));
        }
        if let Some(after) = inside.strip_prefix(')') {
            return Err(fail(ReadErrorKind::EmptyBranch, self.span(input, after)));
        }
        let (after_bond, bond) = opt(|i| self.bond(i)).parse(inside)?;
        if bond.is_some() && self.atom(after_bond).is_err_and(|e| matches!(e, Err::Error(_))) {
            return Err(self.no_atom(inside, after_bond));
        }
        let (rest, mut chain) = self.chain(after_bond, depth)?;
        chain.atoms[0].bond = bond;
        match rest.strip_prefix(')') {
            Some(after) => Ok((after, chain)),
            None if rest.is_empty() => Err(fail(ReadErrorKind::OpenBranch, opening)),
            None => Err(self.stray(rest)),
        }
    }

    fn ring_bond(self, input: &'a str) -> Parsed<'a, RingBond> {
        let (rest, bond) = opt(|i| self.bond(i)).parse(input)?;
        let (rest, number) = self.ring_number(rest)?;
        Ok((rest, RingBond { bond, number }))
    }

    fn ring_number(self, input: &'a str) -> Parsed<'a, Spanned<u8>> {
        let (rest, number) = match input.strip_prefix('%') {
            None => digit(input)?,
            Some(digits) => {
                let short = |_| fail(ReadErrorKind::ShortRingNumber, self.span(input, digits));
                let (rest, tens) = digit(digits).map_err(short)?;
                let (rest, ones) = digit(rest).map_err(short)?;
                (rest, 10 * tens + ones)
            }
        };
        Ok((rest, Spanned { value: number, span: self.span(input, rest) }))
    }

    fn bond(self, input: &'a str) -> Parsed<'a, Spanned<BondSymbol>> {
        let (rest, symbol) = alt((
            value(BondSymbol::Single, char('-')),
            value(BondSymbol::Double, char('=')),
            value(BondSymbol::Triple, char('#')),
            value(BondSymbol::Aromatic, char(':')),
            value(BondSymbol::Up, char('/')),
            value(BondSymbol::Down, char('\\')),
        ))
        .parse(input)?;
        Ok((rest, Spanned { value: symbol, span: self.span(input, rest) }))
    }

    fn atom(self, input: &'a str) -> Parsed<'a, AtomText> {
        if input.starts_with('[') {
            return self.bracket_atom(input);
        }
        let (rest, (symbol, is_aromatic)) = alt((organic_atom, aromatic_atom)).parse(input)?;
        Ok((rest, AtomText { symbol, is_aromatic, bracket: None, span: self.span(input, rest) }))
    }

    fn bracket_atom(self, input: &'a str) -> Parsed<'a, AtomText> {
        let inside = &input[1..];
        let (rest, (symbol, is_aromatic)) = self.symbol(input, inside)?;
        let (rest, chirality) = opt(|i| self.chirality(i)).parse(rest)?;
        let (rest, n_hydrogens) = opt(hydrogens).parse(rest)?;
        let (rest, charge) = opt(charge).parse(rest)?;
        let Some(after) = rest.strip_prefix(']') else { return Err(self.open_bracket(input, rest)) };
        let bracket = Bracket { chirality, n_hydrogens: n_hydrogens.unwrap_or(0), charge: charge.unwrap_or(0) };
        Ok((after, AtomText { symbol, is_aromatic, bracket: Some(bracket), span: self.span(input, after) }))
    }

    fn symbol(self, opening: &'a str, input: &'a str) -> Parsed<'a, (Symbol, bool)> {
        let digits = input.trim_start_matches(|c: char| c.is_ascii_digit());
        if digits.len() < input.len() {
            return Err(fail(ReadErrorKind::Isotope, self.span(input, digits)));
        }
        let Some(first) = input.chars().next() else { return Err(self.open_bracket(opening, input)) };
        if first.is_ascii_lowercase() {
            let known =
                aromatic_atom(input).ok().filter(|(rest, _)| !rest.starts_with(|c: char| c.is_ascii_lowercase()));
            return known.ok_or_else(|| self.no_element(input));
        }
        let rest = input[first.len_utf8()..].trim_start_matches(|c: char| c.is_ascii_lowercase());
        match &input[..input.len() - rest.len()] {
            "H" => Ok((rest, (Symbol::Hydrogen, false))),
            symbol if first.is_ascii_uppercase() => match Element::from_symbol(symbol) {
                Some(element) => Ok((rest, (Symbol::Element(element), false))),
                None => Err(self.no_element(input)),
            },
            _ => Err(self.unexpected(input, |found| ReadErrorKind::ExpectedAtom { found })),
        }
    }

    /// Letters that are no element here, as one name.
    fn no_element(self, input: &'a str) -> Err<Fault> {
        let rest = input[1..].trim_start_matches(|c: char| c.is_ascii_lowercase());
        let symbol = input[..input.len() - rest.len()].to_owned();
        fail(unusable_element(symbol), self.span(input, rest))
    }

    fn chirality(self, input: &'a str) -> Parsed<'a, Spanned<Handedness>> {
        let (rest, handedness) =
            alt((value(Handedness::Clockwise, tag("@@")), value(Handedness::Anticlockwise, tag("@")))).parse(input)?;
        if ["TH", "AL", "SP", "TB", "OH"].iter().any(|class| rest.starts_with(class)) {
            let after = rest[2..].trim_start_matches(|c: char| c.is_ascii_digit());
            let written = input[..input.len() - after.len()].to_owned();
            return Err(fail(ReadErrorKind::OtherConfiguration { written }, self.span(input, after)));
        }
        Ok((rest, Spanned { value: handedness, span: self.span(input, rest) }))
    }

    /// What is wrong where a bracket should close.
    fn open_bracket(self, opening: &'a str, rest: &'a str) -> Err<Fault> {
        if let Some(class) = rest.strip_prefix(':') {
            let after = class.trim_start_matches(|c: char| c.is_ascii_digit());
            return fail(ReadErrorKind::AtomClass, self.span(rest, after));
        }
        if rest.contains(']') {
            return self.unexpected(rest, |found| ReadErrorKind::UnexpectedCharacter { found });
        }
        fail(ReadErrorKind::OpenBracket, self.span(opening, &opening[1..]))
    }

    /// What is wrong after a bond symbol that no atom follows.
    fn no_atom(self, bond: &'a str, after: &'a str) -> Err<Fault> {
        if after.is_empty() || after.starts_with(')') {
            return fail(ReadErrorKind::DanglingBond, self.span(bond, after));
        }
        self.unexpected(after, |found| ReadErrorKind::ExpectedAtom { found })
    }

    /// What is wrong where neither an atom nor a branch nor an end follows.
    fn stray(self, rest: &'a str) -> Err<Fault> {
        let after_first = &rest[rest.chars().next().map_or(0, char::len_utf8)..];
        match rest.chars().next() {
            Some(')') => fail(ReadErrorKind::UnopenedBranch, self.span(rest, after_first)),
            Some('0'..='9' | '%') => fail(ReadErrorKind::MisplacedRingNumber, self.span(rest, after_first)),
            _ => self.unexpected(rest, |found| ReadErrorKind::UnexpectedCharacter { found }),
        }
    }

    /// The error for a character that may not stand where it stands: what it tells by itself,
    /// or else what `otherwise` makes of it.
    fn unexpected(self, rest: &'a str, otherwise: impl Fn(char) -> ReadErrorKind) -> Err<Fault> {
        let Some(found) = rest.chars().next() else {
            return fail(ReadErrorKind::EmptyText, self.text.len()..self.text.len());
        };
        let at = self.offset(rest);
        let one = at..at + found.len_utf8();
        match found {
            '.' => fail(ReadErrorKind::SeveralComponents, one),
            '*' => fail(ReadErrorKind::Wildcard, one),
            '$' => fail(ReadErrorKind::QuadrupleBond, one),
            c if c.is_ascii_alphabetic() => self.stray_letter(at).unwrap_or_else(|| fail(otherwise(found), one)),
            _ => fail(otherwise(found), one),
        }
    }

    /// The element that a stray letter is part of, with its neighbour or alone.
    fn stray_letter(self, at: usize) -> Option<Err<Fault>> {
        let candidates = [(at.checked_sub(1), at + 1), (Some(at), at + 2), (Some(at), at + 1)];
        candidates.into_iter().find_map(|(from, to)| {
            let symbol = self.text.get(from?..to)?;
            is_element(symbol).then(|| {
                let usable = symbol == "H" || Element::from_symbol(symbol).is_some();
                let symbol = symbol.to_owned();
                let kind = if usable { ReadErrorKind::NeedsBrackets { symbol } } else { unusable_element(symbol) };
                fail(kind, from.unwrap_or(at)..to)
            })
        })
    }

    fn offset(self, rest: &str) -> usize {
        self.text.len() - rest.len()
    }

    fn span(self, from: &str, to: &str) -> Range<usize> {
        self.offset(from)..self.offset(to)
    }
}

fn fail(kind: ReadErrorKind, span: Range<usize>) -> Err<Fault> {
    Err::Failure(Fault(Some(ReadError { kind, span })))
}

fn organic_atom(input: &str) -> Parsed<'_, (Symbol, bool)> {
    let (rest, symbol) = alt((tag("Cl"), tag("Br"), recognised_capital)).parse(input)?;
    let element = Element::from_symbol(symbol).ok_or(Err::Error(Fault(None)))?;
    Ok((rest, (Symbol::Element(element), false)))
}

fn recognised_capital(input: &str) -> Parsed<'_, &str> {
    let (rest, _) = one_of("BCNOPSFI").parse(input)?;
    Ok((rest, &input[..1]))
}

fn aromatic_atom(input: &str) -> Parsed<'_, (Symbol, bool)> {
    let (rest, element) = alt((
        value(Element::B, char('b')),
        value(Element::C, char('c')),
        value(Element::N, char('n')),
        value(Element::O, char('o')),
        value(Element::P, char('p')),
        value(Element::S, char('s')),
    ))
    .parse(input)?;
    Ok((rest, (Symbol::Element(element), true)))
}

fn hydrogens(input: &str) -> Parsed<'_, u8> {
    let (rest, _) = char('H').parse(input)?;
    let (rest, number) = opt(digit).parse(rest)?;
    Ok((rest, number.unwrap_or(1)))
}

fn charge(input: &str) -> Parsed<'_, i8> {
    let (rest, sign) = one_of("+-").parse(input)?;
    let (rest, size) = opt(alt((value(2, char(sign)), nonzero))).parse(rest)?;
    let size = size.unwrap_or(1);
    Ok((rest, if sign == '+' { size } else { -size }))
}

fn nonzero(input: &str) -> Parsed<'_, i8> {
    let (rest, digit) = one_of("123456789").parse(input)?;
    Ok((rest, digit.to_digit(10).map_or(0, |n| n as i8)))
}

fn digit(input: &str) -> Parsed<'_, u8> {
    let (rest, digit) = satisfy(|c| c.is_ascii_digit()).parse(input)?;
    Ok((rest, digit as u8 - b'0'))
}

fn unusable_element(symbol: String) -> ReadErrorKind {
    if is_element(&symbol) {
        ReadErrorKind::UnsupportedElement { symbol }
    } else {
        ReadErrorKind::UnknownElement { symbol }
    }
}

/// Whether this is the symbol of an element, of aromatic selenium, arsenic or silicon, or of
/// deuterium or tritium.
fn is_element(symbol: &str) -> bool {
    const SYMBOLS: &str = " H He Li Be B C N O F Ne Na Mg Al Si P S Cl Ar K Ca Sc Ti V Cr Mn Fe Co Ni Cu Zn Ga Ge \
        As Se Br Kr Rb Sr Y Zr Nb Mo Tc Ru Rh Pd Ag Cd In Sn Sb Te I Xe Cs Ba La Ce Pr Nd Pm Sm Eu Gd Tb Dy Ho Er \
        Tm Yb Lu Hf Ta W Re Os Ir Pt Au Hg Tl Pb Bi Po At Rn Fr Ra Ac Th Pa U Np Pu Am Cm Bk Cf Es Fm Md No Lr Rf \
        Db Sg Bh Hs Mt Ds Rg Cn Nh Fl Mc Lv Ts Og D T se as si te ";
    SYMBOLS.split_whitespace().any(|known| known == symbol)
}
