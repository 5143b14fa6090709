//! Parsers of the words of a line: labels, names, numbers, texts and the fixed words.
//!
//! A function has the name of its production in `grammar/rules.abnf`. Words are read whatever
//! their case, as runs of letters and digits, so that `sites` is a misspelt word rather than
//! `site` and a stray `s`.

use nom::Parser;
use nom::branch::alt;
use nom::bytes::complete::{take_while, take_while1};
use nom::combinator::{cut, map, opt, value};
use nom::multi::many0;
use nom::sequence::{delimited, preceded};

use super::rest::{Expectation, Mistake, Parsed, Rest};
use super::rule::{Amount, Counted, SiteState};
use super::syntax::{CountText, Label, Place, Reagent, Spanned};
use crate::molecule::{BondOrder, Element, Halogen};

const LABEL: Expectation = Expectation::Thing("a label (one capital letter, or one and a digit)");
const NAME: Expectation = Expectation::Thing("a name (lower-case words joined by hyphens)");
const NUMBER: Expectation = Expectation::Thing("a number up to 999");
const TEXT: Expectation = Expectation::Thing("a text in double quotes");
const SPACE: Expectation = Expectation::Thing("a space");
const MORE: Expectation = Expectation::Thing("more on this line");
const END: Expectation = Expectation::Thing("the end of the line");

fn is_blank(c: char) -> bool {
    c == ' ' || c == '\t'
}

fn is_beyond_ascii(c: char) -> bool {
    c >= '\u{80}'
}

/// `*WSP`
pub(super) fn indent(i: Rest) -> Parsed<Rest> {
    take_while(is_blank).parse(i)
}

/// `1*WSP`
pub(super) fn gap(i: Rest) -> Parsed<Rest> {
    let missing = if i.text.is_empty() { MORE } else { SPACE };
    take_while1(is_blank).parse(i).or_else(|_: nom::Err<Mistake>| i.wrong(missing))
}

/// What may follow the last word of a line; line breaks have been taken off.
pub(super) fn end_of_line(i: Rest) -> Parsed<()> {
    let (rest, _) = indent(i)?;
    let (rest, _) = opt(comment).parse(rest)?;
    if rest.text.is_empty() { Ok((rest, ())) } else { rest.wrong(END) }
}

fn comment(i: Rest) -> Parsed<()> {
    let within = |c: char| is_blank(c) || c.is_ascii_graphic() || is_beyond_ascii(c);
    value((), (sign('#'), take_while(within))).parse(i)
}

/// One fixed character.
pub(super) fn sign<'a>(c: char) -> impl Parser<Rest<'a>, Output = char, Error = Mistake> {
    move |i: Rest<'a>| match i.text.chars().next() {
        Some(found) if found == c => Ok((nom::Input::take_from(&i, c.len_utf8()), c)),
        _ => i.wrong(match c {
            '-' => Expectation::Word("-"),
            '+' => Expectation::Word("+"),
            '\'' => Expectation::Word("'"),
            '#' => Expectation::Word("#"),
            _ => Expectation::Word("\""),
        }),
    }
}

/// One fixed word, whatever its case.
pub(super) fn word<'a>(wanted: &'static str) -> impl Parser<Rest<'a>, Output = (), Error = Mistake> {
    move |i: Rest<'a>| match take_while1::<_, _, Mistake>(|c: char| c.is_ascii_alphanumeric()).parse(i) {
        Ok((rest, found)) if found.text.eq_ignore_ascii_case(wanted) => Ok((rest, ())),
        _ => i.wrong(Expectation::Word(wanted)),
    }
}

/// A fixed word or its plural.
fn noun<'a>(one: &'static str, many: &'static str) -> impl Parser<Rest<'a>, Output = (), Error = Mistake> {
    move |i: Rest<'a>| word(one).parse(i).or_else(|mistake| word(many).parse(i).map_err(|_| mistake))
}

