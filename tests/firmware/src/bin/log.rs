//! Logs the seven-stage chain, a few points of it from the load to the readouts, and an error.
#![no_std]
#![no_main]

use defmt::info;
use defmt_semihosting as _;
use stagebits_firmware::seven_stages::{chain, scalar};
use stagebits_firmware::{entry, exit, logged};
use stagebits_kernel::{Chain, Frequency, Gamma, Scalar, State, Word, image};

fn point<W: Word>(chain: &Chain<Scalar, 7>, hertz: u32, load: Gamma) {
    let frequency = Frequency::new(hertz);
    let point = chain.at::<W>(&frequency);
    let input = point.walk(State::from_load(load));
    let moments = input.moments();
    info!(
        "word length {}, frequency {}, load {}",
        W::BITS,
        frequency,
        load
    );
    info!("point {}", point);
    info!("input {}", input);
    info!("reflection {}, {}", moments.gamma(), moments.swr());
    info!(
        "impedance {}, return loss {}",
        moments.impedance(),
        moments.return_loss()
    );
}

#[entry]
fn main() -> ! {
    let chain = chain(scalar);
    info!("{}", chain);
    for (hertz, load) in logged::POINTS {
        point::<i32>(&chain, hertz, load);
        point::<i16>(&chain, hertz, load);
    }
    info!("{}", image::decode::<7, 0>(b"no image at all"));
    exit::success()
}
