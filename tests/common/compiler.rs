//! Finds a compiler for bare-metal targets and builds images with it.
//!
//! Two ways serve, looked for in this order: a compiler that has the target's `core` installed
//! (`rustup target add`), and one that has the sources of `core` to build it from (Debian's
//! packages `rustc-web` and `rust-web-src`, or rustup's `rust-src`). Nothing is fetched for it.

use std::collections::hash_map::DefaultHasher;
use std::ffi::OsString;
use std::fs::{self, File};
use std::hash::{Hash, Hasher};
use std::io;
use std::path::{Path, PathBuf};
use std::process::Command;
use std::{env, iter};

use super::{Core, Failure};

/// Debian's compiler, even where rustup's comes first on the search path.
const SYSTEM_RUSTC: &str = "/usr/bin/rustc";

/// A way to get an image for a target.
struct Compiler {
    rustc: PathBuf,
    version: String,
    /// Its cargo subcommand for lints, perhaps not installed.
    clippy: PathBuf,
    /// Where `core` has to be built first: the linker, which comes with rustup's libraries.
    linker_with_core: Option<PathBuf>,
}

/// An installed compiler.
struct Candidate {
    rustc: PathBuf,
    /// What `rustc --version` says.
    version: String,
    libraries: PathBuf,
}

fn candidates() -> Vec<Candidate> {
    let usual = env::var_os("RUSTC").unwrap_or_else(|| "rustc".into());
    let ask = |rustc: &Path, arguments: &[&str]| {
        let output = Command::new(rustc).args(arguments).output().ok()?;
        let text = String::from_utf8(output.stdout).ok()?;
        output.status.success().then(|| text.trim().to_owned())
    };
    [PathBuf::from(usual), PathBuf::from(SYSTEM_RUSTC)]
        .into_iter()
        .filter_map(|rustc| {
            let version = ask(&rustc, &["--version"])?;
            let libraries = ask(&rustc, &["--print", "sysroot"])? + "/lib/rustlib";
            Some(Candidate {
                rustc,
                version,
                libraries: libraries.into(),
            })
        })
        .collect()
}

impl Candidate {
    fn compiler(&self, linker_with_core: Option<PathBuf>) -> Compiler {
        Compiler {
            rustc: self.rustc.clone(),
            version: self.version.clone(),
            clippy: self.libraries.join("../../bin/cargo-clippy"),
            linker_with_core,
        }
    }

    fn has_core(&self, target: &str) -> bool {
        fs::read_dir(self.libraries.join(target).join("lib")).is_ok_and(|files| {
            files
                .flatten()
                .any(|file| file.file_name().to_string_lossy().starts_with("libcore-"))
        })
    }

    /// Whether it has the sources of `core` and is no older than the project allows.
    fn can_build_core(&self) -> bool {
        let minor = |version: &str| version.split('.').nth(1).and_then(|text| text.parse().ok());
        let needed: Option<u32> = minor(env!("CARGO_PKG_RUST_VERSION"));
        minor(&self.version) >= needed
            && self
                .libraries
                .join("src/rust/library/core/Cargo.toml")
                .exists()
    }
}

/// The linker of rustup's compiler, or Debian's.
fn linker(candidates: &[Candidate]) -> Option<PathBuf> {
    let host = format!("{}-unknown-linux-gnu", env::consts::ARCH);
    let bundled = candidates
        .iter()
        .map(|one| one.libraries.join(&host).join("bin/rust-lld"));
    let path = env::var_os("PATH").unwrap_or_default();
    let system: Vec<_> = env::split_paths(&path)
        .map(|folder| folder.join("ld.lld"))
        .collect();
    bundled.chain(system).find(|file| file.exists())
}

fn find(core: &Core) -> Result<Compiler, Failure> {
    let candidates = candidates();
    if let Some(found) = candidates.iter().find(|one| one.has_core(core.target)) {
        return Ok(found.compiler(None));
    }
    let Some(found) = candidates.iter().find(|one| one.can_build_core()) else {
        return Err(Failure(format!(
            "no compiler for {target}: it is not installed, and no compiler from {rust} on has the \
             sources of `core`; install either: apt-get install rustc-web rust-web-src lld, or: \
             rustup target add {target}",
            target = core.target,
            rust = env!("CARGO_PKG_RUST_VERSION"),
        )));
    };
    let linker = linker(&candidates).ok_or_else(|| {
        Failure("no linker for bare-metal images; install it: apt-get install lld".into())
    })?;
    Ok(found.compiler(Some(linker)))
}

/// What the compiler for `core` says of itself, such as `rustc 1.96.0 (…)`; counts and sizes are
/// figures of one compiler.
pub(crate) fn compiler_version(core: &Core) -> Result<String, Failure> {
    find(core).map(|compiler| compiler.version)
}

