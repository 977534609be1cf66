//! A core computes the very bits of the desktop: images are decoded, resolved, walked and read on
//! every emulated core, and every word is compared with what the same kernel gives here.

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
#[path = "same_bits/coverage.rs"]
mod coverage;
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
#[path = "firmware/src/words/mod.rs"]
#[allow(
    unreachable_pub,
    reason = "public in the images, where it is a library's"
)]
mod words;

use cases::{Image, WORD_BITS, cases, file, images};
use emulator::{CORES, Core, Failure, Output};
use listing::{Difference, Extent, Line, compare, listing};
use stagebits_kernel::Scalar;
use words::Subject;

const _: () = assert!(words::CAPACITY == stagebits::constants::CAPACITY);

/// Fewest points that each core is compared at.
const POINTS: usize = 10_000;

/// Arguments of cargo for each profile that firmware is built with.
const PROFILES: [&[&str]; 2] = [&["--profile", "release"], &["--profile", "small"]];

/// Runs `words`, built with this profile for `core`, with these bytes as its file.
fn run(core: &Core, profile: &[&str], bytes: &[u8]) -> Result<Output, Failure> {
    let elf = emulator::build(core, "words", &[], profile)?;
    let mut images = tempfile::NamedTempFile::new().expect("a temporary file");
    images.write_all(bytes).expect("room for the images");
    let path = images.path().to_str().expect("a path in UTF-8");
    emulator::run_within(core, &elf, Some(path), emulator::TIME_LIMIT)
}

/// What `words` prints on `core` for these images, having ended well.
fn printed(core: &Core, profile: &[&str], images: &[Image]) -> Result<String, Failure> {
    let Output { stdout, status } = run(core, profile, &file(images))?;
    let last = stdout.lines().last().unwrap_or_default();
    assert_eq!(status, 0, "{}: {last}", core.name);
    Ok(stdout)
}

#[test]
fn cores_compute_the_words_of_the_desktop() -> Result<(), Failure> {
    let images = images(&cases());
    let desktop = listing(&images);
    for (core, profile) in CORES.iter().flat_map(|core| PROFILES.map(|it| (core, it))) {
        let what = format!("{}, {}", core.name, profile[1]);
        let printed = printed(core, profile, &images)?;
        let Extent { points, words } =
            compare(&desktop, &printed).unwrap_or_else(|it| panic!("{what}: {it}"));
        println!(
            "{what}: {points} points of {} images, {words} words: all as on the desktop",
            images.len()
        );
        assert!(points >= POINTS, "{what}: {points} points");
        let all: usize = desktop.iter().map(|line| line.words.len()).sum();
        assert_eq!(words, all, "{what}: words");
    }
    Ok(())
}

/// What the core would print, had it computed as the desktop.
fn print(lines: &[Line]) -> String {
    let mut text = String::new();
    for line in lines {
        let words: Vec<_> = line
            .words
            .iter()
            .map(|word| format!("{word:08x}"))
            .collect();
        text += &words.join(" ");
        text += "\n";
    }
    text
}

#[test]
fn comparison_finds_one_bit_and_names_its_place() {
    let desktop = listing(&images(&cases()));
    let mut printed: Vec<_> = print(&desktop).lines().map(str::to_owned).collect();
    let extent = compare(&desktop, &printed.join("\n")).unwrap_or_else(|it| panic!("{it}"));
    assert!(extent.points >= POINTS);
    let words: usize = desktop.iter().map(|line| line.words.len()).sum();
    assert_eq!(extent.words, words);

    let last = desktop.len() - 1;
    for (index, word, bit) in [
        (0, 0, 31),
        (1, 2, 0),
        (last / 2, 3, 7),
        (last, 17, 0),
        (last, 0, 30),
    ] {
        let Line {
            place,
            names,
            words,
        } = &desktop[index];
        let word = word % words.len();
        let (here, there) = (words[word], words[word] ^ 1 << bit);
        let digits = 9 * word..9 * word + 8;
        printed[index].replace_range(digits.clone(), &format!("{there:08x}"));
        let found = compare(&desktop, &printed.join("\n")).expect_err("a bit differs");
        let expected = Difference::Word {
            place: place.clone(),
            name: names[word],
            here,
            there,
        };
        assert_eq!(*found, expected);
        printed[index].replace_range(digits, &format!("{here:08x}"));
    }
}

#[test]
fn comparison_finds_lines_too_many_too_few_and_garbled() {
    let cases = cases();
    let desktop = listing(&[cases[0].image(32, |constant| constant)]);
    let whole = print(&desktop);
    let fails = |printed: &str| *compare(&desktop, printed).expect_err("the text differs");
    let place = |index: usize| desktop[index].place.clone();

    let end = whole.trim_end().rfind('\n').expect("many lines");
    let found = None;
    let place_of_last = place(desktop.len() - 1);
    assert_eq!(
        fails(&whole[..end]),
        Difference::Line {
            place: place_of_last,
            found
        }
    );
    let (first, rest) = whole.split_once('\n').expect("many lines");
    for garbled in [&first[9..], &format!("{first} 00000000"), "", "0000000g"] {
        let found = Some(garbled.to_owned());
        assert_eq!(
            fails(&format!("{garbled}\n{rest}")),
            Difference::Line {
                place: place(0),
                found
            }
        );
    }
    assert_eq!(
        fails(&format!("{whole}{first}\n")),
        Difference::Surplus(first.to_owned())
    );
}

/// One bit in the last place of one constant shows, at its chain and nowhere before.
#[test]
fn constant_of_another_last_bit_is_found_on_the_core() -> Result<(), Failure> {
    let core = emulator::core("armv6m");
    let cases = cases();
    for word_bits in WORD_BITS {
        let mut images: Vec<_> = cases[..3]
            .iter()
            .map(|case| case.image(word_bits, |constant| constant))
            .collect();
        let desktop = listing(&images);
        let mut first = true;
        images[1] = cases[1].image(word_bits, |constant| {
            if constant.is_zero() || !std::mem::take(&mut first) {
                return constant;
            }
            let mantissa = constant.mantissa() ^ 1 << (32 - word_bits);
            Scalar::from_parts(mantissa, constant.exponent()).expect("normalised as before")
        });
        let printed = printed(core, PROFILES[0], &images)?;
        let found = compare(&desktop, &printed).expect_err("a constant differs");
        let Difference::Word { place, .. } = *found else {
            panic!("{found}");
        };
        let expected = (&cases[1].name, word_bits, Subject::Step(0));
        assert_eq!((&place.chain, place.word_bits, place.subject), expected);
        // The core computes what the desktop makes of the same constant.
        compare(&listing(&images), &printed).unwrap_or_else(|it| panic!("{it}"));
    }
    Ok(())
}

#[test]
fn damaged_image_is_refused_on_the_core() -> Result<(), Failure> {
    let core = emulator::core("armv6m");
    let image = cases()[0].image(16, |constant| constant);
    let whole = file(std::slice::from_ref(&image));
    let mut damaged = whole.clone();
    let last = damaged.len() - 1;
    damaged[last] ^= 1;
    let mut tail = whole.clone();
    tail.extend([0; 3]);
    for (bytes, reason) in [
        (&damaged[..], "an image is refused"),
        (&whole[..last], "the file ends within an image"),
        (&tail[..], "the file ends before an image"),
    ] {
        let Output { stdout, status } = run(core, PROFILES[0], bytes)?;
        assert_eq!((stdout.lines().last(), status), (Some(reason), 1));
    }
    Ok(())
}
