//! Chooses the direction marks with which double bonds are written.
//!
//! Geometry needs a mark on one ligand at each end of its double bond. A single bond between
//! two double bonds serves both, so marks along a conjugated chain depend on each other, and a
//! mark must not give geometry to a double bond between marked ones that has none. So marks
//! are chosen one end after the other, and taken back when they cannot agree; an end whose
//! bonds are of no use writes out its hydrogen and marks that.
//!
//! A *carrier* is what can bear a mark: a bond, or the hydrogen written at an atom.

use crate::molecule::{BondOrder, Element, Geometry, Ligand, Molecule, Unit};

use super::syntax::BondSymbol;

/// Marks by bond, as read from the end that is written first, and by atom for the hydrogens
/// that must be written.
pub(super) struct Marks {
    pub(super) on_bond: Vec<Option<BondSymbol>>,
    pub(super) on_hydrogen: Vec<Option<BondSymbol>>,
}

/// Marks for a molecule whose atom `i` is written at `position[i]`.
///
/// Geometry that no choice of marks could express would be left out; no molecule is known
/// where this happens, since a ring of double bonds has a hydrogen or a substituent somewhere.
pub(super) fn choose(molecule: &Molecule, position: &[usize]) -> Marks {
    let n_carriers = molecule.n_bonds() + molecule.n_atoms();
    let mut on_carrier = vec![None; n_carriers];
    if (0..molecule.n_bonds()).any(|bond| molecule.geometry(bond).is_some()) {
        let puzzle = Puzzle::of(molecule, position);
        if let Some(signs) = puzzle.solve(Preference::Shared).or_else(|| puzzle.solve(Preference::Apart)) {
            on_carrier = signs;
        }
    }
    let on_hydrogen = on_carrier.split_off(molecule.n_bonds());
    Marks { on_bond: on_carrier, on_hydrogen }
}

/// Which carrier an end tries first.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Preference {
    /// One that serves another double bond too: few marks.
    Shared,
    /// One of its own: few dependences.
    Apart,
}

/// Most choices that are looked at before the preference is given up.
const MOST_STEPS: usize = 50_000;

struct Puzzle<'a> {
    molecule: &'a Molecule,
    position: &'a [usize],
    /// Both ends of each double bond with geometry, in the order of writing.
    ends: Vec<usize>,
    /// Double bonds with geometry.
    given: Vec<usize>,
    /// Double bonds that could have geometry and have none.
    open: Vec<usize>,
    /// Carbons with a double bond, where two marked ligands must stand on two sides.
    planar: Vec<usize>,
}

