//! The emulated cores themselves: before any figure or word of theirs counts, their arithmetic,
//! instruction counter, stack gauge, exit status and link-time proof are checked against what is
//! known.

use std::collections::HashSet;
use std::path::Path;
use std::process::Command;
use std::time::Duration;

#[path = "firmware/src/checksum.rs"]
#[allow(
    unreachable_pub,
    reason = "public in the images, where it is a library's"
)]
mod checksum;
#[path = "common/emulator.rs"]
mod emulator;

use emulator::{CORES, Failure};

/// Figures that an image printed as lines of `name argument value`, in order.
fn figures<'a>(stdout: &'a str, name: &'a str) -> impl Iterator<Item = (u32, u32)> + use<'a> {
    stdout.lines().filter_map(move |line| {
        let mut words = line.strip_prefix(name)?.split_whitespace();
        Some((words.next()?.parse().ok()?, words.next()?.parse().ok()?))
    })
}

#[test]
fn arithmetic_and_printing_agree_with_the_desktop() -> Result<(), Failure> {
    let mut sum = 0;
    let mut expected = String::new();
    for word in checksum::Stream(1).take(20_000) {
        sum = checksum::mix(sum, word);
        let halves = [word >> 32, word & 0xFFFF_FFFF, sum >> 32, sum & 0xFFFF_FFFF];
        expected += &halves.map(|half| format!("{half:08x}")).join(" ");
        expected += "\n";
    }
    expected += &format!("sum {sum}\n");
    for core in &CORES {
        let image = emulator::build(core, "checksum", &[], &[])?;
        let printed = emulator::stdout(core, &image)?;
        let differs = printed
            .lines()
            .zip(expected.lines())
            .position(|(here, there)| here != there);
        assert_eq!(
            differs, None,
            "{}: index of the first line that differs",
            core.name
        );
        assert!(
            printed == expected,
            "{}: too few or too many lines",
            core.name
        );
    }
    Ok(())
}

/// The first output of the reference implementation's generator for seed 1234567, widely used as
/// its check value (from memory): without it, the two sides could share a mistake in the stream.
#[test]
fn stream_is_splitmix64() {
    assert_eq!(
        checksum::Stream(1_234_567).next(),
        Some(6_457_827_717_110_365_317)
    );
}

#[test]
fn instruction_counter_is_exact_and_repeats() -> Result<(), Failure> {
    for core in &CORES {
        let image = emulator::build(core, "gauges", &[], &[])?;
        let printed = emulator::stdout(core, &image)?;
        let counts: Vec<_> = figures(&printed, "nop").collect();
        assert_eq!(counts.len(), 37, "{}: {printed}", core.name);
        for (operations, counted) in counts {
            assert_eq!(counted, operations, "{}: no-operations", core.name);
        }
        // Each round is two instructions; loading the number of rounds takes a few more.
        let loops: Vec<_> = figures(&printed, "loop").collect();
        assert_eq!(loops.len(), 6, "{}: {printed}", core.name);
        for (rounds, counted) in loops {
            let loading = counted.checked_sub(2 * rounds);
            assert!(
                loading.is_some_and(|it| it <= 4),
                "{}: {rounds}: {counted}",
                core.name
            );
        }
        assert_eq!(
            emulator::stdout(core, &image)?,
            printed,
            "{}: second run",
            core.name
        );
    }
    Ok(())
}

#[test]
fn instruction_counter_that_runs_out_says_so() -> Result<(), Failure> {
    for core in &CORES {
        let image = emulator::build(core, "endings", &[], &[])?;
        let limit = emulator::TIME_LIMIT;
        let output = emulator::run_within(core, &image, Some("count"), limit)?;
        match core.counter {
            emulator::Counter::SysTick(_) => {
                assert_eq!(output.status, 1, "{}: {}", core.name, output.stdout);
                assert!(
                    output.stdout.contains("too long for the timer"),
                    "{}",
                    output.stdout
                );
            }
            emulator::Counter::Retired => {
                let counted: u32 = output
                    .stdout
                    .lines()
                    .last()
                    .map_or("", |line| &line[8..])
                    .parse()
                    .unwrap();
                assert!(counted > 40_000_000, "{}: {counted}", core.name);
            }
        }
    }
    Ok(())
}

#[test]
fn stack_gauge_finds_the_deepest_word() -> Result<(), Failure> {
    for core in &CORES {
        let image = emulator::build(core, "gauges", &[], &[])?;
        let printed = emulator::stdout(core, &image)?;
        let depths: Vec<_> = figures(&printed, "stack").collect();
        assert_eq!(depths.len(), 4, "{}: {printed}", core.name);
        for (occupied, found) in depths {
            // Return addresses, saved registers and alignment of two frames.
            let frames = found.checked_sub(occupied);
            assert!(
                frames.is_some_and(|it| it <= 64),
                "{}: {occupied}: {found}",
                core.name
            );
        }
    }
    Ok(())
}

