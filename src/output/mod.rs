//! Everything that leaves the program.
//!
//! What leaves is [`record`]s: plain structs, the same in every format, from which the JSON
//! schema is derived. A network is handed over as [`Records`], which makes a record when it is
//! asked for one ([`assemble`]), so that a large network is never in memory twice. A [`Writer`] turns records
//! into one format; [`json`], [`jsonl`] and [`csv`] stream, [`table`], [`summary`] and [`dot`]
//! are for reading. [`steps`] writes half-reactions, [`explain`] the parts of one Gibbs energy;
//! [`valued`] is where the values of both come from, [`known`] the names, [`header`] the
//! warnings.
//! [`file`](mod@file) is where they are written to. Numbers are rounded in [`decimals`] and nowhere else.
//!
//! Nothing here prints, and nothing here calculates chemistry.

pub mod assemble;
pub mod counts;
pub mod csv;
pub mod decimals;
pub mod dot;
pub mod explain;
pub mod file;
pub mod format;
pub mod header;
pub mod json;
pub mod jsonl;
pub mod known;
mod layout;
pub mod record;
pub mod rule_list;
pub mod steps;
pub mod summary;
pub mod table;
pub mod valued;

use std::borrow::Cow;
use std::io;

use counts::Counts;
use record::{Compound, Header, Network, Step};

/// A network as records, made one by one.
///
/// Both series are in order of id, and the ids run from 1 without gaps.
pub trait Records {
    /// What holds for the whole network.
    fn header(&self) -> &Header;

    /// The compounds, in order of id.
    fn compounds(&self) -> Box<dyn Iterator<Item = Cow<'_, Compound>> + '_>;

    /// The steps, in order of id.
    fn steps(&self) -> Box<dyn Iterator<Item = Cow<'_, Step>> + '_>;

    /// Numbers of the network; made without records where that is faster.
    fn counts(&self) -> Counts {
        Counts::of(self.header(), self.compounds(), self.steps())
    }
}

impl Records for Network {
    fn header(&self) -> &Header {
        &self.header
    }

    fn compounds(&self) -> Box<dyn Iterator<Item = Cow<'_, Compound>> + '_> {
        Box::new(self.compounds.iter().map(Cow::Borrowed))
    }

    fn steps(&self) -> Box<dyn Iterator<Item = Cow<'_, Step>> + '_> {
        Box::new(self.steps.iter().map(Cow::Borrowed))
    }
}

/// Writes a network in one format.
pub trait Writer {
    /// Writes all of it.
    ///
    /// # Errors
    /// * whatever `out` reports; a record itself can always be written
    fn write(&self, network: &dyn Records, out: &mut dyn io::Write) -> io::Result<()>;
}
