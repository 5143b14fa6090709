//! Reads a rule file into [`RuleText`], unchecked.
//!
//! The language is `grammar/rules.abnf`; a production there and the function here (or in
//! `lines`, `words`) have the same name. Nothing is looked up
//! and nothing is balanced: that is the work of [`check`](super::check).
//!
//! A line that cannot be read is reported and stands in for any line that could be in its
//! place, so that one misspelt heading is one error and the lines below it are still read.

use super::error::{RuleError, RuleErrorKind, nearest};
use super::lines::{Line, line};
use super::rest::{Expectation, Mistake, Rest};
use super::syntax::{CaseText, CountText, EditItem, FindItem, RuleText, Span, Spanned};
use super::words::end_of_line;

/// Reads a rule file: the rules that could be read whole, and every mistake.
pub fn rule_file(text: &str) -> (Vec<RuleText>, Vec<RuleError>) {
    let mut errors = Vec::new();
    let lines = read_lines(text, &mut errors);
    let mut blocks = Blocks { lines, next: 0, errors };
    let mut rules = Vec::new();
    blocks.skip_to_rule("`rule`");
    while blocks.next < blocks.lines.len() {
        let n_errors = blocks.errors.len();
        let from = blocks.next;
        let rule = blocks.rule();
        let is_whole = blocks.errors.len() == n_errors && blocks.lines[from..blocks.next].iter().all(Placed::is_read);
        rules.extend(rule.filter(|_| is_whole));
    }
    blocks.errors.sort_by_key(|error| (error.span.start, error.span.end));
    (rules, blocks.errors)
}

/// A line that is not empty; none if it could not be read.
struct Placed {
    line: Option<Line>,
    span: Span,
}

impl Placed {
    fn is_read(&self) -> bool {
        self.line.is_some()
    }
}

fn read_lines(text: &str, errors: &mut Vec<RuleError>) -> Vec<Placed> {
    let mut placed = Vec::new();
    let mut offset = if text.starts_with('\u{FEFF}') { '\u{FEFF}'.len_utf8() } else { 0 };
    for whole in text[offset..].split_inclusive('\n') {
        let rest = Rest { text: without_break(whole), offset };
        offset += whole.len();
        if end_of_line(rest).is_ok() {
            continue;
        }
        let span = content_span(rest);
        match line(rest) {
            Ok((_, line)) => placed.push(Placed { line: Some(line), span }),
            Err(nom::Err::Error(mistake) | nom::Err::Failure(mistake)) => {
                errors.push(unreadable(rest, span.start, &mistake));
                placed.push(Placed { line: None, span });
            }
            Err(nom::Err::Incomplete(_)) => placed.push(Placed { line: None, span }),
        }
    }
    placed
}

fn without_break(line: &str) -> &str {
    line.strip_suffix('\n').map_or(line, |l| l.strip_suffix('\r').unwrap_or(l))
}

/// A line without its indent and without the comment and blanks behind it.
fn content_span(line: Rest) -> Span {
    let mut is_quoted = false;
    let comment = line.text.char_indices().find(|&(_, c)| {
        is_quoted ^= c == '"';
        c == '#' && !is_quoted
    });
    let content = &line.text[..comment.map_or(line.text.len(), |(at, _)| at)];
    let start = line.offset + content.len() - content.trim_start().len();
    start..(line.offset + content.trim_end().len()).max(start)
}

/// The error for a line that reading stopped in.
fn unreadable(line: Rest, start: usize, mistake: &Mistake) -> RuleError {
    let span = token_at(line, mistake.at);
    let found = &line.text[span.start - line.offset..span.end - line.offset];
    let shown = if found.is_empty() { "the end of the line".to_owned() } else { format!("`{}`", found.escape_debug()) };
    let known = mistake.expected.iter().filter_map(|e| match e {
        Expectation::Word(w) => Some(*w),
        Expectation::Thing(_) => None,
    });
    let hint = match &nearest(found, known)[..] {
        [] => None,
        near => Some(format!("did you mean {}?", listed(near.iter().map(|w| format!("`{w}`")), "or"))),
    };
    if mistake.at == start && mistake.expected.len() > 8 {
        let hint =
            hint.or_else(|| Some("every line begins with a verb or a heading; docs/grammar.md lists them".into()));
        return RuleError { kind: RuleErrorKind::UnknownLine { found: shown }, span, label: "this word".into(), hint };
    }
    let expected = listed(
        mistake.expected.iter().map(|e| match e {
            Expectation::Word(w) => format!("`{w}`"),
            Expectation::Thing(t) => (*t).to_owned(),
        }),
        "or",
    );
    RuleError { kind: RuleErrorKind::Unexpected { expected, found: shown }, span, label: "here".into(), hint }
}

