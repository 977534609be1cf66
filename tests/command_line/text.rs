//! The text form: it fits 80 columns, its columns line up, and every figure is one.

use super::{EXAMPLES, SEARCHES, folder_with, run_example, run_in};

const WIDTH: usize = 80;

/// From a short to an open, with loads that take no power among them.
const LOADS: [&str; 6] = [
    "0 ohm, 0 ohm",
    "50 ohm, 0 ohm",
    "0 ohm, -50 ohm",
    "1234.5 ohm, -9876.5 ohm",
    "1 Gohm, 1 Gohm",
    "0 ohm, 1 Gohm",
];

/// Extremes in everything that the width of a line depends on.
fn extreme_chain() -> String {
    let stage = |loss: u32| {
        format!(
            "[[stage]]\nname = \"a stage whose name goes on for longer than a table has room for\"\n\
             line = {{ impedance = \"50 ohm\", length = \"100 m\", velocity = 0.7, \
             loss_db_per_100m = {{ \"1 GHz\" = {loss} }} }}\n"
        )
    };
    format!(
        "title = \"{}\"\n[band]\nfrom = \"900 kHz\"\nto = \"4.294967295 GHz\"\n\
         [load]\nswr_up_to = 1e15\n{}{}",
        "long title ".repeat(12),
        stage(250).repeat(4),
        stage(0).repeat(12)
    )
}

/// Every kind of text that the program writes.
fn texts() -> Vec<String> {
    let mut texts = Vec::new();
    for name in EXAMPLES {
        for bits in ["10", "16", "32"] {
            for command in ["respond", "budget"] {
                texts.push(run_example(command, name, &["--word-bits", bits]).stdout);
            }
        }
        texts.push(run_example("size", name, &[]).stdout);
        for load in LOADS {
            texts.push(run_example("respond", name, &["--load", load]).stdout);
        }
    }
    let folder = folder_with(extreme_chain());
    for command in SEARCHES {
        let search = "chain.toml --points 1000 --seed 18446744073709551615";
        let arguments = [command].into_iter().chain(search.split(' '));
        texts.push(run_in(folder.path(), arguments).stdout);
    }
    for load in LOADS {
        texts.push(run_in(folder.path(), ["respond", "chain.toml", "--load", load]).stdout);
    }
    texts
}

#[test]
fn lines_fit_and_figures_are_figures() {
    for text in texts() {
        assert!(text.lines().count() > 5, "{text}");
        for line in text.lines() {
            assert!(line.chars().count() <= WIDTH, "{line}");
            assert_eq!(line, line.trim_end());
            assert!(!line.contains("NaN"), "{line}");
            assert!(
                !line.split_whitespace().any(|word| word.ends_with("inf")),
                "{line}"
            );
        }
    }
}

/// The cells of a line, which two blanks or more keep apart, with the columns they end in.
pub(super) fn cells(line: &str) -> Vec<(usize, String)> {
    let mut cells: Vec<(usize, String)> = Vec::new();
    let mut blanks = 2;
    for (column, c) in line.chars().enumerate() {
        if c == ' ' {
            blanks += 1;
            continue;
        }
        match cells.last_mut() {
            Some((end, cell)) if blanks < 2 => {
                cell.extend(std::iter::repeat_n(' ', blanks));
                cell.push(c);
                *end = column;
            }
            _ => cells.push((column, c.into())),
        }
        blanks = 0;
    }
    cells
}

/// The lines behind the one that begins with `heading`, which is the first, up to a blank one.
pub(super) fn table<'a>(text: &'a str, heading: &str) -> Vec<&'a str> {
    text.lines()
        .skip_while(|line| !line.trim_start().starts_with(heading))
        .take_while(|line| !line.is_empty())
        .collect()
}

/// Expects the columns of figures, which end where their headings do, in every line.
fn lines_up(table: &[&str]) {
    assert!(table.len() > 2, "{table:#?}");
    let ends = |line: &str| cells(line).iter().map(|(end, _)| *end).collect::<Vec<_>>();
    // a heading of names stands at the left
    let named = usize::from(table[0].trim_start().starts_with("stage"));
    let headings = &ends(table[0])[named..];
    for line in &table[1..] {
        let ends = ends(line);
        assert!(ends.ends_with(headings), "{}\n{line}", table[0]);
    }
}

#[test]
fn columns_line_up() {
    for text in texts() {
        if text.contains("∠Γ") {
            let response = table(&text, "MHz");
            lines_up(&response);
            let point = |line: &&str| line.find('.');
            let first = point(&response[1]);
            assert!(first.is_some() && response[1..].iter().all(|line| point(line) == first));
            lines_up(&table(&text, "stage  "));
        } else if text.contains("rms÷theory") {
            lines_up(&table(&text, "worst  "));
        } else {
            for heading in ["at worst  ", "constants  "] {
                lines_up(&table(&text, heading));
            }
        }
    }
}

#[test]
fn frequencies_have_their_places_from_kilohertz_to_gigahertz() {
    let folder = folder_with(extreme_chain());
    let text = run_in(folder.path(), ["respond", "chain.toml"]).result();
    let table = table(&text, "MHz");
    assert!(table[1].starts_with("   0.900000  "), "{text}");
    assert!(
        table.last().expect("a row").starts_with("4294.967295  "),
        "{text}"
    );
}

/// A short, and an open whose power the rounding of `f64` leaves a little below zero.
#[test]
fn load_without_power_is_an_infinite_loss() {
    for load in ["0 ohm, 0 ohm", "0 ohm, 1 Gohm"] {
        let text = run_example("respond", "tide-gauge-buoy", &["--load", load]).result();
        let gains: Vec<_> = table(&text, "MHz")[1..]
            .iter()
            .map(|line| cells(line)[7].1.clone())
            .collect();
        assert_eq!(gains, vec!["-∞"; 41]);
        let whole = cells(table(&text, "stage  ").last().expect("a row"));
        assert_eq!(
            (whole[0].1.as_str(), whole[1].1.as_str()),
            ("whole chain", "∞")
        );
    }
}
