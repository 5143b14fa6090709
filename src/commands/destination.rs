//! Where a result goes: stdout, or a file that appears when it is whole.

use std::io::{self, BufWriter, Write};
use std::path::Path;

use haloshed::output::file::Target;

use super::failure::Failure;
use super::report::Report;

/// Where a result goes.
pub(crate) enum Destination {
    Stdout,
    File(Target),
}

impl Destination {
    /// Opens the file, or takes stdout if there is none or its name is `-`.
    pub(crate) fn open(file: Option<&Path>) -> Result<Destination, Failure> {
        match file {
            Some(path) if path.as_os_str() != "-" => {
                Target::open(path).map(Destination::File).map_err(|error| Report::plain(error.to_string()).into())
            }
            _ => Ok(Destination::Stdout),
        }
    }

    /// Writes all of a result and puts it in place. A closed pipe ends quietly.
    pub(crate) fn write(self, fill: impl FnOnce(&mut dyn Write) -> io::Result<()>) -> Result<(), Failure> {
        let failed = |message: String| Failure::from(Report::plain(message));
        match self {
            Destination::Stdout => {
                let mut out = BufWriter::new(io::stdout().lock());
                match fill(&mut out).and_then(|()| out.flush()) {
                    Err(error) if error.kind() == io::ErrorKind::BrokenPipe => {
                        // What is left in the buffer has nowhere to go.
                        let _ = out.into_parts();
                        Ok(())
                    }
                    done => done.map_err(|error| failed(format!("cannot write the result: {error}"))),
                }
            }
            Destination::File(mut target) => {
                fill(&mut target).map_err(|error| failed(format!("cannot write the result: {error}")))?;
                target.finish().map_err(|error| failed(error.to_string()))
            }
        }
    }
}
