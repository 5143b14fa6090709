//! Symmetry number of a compound: external and internal rotations together.
//!
//! It is the number of permutations of all atoms, hydrogens and halogens included, that keep
//! the graph and could be rotations: even at every sp3 carbon, and of equal parity at the two
//! ends of a double bond or cumulene. For each automorphism of the skeleton that keeps the
//! decoration, the like ligands of each carbon can still be permuted among themselves; a carbon
//! with two like ligands can always mend its own parity.
//!
//! # Source
//! S. W. Benson, Thermochemical Kinetics, 2nd ed. (1976), section 2.6, for external times
//! internal symmetry; the count on the graph is our own.

use crate::frame::{Decoration, Frame};
use crate::molecule::BondOrder;
use crate::molecule::graph::is_odd;

/// Symmetry number of a decoration. `stabiliser` holds the automorphisms of the skeleton, the
/// identity left out, that keep the decoration: images of skeleton atoms.
pub fn symmetry_number(frame: &Frame, state: &Decoration, stabiliser: &[&Vec<usize>]) -> f64 {
    let identity: Vec<usize> = (0..frame.skeleton().n_atoms()).collect();
    let all = std::iter::once(&identity).chain(stabiliser.iter().copied());
    let sum: f64 = all.map(|g| n_rotations(frame, state, g)).sum();
    sum.max(1.0)
}

/// Permutations of like ligands that make a rotation of a skeleton automorphism.
fn n_rotations(frame: &Frame, state: &Decoration, g: &[usize]) -> f64 {
    let mut n = 1.0;
    for site in 0..frame.sites().len() {
        let n_pi = state.n_pi_bonds(frame, site);
        if state.is_aromatic(frame, site) || n_pi > 1 {
            continue;
        }
        if n_pi == 0 {
            n *= at_single_bonded(frame, state, site, g);
        } else if let Some(other) = other_end(frame, state, site).filter(|&other| other >= site) {
            n *= at_double_bond(frame, state, site, other, g);
        }
        if n < 0.5 {
            return 0.0;
        }
    }
    n
}

fn at_single_bonded(frame: &Frame, state: &Decoration, site: usize, g: &[usize]) -> f64 {
    let orders = n_orders(frame, state, site);
    if state.carbenes[site] {
        // Bent: two like ligands change places by half a turn.
        return if frame.site_neighbours(site).is_empty() { orders } else { 1.0 };
    }
    if orders > 1.0 {
        return orders / 2.0;
    }
    let at = frame.sites()[site];
    let is_kept_in_place = g[at] == at;
    if is_kept_in_place && is_odd(&images(frame, site, g, None)) { 0.0 } else { 1.0 }
}

/// Orders of like ligands on a site.
fn n_orders(frame: &Frame, state: &Decoration, site: usize) -> f64 {
    let factorial = |n: u8| (1..=n).map(f64::from).product::<f64>();
    let halogens: f64 = state.halogens[site].iter().map(|&n| factorial(n)).product();
    halogens * factorial(state.n_hydrogens(frame, site))
}

/// Images of a site's skeleton neighbours in their order, one site left out.
fn images(frame: &Frame, site: usize, g: &[usize], besides: Option<usize>) -> Vec<usize> {
    let mut around: Vec<usize> = frame.skeleton().neighbours(frame.sites()[site]).map(|(n, _, _)| n).collect();
    around.retain(|&n| besides.map(|b| frame.sites()[b]) != Some(n));
    around.sort_unstable();
    around.iter().map(|&n| g[n]).collect()
}

/// The sp2 carbon at the other end of a double bond or cumulene; the site itself if the
/// double bond leads to a fixed atom.
fn other_end(frame: &Frame, state: &Decoration, site: usize) -> Option<usize> {
    let (mut previous, mut here) = (site, site);
    for _ in 0..frame.sites().len() {
        let next = frame
            .site_neighbours(here)
            .iter()
            .find(|&&(n, bond)| n != previous && state.orders[bond] == BondOrder::Double)
            .map(|&(n, _)| n);
        match next {
            Some(n) => (previous, here) = (here, n),
            None => return (here != site).then_some(here),
        }
    }
    None
}

fn at_double_bond(frame: &Frame, state: &Decoration, a: usize, b: usize, g: &[usize]) -> f64 {
    let has_twins = |site: usize| n_orders(frame, state, site) > 1.0;
    match (has_twins(a), has_twins(b)) {
        (true, true) => 2.0,
        (true, false) | (false, true) => 1.0,
        (false, false) => {
            let is_reversed = |site: usize| {
                let besides =
                    frame.site_neighbours(site).iter().find(|&&(_, bond)| state.orders[bond] == BondOrder::Double);
                is_odd(&images(frame, site, g, besides.map(|&(n, _)| n)))
            };
            if is_reversed(a) == is_reversed(b) { 1.0 } else { 0.0 }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::frame::{Canonicaliser, Layout};
    use crate::molecule::{Halogen, Identity};
    use crate::smiles;

    fn check(text: &str, expected: f64) {
        let frame = Frame::of(&smiles::read(text).unwrap());
        let state = frame.decompose(&smiles::read(text).unwrap());
        let layout = Layout::new(&frame, &Halogen::ALL, Identity::Geometric).unwrap();
        let canonicaliser = Canonicaliser::new(&frame, &layout);
        let (mut row, mut candidates) = (vec![0; layout.n_words()], vec![0; layout.n_words()]);
        layout.pack(&state, &mut row);
        layout.candidates(&frame, &state, &mut candidates);
        let found = symmetry_number(&frame, &state, &canonicaliser.stabiliser(&row, &candidates));
        assert!((found - expected).abs() < 1e-9, "{text}: {found}, expected {expected}");
    }

    #[test]
    fn rigid_molecules_have_the_order_of_their_rotation_group() {
        // Point groups as in any textbook of group theory: T, C3v, D2h, C2v, D2h, D2d, D6h, D3h, Dinf h.
        check("C", 12.0);
        check("ClC(Cl)(Cl)Cl", 12.0);
        check("ClC(Cl)Cl", 3.0);
        check("ClCCl", 2.0);
        check("FC(Cl)Br", 1.0);
        check("C=C", 4.0);
        check("ClC=C", 1.0);
        check("C=C(Cl)Cl", 2.0);
        check(r"Cl/C=C\Cl", 2.0);
        check("Cl/C=C/Cl", 2.0);
        check("ClC(Cl)=C(Cl)Cl", 4.0);
        check("C=C=C", 4.0);
        check("C#C", 2.0);
        check("ClC#C", 1.0);
        check("c1ccccc1", 12.0);
        check("Clc1ccc(Cl)cc1", 4.0);
        check("Clc1cc(Cl)cc(Cl)c1", 6.0);
        check("C1CC1", 6.0);
        check("Cl[C]Cl", 2.0);
    }

    #[test]
    fn internal_rotors_multiply_the_outer_symmetry() {
        // S. W. Benson, Thermochemical Kinetics (1976), section 2.6: outer times 3 a methyl.
        check("CC", 18.0);
        check("CCC", 18.0);
        check("CC(C)C", 81.0);
        check("CC(C)(C)C", 972.0);
        check("ClC(Cl)(Cl)C(Cl)(Cl)Cl", 18.0);
        check("CC(Cl)(Cl)Cl", 9.0);
        check("ClCCCl", 2.0);
        check("C/C=C/C", 18.0);
        check("CC=C", 3.0);
        check("Cc1ccccc1", 6.0);
    }
}
