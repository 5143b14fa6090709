//! A file that appears whole or not at all.
//!
//! It is opened before the work starts, so that a path that cannot be written is known at once;
//! written beside its name; and renamed when it is done. A path that is no ordinary file (a
//! device, a pipe) is written to as it is.

use std::fs::{self, File, OpenOptions};
use std::io::{self, BufWriter, Write};
use std::path::{Path, PathBuf};

use tempfile::NamedTempFile;

/// A file being written.
#[derive(Debug)]
pub struct Target {
    path: PathBuf,
    place: Place,
}

#[derive(Debug)]
enum Place {
    Beside(BufWriter<NamedTempFile>),
    Direct(BufWriter<File>),
}

/// A file that could not be written.
#[derive(Debug, thiserror::Error)]
#[error("cannot {verb} {}: {}", path.display(), reason(error))]
pub struct TargetError {
    /// What failed: open, write or rename.
    verb: &'static str,
    /// The file.
    path: PathBuf,
    #[source]
    error: io::Error,
}

/// The system's sentence without its number.
fn reason(error: &io::Error) -> String {
    let text = error.to_string();
    let end = text.find(" (os error").unwrap_or(text.len());
    text[..end].to_lowercase()
}

impl Target {
    /// Opens a target at this path. What stands there stays until [`finish`](Target::finish).
    ///
    /// # Errors
    /// * the path is a folder, or its folder is not there or cannot be written to
    pub fn open(path: &Path) -> Result<Target, TargetError> {
        let failed = |error| TargetError { verb: "open", path: path.to_owned(), error };
        // A link is followed, so that the file it points to is replaced and not the link.
        let real = fs::canonicalize(path).unwrap_or_else(|_| path.to_owned());
        let place = match fs::metadata(&real) {
            Ok(there) if there.is_dir() => return Err(failed(io::Error::from(io::ErrorKind::IsADirectory))),
            Ok(there) if !there.is_file() => {
                Place::Direct(BufWriter::new(OpenOptions::new().write(true).open(&real).map_err(failed)?))
            }
            Ok(there) => beside(&real, Some(there.permissions())).map_err(failed)?,
            Err(_) => beside(&real, None).map_err(failed)?,
        };
        Ok(Target { path: real, place })
    }

    /// Puts what was written in place.
    ///
    /// # Errors
    /// * the last bytes cannot be written, or the file cannot be renamed
    pub fn finish(self) -> Result<(), TargetError> {
        let path = self.path;
        let failed = |verb, error| TargetError { verb, path: path.clone(), error };
        match self.place {
            Place::Direct(mut file) => file.flush().map_err(|e| failed("write", e)),
            Place::Beside(file) => {
                let file = file.into_inner().map_err(|e| failed("write", e.into_error()))?;
                file.persist(&path).map(drop).map_err(|e| failed("rename", e.error))
            }
        }
    }
}

fn beside(path: &Path, permissions: Option<fs::Permissions>) -> io::Result<Place> {
    let folder = path.parent().filter(|folder| !folder.as_os_str().is_empty()).unwrap_or(Path::new("."));
    let mut builder = tempfile::Builder::new();
    builder.prefix(".haloshed-").suffix(".part");
    #[cfg(unix)]
    let permissions = permissions.or_else(|| {
        use std::os::unix::fs::PermissionsExt;
        // The system takes off what the user's mask says.
        Some(fs::Permissions::from_mode(0o666))
    });
    if let Some(permissions) = permissions {
        builder.permissions(permissions);
    }
    Ok(Place::Beside(BufWriter::new(builder.tempfile_in(folder)?)))
}

impl Write for Target {
    fn write(&mut self, bytes: &[u8]) -> io::Result<usize> {
        match &mut self.place {
            Place::Beside(file) => file.write(bytes),
            Place::Direct(file) => file.write(bytes),
        }
    }

    fn flush(&mut self) -> io::Result<()> {
        match &mut self.place {
            Place::Beside(file) => file.flush(),
            Place::Direct(file) => file.flush(),
        }
    }
}
