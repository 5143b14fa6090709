//! Comma-separated values: one table of compounds, one of steps (RFC 4180, UTF-8).
//!
//! A cell of text that begins with `=`, `+`, `-`, `@`, a tab or a carriage return could be run
//! as a formula by a spreadsheet; an apostrophe before it prevents that. Numbers are left
//! alone. The conditions stand on every row of a table with potentials, so that no potential
//! is copied out without its pH and chloride.

use std::borrow::Cow;
use std::io;

use serde::Serialize;

use super::decimals;
use super::record::{ByHalogen, Compound, Conditions, GibbsOrigin, Step};
use super::{Records, Writer};

/// Writes one table of a network as CSV.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Csv {
    /// A row for each compound.
    Compounds,
    /// A row for each step.
    Steps,
}

impl Writer for Csv {
    fn write(&self, network: &dyn Records, out: &mut dyn io::Write) -> io::Result<()> {
        let mut writer = ::csv::Writer::from_writer(out);
        match self {
            Csv::Compounds => write_compounds(network, &mut writer),
            Csv::Steps => write_steps(network, &mut writer),
        }?;
        writer.flush()
    }
}

/// Text that no spreadsheet takes for a formula.
///
/// # Example
/// ```
/// use haloshed::output::csv::guarded;
///
/// assert_eq!(guarded("=1+2"), "'=1+2");
/// assert_eq!(guarded("1,1-dichloroethene"), "1,1-dichloroethene");
/// ```
pub fn guarded(text: &str) -> Cow<'_, str> {
    if text.starts_with(['=', '+', '-', '@', '\t', '\r']) {
        Cow::Owned(format!("'{text}"))
    } else {
        Cow::Borrowed(text)
    }
}

#[derive(Serialize)]
struct CompoundRow<'a> {
    id: u32,
    generation: u32,
    smiles: Cow<'a, str>,
    formula: Cow<'a, str>,
    condensed: Cow<'a, str>,
    name: Cow<'a, str>,
    abbreviation: Cow<'a, str>,
    other_names: String,
    cas: Cow<'a, str>,
    is_parent: bool,
    is_end_product: bool,
    transient: bool,
    n_fluorine: u32,
    n_chlorine: u32,
    n_bromine: u32,
    n_iodine: u32,
    #[serde(serialize_with = "decimals::molar_mass")]
    molar_mass_g_per_mol: f64,
    #[serde(serialize_with = "decimals::five")]
    monoisotopic_mass_u: f64,
    #[serde(serialize_with = "decimals::kj_per_mol")]
    gibbs_aq_kj_per_mol: Option<f64>,
    #[serde(serialize_with = "decimals::kj_per_mol")]
    gibbs_sd_kj_per_mol: Option<f64>,
    gibbs_origin: GibbsOrigin,
    gibbs_source: Cow<'a, str>,
    cautions: String,
}

fn write_compounds<W: io::Write>(network: &dyn Records, writer: &mut ::csv::Writer<W>) -> io::Result<()> {
    for compound in network.compounds() {
        writer.serialize(compound_row(&compound))?;
    }
    Ok(())
}

fn compound_row(compound: &Compound) -> CompoundRow<'_> {
    let others = compound.names.iter().skip(1).chain(compound.abbreviations.iter().skip(1));
    let cautions = compound.cautions.iter().map(|c| format!("{} [{}]", c.text, c.source));
    CompoundRow {
        id: compound.id,
        generation: compound.generation,
        smiles: guarded(&compound.smiles),
        formula: guarded(&compound.formula),
        condensed: guarded(&compound.condensed),
        name: guarded(compound.names.first().map_or("", String::as_str)),
        abbreviation: guarded(compound.abbreviations.first().map_or("", String::as_str)),
        other_names: guarded(&others.map(String::as_str).collect::<Vec<_>>().join("; ")).into_owned(),
        cas: guarded(compound.cas.as_deref().unwrap_or_default()),
        is_parent: compound.is_parent,
        is_end_product: compound.is_end_product,
        transient: compound.transient,
        n_fluorine: compound.halogens.fluorine,
        n_chlorine: compound.halogens.chlorine,
        n_bromine: compound.halogens.bromine,
        n_iodine: compound.halogens.iodine,
        molar_mass_g_per_mol: compound.molar_mass_g_per_mol,
        monoisotopic_mass_u: compound.monoisotopic_mass_u,
        gibbs_aq_kj_per_mol: compound.gibbs_aq_kj_per_mol,
        gibbs_sd_kj_per_mol: compound.gibbs_sd_kj_per_mol,
        gibbs_origin: compound.gibbs_origin,
        gibbs_source: guarded(&compound.gibbs_source),
        cautions: guarded(&cautions.collect::<Vec<_>>().join("; ")).into_owned(),
    }
}

