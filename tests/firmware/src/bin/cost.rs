//! Counts the instructions of the kernel's work on the seven-stage chain, and of the same work in
//! floating point beside it. One line `name count` each; spreads as `name smallest largest`.
#![no_std]
#![no_main]

use core::hint::black_box;

use stagebits_firmware::seven_stages::{chain, scalar};
use stagebits_firmware::{console, count, entry, exit, print};
use stagebits_kernel::{
    Chain, Complex, FloatState, Frequency, Gamma, Immittance, Resolved, Scalar, State, Step,
    TwoPort, Walk, Word,
};

/// Frequencies and loads that spreads are taken over.
const FREQUENCIES: [u32; 5] = [2_000_000, 3_600_000, 7_100_000, 9_950_000, 12_000_000];
const LOADS: [(i32, i32); 6] = [
    (0, 0),
    (500_000_000, -700_000_000),
    (-878_000_000, 10_000_000),
    (878_000_000, 3),
    (-300_000_000, 123_456_789),
    (1_000_000, 860_000_000),
];

#[inline(never)]
fn walk<W: Word>(point: &Resolved<Immittance<W>, 7>, load: Gamma) -> State<W> {
    point.walk(State::from_load(load))
}

#[inline(never)]
fn walk_float(point: &Resolved<Complex<f32>, 7>, load: Complex<f32>) -> FloatState<f32> {
    point.walk(FloatState::from_load(load))
}

#[inline(never)]
fn resolve<W: Word>(chain: &Chain<Scalar, 7>, hertz: u32) -> Resolved<Immittance<W>, 7> {
    chain.at(&Frequency::new(hertz))
}

#[inline(never)]
fn whole<W: Word>(chain: &Chain<Scalar, 7>, hertz: u32, load: Gamma) -> (Gamma, u32) {
    let point = chain.at::<W>(&Frequency::new(hertz));
    let moments = point.walk(State::from_load(load)).moments();
    (moments.gamma(), moments.swr().bits())
}

#[inline(never)]
fn resolve_float(chain: &Chain<f32, 7>, hertz: u32) -> Resolved<Complex<f32>, 7> {
    chain.at_float(&Frequency::new(hertz))
}

#[inline(never)]
fn whole_float(chain: &Chain<f32, 7>, hertz: u32, load: Complex<f32>) -> (Complex<f32>, f32) {
    let point = chain.at_float(&Frequency::new(hertz));
    let gamma = point.walk(FloatState::from_load(load)).gamma();
    let magnitude = libm::sqrtf(gamma.re * gamma.re + gamma.im * gamma.im);
    (gamma, (1.0 + magnitude) / (1.0 - magnitude))
}

type C32 = num_complex::Complex<f32>;
type Matrix = [[C32; 2]; 2];

fn matrix(step: &Step<Complex<f32>>) -> Matrix {
    let (one, zero) = (C32::new(1.0, 0.0), C32::new(0.0, 0.0));
    let c = |z: &Complex<f32>| C32::new(z.re, z.im);
    match step {
        Step::Series(z) => [[one, c(z)], [zero, one]],
        Step::Shunt(y) => [[one, zero], [c(y), one]],
        Step::Tee { series, shunt } => {
            let (z, y) = (c(series), c(shunt));
            let a = one + z * y;
            [[a, z * (one + a)], [y, a]]
        }
        Step::Stretch { ratio, inverse } => [[c(ratio), zero], [zero, c(inverse)]],
        Step::TwoPort(TwoPort { a, b, c: y, d }) => [[c(a), c(b)], [c(y), c(d)]],
    }
}

#[inline(never)]
fn products(matrices: &[Matrix; 7], load: C32) -> C32 {
    let mut whole = matrices[0];
    for next in &matrices[1..] {
        let [[a, b], [c, d]] = whole;
        let [[e, f], [g, h]] = *next;
        whole = [
            [a * e + b * g, a * f + b * h],
            [c * e + d * g, c * f + d * h],
        ];
    }
    let one = C32::new(1.0, 0.0);
    let (v, i) = (one + load, one - load);
    let [[a, b], [c, d]] = whole;
    let (v, i) = (a * v + b * i, c * v + d * i);
    (v - i) / (v + i)
}

