//! Faults of a file as such, and what a file on disk may hold.

use std::fs::{self, File};

use num_complex::Complex;
use stagebits::diagnostic::Diagnostic;
use stagebits::touchstone::{LARGEST_FILE, Network, read};

use super::{gammas, says};

fn read_bytes(bytes: &[u8]) -> Result<Network, Diagnostic> {
    let folder = tempfile::tempdir().expect("a folder for the test");
    let path = folder.path().join("test.s1p");
    fs::write(&path, bytes).expect("a file for the test");
    read(&path)
}

#[test]
fn missing_file_is_named_without_a_line() {
    let folder = tempfile::tempdir().expect("a folder for the test");
    for path in [folder.path().join("nowhere.s1p"), folder.path().to_owned()] {
        let fault = read(&path).expect_err("not a file");
        assert_eq!(
            (&fault.file, &fault.spot),
            (&path.display().to_string(), &None)
        );
        says(
            &fault,
            "cannot read the Touchstone file: ",
            "a readable Touchstone file",
        );
    }
}

#[test]
fn size_is_limited() {
    let folder = tempfile::tempdir().expect("a folder for the test");
    let path = folder.path().join("test.s1p");
    // A file of zeros that takes no room on the disk.
    let file = File::create(&path).expect("a file for the test");
    file.set_len(LARGEST_FILE + 1).expect("a large file");
    let fault = read(&path).expect_err("too large");
    assert_eq!(fault.spot, None);
    says(
        &fault,
        "larger than 67108864 bytes",
        "a readable Touchstone file",
    );
}

#[test]
fn comments_and_information_may_hold_any_bytes() {
    // ISO 8859-1, and bytes that are text in no encoding.
    let network = read_bytes(b"! 4.7 \xb5H \xff\xfe\x00\n# MHz RI ! \xa9\n1 0.5 0 ! \x80\x81\r\n");
    let one_port = network.and_then(|network| network.one_port("x"));
    let one_port = one_port.unwrap_or_else(|fault| panic!("{fault}"));
    assert_eq!(gammas(&one_port), [(1e6, Complex::new(0.5, 0.0))]);
    let version_2 = b"[Version] 2.0\n# MHz RI\n[Number of Ports] 1\n[Number of Frequencies] 1\n\
        [Begin Information]\n\xb5\xff [\xb5]\n[End Information]\n[Network Data]\n1 0.5 0\n[End]\n";
    let network = read_bytes(version_2).unwrap_or_else(|fault| panic!("{fault}"));
    assert_eq!(network, Network::OnePort(one_port));
}

#[test]
fn other_bytes_outside_of_comments_are_located() {
    let fault = read_bytes(b"! \xb5\n# MHz RI\n1 0.5 \xb5").expect_err("no number");
    says(&fault, "is not an ASCII character", "plain ASCII text");
    let spot = fault.spot.expect("a place");
    assert_eq!((spot.line, spot.column, spot.width), (3, 7, 1));

    // UTF-16, as some editors save text.
    let fault = read_bytes(b"\xff\xfe#\0 \0M\0H\0z\0\n\0").expect_err("UTF-16");
    says(&fault, "is not an ASCII character", "plain ASCII text");
    assert_eq!(
        fault.spot.map(|spot| (spot.line, spot.column)),
        Some((1, 1))
    );
}
