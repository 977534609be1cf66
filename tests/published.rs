//! Published figures against the f64 reference.
//!
//! The table of chains lies in `published/`; what does not take a chain is checked in the modules
//! named here.

#[path = "published/conversions.rs"]
mod conversions;
#[path = "published/mod.rs"]
mod published;

use published::{Chain, chains};
use stagebits::reference::Reference;

/// All figures of a chain that the reference does not meet.
fn failures(chain: &Chain) -> Vec<String> {
    let r0 = chain.plan.reference;
    let reference = Reference::new(&chain.plan);
    let mut failures = Vec::new();
    for input in &chain.inputs {
        if let Err(error) = input.expected.check(input.used, 0.0) {
            failures.push(format!("{}: {error}", input.label));
        }
    }
    for case in &chain.cases {
        let point = reference.at(f64::from(case.hertz));
        let gamma_load = case.load.gamma(r0);
        for figure in &case.figures {
            let value = figure.quantity.of_point(&point, r0, gamma_load);
            let scale = figure.quantity.scale(r0);
            if let Err(error) = figure.expected.check(value, scale) {
                failures.push(format!(
                    "{:?} at {} Hz: {error}",
                    figure.quantity, case.hertz
                ));
            }
        }
    }
    failures
}

#[test]
fn every_chain_gives_its_published_figures() {
    let mut report = String::new();
    for chain in chains() {
        for failure in failures(&chain) {
            let source = chain.source;
            report.push_str(&format!("{} ({source:?}): {failure}\n", chain.plan.title));
        }
    }
    assert!(report.is_empty(), "{report}");
}

/// Titles are the names of the checks, a chain without a figure checks nothing, and every plan is
/// one that the other evaluators accept.
#[test]
fn the_table_is_well_formed() {
    let chains = chains();
    let mut titles: Vec<&str> = chains
        .iter()
        .map(|chain| chain.plan.title.as_str())
        .collect();
    titles.sort_unstable();
    titles.dedup();
    assert_eq!(titles.len(), chains.len(), "two chains share a title");
    for chain in &chains {
        assert!(!chain.plan.stages.is_empty(), "{}", chain.plan.title);
        assert!(!chain.cases.is_empty(), "{}", chain.plan.title);
        assert!(
            chain.cases.iter().all(|case| !case.figures.is_empty()),
            "{}",
            chain.plan.title
        );
        assert!(chain.plan.band.from <= chain.plan.band.to);
    }
}