#[inline(never)]
fn product(a: i32, b: i32) -> i64 {
    a.times(b)
}

fn spread(name: &str, mut work: impl FnMut(u32, Gamma) -> u32) {
    let (mut smallest, mut largest) = (u32::MAX, 0);
    for hertz in FREQUENCIES {
        for (re, im) in LOADS {
            let count = work(hertz, Gamma { re, im });
            smallest = smallest.min(count);
            largest = largest.max(count);
        }
    }
    print!("{name} {smallest} {largest}\n");
}

fn fixed<W: Word>(bits: &str) {
    let chain = chain(scalar);
    spread(&concat(bits, "walk"), |hertz, load| {
        let point = resolve::<W>(&chain, hertz);
        count::instructions(|| {
            black_box(walk(black_box(&point), black_box(load)));
        })
    });
    for (index, step) in resolve::<W>(&chain, FREQUENCIES[2])
        .steps()
        .iter()
        .enumerate()
    {
        let mut state = State::<W>::from_load(Gamma {
            re: 1 << 28,
            im: -(1 << 29),
        });
        let count = count::instructions(|| black_box(&mut state).pass(black_box(step)));
        print!("{bits} step-{index} {count}\n");
    }
    print!(
        "{bits} load {}\n",
        count::instructions(|| {
            black_box(State::<W>::from_load(black_box(Gamma {
                re: 1 << 28,
                im: -(1 << 29),
            })));
        })
    );
    spread(&concat(bits, "resolve"), |hertz, _| {
        count::instructions(|| {
            black_box(resolve::<W>(black_box(&chain), black_box(hertz)));
        })
    });
    spread(&concat(bits, "readout-gamma"), |hertz, load| {
        let state = walk(&resolve::<W>(&chain, hertz), load);
        count::instructions(|| {
            black_box(black_box(&state).gamma());
        })
    });
    spread(&concat(bits, "whole"), |hertz, load| {
        count::instructions(|| {
            black_box(whole::<W>(
                black_box(&chain),
                black_box(hertz),
                black_box(load),
            ));
        })
    });
}

fn float() {
    let chain = chain(|x| x as f32);
    let to_float = |load: Gamma| {
        let unit = 1.0 / (1 << 30) as f32;
        Complex {
            re: load.re as f32 * unit,
            im: load.im as f32 * unit,
        }
    };
    spread("f32 walk", |hertz, load| {
        let point = resolve_float(&chain, hertz);
        let load = to_float(load);
        count::instructions(|| {
            black_box(walk_float(black_box(&point), black_box(load)));
        })
    });
    spread("f32 products", |hertz, load| {
        let point = resolve_float(&chain, hertz);
        let load = to_float(load);
        let mut matrices = [[[C32::new(0.0, 0.0); 2]; 2]; 7];
        for (to, step) in matrices.iter_mut().zip(point.steps()) {
            *to = matrix(step);
        }
        let load = C32::new(load.re, load.im);
        count::instructions(|| {
            black_box(products(black_box(&matrices), black_box(load)));
        })
    });
    spread("f32 whole", |hertz, load| {
        let load = to_float(load);
        count::instructions(|| {
            black_box(whole_float(
                black_box(&chain),
                black_box(hertz),
                black_box(load),
            ));
        })
    });
}

/// Two short texts in one.
fn concat(bits: &str, name: &str) -> heapless::String<32> {
    let mut text = heapless::String::new();
    let _ = text.push_str(bits);
    let _ = text.push_str(" ");
    let _ = text.push_str(name);
    text
}

#[entry]
fn main() -> ! {
    fixed::<i32>("w32");
    fixed::<i16>("w16");
    float();
    let isolated = count::instructions(|| {
        black_box(product(black_box(123_456_789), black_box(-987_654_321)));
    });
    console::figure("product", u64::from(isolated));
    exit::success()
}
