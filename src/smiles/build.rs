//! Makes a molecule from a SMILES text.
//!
//! The order of work matters: bonds must have their orders before hydrogens can be implied,
//! hydrogens must be complete before valences are checked, and aromatic rings must be settled
//! before configuration is set, since it may not stand in them.

use crate::molecule::{Atom, BondOrder, Element, Molecule, aromatic::perceive};

use super::configure::{configure, order_of};
use super::error::{ReadError, ReadErrorKind};
use super::parse::parse;
use super::sketch::{Sketch, SketchBond, flatten};
use super::syntax::{AtomText, BondSymbol, Symbol};
use super::{aromatic, valence};

/// Reads a compound.
///
/// Hydrogens are counts on their atoms, also those written as `[H]`. Aromatic six-rings are
/// perceived, so that `C1=CC=CC=C1` and `c1ccccc1` are one compound, and `N(=O)=O` is read as
/// `[N+](=O)[O-]`. Configuration is kept
/// where the text gives it and a place may have it, whether or not it turns out to tell
/// compounds apart ([`Molecule::keep_real_units`] asks that).
///
/// # Errors
/// * the text does not follow `grammar/smiles.abnf`, or is too long or nested too deep
/// * a ring is left open, or bonds atoms that cannot be bonded by it
/// * an atom has too many bonds, or too few and is no carbene; it bears an impossible charge
/// * an aromatic ring has no Kekulé form
/// * marks contradict each other, or `@` stands at an atom without four ligands
///
/// # Example
/// ```
/// use haloshed::smiles::read;
///
/// let trichloroethene = read("ClC=C(Cl)Cl").unwrap();
/// assert_eq!(trichloroethene.formula().to_string(), "C2HCl3");
///
/// let error = read("ClC(Cl)(Cl)(Cl)Cl").unwrap_err();
/// assert_eq!(error.to_string(), "carbon has 5 bonds");
/// assert_eq!(error.span, 2..3);
/// ```
pub fn read(text: &str) -> Result<Molecule, ReadError> {
    let sketch = flatten(parse(text)?)?;
    check_hydrogens(&sketch)?;
    let (mut molecule, place) = bare_molecule(&sketch)?;
    let text_of = atom_texts(&sketch);
    aromatic::release_bridges(&mut molecule);
    check_aromatic_atoms(&molecule, &text_of)?;
    imply_hydrogens(&mut molecule, &text_of)?;
    split_nitro_groups(&mut molecule);
    check_valences(&molecule, &text_of)?;
    check_alternation(&molecule, &text_of)?;
    aromatic::release_links(&mut molecule);
    perceive(&mut molecule);
    configure(&mut molecule, &sketch, &place)?;
    Ok(molecule)
}

/// The text of each atom of the molecule, by its index.
fn atom_texts(sketch: &Sketch) -> Vec<&AtomText> {
    sketch.atoms.iter().map(|atom| &atom.text).filter(|text| text.symbol != Symbol::Hydrogen).collect()
}

fn check_hydrogens(sketch: &Sketch) -> Result<(), ReadError> {
    for atom in (0..sketch.atoms.len()).filter(|&a| sketch.is_hydrogen(a)) {
        let text = &sketch.atoms[atom].text;
        let is_plain =
            text.bracket.as_ref().is_none_or(|b| b.n_hydrogens == 0 && b.charge == 0 && b.chirality.is_none());
        let mut bonds = sketch.bonds_of(atom);
        let is_sound = |bond: &SketchBond| {
            let is_single = bond.symbol.as_ref().is_none_or(|s| order_of(s.value) == BondOrder::Single);
            is_single && !sketch.is_hydrogen(bond.other(atom))
        };
        if !(is_plain && bonds.next().is_some_and(is_sound) && bonds.next().is_none()) {
            return Err(ReadError { kind: ReadErrorKind::Hydrogen, span: text.span.clone() });
        }
    }
    Ok(())
}

/// The molecule without implied hydrogens and configuration, and the place in it of each atom
/// of the sketch; none for a hydrogen, which is counted on its neighbour.
fn bare_molecule(sketch: &Sketch) -> Result<(Molecule, Vec<Option<usize>>), ReadError> {
    let mut molecule = Molecule::new();
    let place: Vec<Option<usize>> = sketch
        .atoms
        .iter()
        .map(|atom| match atom.text.symbol {
            Symbol::Hydrogen => None,
            Symbol::Element(element) => Some(molecule.add_atom(bare_atom(&atom.text, element))),
        })
        .collect();
    for bond in &sketch.bonds {
        match (place[bond.from], place[bond.to]) {
            (Some(a), Some(b)) => {
                let order = bond_order(&molecule, bond, a, b)?;
                molecule.add_bond(a, b, order);
            }
            (Some(atom), None) | (None, Some(atom)) => {
                let count = &mut molecule.atom_mut(atom).n_hydrogens;
                *count = count.saturating_add(1);
            }
            (None, None) => {}
        }
    }
    Ok((molecule, place))
}

