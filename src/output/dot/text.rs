//! Text in DOT: quoted strings, and the HTML-like markup of labels.
//!
//! # Source
//! The DOT language and HTML-like labels, as documented by Graphviz.

use crate::output::record::Compound;

/// A double-quoted string.
///
/// # Example
/// ```
/// use haloshed::output::dot::text::quoted;
///
/// assert_eq!(quoted(r#"C/C=C\C "x""#), r#""C/C=C\\C \"x\"""#);
/// ```
pub fn quoted(text: &str) -> String {
    let mut quoted = String::from("\"");
    for c in text.chars() {
        match c {
            '"' => quoted.push_str("\\\""),
            '\\' => quoted.push_str("\\\\"),
            '\n' => quoted.push_str("\\n"),
            // Other control characters have no place in a label.
            c if c.is_control() => quoted.push(' '),
            c => quoted.push(c),
        }
    }
    quoted.push('"');
    quoted
}

/// Text inside an HTML-like label.
pub fn markup(text: &str) -> String {
    let mut escaped = String::new();
    for c in text.chars() {
        push_escaped(c, &mut escaped);
    }
    escaped
}

fn push_escaped(c: char, escaped: &mut String) {
    match c {
        '&' => escaped.push_str("&amp;"),
        '<' => escaped.push_str("&lt;"),
        '>' => escaped.push_str("&gt;"),
        '"' => escaped.push_str("&quot;"),
        c if c.is_control() => escaped.push(' '),
        c => escaped.push(c),
    }
}

/// The formula of a compound, its counts set low; a SMILES stays as it is, as its digits are
/// ring numbers.
pub fn formula_markup(compound: &Compound) -> String {
    if compound.condensed == compound.smiles {
        return markup(&compound.formula_text());
    }
    let mut escaped = String::new();
    let mut is_low = false;
    let mut before = ' ';
    for c in compound.formula_text().chars() {
        let goes_low = c.is_ascii_digit() && (is_low || before.is_ascii_alphabetic() || matches!(before, ')' | ']'));
        match (is_low, goes_low) {
            (false, true) => escaped.push_str("<sub>"),
            (true, false) => escaped.push_str("</sub>"),
            _ => {}
        }
        is_low = goes_low;
        push_escaped(c, &mut escaped);
        before = c;
    }
    if is_low {
        escaped.push_str("</sub>");
    }
    escaped
}

/// Most characters of a line of a name, where it can be broken.
const NAME_LINE: usize = 16;

/// Name and abbreviation of a compound in short lines, broken after hyphens and at spaces.
pub fn name_lines(compound: &Compound) -> Vec<String> {
    let title = compound.title();
    let mut lines: Vec<String> = Vec::new();
    for piece in title.split_inclusive(['-', ' ']) {
        match lines.last_mut() {
            Some(line) if line.chars().count() + piece.trim_end().chars().count() <= NAME_LINE => line.push_str(piece),
            _ => lines.push(piece.to_owned()),
        }
    }
    lines.iter().map(|line| line.trim_end().to_owned()).collect()
}
