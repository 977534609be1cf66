//! From arguments to a written result.

use std::io;

use num_complex::Complex;

use super::arguments::{self, Arguments, Command, Common, Search, Words};
use super::switches::parse_switches;
use crate::arithmetic::with_word;
use crate::budget::{Budget, budget};
use crate::chain_file;
use crate::constants;
use crate::diagnostic::Diagnostic;
use crate::envelope::Effort;
use crate::output::file::Destination;
use crate::output::{json, text};
use crate::plan::{Loads, Plan, Switches};
use crate::quantity::{self, Dimension};
use crate::reference;
use crate::respond::respond;
use crate::size::size;

/// How a run that produced its result ended.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Outcome {
    /// The accuracy wanted is met, or none was asked about.
    Met,
    /// The accuracy wanted is not met.
    NotMet,
}

/// Why a run produced no result.
#[derive(Debug)]
pub enum Failure {
    /// The chain file is at fault.
    Input(Diagnostic),
    /// An argument is at fault: what is wrong and what would be right.
    Usage(String),
    /// The result could not be written.
    Write(String),
}

/// Does what the arguments ask for.
///
/// # Errors
/// [`Failure`] where there is no result; an output file is as it was before then, and nothing has
/// been written to standard output unless it is that which failed.
pub fn run(arguments: &Arguments) -> Result<Outcome, Failure> {
    match &arguments.command {
        Command::Respond(request) => run_respond(request),
        Command::Budget(request) => run_budget(request),
        Command::Size(request) => run_size(request),
    }
}

fn run_respond(request: &arguments::Respond) -> Result<Outcome, Failure> {
    let plan = read_for(&request.common, &request.words)?;
    let given = request.load.as_deref().map(load).transpose()?;
    let one_load = given.or(match &plan.loads {
        Loads::Impedances(list) => Some(Complex::new(list[0].0, list[0].1)),
        Loads::SwrUpTo(_) => Some(Complex::new(plan.reference, 0.0)),
        Loads::Measured(_) | Loads::SeriesModel(_) => None,
    });
    let switches = match &request.switches {
        Some(words) => parse_switches(words, &plan).map_err(Failure::Usage)?,
        None => Switches::OFF,
    };
    let destination = destination(&request.common)?;
    let exact = constants::exact(&plan);
    let gamma = one_load.map(|load| reference::gamma_from_impedance(load, plan.reference));
    let response = with_word!(
        plan.firmware.word_bits,
        respond(&plan, &exact, gamma, &switches)
    );
    let rendering = if request.common.json {
        json::response(&plan, &response)
    } else {
        text::response(&plan, &response)
    };
    write(&request.common, &destination, &rendering)?;
    Ok(Outcome::Met)
}

fn run_budget(request: &arguments::Budget) -> Result<Outcome, Failure> {
    let plan = read_for(&request.common, &request.words)?;
    let destination = destination(&request.common)?;
    let exact = constants::exact(&plan);
    let effort = effort(&request.search);
    let result: Budget = with_word!(plan.firmware.word_bits, budget(&plan, &exact, effort));
    let rendering = if request.common.json {
        json::budget(&plan, &result)
    } else {
        text::budget(&plan, &result)
    };
    write(&request.common, &destination, &rendering)?;
    Ok(outcome(result.meets(plan.accuracy)))
}

fn run_size(request: &arguments::Size) -> Result<Outcome, Failure> {
    let plan = read(&request.common)?;
    let destination = destination(&request.common)?;
    let sizing = size(&plan, &constants::exact(&plan), effort(&request.search));
    let rendering = if request.common.json {
        json::size(&plan, &sizing)
    } else {
        text::size(&plan, &sizing)
    };
    write(&request.common, &destination, &rendering)?;
    Ok(outcome(sizing.recommended().is_some()))
}

fn outcome(met: bool) -> Outcome {
    if met { Outcome::Met } else { Outcome::NotMet }
}

fn effort(search: &Search) -> Effort {
    Effort {
        points: search.points,
        seed: search.seed,
    }
}

fn read(common: &Common) -> Result<Plan, Failure> {
    chain_file::read(&common.file).map_err(Failure::Input)
}

/// The plan in words of the length asked for.
fn read_for(common: &Common, words: &Words) -> Result<Plan, Failure> {
    let mut plan = read(common)?;
    if let Some(bits) = words.word_bits {
        plan.firmware.word_bits = bits;
    }
    Ok(plan)
}

/// A load written as 'R, X', within the limits of the chain file's loads.
fn load(text: &str) -> Result<Complex<f64>, Failure> {
    let usage = |what: &str| {
        Failure::Usage(format!(
            "--load '{text}': {what}; write resistance and reactance, such as '36 ohm, -120 ohm'"
        ))
    };
    let Some((r, x)) = text.split_once(',') else {
        return Err(usage("there is no comma"));
    };
    let ohms = |part: &str| {
        quantity::parse(part.trim(), Dimension::Resistance).map_err(|error| usage(&error.message))
    };
    let load = Complex::new(ohms(r)?, ohms(x)?);
    if load.re < 0.0 {
        return Err(usage("a passive load has no negative resistance"));
    }
    let most = *Dimension::Resistance.limits().end();
    if load.re.max(load.im.abs()) > most {
        let most = Dimension::Resistance.write(most);
        return Err(usage(&format!("the limit of either is {most}")));
    }
    Ok(load)
}

/// Looked at before the work is done, so that hours of it are not lost.
fn destination(common: &Common) -> Result<Destination, Failure> {
    let path = common.output.as_deref();
    let destination = Destination::new(path).map_err(|error| not_written(common, &error))?;
    if destination.replaces(&common.file) {
        let path = common.file.display();
        return Err(Failure::Usage(format!(
            "--output would replace the chain file {path}; name another file"
        )));
    }
    Ok(destination)
}

fn write(common: &Common, destination: &Destination, rendering: &str) -> Result<(), Failure> {
    destination
        .write(rendering)
        .map_err(|error| not_written(common, &error))
}

fn not_written(common: &Common, error: &io::Error) -> Failure {
    Failure::Write(match &common.output {
        Some(path) => format!("{}: {error}", path.display()),
        None => format!("standard output: {error}"),
    })
}