/// Fixed words with a gap between each two and one behind the last.
pub(super) fn words<'a>(wanted: &'static [&'static str]) -> impl Parser<Rest<'a>, Output = (), Error = Mistake> {
    move |i: Rest<'a>| {
        let mut rest = i;
        for &w in wanted {
            (rest, _) = (word(w), gap).parse(rest)?;
        }
        Ok((rest, ()))
    }
}

/// `%x41-5A [DIGIT]`
pub(super) fn label(i: Rest) -> Parsed<Label> {
    let Ok((rest, run)) =
        take_while1::<_, _, Mistake>(|c: char| c.is_ascii_alphanumeric() || is_beyond_ascii(c)).parse(i)
    else {
        return i.wrong(LABEL);
    };
    match run.text.as_bytes() {
        [b'A'..=b'Z'] | [b'A'..=b'Z', b'0'..=b'9'] => Ok((rest, run.spanned(run.text.to_owned()))),
        _ => i.wrong(LABEL),
    }
}

/// `label ["'"]`
pub(super) fn place(i: Rest) -> Parsed<Place> {
    let (rest, label) = label(i)?;
    let (rest, prime) = opt(sign('\'')).parse(rest)?;
    let span = i.offset..rest.offset;
    Ok((rest, Place { label: label.value, is_primed: prime.is_some(), span }))
}

/// `place "-" place`
pub(super) fn pair(i: Rest) -> Parsed<(Place, Place)> {
    map((place, sign('-'), place), |(a, _, b)| (a, b)).parse(i)
}

/// Lower-case words joined by hyphens.
pub(super) fn name(i: Rest) -> Parsed<Spanned<String>> {
    let (rest, run) = take_while(|c: char| !is_blank(c) && c != '#').parse(i)?;
    let is_word = |w: &str| {
        w.starts_with(|c: char| c.is_ascii_lowercase())
            && w.bytes().all(|b| b.is_ascii_lowercase() || b.is_ascii_digit())
    };
    if run.text.split('-').all(is_word) { Ok((rest, run.spanned(run.text.to_owned()))) } else { i.wrong(NAME) }
}

/// `1*3DIGIT`
pub(super) fn number(i: Rest) -> Parsed<u32> {
    let (rest, digits) = take_while(|c: char| c.is_ascii_digit()).parse(i)?;
    match digits.text.parse() {
        Ok(n) if digits.text.len() <= 3 => Ok((rest, n)),
        _ => i.wrong(NUMBER),
    }
}

/// A text between double quotes, on one line.
pub(super) fn text(i: Rest) -> Parsed<Spanned<String>> {
    let inside = |c: char| c != '"' && (c == ' ' || c.is_ascii_graphic() || is_beyond_ascii(c));
    if !i.text.starts_with('"') {
        return i.wrong(TEXT);
    }
    let (rest, content) = delimited(sign('"'), take_while(inside), sign('"')).parse(i)?;
    if content.text.is_empty() { i.wrong(TEXT) } else { Ok((rest, content.spanned(content.text.to_owned()))) }
}

/// `"saturated" / "vinyl" / "cumulated" / "acetylenic"`
pub(super) fn state(i: Rest) -> Parsed<SiteState> {
    alt((
        value(SiteState::Saturated, word("saturated")),
        value(SiteState::Vinyl, word("vinyl")),
        value(SiteState::Cumulated, word("cumulated")),
        value(SiteState::Acetylenic, word("acetylenic")),
    ))
    .parse(i)
}

/// `"single" / "double" / "triple"`
pub(super) fn order(i: Rest) -> Parsed<BondOrder> {
    alt((
        value(BondOrder::Single, word("single")),
        value(BondOrder::Double, word("double")),
        value(BondOrder::Triple, word("triple")),
    ))
    .parse(i)
}

/// Orders joined by `or`, each with its place.
pub(super) fn orders(i: Rest) -> Parsed<Vec<Spanned<BondOrder>>> {
    ored(spanned_order, i)
}

fn spanned_order(i: Rest) -> Parsed<Spanned<BondOrder>> {
    let (rest, value) = order(i)?;
    Ok((rest, Spanned { value, span: i.offset..rest.offset }))
}

