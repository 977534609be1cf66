//! Loads that depend on the frequency: from the chain file through the envelope to the budget.

use std::fs;
use std::path::{Path, PathBuf};

use num_complex::Complex;
use stagebits::arithmetic::{to_complex, to_gamma};
use stagebits::budget::budget;
use stagebits::chain_file::{parse, read};
use stagebits::comparison::Comparison;
use stagebits::constants;
use stagebits::envelope::{Effort, Envelope, Point, Survey};
use stagebits::plan::{Loads, Plan, Switches};
use stagebits::reference::load_gamma;
use stagebits::touchstone;

use super::gammas;

/// The series circuit behind the example's measurement: 36 ohm, 4.7 uH, 150 pF.
fn model_impedance(hertz: f64) -> Complex<f64> {
    let omega = std::f64::consts::TAU * hertz;
    Complex::new(36.0, omega * 4.7e-6 - 1.0 / (omega * 150e-12))
}

const MODEL: &str =
    "series = { resistance = \"36 ohm\", inductance = \"4.7 uH\", capacitance = \"150 pF\" }";

/// Half a unit of the last place of the example's magnitudes and of its angles.
const EXAMPLE_ROUNDING: f64 = 0.5e-4 + 0.5e-2 * std::f64::consts::PI / 180.0;
/// The ripple that the example says it has.
const EXAMPLE_RIPPLE: f64 = 0.003;

fn examples() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("../examples")
}

/// The buoy's chain with another load.
fn buoy(load: &str) -> Plan {
    let path = examples().join("tide-gauge-buoy.toml");
    let text = fs::read_to_string(&path).expect("the example");
    let changed = text.replace("swr_up_to = 10", load);
    assert_ne!(changed, text);
    parse(&changed, &path.display().to_string()).unwrap_or_else(|fault| panic!("{fault}"))
}

fn gamma(plan: &Plan, hertz: f64) -> Complex<f64> {
    load_gamma(&plan.loads, plan.reference, hertz).expect("a load at this frequency")
}

/// Keeps the points it is shown.
struct Collect;

impl Survey for Collect {
    type Prepared = u32;
    type Kept = Vec<Point>;

    fn prepare(&self, hertz: u32, _: &Switches) -> u32 {
        hertz
    }

    fn empty(&self) -> Vec<Point> {
        Vec::new()
    }

    fn take(&self, prepared: &u32, point: Point, kept: &mut Vec<Point>) {
        assert_eq!(*prepared, point.hertz);
        kept.push(point);
    }

    fn merge(&self, kept: &mut Vec<Point>, later: Vec<Point>) {
        kept.extend(later);
    }
}

#[test]
fn the_example_is_the_model_it_says_it_is() {
    let network = touchstone::read(&examples().join("buoy-whip.s1p"));
    let whip = network.and_then(|network| network.one_port("buoy-whip.s1p"));
    let whip = whip.unwrap_or_else(|fault| panic!("{fault}"));
    assert_eq!(whip.range(), (1.5e6, 12.5e6));
    for (hertz, gamma) in gammas(&whip) {
        let z = model_impedance(hertz);
        let ripple = (gamma - (z - 50.0) / (z + 50.0)).norm();
        assert!(
            (ripple - EXAMPLE_RIPPLE).abs() <= EXAMPLE_ROUNDING,
            "{hertz} Hz: {ripple}"
        );
    }
}

#[test]
fn a_path_starts_in_the_folder_of_the_chain_file() {
    let folder = tempfile::tempdir().expect("a folder for the test");
    fs::create_dir(folder.path().join("data")).expect("a folder for the test");
    fs::write(
        folder.path().join("data/dummy.s1p"),
        "# MHz MA R 50\n1 0 0\n9 1 180\n",
    )
    .expect("a measurement for the test");
    let path = folder.path().join("chain.toml");
    let text = "title = \"test\"\nreference = \"25 ohm\"\nband = { from = \"1 MHz\", to = \"9 MHz\" }\n\
                load.one_port = \"data/dummy.s1p\"\n[[stage]]\ntransformer.ratio = 1\n";
    fs::write(&path, text).expect("a chain for the test");
    let plan = read(&path).unwrap_or_else(|fault| panic!("{fault}"));
    // 50 ohm at a reference of 25 ohm is Γ = 1/3; a short is one at any.
    assert!((gamma(&plan, 1e6) - 1.0 / 3.0).norm() <= f64::EPSILON);
    assert_eq!(gamma(&plan, 9e6), Complex::new(-1.0, 0.0));
    // The line is straight at the reference of the plan.
    assert!((gamma(&plan, 5e6) + 1.0 / 3.0).norm() <= f64::EPSILON);
    assert_eq!(load_gamma(&plan.loads, plan.reference, 9.1e6), None);
}

