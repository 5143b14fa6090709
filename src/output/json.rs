//! One JSON object, each record on a line of its own.
//!
//! The object is written as it is made: records are asked for one by one. Outer levels are
//! broken over lines and indented, records are not, so that the file reads well and two
//! networks can be compared line by line.

use std::io;

use serde::{Serialize, Serializer};
use serde_json::ser::{Formatter, PrettyFormatter};

use super::record::Header;
use super::{Records, Writer};

/// Writes [`record::Network`](super::record::Network) as JSON.
///
/// # Example
/// ```
/// use haloshed::output::record::Network;
/// use haloshed::output::{Writer, json::Json};
///
/// let text = r#"{
///   "format": "haloshed-network/1", "program": {"name": "haloshed", "version": "0"}, "parents": [],
///   "identity": "geometric", "rules": [], "complete": true, "warnings": [], "compounds": [], "steps": [],
///   "conditions": {"temperature_kelvin": 298.15, "ph": 7.0,
///     "halide_mol_per_litre": {"F": 0.001, "Cl": 0.001, "Br": 0.001, "I": 0.001}}
/// }"#;
/// let network: Network = serde_json::from_str(text)?;
/// let mut written = Vec::new();
/// Json.write(&network, &mut written)?;
/// assert_eq!(serde_json::from_slice::<Network>(&written)?, network);
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
#[derive(Debug, Clone, Copy)]
pub struct Json;

/// Levels of brackets that are broken over lines: the object, and its lists of records.
const N_BROKEN_LEVELS: usize = 2;

#[derive(Serialize)]
struct Document<'a, C: Serialize, S: Serialize> {
    #[serde(flatten)]
    header: &'a Header,
    compounds: C,
    steps: S,
}

/// Serialises what an iterator gives, without collecting it.
struct Series<F>(F);

impl<F, I, T> Serialize for Series<F>
where
    F: Fn() -> I,
    I: Iterator<Item = T>,
    T: Serialize,
{
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.collect_seq((self.0)())
    }
}

impl Writer for Json {
    fn write(&self, network: &dyn Records, out: &mut dyn io::Write) -> io::Result<()> {
        let document = Document {
            header: network.header(),
            compounds: Series(|| network.compounds()),
            steps: Series(|| network.steps()),
        };
        let mut serializer = serde_json::Serializer::with_formatter(&mut *out, LineFormatter::default());
        document.serialize(&mut serializer).map_err(io::Error::from)?;
        out.write_all(b"\n")
    }
}

/// Breaks the outer levels over lines and leaves the inner ones on one.
#[derive(Default)]
struct LineFormatter {
    pretty: PrettyFormatter<'static>,
    depth: usize,
}

impl LineFormatter {
    fn is_broken(&self) -> bool {
        self.depth <= N_BROKEN_LEVELS
    }
}

/// Passes a call to the pretty formatter on broken levels, and does the plain thing on others.
macro_rules! by_level {
    ($($name:ident($($argument:ident: $kind:ty),*) $plain:expr;)*) => {
        $(fn $name<W: ?Sized + io::Write>(&mut self, out: &mut W, $($argument: $kind),*) -> io::Result<()> {
            if self.is_broken() {
                return self.pretty.$name(out, $($argument),*);
            }
            let plain: fn(&mut W, $($kind),*) -> io::Result<()> = $plain;
            plain(out, $($argument),*)
        })*
    };
}

impl Formatter for LineFormatter {
    by_level! {
        begin_array_value(first: bool) |out, first| if first { Ok(()) } else { out.write_all(b", ") };
        begin_object_key(first: bool) |out, first| if first { Ok(()) } else { out.write_all(b", ") };
        begin_object_value() |out| out.write_all(b": ");
        end_array_value() |_| Ok(());
        end_object_value() |_| Ok(());
    }

    fn begin_array<W: ?Sized + io::Write>(&mut self, out: &mut W) -> io::Result<()> {
        self.depth += 1;
        if self.is_broken() { self.pretty.begin_array(out) } else { out.write_all(b"[") }
    }

    fn end_array<W: ?Sized + io::Write>(&mut self, out: &mut W) -> io::Result<()> {
        let is_broken = self.is_broken();
        self.depth -= 1;
        if is_broken { self.pretty.end_array(out) } else { out.write_all(b"]") }
    }

    fn begin_object<W: ?Sized + io::Write>(&mut self, out: &mut W) -> io::Result<()> {
        self.depth += 1;
        if self.is_broken() { self.pretty.begin_object(out) } else { out.write_all(b"{") }
    }

    fn end_object<W: ?Sized + io::Write>(&mut self, out: &mut W) -> io::Result<()> {
        let is_broken = self.is_broken();
        self.depth -= 1;
        if is_broken { self.pretty.end_object(out) } else { out.write_all(b"}") }
    }
}
