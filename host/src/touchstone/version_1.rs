//! Files of version 1.x: an option line, network data, and noise data behind those of a two-port.

use std::path::Path;

use super::data::{Data, Order};
use super::line::{Kind, Line, Lines};
use super::network::{NPort, Network};
use super::option_line::{self, Options};
use crate::diagnostic::{Diagnostic, Source};

/// Reads the file whose first line is `first`.
pub(super) fn read<'a>(mut lines: Lines<'a>, first: Line<'a>) -> Result<Network, Diagnostic> {
    let source = lines.source;
    let mut options = None;
    let mut next = Some(first);
    while let Some(line) = next {
        match line.kind() {
            Kind::Options if options.is_some() => {}
            Kind::Options => options = Some(option_line::parse(source, &line)?),
            Kind::Keyword => return Err(stray_keyword(source, &line)),
            Kind::Data => {
                let Some(options) = options else {
                    let help = "write a line such as `# MHz S MA R 50` above it";
                    return Err(source.fault(line.range(), "data before the option line", help));
                };
                return match ports(source)? {
                    1 => data(lines, line, options).map(Network::OnePort),
                    _ => data(lines, line, options).map(Network::TwoPort),
                };
            }
        }
        next = lines.significant()?;
    }
    let help = "write a line for each frequency below the option line";
    Err(lines.fault_at_end("the file ends without network data", help))
}

/// Number of ports, 1 or 2, from the name of the file.
fn ports(source: Source<'_>) -> Result<usize, Diagnostic> {
    let extension = Path::new(source.file).extension();
    let extension = extension.map(|it| it.to_string_lossy().to_ascii_lowercase());
    let number = extension
        .as_deref()
        .and_then(|it| it.strip_prefix('s')?.strip_suffix('p'));
    let message = match number.map(str::parse::<u32>) {
        Some(Ok(1)) => return Ok(1),
        Some(Ok(2)) => return Ok(2),
        Some(Ok(more)) => format!("the name says {more} ports; files of 1 and 2 ports are read"),
        _ => "the name does not say how many ports there are".to_owned(),
    };
    let help = "let the name end in .s1p for a one-port and in .s2p for a two-port";
    Err(Diagnostic::of_file(source.file, message, help))
}

fn data<'a, const PORTS: usize>(
    mut lines: Lines<'a>,
    first: Line<'a>,
    options: Options,
) -> Result<NPort<PORTS>, Diagnostic> {
    let resistance = options.resistance;
    let reference = [resistance; PORTS];
    let mut data = Data::new(lines.source, options, Order::Columns, resistance, reference)?;
    let mut noise = false;
    let mut next = Some(first);
    while let Some(line) = next {
        match line.kind() {
            Kind::Options => {}
            Kind::Keyword => return Err(stray_keyword(lines.source, &line)),
            Kind::Data => {
                data.take(&line)?;
                noise |= data.at_noise();
                if noise {
                    data.pass_noise(&line)?;
                } else {
                    data.push(&line)?;
                }
            }
        }
        next = lines.significant()?;
    }
    Ok(NPort {
        reference,
        points: data.points,
    })
}

fn stray_keyword(source: Source<'_>, line: &Line<'_>) -> Diagnostic {
    let message = "a keyword in a file that does not begin with [Version]";
    let help = "write [Version] 2.0 on the first line, or leave all keywords out";
    source.fault(line.range(), message, help)
}
