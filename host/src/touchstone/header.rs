//! The keywords of version 2.0 that stand before the network data.

use super::data::{Data, Order};
use super::keyword::{Entry, Keyword};
use super::line::{Kind, Line, Lines, Token};
use super::number::{resistance, whole};
use super::option_line::{self, Options};
use crate::diagnostic::{Diagnostic, Source};

/// Most frequencies that a file may announce; one of the largest size holds fewer.
const MOST_FREQUENCIES: usize = 100_000_000;

/// What stands before the network data.
#[derive(Default)]
pub(super) struct Header<'a> {
    seen: Vec<Keyword>,
    options: Option<Options>,
    ports: Option<usize>,
    frequencies: Option<usize>,
    order: Option<Order>,
    /// `Some(None)` is a full matrix.
    triangle: Option<Option<Order>>,
    reference: Option<(Entry<'a>, Vec<Token<'a>>)>,
}

impl<'a> Header<'a> {
    /// Nothing but `[Version]` read yet.
    pub(super) fn new() -> Self {
        Self {
            seen: vec![Keyword::Version],
            ..Self::default()
        }
    }

    /// Takes the option line; only the first one counts.
    pub(super) fn take_options(
        &mut self,
        source: Source<'_>,
        line: &Line<'_>,
    ) -> Result<(), Diagnostic> {
        if self.options.is_none() {
            self.options = Some(option_line::parse(source, line)?);
        }
        Ok(())
    }

    /// Number of ports, 1 or 2; `network_data` stands behind all this.
    pub(super) fn ports(
        &self,
        source: Source<'_>,
        network_data: &Entry<'_>,
    ) -> Result<usize, Diagnostic> {
        self.ports
            .ok_or_else(|| missing(source, network_data, Keyword::NumberOfPorts, "1"))
    }

    /// Takes a keyword in.
    pub(super) fn take(
        &mut self,
        lines: &mut Lines<'a>,
        entry: Entry<'a>,
    ) -> Result<(), Diagnostic> {
        let source = lines.source;
        let name = entry.keyword.name();
        if self.seen.contains(&entry.keyword) {
            let message = format!("[{name}] a second time");
            return Err(entry.fault(source, message, "keep one of them"));
        }
        self.seen.push(entry.keyword);
        match entry.keyword {
            Keyword::NumberOfPorts => {
                let ports = entry.argument(source, "1")?;
                self.ports = Some(whole(source, ports, 1..=2)?);
            }
            Keyword::NumberOfFrequencies => {
                let frequencies = entry.argument(source, "201")?;
                self.frequencies = Some(whole(source, frequencies, 1..=MOST_FREQUENCIES)?);
            }
            Keyword::TwoPortDataOrder => {
                let orders = [("12_21", Order::Rows), ("21_12", Order::Columns)];
                self.order = Some(entry.word(source, &orders)?);
            }
            Keyword::MatrixFormat => {
                let formats = [
                    ("Full", None),
                    ("Lower", Some(Order::Lower)),
                    ("Upper", Some(Order::Upper)),
                ];
                self.triangle = Some(entry.word(source, &formats)?);
            }
            Keyword::Reference => {
                let values = entry.arguments.clone();
                self.reference = Some((entry, values));
            }
            Keyword::BeginInformation => {
                entry.alone(source)?;
                pass_information(lines, &entry)?;
            }
            // Noise data are left out, and so is their number; a second [Version] is caught above.
            Keyword::NumberOfNoiseFrequencies | Keyword::Version => {}
            Keyword::MixedModeOrder => {
                let message = "mixed-mode data are not read".to_owned();
                let help = "save the network with a common reference for all ports";
                return Err(entry.fault(source, message, help));
            }
            Keyword::EndInformation => {
                let message = "[End Information] without [Begin Information]".to_owned();
                return Err(entry.fault(source, message, "leave it out"));
            }
            Keyword::NetworkData | Keyword::NoiseData | Keyword::End => {
                let message = format!("[{name}] before [Network Data]");
                let help = "write [Network Data] and the data first";
                return Err(entry.fault(source, message, help));
            }
        }
        Ok(())
    }

    /// Takes a line of numbers, which may only go on with `[Reference]`.
    pub(super) fn continue_reference(
        &mut self,
        source: Source<'_>,
        line: &Line<'a>,
    ) -> Result<(), Diagnostic> {
        match &mut self.reference {
            Some((_, values)) if self.seen.last() == Some(&Keyword::Reference) => {
                values.extend(line.tokens());
                Ok(())
            }
            _ => {
                let message = "data before [Network Data]";
                let help = "write [Network Data] on the line above them";
                Err(source.fault(line.range(), message, help))
            }
        }
    }

    /// Reference resistance of each port: that of the option line where there is no `[Reference]`.
    fn reference<const PORTS: usize>(
        &self,
        source: Source<'_>,
        options: &Options,
    ) -> Result<[f64; PORTS], Diagnostic> {
        let mut reference = [options.resistance; PORTS];
        let Some((entry, values)) = &self.reference else {
            return Ok(reference);
        };
        if values.len() != PORTS {
            let message = format!("[Reference] has {} values for {PORTS} ports", values.len());
            return Err(entry.fault(source, message, "write one resistance for each port"));
        }
        for (ohms, value) in reference.iter_mut().zip(values) {
            *ohms = resistance(source, value)?;
        }
        Ok(reference)
    }

    /// The number of frequencies and the room for their data; `network_data` stands behind all this.
    pub(super) fn finish<const PORTS: usize>(
        self,
        source: Source<'a>,
        network_data: &Entry<'_>,
    ) -> Result<(usize, Data<'a, PORTS>), Diagnostic> {
        let missing = |keyword, example| missing(source, network_data, keyword, example);
        let Some(frequencies) = self.frequencies else {
            return Err(missing(Keyword::NumberOfFrequencies, "201"));
        };
        let order = match (self.triangle.flatten(), self.order) {
            (Some(triangle), _) => triangle,
            (None, Some(order)) => order,
            (None, None) if PORTS == 1 => Order::Columns,
            (None, None) => return Err(missing(Keyword::TwoPortDataOrder, "21_12")),
        };
        let Some(options) = &self.options else {
            let message = "no option line before [Network Data]".to_owned();
            let help = "write a line such as `# MHz S MA R 50` behind [Version]";
            return Err(network_data.fault(source, message, help));
        };
        let reference = self.reference(source, options)?;
        let data = Data::new(source, options.clone(), order, 1.0, reference)?;
        Ok((frequencies, data))
    }
}

/// Skips an information block, whose text is free.
fn pass_information(lines: &mut Lines<'_>, begin: &Entry<'_>) -> Result<(), Diagnostic> {
    let source = lines.source;
    while let Some(line) = lines.any() {
        let at_end = line.kind() == Kind::Keyword
            && Entry::parse(source, &line)
                .is_ok_and(|entry| entry.keyword == Keyword::EndInformation);
        if at_end {
            return Ok(());
        }
    }
    let message = "[Begin Information] without [End Information]".to_owned();
    Err(begin.fault(source, message, "write [End Information] behind the block"))
}

fn missing(
    source: Source<'_>,
    network_data: &Entry<'_>,
    keyword: Keyword,
    example: &str,
) -> Diagnostic {
    let name = keyword.name();
    let message = format!("no [{name}] before [Network Data]");
    network_data.fault(source, message, format!("write [{name}] {example} above"))
}