#[test]
fn a_series_model_is_the_impedance_of_its_elements() {
    let plan = buoy(MODEL);
    for hertz in [2e6, 5.994e6, 12e6] {
        let z = model_impedance(hertz);
        let wanted = (z - plan.reference) / (z + plan.reference);
        assert!((gamma(&plan, hertz) - wanted).norm() <= 8.0 * f64::EPSILON);
    }
    // One element alone: a resistance is no reactance, a reactance is total reflection.
    let resistance = buoy("series = { resistance = \"150 ohm\" }");
    assert_eq!(gamma(&resistance, 3e6), Complex::new(0.5, 0.0));
    for element in ["inductance = \"1 uH\"", "capacitance = \"1 nF\""] {
        let plan = buoy(&format!("series = {{ {element} }}"));
        assert!((gamma(&plan, 3e6).norm() - 1.0).abs() <= 4.0 * f64::EPSILON);
        let inductive = element.starts_with("ind");
        assert_eq!(gamma(&plan, 3e6).im > 0.0, inductive);
    }
}

#[test]
fn loads_that_are_the_same_at_every_frequency_are_not_one_for_each() {
    for loads in [Loads::SwrUpTo(3.0), Loads::Impedances(vec![(50.0, 0.0)])] {
        assert_eq!(load_gamma(&loads, 50.0, 3e6), None);
    }
}

#[test]
fn every_point_of_the_envelope_has_the_load_of_its_frequency() {
    for load in ["one_port = \"buoy-whip.s1p\"", MODEL] {
        let plan = buoy(load);
        let envelope = Envelope::new(&plan);
        let effort = Effort {
            points: 500,
            seed: 7,
        };
        let points = envelope.run(effort, &Collect);
        assert_eq!(points.len(), 500);
        let right = |point: &Point| {
            point.load == to_gamma(gamma(&plan, f64::from(point.hertz)))
                && (plan.band.from..=plan.band.to).contains(&point.hertz)
        };
        assert!(points.iter().all(right));
        let mut hertz: Vec<_> = points.iter().map(|point| point.hertz).collect();
        for index in 0..plan.band.points {
            assert_eq!(hertz[index as usize], plan.band.grid(index));
        }
        hertz.sort_unstable();
        hertz.dedup();
        assert!(
            hertz.len() > 490,
            "each point is another frequency: {}",
            hertz.len()
        );

        // The ascent towards large |Γ| ends at the low end of the band, where the whip is shortest.
        let magnitude = |point: Point| {
            assert!(right(&point), "{point:?}");
            to_complex(point.load).norm()
        };
        let (highest, _, tried) = envelope.ascend(points[5], 7, magnitude);
        assert_eq!(highest.hertz, plan.band.from);
        assert!(tried > 100);
    }
}

#[test]
fn a_single_frequency_has_a_single_point() {
    let mut plan = buoy(MODEL);
    plan.band.to = plan.band.from;
    plan.band.points = 1;
    let effort = Effort {
        points: 100,
        seed: 1,
    };
    let points = Envelope::new(&plan).run(effort, &Collect);
    let hertz = plan.band.from;
    let load = to_gamma(gamma(&plan, f64::from(hertz)));
    let switches = Switches::OFF;
    assert_eq!(
        points,
        [Point {
            hertz,
            load,
            switches
        }]
    );
}

/// The budget's worst point has the load of its frequency, and none of the grid is worse.
#[test]
fn a_budget_is_of_the_loads_measured() {
    let plan = buoy("one_port = \"buoy-whip.s1p\"");
    let exact = constants::exact(&plan);
    let effort = Effort {
        points: 400,
        seed: 1,
    };
    let budget = budget::<i16>(&plan, &exact, effort);
    let load = |hertz: u32| to_gamma(gamma(&plan, f64::from(hertz)));
    assert_eq!(budget.worst.load, load(budget.worst.hertz));
    assert!(budget.evaluations > effort.points);
    let comparison = Comparison::<i16>::new(&plan, &exact);
    let error = |hertz: u32| comparison.at(hertz).error(load(hertz)).norm();
    assert_eq!(error(budget.worst.hertz), budget.worst_error());
    let grid = (0..plan.band.points).map(|index| error(plan.band.grid(index)));
    let on_grid = grid.fold(0.0, f64::max);
    assert!(on_grid > 0.0 && on_grid <= budget.worst_error());
}