impl<'a> Puzzle<'a> {
    fn of(molecule: &'a Molecule, position: &'a [usize]) -> Puzzle<'a> {
        let (mut given, mut open) = (Vec::new(), Vec::new());
        for unit in molecule.candidate_units() {
            if let Unit::DoubleBond(bond) = unit {
                if molecule.geometry(bond).is_some() { given.push(bond) } else { open.push(bond) }
            }
        }
        let written_at = |bond: usize| {
            let (a, b, _) = molecule.bond(bond);
            let (a, b) = (position[a], position[b]);
            (a.min(b), a.max(b))
        };
        given.sort_by_key(|&bond| written_at(bond));
        let mut ends: Vec<usize> = given.iter().flat_map(|&bond| <[usize; 2]>::from(ends_of(molecule, bond))).collect();
        ends.sort_by_key(|&end| position[end]);
        let is_planar = |&atom: &usize| {
            molecule.atom(atom).element == Element::C
                && molecule.neighbours(atom).any(|(_, order, _)| order == BondOrder::Double)
        };
        let planar = (0..molecule.n_atoms()).filter(is_planar).collect();
        Puzzle { molecule, position, ends, given, open, planar }
    }

    /// A mark for each carrier that needs one, or nothing if this preference leads nowhere.
    fn solve(&self, preference: Preference) -> Option<Vec<Option<BondSymbol>>> {
        let options: Vec<Vec<usize>> = self.ends.iter().map(|&end| self.options(end, preference)).collect();
        let mut marked = vec![false; self.molecule.n_bonds() + self.molecule.n_atoms()];
        // For each end passed: which of its options was taken; none if it was marked already.
        let mut taken: Vec<Option<usize>> = Vec::new();
        let mut next_option = 0;
        for _ in 0..MOST_STEPS {
            let k = taken.len();
            if k == self.ends.len() {
                return self.signs(&marked);
            }
            if next_option == 0 && self.carriers(self.ends[k]).any(|(carrier, _)| marked[carrier]) {
                taken.push(None);
                continue;
            }
            if let Some(&carrier) = options[k].get(next_option) {
                marked[carrier] = true;
                if !self.says_too_much(&marked) && self.signs(&marked).is_some() {
                    taken.push(Some(next_option));
                    next_option = 0;
                } else {
                    marked[carrier] = false;
                    next_option += 1;
                }
                continue;
            }
            // Nothing is left here: go back to the last end that had a choice.
            let choice = std::iter::from_fn(|| taken.pop()).flatten().next()?;
            marked[options[taken.len()][choice]] = false;
            next_option = choice + 1;
        }
        None
    }

    /// What can bear a mark at an end, as (carrier, ligand): single bonds and hydrogen.
    fn carriers(&self, end: usize) -> impl Iterator<Item = (usize, Ligand)> + '_ {
        let single = self.molecule.neighbours(end).filter(|&(_, order, _)| order == BondOrder::Single);
        let bonds = single.map(|(n, _, bond)| (bond, Ligand::Neighbour(n)));
        let has_hydrogen = self.molecule.atom(end).n_hydrogens > 0;
        let hydrogen = has_hydrogen.then_some((self.molecule.n_bonds() + end, Ligand::Hydrogen));
        bonds.chain(hydrogen)
    }

    fn options(&self, end: usize, preference: Preference) -> Vec<usize> {
        let rank = |ligand: Ligand| match (ligand, preference) {
            (Ligand::Neighbour(n), Preference::Shared) => (u8::from(!self.ends.contains(&n)), self.position[n]),
            (Ligand::Neighbour(n), Preference::Apart) => (2 * u8::from(self.planar.contains(&n)), self.position[n]),
            (Ligand::Hydrogen, Preference::Shared) => (2, 0),
            (Ligand::Hydrogen, Preference::Apart) => (1, 0),
        };
        let mut options: Vec<((u8, usize), usize)> =
            self.carriers(end).map(|(carrier, ligand)| (rank(ligand), carrier)).collect();
        options.sort_unstable();
        options.into_iter().map(|(_, carrier)| carrier).collect()
    }

    /// Whether marks give geometry to a double bond that has none.
    fn says_too_much(&self, marked: &[bool]) -> bool {
        self.open.iter().any(|&bond| {
            let (a, b) = ends_of(self.molecule, bond);
            [a, b].into_iter().all(|end| self.carriers(end).any(|(carrier, _)| marked[carrier]))
        })
    }

    /// A mark for each marked carrier so that all geometries come out, if there are such; the
    /// first one written that is free to choose is `/`.
    fn signs(&self, marked: &[bool]) -> Option<Vec<Option<BondSymbol>>> {
        let mut links: Vec<Vec<(usize, bool)>> = vec![Vec::new(); marked.len()];
        let mut link = |x: usize, y: usize, differ: bool| {
            links[x].push((y, differ));
            links[y].push((x, differ));
        };
        for &atom in &self.planar {
            if let [x, y] = &self.marked_at(atom, marked)[..] {
                link(x.carrier, y.carrier, x.reads_down == y.reads_down);
            }
        }
        for &bond in &self.given {
            let (a, b) = ends_of(self.molecule, bond);
            let (at_a, at_b) = (self.marked_at(a, marked), self.marked_at(b, marked));
            if let (Some(x), Some(y)) = (at_a.first(), at_b.first()) {
                let is_trans = self.molecule.geometry_between(bond, x.ligand, y.ligand) == Some(Geometry::Trans);
                link(x.carrier, y.carrier, is_trans ^ x.reads_down ^ y.reads_down);
            }
        }
        self.spread(marked, &links)
    }

    fn marked_at(&self, atom: usize, marked: &[bool]) -> Vec<MarkedCarrier> {
        let carriers = self.carriers(atom).filter(|&(carrier, _)| marked[carrier]);
        carriers
            .map(|(carrier, ligand)| {
                let reads_down = matches!(ligand, Ligand::Neighbour(n) if self.position[n] < self.position[atom]);
                MarkedCarrier { carrier, ligand, reads_down }
            })
            .collect()
    }

    fn spread(&self, marked: &[bool], links: &[Vec<(usize, bool)>]) -> Option<Vec<Option<BondSymbol>>> {
        let mut is_down: Vec<Option<bool>> = vec![None; marked.len()];
        let mut starts: Vec<usize> = (0..marked.len()).filter(|&carrier| marked[carrier]).collect();
        starts.sort_by_key(|&carrier| self.written_at(carrier));
        for start in starts {
            if is_down[start].is_some() {
                continue;
            }
            is_down[start] = Some(false);
            let mut stack = vec![(start, false)];
            while let Some((x, value)) = stack.pop() {
                for &(y, differ) in &links[x] {
                    match is_down[y] {
                        None => {
                            is_down[y] = Some(value ^ differ);
                            stack.push((y, value ^ differ));
                        }
                        Some(known) if known != value ^ differ => return None,
                        Some(_) => {}
                    }
                }
            }
        }
        let symbol = |down: bool| if down { BondSymbol::Down } else { BondSymbol::Up };
        Some(is_down.into_iter().map(|down| down.map(symbol)).collect())
    }

    fn written_at(&self, carrier: usize) -> (usize, usize) {
        if let Some(atom) = carrier.checked_sub(self.molecule.n_bonds()) {
            return (self.position[atom], usize::MAX);
        }
        let (a, b) = ends_of(self.molecule, carrier);
        let (a, b) = (self.position[a], self.position[b]);
        (a.max(b), a.min(b))
    }
}

/// A carrier with a mark, seen from one of its atoms.
struct MarkedCarrier {
    carrier: usize,
    ligand: Ligand,
    /// Whether `/` puts the ligand below the atom: when the ligand is written first.
    reads_down: bool,
}

fn ends_of(molecule: &Molecule, bond: usize) -> (usize, usize) {
    let (a, b, _) = molecule.bond(bond);
    (a, b)
}
