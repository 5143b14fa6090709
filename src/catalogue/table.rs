//! The rows of `data/compounds.csv`, read once.
//!
//! Invariant: every row has six cells, its SMILES is as our own writer writes it, its CAS
//! number is right, and no two rows share a name; tests read the table and see to it.

use std::sync::OnceLock;

const COMPOUNDS: &str = include_str!("../../data/compounds.csv");

/// One known compound.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Entry {
    /// Canonical SMILES, configuration included where the name fixes it.
    pub smiles: String,
    /// Systematic name.
    pub name: String,
    /// CAS registry number.
    pub cas: String,
    /// Abbreviations in use at sites, the commonest first.
    pub abbreviations: Vec<String>,
    /// Everyday and older names.
    pub synonyms: Vec<String>,
    /// How number, name and structure were checked against each other.
    pub source: String,
}

impl Entry {
    /// Every text that means this compound: name, abbreviations, synonyms.
    pub fn texts(&self) -> impl Iterator<Item = &str> {
        let others = self.abbreviations.iter().chain(&self.synonyms);
        std::iter::once(self.name.as_str()).chain(others.map(String::as_str))
    }
}

/// Every known compound, in the order of the table.
///
/// # Panics
/// Never: a test reads the embedded table.
pub fn entries() -> &'static [Entry] {
    static ENTRIES: OnceLock<Vec<Entry>> = OnceLock::new();
    ENTRIES.get_or_init(|| read(COMPOUNDS).expect("the embedded table is read by a test"))
}

fn read(table: &str) -> Result<Vec<Entry>, csv::Error> {
    let mut reader = csv::Reader::from_reader(table.as_bytes());
    let mut record = csv::StringRecord::new();
    let mut entries = Vec::new();
    while reader.read_record(&mut record)? {
        entries.push(entry(&record));
    }
    Ok(entries)
}

fn entry(record: &csv::StringRecord) -> Entry {
    let cell = |index: usize| record.get(index).unwrap_or_default();
    Entry {
        smiles: cell(0).to_owned(),
        name: cell(1).to_owned(),
        cas: cell(2).to_owned(),
        abbreviations: list(cell(3)),
        synonyms: list(cell(4)),
        source: cell(5).to_owned(),
    }
}

/// The parts of a cell that holds several texts.
pub(super) fn list(cell: &str) -> Vec<String> {
    cell.split("; ").filter(|part| !part.is_empty()).map(str::to_owned).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_columns_are_those_that_are_read() {
        let header = COMPOUNDS.lines().next().unwrap();
        assert_eq!(header, "smiles,name,cas,abbreviations,synonyms,source");
    }

    #[test]
    fn no_cell_that_must_be_filled_is_empty() {
        for entry in read(COMPOUNDS).unwrap() {
            let filled = [&entry.smiles, &entry.name, &entry.cas, &entry.source];
            assert!(filled.iter().all(|cell| !cell.is_empty()), "{entry:?}");
            assert!(entry.texts().all(|text| text == text.trim() && !text.contains(';')), "{entry:?}");
        }
    }
}
