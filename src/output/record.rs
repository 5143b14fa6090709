//! The shape of what leaves: a network as plain records.
//!
//! These structs are the JSON of format `haloshed-network/1`; `docs/haloshed-network.schema.json`
//! is derived from them. Within a format number fields are only added, never renamed or taken
//! away, and ids keep their meaning: they run from 1, the same on every run.
//!
//! Invariant: a number that is not known is null, and a field beside it says why.

use std::fmt::Write as _;

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::decimals;

/// Name and number of the format.
pub const FORMAT: &str = "haloshed-network/1";

/// A network: everything that its parents can turn into by the rules named.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
#[schemars(title = "haloshed-network/1")]
pub struct Network {
    /// What holds for the whole network.
    #[serde(flatten)]
    pub header: Header,
    /// Every compound once, generation by generation, parents first.
    pub compounds: Vec<Compound>,
    /// One step for each distinct from, to and rule.
    pub steps: Vec<Step>,
}

/// What holds for the whole network.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Header {
    /// Name and number of the format: "haloshed-network/1".
    pub format: String,
    /// What made it.
    pub program: Program,
    /// Ids of the parents; several where the one given stands for several isomers.
    pub parents: Vec<u32>,
    /// How far compounds are told apart.
    pub identity: Identity,
    /// The conditions that `e_volt` and `gibbs_step_kj_per_mol` are for.
    pub conditions: Conditions,
    /// Names of the rules that were applied, in order.
    pub rules: Vec<String>,
    /// Whether everything reachable is there; if not, `warnings` says which limit was reached.
    pub complete: bool,
    /// What the reader must know before using the network.
    pub warnings: Vec<String>,
}

/// A program and its version.
#[derive(Debug, Clone, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct Program {
    /// Its name.
    pub name: String,
    /// Its version.
    pub version: String,
}

impl Program {
    /// This program.
    pub fn this() -> Program {
        Program { name: env!("CARGO_PKG_NAME").to_owned(), version: env!("CARGO_PKG_VERSION").to_owned() }
    }
}

/// How far compounds are told apart.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "lowercase")]
pub enum Identity {
    /// By connectivity alone.
    Constitutional,
    /// By connectivity and E/Z.
    Geometric,
    /// By connectivity, E/Z and tetrahedral configuration.
    Full,
}

/// Conditions of the water.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Conditions {
    /// Temperature in kelvin.
    pub temperature_kelvin: f64,
    /// pH.
    pub ph: f64,
    /// Activity of each halide ion, in mol/L.
    pub halide_mol_per_litre: ByHalogen<f64>,
}

/// A number for each halogen.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, Serialize, Deserialize, JsonSchema)]
#[schemars(rename = "{T}_by_halogen")]
pub struct ByHalogen<T> {
    /// Fluorine.
    #[serde(rename = "F")]
    pub fluorine: T,
    /// Chlorine.
    #[serde(rename = "Cl")]
    pub chlorine: T,
    /// Bromine.
    #[serde(rename = "Br")]
    pub bromine: T,
    /// Iodine.
    #[serde(rename = "I")]
    pub iodine: T,
}

impl<T: Copy> ByHalogen<T> {
    /// Symbol and number of each halogen, lightest first.
    pub fn pairs(&self) -> [(&'static str, T); 4] {
        [("F", self.fluorine), ("Cl", self.chlorine), ("Br", self.bromine), ("I", self.iodine)]
    }
}

/// A compound of the network.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Compound {
    /// Number, from 1.
    pub id: u32,
    /// Canonical SMILES; isomeric as far as the network's identity goes.
    pub smiles: String,
    /// Molecular formula in Hill order.
    pub formula: String,
    /// Condensed structural formula such as `cis-CHCl=CHCl`; the SMILES where there is none.
    pub condensed: String,
    /// Names, the systematic one first; empty where none is known.
    pub names: Vec<String>,
    /// Abbreviations in use at sites, such as PCE.
    pub abbreviations: Vec<String>,
    /// CAS registry number, where known.
    pub cas: Option<String>,
    /// Fewest steps from a parent; parents are 0.
    pub generation: u32,
    /// Whether it is one of the parents.
    pub is_parent: bool,
    /// Whether no rule leads on from it. False where a limit left it unexpanded.
    pub is_end_product: bool,
    /// Whether it is a short-lived intermediate (a carbene) that no bottle will hold.
    pub transient: bool,
    /// Halogen atoms by element.
    pub halogens: ByHalogen<u32>,
    /// Molar mass in g/mol.
    #[serde(serialize_with = "decimals::molar_mass")]
    pub molar_mass_g_per_mol: f64,
    /// Mass of the molecule of the lightest abundant isotopes, in u.
    #[serde(serialize_with = "decimals::five")]
    pub monoisotopic_mass_u: f64,
    /// Standard Gibbs energy of formation in water, 298.15 K, 1 mol/L, in kJ/mol.
    #[serde(serialize_with = "decimals::kj_per_mol")]
    pub gibbs_aq_kj_per_mol: Option<f64>,
    /// Its standard uncertainty in kJ/mol.
    #[serde(serialize_with = "decimals::kj_per_mol")]
    pub gibbs_sd_kj_per_mol: Option<f64>,
    /// Whether it was measured or estimated.
    pub gibbs_origin: GibbsOrigin,
    /// The sources of what was measured, the groups of what was estimated, or why there is none.
    pub gibbs_source: String,
    /// Well-known dangers, each with its source.
    pub cautions: Vec<Caution>,
}

