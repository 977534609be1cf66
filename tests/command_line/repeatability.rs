//! The same figures on every run and with any number of threads; others with another seed.

use super::{COMMANDS, EXAMPLES, SEARCHES, example, stagebits};

fn result(command: &str, name: &str, threads: &str, arguments: &[&str]) -> String {
    let mut run = stagebits();
    run.env("RAYON_NUM_THREADS", threads)
        .arg(command)
        .arg(example(name))
        .args(arguments);
    let output = run.output().expect("the program starts");
    super::Run::from(output).result()
}

#[test]
fn threads_do_not_matter() {
    for name in EXAMPLES {
        for command in COMMANDS {
            let points: &[&str] = if SEARCHES.contains(&command) {
                &["--points", "20000"]
            } else {
                &[]
            };
            for json in [&[][..], &["--json"]] {
                let arguments = [points, json].concat();
                let one = result(command, name, "1", &arguments);
                for threads in ["1", "2", "5"] {
                    assert_eq!(
                        one,
                        result(command, name, threads, &arguments),
                        "{threads} threads"
                    );
                }
            }
        }
    }
}

#[test]
fn the_seed_matters() {
    let with = |seed| {
        let arguments = ["--json", "--points", "2000", "--seed", seed];
        let text = result("budget", "tide-gauge-buoy", "2", &arguments);
        let value: serde_json::Value = serde_json::from_str(&text).expect("JSON");
        (
            value["total"]["rms"].as_f64().expect("a number"),
            value["worst"].clone(),
        )
    };
    let (one, two) = (with("1"), with("2"));
    assert_ne!(one.0, two.0);
    // the same envelope all the same
    assert!((one.0 / two.0 - 1.0).abs() < 0.2, "{one:?} {two:?}");
}
