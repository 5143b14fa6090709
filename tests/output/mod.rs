//! What leaves the program: every writer, its whole output read before it was accepted.
//!
//! Files that are kept (`docs/*.schema.json`, `tests/figures/*.dot`) are held against what the
//! program makes; `HALOSHED_KEEP=1 cargo test output` writes them anew.

mod sample;

mod figures;
mod file;
mod schema;
mod writers;

use std::path::Path;

use haloshed::output::file::Target;
use haloshed::output::{Records, Writer};

/// What a writer makes of a network.
fn written(writer: &dyn Writer, network: &dyn Records) -> String {
    let mut bytes = Vec::new();
    writer.write(network, &mut bytes).unwrap();
    String::from_utf8(bytes).unwrap()
}

/// Holds a text against a kept file, or keeps it.
fn check_kept(file: &str, text: &str) {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join(file);
    if std::env::var_os("HALOSHED_KEEP").is_some() {
        let mut target = Target::open(&path).unwrap();
        std::io::Write::write_all(&mut target, text.as_bytes()).unwrap();
        target.finish().unwrap();
    }
    let kept = std::fs::read_to_string(&path).unwrap_or_default();
    assert!(kept == text, "{file} is out of step: look at it, then run HALOSHED_KEEP=1 cargo test output");
}
