//! Parsers of the lines of a rule file, one a production of `grammar/rules.abnf`.
//!
//! Every line says by its words alone what it is, so a line is read without knowing the block
//! it stands in; [`parse`](super::parse) then sees to the blocks.

use nom::Parser;
use nom::branch::alt;
use nom::combinator::{map, value};
use nom::sequence::{delimited, preceded};

use super::rest::{Mistake, Parsed, Rest};
use super::rule::SiteState;
use super::syntax::{Budget, CaseOption, CountText, EditItem, FindItem, Setting, Spanned, Switch};
use super::words::{
    charge, count, element, end_of_line, gap, halogen_choice, indent, label, name, number, order, orders, pair, place,
    reagent, sign, state, text, word, words,
};

/// One line.
#[derive(Debug, Clone)]
pub(super) enum Line {
    Rule(Spanned<String>),
    Says(Spanned<String>),
    Setting(Setting),
    Case(Spanned<String>),
    Find,
    Where,
    Edit,
    FindItem(FindItem),
    Condition(CountText),
    EditItem(EditItem),
    Budget(Budget),
    Option(CaseOption),
}

/// Any line, its line break taken off.
pub(super) fn line(i: Rest) -> Parsed<Line> {
    let content = alt((heading, map(setting_line, Line::Setting), find_item, condition_line, edit_item, tail_line));
    preceded(indent, content).parse(i)
}

fn heading(i: Rest) -> Parsed<Line> {
    alt((
        map(rest_of_line("rule", name), Line::Rule),
        map(rest_of_line("says", text), Line::Says),
        map(rest_of_line("case", text), Line::Case),
        value(Line::Find, (word("find"), end_of_line)),
        value(Line::Where, (word("where"), end_of_line)),
        value(Line::Edit, (word("edit"), end_of_line)),
    ))
    .parse(i)
}

/// A line of one word and what follows it.
fn rest_of_line<'a, T>(
    first: &'static str,
    content: impl Parser<Rest<'a>, Output = T, Error = Mistake>,
) -> impl Parser<Rest<'a>, Output = T, Error = Mistake> {
    delimited((word(first), gap), content, end_of_line)
}

/// A line of several words and what follows them.
fn rest_of_words<'a, T>(
    first: &'static [&'static str],
    content: impl Parser<Rest<'a>, Output = T, Error = Mistake>,
) -> impl Parser<Rest<'a>, Output = T, Error = Mistake> {
    delimited(words(first), content, end_of_line)
}

fn setting_line(i: Rest) -> Parsed<Setting> {
    let switch = alt((value(Switch::On, word("on")), value(Switch::Off, word("off"))));
    alt((
        map(rest_of_line("group", name), |group| Setting::Group(group.value)),
        map(rest_of_line("default", switch), Setting::Default),
        map(rest_of_line("copies", number), Setting::Copies),
        map(rest_of_line("generations", (number, gap, word("to"), gap, number)), |(from, _, (), _, to)| {
            Setting::Generations(from, to)
        }),
    ))
    .parse(i)
}

fn find_item(i: Rest) -> Parsed<Line> {
    let content = alt((
        site_line,
        map(rest_of_line("aryl", label), FindItem::Aryl),
        map(rest_of_line("carbene", label), FindItem::Carbene),
        bond_line,
        halogen_line,
        ligand_line,
    ));
    map(content, Line::FindItem).parse(i)
}

fn site_line(i: Rest) -> Parsed<FindItem> {
    let (rest, (label, state)) = (
        preceded((word("site"), gap), label),
        alt((delimited(gap, state, end_of_line), value(SiteState::Any, end_of_line))),
    )
        .parse(i)?;
    Ok((rest, FindItem::Site(label, state)))
}

fn bond_line(i: Rest) -> Parsed<FindItem> {
    let content = (label, sign('-'), label, gap, orders);
    map(rest_of_line("bond", content), |(a, _, b, _, orders)| FindItem::Bond(a, b, orders)).parse(i)
}

fn halogen_line(i: Rest) -> Parsed<FindItem> {
    let content = (halogen_choice, gap, label, gap, word("on"), gap, label, end_of_line);
    map(content, |(kinds, _, x, _, (), _, a, ())| FindItem::Halogen(kinds, x, a)).parse(i)
}

fn ligand_line(i: Rest) -> Parsed<FindItem> {
    let content = (label, gap, word("has"), gap, count, end_of_line);
    map(content, |(a, _, (), _, count, ())| FindItem::Ligands(a, count)).parse(i)
}

fn condition_line(i: Rest) -> Parsed<Line> {
    map(rest_of_words(&["molecule", "has"], count), Line::Condition).parse(i)
}

fn edit_item(i: Rest) -> Parsed<Line> {
    let content = alt((
        map(rest_of_line("release", place), EditItem::Release),
        map(rest_of_words(&["add", "hydrogen", "to"], place), EditItem::Add),
        map(rest_of_words(&["take", "hydrogen", "from"], place), EditItem::Take),
        map(rest_of_line("raise", pair), |(a, b)| EditItem::Raise(a, b)),
        map(rest_of_line("lower", pair), |(a, b)| EditItem::Lower(a, b)),
        map(rest_of_words(&["make", "carbene"], place), EditItem::Make),
        map(rest_of_words(&["close", "carbene"], place), EditItem::Close),
        map(rest_of_line("new", (element, gap, label)), |(element, _, label)| EditItem::New(element, label)),
        map(rest_of_line("join", (pair, gap, order)), |((a, b), _, order)| EditItem::Join(a, b, order)),
        map(rest_of_line("charge", (place, gap, charge)), |(a, _, by)| EditItem::Charge(a, by)),
    ));
    map(content, Line::EditItem).parse(i)
}

/// What may follow the edits.
fn tail_line(i: Rest) -> Parsed<Line> {
    let uses = map(rest_of_line("uses", (number, gap, reagent)), |(n, _, reagent)| budget(reagent, n, 1));
    let gives = map(rest_of_line("gives", (number, gap, reagent)), |(n, _, reagent)| budget(reagent, n, -1));
    let retain = (word("retain"), gap, word("configuration"), end_of_line);
    let ring = (word("ring"), gap, word("limits"), gap, word("off"), end_of_line);
    alt((
        uses,
        gives,
        value(Line::Option(CaseOption::RetainConfiguration), retain),
        value(Line::Option(CaseOption::RingLimitsOff), ring),
    ))
    .parse(i)
}

fn budget(reagent: super::syntax::Reagent, n: u32, sign: i32) -> Line {
    Line::Budget(Budget { reagent, consumed: sign * n.cast_signed() })
}
