//! Chains with published results, through the kernel.

use stagebits::arithmetic::to_complex;
use stagebits::constants;
use stagebits::reference::{self, State};
use stagebits_kernel::{Bits, Swr, Word};

use crate::bound::{Trace, readout_bound};
use crate::case::Case;
use crate::moves::Move;
use crate::published::{Chain, Expected, Figure, Quantity, chains, tolerance};

/// A chain with the walk of each of its cases.
type Walked<W> = (Chain, Vec<(Case<W>, Trace<W>)>);

/// Every load and frequency of every chain.
fn cases<W: Word>() -> Vec<Walked<W>> {
    let walk = |chain: &Chain| {
        let cases = chain.cases.iter().map(|case| {
            let point = Case::new(&chain.plan, case.hertz);
            let trace = point.forward(case.load.gamma(chain.plan.reference));
            (point, trace)
        });
        cases.collect()
    };
    let walked = chains().into_iter().map(|chain| {
        let cases = walk(&chain);
        (chain, cases)
    });
    walked.collect()
}

/// What a published value leaves open by itself.
fn slack(expected: &Expected, scale: f64) -> (f64, f64) {
    match *expected {
        Expected::Printed(printed) => {
            let figure = printed.parse().expect("a printed figure is a number");
            let edge = 1.0 + tolerance::PRINTED_EDGE;
            (figure, tolerance::half_unit(printed) * edge)
        }
        Expected::Exact(exact) | Expected::Misprinted { exact, .. } => {
            (exact, tolerance::EXACT * exact.abs().max(scale))
        }
    }
}

/// Both comparisons of one figure; `None` where it does not follow from the state, or where its
/// bound is infinite: the angle of a match, the standing wave ratio of total reflection.
fn check<W: Word>(
    figure: &Figure,
    input: &State,
    trace: &Trace<W>,
    r0: f64,
) -> Option<Result<(), String>> {
    let quantity = figure.quantity;
    let value = quantity.of_state(&trace.word_state(), r0)?;
    let exact = quantity.of_state(input, r0)?;
    let bound = trace.figure_bound(quantity, r0);
    if !bound.is_finite() {
        return None;
    }
    let (published, slack) = slack(&figure.expected, quantity.scale(r0));
    let distance = |from: f64| {
        let distance = (value - from).abs();
        match quantity {
            Quantity::GammaDegrees => distance.min(360.0 - distance),
            _ => distance,
        }
    };
    // written so that a value that is not a number fails
    Some(
        if distance(exact) <= bound && distance(published) <= bound + slack {
            Ok(())
        } else {
            Err(format!(
                "{quantity:?}: {value:e}, reference {exact:e}, published {published:e}, bound {bound:e}"
            ))
        },
    )
}

fn figures_agree<W: Word>() {
    let (mut checked, mut unbounded, mut faults) = (0, 0, String::new());
    for (chain, traces) in cases::<W>() {
        let r0 = chain.plan.reference;
        for (case, (point, trace)) in chain.cases.iter().zip(&traces) {
            let input = point.exact.input_state(case.load.gamma(r0));
            for figure in &case.figures {
                if figure.quantity.of_state(&input, r0).is_none() {
                    continue;
                }
                match check(figure, &input, trace, r0) {
                    None => unbounded += 1,
                    Some(outcome) => {
                        checked += 1;
                        if let Err(fault) = outcome {
                            let title = &chain.plan.title;
                            faults += &format!("{title} at {} Hz: {fault}\n", case.hertz);
                        }
                    }
                }
            }
        }
    }
    assert!(faults.is_empty(), "{} bits:\n{faults}", W::BITS);
    assert!(
        checked > 10 * unbounded,
        "{checked} checked, {unbounded} not"
    );
}

