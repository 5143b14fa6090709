//! What of a compound the scheme has no value for, and what that allows.
//!
//! Fixed atoms (O, N, a carbonyl carbon, ...) have no group values of their own. Two compounds
//! of one frame whose sites beside fixed atoms have the same classes hold the same valueless
//! parts: these cancel in a step. A *signature* says which valueless parts a compound has; a
//! step has an estimate when both signatures are equal. Zero stands for none.

use std::hash::{Hash, Hasher};

use rustc_hash::FxHasher;

use crate::frame::{Decoration, Frame};
use crate::molecule::Element;

/// The signature of a decoration's valueless parts; zero if there are none.
pub fn signature(frame: &Frame, state: &Decoration) -> u64 {
    if frame.sites().len() == frame.skeleton().n_atoms() {
        return 0;
    }
    let mut hasher = FxHasher::default();
    frame.key().hash(&mut hasher);
    for site in 0..frame.sites().len() {
        if frame.fixed_neighbours(site).next().is_some() {
            let class = (state.n_pi_bonds(frame, site), state.carbenes[site], state.is_aromatic(frame, site));
            (site, class).hash(&mut hasher);
        }
    }
    hasher.finish().max(1)
}

/// Halogens on carbons beside fixed atoms, by site.
pub fn halogens_beside_fixed(frame: &Frame, state: &Decoration) -> Vec<u8> {
    (0..frame.sites().len())
        .filter(|&site| frame.fixed_neighbours(site).next().is_some())
        .map(|site| state.n_halogens(site))
        .collect()
}

/// The valueless parts in words: the elements of the fixed atoms.
pub fn in_words(frame: &Frame) -> String {
    let mut symbols: Vec<String> = (0..frame.skeleton().n_atoms())
        .filter(|&at| frame.site_of(at).is_none())
        .map(|at| {
            let atom = frame.skeleton().atom(at);
            match atom.charge {
                0 if atom.element == Element::C => "carbonyl or cyano carbon".to_owned(),
                0 => atom.element.name().to_owned(),
                charge => format!("{} of charge {charge:+}", atom.element.name()),
            }
        })
        .collect();
    symbols.sort();
    symbols.dedup();
    symbols.join(", ")
}
