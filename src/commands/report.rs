//! Errors and warnings as they are shown: a sentence, an excerpt of the text it is about, help.
//!
//! This file alone knows the excerpt library. Colour only where stderr is a terminal.

use std::io::{self, IsTerminal, Write};
use std::ops::Range;

use annotate_snippets::{AnnotationKind, Group, Level, Renderer, Snippet};

/// One error.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(crate) struct Report {
    /// What is wrong: lower case, no full stop.
    pub(crate) message: String,
    /// Where, if it is in a text.
    pub(crate) excerpt: Option<Excerpt>,
    /// What to do.
    pub(crate) help: Option<String>,
}

/// A place in a text.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(crate) struct Excerpt {
    /// What the text is: `compound`, or the name of a file.
    pub(crate) origin: String,
    /// The whole text.
    pub(crate) text: String,
    /// The bytes to mark.
    pub(crate) span: Range<usize>,
    /// What stands under the mark.
    pub(crate) label: String,
}

impl Report {
    /// An error that is about no text.
    pub(crate) fn plain(message: impl Into<String>) -> Report {
        Report { message: message.into(), excerpt: None, help: None }
    }

    /// The same with help.
    pub(crate) fn with_help(self, help: impl Into<String>) -> Report {
        Report { help: Some(help.into()), ..self }
    }

    fn render(&self, renderer: &Renderer) -> String {
        let title = Group::with_title(Level::ERROR.primary_title(&self.message));
        match (&self.excerpt, &self.help) {
            (Some(excerpt), help) => {
                let mark = AnnotationKind::Primary.span(excerpt.bounded_span()).label(&excerpt.label);
                let group = title.element(Snippet::source(&excerpt.text).path(&excerpt.origin).annotation(mark));
                renderer.render(&[group.elements(help.as_ref().map(|help| Level::HELP.message(help)))])
            }
            (None, Some(help)) => {
                let help = Group::with_title(Level::HELP.primary_title(help));
                format!("{}\n{}", renderer.render(&[title]), renderer.render(&[help]))
            }
            (None, None) => renderer.render(&[title]),
        }
    }
}

impl Excerpt {
    /// The span cut to the text and to whole characters, which the renderer relies on.
    fn bounded_span(&self) -> Range<usize> {
        let floor = |at: usize| (0..=at.min(self.text.len())).rev().find(|&i| self.text.is_char_boundary(i));
        let start = floor(self.span.start).unwrap_or(0);
        let end = (self.span.end.min(self.text.len())..=self.text.len()).find(|&i| self.text.is_char_boundary(i));
        start..end.unwrap_or(start).max(start)
    }
}

/// Shows errors. A stderr that cannot be written to is nobody's to report.
pub(crate) fn show(reports: &[Report], stderr: &mut io::Stderr) {
    let renderer = if stderr.is_terminal() { Renderer::styled() } else { Renderer::plain() };
    for report in reports {
        let _ = writeln!(stderr, "{}", report.render(&renderer));
    }
}

/// Shows a note in one line.
pub(crate) fn note(text: &str) {
    let _ = writeln!(io::stderr(), "note: {text}");
}

/// Shows a warning in one line.
pub(crate) fn warn(text: &str) {
    let _ = writeln!(io::stderr(), "warning: {text}");
}

#[cfg(test)]
mod tests {
    use super::*;

    fn check(text: &str, span: Range<usize>, expected: &str) {
        let excerpt = Excerpt { origin: "compound".into(), text: text.into(), span, label: "here".into() };
        let report = Report { message: "wrong".into(), excerpt: Some(excerpt), help: None };
        assert_eq!(report.render(&Renderer::plain()), expected);
    }

    #[test]
    fn a_span_beyond_the_text_marks_its_end() {
        check("CC", 7..9, "error: wrong\n --> compound:1:3\n  |\n1 | CC\n  |   ^ here");
    }

    #[test]
    fn a_span_within_a_character_marks_all_of_it() {
        check("Cµ", 2..2, "error: wrong\n --> compound:1:2\n  |\n1 | Cµ\n  |  ^ here");
    }
}
