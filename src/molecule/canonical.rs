//! General canonical labelling: one order of atoms for each compound, however it was drawn.
//!
//! Individualisation and refinement: atoms are coloured by what they are, colours are refined
//! by the colours around them until stable, and ties are broken by trying each atom of the
//! first smallest tied class. Each way of breaking all ties gives a *leaf*, an order of the
//! atoms; the leaf whose description (graph, then configuration) is smallest wins. Two leaves
//! with one description give an automorphism, and branches that known automorphisms make
//! alike are tried once.
//!
//! Halogens at the ends of bonds are folded into their carbon's colour, so that perhalogenated
//! compounds cost no more than their skeletons.
//!
//! # Source
//! Brendan McKay, Congressus Numerantium 30, 45 (1981), in its simplest form; refinement as in
//! the colouring of Morgan, J. Chem. Doc. 5, 107 (1965).

use super::graph::{Geometry, Handedness, Ligand, Molecule};

/// Description of a molecule that is equal exactly when the compound is the same.
pub type Code = Vec<u32>;

/// The canonical description of a molecule, configuration included as far as it is given.
///
/// # Cost
/// One refinement a leaf; the number of leaves is small but for highly symmetric graphs.
pub fn canonical_code(molecule: &Molecule) -> Code {
    search(molecule).0
}

/// Atom indices in canonical order.
pub fn canonical_order(molecule: &Molecule) -> Vec<usize> {
    search(molecule).1
}

/// Colour classes of the atoms after refinement, without configuration: equal for atoms that
/// some relabelling might exchange.
pub fn refined_classes(molecule: &Molecule) -> Vec<usize> {
    let folded = Folded::of(molecule);
    let mut colours = folded.initial_colours(molecule);
    refine(&folded, &mut colours);
    let mut classes = vec![usize::MAX; molecule.n_atoms()];
    for (kept, &atom) in folded.kept.iter().enumerate() {
        classes[atom] = colours[kept];
    }
    let n = folded.kept.len();
    for atom in 0..molecule.n_atoms() {
        if let Some(carrier) = folded.carrier[atom] {
            classes[atom] = n + colours[folded.place[carrier]] * 16 + molecule.atom(atom).element as usize;
        }
    }
    classes
}

/// A molecule without its folded halogens.
struct Folded {
    /// Atoms that are kept, by their place.
    kept: Vec<usize>,
    /// Place of each kept atom.
    place: Vec<usize>,
    /// The carbon that each folded halogen sits on.
    carrier: Vec<Option<usize>>,
    /// Kept neighbours of each kept atom as (place, bond order).
    around: Vec<Vec<(usize, u32)>>,
}

impl Folded {
    fn of(molecule: &Molecule) -> Folded {
        let n = molecule.n_atoms();
        let mut carrier = vec![None; n];
        for (atom, slot) in carrier.iter_mut().enumerate() {
            if molecule.leaving_halogen(atom).is_some() {
                *slot = molecule.neighbours(atom).map(|(c, _, _)| c).find(|&c| molecule.degree(c) > 1 || c < atom);
            }
        }
        // Two halogens bonded to each other would fold into each other: keep both.
        for atom in 0..n {
            if carrier[atom].is_some_and(|c| molecule.leaving_halogen(c).is_some()) {
                carrier[atom] = None;
            }
        }
        let kept: Vec<usize> = (0..n).filter(|&a| carrier[a].is_none()).collect();
        let mut place = vec![usize::MAX; n];
        for (p, &atom) in kept.iter().enumerate() {
            place[atom] = p;
        }
        let around = kept
            .iter()
            .map(|&a| {
                let kept_neighbours = molecule.neighbours(a).filter(|&(b, _, _)| carrier[b].is_none());
                kept_neighbours.map(|(b, order, _)| (place[b], order as u32)).collect()
            })
            .collect();
        Folded { kept, place, carrier, around }
    }

    fn initial_colours(&self, molecule: &Molecule) -> Vec<usize> {
        let keys: Vec<[u32; 5]> = self
            .kept
            .iter()
            .map(|&a| {
                let atom = molecule.atom(a);
                let mut halogens = 0;
                for (b, _, _) in molecule.neighbours(a).filter(|&(b, _, _)| self.carrier[b] == Some(a)) {
                    halogens += 1 << (4 * molecule.atom(b).element.halogen().map_or(0, |h| h as u32));
                }
                [
                    molecule.degree(a) as u32,
                    u32::from(atom.element.atomic_number()) * 2 + u32::from(atom.is_aromatic),
                    halogens,
                    u32::from(atom.n_hydrogens),
                    (i32::from(atom.charge) + 128) as u32,
                ]
            })
            .collect();
        ranks(&keys)
    }
}

