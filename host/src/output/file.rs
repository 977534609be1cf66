//! Where a result is written: to standard output, or to a file that is replaced as a whole.

use std::fs::{self, OpenOptions, Permissions};
use std::io::{self, Write};
use std::path::{Path, PathBuf};

/// Where a result goes, looked at before the work that leads to it.
#[derive(Debug)]
pub struct Destination(Kind);

#[derive(Debug)]
enum Kind {
    StandardOutput,
    /// A pipe or a device, which a file must not take the place of.
    Stream(PathBuf),
    /// A file that exists, with its permissions, or does not; never a link.
    File(PathBuf, Option<Permissions>),
}

impl Destination {
    /// Standard output, or the file at `path`. A symbolic link stands for what it points to.
    ///
    /// # Errors
    /// Where the file could not be written: it is a directory, or in none, or write-protected.
    pub fn new(path: Option<&Path>) -> io::Result<Self> {
        let Some(path) = path else {
            return Ok(Self(Kind::StandardOutput));
        };
        let permissions = match fs::metadata(path) {
            Ok(found) if found.is_dir() => return Err(io::ErrorKind::IsADirectory.into()),
            Ok(found) if !found.is_file() => return Ok(Self(Kind::Stream(path.to_owned()))),
            Ok(found) => {
                // a new file may take the place of a protected one, but is not meant to
                OpenOptions::new().write(true).open(path)?;
                Some(found.permissions())
            }
            Err(error) if error.kind() == io::ErrorKind::NotFound => None,
            Err(error) => return Err(error),
        };
        let path = behind_links(path)?;
        let folder = folder(&path);
        if !folder.is_dir() {
            let message = format!("{} is not a directory", folder.display());
            return Err(io::Error::new(io::ErrorKind::NotADirectory, message));
        }
        Ok(Self(Kind::File(path, permissions)))
    }

    /// Whether writing would replace the file at `path`.
    pub fn replaces(&self, path: &Path) -> bool {
        let Kind::File(target, _) = &self.0 else {
            return false;
        };
        matches!((target.canonicalize(), path.canonicalize()), (Ok(a), Ok(b)) if a == b)
    }

    /// Writes all of `text`. A reader of a file sees the old or the new one and never a part; a
    /// reader of a stream that has seen enough and left is no error.
    ///
    /// # Errors
    /// Where writing fails; a file is as it was before, and nothing is left beside it.
    pub fn write(&self, text: &str) -> io::Result<()> {
        match &self.0 {
            Kind::StandardOutput => to_stream(io::stdout().lock(), text),
            Kind::Stream(path) => to_stream(OpenOptions::new().write(true).open(path)?, text),
            Kind::File(path, permissions) => replace(path, permissions.clone(), text),
        }
    }
}

fn to_stream(mut stream: impl Write, text: &str) -> io::Result<()> {
    match stream
        .write_all(text.as_bytes())
        .and_then(|()| stream.flush())
    {
        Err(error) if error.kind() == io::ErrorKind::BrokenPipe => Ok(()),
        result => result,
    }
}

/// Writes a temporary file and moves it to `path`: with the permissions given, or with those of
/// any new file.
fn replace(path: &Path, permissions: Option<Permissions>, text: &str) -> io::Result<()> {
    let mut builder = tempfile::Builder::new();
    #[cfg(unix)]
    {
        use std::os::unix::fs::PermissionsExt;
        // less the umask; a temporary file is for its owner alone otherwise
        builder.permissions(Permissions::from_mode(0o666));
    }
    let mut file = builder.tempfile_in(folder(path))?;
    file.write_all(text.as_bytes())?;
    if let Some(permissions) = permissions {
        file.as_file().set_permissions(permissions)?;
    }
    file.as_file().sync_all()?;
    file.persist(path).map_err(|error| error.error)?;
    Ok(())
}

/// What `path` stands for: itself, or what a link there leads to, whether that exists or not.
fn behind_links(path: &Path) -> io::Result<PathBuf> {
    /// More than any system follows.
    const MOST_LINKS: u32 = 64;
    let mut path = path.to_owned();
    for _ in 0..MOST_LINKS {
        match fs::read_link(&path) {
            Ok(target) => path = folder(&path).join(target),
            Err(_) => return Ok(path),
        }
    }
    Err(io::Error::other("too many symbolic links"))
}

fn folder(path: &Path) -> &Path {
    match path.parent() {
        Some(folder) if folder != Path::new("") => folder,
        _ => Path::new("."),
    }
}
