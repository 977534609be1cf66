//! Faults of the keywords of version 2.0.

use super::refused;

const START: &str = "[Version] 2.0\n# MHz RI\n";
const ONE: &str = "[Number of Ports] 1\n[Number of Frequencies] 2\n";

fn bad(marked: &str, message: &str, help: &str) {
    refused("test.ts", marked, message, help);
}

/// Expects a fault before the network data of a one-port.
fn bad_header(marked: &str, message: &str, help: &str) {
    bad(&format!("{START}{marked}"), message, help);
}

/// Expects a fault in or behind the network data of a one-port of two frequencies.
fn bad_data(marked: &str, message: &str, help: &str) {
    bad(
        &format!("{START}{ONE}[Network Data]\n{marked}"),
        message,
        help,
    );
}

#[test]
fn version() {
    let first = "[Version] 2.0 on the first line";
    bad(
        "«[Number of Ports]» 1\n",
        "[Number of Ports] before [Version]",
        first,
    );
    bad(
        "[Version] «1.0»\n",
        "version \"1.0\" is not known",
        "version 1.x has no keywords",
    );
    bad(
        "«[Version]»\n",
        "[Version] without a value",
        "[Version] 2.0",
    );
    bad(
        "[Version] 2.0 «beta»\n",
        "a second value of [Version]",
        "[Version] 2.0",
    );
    bad_header("«[version]» 2.0\n", "[Version] a second time", "keep one");
    let message = "a keyword in a file that does not begin with [Version]";
    refused("test.s1p", "# MHz\n«[Version] 2.0»\n", message, first);
    refused(
        "test.s1p",
        "# MHz\n1 0 0\n«[End]»\n",
        message,
        "leave all keywords out",
    );
}

#[test]
fn keywords() {
    bad_header(
        "«[Number of Port]» 1\n",
        "unknown keyword \"Number of Port\"",
        "[Number of Ports], ",
    );
    bad_header(
        "«[]»",
        "unknown keyword \"\"",
        "version 2.0 knows [Version]",
    );
    bad_header("«[[End]»", "unknown keyword \"[End\"", "version 2.0 knows");
    bad_header(
        " «[Network Data»\n",
        "without its closing bracket",
        "[Network Data]",
    );
    bad_header(
        "[Reference] 50\n«[Reference]» 50\n",
        "[Reference] a second time",
        "keep one",
    );
    bad_header(
        "«[Mixed-Mode Order]» D2,3\n",
        "mixed-mode data are not read",
        "common reference",
    );
    bad_header("«[End]»\n", "[End] before [Network Data]", "the data first");
    bad_header(
        "«[Noise Data]»\n",
        "[Noise Data] before [Network Data]",
        "the data first",
    );
    bad_header(
        "«[End Information]»\n",
        "without [Begin Information]",
        "leave it out",
    );
    bad_header(
        "«[Begin Information]»\nfree\n[End]\n",
        "without [End Information]",
        "behind the block",
    );
    bad_header(
        "[Begin Information] «free»\n",
        "[Begin Information] takes no value",
        "line of its own",
    );
}

#[test]
fn values() {
    let ports = "a whole number from 1 to 2";
    for value in ["3", "0", "-1", "1.5", "two", "99999999999999999999"] {
        let marked = format!("[Number of Ports] «{value}»");
        bad_header(
            &marked,
            &format!("\"{value}\" is not a whole number in range"),
            ports,
        );
    }
    bad_header(
        "«[Number of Ports]» ! 1",
        "[Number of Ports] without a value",
        "[Number of Ports] 1",
    );
    bad_header(
        "[Number of Frequencies] «0»",
        "\"0\" is not a whole",
        "from 1 to 100000000",
    );
    bad_header(
        "[Two-Port Data Order] «12-21»",
        "is \"12-21\"",
        "write 12_21 or 21_12",
    );
    bad_header(
        "[Matrix Format] «Diagonal»",
        "is \"Diagonal\"",
        "Full or Lower or Upper",
    );
}

