//! Reading an input file into memory, up to a limit.

use std::fs::File;
use std::io::Read as _;
use std::path::Path;

use crate::diagnostic::Diagnostic;

/// The bytes of the file at `path`; `what` says in messages what it should be.
///
/// # Errors
/// Where the file cannot be read or is larger than `largest` bytes, which also ends the reading of
/// a device.
pub(crate) fn read(path: &Path, largest: u64, what: &str) -> Result<Vec<u8>, Diagnostic> {
    let fault = |message: String| {
        let help = format!("give the path of a readable {what}");
        Err(Diagnostic::of_file(
            &path.display().to_string(),
            message,
            help,
        ))
    };
    let mut bytes = Vec::new();
    match File::open(path).and_then(|file| file.take(largest + 1).read_to_end(&mut bytes)) {
        Err(error) => fault(format!("cannot read the {what}: {error}")),
        Ok(_) if bytes.len() as u64 > largest => {
            fault(format!("the file is larger than {largest} bytes"))
        }
        Ok(_) => Ok(bytes),
    }
}
