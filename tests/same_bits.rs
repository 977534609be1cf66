//! A core computes the very bits of the desktop: images are decoded, resolved, walked and read on
//! every emulated core, and every word is compared with what the same kernel gives here.

use std::collections::{BTreeSet, HashSet};
use std::io::Write;

#[path = "same_bits/cases.rs"]
mod cases;
#[path = "firmware/src/checksum.rs"]
#[allow(
    dead_code,
    unreachable_pub,
    reason = "public in the images, where it is a library's"
)]
mod checksum;
#[path = "common/emulator.rs"]
mod emulator;
#[path = "same_bits/listing.rs"]
mod listing;
#[path = "firmware/src/points.rs"]
#[allow(
    unreachable_pub,
    reason = "public in the images, where it is a library's"
)]
mod points;
#[path = "firmware/src/words.rs"]
#[allow(
    unreachable_pub,
    reason = "public in the images, where it is a library's"
)]
mod words;

use cases::{Image, WORD_BITS, cases, file, images};
use emulator::{CORES, Core, Failure, Output};
use listing::{Difference, Extent, Line, compare, listing};
use stagebits::arithmetic::{Block, Double, to_complex};
use stagebits_kernel::{
    Gamma, Immittance, Position, Scalar, Stage, State, StubFunction, Transformer,
};
use words::Subject;

const _: () = assert!(words::CAPACITY == stagebits::constants::CAPACITY);

/// Fewest points that each core is compared at.
const POINTS: usize = 10_000;

/// Runs `words` on `core` with these bytes as its file.
fn run(core: &Core, bytes: &[u8]) -> Result<Output, Failure> {
    let elf = emulator::build(core, "words", &[], &[])?;
    let mut images = tempfile::NamedTempFile::new().expect("a temporary file");
    images.write_all(bytes).expect("room for the images");
    let path = images.path().to_str().expect("a path in UTF-8");
    emulator::run_within(core, &elf, Some(path), emulator::TIME_LIMIT)
}

/// What `words` prints on `core` for these images, having ended well.
fn printed(core: &Core, images: &[Image]) -> Result<String, Failure> {
    let Output { stdout, status } = run(core, &file(images))?;
    let last = stdout.lines().last().unwrap_or_default();
    assert_eq!(status, 0, "{}: {last}", core.name);
    Ok(stdout)
}

#[test]
fn cores_compute_the_words_of_the_desktop() -> Result<(), Failure> {
    let images = images(&cases());
    let desktop = listing(&images);
    for core in &CORES {
        let printed = printed(core, &images)?;
        let Extent { points, words } =
            compare(&desktop, &printed).unwrap_or_else(|it| panic!("{}: {it}", core.name));
        println!(
            "{}: {points} points of {} images, {words} words: all as on the desktop",
            core.name,
            images.len()
        );
        assert!(points >= POINTS, "{}: {points} points", core.name);
        let at_points = Subject::Point(Gamma::MATCHED).names().len() * points;
        assert!(words > at_points, "{}: {words} words", core.name);
    }
    Ok(())
}
