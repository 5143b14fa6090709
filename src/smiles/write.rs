//! Writes a molecule as canonical SMILES.
//!
//! Atoms are numbered canonically first, and every later choice (where the text begins, which
//! branch comes first, which bond closes a ring) looks at those numbers alone; so each
//! compound has one text, however its atoms were numbered before.
//!
//! Invariant: what was written reads back as the same compound.

use crate::molecule::canonical::canonical_order;
use crate::molecule::{Atom, BondOrder, Element, Handedness, Identity, Ligand, Molecule};

use super::marks::{self, Marks};
use super::syntax::BondSymbol;
use super::valence::implied_hydrogens;

/// The canonical SMILES of a molecule, configuration included as far as it is given and real.
///
/// The same text for every numbering of the atoms. Configuration that tells no compounds apart
/// is left out (see [`Molecule::keep_real_units`]). At most 99 rings are open at any place of a
/// text that can be read back.
///
/// # Cost
/// A canonical labelling, and another for each given unit that symmetry might make unreal.
///
/// # Example
/// ```
/// use haloshed::smiles::{read, write};
///
/// let one = read("C(Cl)(Cl)=C/Cl").unwrap();
/// let other = read("Cl[CH]=C(Cl)(Cl)").unwrap();
/// assert_eq!(write(&one), write(&other));
/// assert_eq!(write(&read("F/C(=C(/F)Cl)Cl").unwrap()), write(&read("FC(/Cl)=C(/F)\\Cl").unwrap()));
/// ```
pub fn write(molecule: &Molecule) -> String {
    let mut pruned = molecule.clone();
    pruned.keep_real_units(Identity::Full);
    let numbered = pruned.relabelled(&canonical_order(&pruned));
    let route = Route::through(&numbered);
    let marks = marks::choose(&numbered, &route.position);
    Text { molecule: &numbered, route: &route, marks: &marks, open: Vec::new(), out: String::new() }.written()
}

/// The way a text takes through a molecule.
struct Route {
    parent: Vec<Option<usize>>,
    /// Atoms after an atom, the continuation of its chain last.
    children: Vec<Vec<usize>>,
    /// Atoms before an atom that a ring bond leads back to, in the order of writing.
    closed_at: Vec<Vec<usize>>,
    /// Atoms after an atom that a ring bond leads forward to, in the order of writing.
    opened_at: Vec<Vec<usize>>,
    /// When an atom is written.
    position: Vec<usize>,
    starts: Vec<usize>,
}

impl Route {
    fn through(molecule: &Molecule) -> Route {
        let n = molecule.n_atoms();
        let mut route = Route {
            parent: vec![None; n],
            children: vec![Vec::new(); n],
            closed_at: vec![Vec::new(); n],
            opened_at: vec![Vec::new(); n],
            position: vec![usize::MAX; n],
            starts: Vec::new(),
        };
        let mut order: Vec<usize> = (0..n).collect();
        order.sort_by_key(|&atom| (molecule.degree(atom) > 1, atom));
        let mut seen = vec![false; n];
        for start in order {
            if !seen[start] {
                route.starts.push(start);
                let visited = route.walk(molecule, start, &mut seen);
                route.sort_children(molecule, &visited);
            }
        }
        route.number();
        route
    }

    /// Walks depth first from `start` and gives the atoms in the order of the walk.
    fn walk(&mut self, molecule: &Molecule, start: usize, seen: &mut [bool]) -> Vec<usize> {
        let mut visited = vec![start];
        seen[start] = true;
        let mut stack = vec![(start, ways_from(molecule, start))];
        while let Some((atom, ways)) = stack.last_mut() {
            let atom = *atom;
            let Some(next) = ways.pop() else {
                stack.pop();
                continue;
            };
            if !seen[next] {
                seen[next] = true;
                visited.push(next);
                self.parent[next] = Some(atom);
                self.children[atom].push(next);
                stack.push((next, ways_from(molecule, next)));
            } else if self.parent[atom] != Some(next) && stack.iter().any(|&(on_way, _)| on_way == next) {
                self.closed_at[atom].push(next);
                self.opened_at[next].push(atom);
            }
        }
        visited
    }

    /// Small branches first.
    fn sort_children(&mut self, molecule: &Molecule, visited: &[usize]) {
        let mut size = vec![1usize; molecule.n_atoms()];
        for &atom in visited.iter().rev() {
            if let Some(parent) = self.parent[atom] {
                size[parent] += size[atom];
            }
        }
        for &atom in visited {
            self.children[atom].sort_by_key(|&child| (size[child], child));
        }
    }

    fn number(&mut self) {
        let mut stack: Vec<usize> = self.starts.iter().rev().copied().collect();
        let mut next = 0;
        while let Some(atom) = stack.pop() {
            self.position[atom] = next;
            next += 1;
            stack.extend(self.children[atom].iter().rev());
        }
        let position = &self.position;
        for around in self.closed_at.iter_mut().chain(&mut self.opened_at) {
            around.sort_by_key(|&other| position[other]);
        }
    }
}

/// Neighbours to go to, the first last.
fn ways_from(molecule: &Molecule, atom: usize) -> Vec<usize> {
    let mut ways: Vec<usize> = molecule.neighbours(atom).map(|(n, _, _)| n).collect();
    ways.sort_unstable_by_key(|&n| std::cmp::Reverse(n));
    ways
}

