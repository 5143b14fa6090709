//! The input type of the line parsers: what is left of a line, and where that stands.
//!
//! nom's parsers work on it as on a `&str`; the offset makes byte ranges of the whole text
//! out of what they take. A [`Mistake`] remembers the furthest place that any alternative
//! came to, and all that would have been right there.

use std::str::{CharIndices, Chars};

use nom::error::{ErrorKind, ParseError};
use nom::{IResult, Input, Needed};

use super::syntax::{Span, Spanned};

/// What is left to read.
#[derive(Debug, Clone, Copy)]
pub(super) struct Rest<'a> {
    /// The text itself.
    pub(super) text: &'a str,
    /// Byte offset of its first character in the whole file.
    pub(super) offset: usize,
}

/// What a parser of this folder gives.
pub(super) type Parsed<'a, T> = IResult<Rest<'a>, T, Mistake>;

/// Where reading stopped, and what would have been right there.
#[derive(Debug, Clone)]
pub(super) struct Mistake {
    /// Byte offset in the whole file.
    pub(super) at: usize,
    /// What would have been right, in the order tried.
    pub(super) expected: Vec<Expectation>,
}

/// Something that would have been right.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Expectation {
    /// A word of the language.
    Word(&'static str),
    /// Something else, as it is called.
    Thing(&'static str),
}

impl<'a> Rest<'a> {
    /// The byte range of a text that was taken.
    pub(super) fn span(self) -> Span {
        self.offset..self.offset + self.text.len()
    }

    /// A value made of all that was taken.
    pub(super) fn spanned<T>(self, value: T) -> Spanned<T> {
        Spanned { value, span: self.span() }
    }

    /// The error that something else was expected here.
    pub(super) fn wrong<T>(self, expected: Expectation) -> Parsed<'a, T> {
        Err(nom::Err::Error(Mistake { at: self.offset, expected: vec![expected] }))
    }
}

impl<'a> Input for Rest<'a> {
    type Item = char;
    type Iter = Chars<'a>;
    type IterIndices = CharIndices<'a>;

    fn input_len(&self) -> usize {
        self.text.len()
    }

    fn take(&self, index: usize) -> Self {
        Rest { text: &self.text[..index], offset: self.offset }
    }

    fn take_from(&self, index: usize) -> Self {
        Rest { text: &self.text[index..], offset: self.offset + index }
    }

    fn take_split(&self, index: usize) -> (Self, Self) {
        (self.take_from(index), self.take(index))
    }

    fn position<P: Fn(char) -> bool>(&self, predicate: P) -> Option<usize> {
        self.text.find(predicate)
    }

    fn iter_elements(&self) -> Self::Iter {
        self.text.chars()
    }

    fn iter_indices(&self) -> Self::IterIndices {
        self.text.char_indices()
    }

    fn slice_index(&self, count: usize) -> Result<usize, Needed> {
        Input::slice_index(&self.text, count)
    }
}

impl<'a> ParseError<Rest<'a>> for Mistake {
    fn from_error_kind(input: Rest<'a>, _: ErrorKind) -> Self {
        Mistake { at: input.offset, expected: Vec::new() }
    }

    fn append(_: Rest<'a>, _: ErrorKind, other: Self) -> Self {
        other
    }

    fn or(mut self, mut other: Self) -> Self {
        match self.at.cmp(&other.at) {
            std::cmp::Ordering::Less => other,
            std::cmp::Ordering::Greater => self,
            std::cmp::Ordering::Equal => {
                other.expected.retain(|e| !self.expected.contains(e));
                self.expected.append(&mut other.expected);
                self
            }
        }
    }
}
