//! The frame: what all compounds of a network share when no rule breaks a C–C bond.
//!
//! A *site* is a plain carbon (see [`Molecule::is_plain_carbon`]): its halogens, hydrogens and
//! lone pair belong to the decoration. An *open bond* joins two sites; its order belongs to the
//! decoration. Everything else (other atoms with their hydrogens, bonds to them) is *fixed*.
//! The skeleton is kept in canonical order, so compounds with one skeleton get one frame,
//! atom for atom, however they were drawn.
//!
//! Invariant: [`Frame::decompose`] and [`Frame::compose`] are inverse up to renumbering.

use super::decoration::Decoration;
use crate::molecule::canonical::{Code, canonical_code, canonical_order};
use crate::molecule::rings::{six_rings, smallest_ring_through_bond};
use crate::molecule::stereo::SMALLEST_RING_WITH_GEOMETRY;
use crate::molecule::{Atom, BondOrder, Element, Geometry, Halogen, Handedness, Ligand, Molecule};

/// A skeleton, and the facts about it that every state needs.
#[derive(Debug, Clone)]
pub struct Frame {
    skeleton: Molecule,
    key: Code,
    /// Skeleton atom of each site.
    sites: Vec<usize>,
    /// Site of each skeleton atom.
    site_of: Vec<Option<usize>>,
    /// The two sites of each open bond, smaller first.
    open_bonds: Vec<(usize, usize)>,
    /// By site: neighbouring sites with the open bond to each.
    site_neighbours: Vec<Vec<(usize, usize)>>,
    /// By site: valence used by fixed bonds that are not aromatic.
    fixed_valence: Vec<u8>,
    /// By site: fixed aromatic bonds.
    n_fixed_aromatic: Vec<u8>,
    /// Atoms that may be stereocentres: the sites in order, then fixed tetrahedral atoms.
    centres: Vec<usize>,
    /// By open bond: whether geometry is possible (no ring of fewer than eight atoms).
    may_have_geometry: Vec<bool>,
    /// Six-rings of open bonds, in ring order.
    six_rings: Vec<[usize; 6]>,
}

impl Frame {
    /// The frame of a molecule.
    pub fn of(molecule: &Molecule) -> Frame {
        let (bare, _) = strip(molecule);
        let skeleton = bare.relabelled(&canonical_order(&bare));
        let mut frame = Frame {
            key: canonical_code(&skeleton),
            sites: Vec::new(),
            site_of: vec![None; skeleton.n_atoms()],
            open_bonds: Vec::new(),
            site_neighbours: Vec::new(),
            fixed_valence: Vec::new(),
            n_fixed_aromatic: Vec::new(),
            centres: Vec::new(),
            may_have_geometry: Vec::new(),
            six_rings: Vec::new(),
            skeleton,
        };
        frame.find_sites();
        frame.find_open_bonds();
        frame.find_rings();
        frame
    }

    fn find_sites(&mut self) {
        for atom in 0..self.skeleton.n_atoms() {
            if self.skeleton.is_plain_carbon(atom) {
                self.site_of[atom] = Some(self.sites.len());
                self.sites.push(atom);
            }
        }
        self.centres.clone_from(&self.sites);
        for atom in 0..self.skeleton.n_atoms() {
            if self.site_of[atom].is_none() && is_fixed_centre(&self.skeleton, atom) {
                self.centres.push(atom);
            }
        }
    }

    fn find_open_bonds(&mut self) {
        self.site_neighbours = vec![Vec::new(); self.sites.len()];
        self.fixed_valence = vec![0; self.sites.len()];
        self.n_fixed_aromatic = vec![0; self.sites.len()];
        for site in 0..self.sites.len() {
            let mut around: Vec<(usize, BondOrder)> =
                self.skeleton.neighbours(self.sites[site]).map(|(n, order, _)| (n, order)).collect();
            around.sort_unstable();
            for (n, order) in around {
                match (self.site_of[n], order) {
                    (Some(other), _) if other > site => self.add_open_bond(site, other),
                    (Some(_), _) => {}
                    (None, BondOrder::Aromatic) => self.n_fixed_aromatic[site] += 1,
                    (None, BondOrder::Single) => self.fixed_valence[site] += 1,
                    (None, BondOrder::Double) => self.fixed_valence[site] += 2,
                    (None, BondOrder::Triple) => self.fixed_valence[site] += 3,
                }
            }
        }
        for around in &mut self.site_neighbours {
            around.sort_unstable();
        }
    }

