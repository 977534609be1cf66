//! Conversions, gains and stresses that are no plain figure of a chain.

use crate::published::build::stage;
use crate::published::tolerance::{exact, printed};
use crate::published::{Chain, FRICKEY_TITLE, L_SECTION_TITLE, STANDING_WAVE_TITLE, chains};
use num_complex::Complex;
use stagebits::plan::{DECIBELS_PER_NEPER, Line, Part, SPEED_OF_LIGHT};
use stagebits::reference::{
    Matrix, Reference, SParameters, State, chain_matrix, gamma_from_impedance,
    gamma_magnitude_from_swr, impedance_from_gamma, mismatch_loss_db, return_loss_db, stage_matrix,
    swr,
};
use std::f64::consts::TAU;

type Verdict = Result<(), String>;

fn chain(title: &str) -> Chain {
    chains()
        .into_iter()
        .find(|chain| chain.plan.title == title)
        .expect("a chain of the table")
}

/// The standard conversion table (formulas in Reference Data for Engineers, 9th ed., ch. 29);
/// figures from memory: SWR, |Γ|, return loss, mismatch loss, reflected power in percent.
#[test]
fn swr_table() -> Verdict {
    let rows = [
        (1.1, ["0.048", "26.44", "0.010", "0.2"]),
        (1.2, ["0.091", "20.83", "0.036", "0.8"]),
        (1.3, ["0.130", "17.69", "0.075", "1.7"]),
        (1.4, ["0.167", "15.56", "0.122", "2.8"]),
        (2.5, ["0.429", "7.36", "0.881", "18.4"]),
        (3.0, ["0.500", "6.02", "1.249", "25.0"]),
        (4.0, ["0.600", "4.44", "1.938", "36.0"]),
        (5.0, ["0.667", "3.52", "2.553", "44.4"]),
        (6.0, ["0.714", "2.92", "3.100", "51.0"]),
        (8.0, ["0.778", "2.18", "4.033", "60.5"]),
        (10.0, ["0.818", "1.74", "4.807", "66.9"]),
    ];
    for (ratio, [gamma, return_loss, mismatch_loss, reflected]) in rows {
        let magnitude = gamma_magnitude_from_swr(ratio);
        printed(magnitude, gamma)?;
        printed(return_loss_db(magnitude), return_loss)?;
        printed(mismatch_loss_db(magnitude), mismatch_loss)?;
        printed(100.0 * magnitude * magnitude, reflected)?;
        exact(swr(magnitude), ratio, 0.0)?;
        // And through an impedance: R0·S has that SWR.
        let gamma = gamma_from_impedance(Complex::from(50.0 * ratio), 50.0);
        exact(gamma.norm(), magnitude, 0.0)?;
        exact(impedance_from_gamma(gamma, 50.0).re, 50.0 * ratio, 0.0)?;
    }
    // Selected rows to full precision.
    exact(
        return_loss_db(gamma_magnitude_from_swr(1.1)),
        26.444385894678387,
        0.0,
    )?;
    exact(
        mismatch_loss_db(gamma_magnitude_from_swr(1.1)),
        0.00985912981651105,
        0.0,
    )?;
    exact(
        return_loss_db(gamma_magnitude_from_swr(10.0)),
        1.7430035143780034,
        0.0,
    )?;
    exact(
        mismatch_loss_db(gamma_magnitude_from_swr(10.0)),
        4.807253789884877,
        0.0,
    )
}

/// The ends of the scale: match, open, short.
#[test]
fn ends_of_the_scale() {
    assert_eq!(swr(0.0), 1.0);
    assert_eq!(swr(1.0), f64::INFINITY);
    assert_eq!(gamma_magnitude_from_swr(f64::INFINITY), 1.0);
    assert_eq!(return_loss_db(0.0), f64::INFINITY);
    assert_eq!(mismatch_loss_db(1.0), f64::INFINITY);
    let open = State::from_gamma(Complex::new(1.0, 0.0));
    assert_eq!(open.impedance(50.0).re, f64::INFINITY);
    assert_eq!(open.admittance(50.0), Complex::new(0.0, 0.0));
    let short = State::from_gamma(Complex::new(-1.0, 0.0));
    assert_eq!(short.impedance(50.0), Complex::new(0.0, 0.0));
    assert_eq!(short.admittance(50.0).re, f64::INFINITY);
}

/// ISO 80000-3, from memory: 1 Np = 8.686 dB, 1 dB = 0.1151 Np.
#[test]
fn neper_and_decibel() -> Verdict {
    printed(DECIBELS_PER_NEPER, "8.686")?;
    printed(1.0 / DECIBELS_PER_NEPER, "0.1151")?;
    exact(DECIBELS_PER_NEPER, 8.685889638065037, 0.0)
}

