//! The half-reaction of a step, from what its two compounds are made of.
//!
//! A step's protons, electrons, water and halides follow from its compounds alone: oxygen gives
//! the water, halogens the ions, hydrogen the protons, and charge the electrons.

use super::store::{CompoundId, Network};
use crate::molecule::{Element, Formula, Halogen};

/// What a step takes up and gives off besides its compounds.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct HalfReaction {
    /// Molecules of the reacting compound (2 in a coupling).
    pub n_reactants: u32,
    /// Electrons taken up; negative when given off.
    pub electrons: i32,
    /// Protons taken up; negative when given off.
    pub protons: i32,
    /// Water taken up; negative when given off.
    pub water: i32,
    /// Halide ions given off, by [`Halogen`].
    pub released: [i32; 4],
}

impl Network {
    /// The half-reaction from one compound to another, `n_reactants` of the first.
    pub fn half_reaction(&self, from: CompoundId, to: CompoundId, n_reactants: u32) -> HalfReaction {
        between(&self.molecule_as_stored(from).formula(), &self.molecule_as_stored(to).formula(), n_reactants)
    }
}

/// The half-reaction between two formulas, `n_reactants` of the first giving one of the second.
pub fn between(from: &Formula, to: &Formula, n_reactants: u32) -> HalfReaction {
    let n = n_reactants as i32;
    let gain = |of: &dyn Fn(&Formula) -> i32| of(to) - n * of(from);
    let released = Halogen::ALL.map(|x| -gain(&|f| f.count(x.element()) as i32));
    let water = gain(&|f| f.count(Element::O) as i32);
    let protons = gain(&|f| f.n_hydrogens() as i32) - 2 * water;
    let charge = gain(&Formula::charge);
    let electrons = protons - charge + released.iter().sum::<i32>();
    HalfReaction { n_reactants, electrons, protons, water, released }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::smiles::read;

    fn check(from: &str, to: &str, expected: (i32, i32, i32, [i32; 4])) {
        let formula = |text| read(text).unwrap().formula();
        let found = between(&formula(from), &formula(to), 1);
        assert_eq!((found.electrons, found.protons, found.water, found.released), expected, "{from} to {to}");
    }

    #[test]
    fn half_reactions_balance() {
        check("ClC(Cl)=C(Cl)Cl", "ClC=C(Cl)Cl", (2, 1, 0, [0, 1, 0, 0]));
        check("ClC(Cl)=C(Cl)Cl", "ClC#CCl", (2, 0, 0, [0, 2, 0, 0]));
        check("ClCC(F)Br", "ClCC", (4, 2, 0, [1, 0, 1, 0]));
        check("Cl[C]Cl", "[C-]#[O+]", (0, -2, 1, [0, 2, 0, 0]));
        check("C=C", "CC", (2, 2, 0, [0; 4]));
        check("CCl", "CO", (0, -1, 1, [0, 1, 0, 0]));
    }
}