    fn add_open_bond(&mut self, a: usize, b: usize) {
        let bond = self.open_bonds.len();
        self.open_bonds.push((a, b));
        self.site_neighbours[a].push((b, bond));
        self.site_neighbours[b].push((a, bond));
    }

    fn find_rings(&mut self) {
        let adjacency = self.skeleton.adjacency();
        for &(a, b) in &self.open_bonds {
            let ring = smallest_ring_through_bond(&adjacency, self.sites[a], self.sites[b]);
            self.may_have_geometry.push(ring.is_none_or(|n| n >= SMALLEST_RING_WITH_GEOMETRY));
        }
        let of_sites = self.site_neighbours.iter().map(|around| around.iter().map(|&(n, _)| n).collect()).collect();
        self.six_rings = six_rings(&of_sites)
            .into_iter()
            .map(|ring| {
                std::array::from_fn(|i| self.open_bond(ring[i], ring[(i + 1) % 6]).expect("ring sites are bonded"))
            })
            .collect();
    }

    /// What two frames of one skeleton have in common and no others.
    pub fn key(&self) -> &Code {
        &self.key
    }

    /// The skeleton: sites without hydrogens, open bonds single, fixed atoms as they are.
    pub fn skeleton(&self) -> &Molecule {
        &self.skeleton
    }

    /// Skeleton atom of each site.
    pub fn sites(&self) -> &[usize] {
        &self.sites
    }

    /// The site a skeleton atom is, if it is one.
    pub fn site_of(&self, atom: usize) -> Option<usize> {
        self.site_of[atom]
    }

    /// The two sites of each open bond, smaller first.
    pub fn open_bonds(&self) -> &[(usize, usize)] {
        &self.open_bonds
    }

    /// The open bond between two sites.
    pub fn open_bond(&self, a: usize, b: usize) -> Option<usize> {
        self.site_neighbours[a].iter().find(|&&(n, _)| n == b).map(|&(_, bond)| bond)
    }

    /// Neighbouring sites of a site with the open bond to each, by site.
    pub fn site_neighbours(&self, site: usize) -> &[(usize, usize)] {
        &self.site_neighbours[site]
    }

