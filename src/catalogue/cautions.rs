//! What is dangerous about a compound: `data/cautions.csv`.
//!
//! A row is about a compound or about a class. A row whose SMILES leaves configuration open is
//! about all its isomers; if there are rows for an isomer, they alone count for it. The classes
//! are a short closed list ([`Class`]): what they mean is decided on the molecule, here, and what
//! is said of them stands in the table.

use std::sync::OnceLock;

use crate::molecule::{BondOrder, Element, Molecule};
use crate::smiles;

const CAUTIONS: &str = include_str!("../../data/cautions.csv");

/// A short factual caution.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Caution {
    /// What it is about.
    pub subject: Subject,
    /// Name of the compound or class.
    pub name: String,
    /// The caution: one line.
    pub text: String,
    /// Who says so.
    pub source: String,
    /// `read` if the source was read, `memory` if the fact is from memory.
    pub provenance: String,
}

/// What a caution is about.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Subject {
    /// A compound by canonical SMILES.
    Compound(String),
    /// A class of compounds.
    Class(Class),
}

/// A class of compounds that has a caution of its own.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Class {
    /// A halogen on a carbon of a C#C.
    Haloalkyne,
    /// A carbene with two halogens.
    Dihalocarbene,
    /// A halogen on a carbonyl carbon.
    AcylHalide,
    /// A halogen on a saturated carbon that bears an ether oxygen.
    AlphaHaloEther,
}

impl Class {
    /// Every class, in the order of their cautions.
    pub const ALL: [Class; 4] = [Class::Haloalkyne, Class::Dihalocarbene, Class::AcylHalide, Class::AlphaHaloEther];

    /// The name that the table uses.
    pub fn name(self) -> &'static str {
        match self {
            Class::Haloalkyne => "haloalkyne",
            Class::Dihalocarbene => "dihalocarbene",
            Class::AcylHalide => "acyl-halide",
            Class::AlphaHaloEther => "alpha-halo-ether",
        }
    }

    /// Whether a molecule belongs to the class.
    pub fn holds(self, molecule: &Molecule) -> bool {
        (0..molecule.n_atoms()).any(|atom| {
            molecule.atom(atom).element == Element::C
                && n_halogens(molecule, atom) > 0
                && match self {
                    Class::Haloalkyne => has_bond(molecule, atom, BondOrder::Triple, Element::C),
                    Class::Dihalocarbene => molecule.is_carbene(atom) && n_halogens(molecule, atom) == 2,
                    Class::AcylHalide => has_bond(molecule, atom, BondOrder::Double, Element::O),
                    Class::AlphaHaloEther => is_saturated(molecule, atom) && bears_ether(molecule, atom),
                }
        })
    }
}

/// The cautions for a compound, those of the compound before those of its classes.
///
/// `canonical_smiles` is the molecule as [`write`](fn@crate::smiles::write) writes it.
///
/// # Example
/// ```
/// let vinyl_chloride = haloshed::smiles::read("C=CCl")?;
/// let found = haloshed::catalogue::cautions(&vinyl_chloride, "C=CCl");
/// assert!(found[0].text.contains("IARC group 1"));
/// # Ok::<(), haloshed::smiles::ReadError>(())
/// ```
pub fn cautions(molecule: &Molecule, canonical_smiles: &str) -> Vec<&'static Caution> {
    let mut found = of_compound(canonical_smiles);
    if found.is_empty() && canonical_smiles.contains(['/', '\\', '@']) {
        let mut plain = molecule.clone();
        plain.clear_geometry();
        plain.clear_handedness();
        found = of_compound(&smiles::write(&plain));
    }
    for class in Class::ALL.into_iter().filter(|class| class.holds(molecule)) {
        found.extend(rows().iter().filter(|caution| caution.subject == Subject::Class(class)));
    }
    found
}

fn of_compound(smiles: &str) -> Vec<&'static Caution> {
    rows().iter().filter(|caution| matches!(&caution.subject, Subject::Compound(own) if own == smiles)).collect()
}

