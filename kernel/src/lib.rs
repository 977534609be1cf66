#![doc = include_str!("../README.md")]
//!
//! # Example
//!
//! ```
//! use stagebits_kernel::{Chain, Frequency, Gamma, Scalar, State};
//! use stagebits_kernel::{Branch, Complex, Law, Position, Stage};
//!
//! // A series coil of 1 µH on 50 ohms: z = j f · 2π·1e-6/50, and 2π·1e-6/50 = m · 2^-53
//! let rising = Complex {
//!     re: Scalar::ZERO,
//!     im: Scalar::from_parts(1_131_878_040, -53).unwrap(),
//! };
//! let coil = Branch {
//!     position: Position::Series,
//!     inverted: false,
//!     law: Law { rising, ..Law::ZERO },
//!     beside: None,
//! };
//! let chain = Chain::<Scalar, 1>::new(&[Stage::Branch(coil)]).unwrap();
//!
//! let point = chain.at::<i32>(&Frequency::new(7_000_000));
//! let input = point.walk(State::from_load(Gamma::MATCHED));
//! let (resistance, reactance) = input.moments().milliohms(50_000);
//! assert_eq!((resistance, reactance), (50_000, 43_982)); // 2π · 7 MHz · 1 µH = 43.982 ohm
//! ```
//!
//! # Features
//! - `float`: the same stages over `f32` and `f64`.
//! - `defmt`: `defmt::Format` on every public type, numbers as the words that they are.
#![cfg_attr(not(test), no_std)]
#![forbid(unsafe_code)]

mod angle;
mod chain;
pub mod correction;
#[cfg(feature = "float")]
mod float;
#[cfg(feature = "defmt")]
mod format;
mod frequency;
mod hyperbolic;
pub mod image;
mod immittance;
mod logarithm;
mod product;
mod readout;
mod real;
mod root;
mod scalar;
mod stage;
mod state;
mod switched;
#[cfg(test)]
mod testing;
mod two_port;
mod walk;
mod word;

pub use chain::{Chain, ChainError, Resolved};
#[cfg(feature = "float")]
pub use float::FloatState;
pub use frequency::Frequency;
pub use immittance::Immittance;
pub use readout::{ChainMatrix, Decibels, Drive, Gamma, Moments, Scattering, Swr};
pub use real::{Complex, Real};
pub use scalar::Scalar;
pub use stage::{
    BANK_STEPS_MAX, Bank, BankElement, BankStep, Branch, Law, Line, LossyReactor, Position, Stage,
    Step, StepForm, Stub, StubFunction, Transformer,
};
pub use state::State;
pub use switched::Switched;
pub use two_port::{TwoPort, TwoPortWords};
pub use walk::Walk;
pub use word::{Bits, DoubleWord, Word, round_shift};