/// The word, number or single character at an offset; empty at the end of the line.
fn token_at(line: Rest, at: usize) -> Span {
    let rest = &line.text[at - line.offset..];
    let is_part = |c: char| c.is_alphanumeric();
    let len = match rest.chars().next() {
        None => 0,
        Some(c) if is_part(c) => rest.find(|c| !is_part(c)).unwrap_or(rest.len()),
        Some(c) => c.len_utf8(),
    };
    at..at + len
}

/// `a, b or c`.
pub(super) fn listed(items: impl Iterator<Item = String>, joint: &str) -> String {
    let mut items: Vec<String> = items.collect();
    let Some(last) = items.pop() else { return "nothing".to_owned() };
    if items.is_empty() { last } else { format!("{} {joint} {last}", items.join(", ")) }
}

/// Lines on their way into blocks.
struct Blocks {
    lines: Vec<Placed>,
    next: usize,
    errors: Vec<RuleError>,
}

impl Blocks {
    fn peek(&self) -> Option<&Placed> {
        self.lines.get(self.next)
    }

    /// Takes the next line if `wanted` makes something of it.
    fn take<T>(&mut self, wanted: impl Fn(&Line) -> Option<T>) -> Option<Spanned<T>> {
        let placed = self.peek()?;
        let value = wanted(placed.line.as_ref()?)?;
        let span = placed.span.clone();
        self.next += 1;
        Some(Spanned { value, span })
    }

    /// Takes all next lines that `wanted` makes something of, and the unreadable among them.
    fn take_all<T>(&mut self, wanted: impl Fn(&Line) -> Option<T>) -> Vec<Spanned<T>> {
        let mut taken = Vec::new();
        loop {
            if let Some(one) = self.take(&wanted) {
                taken.push(one);
            } else if self.peek().is_some_and(|placed| !placed.is_read()) {
                self.next += 1;
            } else {
                return taken;
            }
        }
    }

    /// Takes a line that must be here. An unreadable line here, or taken just before, is
    /// held to be the one; else its absence is reported.
    fn need<T>(&mut self, expected: &'static str, wanted: impl Fn(&Line) -> Option<T>) -> Option<Spanned<T>> {
        let found = self.take(wanted);
        if found.is_none() {
            let is_unread = |placed: Option<&Placed>| placed.is_some_and(|p| !p.is_read());
            if is_unread(self.peek()) {
                self.next += 1;
            } else if self.next == 0 || !is_unread(self.lines.get(self.next - 1)) {
                self.misplaced(expected);
            }
        }
        found
    }

    /// Reports that something else was expected where the next line stands.
    fn misplaced(&mut self, expected: &'static str) {
        let (found, span) = match self.peek() {
            Some(placed) => (placed.line.as_ref().map_or("a line", kind_of_line), placed.span.clone()),
            None => ("the end of the file", self.lines.last().map_or(0..0, |l| l.span.end..l.span.end)),
        };
        let is_same = |e: &RuleError| e.span == span && matches!(e.kind, RuleErrorKind::Misplaced { .. });
        if self.errors.last().is_some_and(is_same) {
            return; // One line out of place is one mistake, however many blocks miss it.
        }
        self.errors.push(RuleError {
            kind: RuleErrorKind::Misplaced { expected, found },
            span,
            label: "here".into(),
            hint: Some(
                "a rule has these parts, in this order: rule, says, settings, (case,) find, where, edit, uses or gives"
                    .into(),
            ),
        });
    }

