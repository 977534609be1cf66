//! Faults of a file as such: missing, too large, not text; and that nothing makes the reader panic.

use std::fs;

use proptest::prelude::*;
use stagebits::chain_file::{LARGEST_FILE, parse, read};
use stagebits::diagnostic::Diagnostic;

fn fault_of(bytes: &[u8]) -> Diagnostic {
    let folder = tempfile::tempdir().expect("a folder for the test");
    let path = folder.path().join("chain.toml");
    fs::write(&path, bytes).expect("a file for the test");
    read(&path).expect_err("a bad file")
}

#[test]
fn missing_file_is_named_without_a_line() {
    let folder = tempfile::tempdir().expect("a folder for the test");
    for path in [folder.path().join("nowhere.toml"), folder.path().to_owned()] {
        let fault = read(&path).expect_err("not a file");
        assert_eq!(fault.file, path.display().to_string());
        assert_eq!(fault.spot, None);
        assert!(
            fault.message.starts_with("cannot read the chain file: "),
            "{fault}"
        );
    }
}

#[test]
fn first_byte_outside_utf_8_is_located() {
    // 0xb5 is the micro sign of ISO 8859-1; the "µ" before it is right and one column wide.
    let fault = fault_of(b"title = \"\xc2\xb5\"\r\n# 4.7 \xb5H\r\n");
    let spot = fault.spot.expect("a place");
    assert_eq!((spot.line, spot.column, spot.width), (2, 7, 1));
    assert_eq!(spot.text, "# 4.7 \u{fffd}H");
    assert_eq!(fault.message, "byte 0xb5 is not part of UTF-8 text");
    assert_eq!(fault.help, "save the file in UTF-8");
}

#[test]
fn a_text_that_ends_inside_a_character_is_located() {
    let spot = fault_of(b"# \xe2\x82").spot.expect("a place");
    assert_eq!((spot.line, spot.column), (1, 3));
}

#[test]
fn size_is_limited() {
    let largest = usize::try_from(LARGEST_FILE).expect("a size");
    let fault = fault_of(&vec![b'\n'; largest + 1]);
    assert_eq!(fault.spot, None);
    assert!(
        fault.message.contains("larger than 1048576 bytes"),
        "{fault}"
    );
    let fault = fault_of(&vec![b'\n'; largest]);
    assert!(fault.message.contains("no `title`"), "{fault}");
}

#[test]
fn a_byte_order_mark_takes_no_column() {
    let spot = fault_of(b"\xef\xbb\xbftitel = 1").spot.expect("a place");
    assert_eq!(
        (spot.line, spot.column, spot.text.as_str()),
        (1, 1, "titel = 1")
    );
}

const BUOY: &str = include_str!("../../examples/tide-gauge-buoy.toml");

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..Default::default() })]

    #[test]
    fn a_damaged_file_is_read_or_refused_with_a_place_in_it(
        at in 0..BUOY.len(), length in 0..12usize, new in "[ -~µΩ\\n\\r\\t]{0,6}",
    ) {
        let cut = |offset: usize| (0..=offset.min(BUOY.len()))
            .rev()
            .find(|&offset| BUOY.is_char_boundary(offset))
            .unwrap_or(0);
        let text = format!("{}{new}{}", &BUOY[..cut(at)], &BUOY[cut(at + length)..]);
        if let Err(fault) = parse(&text, "buoy.toml") {
            let spot = fault.spot.as_ref().expect("a fault of the text has a place");
            let line = text.split('\n').nth(spot.line as usize - 1).expect("a line of the file");
            prop_assert!(line.strip_suffix('\r') == Some(&spot.text) || line == spot.text);
            prop_assert!(spot.column as usize <= spot.text.chars().count() + 1);
            prop_assert!(!fault.message.is_empty() && !fault.help.is_empty());
        }
    }

    #[test]
    fn any_text_is_refused_without_panic(text in "\\PC{0,80}") {
        prop_assert!(parse(&text, "x.toml").is_err());
    }
}