/// Builds the image `bin` of `tests/firmware` for `core` and returns its path.
///
/// `arguments` go to cargo, such as `--profile small`; without a profile it is `release`. Images
/// of other features or arguments do not overwrite this one, and builds from several tests,
/// threads or processes wait for each other.
pub(crate) fn build(
    core: &Core,
    bin: &str,
    features: &[&str],
    arguments: &[&str],
) -> Result<PathBuf, Failure> {
    let compiler = find(core)?;
    let images = target_folder(&compiler).join("images");
    let cannot = |what: &Path, error: io::Error| Failure(format!("{}: {error}", what.display()));
    fs::create_dir_all(&images).map_err(|error| cannot(&images, error))?;

    // Cargo has a lock of its own, but frees it before the image is copied.
    let lock = images.join("lock");
    let file = File::create(&lock).map_err(|error| cannot(&lock, error))?;
    let mut lock_file = fd_lock::RwLock::new(file);
    let _locked = lock_file.write().map_err(|error| cannot(&lock, error))?;

    let cargo = env::var_os("CARGO").unwrap_or_else(|| "cargo".into());
    let mut cargo = command(cargo.as_ref(), "build", &compiler, core);
    cargo.args(["--message-format=json-render-diagnostics", "--bin", bin]);
    cargo.arg("--features").arg(features.join(","));
    if !arguments.contains(&"--profile") {
        cargo.arg("--release");
    }
    let messages = output(cargo.args(arguments)).map_err(|reason| {
        Failure(format!(
            "cannot build {bin} for {} with {}: {reason}",
            core.name, compiler.version
        ))
    })?;
    let built = messages
        .lines()
        .filter_map(|line| serde_json::from_str::<serde_json::Value>(line).ok())
        .filter(|message| message["target"]["name"] == bin)
        .find_map(|message| message["executable"].as_str().map(PathBuf::from))
        .ok_or_else(|| {
            Failure(format!(
                "cargo does not say where it built {bin}:\n{messages}"
            ))
        })?;
    let mut hasher = DefaultHasher::new();
    (features, arguments).hash(&mut hasher);
    let image = images.join(format!("{bin}-{}-{:016x}.elf", core.name, hasher.finish()));
    // Renamed when complete: an emulator may be loading the one from before.
    let partial = image.with_extension("partial");
    fs::copy(&built, &partial).map_err(|error| cannot(&built, error))?;
    fs::rename(&partial, &image).map_err(|error| cannot(&image, error))?;
    Ok(image)
}

/// Checks the images' sources, as compiled for `core`, with clippy; any warning is a failure.
pub(crate) fn lint(core: &Core) -> Result<(), Failure> {
    let compiler = find(core)?;
    if !compiler.clippy.exists() {
        return Err(Failure(format!(
            "{} has no clippy; install it: apt-get install rust-web-clippy, or: rustup component \
             add clippy",
            compiler.version
        )));
    }
    let mut clippy = command(&compiler.clippy, "clippy", &compiler, core);
    // Without the features, images that need them would be left out.
    clippy.args(["--release", "--features", "float,log"]);
    clippy.args(["--", "--deny", "warnings"]);
    output(&mut clippy)
        .map(drop)
        .map_err(|reason| Failure(format!("clippy on the images for {}: {reason}", core.name)))
}

/// Where images are built; different compilers keep out of each other's way.
fn target_folder(compiler: &Compiler) -> PathBuf {
    let kind = if compiler.linker_with_core.is_some() {
        "core-built"
    } else {
        "core-installed"
    };
    Path::new(env!("CARGO_TARGET_TMPDIR"))
        .with_file_name("firmware")
        .join(kind)
}

/// A cargo command for `tests/firmware` and the target of `core`, in an environment that nothing
/// of the caller's leaks into.
fn command(program: &Path, subcommand: &str, compiler: &Compiler, core: &Core) -> Command {
    let mut cargo = Command::new(program);
    let leaks = |name: &OsString| {
        let name = name.to_string_lossy();
        ["CARGO_BUILD_", "CARGO_PROFILE_", "CARGO_TARGET_"]
            .iter()
            .any(|it| name.starts_with(it))
            || name.ends_with("RUSTFLAGS")
            || name.contains("WRAPPER")
            || name.starts_with("CLIPPY")
    };
    // Cargo points it at the libraries of the compiler that built the test.
    let libraries = iter::once(OsString::from("LD_LIBRARY_PATH"));
    for name in env::vars_os()
        .map(|(name, _)| name)
        .filter(leaks)
        .chain(libraries)
    {
        cargo.env_remove(name);
    }
    cargo
        .arg(subcommand)
        .args(["--locked", "--config", "term.color='never'"]);
    cargo
        .args(["--target", core.target])
        .env("RUSTC", &compiler.rustc);
    cargo.arg("--target-dir").arg(target_folder(compiler));
    let firmware = Path::new(env!("CARGO_MANIFEST_DIR")).join("../tests/firmware/Cargo.toml");
    cargo.arg("--manifest-path").arg(firmware);
    if let Some(linker) = &compiler.linker_with_core {
        let name = core.target.to_uppercase().replace(['-', '.'], "_");
        cargo.env(format!("CARGO_TARGET_{name}_LINKER"), linker);
        // `-Z` is for nightly compilers; the variable makes a stable one accept it.
        cargo
            .env("RUSTC_BOOTSTRAP", "1")
            .args(["-Z", "build-std=core,alloc"]);
    }
    cargo
}

/// What a command prints, or why it fails and what it complains of.
fn output(command: &mut Command) -> Result<String, String> {
    let output = command
        .output()
        .map_err(|error| format!("{command:?}: {error}"))?;
    if output.status.success() {
        Ok(String::from_utf8_lossy(&output.stdout).into_owned())
    } else {
        Err(format!(
            "{command:?}:\n{}",
            String::from_utf8_lossy(&output.stderr)
        ))
    }
}