/// Velocity factor 1/√εr: 0.665 for polyethylene (2.26), 0.69 for PTFE (2.1), cable catalogues
/// and The ARRL Handbook, from memory. A line of one wavelength in the dielectric is one turn.
#[test]
fn velocity_factor_of_dielectrics() -> Verdict {
    for (permittivity, printed_factor) in [(2.26_f64, "0.665"), (2.1, "0.69")] {
        let velocity = 1.0 / permittivity.sqrt();
        printed(velocity, printed_factor)?;
        let hertz = 1e8;
        let wavelength = Line {
            impedance: 50.0,
            length: SPEED_OF_LIGHT / permittivity.sqrt() / hertz,
            velocity,
            k1: 0.0,
            k2: 0.0,
        };
        let matrix = stage_matrix(&stage(Part::Line(wavelength)), hertz);
        exact(matrix.a.re, 1.0, 1.0)?;
        exact(matrix.b.im, 0.0, 50.0)?;
    }
    Ok(())
}

/// B. D. H. Tellegen, The gyrator, a new electric network element, Philips Res. Rep. 3 (1948)
/// 81-101, from memory: [0 R; 1/R 0] has determinant −1, so S12 = −S21.
#[test]
fn gyrator_is_not_reciprocal() -> Verdict {
    let (zero, r) = (Complex::from(0.0), Complex::from(50.0));
    let gyrator = Matrix {
        a: zero,
        b: r,
        c: r.inv(),
        d: zero,
    };
    exact(gyrator.determinant().re, -1.0, 0.0)?;
    let s = SParameters::from_normalised(&gyrator.normalised(50.0));
    exact(s.s21.re, 1.0, 0.0)?;
    exact(s.s12.re, -1.0, 0.0)?;
    exact(s.s11.norm(), 0.0, 1.0)
}

/// D. A. Frickey, IEEE Trans. MTT 42(2), Feb. 1994, 205-211, Table I, from memory, values computed:
/// the three-stage chain between 30 + j40 and 75 − j25 ohm. |S21|² is the transducer gain
/// (K. Kurokawa, IEEE Trans. MTT 13, 1965).
#[test]
fn gain_between_complex_impedances() -> Verdict {
    let chain = chain(FRICKEY_TITLE);
    let hertz = f64::from(chain.plan.band.from);
    let matrix = chain_matrix(&chain.plan.stages, hertz);
    let (source, load) = (Complex::new(30.0, 40.0), Complex::new(75.0, -25.0));
    let gain = matrix.transducer_gain(source, load);
    exact(gain, 0.6457986278658825, 0.0)?;
    exact(10.0 * gain.log10(), -1.899028820672448, 0.0)?;
    let s21 = Complex::new(-0.22569104006566343, -0.7712730919071153);
    exact(gain, s21.norm_sqr(), 0.0)?;
    // Power-wave reflection at either end from the impedance seen there.
    let input = matrix.input_impedance(load);
    let s11 = (input - source.conj()) / (input + source);
    exact(s11.re, 0.3105351378335508, 1.0)?;
    exact(s11.im, 0.4247609463274961, 1.0)?;
    let output = matrix.output_impedance(source);
    exact(output.re, 45.759607084987906, 0.0)?;
    exact(output.im, -32.387449165959, 0.0)?;
    let s22 = (output - load.conj()) / (output + load);
    exact(s22.re, -0.0132991917029265, 1.0)?;
    exact(s22.im, -0.4815406182369731, 1.0)
}

/// Transmission of the same chain the other way has the same gain, as reciprocity has it:
/// S12 = S21 and S parameters of the two renderings agree.
#[test]
fn scattering_agrees_with_ohmic_gain() -> Verdict {
    let chain = chain(FRICKEY_TITLE);
    let hertz = f64::from(chain.plan.band.from);
    let r0 = Complex::from(chain.plan.reference);
    let point = Reference::new(&chain.plan).at(hertz);
    let s = point.s_parameters();
    let matrix = chain_matrix(&chain.plan.stages, hertz);
    exact(s.s21.norm_sqr(), matrix.transducer_gain(r0, r0), 0.0)?;
    exact(
        s.s21.norm_sqr(),
        point.transducer_gain(Complex::from(0.0)),
        0.0,
    )?;
    let general = SParameters::from_normalised(point.chain());
    exact(general.s12.re, s.s12.re, 1.0)?;
    exact(general.s12.im, s.s12.im, 1.0)
}

