//! Touchstone files: what is read, what is refused and where, and measured loads of a chain.

#[path = "touchstone/data_faults.rs"]
mod data_faults;
#[path = "touchstone/files.rs"]
mod files;
#[path = "touchstone/frequency_loads.rs"]
mod frequency_loads;
#[path = "touchstone/keyword_faults.rs"]
mod keyword_faults;
#[path = "touchstone/load_faults.rs"]
mod load_faults;
#[path = "touchstone/one_ports.rs"]
mod one_ports;
#[path = "touchstone/properties.rs"]
mod properties;
#[path = "touchstone/standard.rs"]
mod standard;

use num_complex::Complex;
use stagebits::diagnostic::Diagnostic;
use stagebits::touchstone::{Network, OnePort, Point, TwoPort, parse};

/// What a right file of a one-port says.
fn one_port(text: &str) -> OnePort {
    match parse(text, "test.s1p") {
        Ok(Network::OnePort(one_port)) => one_port,
        Ok(other) => panic!("{other:?}"),
        Err(fault) => panic!("{fault}"),
    }
}

/// What a right file of a two-port says.
fn two_port(text: &str) -> TwoPort {
    match parse(text, "test.s2p") {
        Ok(Network::TwoPort(two_port)) => two_port,
        Ok(other) => panic!("{other:?}"),
        Err(fault) => panic!("{fault}"),
    }
}

/// Frequency and Γ of every point.
fn gammas(one_port: &OnePort) -> Vec<(f64, Complex<f64>)> {
    let pair = |point: &Point<1>| (point.hertz, point.s[0][0]);
    one_port.points().iter().map(pair).collect()
}

/// Takes the marks « and » out of a text; gives the text, its part before the mark, and the part
/// that is marked.
fn unmarked(marked: &str) -> (String, &str, &str) {
    let (before, rest) = marked.split_once('«').expect("a mark");
    let (fault, after) = rest.split_once('»').expect("an end of the mark");
    (format!("{before}{fault}{after}"), before, fault)
}

/// Expects the file `name` to be refused for what stands between « and », over its whole width,
/// with a message and a help that hold the texts given.
fn refused(name: &str, marked: &str, message: &str, help: &str) {
    let (text, before, fault) = unmarked(marked);
    let found = parse(&text, name).expect_err(&text);
    says(&found, message, help);
    let spot = found
        .spot
        .as_ref()
        .expect("a fault of the text has a place");
    let line = before.matches('\n').count() + 1;
    let column = before.chars().rev().take_while(|&c| c != '\n').count() + 1;
    let place = [spot.line, spot.column, spot.width].map(|it| it as usize);
    let wanted = [line, column, fault.chars().count().max(1)];
    assert_eq!(place, wanted, "\n{found}");
    assert_eq!(text.lines().nth(line - 1).unwrap_or_default(), spot.text);
}

fn says(found: &Diagnostic, message: &str, help: &str) {
    assert!(
        found.message.contains(message),
        "{message:?} is wanted:\n{found}"
    );
    assert!(found.help.contains(help), "{help:?} is wanted:\n{found}");
}
