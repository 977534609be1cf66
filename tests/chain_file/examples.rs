//! The chains in `examples/` can be read, and are what they say they are.

use std::fs;
use std::path::{Path, PathBuf};

use stagebits::chain_file::{parse, read};
use stagebits::plan::*;

fn folder() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("../examples")
}

fn example(name: &str) -> Plan {
    read(&folder().join(name)).unwrap_or_else(|fault| panic!("{fault}"))
}

fn lossy(branch: &Branch) -> bool {
    let reactors = [branch.inductor, branch.capacitor];
    branch.resistance.is_some()
        || reactors
            .iter()
            .flatten()
            .any(|reactor| reactor.loss != Loss::Lossless)
}

#[test]
fn every_chain_file_is_read_and_says_what_it_is() {
    let mut found = 0;
    for entry in fs::read_dir(folder()).expect("the folder of examples") {
        let path = entry.expect("an entry").path();
        if path
            .extension()
            .is_some_and(|extension| extension == "toml")
        {
            let text = fs::read_to_string(&path).expect("an example");
            assert!(text.starts_with("# "), "{}", path.display());
            assert!(text.contains("Stands for the job of"), "{}", path.display());
            read(&path).unwrap_or_else(|fault| panic!("{fault}"));
            found += 1;
        }
    }
    assert!(found >= 3);
}

#[test]
fn the_file_in_the_documentation_is_read() {
    let source = include_str!("../../host/src/chain_file/mod.rs");
    let block = source
        .split("```")
        .nth(1)
        .and_then(|block| block.strip_prefix("toml\n"));
    let lines = block.expect("a block of TOML").lines();
    let text: Vec<_> = lines.map(|line| line.trim_start_matches("//! ")).collect();
    let plan = parse(&text.join("\n"), "documentation").unwrap_or_else(|fault| panic!("{fault}"));
    assert_eq!(plan.stages.len(), 7);
}

#[test]
fn buoy_has_two_lines_two_lossy_and_three_reactive_branches() {
    let plan = example("tide-gauge-buoy.toml");
    assert_eq!((plan.band.from, plan.band.to), (2_000_000, 12_000_000));
    assert_eq!(plan.loads, Loads::SwrUpTo(10.0));
    assert_eq!(plan.firmware.word_bits, 32);
    assert_eq!(plan.accuracy.gamma, 1e-4);
    let (mut lines, mut with_loss, mut reactive) = (0, 0, 0);
    for stage in &plan.stages {
        match &stage.part {
            Part::Line(line) if line.attenuation(1e6) > 0.0 => lines += 1,
            Part::Branch(_, branch) if lossy(branch) => with_loss += 1,
            Part::Branch(..) => reactive += 1,
            other => panic!("{other:?}"),
        }
    }
    assert_eq!((lines, with_loss, reactive), (2, 2, 3));
    assert!(matches!(
        plan.stages.first().map(|stage| &stage.part),
        Some(Part::Line(_))
    ));
    assert!(matches!(
        plan.stages.last().map(|stage| &stage.part),
        Some(Part::Line(_))
    ));
}

#[test]
fn harmonic_trap_of_the_buoy_is_at_twice_the_top_of_the_band() {
    let plan = example("tide-gauge-buoy.toml");
    let trap = plan
        .stages
        .iter()
        .find(|stage| stage.name == "harmonic trap");
    let Some(Part::Branch(Position::Shunt, branch)) = trap.map(|stage| &stage.part) else {
        panic!("{trap:?}")
    };
    let (Some(coil), Some(capacitor)) = (branch.inductor, branch.capacitor) else {
        panic!("{branch:?}")
    };
    let resonance = 1.0 / (std::f64::consts::TAU * (coil.value * capacitor.value).sqrt());
    approx::assert_relative_eq!(
        resonance,
        2.0 * f64::from(plan.band.to),
        max_relative = 0.02
    );
}

#[test]
fn meter_ends_in_a_filter_and_a_test_lead() {
    let plan = example("handheld-impedance-meter.toml");
    assert_eq!(plan.firmware.word_bits, 16);
    let Some((Part::Line(lead), before)) = plan
        .stages
        .split_last()
        .map(|(last, before)| (&last.part, before))
    else {
        panic!("a test lead")
    };
    assert_eq!(lead.length, 0.3);
    let filter = before.iter().rev().take(5).map(|stage| match &stage.part {
        Part::Branch(position, _) => *position,
        other => panic!("{other:?}"),
    });
    use Position::{Series, Shunt};
    assert!(filter.eq([Shunt, Series, Shunt, Series, Shunt]));
}

#[test]
fn hut_tuner_has_an_l_of_eight_coils_and_eight_capacitors() {
    let plan = example("mountain-hut-tuner.toml");
    assert_eq!((plan.band.from, plan.band.to), (1_800_000, 30_000_000));
    let banks: Vec<_> = plan
        .stages
        .iter()
        .filter_map(|stage| match &stage.part {
            Part::Bank(position, bank) => Some((*position, bank)),
            _ => None,
        })
        .collect();
    let [(Position::Series, coils), (Position::Shunt, capacitors)] = banks[..] else {
        panic!("{banks:?}")
    };
    assert_eq!(coils.element, BankElement::Coils);
    assert_eq!(capacitors.element, BankElement::Capacitors);
    for bank in [coils, capacitors] {
        assert_eq!(bank.steps.len(), 8);
        assert!(bank.steps.iter().all(|step| step.loss > 0.0));
        assert!(bank.contact > 0.0 && bank.stray > 0.0);
    }
    // the largest coil is far from resonance with its open contact at the top of the band
    let omega = std::f64::consts::TAU * f64::from(plan.band.to);
    assert!(omega * omega * coils.steps[7].value * coils.stray < 0.5);
}

#[test]
fn shore_station_has_a_long_cable_both_stubs_and_a_transformer() {
    let parts: Vec<_> = example("shore-station.toml")
        .stages
        .into_iter()
        .map(|stage| stage.part)
        .collect();
    let has = |wanted: fn(&Part) -> bool| parts.iter().any(wanted);
    assert!(has(
        |part| matches!(part, Part::Line(line) if line.length >= 100.0 && line.k1 > 0.0)
    ));
    assert!(has(|part| matches!(
        part,
        Part::Stub(_, Termination::Open, _)
    )));
    assert!(has(|part| matches!(
        part,
        Part::Stub(_, Termination::Short, _)
    )));
    assert!(has(|part| matches!(part, Part::Transformer { .. })));
}