/// What is still to be written.
enum Piece {
    Atom(usize),
    Open,
    Close,
}

struct Text<'a> {
    molecule: &'a Molecule,
    route: &'a Route,
    marks: &'a Marks,
    /// Ring bonds that are open, as (first atom, second atom), by ring number less one.
    open: Vec<Option<(usize, usize)>>,
    out: String,
}

impl Text<'_> {
    fn written(mut self) -> String {
        for (i, &start) in self.route.starts.iter().enumerate() {
            if i > 0 {
                self.out.push('.');
            }
            self.component(start);
        }
        self.out
    }

    fn component(&mut self, start: usize) {
        let mut stack = vec![Piece::Atom(start)];
        while let Some(piece) = stack.pop() {
            match piece {
                Piece::Open => self.out.push('('),
                Piece::Close => self.out.push(')'),
                Piece::Atom(atom) => {
                    if let Some(parent) = self.route.parent[atom] {
                        self.bond(parent, atom);
                    }
                    self.atom(atom);
                    self.rings(atom);
                    self.hydrogen(atom);
                    if let Some((&last, branches)) = self.route.children[atom].split_last() {
                        stack.push(Piece::Atom(last));
                        for &branch in branches.iter().rev() {
                            stack.extend([Piece::Close, Piece::Atom(branch), Piece::Open]);
                        }
                    }
                }
            }
        }
    }

    fn bond(&mut self, first: usize, second: usize) {
        let Some(bond) = self.molecule.bond_between(first, second) else { return };
        let both_aromatic = self.molecule.atom(first).is_aromatic && self.molecule.atom(second).is_aromatic;
        let symbol = match self.molecule.bond(bond).2 {
            BondOrder::Single if both_aromatic => Some(BondSymbol::Single),
            BondOrder::Single => self.marks.on_bond[bond],
            BondOrder::Double => Some(BondSymbol::Double),
            BondOrder::Triple => Some(BondSymbol::Triple),
            BondOrder::Aromatic => None,
        };
        self.out.extend(symbol.map(BondSymbol::character));
    }

    fn atom(&mut self, index: usize) {
        let atom = self.molecule.atom(index);
        let symbol =
            if atom.is_aromatic { atom.element.symbol().to_lowercase() } else { atom.element.symbol().to_owned() };
        let chirality = self.chirality(index);
        if chirality.is_none() && !self.needs_brackets(index) {
            self.out.push_str(&symbol);
            return;
        }
        let hydrogens = match atom.n_hydrogens {
            0 => String::new(),
            1 => "H".to_owned(),
            n => format!("H{n}"),
        };
        let charge = match atom.charge {
            0 => String::new(),
            1 => "+".to_owned(),
            -1 => "-".to_owned(),
            n => format!("{n:+}"),
        };
        let text = format!("[{symbol}{}{hydrogens}{charge}]", chirality.unwrap_or(""));
        self.out.push_str(&text);
    }

    fn needs_brackets(&self, index: usize) -> bool {
        let Atom { element, n_hydrogens, is_aromatic, .. } = self.molecule.atom(index);
        let hides_hydrogen = is_aromatic && element != Element::C && n_hydrogens > 0;
        hides_hydrogen || implied_hydrogens(self.molecule, index, 0) != Some(n_hydrogens)
    }

    /// `@` or `@@`, from the ligands in the order of writing.
    fn chirality(&self, atom: usize) -> Option<&'static str> {
        let before = self.route.parent[atom].map(Ligand::Neighbour);
        let hydrogen = (self.molecule.atom(atom).n_hydrogens > 0).then_some(Ligand::Hydrogen);
        let after = [&self.route.closed_at[atom], &self.route.opened_at[atom], &self.route.children[atom]];
        let after = after.into_iter().flatten().map(|&n| Ligand::Neighbour(n));
        let order: Vec<Ligand> = before.into_iter().chain(hydrogen).chain(after).collect();
        self.molecule.handedness_in(atom, &order).map(|handedness| match handedness {
            Handedness::Anticlockwise => "@",
            Handedness::Clockwise => "@@",
        })
    }

    fn rings(&mut self, atom: usize) {
        let route = self.route;
        let mut closed = Vec::new();
        for &first in &route.closed_at[atom] {
            if let Some(number) = self.open.iter().position(|&ring| ring == Some((first, atom))) {
                self.ring_number(number + 1);
                closed.push(number);
            }
        }
        for &second in &route.opened_at[atom] {
            let free = self.open.iter().position(Option::is_none).unwrap_or(self.open.len());
            if free == self.open.len() {
                self.open.push(None);
            }
            self.open[free] = Some((atom, second));
            self.bond(atom, second);
            self.ring_number(free + 1);
        }
        for number in closed {
            self.open[number] = None;
        }
    }

    fn ring_number(&mut self, number: usize) {
        if number > 9 {
            self.out.push('%');
        }
        self.out.push_str(&number.to_string());
    }

    /// A hydrogen that bears a mark.
    fn hydrogen(&mut self, atom: usize) {
        if let Some(mark) = self.marks.on_hydrogen[atom] {
            self.out.push('(');
            self.out.push(mark.character());
            self.out.push_str("[H])");
        }
    }
}