/// Rank of each key among the distinct keys, where a class's rank is the number of members
/// in the classes below it.
fn ranks<K: Ord>(keys: &[K]) -> Vec<usize> {
    let mut order: Vec<usize> = (0..keys.len()).collect();
    order.sort_by(|&a, &b| keys[a].cmp(&keys[b]));
    let mut out = vec![0; keys.len()];
    for position in 0..order.len() {
        let same = position > 0 && keys[order[position]] == keys[order[position - 1]];
        out[order[position]] = if same { out[order[position - 1]] } else { position };
    }
    out
}

fn refine(folded: &Folded, colours: &mut Vec<usize>) {
    loop {
        let keys: Vec<(usize, Vec<(usize, u32)>)> = (0..colours.len())
            .map(|a| {
                let mut around: Vec<(usize, u32)> =
                    folded.around[a].iter().map(|&(b, order)| (colours[b], order)).collect();
                around.sort_unstable();
                (colours[a], around)
            })
            .collect();
        let finer = ranks(&keys);
        if finer == *colours {
            return;
        }
        *colours = finer;
    }
}

struct Search<'a> {
    molecule: &'a Molecule,
    folded: &'a Folded,
    units: Units,
    best: Option<(Code, Vec<usize>)>,
    first: Option<(Code, Vec<usize>)>,
    /// Automorphisms found, as images of places.
    automorphisms: Vec<Vec<usize>>,
}

/// Places with given configuration.
struct Units {
    centres: Vec<usize>,
    bonds: Vec<usize>,
}

fn search(molecule: &Molecule) -> (Code, Vec<usize>) {
    let folded = Folded::of(molecule);
    let mut colours = folded.initial_colours(molecule);
    refine(&folded, &mut colours);
    let units = Units {
        centres: (0..molecule.n_atoms()).filter(|&a| molecule.handedness(a).is_some()).collect(),
        bonds: (0..molecule.n_bonds()).filter(|&b| molecule.geometry(b).is_some()).collect(),
    };
    let mut search = Search { molecule, folded: &folded, units, best: None, first: None, automorphisms: Vec::new() };
    search.descend(&colours, &mut Vec::new());
    search.best.unwrap_or_default()
}

