//! Network data: one line of numbers for each frequency.

use num_complex::Complex;

use super::format::Format;
use super::line::Line;
use super::network::Point;
use super::number::number;
use super::option_line::Options;
use super::parameter::Parameter;
use crate::diagnostic::{Diagnostic, Source};
use crate::quantity::Dimension;

/// Which entries of a two-port's matrix stand on a line, and in which order.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Order {
    /// 11 21 12 22: that of version 1.x, and `21_12` of 2.0.
    Columns,
    /// 11 12 21 22: `12_21`.
    Rows,
    /// 11 21 22, the matrix being symmetric.
    Lower,
    /// 11 12 22, the matrix being symmetric.
    Upper,
}

impl Order {
    /// Row and column, from 0, of each entry on a line.
    pub(super) fn entries(self, ports: usize) -> &'static [(usize, usize)] {
        match self {
            _ if ports == 1 => &[(0, 0)],
            Self::Columns => &[(0, 0), (1, 0), (0, 1), (1, 1)],
            Self::Rows => &[(0, 0), (0, 1), (1, 0), (1, 1)],
            Self::Lower => &[(0, 0), (1, 0), (1, 1)],
            Self::Upper => &[(0, 0), (0, 1), (1, 1)],
        }
    }
}

/// Numbers on a line of noise data: frequency, minimum noise figure, optimum source reflection as
/// magnitude and angle, noise resistance.
pub(super) const NOISE_NUMBERS: usize = 5;

/// The network data read so far.
pub(super) struct Data<'a, const PORTS: usize> {
    source: Source<'a>,
    options: Options,
    entries: &'static [(usize, usize)],
    symmetric: bool,
    /// The impedance in ohms that Z is a multiple of.
    unit: f64,
    pub(super) reference: [f64; PORTS],
    pub(super) points: Vec<Point<PORTS>>,
    /// The numbers of the line at hand.
    numbers: Vec<f64>,
}

impl<'a, const PORTS: usize> Data<'a, PORTS> {
    /// Nothing read yet; `unit` is the impedance in ohms that Z-parameters are multiples of.
    ///
    /// # Errors
    /// Where the parameters cannot be made S-parameters.
    pub(super) fn new(
        source: Source<'a>,
        options: Options,
        order: Order,
        unit: f64,
        reference: [f64; PORTS],
    ) -> Result<Self, Diagnostic> {
        let Options {
            parameter,
            parameter_range,
            ..
        } = &options;
        let refused = match parameter {
            Parameter::S => None,
            Parameter::Y | Parameter::Z if PORTS == 1 => None,
            Parameter::H | Parameter::G if PORTS == 1 => {
                Some(("a one-port has no H- or G-parameters", "write S, Y or Z"))
            }
            _ => Some((
                "of two-ports S-parameters only are read",
                "convert the data to S-parameters",
            )),
        };
        if let Some((message, help)) = refused {
            return Err(source.fault(parameter_range.clone(), message, help));
        }
        Ok(Self {
            source,
            options,
            entries: order.entries(PORTS),
            symmetric: matches!(order, Order::Lower | Order::Upper),
            unit,
            reference,
            points: Vec::new(),
            numbers: Vec::new(),
        })
    }

    /// Reads the numbers of a line, the first as a frequency.
    pub(super) fn take(&mut self, line: &Line<'_>) -> Result<(), Diagnostic> {
        self.numbers.clear();
        for (index, token) in line.tokens().enumerate() {
            let power = if index == 0 {
                self.options.power_of_ten
            } else {
                0
            };
            self.numbers.push(number(self.source, &token, power)?);
        }
        Ok(())
    }

    /// Whether the line at hand begins the noise data of version 1.x: these have no mark but that
    /// their first frequency is not above the last of the network data.
    pub(super) fn at_noise(&self) -> bool {
        let ascends = |point: &Point<PORTS>| self.numbers[0] > point.hertz;
        PORTS == 2
            && self.numbers.len() == NOISE_NUMBERS
            && self.points.last().is_some_and(|last| !ascends(last))
    }

