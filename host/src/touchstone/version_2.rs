//! Files of version 2.0: keywords, then network data between `[Network Data]` and `[End]`.

use super::header::Header;
use super::keyword::{Entry, Keyword};
use super::line::{Kind, Line, Lines};
use super::network::{NPort, Network};
use super::number::shown;
use crate::diagnostic::{Diagnostic, Source};

/// Reads the file whose first line is `first`, a keyword.
pub(super) fn read<'a>(mut lines: Lines<'a>, first: &Line<'a>) -> Result<Network, Diagnostic> {
    let source = lines.source;
    version(source, first)?;
    let mut header = Header::new();
    let network_data = loop {
        let Some(line) = lines.significant()? else {
            let help = "write [Network Data] and the data behind the other keywords";
            return Err(lines.fault_at_end("the file ends without [Network Data]", help));
        };
        match line.kind() {
            Kind::Options => header.take_options(source, &line)?,
            Kind::Data => header.continue_reference(source, &line)?,
            Kind::Keyword => {
                let entry = Entry::parse(source, &line)?;
                if entry.keyword == Keyword::NetworkData {
                    break entry;
                }
                header.take(&mut lines, entry)?;
            }
        }
    };
    network_data.alone(source)?;
    match header.ports(source, &network_data)? {
        1 => data(lines, header, &network_data).map(Network::OnePort),
        _ => data(lines, header, &network_data).map(Network::TwoPort),
    }
}

fn version(source: Source<'_>, first: &Line<'_>) -> Result<(), Diagnostic> {
    let entry = Entry::parse(source, first)?;
    if entry.keyword != Keyword::Version {
        let message = format!("[{}] before [Version]", entry.keyword.name());
        return Err(entry.fault(source, message, "write [Version] 2.0 on the first line"));
    }
    let version = entry.argument(source, "2.0")?;
    if version.text == "2.0" {
        return Ok(());
    }
    let message = format!("version {} is not known", shown(version.text));
    let help = "write [Version] 2.0; a file of version 1.x has no keywords";
    Err(source.fault(version.range.clone(), message, help))
}

/// Reads the network data up to `[End]`; `network_data` stands right before them.
fn data<'a, const PORTS: usize>(
    mut lines: Lines<'a>,
    header: Header<'a>,
    network_data: &Entry<'_>,
) -> Result<NPort<PORTS>, Diagnostic> {
    let source = lines.source;
    let (frequencies, mut data) = header.finish(source, network_data)?;
    let mut noise = false;
    while let Some(line) = lines.significant()? {
        match line.kind() {
            Kind::Options => {}
            Kind::Data => {
                data.take(&line)?;
                if noise {
                    data.pass_noise(&line)?;
                } else if data.points.len() < frequencies {
                    data.push(&line)?;
                } else {
                    let message =
                        format!("[Number of Frequencies] is {frequencies}, and this is one more");
                    let help = "correct [Number of Frequencies], or end the data with [End]";
                    return Err(source.fault(line.range(), message, help));
                }
            }
            Kind::Keyword => {
                let entry = Entry::parse(source, &line)?;
                let begins_noise = entry.keyword == Keyword::NoiseData && PORTS == 2 && !noise;
                if entry.keyword != Keyword::End && !begins_noise {
                    let message = format!("[{}] behind [Network Data]", entry.keyword.name());
                    let help = "behind the network data stand [Noise Data] of a two-port and [End]";
                    return Err(entry.fault(source, message, help));
                }
                entry.alone(source)?;
                let found = data.points.len();
                if found < frequencies {
                    let message =
                        format!("[Number of Frequencies] is {frequencies}, but there are {found}");
                    let help = "correct [Number of Frequencies]; or the file has lost data";
                    return Err(entry.fault(source, message, help));
                }
                if begins_noise {
                    noise = true;
                } else {
                    nothing_behind(lines)?;
                    return Ok(NPort {
                        reference: data.reference,
                        points: data.points,
                    });
                }
            }
        }
    }
    let help = "write [End] behind the data; or the file has been cut short";
    Err(lines.fault_at_end("the file ends without [End]", help))
}

/// Expects no more than comments behind `[End]`.
fn nothing_behind(mut lines: Lines<'_>) -> Result<(), Diagnostic> {
    match lines.significant()? {
        None => Ok(()),
        Some(line) => Err(lines.source.fault(
            line.range(),
            "text behind [End]",
            "leave out what stands behind [End]",
        )),
    }
}
