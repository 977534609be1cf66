//! What a right chain file is read as.

use stagebits::plan::*;

use super::{plan, with_settings, with_stage, with_stages};

fn part(kind: &str) -> Part {
    let mut stages = plan(&with_stage(kind)).stages;
    assert_eq!(stages.len(), 1);
    stages.remove(0).part
}

fn line(properties: &str) -> Line {
    match part(&format!("line = {{ {properties} }}")) {
        Part::Line(line) => line,
        other => panic!("{other:?}"),
    }
}

#[test]
fn everything_that_is_written_arrives() {
    let text = r#"
        title = "all of it"
        reference = "75 Ω"
        accuracy.gamma = 2e-3
        firmware = { word_bits = 16 }
        [load]
        impedances = [["30 ohm", "-40 ohm"], ["0 ohm", "0 ohm"]]
        [band]
        from = "472 kHz"
        to = "479 kHz"
        points = 8
        [[stage]]
        name = " drain "
        shunt = { inductance = "47 µH" }
        [[stage]]
        [stage.transformer]
        ratio = 3
    "#;
    let expected = Plan {
        title: "all of it".into(),
        reference: 75.0,
        band: Band {
            from: 472_000,
            to: 479_000,
            points: 8,
        },
        loads: Loads::Impedances(vec![(30.0, -40.0), (0.0, 0.0)]),
        firmware: Firmware { word_bits: 16 },
        accuracy: Accuracy { gamma: 2e-3 },
        stages: vec![
            Stage {
                name: "drain".into(),
                part: Part::Branch(
                    Position::Shunt,
                    Branch {
                        arrangement: Arrangement::Series,
                        resistance: None,
                        inductor: Some(Reactor {
                            value: 47e-6,
                            loss: Loss::Lossless,
                        }),
                        capacitor: None,
                    },
                ),
            },
            Stage {
                name: "transformer 2".into(),
                part: Part::Transformer { ratio: 3.0 },
            },
        ],
    };
    assert_eq!(plan(text), expected);
}

#[test]
fn what_is_left_out_has_a_default() {
    let plan = plan(&with_stage("series = { resistance = \"5 ohm\" }"));
    assert_eq!(plan.reference, 50.0);
    assert_eq!(plan.band.points, 41);
    assert_eq!(plan.firmware.word_bits, 32);
    assert_eq!(plan.accuracy.gamma, 1e-4);
    assert_eq!(plan.stages[0].name, "series branch 1");
}

#[test]
fn a_narrow_band_has_a_point_for_each_hertz() {
    for (to, points) in [
        ("7 MHz", 1),
        ("7.000001 MHz", 2),
        ("7.000039 MHz", 40),
        ("7.1 MHz", 41),
    ] {
        let text = format!("band = {{ from = \"7 MHz\", to = \"{to}\" }}\nload.swr_up_to = 1");
        assert_eq!(plan(&with_settings(&text)).band.points, points, "{to}");
    }
}

#[test]
fn band_reaches_the_ends_of_the_frequency_word() {
    let text =
        "band = { from = \"1 Hz\", to = \"4294967295 Hz\", points = 100000 }\nload.swr_up_to = 1";
    let band = plan(&with_settings(text)).band;
    assert_eq!((band.from, band.to, band.points), (1, u32::MAX, 100_000));
}

#[test]
fn branches_hold_their_elements_and_losses() {
    let Part::Branch(position, branch) = part(
        r#"shunt = { arrangement = "parallel", resistance = "2 kohm", inductance = "1 uH",
           inductor_q = 200, capacitance = "100 pF", capacitor_esr = "0.1 ohm" }"#,
    ) else {
        panic!("a branch")
    };
    assert_eq!(position, Position::Shunt);
    assert_eq!(
        branch,
        Branch {
            arrangement: Arrangement::Parallel,
            resistance: Some(2e3),
            inductor: Some(Reactor {
                value: 1e-6,
                loss: Loss::Q(200.0)
            }),
            capacitor: Some(Reactor {
                value: 100e-12,
                loss: Loss::Esr(0.1)
            }),
        }
    );
}

