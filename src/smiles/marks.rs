//! Direction marks: which single bonds get `/` or `\` so that every double bond reads back.
//!
//! A direction says whether the atom written second lies above the first. The two ends of a
//! stereo double bond need one marked ligand each; a single bond between two double bonds
//! serves both. Double bonds are settled outward from the first, each next to one settled
//! before where possible, so that a shared bond is known before it is needed.

use crate::molecule::{Geometry, Ligand, Molecule};

/// Direction of each bond: whether its atom written second lies above its first, and whether
/// that is to be written.
pub(super) struct Marks {
    above: Vec<Option<bool>>,
    is_written: Vec<bool>,
}

/// A double bond whose geometry the marks cannot tell, in a ring of conjugated double bonds.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Conflict {
    /// The double bond.
    pub(super) bond: usize,
}

impl Marks {
    /// Marks for all double bonds with geometry. `position` is each atom's place in the text.
    pub(super) fn of(molecule: &Molecule, position: &[usize]) -> Result<Marks, Conflict> {
        let n = molecule.n_bonds();
        let mut marks = Marks { above: vec![None; n], is_written: vec![false; n] };
        let mut open: Vec<usize> = (0..n).filter(|&b| molecule.geometry(b).is_some()).collect();
        let start = |bond: usize| {
            let (a, b, _) = molecule.bond(bond);
            position[a].min(position[b])
        };
        open.sort_by_key(|&bond| start(bond));
        while !open.is_empty() {
            let next = open.iter().position(|&bond| marks.touches(molecule, bond)).unwrap_or(0);
            let bond = open.remove(next);
            marks.settle(molecule, position, bond)?;
        }
        marks.turn(molecule, position);
        Ok(marks)
    }

    /// Turns the marks of each connected set round if the first one written is no `/`.
    fn turn(&mut self, molecule: &Molecule, position: &[usize]) {
        let mut order: Vec<usize> = (0..molecule.n_bonds()).filter(|&b| self.is_written[b]).collect();
        let place = |bond: usize| {
            let (a, b, _) = molecule.bond(bond);
            (position[a].max(position[b]), position[a].min(position[b]))
        };
        order.sort_by_key(|&bond| place(bond));
        let mut is_done = vec![false; molecule.n_bonds()];
        for first in order {
            if is_done[first] {
                continue;
            }
            let turned = self.above[first] == Some(false);
            let mut set = vec![first];
            is_done[first] = true;
            while let Some(bond) = set.pop() {
                if turned {
                    self.above[bond] = self.above[bond].map(|above| !above);
                }
                for other in self.bound_to(molecule, bond) {
                    if !std::mem::replace(&mut is_done[other], true) {
                        set.push(other);
                    }
                }
            }
        }
    }

    /// Bonds whose direction is tied to a bond's by a double bond with geometry.
    fn bound_to(&self, molecule: &Molecule, bond: usize) -> Vec<usize> {
        let (a, b, _) = molecule.bond(bond);
        let mut found = Vec::new();
        for end in [a, b] {
            for (other, _, _) in molecule.neighbours(end).filter(|n| molecule.geometry(n.2).is_some()) {
                for at in [end, other] {
                    found.extend(molecule.neighbours(at).map(|n| n.2).filter(|&l| self.above[l].is_some()));
                }
            }
        }
        found
    }

    /// Mark of a bond as written from its first atom, if it has one: true for `/`.
    pub(super) fn written(&self, bond: usize) -> Option<bool> {
        self.above[bond].filter(|_| self.is_written[bond])
    }

    /// Whether any ligand bond of a double bond is known already.
    fn touches(&self, molecule: &Molecule, bond: usize) -> bool {
        let (a, b, _) = molecule.bond(bond);
        [a, b].into_iter().any(|end| molecule.neighbours(end).any(|(_, _, ligand)| self.above[ligand].is_some()))
    }

    /// Settles a double bond from the end that is known already, else from the first written.
    fn settle(&mut self, molecule: &Molecule, position: &[usize], bond: usize) -> Result<(), Conflict> {
        let (x, y, _) = molecule.bond(bond);
        let is_unknown = |end: usize| !molecule.neighbours(end).any(|(_, _, ligand)| self.above[ligand].is_some());
        let (a, b) = if (is_unknown(x), position[x]) < (is_unknown(y), position[y]) { (x, y) } else { (y, x) };
        let (first, at_first) = self.carrier(molecule, position, a, b).ok_or(Conflict { bond })?;
        let above_first = self.side(position, a, first, at_first).unwrap_or(position[a] < position[at_first]);
        self.set_end(molecule, position, a, b, at_first, above_first);
        let (second, at_second) = self.carrier(molecule, position, b, a).ok_or(Conflict { bond })?;
        let (at_x, at_y) = if a == x { (at_first, at_second) } else { (at_second, at_first) };
        let geometry = molecule.geometry_between(bond, Ligand::Neighbour(at_x), Ligand::Neighbour(at_y));
        let above_second = above_first == (geometry == Some(Geometry::Cis));
        if self.side(position, b, second, at_second).is_some_and(|known| known != above_second) {
            return Err(Conflict { bond });
        }
        self.set_end(molecule, position, b, a, at_second, above_second);
        self.is_written[first] = true;
        self.is_written[second] = true;
        Ok(())
    }

    /// The ligand bond to mark at an end, with the ligand: one written already, else one that
    /// is known, else one that serves no other double bond, else the first in the text.
    fn carrier(&self, molecule: &Molecule, position: &[usize], end: usize, other: usize) -> Option<(usize, usize)> {
        let is_shared =
            |ligand: usize| molecule.neighbours(ligand).any(|(_, _, bond)| molecule.geometry(bond).is_some());
        molecule
            .neighbours(end)
            .filter(|&(ligand, _, _)| ligand != other)
            .map(|(ligand, _, bond)| (bond, ligand))
            .min_by_key(|&(bond, ligand)| {
                (!self.is_written[bond], self.above[bond].is_none(), is_shared(ligand), position[ligand])
            })
    }

    /// Whether a ligand lies above its end of a double bond, if that is known.
    fn side(&self, position: &[usize], end: usize, bond: usize, ligand: usize) -> Option<bool> {
        self.above[bond].map(|above| above == (position[end] < position[ligand]))
    }

    /// Notes that a ligand lies above or below its end, and the other ligand opposite.
    fn set_end(
        &mut self,
        molecule: &Molecule,
        position: &[usize],
        end: usize,
        other: usize,
        ligand: usize,
        above: bool,
    ) {
        for (n, _, bond) in molecule.neighbours(end).filter(|&(n, _, _)| n != other) {
            let side = if n == ligand { above } else { !above };
            self.above[bond] = Some(side == (position[end] < position[n]));
        }
    }
}
