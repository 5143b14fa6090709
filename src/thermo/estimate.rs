//! A compound's groups and estimate, from its decoration of a frame.

use super::data::Quantity;
use super::features::{self, FrameFacts, SiteView};
use super::scheme::Scheme;
use super::symmetry::symmetry_number;
use crate::frame::{Decoration, Frame};
use crate::molecule::{Element, Halogen};

/// Counts the groups of decorations of one frame.
#[derive(Debug, Clone)]
pub struct Estimator<'a> {
    frame: &'a Frame,
    facts: &'a FrameFacts,
    has_geometry: bool,
    views: Vec<SiteView>,
}

impl<'a> Estimator<'a> {
    /// For a frame and its facts; without geometry in the states (`has_geometry` false) cis and trans count
    /// half each.
    pub fn new(frame: &'a Frame, facts: &'a FrameFacts, has_geometry: bool) -> Estimator<'a> {
        Estimator { frame, facts, has_geometry, views: Vec::new() }
    }

    /// Gives `emit` each group with its count; a group may come several times.
    pub fn count(&mut self, state: &Decoration, emit: &mut impl FnMut(usize, f64)) {
        features::view(self.frame, self.facts, state, &mut self.views);
        features::count(self.frame, self.facts, state, &self.views, self.has_geometry, emit);
    }

    /// The groups of a decoration, each once, by number.
    pub fn groups(&mut self, state: &Decoration) -> Vec<(usize, f64)> {
        let mut counts = vec![0.0; features::N_FEATURES];
        self.count(state, &mut |group, n| counts[group] += n);
        counts.into_iter().enumerate().filter(|(_, n)| *n != 0.0).collect()
    }
}

/// The estimate of a quantity from its groups, without the symmetry of the compound.
pub fn sum(scheme: &Scheme, quantity: Quantity, groups: &[(usize, f64)]) -> f64 {
    groups.iter().map(|&(group, n)| n * scheme.values[quantity as usize][group]).sum()
}

/// Entropy that symmetry takes from a compound, J/mol/K: R ln sigma.
pub fn symmetry_entropy(frame: &Frame, state: &Decoration, stabiliser: &[&Vec<usize>]) -> f64 {
    super::constants::GAS_CONSTANT_J_PER_MOL_K * libm::log(symmetry_number(frame, state, stabiliser))
}

/// Standard entropy of the elements that make a compound, J/mol/K at 298.15 K.
///
/// # Source
/// CODATA Key Values (Cox, Wagman, Medvedev 1989): C graphite, H2, F2, Cl2, Br2(l), I2(s), O2,
/// N2, S, P white, Si, B; from memory beyond the halogens.
pub fn element_entropy(frame: &Frame, state: &Decoration) -> f64 {
    const HYDROGEN: f64 = 65.34;
    let mut sum = 0.0;
    for site in 0..frame.sites().len() {
        sum += of_element(Element::C) + HYDROGEN * f64::from(state.n_hydrogens(frame, site));
        for halogen in Halogen::ALL {
            sum += of_element(halogen.element()) * f64::from(state.halogens[site][halogen as usize]);
        }
    }
    for at in (0..frame.skeleton().n_atoms()).filter(|&at| frame.site_of(at).is_none()) {
        let atom = frame.skeleton().atom(at);
        sum += of_element(atom.element) + HYDROGEN * f64::from(atom.n_hydrogens);
    }
    sum
}

fn of_element(element: Element) -> f64 {
    match element {
        Element::C => 5.74,
        Element::F => 101.395,
        Element::Cl => 111.54,
        Element::Br => 76.105,
        Element::I => 58.07,
        Element::O => 102.576,
        Element::N => 95.805,
        Element::S => 32.05,
        Element::P => 41.09,
        Element::Si => 18.81,
        Element::B => 5.90,
    }
}
