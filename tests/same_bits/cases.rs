//! The chains whose words are compared, and their images.

use std::collections::BTreeSet;
use std::path::{Path, PathBuf};
use std::{fs, io};

use stagebits::constants::{self, Constants};
use stagebits::plan::Plan;
use stagebits_kernel::Scalar;
use stagebits_kernel::image::{self, Header};

use crate::points::Band;

/// Word lengths that a firmware can choose.
pub(crate) const WORD_BITS: [u32; 2] = [16, 32];

/// A chain file.
pub(crate) struct Case {
    /// Its name.
    pub(crate) name: String,
    /// What it holds.
    pub(crate) plan: Plan,
}

/// A chain as the cores get it.
#[derive(Clone)]
pub(crate) struct Image {
    /// Name of the chain file.
    pub(crate) name: String,
    /// Word length.
    pub(crate) word_bits: u32,
    /// Frequencies to evaluate it at.
    pub(crate) band: Band,
    /// The bytes.
    pub(crate) bytes: Vec<u8>,
}

/// The chains of users in `examples/`, and those in `tests/same_bits/`, which make up what these
/// lack.
pub(crate) fn cases() -> Vec<Case> {
    let project = Path::new(env!("CARGO_MANIFEST_DIR")).join("..");
    let mut cases = Vec::new();
    for folder in ["examples", "tests/same_bits"] {
        let files = chain_files(&project.join(folder)).unwrap_or_else(|e| panic!("{folder}: {e}"));
        assert!(!files.is_empty(), "{folder}: no chain file");
        for path in files {
            let plan = stagebits::chain_file::read(&path).unwrap_or_else(|fault| panic!("{fault}"));
            let name = path.file_name().unwrap_or_default().to_string_lossy();
            cases.push(Case {
                name: format!("{folder}/{name}"),
                plan,
            });
        }
    }
    let names: BTreeSet<_> = cases.iter().map(|case| &case.name).collect();
    assert_eq!(names.len(), cases.len(), "a chain is named by its file");
    cases
}

fn chain_files(folder: &Path) -> io::Result<Vec<PathBuf>> {
    let mut files = fs::read_dir(folder)?
        .map(|entry| entry.map(|entry| entry.path()))
        .collect::<io::Result<Vec<_>>>()?;
    files.retain(|path| path.extension().is_some_and(|it| it == "toml"));
    files.sort();
    Ok(files)
}

impl Case {
    /// The chain with its constants as they are.
    pub(crate) fn exact(&self) -> Constants<f64> {
        constants::exact(&self.plan)
    }

    /// The chain as an image for words of `word_bits`, its constants passed through `alter`.
    pub(crate) fn image(&self, word_bits: u32, alter: impl FnMut(Scalar) -> Scalar) -> Image {
        let chain = constants::rounded(&self.exact(), word_bits).map(alter);
        let reference_milliohms = (self.plan.reference * 1e3).round() as u32;
        let header = Header::new(word_bits, reference_milliohms).expect("a header");
        let length = image::encoded_len(&chain, header).expect("a chain that has an image");
        let mut bytes = vec![0; length];
        image::encode(&chain, header, &mut bytes).expect("room for the image");
        Image {
            name: self.name.clone(),
            word_bits,
            band: Band {
                from: self.plan.band.from,
                to: self.plan.band.to,
            },
            bytes,
        }
    }
}

/// Every chain for every word length.
pub(crate) fn images(cases: &[Case]) -> Vec<Image> {
    let lengths = |case| WORD_BITS.map(|word_bits| Case::image(case, word_bits, |word| word));
    cases.iter().flat_map(lengths).collect()
}

/// The images as the file that the firmware's `words` reads.
pub(crate) fn file(images: &[Image]) -> Vec<u8> {
    let mut bytes = Vec::new();
    for image in images {
        let length = u16::try_from(image.bytes.len()).expect("an image's length has two bytes");
        bytes.extend(image.band.from.to_le_bytes());
        bytes.extend(image.band.to.to_le_bytes());
        bytes.extend(length.to_le_bytes());
        bytes.extend(&image.bytes);
    }
    bytes
}
