//! Energies of a network's compounds and steps as records want them.

use super::assemble::{CompoundEnergy, Energies, StepEnergy};
use super::explain::{Contribution, Explanation, Part};
use super::record::GibbsOrigin;
use crate::network::{CompoundId, HalfReaction, Network, Step};
use crate::smiles;
use crate::thermo::data::Quantity;
use crate::thermo::{self, Conditions, Node, Origin, Scheme, features, parts, potential};

/// A network with the energies of its compounds, at some conditions.
pub struct Valued<'a> {
    /// The network.
    pub network: &'a Network,
    /// Energies of its compounds.
    pub energies: &'a thermo::Energies,
    /// The scheme they come from.
    pub scheme: &'a Scheme,
    /// Conditions of E' and of the Gibbs energies of steps.
    pub conditions: Conditions,
}

impl Energies for Valued<'_> {
    fn compound(&self, compound: CompoundId) -> CompoundEnergy {
        let node = Node::of(self.network, self.energies, self.scheme, compound);
        match self.energies.gibbs_kj_per_mol(compound) {
            Some(gibbs) => CompoundEnergy {
                gibbs_aq_kj_per_mol: Some(gibbs),
                gibbs_sd_kj_per_mol: Some(node.sd_kj_per_mol(self.scheme)),
                gibbs_origin: origin(&node),
                gibbs_source: source(&node),
            },
            None => CompoundEnergy {
                gibbs_aq_kj_per_mol: None,
                gibbs_sd_kj_per_mol: None,
                gibbs_origin: GibbsOrigin::None,
                gibbs_source: self.why_missing(compound),
            },
        }
    }

    fn has_value(&self, step: &Step, n_reactants: u32) -> bool {
        self.energies.has_value(step.from, step.to, n_reactants)
    }

    fn step(&self, step: &Step, reaction: &HalfReaction) -> StepEnergy {
        let ends = (step.from, step.to);
        match potential(self.network, self.energies, self.scheme, &self.conditions, ends, reaction) {
            Err(missing) => StepEnergy { e_missing: Some(missing.to_string()), ..StepEnergy::default() },
            Ok(found) => StepEnergy {
                e_standard_volt: found.volts.map(|v| v.standard),
                e_volt: found.volts.map(|v| v.at_conditions),
                e_sd_volt: found.volts.map(|v| v.sd),
                e_missing: found.volts.is_none().then(|| "no electron is transferred".to_owned()),
                gibbs_step_kj_per_mol: Some(found.gibbs_kj_per_mol),
                gibbs_step_sd_kj_per_mol: Some(found.gibbs_sd_kj_per_mol),
            },
        }
    }
}

