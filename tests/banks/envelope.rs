//! Which states of its banks a chain's envelope covers.

use std::collections::HashMap;

use stagebits::budget::budget;
use stagebits::chain_file::parse;
use stagebits::constants;
use stagebits::envelope::{Effort, Envelope, Point, Survey};
use stagebits::plan::{Plan, Switches};

/// Keeps the points it is shown.
struct Collect;

impl Survey for Collect {
    type Prepared = (u32, Switches);
    type Kept = Vec<Point>;

    fn prepare(&self, hertz: u32, switches: &Switches) -> Self::Prepared {
        (hertz, *switches)
    }

    fn empty(&self) -> Vec<Point> {
        Vec::new()
    }

    fn take(&self, prepared: &Self::Prepared, point: Point, kept: &mut Vec<Point>) {
        assert_eq!(*prepared, (point.hertz, point.switches));
        kept.push(point);
    }

    fn merge(&self, kept: &mut Vec<Point>, later: Vec<Point>) {
        kept.extend(later);
    }
}

const BANKS: &str = r#"
[[stage]]
name = "coils"
series_bank = { inductances = { first = "60 nH", steps = 8 }, q = 200, contact = "0.03 ohm", stray = "0.7 pF" }
[[stage]]
series.resistance = "1 ohm"
[[stage]]
name = "capacitors"
shunt_bank = { capacitances = ["12 pF", "22 pF", "47 pF"], stray = "0.7 pF" }
"#;

/// Words with all steps on.
const ALL_ON: [u16; 2] = [0xff, 0b111];

fn plan(load: &str, stages: &str) -> Plan {
    let text = format!(
        "title = \"test\"\n[band]\nfrom = \"2 MHz\"\nto = \"12 MHz\"\npoints = 5\n[load]\n{load}\n{stages}"
    );
    parse(&text, "test.toml").unwrap_or_else(|fault| panic!("{fault}"))
}

const EFFORT: Effort = Effort {
    points: 10_000,
    seed: 1,
};

/// The states of each frequency, with the number of loads in each.
fn states(points: &[Point]) -> HashMap<u32, HashMap<[u16; 2], usize>> {
    let mut found: HashMap<u32, HashMap<_, _>> = HashMap::new();
    for point in points {
        let [first, second, rest @ ..] = point.switches.words;
        assert!(
            first & !ALL_ON[0] == 0 && second & !ALL_ON[1] == 0,
            "{point:?}"
        );
        assert_eq!(rest, [0; 14]);
        let of_frequency = found.entry(point.hertz).or_default();
        *of_frequency.entry([first, second]).or_insert(0) += 1;
    }
    found
}

#[test]
fn each_frequency_meets_many_states_the_outermost_among_them() {
    for load in [
        "swr_up_to = 10",
        "impedances = [[\"5 ohm\", \"0 ohm\"], [\"50 ohm\", \"9 ohm\"]]",
        "series = { resistance = \"36 ohm\", inductance = \"4.7 uH\" }",
    ] {
        let points = Envelope::new(&plan(load, BANKS)).run(EFFORT, &Collect);
        assert!(points.len() >= 10_000, "{load}: {}", points.len());
        assert!(points.len() <= 12_000, "{load}: {}", points.len());
        let states = states(&points);
        assert!(states.len() >= 90, "{load}: {} frequencies", states.len());
        for of_frequency in states.values() {
            assert!(of_frequency.len() >= 9, "{load}: {of_frequency:?}");
            assert!(of_frequency.contains_key(&[0, 0]), "{load}");
            assert!(of_frequency.contains_key(&ALL_ON), "{load}");
        }
        let mut met: Vec<_> = states.values().flat_map(HashMap::keys).collect();
        met.sort_unstable();
        met.dedup();
        // most of 2 048 states by chance alone, where 800 or more are drawn
        assert!(met.len() >= 600, "{load}: {} states", met.len());
    }
}

#[test]
fn a_chain_without_banks_has_one_state() {
    let plan = plan(
        "swr_up_to = 10",
        "[[stage]]\nseries.resistance = \"1 ohm\"\n",
    );
    let points = Envelope::new(&plan).run(EFFORT, &Collect);
    assert!(points.iter().all(|point| point.switches == Switches::OFF));
    assert_eq!(points.len(), 10_000);
}

/// Climbs to a state that it can reach by single steps only.
#[test]
fn ascent_switches_step_by_step() {
    let envelope = Envelope::new(&plan("swr_up_to = 10", BANKS));
    let start = envelope.run(EFFORT, &Collect)[0];
    for (seed, target) in [(1, [0b1011_0010, 0b101]), (2, [0b0000_0001, 0b010])] {
        let wrong = |point: &Point| {
            let words = point.switches.words.iter().zip(target);
            words
                .map(|(word, target)| (word ^ target).count_ones())
                .sum::<u32>()
        };
        let (found, highest, _) = envelope.ascend(start, seed, |point| -f64::from(wrong(&point)));
        assert_eq!((wrong(&found), highest), (0, 0.0));
    }
}

/// The worst state is among those that a budget tries, and no other is worse by the reference.
#[test]
fn a_budget_finds_the_state_with_the_largest_error() {
    let plan = plan("impedances = [[\"50 ohm\", \"0 ohm\"]]", BANKS);
    let exact = constants::exact(&plan);
    let result = budget::<i16>(&plan, &exact, EFFORT);
    let comparison = stagebits::comparison::Comparison::<i16>::new(&plan, &exact);
    let at = |point: &Point| comparison.at_state(point.hertz, &point.switches);
    let again = at(&result.worst).error(result.worst.load).norm();
    assert_eq!(again, result.worst_error());
    // every state at the grid's frequencies
    let load = result.worst.load;
    let mut worst = 0.0_f64;
    for index in 0..plan.band.points {
        for state in 0..2048_u16 {
            let mut switches = Switches::OFF;
            (switches.words[0], switches.words[1]) = (state & 0xff, state >> 8);
            let hertz = plan.band.grid(index);
            let point = Point {
                hertz,
                load,
                switches,
            };
            worst = worst.max(at(&point).error(load).norm());
        }
    }
    assert!(
        result.worst_error() >= worst,
        "{} {worst}",
        result.worst_error()
    );
}