impl Search<'_> {
    fn descend(&mut self, colours: &[usize], prefix: &mut Vec<usize>) {
        let Some(cell) = smallest_tied_class(colours) else {
            self.leaf(colours);
            return;
        };
        let mut tried: Vec<usize> = Vec::new();
        for &member in &cell {
            if self.is_like_one_tried(member, &tried, prefix) {
                continue;
            }
            tried.push(member);
            let mut finer = colours.to_vec();
            for &other in cell.iter().filter(|&&other| other != member) {
                finer[other] += 1;
            }
            refine(self.folded, &mut finer);
            prefix.push(member);
            self.descend(&finer, prefix);
            prefix.pop();
        }
    }

    /// Whether known automorphisms that fix the prefix carry a member tried before to this one.
    fn is_like_one_tried(&self, member: usize, tried: &[usize], prefix: &[usize]) -> bool {
        if tried.is_empty() {
            return false;
        }
        let fixing: Vec<&Vec<usize>> =
            self.automorphisms.iter().filter(|g| prefix.iter().all(|&p| g[p] == p)).collect();
        let mut orbit = vec![member];
        let mut next = 0;
        while next < orbit.len() {
            for g in &fixing {
                let image = g[orbit[next]];
                if !orbit.contains(&image) {
                    orbit.push(image);
                }
            }
            next += 1;
        }
        orbit.iter().any(|o| tried.contains(o))
    }

    fn leaf(&mut self, colours: &[usize]) {
        let mut places = vec![0; colours.len()];
        for (place, &colour) in colours.iter().enumerate() {
            places[colour] = place;
        }
        let order = self.full_order(&places);
        let code = self.describe(&order);
        for known in [&self.first, &self.best].into_iter().flatten() {
            if known.0 == code {
                let automorphism = self.automorphism(&known.1, &order);
                self.automorphisms.push(automorphism);
                break;
            }
        }
        if self.first.is_none() {
            self.first = Some((code.clone(), order.clone()));
        }
        if self.best.as_ref().is_none_or(|(best, _)| code < *best) {
            self.best = Some((code, order));
        }
    }

    /// Kept atoms in order, each followed at the end by the folded halogens in carrier order.
    fn full_order(&self, places: &[usize]) -> Vec<usize> {
        let mut order: Vec<usize> = places.iter().map(|&p| self.folded.kept[p]).collect();
        for &p in places {
            let carrier = self.folded.kept[p];
            let mut halogens: Vec<usize> = self
                .molecule
                .neighbours(carrier)
                .map(|(n, _, _)| n)
                .filter(|&n| self.folded.carrier[n] == Some(carrier))
                .collect();
            halogens.sort_by_key(|&n| (self.molecule.atom(n).element, n));
            order.extend(halogens);
        }
        order
    }

    fn automorphism(&self, from: &[usize], to: &[usize]) -> Vec<usize> {
        let mut image = vec![0; self.folded.kept.len()];
        for (a, b) in from.iter().zip(to).take(image.len()) {
            image[self.folded.place[*a]] = self.folded.place[*b];
        }
        image
    }

    /// Atoms, bonds to atoms earlier in the order, and configuration, as numbers.
    fn describe(&self, order: &[usize]) -> Code {
        let mut rank = vec![0; order.len()];
        for (r, &atom) in order.iter().enumerate() {
            rank[atom] = r;
        }
        let mut code = Vec::with_capacity(4 * order.len());
        for (r, &a) in order.iter().enumerate() {
            let atom = self.molecule.atom(a);
            code.push(
                u32::from(atom.element.atomic_number()) << 16
                    | u32::from(atom.is_aromatic) << 15
                    | ((i32::from(atom.charge) + 16) as u32) << 8
                    | u32::from(atom.n_hydrogens),
            );
            let mut earlier: Vec<u32> = self
                .molecule
                .neighbours(a)
                .filter(|&(b, _, _)| rank[b] < r)
                .map(|(b, bond_order, _)| ((rank[b] as u32) << 3) | bond_order as u32 | 1 << 30)
                .collect();
            earlier.sort_unstable();
            code.extend(earlier);
        }
        self.describe_configuration(&rank, &mut code);
        code
    }

    fn describe_configuration(&self, rank: &[usize], code: &mut Code) {
        let mut marks: Vec<u32> = Vec::with_capacity(self.units.centres.len() + self.units.bonds.len());
        for &centre in &self.units.centres {
            let ligands = by_rank(self.molecule.ligands(centre), rank);
            let clockwise = self.molecule.handedness_in(centre, &ligands) == Some(Handedness::Clockwise);
            marks.push((rank[centre] as u32) << 1 | u32::from(clockwise));
        }
        for &bond in &self.units.bonds {
            let (a, b, _) = self.molecule.bond(bond);
            let first = |end: usize, other: usize| {
                by_rank(self.molecule.ligands(end), rank).into_iter().find(|&l| l != Ligand::Neighbour(other))
            };
            let (Some(at_a), Some(at_b)) = (first(a, b), first(b, a)) else { continue };
            let trans = self.molecule.geometry_between(bond, at_a, at_b) == Some(Geometry::Trans);
            let (low, high) = (rank[a].min(rank[b]) as u32, rank[a].max(rank[b]) as u32);
            marks.push(1 << 31 | low << 16 | high << 1 | u32::from(trans));
        }
        marks.sort_unstable();
        code.extend(marks);
    }
}

/// Ligands in rank order, hydrogens last.
pub(crate) fn by_rank(mut ligands: Vec<Ligand>, rank: &[usize]) -> Vec<Ligand> {
    ligands.sort_by_key(|&l| match l {
        Ligand::Neighbour(n) => rank[n],
        Ligand::Hydrogen => usize::MAX,
    });
    ligands
}

/// Members of the first smallest class that has more than one.
fn smallest_tied_class(colours: &[usize]) -> Option<Vec<usize>> {
    let mut sizes = vec![0usize; colours.len()];
    for &colour in colours {
        sizes[colour] += 1;
    }
    let colour = (0..sizes.len()).filter(|&c| sizes[c] > 1).min_by_key(|&c| (sizes[c], c))?;
    Some((0..colours.len()).filter(|&a| colours[a] == colour).collect())
}