    /// Expects the line at hand to be one of noise data, which are not kept.
    pub(super) fn pass_noise(&self, line: &Line<'_>) -> Result<(), Diagnostic> {
        if self.numbers.len() == NOISE_NUMBERS {
            return Ok(());
        }
        let message = format!(
            "{} on a line of noise data; {NOISE_NUMBERS} are wanted",
            self.count()
        );
        let help = "write frequency, minimum noise figure, optimum reflection as magnitude and \
                    angle, and noise resistance; network data come first, in ascending order";
        Err(self.source.fault(line.range(), message, help))
    }

    /// Takes the line at hand as a point.
    pub(super) fn push(&mut self, line: &Line<'_>) -> Result<(), Diagnostic> {
        if self.numbers.len() != 1 + 2 * self.entries.len() {
            return Err(self.wrong_count(line));
        }
        let hertz = self.numbers[0];
        self.check_frequency(hertz, line)?;
        let mut s = [[Complex::default(); PORTS]; PORTS];
        for (index, &(row, column)) in self.entries.iter().enumerate() {
            let value = self.value(1 + 2 * index, line)?;
            s[row][column] = value;
            if self.symmetric {
                s[column][row] = value;
            }
        }
        self.points.push(Point { hertz, s });
        Ok(())
    }

    /// The S-parameter whose first number is `numbers[first]`.
    fn value(&self, first: usize, line: &Line<'_>) -> Result<Complex<f64>, Diagnostic> {
        let Options {
            parameter, format, ..
        } = self.options;
        let pair = [self.numbers[first], self.numbers[first + 1]];
        if format == Format::MagnitudeAngle && pair[0] < 0.0 {
            let message = format!("a magnitude of {}", pair[0]);
            let help = "write a magnitude of 0 or more; decibels need DB in the option line";
            return Err(self.fault_at(first, line, message, help));
        }
        let value = format.complex(pair);
        if !value.is_finite() {
            let message = format!("{} dB is too large", pair[0]);
            return Err(self.fault_at(first, line, message, "write a smaller number"));
        }
        let s = parameter.gamma(value, self.unit, self.reference[0]);
        if !s.is_finite() {
            let message = "this impedance or admittance has no finite reflection".to_owned();
            let help = "write another value than minus the reference, or S-parameters";
            return Err(self.fault_at(first, line, message, help));
        }
        Ok(s)
    }

    fn check_frequency(&self, hertz: f64, line: &Line<'_>) -> Result<(), Diagnostic> {
        let shown = |hertz| Dimension::Frequency.write(hertz);
        let ascending = "write frequencies in ascending order, each once";
        let (message, help) = match self.points.last() {
            _ if hertz < 0.0 => ("a negative frequency".to_owned(), "write 0 or more"),
            Some(last) if last.hertz == hertz => {
                let message = format!("the frequency {} a second time", shown(hertz));
                (message, ascending)
            }
            Some(last) if last.hertz > hertz => {
                let message = format!("{} after {}", shown(hertz), shown(last.hertz));
                (message, ascending)
            }
            _ => return Ok(()),
        };
        Err(self.fault_at(0, line, message, help))
    }

    fn wrong_count(&self, line: &Line<'_>) -> Diagnostic {
        let wanted = 1 + 2 * self.entries.len();
        let message = format!("{} on the line; {wanted} are wanted", self.count());
        let names: Vec<_> = self
            .entries
            .iter()
            .map(|(row, column)| format!("S{}{}", row + 1, column + 1))
            .collect();
        let mut help = format!(
            "write the frequency and two numbers each of {} on one line",
            names.join(" ")
        );
        match self.numbers.len() {
            3 => help += "; three numbers are of a one-port (.s1p, [Number of Ports] 1)",
            9 => help += "; nine numbers are of a two-port (.s2p, [Number of Ports] 2)",
            _ => {}
        }
        self.source.fault(line.range(), message, help)
    }

    fn count(&self) -> String {
        match self.numbers.len() {
            1 => "1 number".to_owned(),
            more => format!("{more} numbers"),
        }
    }

    /// A fault at one number of the line at hand.
    fn fault_at(&self, index: usize, line: &Line<'_>, message: String, help: &str) -> Diagnostic {
        let range = line.tokens().nth(index).map(|token| token.range);
        self.source
            .fault(range.unwrap_or_else(|| line.range()), message, help)
    }
}
