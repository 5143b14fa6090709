//! The general engine: a rule applied to a molecule, atom by atom.
//!
//! It is written to be plainly right, and is the measure for the fast engine in `frame`. Every
//! way for the rule to act (a `change`: a distinct set of bonds cut) gives
//! the products of its `outcome`, in equal parts.
//!
//! Configuration of idle units. A unit whose two settings give one compound was forgotten by
//! the molecule, yet once a match has cut one of two like branches it is real, and follows
//! from which was cut. So every candidate that carries no setting is given one before the
//! search: any setting will do, as all give the same compound.

use std::collections::BTreeMap;

use super::change::{changes, reactants};
use super::error::ApplyError;
use super::fraction::Fraction;
use super::outcome::outcomes;
use super::rule::{Case, Rule};
use crate::molecule::canonical::{Code, canonical_code};
use crate::molecule::{Identity, Molecule, Unit};

/// What a rule makes of a molecule.
#[derive(Debug, Clone)]
pub struct Product {
    /// The compound, fully specified at the depth of identity asked for.
    pub molecule: Molecule,
    /// Its canonical code.
    pub code: Code,
    /// Path degeneracy: over the distinct sets of bonds cut that give this product, the sum of
    /// 1 / (number of distinct products of that set).
    pub degeneracy: Fraction,
    /// Electrons consumed; negative when given.
    pub electrons: i32,
    /// Protons consumed; negative when given.
    pub protons: i32,
    /// Water molecules consumed; negative when given.
    pub water: i32,
    /// Halide ions released, by [`Halogen`](crate::molecule::Halogen) as index.
    pub released: [u8; 4],
}

/// Every product of a rule, each once, in the order of their canonical codes.
///
/// The molecule is one compound, fully specified at this depth of identity, with its aromatic
/// rings marked. [`Rule::generations`] is for the caller to heed.
///
/// # Errors
/// * a stereo-unit of the molecule is open, so that it stands for several compounds: `NotSpecified`
/// * one step leaves too many stereo-units open: `TooManyOutcomes`
///
/// # Cost
/// One canonical labelling for each way to act and each configuration; no benchmark watches it.
pub fn apply(rule: &Rule, molecule: &Molecule, identity: Identity) -> Result<Vec<Product>, ApplyError> {
    let parent = with_idle_units_set(molecule, identity)?;
    let both = reactants(&parent, rule.copies);
    // By the code with every candidate set, which is canonical without asking what is idle.
    let mut products: BTreeMap<Code, Product> = BTreeMap::new();
    for case in &rule.cases {
        for change in changes(case, &parent, rule.copies) {
            let found = outcomes(&both, &change, case, identity)?;
            let released = halides(&both, change.released.iter().copied());
            let share = Fraction::new(change.n_ways(&both), found.len().max(1) as u64);
            for (code, isomer) in found {
                products
                    .entry(code)
                    .and_modify(|product| product.degeneracy = product.degeneracy.plus(share))
                    .or_insert_with(|| product(isomer, share, case, released, identity));
            }
        }
    }
    let mut products: Vec<Product> = products.into_values().collect();
    products.sort_by(|a, b| a.code.cmp(&b.code));
    Ok(products)
}

fn product(
    mut molecule: Molecule,
    degeneracy: Fraction,
    case: &Case,
    released: [u8; 4],
    identity: Identity,
) -> Product {
    molecule.keep_real_units(identity);
    let code = canonical_code(&molecule);
    let (electrons, protons, water) = (case.electrons, case.protons, case.water);
    Product { molecule, code, degeneracy, electrons, protons, water, released }
}

fn halides(reactants: &Molecule, atoms: impl Iterator<Item = usize>) -> [u8; 4] {
    let mut released = [0; 4];
    for halogen in atoms.filter_map(|atom| reactants.atom(atom).element.halogen()) {
        released[halogen as usize] += 1;
    }
    released
}

/// The molecule with a setting at every candidate unit that the identity tells.
fn with_idle_units_set(molecule: &Molecule, identity: Identity) -> Result<Molecule, ApplyError> {
    let mut set = molecule.clone();
    set.keep_real_units(identity);
    let is_open = |unit: &Unit| unit.is_told_by(identity) && !set.is_given(*unit);
    let open: Vec<Unit> = set.candidate_units().into_iter().filter(is_open).collect();
    for &unit in &open {
        set.set_unit(unit, true);
    }
    let code = canonical_code(&set);
    for &unit in &open {
        let mut other = set.clone();
        other.set_unit(unit, false);
        if canonical_code(&other) != code {
            return Err(ApplyError::NotSpecified { unit });
        }
    }
    Ok(set)
}