/// Things joined by `or`.
fn ored<'a, T: Clone>(item: impl Fn(Rest<'a>) -> Parsed<'a, T> + Copy, i: Rest<'a>) -> Parsed<'a, Vec<T>> {
    let (rest, first) = item(i)?;
    let (rest, others) = many0(preceded((gap, word("or"), gap), cut(item))).parse(rest)?;
    Ok((rest, std::iter::once(first).chain(others).collect()))
}

/// `"halogen" / one-halogen *( gap "or" gap one-halogen )`
pub(super) fn halogen_choice(i: Rest) -> Parsed<[bool; 4]> {
    alt((value([true; 4], word("halogen")), some_halogens)).parse(i)
}

fn some_halogens(i: Rest) -> Parsed<[bool; 4]> {
    let (rest, kinds) = ored(one_halogen, i)?;
    Ok((rest, Halogen::ALL.map(|h| kinds.contains(&h))))
}

/// `"fluorine" / "chlorine" / "bromine" / "iodine"`
pub(super) fn one_halogen(i: Rest) -> Parsed<Halogen> {
    alt((
        value(Halogen::F, word("fluorine")),
        value(Halogen::Cl, word("chlorine")),
        value(Halogen::Br, word("bromine")),
        value(Halogen::I, word("iodine")),
    ))
    .parse(i)
}

/// `amount gap counted`
pub(super) fn count(i: Rest) -> Parsed<CountText> {
    map((amount, gap, counted), |(amount, _, counted)| CountText { amount, counted }).parse(i)
}

fn amount(i: Rest) -> Parsed<Amount> {
    alt((
        value(Amount::Exactly(0), word("no")),
        map(preceded(words(&["at", "least"]), number), Amount::AtLeast),
        map(preceded(words(&["at", "most"]), number), Amount::AtMost),
        map(number, Amount::Exactly),
    ))
    .parse(i)
}

fn counted(i: Rest) -> Parsed<Counted> {
    alt((
        value(Counted::Hydrogens, noun("hydrogen", "hydrogens")),
        value(Counted::Halogens, noun("halogen", "halogens")),
        value(Counted::Carbons, noun("carbon", "carbons")),
        value(Counted::OneHalogen(Halogen::F), noun("fluorine", "fluorines")),
        value(Counted::OneHalogen(Halogen::Cl), noun("chlorine", "chlorines")),
        value(Counted::OneHalogen(Halogen::Br), noun("bromine", "bromines")),
        value(Counted::OneHalogen(Halogen::I), noun("iodine", "iodines")),
    ))
    .parse(i)
}

/// The name of an element, hydrogen left out.
pub(super) fn element(i: Rest) -> Parsed<Element> {
    let mut mistake = None;
    for element in Element::ALL {
        match word(element.name()).parse(i) {
            Ok((rest, ())) => return Ok((rest, element)),
            Err(nom::Err::Error(e)) => {
                mistake = Some(match mistake {
                    None => e,
                    Some(before) => nom::error::ParseError::or(before, e),
                });
            }
            Err(other) => return Err(other),
        }
    }
    mistake.map_or_else(|| i.wrong(Expectation::Thing("an element")), |e| Err(nom::Err::Error(e)))
}

/// `( "electron" / "proton" / "water" ) ["s"]`
pub(super) fn reagent(i: Rest) -> Parsed<Reagent> {
    alt((
        value(Reagent::Electron, noun("electron", "electrons")),
        value(Reagent::Proton, noun("proton", "protons")),
        value(Reagent::Water, noun("water", "waters")),
    ))
    .parse(i)
}

/// `( "+" / "-" ) DIGIT`
pub(super) fn charge(i: Rest) -> Parsed<i8> {
    let (rest, sign) = alt((value(1i8, sign('+')), value(-1i8, sign('-')))).parse(i)?;
    let (after, digits) = take_while(|c: char| c.is_ascii_digit()).parse(rest)?;
    match digits.text.parse::<i8>() {
        Ok(n) if digits.text.len() == 1 => Ok((after, sign * n)),
        _ => rest.wrong(Expectation::Thing("one digit")),
    }
}
