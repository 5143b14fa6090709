//! The states of one frame, each stored once, in the order in which they were found.
//!
//! Rows stand end to end in one array; a hash table holds four-byte row numbers only.

use std::hash::Hasher;

use hashbrown::HashTable;
use rustc_hash::FxHasher;

/// A set of rows of equal length that numbers them.
#[derive(Debug, Clone, Default)]
pub struct StateTable {
    n_words: usize,
    rows: Vec<u64>,
    numbers: HashTable<u32>,
}

impl StateTable {
    /// An empty table for rows of `n_words` words.
    pub fn new(n_words: usize) -> StateTable {
        StateTable { n_words, rows: Vec::new(), numbers: HashTable::new() }
    }

    /// Number of rows.
    pub fn len(&self) -> usize {
        self.rows.len() / self.n_words.max(1)
    }

    /// Whether there is no row.
    pub fn is_empty(&self) -> bool {
        self.rows.is_empty()
    }

    /// The row with this number.
    pub fn row(&self, number: usize) -> &[u64] {
        &self.rows[number * self.n_words..(number + 1) * self.n_words]
    }

    /// Number of a row, if it is there.
    pub fn find(&self, row: &[u64]) -> Option<usize> {
        self.numbers.find(hash(row), |&n| self.row(n as usize) == row).map(|&n| n as usize)
    }

    /// Number of a row, which is added if it is new; and whether it was.
    ///
    /// # Panics
    /// Beyond 2^32 rows; limits keep far below.
    pub fn insert(&mut self, row: &[u64]) -> (usize, bool) {
        let hashed = hash(row);
        if let Some(&n) = self.numbers.find(hashed, |&n| self.row(n as usize) == row) {
            return (n as usize, false);
        }
        let number = u32::try_from(self.len()).expect("compound limits stay below 2^32");
        self.rows.extend_from_slice(row);
        let (rows, n_words) = (&self.rows, self.n_words);
        self.numbers.insert_unique(hashed, number, |&n| {
            let start = n as usize * n_words;
            hash(&rows[start..start + n_words])
        });
        (number as usize, true)
    }

    /// Bytes of memory held.
    pub fn n_bytes(&self) -> usize {
        self.rows.capacity() * size_of::<u64>() + self.numbers.allocation_size()
    }
}

fn hash(row: &[u64]) -> u64 {
    let mut hasher = FxHasher::default();
    for &word in row {
        hasher.write_u64(word);
    }
    hasher.finish()
}
