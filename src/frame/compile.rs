//! Rules compiled for a frame: every place where an in-frame case can act.
//!
//! A case is *compilable* when it has at most four atoms, stays in the frame, loses the configuration it touches, lets
//! each halogen be any of the four, and is as symmetric in what it asks as in what it does. The
//! last makes it enough to take one placing of each set that the pattern's own symmetry makes
//! alike: two placings that cut the same bonds would be one match counted twice. Other cases
//! go to the general engine ([`rules::apply`](crate::rules)), which is slower and says the same.

use super::place::{BondDemand, LonePair, Place, SiteDemand};
use super::skeleton::Frame;
use crate::molecule::BondOrder;
use crate::rules::rule::{AtomRef, Case, Configuration, Edit, RingLimits};

/// Most pattern atoms of a compiled case.
const MOST_ATOMS: usize = 4;

/// Whether a case can be compiled.
pub fn is_compilable(case: &Case) -> bool {
    case.is_in_frame()
        && case.atoms.len() <= MOST_ATOMS
        && case.configuration == Configuration::EveryOutcome
        && case.halogens.iter().all(|h| h.allowed == [true; 4])
        && permutations(case.atoms.len()).iter().all(|p| !keeps_edits(case, p) || keeps_demands(case, p))
}

/// Every place of a case on a frame, each set of bonds once, in order of sites.
pub fn places(frame: &Frame, number: usize, case: &Case) -> Vec<Place> {
    let symmetries: Vec<Vec<usize>> =
        permutations(case.atoms.len()).into_iter().filter(|p| keeps_edits(case, p)).collect();
    let mut found = Vec::new();
    embed(frame, case, &mut Vec::new(), &mut found);
    found.retain(|sites| symmetries.iter().all(|p| &p.iter().map(|&i| sites[i]).collect::<Vec<_>>() >= sites));
    found.into_iter().map(|sites| place(frame, number, case, &sites)).collect()
}

/// Extends a placing of the first pattern atoms by every site that the pattern bonds allow.
fn embed(frame: &Frame, case: &Case, sites: &mut Vec<usize>, found: &mut Vec<Vec<usize>>) {
    let next = sites.len();
    if next == case.atoms.len() {
        found.push(sites.clone());
        return;
    }
    for site in 0..frame.sites().len() {
        let fits = !sites.contains(&site)
            && case.bonds.iter().all(|bond| match (bond.a, bond.b) {
                (a, b) if a == next && b < next => frame.open_bond(site, sites[b]).is_some(),
                (a, b) if b == next && a < next => frame.open_bond(site, sites[a]).is_some(),
                _ => true,
            });
        if fits {
            sites.push(site);
            embed(frame, case, sites, found);
            sites.pop();
        }
    }
}

fn place(frame: &Frame, number: usize, case: &Case, sites: &[usize]) -> Place {
    let demand = |(atom, &site): (usize, &usize)| {
        let n_cut = n_cut(case, atom);
        SiteDemand {
            site,
            kind: case.atoms[atom].kind,
            conditions: case.atoms[atom].conditions.clone(),
            n_cut,
            selections: selections(n_cut),
            n_hydrogens_taken: case.hydrogens_taken(AtomRef::first(atom)) as u8,
            lone_pair: lone_pair(case, atom),
        }
    };
    let bonds = case.bonds.iter().enumerate().map(|(index, bond)| BondDemand {
        bond: frame.open_bond(sites[bond.a], sites[bond.b]).expect("embedded on bonds"),
        allowed: [BondOrder::Single, BondOrder::Double, BondOrder::Triple, BondOrder::Aromatic]
            .map(|order| bond.orders.contains(&order)),
        change: case.order_change(index) as i8,
    });
    let open_centres: Vec<usize> = (0..sites.len()).filter(|&a| case.touches(a)).map(|a| sites[a]).collect();
    let ends_open = |bond: &usize| {
        let (a, b) = frame.open_bonds()[*bond];
        open_centres.contains(&a) || open_centres.contains(&b)
    };
    Place {
        case: number,
        sites: sites.iter().enumerate().map(demand).collect(),
        bonds: bonds.collect(),
        conditions: case.conditions.clone(),
        names_carbene: case.names_carbene(),
        has_ring_limits: case.ring_limits == RingLimits::Kept,
        open_geometries: (0..frame.open_bonds().len()).filter(ends_open).collect(),
        open_centres,
    }
}

/// Pattern halogens on an atom: all of them are cut.
fn n_cut(case: &Case, atom: usize) -> u8 {
    case.halogens.iter().filter(|h| h.on == atom).count() as u8
}

/// The ways to take `n` halogens by kind, lightest first.
fn selections(n: u8) -> Vec<[u8; 4]> {
    let mut all = Vec::new();
    for f in (0..=n).rev() {
        for cl in (0..=n - f).rev() {
            for br in (0..=n - f - cl).rev() {
                all.push([f, cl, br, n - f - cl - br]);
            }
        }
    }
    all
}

fn lone_pair(case: &Case, atom: usize) -> LonePair {
    let this = AtomRef::first(atom);
    if case.edits.contains(&Edit::MakeCarbene(this)) {
        LonePair::Made
    } else if case.edits.contains(&Edit::CloseCarbene(this)) {
        LonePair::Ended
    } else {
        LonePair::Unchanged
    }
}

/// Every order of `n` things.
fn permutations(n: usize) -> Vec<Vec<usize>> {
    let mut all = vec![Vec::new()];
    for i in 0..n {
        all = all
            .into_iter()
            .flat_map(|p: Vec<usize>| {
                (0..=p.len()).map(move |at| {
                    let mut longer = p.clone();
                    longer.insert(at, i);
                    longer
                })
            })
            .collect();
    }
    all
}

/// Whether renaming pattern atoms leaves the bonds and what is done to them as they are.
fn keeps_edits(case: &Case, p: &[usize]) -> bool {
    let image_of_bond = |index: usize| {
        let ends = [p[case.bonds[index].a], p[case.bonds[index].b]];
        case.bonds.iter().position(|b| ends == [b.a, b.b] || ends == [b.b, b.a])
    };
    (0..case.bonds.len()).all(|i| image_of_bond(i).is_some_and(|j| case.order_change(i) == case.order_change(j)))
        && (0..p.len()).all(|a| {
            let (this, that) = (AtomRef::first(a), AtomRef::first(p[a]));
            n_cut(case, a) == n_cut(case, p[a])
                && case.hydrogens_taken(this) == case.hydrogens_taken(that)
                && case.hydrogens_added(this) == case.hydrogens_added(that)
                && lone_pair(case, a) == lone_pair(case, p[a])
        })
}

/// Whether renaming pattern atoms leaves what is asked of them as it is.
fn keeps_demands(case: &Case, p: &[usize]) -> bool {
    let orders_at = |a: usize, b: usize| {
        case.bonds.iter().find(|bond| [bond.a, bond.b] == [a, b] || [bond.a, bond.b] == [b, a]).map(|b| &b.orders)
    };
    case.bonds.iter().all(|bond| orders_at(p[bond.a], p[bond.b]) == Some(&bond.orders))
        && (0..p.len()).all(|a| {
            let (this, that) = (&case.atoms[a], &case.atoms[p[a]]);
            this.kind == that.kind && this.conditions == that.conditions
        })
}