impl Valued<'_> {
    fn why_missing(&self, compound: CompoundId) -> String {
        let words = parts::in_words(&self.network.state(compound).0.frame);
        format!(
            "the scheme has no values for groups with {words}; steps that leave them alone are estimated by difference"
        )
    }

    /// Where the Gibbs energy of a compound comes from.
    pub fn explanation(&self, compound: CompoundId, title: String) -> Explanation {
        let node = Node::of(self.network, self.energies, self.scheme, compound);
        let gibbs = self.energies.gibbs_kj_per_mol(compound);
        let mut remarks = Vec::new();
        if gibbs.is_none() {
            remarks.push(self.why_missing(compound));
        }
        let measured = node.known.as_ref().and_then(|known| known.aqueous.clone());
        let parts = measured.map_or_else(
            || {
                let missing = gibbs.is_none().then(|| parts::in_words(&self.network.state(compound).0.frame));
                self.parts(&node, missing.as_deref())
            },
            |(value, source)| vec![measured_whole((value.mean, value.sd), source)],
        );
        Explanation {
            title,
            smiles: smiles::write(&self.network.molecule(compound)),
            parts,
            gibbs_kj_per_mol: gibbs.map(|gibbs| (gibbs, node.sd_kj_per_mol(self.scheme))),
            origin: if gibbs.is_some() { origin(&node) } else { GibbsOrigin::None },
            remarks,
        }
    }

    fn parts(&self, node: &Node, missing: Option<&str>) -> Vec<Part> {
        let mut parts: Vec<Part> = Quantity::ALL.iter().map(|&quantity| self.part(node, quantity, missing)).collect();
        let plain = |quantity: &str, value: f64, source: &str| Part {
            quantity: quantity.to_owned(),
            unit: "J/mol/K".to_owned(),
            value: Some((value, 0.0)),
            source: source.to_owned(),
            contributions: Vec::new(),
        };
        if node.measured(Quantity::Entropy).is_none() {
            let value = -node.symmetry_entropy_j_per_mol_k;
            parts.insert(2, plain("of which symmetry, -R ln(sigma)", value, "counted on the graph"));
        }
        parts.push(plain("entropy of the elements", node.element_entropy_j_per_mol_k, "CODATA Key Values, 1989"));
        parts
    }

    /// One part. `missing` names the elements whose groups have no value, if that is so.
    fn part(&self, node: &Node, quantity: Quantity, missing: Option<&str>) -> Part {
        let name = match quantity {
            Quantity::Enthalpy => "enthalpy of formation, ideal gas",
            Quantity::Entropy => "standard entropy, ideal gas",
            Quantity::Solubility => "log10 of the Henry solubility",
        };
        let index = quantity as usize;
        let (value, source, contributions) = if let Some(value) = node.measured(quantity) {
            let sources = node.known.as_ref().map(|k| k.sources[index].clone()).unwrap_or_default();
            (Some((value.mean, value.sd)), format!("measured: {sources}"), Vec::new())
        } else if let Some(words) = missing {
            let source = format!(
                "groups with {words} have none; those below enter the steps that leave them alone, by difference"
            );
            (None, source, self.contributions(node, quantity))
        } else {
            let own = node.model_sd[index];
            let sd = (self.scheme.variance(quantity, &node.groups) + own * own).sqrt();
            let source = format!("sum of groups; deviation from the scheme itself ± {own:.2}");
            (Some((node.estimates[index], sd)), source, self.contributions(node, quantity))
        };
        Part { quantity: name.to_owned(), unit: quantity.unit().to_owned(), value, source, contributions }
    }

    fn contributions(&self, node: &Node, quantity: Quantity) -> Vec<Contribution> {
        let names = features::names();
        node.groups
            .iter()
            .map(|&(group, count)| Contribution {
                label: names[group].clone(),
                count,
                value: self.scheme.values[quantity as usize][group],
                sd: self.scheme.variance(quantity, &[(group, 1.0)]).sqrt(),
                source: "data/fitted/groups.csv".to_owned(),
            })
            .collect()
    }
}

/// The only part of a value that was measured as a whole.
fn measured_whole(value: (f64, f64), source: String) -> Part {
    Part {
        quantity: "Gibbs energy of formation in water, as measured".to_owned(),
        unit: "kJ/mol".to_owned(),
        value: Some(value),
        source,
        contributions: Vec::new(),
    }
}

fn origin(node: &Node) -> GibbsOrigin {
    match node.origin() {
        Origin::Measured => GibbsOrigin::Measured,
        Origin::PartlyMeasured => GibbsOrigin::PartlyMeasured,
        Origin::Estimated => GibbsOrigin::Estimated,
    }
}

/// What each part rests on, in one line.
fn source(node: &Node) -> String {
    if let Some((_, source)) = node.known.as_ref().and_then(|known| known.aqueous.as_ref()) {
        return source.clone();
    }
    let names = ["enthalpy", "entropy", "solubility"];
    let of = |quantity: Quantity| match (node.measured(quantity), &node.known) {
        (Some(_), Some(known)) => format!("{}: {}", names[quantity as usize], known.sources[quantity as usize]),
        _ => format!("{}: groups", names[quantity as usize]),
    };
    Quantity::ALL.map(of).join(" | ")
}
