//! Finds everything that a halogenated compound can turn into under reducing conditions, with
//! the two-electron reduction potential of every step and how sure it is.
//!
//! Five verbs: read a compound ([`catalogue`], [`smiles`]), choose rules ([`rules`]), enumerate
//! ([`network`]), ask for potentials ([`thermo`]), write ([`output`]).
//!
//! Estimated potentials screen: they say what to look for and where to measure. They do not
//! replace testing, local codes or licensed practice.
//!
//! # Example
//! ```
//! use haloshed::molecule::Identity;
//! use haloshed::network::{Limits, enumerate};
//! use haloshed::output::assemble::Assembled;
//! use haloshed::output::header::{Extent, header};
//! use haloshed::output::json::Json;
//! use haloshed::output::known::Catalogue;
//! use haloshed::output::valued::Valued;
//! use haloshed::output::Writer;
//! use haloshed::rules::{RuleSet, Selection};
//! use haloshed::thermo::{Conditions, energies, potential, shipped};
//! use haloshed::{catalogue, smiles};
//!
//! // Read and choose.
//! let parent = catalogue::resolve("PCE")?.molecule;
//! let rules = RuleSet::shipped().select(&Selection::default())?;
//!
//! // Enumerate and query.
//! let network = enumerate(&[parent], &rules, Identity::Geometric, Limits::default(), 1)?;
//! let tce = network.find(&smiles::read("ClC=C(Cl)Cl")?).ok_or("trichloroethene is reached")?;
//! assert_eq!(network.generation_of(tce), 1);
//!
//! // Potentials, at pH 6.5 and 10 mmol/L of each halide.
//! let conditions = Conditions::new(6.5, [0.01; 4])?;
//! let energies = energies(&network, shipped(), 1);
//! let reaction = network.half_reaction(0, tce, 1);
//! let found = potential(&network, &energies, shipped(), &conditions, (0, tce), &reaction)?;
//! let volts = found.volts.ok_or("two electrons are transferred")?;
//! assert!((volts.at_conditions - 0.59).abs() < 0.03 && volts.sd < 0.05);
//!
//! // Write.
//! let valued = Valued { network: &network, energies: &energies, scheme: shipped(), conditions };
//! let records = Assembled {
//!     header: header(&network, &rules, &conditions, Extent::Whole),
//!     network: &network,
//!     rules: &rules,
//!     registry: &Catalogue,
//!     energies: &valued,
//! };
//! let mut text = Vec::new();
//! Json.write(&records, &mut text)?;
//! assert!(String::from_utf8(text)?.contains("\"format\":"));
//! # Ok::<(), Box<dyn std::error::Error>>(())
//! ```

pub mod catalogue;
pub mod frame;
pub mod molecule;
pub mod network;
pub mod output;
pub mod rules;
pub mod smiles;
pub mod thermo;