#[test]
fn references() {
    let rest = "[Number of Ports] 1\n[Number of Frequencies] 1\n[Network Data]\n1 0 0\n[End]";
    let bad_reference = |marked: &str, message: &str, help: &str| {
        bad_header(&format!("{marked}\n{rest}"), message, help);
    };
    bad_reference(
        "[Reference] «0»",
        "a reference resistance of 0 ohm",
        "from 1e-6",
    );
    bad_reference(
        "[Reference] «(50,1)»",
        "\"(50,1)\" is not a number",
        "finite",
    );
    bad_reference(
        "«[Reference]»\n50\n75",
        "[Reference] has 2 values for 1 ports",
        "for each port",
    );
    bad_reference("«[Reference]»", "[Reference] has 0 values", "for each port");
    bad_reference("«50»\n", "data before [Network Data]", "on the line above");
}

#[test]
fn missing_keywords() {
    bad_header(
        "[Number of Ports] 1\n«»",
        "the file ends without [Network Data]",
        "write [Network",
    );
    bad_header(
        "«[Network Data]»\n1 0 0\n",
        "no [Number of Ports]",
        "write [Number of Ports] 1",
    );
    bad_header(
        "[Number of Ports] 1\n«[Network Data]»\n1 0 0\n",
        "no [Number of Frequencies]",
        "write [Number of Frequencies] 201",
    );
    bad_header(
        "[Number of Ports] 2\n[Number of Frequencies] 1\n«[Network Data]»\n",
        "no [Two-Port Data Order]",
        "write [Two-Port Data Order] 21_12",
    );
    bad(
        &format!("[Version] 2.0\n{ONE}«[Network Data]»\n"),
        "no option line before [Network Data]",
        "# MHz S MA R 50",
    );
}

#[test]
fn data() {
    bad_data(
        "1 0 0\n2 0 0\n«»",
        "the file ends without [End]",
        "cut short",
    );
    bad_data("1 0 0\n«»", "the file ends without [End]", "cut short");
    bad_data("1 0 0\n«2 0»", "2 numbers on the line; 3 are wanted", "S11");
    bad_data(
        "1 0 0\n«[End]»",
        "[Number of Frequencies] is 2, but there are 1",
        "lost data",
    );
    bad_data(
        "«[End]»",
        "[Number of Frequencies] is 2, but there are 0",
        "lost data",
    );
    bad_data(
        "1 0 0\n2 0 0\n«3 0 0»\n[End]",
        "[Number of Frequencies] is 2, and this is one more",
        "correct",
    );
    bad_data("2 0 0\n«1» 0 0\n[End]", "1 MHz after 2 MHz", "ascending");
    bad_data(
        "1 0 0\n2 0 0\n[End]\n! fine\n«3 0 0»",
        "text behind [End]",
        "leave out",
    );
    bad_data(
        "1 0 0\n2 0 0\n[End] «now»",
        "[End] takes no value",
        "line of its own",
    );
    bad_data(
        "1 0 0\n2 0 0\n«[Noise Data]»",
        "[Noise Data] behind [Network Data]",
        "of a two-port",
    );
    bad_data(
        "1 0 0\n«[Reference]» 50",
        "[Reference] behind [Network Data]",
        "[End]",
    );
    bad_header(
        &format!("{ONE}[Network Data] «1» 0 0"),
        "[Network Data] takes no value",
        "own",
    );
}

#[test]
fn data_of_two_ports() {
    let start = "[Number of Ports] 2\n[Number of Frequencies] 1\n";
    let data = "[Network Data]\n";
    bad_header(
        &format!("{start}[Matrix Format] Lower\n{data}«1 0 0 0 0 0 0 0 0»\n"),
        "9 numbers on the line; 7 are wanted",
        "S11 S21 S22 on one line",
    );
    let order = "[Two-Port Data Order] 12_21\n";
    let point = "1 0 0 0 0 0 0 0 0\n";
    bad_header(
        &format!("{start}{order}{data}{point}[Noise Data]\n«1 2 3»\n[End]"),
        "3 numbers on a line of noise data; 5 are wanted",
        "noise resistance",
    );
    bad_header(
        &format!("{start}{order}{data}{point}[Noise Data]\n«[Noise Data]»"),
        "[Noise Data] behind [Network Data]",
        "[End]",
    );
    bad_header(
        &format!("{start}{order}{data}«[Noise Data]»\n"),
        "[Number of Frequencies] is 1, but there are 0",
        "lost data",
    );
    bad(
        &format!("[Version] 2.0\n# «Y» RI\n{start}{order}{data}{point}[End]"),
        "of two-ports S-parameters only",
        "convert",
    );
}
