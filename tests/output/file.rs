//! The file that appears whole or not at all.

use std::io::Write;

use haloshed::output::file::Target;

#[test]
fn a_file_appears_when_it_is_finished() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("a.json");
    let mut target = Target::open(&path).unwrap();
    target.write_all(b"new").unwrap();
    assert!(!path.exists());
    target.finish().unwrap();
    assert_eq!(std::fs::read_to_string(&path).unwrap(), "new");
}

#[test]
fn what_stood_there_stays_when_the_work_fails() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("a.json");
    let put = |text: &str| {
        let mut target = Target::open(&path).unwrap();
        target.write_all(text.as_bytes()).unwrap();
        target
    };
    put("old").finish().unwrap();
    drop(put("half"));
    assert_eq!(std::fs::read_to_string(&path).unwrap(), "old");
    assert_eq!(std::fs::read_dir(folder.path()).unwrap().count(), 1, "nothing is left beside it");
}

#[test]
fn a_folder_or_a_missing_folder_is_refused_at_once() {
    let folder = tempfile::tempdir().unwrap();
    let message = |path: std::path::PathBuf| {
        let text = Target::open(&path).unwrap_err().to_string();
        text.replace(&folder.path().display().to_string(), "FOLDER")
    };
    assert_eq!(message(folder.path().to_owned()), "cannot open FOLDER: is a directory");
    let missing = message(folder.path().join("none/a.json"));
    assert!(missing.starts_with("cannot open FOLDER/none/a.json: no such file or directory"), "{missing}");
}

#[cfg(unix)]
#[test]
fn a_device_is_written_to_and_a_link_is_followed() {
    let device = Target::open("/dev/null".as_ref()).unwrap();
    device.finish().unwrap();
    assert!(!std::fs::metadata("/dev/null").unwrap().is_file(), "the device is still one");

    let folder = tempfile::tempdir().unwrap();
    let (real, link) = (folder.path().join("real"), folder.path().join("link"));
    Target::open(&real).unwrap().finish().unwrap();
    std::os::unix::fs::symlink(&real, &link).unwrap();
    let mut target = Target::open(&link).unwrap();
    target.write_all(b"through").unwrap();
    target.finish().unwrap();
    assert!(std::fs::symlink_metadata(&link).unwrap().is_symlink());
    assert_eq!(std::fs::read_to_string(&real).unwrap(), "through");
}