#[derive(Serialize, Default)]
struct StepRow<'a> {
    id: u32,
    from: u32,
    from_condensed: &'a str,
    to: u32,
    to_condensed: &'a str,
    rule: Cow<'a, str>,
    #[serde(serialize_with = "decimals::five")]
    degeneracy: f64,
    molecules: u32,
    electrons: i32,
    protons: i32,
    water: i32,
    released_fluoride: u32,
    released_chloride: u32,
    released_bromide: u32,
    released_iodide: u32,
    #[serde(serialize_with = "decimals::volt")]
    e_standard_volt: Option<f64>,
    #[serde(serialize_with = "decimals::volt")]
    e_volt: Option<f64>,
    #[serde(serialize_with = "decimals::volt")]
    e_sd_volt: Option<f64>,
    e_missing: Cow<'a, str>,
    #[serde(serialize_with = "decimals::kj_per_mol")]
    gibbs_step_kj_per_mol: Option<f64>,
    #[serde(serialize_with = "decimals::kj_per_mol")]
    gibbs_step_sd_kj_per_mol: Option<f64>,
    temperature_kelvin: f64,
    ph: f64,
    fluoride_mol_per_litre: f64,
    chloride_mol_per_litre: f64,
    bromide_mol_per_litre: f64,
    iodide_mol_per_litre: f64,
}

/// Holds the condensed formula of every compound while it writes.
fn write_steps<W: io::Write>(network: &dyn Records, writer: &mut ::csv::Writer<W>) -> io::Result<()> {
    let condensed: Vec<String> = network.compounds().map(|c| guarded(&c.condensed).into_owned()).collect();
    let name = |id: u32| condensed.get(id as usize - 1).map_or("", String::as_str);
    let conditions = network.header().conditions;
    let mut is_empty = true;
    for step in network.steps() {
        writer.serialize(step_row(&step, name(step.from), name(step.to), conditions))?;
        is_empty = false;
    }
    if is_empty { writer.write_record(step_headings()?.iter()) } else { Ok(()) }.map_err(io::Error::from)
}

/// The headings of a table without rows, which nothing else would write.
fn step_headings() -> io::Result<::csv::StringRecord> {
    let mut text = Vec::new();
    ::csv::Writer::from_writer(&mut text).serialize(StepRow::default())?;
    Ok(::csv::Reader::from_reader(text.as_slice()).headers()?.clone())
}

fn step_row<'a>(step: &'a Step, from_condensed: &'a str, to_condensed: &'a str, conditions: Conditions) -> StepRow<'a> {
    let ByHalogen { fluorine, chlorine, bromine, iodine } = step.released;
    let halide = conditions.halide_mol_per_litre;
    StepRow {
        id: step.id,
        from: step.from,
        from_condensed,
        to: step.to,
        to_condensed,
        rule: guarded(&step.rule),
        degeneracy: step.degeneracy,
        molecules: step.molecules,
        electrons: step.electrons,
        protons: step.protons,
        water: step.water,
        released_fluoride: fluorine,
        released_chloride: chlorine,
        released_bromide: bromine,
        released_iodide: iodine,
        e_standard_volt: step.e_standard_volt,
        e_volt: step.e_volt,
        e_sd_volt: step.e_sd_volt,
        e_missing: guarded(step.e_missing.as_deref().unwrap_or_default()),
        gibbs_step_kj_per_mol: step.gibbs_step_kj_per_mol,
        gibbs_step_sd_kj_per_mol: step.gibbs_step_sd_kj_per_mol,
        temperature_kelvin: conditions.temperature_kelvin,
        ph: conditions.ph,
        fluoride_mol_per_litre: halide.fluorine,
        chloride_mol_per_litre: halide.chlorine,
        bromide_mol_per_litre: halide.bromine,
        iodide_mol_per_litre: halide.iodine,
    }
}