    /// Fixed atoms bonded to a site, by skeleton index.
    pub fn fixed_neighbours(&self, site: usize) -> impl Iterator<Item = usize> + '_ {
        self.skeleton.neighbours(self.sites[site]).map(|(n, _, _)| n).filter(|&n| self.site_of[n].is_none())
    }

    /// Valence of a site that fixed bonds use, aromatic ones not counted.
    pub fn fixed_valence(&self, site: usize) -> u8 {
        self.fixed_valence[site]
    }

    /// Fixed aromatic bonds of a site.
    pub fn n_fixed_aromatic(&self, site: usize) -> u8 {
        self.n_fixed_aromatic[site]
    }

    /// Most halogens a site may hold: what its bonds leave when all are single.
    pub fn most_halogens(&self, site: usize) -> u8 {
        let aromatic = self.n_fixed_aromatic[site];
        let used =
            self.fixed_valence[site] + aromatic + u8::from(aromatic > 0) + self.site_neighbours[site].len() as u8;
        4u8.saturating_sub(used)
    }

    /// Skeleton atoms that may be stereocentres: all sites in order, then fixed ones.
    pub fn centres(&self) -> &[usize] {
        &self.centres
    }

    /// The site that a centre is; none for a fixed atom.
    pub fn site_of_centre(&self, centre: usize) -> Option<usize> {
        self.site_of[self.centres[centre]]
    }

    /// Whether an open bond may have geometry when it is double.
    pub fn may_have_geometry(&self, bond: usize) -> bool {
        self.may_have_geometry[bond]
    }

    /// Six-rings made of open bonds, each as its bonds in ring order.
    pub fn six_rings(&self) -> &[[usize; 6]] {
        &self.six_rings
    }

    /// Splits a molecule that has this frame into the frame and its decoration. A bit that the
    /// molecule leaves open is false.
    ///
    /// # Panics
    /// If the molecule has another skeleton.
    pub fn decompose(&self, molecule: &Molecule) -> Decoration {
        let (bare, kept) = strip(molecule);
        assert!(canonical_code(&bare) == self.key, "a molecule of this frame");
        let order = canonical_order(&bare);
        let atom_at: Vec<usize> = order.iter().map(|&b| kept[b]).collect();
        let mut decoration = Decoration::bare(self);
        for (site, &at) in self.sites.iter().enumerate() {
            let atom = atom_at[at];
            for (n, _, _) in molecule.neighbours(atom) {
                if let Some(halogen) = molecule.leaving_halogen(n) {
                    decoration.halogens[site][halogen as usize] += 1;
                }
            }
            decoration.carbenes[site] = molecule.is_carbene(atom);
        }
        for (bond, &(a, b)) in self.open_bonds.iter().enumerate() {
            let found = molecule.bond_between(atom_at[self.sites[a]], atom_at[self.sites[b]]);
            decoration.orders[bond] = molecule.bond(found.expect("same skeleton")).2;
        }
        self.read_configuration(molecule, &atom_at, &mut decoration);
        decoration.clear_idle_bits(self);
        decoration
    }

    fn read_configuration(&self, molecule: &Molecule, atom_at: &[usize], decoration: &mut Decoration) {
        for (centre, &at) in self.centres.iter().enumerate() {
            let order = self.ligand_order(molecule, atom_at, at);
            let handedness = (order.len() == 4).then(|| molecule.handedness_in(atom_at[at], &order)).flatten();
            decoration.clockwise[centre] = handedness == Some(Handedness::Clockwise);
        }
        for (bond, &(a, b)) in self.open_bonds.iter().enumerate() {
            let (at_a, at_b) = (self.sites[a], self.sites[b]);
            let Some(found) = molecule.bond_between(atom_at[at_a], atom_at[at_b]) else { continue };
            let ligands = (
                self.reference_ligand(molecule, atom_at, at_a, at_b),
                self.reference_ligand(molecule, atom_at, at_b, at_a),
            );
            let (Some(mut of_a), Some(mut of_b)) = ligands else { continue };
            if molecule.bond(found).0 != atom_at[at_a] {
                std::mem::swap(&mut of_a, &mut of_b);
            }
            decoration.trans[bond] = molecule.geometry_between(found, of_a, of_b) == Some(Geometry::Trans);
        }
    }

    /// Ligands of a skeleton atom in the order of [`Decoration::clockwise`], as the molecule
    /// names them.
    fn ligand_order(&self, molecule: &Molecule, atom_at: &[usize], at: usize) -> Vec<Ligand> {
        let atom = atom_at[at];
        let mut skeleton: Vec<usize> = self.skeleton.neighbours(at).map(|(n, _, _)| n).collect();
        skeleton.sort_unstable();
        let mut order: Vec<Ligand> = skeleton.iter().map(|&n| Ligand::Neighbour(atom_at[n])).collect();
        let mut halogens: Vec<(Halogen, usize)> = molecule
            .neighbours(atom)
            .filter(|&(n, _, _)| !order.contains(&Ligand::Neighbour(n)))
            .filter_map(|(n, _, _)| molecule.leaving_halogen(n).map(|h| (h, n)))
            .collect();
        halogens.sort_unstable();
        order.extend(halogens.into_iter().map(|(_, n)| Ligand::Neighbour(n)));
        order.extend(std::iter::repeat_n(Ligand::Hydrogen, usize::from(molecule.atom(atom).n_hydrogens)));
        order
    }

    /// The ligand of a double bond's end that [`Decoration::trans`] refers to.
    fn reference_ligand(&self, molecule: &Molecule, atom_at: &[usize], end: usize, other: usize) -> Option<Ligand> {
        let besides = Ligand::Neighbour(atom_at[other]);
        let order: Vec<Ligand> =
            self.ligand_order(molecule, atom_at, end).into_iter().filter(|&l| l != besides).collect();
        let n_skeleton = self.skeleton.degree(end) - 1;
        if n_skeleton > 0 {
            return order.first().copied();
        }
        order.iter().rev().find(|l| matches!(l, Ligand::Neighbour(_))).or(order.first()).copied()
    }

    /// The molecule that a decoration of this frame stands for. Every candidate unit is given
    /// a configuration, real or not: see [`Molecule::keep_real_units`].
    ///
    /// # Panics
    /// If the decoration belongs to another frame.
    pub fn compose(&self, decoration: &Decoration) -> Molecule {
        let mut molecule = Molecule::new();
        for at in 0..self.skeleton.n_atoms() {
            let mut atom = self.skeleton.atom(at);
            if let Some(site) = self.site_of[at] {
                atom = Atom::neutral(Element::C, decoration.n_hydrogens(self, site));
                atom.is_aromatic = decoration.is_aromatic(self, site);
            }
            molecule.add_atom(atom);
        }
        for (a, b, order) in self.skeleton.bonds() {
            let order = match (self.site_of[a], self.site_of[b]) {
                (Some(x), Some(y)) => decoration.orders[self.open_bond(x, y).expect("open bonds join sites")],
                _ => order,
            };
            molecule.add_bond(a, b, order);
        }
        for (site, &at) in self.sites.iter().enumerate() {
            for halogen in Halogen::ALL {
                for _ in 0..decoration.halogens[site][halogen as usize] {
                    let x = molecule.add_atom(Atom::neutral(halogen.element(), 0));
                    molecule.add_bond(at, x, BondOrder::Single);
                }
            }
        }
        self.write_configuration(decoration, &mut molecule);
        molecule
    }

    fn write_configuration(&self, decoration: &Decoration, molecule: &mut Molecule) {
        let atom_at: Vec<usize> = (0..self.skeleton.n_atoms()).collect();
        for (centre, &at) in self.centres.iter().enumerate() {
            if decoration.is_candidate_centre(self, centre) {
                let clockwise = decoration.clockwise[centre];
                let handedness = if clockwise { Handedness::Clockwise } else { Handedness::Anticlockwise };
                let order = self.ligand_order(molecule, &atom_at, at);
                molecule.set_handedness_in(at, &order, handedness);
            }
        }
        for (bond, &(a, b)) in self.open_bonds.iter().enumerate() {
            if !decoration.is_candidate_bond(self, bond) {
                continue;
            }
            let (at_a, at_b) = (self.sites[a], self.sites[b]);
            let of_a = self.reference_ligand(molecule, &atom_at, at_a, at_b);
            let of_b = self.reference_ligand(molecule, &atom_at, at_b, at_a);
            let (Some(mut of_a), Some(mut of_b)) = (of_a, of_b) else { continue };
            let found = molecule.bond_between(at_a, at_b).expect("open bonds are bonds");
            if molecule.bond(found).0 != at_a {
                std::mem::swap(&mut of_a, &mut of_b);
            }
            let geometry = if decoration.trans[bond] { Geometry::Trans } else { Geometry::Cis };
            molecule.set_geometry_between(found, of_a, of_b, geometry);
        }
    }
}

