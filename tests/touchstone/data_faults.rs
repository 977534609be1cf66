//! Faults of the option line and of the data.

use stagebits::touchstone::parse;

use super::{refused, says};

fn bad_one_port(marked: &str, message: &str, help: &str) {
    refused("test.s1p", marked, message, help);
}

fn bad_two_port(marked: &str, message: &str, help: &str) {
    refused("test.S2P", marked, message, help);
}

#[test]
fn nothing_to_read() {
    bad_one_port("«»", "the file is empty", "an option line");
    bad_one_port(" \n! only this\n«»", "the file is empty", "an option line");
    bad_one_port("# MHz\n«»", "without network data", "below the option line");
    bad_one_port(
        "# MHz ! 1 0 0\n\n«»",
        "without network data",
        "for each frequency",
    );
    bad_one_port(
        "\n«1 0.5 0» ! no options\n",
        "data before the option line",
        "# MHz S MA R 50",
    );
}

#[test]
fn option_line() {
    let example = "write for example `# MHz S MA R 50`";
    bad_one_port("# «THz»\n1 0 0", "unknown option \"THz\"", example);
    bad_one_port(
        "# MHz S MA R 50 «75»\n1 0 0",
        "unknown option \"75\"",
        example,
    );
    bad_one_port(
        "# MHz S MA «R50»\n1 0 0",
        "unknown option \"R50\"",
        "write R 50, with a blank",
    );
    bad_one_port("#«R-»", "unknown option \"R-\"", example);
    bad_one_port(
        "# MHz S MA «R»\n1 0 0",
        "R without a resistance",
        "write R 50",
    );
    bad_one_port("# MHz S «kHz»\n", "a second unit", example);
    bad_one_port("# S MHz «Z»\n", "a second parameter", example);
    bad_one_port("# RI MHz «MA»\n", "a second format", example);
    bad_one_port("# R 50 MHz «R» 75\n", "a second resistance", example);
    let limits = "a real resistance from 1e-6 to 1e9 ohm";
    bad_one_port("# R «0»\n", "a reference resistance of 0 ohm", limits);
    bad_one_port("# R «-50»\n", "a reference resistance of -50 ohm", limits);
    bad_one_port(
        "# R «2e9»\n",
        "a reference resistance of 2000000000 ohm",
        limits,
    );
    bad_one_port(
        "# R «inf»\n",
        "\"inf\" is not a number",
        "a finite decimal number",
    );
    bad_one_port(
        "# MHz R «50+j5»\n",
        "\"50+j5\" is not a number",
        "a finite decimal number",
    );
}

#[test]
fn parameters_without_a_way_to_s() {
    bad_two_port(
        "# MHz «z» RI\n1 0 0 0 0 0 0 0 0",
        "of two-ports S-parameters only",
        "convert",
    );
    bad_two_port(
        "# MHz «H» RI\n1 0 0 0 0 0 0 0 0",
        "of two-ports S-parameters only",
        "convert",
    );
    bad_one_port(
        "# MHz «G» RI\n1 0 0",
        "a one-port has no H- or G-parameters",
        "S, Y or Z",
    );
    bad_one_port(
        "# Z RI R 75\n1 «-1» 0",
        "no finite reflection",
        "another value",
    );
    bad_one_port(
        "# Y RI R 75\n1 «-1» 0",
        "no finite reflection",
        "another value",
    );
}

#[test]
fn numbers() {
    let finite = "write a finite decimal number";
    bad_one_port("# MHz\n1 «nan» 0", "\"nan\" is not a number", finite);
    bad_one_port("# MHz\n1 0 «-Inf»", "\"-Inf\" is not a number", finite);
    bad_one_port(
        "# MHz\n«infinity» 0 0",
        "\"infinity\" is not a number",
        finite,
    );
    bad_one_port("# MHz\n1 «0.5j» 0", "\"0.5j\" is not a number", finite);
    bad_one_port(
        "# MHz\n1 0.5 0 «//» end",
        "\"//\" is not a number",
        "a comment begins with `!`",
    );
    bad_one_port(
        "# MHz\n1 «0,5» 0",
        "\"0,5\" is not a number",
        "before the decimals: 0.5",
    );
    bad_one_port(
        "# MHz\n1 «1e999» 0",
        "\"1e999\" is too large",
        "a smaller number",
    );
    bad_one_port(
        "# GHz\n«1e300» 0 0",
        "\"1e300\" is too large",
        "a smaller number",
    );
}

