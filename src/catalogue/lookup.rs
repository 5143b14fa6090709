//! From a text to a row of the catalogue.
//!
//! A text of the shape of a CAS number is one. Any other is folded and looked up among names,
//! abbreviations and synonyms; texts that the trade uses for several compounds are in
//! `data/ambiguous.csv` and are refused with their choices.

use std::collections::BTreeMap;
use std::sync::OnceLock;

use super::cas;
use super::error::LookupError;
use super::folding::fold;
use super::table::{Entry, entries, list};

const AMBIGUOUS: &str = include_str!("../../data/ambiguous.csv");

/// Most suggestions for a text that is unknown.
const MOST_SUGGESTIONS: usize = 3;

/// What a key means.
struct Meaning {
    /// The text as the table writes it.
    text: &'static str,
    /// One compound, or several that must be told apart.
    choices: Vec<&'static Entry>,
}

/// The compound that a name, an abbreviation or a CAS number means.
///
/// Case, spaces, hyphens and primes don't matter (see [`folding`](super::folding)); a name may be
/// inverted as in lists by parent, `Ethene, tetrachloro-`.
///
/// # Errors
/// * the text is empty: `Empty`
/// * it is used for several compounds: `Ambiguous`, with them
/// * it is digits and hyphens, but no CAS number: `CasShape`
/// * it is a CAS number with a wrong check digit: `CheckDigit`; with the right one, but
///   not in the table: `UnknownCas`
/// * it is not in the table: `Unknown`, with near texts
///
/// # Example
/// ```
/// use haloshed::catalogue::find;
///
/// assert_eq!(find("cis-1,2-DCE")?.name, "cis-1,2-dichloroethene");
/// let wrong = find("tetracloroethene").unwrap_err();
/// assert_eq!(wrong.to_string(), "no compound named `tetracloroethene` is known");
/// assert!(wrong.hint().starts_with("did you mean `tetrachloroethene`"));
/// # Ok::<(), haloshed::catalogue::LookupError>(())
/// ```
pub fn find(text: &str) -> Result<&'static Entry, LookupError> {
    if let Some(number) = cas::shaped(text) {
        return by_cas(number);
    }
    let given = || text.trim().to_owned();
    if cas::is_meant(text) {
        return Err(LookupError::CasShape { text: given() });
    }
    let key = upright(text).map_or_else(|| fold(text), |upright| fold(&upright));
    if key.is_empty() {
        return Err(LookupError::Empty);
    }
    match meanings().get(&key).map(|meaning| meaning.choices.as_slice()) {
        Some([entry]) => Ok(entry),
        Some(choices) => Err(LookupError::Ambiguous { text: given(), choices: choices.to_vec() }),
        None => Err(LookupError::Unknown { text: given(), nearest: nearest(&key) }),
    }
}

/// `Ethene, 1,2-dichloro-, (E)-` as `(E)-1,2-dichloro-Ethene`; none if the text is not inverted.
fn upright(text: &str) -> Option<String> {
    let parts: Vec<&str> = text.trim().split(", ").collect();
    let is_inverted = parts.len() > 1 && parts[1..].iter().all(|part| part.ends_with('-'));
    is_inverted.then(|| parts.into_iter().rev().collect())
}

/// The row with this canonical SMILES.
///
/// # Cost
/// One search in a sorted map, made at the first call.
pub fn by_smiles(canonical: &str) -> Option<&'static Entry> {
    static ROWS: OnceLock<BTreeMap<&'static str, &'static Entry>> = OnceLock::new();
    let rows = ROWS.get_or_init(|| entries().iter().map(|entry| (entry.smiles.as_str(), entry)).collect());
    rows.get(canonical).copied()
}

fn by_cas(number: String) -> Result<&'static Entry, LookupError> {
    let (expected, found) = cas::check_digits(&number);
    if expected != found {
        return Err(LookupError::CheckDigit { cas: number, expected, found });
    }
    let number = number.trim_start_matches('0');
    let entry = entries().iter().find(|entry| entry.cas == number);
    entry.ok_or_else(|| LookupError::UnknownCas { cas: number.to_owned(), n_known: entries().len() })
}

/// What every key means, made at the first call.
fn meanings() -> &'static BTreeMap<String, Meaning> {
    static MEANINGS: OnceLock<BTreeMap<String, Meaning>> = OnceLock::new();
    MEANINGS.get_or_init(|| {
        let mut meanings = BTreeMap::new();
        for entry in entries() {
            for text in entry.texts() {
                meanings.entry(fold(text)).or_insert_with(|| Meaning { text, choices: vec![entry] });
            }
        }
        for (text, names) in ambiguous() {
            let choices = names.iter().filter_map(|name| entries().iter().find(|entry| entry.name == *name)).collect();
            meanings.insert(fold(text), Meaning { text, choices });
        }
        meanings
    })
}

/// Ambiguous texts with the names they may stand for.
fn ambiguous() -> &'static [(String, Vec<String>)] {
    static ROWS: OnceLock<Vec<(String, Vec<String>)>> = OnceLock::new();
    ROWS.get_or_init(|| {
        let rows = csv::Reader::from_reader(AMBIGUOUS.as_bytes()).into_deserialize();
        let rows: Result<Vec<(String, String)>, csv::Error> = rows.collect();
        let rows = rows.expect("the embedded table is read by a test");
        rows.into_iter().map(|(text, names)| (text, list(&names))).collect()
    })
}

/// The known texts closest to a key, at most one a meaning; none that differs in more than
/// about a quarter of its characters, and none to a key of one or two.
fn nearest(key: &str) -> Vec<&'static str> {
    let length = key.chars().count();
    if length < 3 {
        return Vec::new();
    }
    let most = (length / 4).clamp(1, 4);
    let close = meanings().iter().filter(|(known, _)| known.chars().count().abs_diff(length) <= most);
    let mut close: Vec<(usize, &'static Meaning)> = close
        .map(|(known, meaning)| (strsim::osa_distance(key, known), meaning))
        .filter(|&(distance, _)| distance <= most)
        .collect();
    close.sort_by_key(|&(distance, _)| distance);
    let mut kept: Vec<&'static Meaning> = Vec::new();
    for (_, meaning) in close {
        let is_new = kept.iter().all(|other| other.choices != meaning.choices);
        if is_new && kept.len() < MOST_SUGGESTIONS {
            kept.push(meaning);
        }
    }
    kept.into_iter().map(|meaning| meaning.text).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_choice_of_an_ambiguous_text_is_in_the_table() {
        let n_rows = AMBIGUOUS.lines().count() - 1;
        assert_eq!(ambiguous().len(), n_rows);
        for (text, names) in ambiguous() {
            assert!(names.len() > 1, "{text}");
            for name in names {
                assert!(entries().iter().any(|entry| entry.name == *name), "{text}: {name}");
            }
        }
    }

    #[test]
    fn no_key_has_two_meanings_unless_it_is_said_to() {
        let mut known: BTreeMap<String, &str> = ambiguous().iter().map(|(text, _)| (fold(text), "ambiguous")).collect();
        assert_eq!(known.len(), ambiguous().len());
        for entry in entries() {
            let mut own: Vec<String> = entry.texts().map(fold).collect();
            own.sort();
            own.dedup();
            for key in own {
                let other = known.insert(key.clone(), &entry.name);
                assert_eq!(other, None, "{key} of {}", entry.name);
            }
        }
    }
}