fn n_halogens(molecule: &Molecule, atom: usize) -> usize {
    molecule.neighbours(atom).filter(|&(n, _, _)| molecule.leaving_halogen(n).is_some()).count()
}

fn has_bond(molecule: &Molecule, atom: usize, order: BondOrder, to: Element) -> bool {
    molecule.neighbours(atom).any(|(n, own, _)| own == order && molecule.atom(n).element == to)
}

fn is_saturated(molecule: &Molecule, atom: usize) -> bool {
    molecule.neighbours(atom).all(|(_, order, _)| order == BondOrder::Single)
}

/// Whether an oxygen with two carbons sits on the atom.
fn bears_ether(molecule: &Molecule, atom: usize) -> bool {
    molecule.neighbours(atom).any(|(oxygen, _, _)| {
        molecule.atom(oxygen).element == Element::O
            && molecule.degree(oxygen) == 2
            && molecule.neighbours(oxygen).all(|(n, _, _)| molecule.atom(n).element == Element::C)
    })
}

/// The rows of the table.
fn rows() -> &'static [Caution] {
    static ROWS: OnceLock<Vec<Caution>> = OnceLock::new();
    ROWS.get_or_init(|| read(CAUTIONS).expect("the embedded table is read by a test"))
}

fn read(table: &str) -> Result<Vec<Caution>, csv::Error> {
    let records = csv::Reader::from_reader(table.as_bytes()).into_records();
    records.map(|record| record.map(|record| caution(&record))).filter_map(Result::transpose).collect()
}

/// A row; none if it names a class that is not on the list.
fn caution(record: &csv::StringRecord) -> Option<Caution> {
    let cell = |index: usize| record.get(index).unwrap_or_default().to_owned();
    let subject = match cell(1) {
        class if class.is_empty() => Subject::Compound(cell(0)),
        class => Subject::Class(Class::ALL.into_iter().find(|known| known.name() == class)?),
    };
    Some(Caution { subject, name: cell(2), text: cell(4), source: cell(5), provenance: cell(6) })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::catalogue::cas;

    #[test]
    fn every_row_is_read_and_well_formed() {
        assert!(CAUTIONS.starts_with("smiles,class,name,cas,caution,source,provenance\n"));
        let rows = read(CAUTIONS).unwrap();
        let n_records = csv::Reader::from_reader(CAUTIONS.as_bytes()).into_records().count();
        assert_eq!(rows.len(), n_records);
        for row in &rows {
            assert!(row.text.chars().count() < 110 && !row.text.is_empty() && !row.text.ends_with('.'), "{row:?}");
            assert!(!row.source.is_empty() && ["read", "memory"].contains(&row.provenance.as_str()), "{row:?}");
            if let Subject::Compound(text) = &row.subject {
                assert_eq!(smiles::write(&smiles::read(text).unwrap()), *text, "{row:?}");
            }
        }
    }

    #[test]
    fn cas_numbers_have_their_check_digits() {
        for record in csv::Reader::from_reader(CAUTIONS.as_bytes()).into_records() {
            let record = record.unwrap();
            let (expected, found) = cas::check_digits(&record[3]);
            assert_eq!(expected, found, "{record:?}");
        }
    }

    #[test]
    fn every_class_has_a_row_and_members() {
        let classes = |text: &str| {
            let molecule = smiles::read(text).unwrap();
            Class::ALL.into_iter().filter(|class| class.holds(&molecule)).map(Class::name).collect::<Vec<_>>()
        };
        for class in Class::ALL {
            assert!(rows().iter().any(|row| row.subject == Subject::Class(class)), "{}", class.name());
        }
        assert_eq!(classes("ClC#CC"), ["haloalkyne"]);
        assert_eq!(classes("Cl[C]Cl"), ["dihalocarbene"]);
        assert_eq!(classes("CC(=O)Br"), ["acyl-halide"]);
        assert_eq!(classes("COCCl"), ["alpha-halo-ether"]);
        for other in ["ClCC#C", "C[C]Cl", "ClCC(C)=O", "OCCl", "COC=CCl", "ClC=C", "Clc1ccccc1"] {
            assert_eq!(classes(other), [""; 0], "{other}");
        }
    }
}