    fn rule(&mut self) -> Option<RuleText> {
        let from = self.next;
        let name = self.need("`rule`", |l| if let Line::Rule(name) = l { Some(name.clone()) } else { None });
        let says = self.need("`says`", |l| if let Line::Says(text) = l { Some(text.clone()) } else { None });
        let settings = self.take_all(|l| if let Line::Setting(setting) = l { Some(setting.clone()) } else { None });
        let mut cases = Vec::new();
        while let Some(case) = self.take(|l| if let Line::Case(text) = l { Some(text.clone()) } else { None }) {
            cases.push(self.body(Some(case.value)));
        }
        if cases.is_empty() {
            cases.push(self.body(None));
        }
        self.skip_to_rule("the next rule");
        let span = self.lines[from].span.start..self.lines[self.next - 1].span.end;
        Some(RuleText { name: name?.value, says: says?.value, settings, cases, span })
    }

    /// Passes over lines that belong to no block, reporting the first of them.
    fn skip_to_rule(&mut self, expected: &'static str) {
        let is_other = |placed: &Placed| !matches!(placed.line, Some(Line::Rule(_)));
        let mut is_reported = false;
        while let Some(placed) = self.peek().filter(|placed| is_other(placed)) {
            if placed.is_read() && !is_reported {
                self.misplaced(expected);
                is_reported = true;
            }
            self.next += 1;
        }
    }

    fn body(&mut self, name: Option<Spanned<String>>) -> CaseText {
        let find = self.find_block();
        let conditions = self.where_block();
        let (edit_heading, edits) = self.edit_block();
        let mut case = CaseText { name, find, conditions, edit_heading, edits, budgets: vec![], options: vec![] };
        for tail in self.take_all(|l| matches!(l, Line::Budget(_) | Line::Option(_)).then(|| l.clone())) {
            match tail.value {
                Line::Budget(value) => case.budgets.push(Spanned { value, span: tail.span }),
                Line::Option(value) => case.options.push(Spanned { value, span: tail.span }),
                _ => {}
            }
        }
        case
    }

    fn find_block(&mut self) -> Vec<Spanned<FindItem>> {
        let heading = self.need("`find`", |l| matches!(l, Line::Find).then_some(()));
        let after = self.next;
        let items = self.take_all(|l| if let Line::FindItem(item) = l { Some(item.clone()) } else { None });
        self.not_empty("`find`", heading, after);
        items
    }

    fn where_block(&mut self) -> Vec<Spanned<CountText>> {
        let heading = self.take(|l| matches!(l, Line::Where).then_some(()));
        let after = self.next;
        let conditions = self.take_all(|l| if let Line::Condition(count) = l { Some(*count) } else { None });
        self.not_empty("`where`", heading, after);
        conditions
    }

    fn edit_block(&mut self) -> (Span, Vec<Spanned<EditItem>>) {
        let heading = self.need("`edit`", |l| matches!(l, Line::Edit).then_some(()));
        let span = heading.as_ref().map_or(0..0, |h| h.span.clone());
        let after = self.next;
        let edits = self.take_all(|l| if let Line::EditItem(item) = l { Some(item.clone()) } else { None });
        self.not_empty("`edit`", heading, after);
        (span, edits)
    }

    fn not_empty(&mut self, name: &'static str, heading: Option<Spanned<()>>, after: usize) {
        if let Some(heading) = heading.filter(|_| self.next == after) {
            self.errors.push(RuleError {
                kind: RuleErrorKind::EmptyBlock { heading: name },
                span: heading.span,
                label: "this heading".into(),
                hint: None,
            });
        }
    }
}

fn kind_of_line(line: &Line) -> &'static str {
    match line {
        Line::Rule(_) => "the next rule",
        Line::Says(_) => "`says`",
        Line::Setting(_) => "a setting",
        Line::Case(_) => "`case`",
        Line::Find => "`find`",
        Line::Where => "`where`",
        Line::Edit => "`edit`",
        Line::FindItem(_) => "something to find",
        Line::Condition(_) => "a condition on the molecule",
        Line::EditItem(_) => "an edit",
        Line::Budget(_) => "`uses` or `gives`",
        Line::Option(_) => "an option",
    }
}