#[test]
fn values() {
    bad_one_port(
        "# MHz MA\n1 «-12.5» 30",
        "a magnitude of -12.5",
        "decibels need DB in the option line",
    );
    bad_one_port(
        "# MHz DB\n1 «1e5» 30",
        "100000 dB is too large",
        "a smaller number",
    );
}

#[test]
fn counts() {
    let one = "the frequency and two numbers each of S11 on one line";
    bad_one_port(
        "# MHz\n1 0 0\n«2 0.5»\n",
        "2 numbers on the line; 3 are wanted",
        one,
    );
    bad_one_port(
        "# MHz\n1 0 0\n  «2»",
        "1 number on the line; 3 are wanted",
        one,
    );
    bad_one_port(
        "# MHz\n«1 0 0 0 0»",
        "5 numbers on the line; 3 are wanted",
        one,
    );
    bad_one_port(
        "# MHz\n«1 0 0 0 0 0 0 0 0»",
        "9 numbers on the line",
        "are of a two-port (.s2p",
    );
    let two = "two numbers each of S11 S21 S12 S22 on one line";
    bad_two_port(
        "# MHz\n«1 0 0 0 0 0 0 0»\n",
        "8 numbers on the line; 9 are wanted",
        two,
    );
    bad_two_port(
        "# MHz\n«1 0 0 0 0»\n0 0 0 0",
        "5 numbers on the line; 9 are wanted",
        two,
    );
    bad_two_port(
        "# MHz\n«1 0 0»\n",
        "3 numbers on the line",
        "are of a one-port (.s1p",
    );
    // Five numbers at a frequency that rises are a line cut short, not noise data.
    let full = "1 0 0 0 0 0 0 0 0";
    bad_two_port(
        &format!("# MHz\n{full}\n«2 0 0 0 0»\n"),
        "5 numbers on the line; 9",
        two,
    );
    bad_two_port(
        &format!("# MHz\n{full}\n0.5 1 0.5 10 0.4\n«0.7 1 0.5»\n"),
        "3 numbers on a line of noise data; 5 are wanted",
        "minimum noise figure",
    );
    bad_two_port(
        &format!("# MHz\n{full}\n0.5 1 0.5 10 0.4\n«2 0 0 0 0 0 0 0 0»\n"),
        "9 numbers on a line of noise data",
        "network data come first",
    );
}

#[test]
fn frequencies() {
    let ascending = "ascending order, each once";
    bad_one_port(
        "# MHz\n1 0 0\n«1.0» 0 0",
        "the frequency 1 MHz a second time",
        ascending,
    );
    bad_one_port("# MHz\n3 0 0\n«2» 0 0", "2 MHz after 3 MHz", ascending);
    bad_one_port("# MHz\n«-1» 0 0", "a negative frequency", "write 0 or more");
    bad_two_port(
        "# MHz\n3 0 0 0 0 0 0 0 0\n«2» 0 0 0 0 0 0 0 0",
        "2 MHz after 3 MHz",
        ascending,
    );
}

#[test]
fn characters() {
    let ascii = "save the file as plain ASCII";
    bad_one_port("# MHz\n1 0 «µ»", "'µ' is not an ASCII character", ascii);
    bad_one_port(
        "! µ\n# MHz R 50«Ω»\n",
        "'Ω' is not an ASCII character",
        ascii,
    );
    bad_one_port(
        "# MHz\n1 0\u{a0}0".replace('\u{a0}', "«\u{a0}»").as_str(),
        "'\\u{a0}'",
        ascii,
    );
    bad_one_port(
        "# MHz\n1 «0\0» 0",
        "\"0\\0\" is not a number",
        "a finite decimal number",
    );
}

#[test]
fn long_words_are_cut_in_messages() {
    let word = "x".repeat(100);
    let fault = parse(&format!("# MHz\n1 {word} 0"), "test.s1p").expect_err("no number");
    assert_eq!(
        fault.message,
        format!("\"{}...\" is not a number", "x".repeat(40))
    );
}

#[test]
fn the_name_has_to_tell_the_number_of_ports_of_version_1() {
    let text = "# MHz\n1 0 0";
    for (name, message) in [
        ("test.txt", "does not say how many ports"),
        ("test", "does not say how many ports"),
        (".s1p", "does not say how many ports"),
        ("test.sp", "does not say how many ports"),
        ("test.s4p", "the name says 4 ports; files of 1 and 2"),
        ("test.s0p", "the name says 0 ports"),
    ] {
        let fault = parse(text, name).expect_err(name);
        says(
            &fault,
            message,
            ".s1p for a one-port and in .s2p for a two-port",
        );
        assert_eq!((fault.file.as_str(), &fault.spot), (name, &None));
    }
    assert!(parse(text, "TEST.S1P").is_ok());
}