fn bare_atom(text: &AtomText, element: Element) -> Atom {
    let (charge, n_hydrogens) = text.bracket.as_ref().map_or((0, 0), |b| (b.charge, b.n_hydrogens));
    Atom { element, charge, n_hydrogens, is_aromatic: text.is_aromatic }
}

fn bond_order(molecule: &Molecule, bond: &SketchBond, a: usize, b: usize) -> Result<BondOrder, ReadError> {
    let both_aromatic = molecule.atom(a).is_aromatic && molecule.atom(b).is_aromatic;
    match &bond.symbol {
        None if both_aromatic => Ok(BondOrder::Aromatic),
        None => Ok(BondOrder::Single),
        // A mark for a double bond outside the ring says nothing of the ring's own bond.
        Some(symbol) if both_aromatic && matches!(symbol.value, BondSymbol::Up | BondSymbol::Down) => {
            Ok(BondOrder::Aromatic)
        }
        Some(symbol) => match order_of(symbol.value) {
            BondOrder::Aromatic if !both_aromatic => {
                Err(ReadError { kind: ReadErrorKind::AromaticBond, span: symbol.span.clone() })
            }
            order => Ok(order),
        },
    }
}

fn check_aromatic_atoms(molecule: &Molecule, text_of: &[&AtomText]) -> Result<(), ReadError> {
    match aromatic::stranded_atom(molecule) {
        None => Ok(()),
        Some(atom) => {
            let kind = ReadErrorKind::AromaticOutsideRing { element: molecule.atom(atom).element };
            Err(ReadError { kind, span: text_of[atom].span.clone() })
        }
    }
}

fn imply_hydrogens(molecule: &mut Molecule, text_of: &[&AtomText]) -> Result<(), ReadError> {
    for (atom, text) in text_of.iter().enumerate().filter(|(_, text)| text.bracket.is_none()) {
        let Atom { element, charge, n_hydrogens: n_written, .. } = molecule.atom(atom);
        let Some(n_hydrogens) = valence::implied_hydrogens(molecule, atom, n_written) else {
            let kind = ReadErrorKind::TooManyBonds { element, bonds: molecule.valence_used(atom), charge };
            return Err(ReadError { kind, span: text.span.clone() });
        };
        molecule.atom_mut(atom).n_hydrogens = n_hydrogens;
    }
    Ok(())
}

/// Gives N(=O)=O its charges, so that a nitro group has one form.
fn split_nitro_groups(molecule: &mut Molecule) {
    for nitrogen in 0..molecule.n_atoms() {
        let Atom { element, charge, .. } = molecule.atom(nitrogen);
        if element != Element::N || charge != 0 || molecule.valence_used(nitrogen) != 5 {
            continue;
        }
        let is_bare_oxygen =
            |atom: usize| molecule.atom(atom) == Atom::neutral(Element::O, 0) && molecule.degree(atom) == 1;
        let oxygens: Vec<(usize, usize)> = molecule
            .neighbours(nitrogen)
            .filter(|&(n, order, _)| order == BondOrder::Double && is_bare_oxygen(n))
            .map(|(n, _, bond)| (n, bond))
            .collect();
        if let [(oxygen, bond), _] = oxygens[..] {
            molecule.set_order(bond, BondOrder::Single);
            molecule.atom_mut(oxygen).charge = -1;
            molecule.atom_mut(nitrogen).charge = 1;
        }
    }
}

fn check_valences(molecule: &Molecule, text_of: &[&AtomText]) -> Result<(), ReadError> {
    for (atom, text) in text_of.iter().enumerate() {
        valence::check(molecule, atom).map_err(|kind| ReadError { kind, span: text.span.clone() })?;
    }
    Ok(())
}

fn check_alternation(molecule: &Molecule, text_of: &[&AtomText]) -> Result<(), ReadError> {
    let Some(unpaired) = aromatic::unpaired_atom(molecule) else { return Ok(()) };
    let bare_nitrogen = aromatic::nitrogen_without_hydrogen(molecule);
    let kind = ReadErrorKind::NotAlternating { has_bare_nitrogen: bare_nitrogen.is_some() };
    Err(ReadError { kind, span: text_of[bare_nitrogen.unwrap_or(unpaired)].span.clone() })
}