/// Where a Gibbs energy comes from.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "kebab-case")]
pub enum GibbsOrigin {
    /// Every part was measured.
    Measured,
    /// Some parts were measured, the others estimated.
    PartlyMeasured,
    /// Every part was estimated.
    Estimated,
    /// There is no value.
    None,
}

/// A short factual warning of a dangerous compound.
#[derive(Debug, Clone, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct Caution {
    /// What is dangerous about it.
    pub text: String,
    /// Who says so.
    pub source: String,
}

/// A step of the network.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Step {
    /// Number, from 1.
    pub id: u32,
    /// Id of the compound that reacts.
    pub from: u32,
    /// Id of the compound it becomes.
    pub to: u32,
    /// Name of the rule.
    pub rule: String,
    /// Number of ways, each shared out among the isomers it leads to.
    #[serde(serialize_with = "decimals::five")]
    pub degeneracy: f64,
    /// Molecules of `from` that take part for one of `to`: 1, or 2 where two are joined.
    pub molecules: u32,
    /// Electrons consumed.
    pub electrons: i32,
    /// Protons consumed; negative where they are given off.
    pub protons: i32,
    /// Water molecules consumed; negative where they are given off.
    pub water: i32,
    /// Halide ions released, by element.
    pub released: ByHalogen<u32>,
    /// Reduction potential at unit activities, in volts against the standard hydrogen electrode.
    #[serde(serialize_with = "decimals::volt")]
    pub e_standard_volt: Option<f64>,
    /// Reduction potential under the network's conditions, organics at equal activity, in volts
    /// against the standard hydrogen electrode.
    #[serde(serialize_with = "decimals::volt")]
    pub e_volt: Option<f64>,
    /// Standard uncertainty of both potentials, in volts.
    #[serde(serialize_with = "decimals::volt")]
    pub e_sd_volt: Option<f64>,
    /// Why there is no potential; null where there is one.
    pub e_missing: Option<String>,
    /// Gibbs energy of the step under the network's conditions, in kJ/mol; electrons count as
    /// those of the standard hydrogen electrode.
    #[serde(serialize_with = "decimals::kj_per_mol")]
    pub gibbs_step_kj_per_mol: Option<f64>,
    /// Its standard uncertainty in kJ/mol.
    #[serde(serialize_with = "decimals::kj_per_mol")]
    pub gibbs_step_sd_kj_per_mol: Option<f64>,
}

impl Compound {
    /// Name and abbreviation as they are printed: `trichloroethene (TCE)`; empty if it has none.
    pub fn title(&self) -> String {
        match (self.names.first(), self.abbreviations.first()) {
            (Some(name), Some(short)) if name != short => format!("{name} ({short})"),
            (Some(name), _) => name.clone(),
            (None, Some(short)) => short.clone(),
            (None, None) => String::new(),
        }
    }

    /// Condensed formula as it is printed: a transient stands in brackets.
    pub fn formula_text(&self) -> String {
        if self.transient { format!("[{}]", self.condensed) } else { self.condensed.clone() }
    }
}

impl Conditions {
    /// The conditions in one line: `25 °C, pH 7, chloride 1 mmol/L`.
    ///
    /// Halides are named for the elements in `elements`, those of equal activity together.
    pub fn text(&self, elements: ByHalogen<bool>) -> String {
        let names = ["fluoride", "chloride", "bromide", "iodide"];
        let halides = self.halide_mol_per_litre.pairs();
        let mut groups: Vec<(f64, Vec<&str>)> = Vec::new();
        for ((name, (_, activity)), (_, is_wanted)) in names.into_iter().zip(halides).zip(elements.pairs()) {
            if !is_wanted {
                continue;
            }
            match groups.iter_mut().find(|(a, _)| a.total_cmp(&activity).is_eq()) {
                Some((_, group)) => group.push(name),
                None => groups.push((activity, vec![name])),
            }
        }
        let mut text =
            format!("{} °C, pH {}", decimals::plain(self.temperature_kelvin - 273.15), decimals::plain(self.ph));
        for (activity, group) in groups {
            let each = if group.len() > 1 { "each " } else { "" };
            let _ = write!(text, ", {} {each}{}", group.join(", "), decimals::concentration_text(activity));
        }
        text
    }
}

impl Network {
    /// The elements that halide activities matter for: those of any compound.
    pub fn halogen_elements(&self) -> ByHalogen<bool> {
        let mut found = ByHalogen::default();
        self.compounds.iter().for_each(|compound| mark_elements(&mut found, compound));
        found
    }
}

/// Adds the elements of a compound's halogens to those found.
pub(super) fn mark_elements(found: &mut ByHalogen<bool>, compound: &Compound) {
    found.fluorine |= compound.halogens.fluorine > 0;
    found.chlorine |= compound.halogens.chlorine > 0;
    found.bromine |= compound.halogens.bromine > 0;
    found.iodine |= compound.halogens.iodine > 0;
}