/// M. N. O. Sadiku, Elements of Electromagnetics, Example 11.2, from memory: distortionless line,
/// Z0 = 60 ohm, 20 mNp/m, u = 1.8e8 m/s at 100 MHz. A millimetre of it, shorted and open, shows
/// R + jωL and G + jωC per metre but for (γl)²/3 = 4e-6.
#[test]
fn distortionless_line_per_metre() -> Verdict {
    let hertz = 100e6;
    let millimetre = Line {
        impedance: 60.0,
        length: 1e-3,
        velocity: 1.8e8 / SPEED_OF_LIGHT,
        k1: 0.0,
        k2: 0.020 / hertz,
    };
    let matrix = stage_matrix(&stage(Part::Line(millimetre)), hertz);
    let per_metre = 1e3;
    let shorted = matrix.b / matrix.d * per_metre;
    let open = matrix.c / matrix.a * per_metre;
    let omega = TAU * hertz;
    printed(shorted.re, "1.2")?;
    printed(shorted.im / omega, "333e-9")?;
    printed(open.re, "333e-6")?;
    printed(open.im / omega, "92.59e-12")?;
    let wavelength = 1.0 / (millimetre.delay() * per_metre * hertz);
    printed(wavelength, "1.8")
}

/// The ARRL Antenna Book, 20th ed., ch. 24, figures from memory: 1500 W at SWR 3 on 50 ohm gives
/// √(P·Z0·S) and √(P·S/Z0) at the maxima, √(P·Z0) and √(P/Z0) when matched, all RMS.
#[test]
fn voltage_and_current_on_a_line() -> Verdict {
    let chain = chain(STANDING_WAVE_TITLE);
    let watts = 1500.0;
    let [input, load] = stresses(&chain, Complex::from(150.0), watts)[..] else {
        return Err("one stage has two ports".to_owned());
    };
    printed(load.0, "474")?;
    exact(load.0, 474.3416490252569, 0.0)?;
    printed(input.1, "9.49")?;
    exact(input.1, 9.486832980505138, 0.0)?;
    exact(input.0, 158.11388300841898, 0.0)?;
    let matched = stresses(&chain, Complex::from(50.0), watts);
    printed(matched[0].0, "273.9")?;
    printed(matched[0].1, "5.48")?;
    printed(matched[0].0 * std::f64::consts::SQRT_2, "387.3")
}

/// Closed form from the L-section design equations and Ohm's law (no single source), 100 W from 50
/// to 1250 ohm: the series coil carries the source current, the capacitor stands across the load,
/// and both take Q·P volt-amperes.
#[test]
fn stress_in_an_l_section() -> Verdict {
    let chain = chain(L_SECTION_TITLE);
    let watts = 100.0;
    let load_ohms = Complex::from(1250.0);
    let rms = stresses(&chain, load_ohms, watts);
    printed(rms[0].1, "1.41")?;
    exact(rms[0].1, std::f64::consts::SQRT_2, 0.0)?;
    printed(rms[2].0, "353.6")?;
    exact(rms[2].0, 353.5533905932738, 0.0)?;

    let point = Reference::new(&chain.plan).at(f64::from(chain.plan.band.from));
    let states = point.states(gamma_from_impedance(load_ohms, chain.plan.reference));
    let scale = (watts * chain.plan.reference / states[2].power()).sqrt();
    let across_coil = (states[0].v - states[1].v).norm() * scale;
    printed(across_coil, "346.4")?;
    exact(across_coil, 346.41016151377545, 0.0)?;
    let through_capacitor = (states[1].i - states[2].i).norm() * scale / chain.plan.reference;
    printed(through_capacitor, "1.386")?;
    exact(through_capacitor, 1.3856406460551018, 0.0)?;
    printed(across_coil * rms[0].1, "490")?;
    exact(across_coil * rms[0].1, 489.89794855663564, 0.0)
}

/// RMS voltage and current at each port when `watts` reach a load of `load_ohms`.
fn stresses(chain: &Chain, load_ohms: Complex<f64>, watts: f64) -> Vec<(f64, f64)> {
    let r0 = chain.plan.reference;
    let point = Reference::new(&chain.plan).at(f64::from(chain.plan.band.from));
    let states = point.states(gamma_from_impedance(load_ohms, r0));
    let at_load = states.last().expect("at least the load").power();
    let scale = (watts * r0 / at_load).sqrt();
    states
        .iter()
        .map(|state| (state.v.norm() * scale, state.i.norm() * scale / r0))
        .collect()
}
