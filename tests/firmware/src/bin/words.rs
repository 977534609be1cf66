//! Prints every word that the kernel gives for the images in the file that the argument names.
//!
//! The file holds, for each image, both ends of its band in hertz in four bytes each, the length
//! of the image in two, all of them little endian, and the image.
#![no_std]
#![no_main]

use stagebits_firmware::file::File;
use stagebits_firmware::points::Band;
use stagebits_firmware::words::evaluate;
use stagebits_firmware::{argument, console, entry, exit};

/// Bytes before each image.
const HEAD: usize = 10;
/// Room for an image; one of 16 stages never takes as much.
const ROOM: usize = 1024;

#[entry]
fn main() -> ! {
    let mut path = [0; 1024];
    let mut file = File::open(argument(&mut path));
    let mut room = [0; ROOM];
    loop {
        let mut head = [0; HEAD];
        match file.read(&mut head) {
            0 => exit::success(),
            HEAD => {}
            _ => exit::failure("the file ends before an image"),
        }
        let [a, b, c, d, e, f, g, h, low, high] = head;
        let band = Band {
            from: u32::from_le_bytes([a, b, c, d]),
            to: u32::from_le_bytes([e, f, g, h]),
        };
        let length = usize::from(u16::from_le_bytes([low, high]));
        let Some(image) = room.get_mut(..length) else {
            exit::failure("an image is longer than the room for it");
        };
        if file.read(image) < length {
            exit::failure("the file ends within an image");
        }
        if evaluate(image, band, |_, _, record| console::line(record.words())).is_err() {
            exit::failure("an image is refused");
        }
    }
}