#[test]
fn exit_status_and_last_words_arrive() -> Result<(), Failure> {
    for core in &CORES {
        let image = emulator::build(core, "endings", &[], &[])?;
        for (ending, status, word) in [
            ("success", 0, "ending: success"),
            ("failure", 1, "told to fail"),
            ("panic", 101, "told to panic"),
            ("fault", 102, "cause, address"),
            ("something, else", 1, "ending: something, else"),
            (&"long".repeat(16), 1, "does not fit"),
        ] {
            let limit = emulator::TIME_LIMIT;
            let output = emulator::run_within(core, &image, Some(ending), limit)?;
            assert_eq!(
                output.status, status,
                "{}: {ending}: {}",
                core.name, output.stdout
            );
            assert!(
                output.stdout.contains(word),
                "{}: {ending}: {}",
                core.name,
                output.stdout
            );
        }
        // Told nothing, the image finds its path, which is no ending.
        let failure = emulator::stdout(core, &image).expect_err("no ending");
        assert!(
            failure.0.contains("exit status 1"),
            "{}: {failure:?}",
            core.name
        );
    }
    Ok(())
}

#[test]
fn run_that_does_not_end_is_stopped() -> Result<(), Failure> {
    let core = emulator::core("armv6m");
    let image = emulator::build(core, "endings", &[], &[])?;
    let limit = Duration::from_millis(500);
    let failure = emulator::run_within(core, &image, Some("hang"), limit).expect_err("no end");
    assert!(failure.0.contains("time limit of 0.5 s"), "{failure:?}");
    Ok(())
}

#[test]
fn emulator_that_is_missing_or_fails_is_named() {
    let core = emulator::core("armv6m");
    let missing = emulator::Core {
        emulator: "no-such-emulator",
        ..*core
    };
    let failure = emulator::run(&missing, Path::new("any")).expect_err("nothing to start");
    assert!(
        failure.0.contains("apt-get install qemu-system-arm"),
        "{failure:?}"
    );
    let failure = emulator::run(core, Path::new("no-such-image")).expect_err("nothing to load");
    assert!(failure.0.contains("no-such-image"), "{failure:?}");
}

#[test]
fn panicking_branch_does_not_link_where_none_may_be() -> Result<(), Failure> {
    let proof = &["prove-no-panic"];
    for core in &CORES {
        emulator::build(core, "checksum", proof, &[])?;
        let failure = emulator::build(core, "endings", proof, &[]).expect_err("it can panic");
        assert!(
            failure.0.contains("a_branch_that_can_panic_is_left"),
            "{failure:?}"
        );
    }
    Ok(())
}

/// Against GNU `size`, whose columns are text (constants included), data and bss.
#[test]
fn footprint_agrees_with_binutils() -> Result<(), Failure> {
    for core in &CORES {
        let image = emulator::build(core, "checksum", &[], &[])?;
        let sizes = emulator::footprint(&image)?;
        // The console's block of 1024 bytes is the only large variable.
        assert!(
            (1024..1200).contains(&sizes.ram()),
            "{}: {sizes:?}",
            core.name
        );
        assert!(sizes.flash() > 1000, "{}: {sizes:?}", core.name);
        if core.emulator != "qemu-system-arm" {
            continue; // Binutils for Arm do not read the rest.
        }
        let output = Command::new("arm-none-eabi-size")
            .arg(&image)
            .output()
            .map_err(|error| {
                Failure(format!(
                    "arm-none-eabi-size: {error}; apt-get install binutils-arm-none-eabi"
                ))
            })?;
        let table = String::from_utf8_lossy(&output.stdout).into_owned();
        let columns = table
            .lines()
            .nth(1)
            .unwrap_or_default()
            .split_whitespace()
            .take(3);
        let columns: Vec<u64> = columns.filter_map(|column| column.parse().ok()).collect();
        let ours = [
            sizes.code + sizes.constants,
            sizes.initialised,
            sizes.zeroed,
        ];
        assert_eq!(columns, ours, "{}: {table}", core.name);
    }
    Ok(())
}

#[test]
fn images_draw_no_warning() -> Result<(), Failure> {
    // One core of each family: between cores of a family no source differs.
    for name in ["armv6m", "rv32imc"] {
        emulator::lint(emulator::core(name))?;
    }
    Ok(())
}

#[test]
fn images_of_different_features_and_cores_stand_side_by_side() -> Result<(), Failure> {
    let mut images = HashSet::new();
    for core in &CORES[..2] {
        for features in [&[][..], &["float"]] {
            let image = emulator::build(core, "checksum", features, &[])?;
            assert!(image.exists());
            images.insert(image);
        }
        assert!(emulator::compiler_version(core)?.starts_with("rustc 1."));
    }
    assert_eq!(images.len(), 4);
    Ok(())
}
