//! Turns `@` and `/ \` into configuration.
//!
//! A *mark* is the side of a double-bonded atom, above or below, on which a ligand stands. Two
//! marks, one at each end, make a geometry. Configuration is set at candidate places alone
//! (see [`stereo`](crate::molecule::stereo)); elsewhere it means nothing and is dropped.
//!
//! # Source
//! OpenSMILES 1.0, sections 3.8.2 (order of ligands) and 3.8.3 (marks).

use crate::molecule::{BondOrder, Element, Geometry, Handedness, Ligand, Molecule, Unit};

use super::error::{ReadError, ReadErrorKind};
use super::sketch::{Sketch, SketchBond, Slot};
use super::syntax::{BondSymbol, Spanned, Symbol};

/// Sets the configuration that a sketch gives to the molecule made from it, where atom `i` of
/// the sketch is atom `place[i]` of the molecule.
///
/// # Errors
/// * marks put two ligands of one end on one side
/// * `@` stands at an atom without four ligands
pub(super) fn configure(molecule: &mut Molecule, sketch: &Sketch, place: &[Option<usize>]) -> Result<(), ReadError> {
    let view = View { sketch, place };
    view.check_marks()?;
    let candidates = molecule.candidate_units();
    for (atom, &centre) in place.iter().enumerate() {
        if let (Some(handedness), Some(centre)) = (view.chirality(atom), centre) {
            view.check_centre(molecule, atom)?;
            if candidates.binary_search(&Unit::Centre(centre)).is_ok() {
                molecule.set_handedness_in(centre, &view.ligands(atom), handedness.value);
            }
        }
    }
    let at = view.atoms_by_place(molecule.n_atoms());
    for unit in candidates {
        if let Unit::DoubleBond(bond) = unit {
            let (a, b, _) = molecule.bond(bond);
            if let (Some(at_a), Some(at_b)) = (view.marked(at[a]), view.marked(at[b])) {
                let geometry = if at_a.is_above == at_b.is_above { Geometry::Cis } else { Geometry::Trans };
                molecule.set_geometry_between(bond, at_a.ligand, at_b.ligand, geometry);
            }
        }
    }
    Ok(())
}

/// A ligand that a mark puts above or below its atom.
struct Marked {
    ligand: Ligand,
    is_above: bool,
}

struct View<'a> {
    sketch: &'a Sketch,
    place: &'a [Option<usize>],
}

impl View<'_> {
    fn atoms_by_place(&self, n_atoms: usize) -> Vec<usize> {
        let mut at = vec![0; n_atoms];
        for (atom, place) in self.place.iter().enumerate() {
            if let Some(place) = *place {
                at[place] = atom;
            }
        }
        at
    }

    fn ligand(&self, atom: usize, bond: &SketchBond) -> Ligand {
        self.place[bond.other(atom)].map_or(Ligand::Hydrogen, Ligand::Neighbour)
    }

    fn ligands(&self, atom: usize) -> Vec<Ligand> {
        let slots = self.sketch.atoms[atom].around.iter();
        slots
            .map(|slot| match slot {
                Slot::Bond(bond) => self.ligand(atom, &self.sketch.bonds[*bond]),
                Slot::BracketHydrogen => Ligand::Hydrogen,
            })
            .collect()
    }

    fn chirality(&self, atom: usize) -> Option<Spanned<Handedness>> {
        self.sketch.atoms[atom].text.bracket.as_ref()?.chirality.clone()
    }

    /// An aromatic or double-bonded atom is told about as well: four ligands are asked for.
    fn check_centre(&self, molecule: &Molecule, atom: usize) -> Result<(), ReadError> {
        let (Some(centre), Some(mark)) = (self.place[atom], self.chirality(atom)) else { return Ok(()) };
        let n_ligands = molecule.degree(centre) + usize::from(molecule.atom(centre).n_hydrogens);
        if n_ligands == 4 {
            return Ok(());
        }
        let element = molecule.atom(centre).element;
        Err(ReadError { kind: ReadErrorKind::NotFourLigands { element, n_ligands }, span: mark.span })
    }

    /// The first marked ligand of an atom, in the order of writing.
    fn marked(&self, atom: usize) -> Option<Marked> {
        self.sketch.bonds_of(atom).find_map(|bond| {
            let is_above = is_above(atom, bond)?;
            Some(Marked { ligand: self.ligand(atom, bond), is_above })
        })
    }

    /// Refuses two marks on one side of an end. Asked only where both ends of a double bond are
    /// marked: marks that serve the next double bonds alone may agree, as in
    /// `C=C(/C=C/Cl)/C=C/Cl`.
    fn check_marks(&self) -> Result<(), ReadError> {
        for bond in self.sketch.bonds.iter().filter(|bond| self.is_carbon_double(bond)) {
            if self.marked(bond.from).is_some() && self.marked(bond.to).is_some() {
                self.check_sides(bond.from)?;
                self.check_sides(bond.to)?;
            }
        }
        Ok(())
    }

    fn is_carbon_double(&self, bond: &SketchBond) -> bool {
        let is_carbon = |atom: usize| self.sketch.atoms[atom].text.symbol == Symbol::Element(Element::C);
        let is_double = bond.symbol.as_ref().is_some_and(|symbol| symbol.value == BondSymbol::Double);
        is_double && is_carbon(bond.from) && is_carbon(bond.to)
    }

    fn check_sides(&self, end: usize) -> Result<(), ReadError> {
        let mut marks = self.sketch.bonds_of(end).filter_map(|bond| Some((is_above(end, bond)?, bond)));
        let (Some((first, _)), Some((second, bond))) = (marks.next(), marks.next()) else { return Ok(()) };
        if first != second {
            return Ok(());
        }
        let span = bond.symbol.as_ref().map_or(0..0, |symbol| symbol.span.clone());
        Err(ReadError { kind: ReadErrorKind::ContradictoryMarks, span })
    }
}

/// Whether the other end of a marked bond stands above this atom.
fn is_above(atom: usize, bond: &SketchBond) -> Option<bool> {
    let is_up = match bond.symbol.as_ref()?.value {
        BondSymbol::Up => true,
        BondSymbol::Down => false,
        _ => return None,
    };
    Some(is_up == (bond.from == atom))
}

/// The order that a symbol asks for; none without a symbol.
pub(super) fn order_of(symbol: BondSymbol) -> BondOrder {
    match symbol {
        BondSymbol::Single | BondSymbol::Up | BondSymbol::Down => BondOrder::Single,
        BondSymbol::Double => BondOrder::Double,
        BondSymbol::Triple => BondOrder::Triple,
        BondSymbol::Aromatic => BondOrder::Aromatic,
    }
}
