//! Names of what an image holds, and which of them have no place in fixed-point firmware.

use std::fs;
use std::path::Path;

use object::{Object, ObjectSymbol};

use super::Failure;

/// What firmware in fixed point has no use for.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(crate) enum Unwanted {
    /// A panic's machinery.
    Panic,
    /// Arithmetic in floating point.
    Float,
    /// An allocator or what calls one.
    Heap,
}

/// Names of the functions and data of an image, demangled.
pub(crate) fn symbols(image: &Path) -> Result<Vec<String>, Failure> {
    let failure = |error: String| Failure(format!("{}: {error}", image.display()));
    let bytes = fs::read(image).map_err(|error| failure(error.to_string()))?;
    let file = object::File::parse(&*bytes).map_err(|error| failure(error.to_string()))?;
    let mut names = Vec::new();
    for symbol in file.symbols() {
        let name = symbol.name().map_err(|error| failure(error.to_string()))?;
        // Without the hash that ends a path.
        names.push(format!("{:#}", rustc_demangle::demangle(name)));
    }
    Ok(names)
}

/// What the symbol of this demangled name is part of, where that is unwanted.
pub(crate) fn unwanted(name: &str) -> Option<Unwanted> {
    let of_crate = |path: &str| {
        name.match_indices(path).any(|(start, _)| {
            let before = name[..start].chars().next_back();
            !before.is_some_and(|it| it.is_alphanumeric() || "_:".contains(it))
        })
    };
    let is = |names: &[&str]| names.contains(&name.rsplit("::").next().unwrap_or_default());
    if of_crate("core::panicking::") || is(&["rust_begin_unwind"]) {
        return Some(Unwanted::Panic);
    }
    if of_crate("compiler_builtins::float::") || of_crate("libm::") || is_float_routine(name) {
        return Some(Unwanted::Float);
    }
    let rust = ["__rust_alloc", "__rust_alloc_zeroed", "__rust_realloc"];
    let c = ["malloc", "calloc", "realloc"];
    (of_crate("alloc::") || is(&rust) || is(&c)).then_some(Unwanted::Heap)
}

/// Whether this is a routine that compilers call for an operation in floating point, by the names
/// of Arm's run-time ABI (`__aeabi_`) or of libgcc.
fn is_float_routine(name: &str) -> bool {
    let Some(name) = name.strip_prefix("__") else {
        return false;
    };
    if let Some(name) = name.strip_prefix("aeabi_") {
        // Of double, float and half, compared in flags, or into float or double.
        let from = ["d", "f", "h", "cd", "cf"];
        return from.iter().any(|it| name.starts_with(it))
            || ["2d", "2f"].iter().any(|it| name.ends_with(it));
    }
    let conversions = ["fix", "float", "extend", "trunc", "powi"];
    let operands = name.trim_end_matches(['2', '3']);
    let modes = ["hf", "sf", "df", "tf"];
    conversions.iter().any(|it| name.starts_with(it))
        || operands != name && modes.iter().any(|it| operands.ends_with(it))
}
