//! The formats, by name and by the ending of a file.

use std::path::Path;

/// A format that a network can be written in.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Format {
    /// For reading in a terminal.
    Table,
    /// One JSON object.
    Json,
    /// JSON records, a line each.
    Jsonl,
    /// Comma-separated values for a spreadsheet.
    Csv,
    /// A figure for Graphviz.
    Dot,
    /// Counts by generation and rule.
    Summary,
}

impl Format {
    /// The format that the ending of a file stands for, if it stands for one.
    ///
    /// # Example
    /// ```
    /// use haloshed::output::format::Format;
    ///
    /// assert_eq!(Format::of_file("pce.gv".as_ref()), Some(Format::Dot));
    /// assert_eq!(Format::of_file("pce".as_ref()), None);
    /// ```
    pub fn of_file(path: &Path) -> Option<Format> {
        match path.extension()?.to_str()?.to_ascii_lowercase().as_str() {
            "txt" => Some(Format::Table),
            "json" => Some(Format::Json),
            "jsonl" | "ndjson" => Some(Format::Jsonl),
            "csv" => Some(Format::Csv),
            "dot" | "gv" => Some(Format::Dot),
            _ => None,
        }
    }
}
