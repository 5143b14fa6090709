//! No floor imports from one above it: the sources are read and every `crate::room` is weighed.

use std::path::Path;

/// Rooms with their floors, as in `docs/architecture.md`.
const FLOORS: [(&str, u8); 9] = [
    ("molecule", 1),
    ("smiles", 2),
    ("rules", 2),
    ("frame", 3),
    ("catalogue", 3),
    ("network", 4),
    ("thermo", 4),
    ("output", 5),
    ("commands", 6),
];

fn floor(room: &str) -> Option<u8> {
    FLOORS.iter().find(|(name, _)| *name == room).map(|&(_, floor)| floor)
}

/// Rooms that a source names after `crate::`, tests and documentation included.
fn rooms_named(source: &str) -> Vec<&str> {
    let starts = source.match_indices("crate::").map(|(at, found)| &source[at + found.len()..]);
    starts.map(|rest| rest.split(|c: char| !c.is_alphanumeric() && c != '_').next().unwrap_or("")).collect()
}

fn check_folder(folder: &Path, own: u8, n_files: &mut usize) {
    for entry in std::fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.is_dir() {
            check_folder(&path, own, n_files);
        } else if path.extension().is_some_and(|e| e == "rs") {
            let source = std::fs::read_to_string(&path).unwrap();
            for named in rooms_named(&source) {
                if let Some(other) = floor(named) {
                    assert!(other <= own, "{} (floor {own}) names {named} (floor {other})", path.display());
                }
            }
            *n_files += 1;
        }
    }
}

#[test]
fn no_room_imports_from_a_floor_above() {
    let src = Path::new(env!("CARGO_MANIFEST_DIR")).join("src");
    let mut n_files = 0;
    for (room, own) in FLOORS {
        let folder = src.join(room);
        if folder.exists() {
            check_folder(&folder, own, &mut n_files);
        }
    }
    assert!(n_files > 20, "the sources were found");
}

#[test]
fn a_name_after_crate_is_found() {
    assert_eq!(rooms_named("use crate::output::json; let x = crate::molecule::Atom;"), ["output", "molecule"]);
}