fn is_fixed_centre(skeleton: &Molecule, atom: usize) -> bool {
    let a = skeleton.atom(atom);
    let tetrahedral = match a.element {
        Element::Si => a.charge == 0,
        Element::N | Element::P => a.charge == 1,
        Element::B => a.charge == -1,
        _ => false,
    };
    let n_ligands = skeleton.degree(atom) + usize::from(a.n_hydrogens);
    tetrahedral
        && n_ligands == 4
        && a.n_hydrogens <= 1
        && skeleton.neighbours(atom).all(|(_, order, _)| order == BondOrder::Single)
}

/// A molecule's skeleton in the molecule's own atom order, and the molecule's atom at each
/// place of it.
fn strip(molecule: &Molecule) -> (Molecule, Vec<usize>) {
    let is_site: Vec<bool> = (0..molecule.n_atoms()).map(|a| molecule.is_plain_carbon(a)).collect();
    let is_decoration =
        |atom: usize| molecule.leaving_halogen(atom).is_some() && molecule.neighbours(atom).all(|(n, _, _)| is_site[n]);
    let kept: Vec<usize> = (0..molecule.n_atoms()).filter(|&a| !is_decoration(a)).collect();
    let mut place = vec![usize::MAX; molecule.n_atoms()];
    let mut bare = Molecule::new();
    for (p, &atom) in kept.iter().enumerate() {
        place[atom] = p;
        bare.add_atom(if is_site[atom] { Atom::neutral(Element::C, 0) } else { molecule.atom(atom) });
    }
    for (a, b, order) in molecule.bonds() {
        if place[a] != usize::MAX && place[b] != usize::MAX {
            let order = if is_site[a] && is_site[b] { BondOrder::Single } else { order };
            bare.add_bond(place[a], place[b], order);
        }
    }
    (bare, kept)
}