#[test]
fn loss_of_the_only_reactor_has_two_names() {
    for (short, long) in [
        (
            "inductance = \"1 uH\", q = 90",
            "inductance = \"1 uH\", inductor_q = 90",
        ),
        (
            "capacitance = \"1 nF\", esr = \"1 ohm\"",
            "capacitance = \"1 nF\", capacitor_esr = \"1 ohm\"",
        ),
    ] {
        let (short, long) = (
            format!("series = {{ {short} }}"),
            format!("series = {{ {long} }}"),
        );
        assert_eq!(part(&short), part(&long));
        assert_ne!(part(&short), part("series = { inductance = \"1 uH\" }"));
    }
}

#[test]
fn two_esr_go_together_in_a_series_arrangement() {
    part(
        r#"shunt = { arrangement = "series", inductance = "1 uH", capacitance = "1 nF",
           inductor_esr = "1 ohm", capacitor_esr = "1 ohm" }"#,
    );
}

#[test]
fn stubs_have_a_position_and_an_end() {
    for (kind, end, position, termination) in [
        ("series_stub", "open", Position::Series, Termination::Open),
        ("series_stub", "short", Position::Series, Termination::Short),
        ("shunt_stub", "open", Position::Shunt, Termination::Open),
        ("shunt_stub", "short", Position::Shunt, Termination::Short),
    ] {
        let text = format!(
            "{kind} = {{ end = \"{end}\", impedance = \"300 ohm\", length = \"20 mm\", velocity = 0.9 }}"
        );
        let line = Line {
            impedance: 300.0,
            length: 0.02,
            velocity: 0.9,
            k1: 0.0,
            k2: 0.0,
        };
        assert_eq!(part(&text), Part::Stub(position, termination, line));
    }
}

#[test]
fn line_loss_is_that_of_the_data_sheet() {
    let rest = "impedance = \"50 ohm\", length = \"100 m\", velocity = 0.66";
    let sheet = [(10e6, 2.2), (100e6, 7.6)];
    // Either order in the file is the same table.
    for table in [
        "\"10 MHz\" = 2.2, \"100 MHz\" = 7.6",
        "\"0.1 GHz\" = 7.6, \"10000 kHz\" = 2.2",
    ] {
        let line = line(&format!("{rest}, loss_db_per_100m = {{ {table} }}"));
        for (hertz, decibels) in sheet {
            // ISO 80000-3: an amplitude ratio of e is 1 Np, and 20 lg e = 8.685889638 dB.
            let found = line.attenuation(hertz) * line.length * 8.685_889_638;
            approx::assert_relative_eq!(found, decibels, max_relative = 1e-9);
        }
        assert!(line.k1 > 0.0 && line.k2 > 0.0);
    }
}

#[test]
fn line_loss_of_one_point_is_skin_effect() {
    let rest = "impedance = \"50 ohm\", length = \"1 m\", velocity = 1";
    let line_1 = line(&format!("{rest}, loss_db_per_100m = {{ \"25 MHz\" = 3 }}"));
    assert_eq!(line_1.k2, 0.0);
    let found = line_1.attenuation(100e6) * 100.0 * 8.685_889_638;
    approx::assert_relative_eq!(found, 6.0, max_relative = 1e-9);
    let lossless = line(rest);
    assert_eq!((lossless.k1, lossless.k2), (0.0, 0.0));
    assert_eq!(line(&format!("{rest}, loss_db_per_100m = {{}}")), lossless);
}

#[test]
fn a_chain_may_fill_the_firmware() {
    let stage = "[[stage]]\nseries.resistance = \"1 ohm\"\n";
    let plan = plan(&with_stages(&stage.repeat(STAGE_CAPACITY)));
    assert_eq!(plan.stages.len(), STAGE_CAPACITY);
}