/// Γ, impedance and standing wave ratio as the kernel reads them out.
fn readouts_agree<W: Word>() {
    for (chain, traces) in cases::<W>() {
        let title = &chain.plan.title;
        for (case, (point, trace)) in chain.cases.iter().zip(&traces) {
            let load = case.load.gamma(chain.plan.reference);
            let input = point.exact.input_state(load);
            let exact = input.gamma();
            let moments = trace.words.moments();
            let gamma = to_complex(moments.gamma());
            let bound = trace.gamma_bound() + readout_bound(gamma);
            let error = (gamma - exact).norm();
            assert!(
                error <= bound,
                "{title}: Γ {gamma}, {exact}, {error:e} > {bound:e}"
            );

            let bound = trace.impedance_bound();
            if bound.is_finite() {
                let z = moments.impedance().map(constants::value);
                let exact = input.impedance(1.0);
                for (read, exact) in [(z.re, exact.re), (z.im, exact.im)] {
                    let bound = bound + read.abs() * READ_IMPEDANCE;
                    let error = (read - exact).abs();
                    assert!(
                        error <= bound,
                        "{title}: z {read}, {exact}, {error:e} > {bound:e}"
                    );
                }
            }

            let exact = reference::swr(exact.norm());
            let bound = trace.figure_bound(Quantity::Swr, 1.0);
            let read = f64::from(moments.swr().bits()) / f64::from(1 << Swr::FRACTION_BITS);
            if bound.is_finite() && exact < 32_000.0 {
                let bound = bound + 0.5 / f64::from(1 << Swr::FRACTION_BITS) + read * READ_SWR;
                let error = (read - exact).abs();
                assert!(
                    error <= bound,
                    "{title}: SWR {read}, {exact}, {error:e} > {bound:e}"
                );
            }
        }
    }
}

/// Relative error of reading an impedance from a state, as the kernel's documentation states.
const READ_IMPEDANCE: f64 = 1.0 / (1 << 29) as f64;

/// The same of the standing wave ratio before its last rounding: eight scalar roundings.
const READ_SWR: f64 = 1.0 / (1 << 28) as f64;

/// How close the bound has to be at one word length.
struct Closeness {
    /// Of bound over error, over all cases.
    median: f64,
    /// Bound of Γ, per multiplication and in half units of a word of one, of a chain on which
    /// nothing resonates. The state alone takes up to 8: four words at half of the window, seen
    /// from the input. At 32 bits the scalars are as coarse as the words and add their own.
    per_multiplication: f64,
}

/// A bound that is far above every error would let wrong results pass.
fn bound_is_close<W: Word>() {
    let Closeness {
        median,
        per_multiplication,
    } = if W::BITS == 32 {
        Closeness {
            median: 15.0,
            per_multiplication: 24.0,
        }
    } else {
        Closeness {
            median: 9.0,
            per_multiplication: 8.0,
        }
    };
    let (mut ratios, mut well_conditioned) = (Vec::new(), 0);
    for (chain, traces) in cases::<W>() {
        for (case, (point, trace)) in chain.cases.iter().zip(traces) {
            let load = case.load.gamma(chain.plan.reference);
            let error = (trace.word_state().gamma() - point.exact.input_gamma(load)).norm();
            let bound = trace.gamma_bound();
            let title = &chain.plan.title;
            assert!(error <= bound, "{title}: {error:e} > {bound:e}");
            ratios.push(bound / error);
            if trace.conditioning() <= 1.0 {
                well_conditioned += 1;
                let half_unit = f64::from(1 - W::BITS as i32).exp2();
                let moves = point.moves.iter().flatten();
                let multiplications: usize = moves.map(Move::multiplications).sum();
                let bound = bound / half_unit / (multiplications + 1) as f64;
                assert!(bound <= per_multiplication, "{title}: {bound}");
            }
        }
    }
    ratios.sort_by(f64::total_cmp);
    let found = ratios[ratios.len() / 2];
    assert!(found <= median, "{found}");
    assert!(well_conditioned > ratios.len() / 4, "{well_conditioned}");
}

macro_rules! at_widths {
    ($($check:ident: $word:ty => $name:ident;)*) => {
        $(#[test]
        fn $name() {
            $check::<$word>();
        })*
    };
}

at_widths! {
    figures_agree: i16 => published_figures_in_16_bits;
    figures_agree: Bits<24> => published_figures_in_24_bits;
    figures_agree: i32 => published_figures_in_32_bits;
    readouts_agree: i16 => readouts_in_16_bits;
    readouts_agree: Bits<24> => readouts_in_24_bits;
    readouts_agree: i32 => readouts_in_32_bits;
    bound_is_close: i16 => bound_is_close_in_16_bits;
    bound_is_close: Bits<24> => bound_is_close_in_24_bits;
    bound_is_close: i32 => bound_is_close_in_32_bits;
}
