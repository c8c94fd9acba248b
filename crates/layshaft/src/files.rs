//! The only door to the disk: which specs are meant, what a spec may read, how a file is written.
//!
//! What a spec names (`use`, `csv`) is read only inside its root: the nearest folder above it that holds a
//! `layshaft.toml`, else its own folder. A path with `..`, an absolute path and a link that leads out are refused.

#![allow(clippy::disallowed_methods, reason = "this is the module of the command that touches files")]

use std::ffi::OsStr;
use std::fs;
use std::io::{self, Read, Write};
use std::path::{Component, Path, PathBuf};
use std::sync::Arc;

use layshaft_semantics::files::{Files, ReadError};

/// Largest spec, in bytes.
pub const SPEC_LIMIT: u64 = 10_000_000;
/// Largest table, in bytes: room for the 10⁶ rows that are read at most.
pub const TABLE_LIMIT: u64 = 100_000_000;
/// The file that marks a root.
pub const ROOT_MARK: &str = "layshaft.toml";
/// The ending of a spec.
pub const SPEC_ENDING: &str = "shaft";
/// Names of one folder that are listed at most.
const MOST_LISTED: usize = 2_000;
/// Folders nested deeper than this are not searched.
const DEEPEST: usize = 64;

/// The folder that a spec may read from.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Root {
    folder: PathBuf,
}

impl Root {
    /// The root of the specs in `folder`.
    ///
    /// # Errors
    /// The folder cannot be reached.
    pub fn of(folder: &Path) -> io::Result<Self> {
        let folder = fs::canonicalize(folder)?;
        let marked = folder.ancestors().find(|above| above.join(ROOT_MARK).is_file());
        Ok(Self { folder: marked.unwrap_or(&folder).to_path_buf() })
    }

    /// The root that [`Root::of`] has found before.
    #[must_use]
    pub fn at(folder: &Path) -> Self {
        Self { folder: folder.to_path_buf() }
    }

    /// The folder itself, no links in it.
    #[must_use]
    pub fn folder(&self) -> &Path {
        &self.folder
    }

    /// The path below the root of a file in `folder`.
    #[must_use]
    pub fn below(&self, folder: &Path, file: &OsStr) -> Option<String> {
        self.relative(&fs::canonicalize(folder).ok()?.join(file))
    }

    /// What a folder inside the root holds, sorted: each name, and whether it is a folder. Names that begin with a
    /// point and names that are not in Unicode are left out, and of a very full folder the rest.
    ///
    /// # Errors
    /// The folder cannot be listed, or lies outside.
    pub fn list(&self, folder: &str) -> io::Result<Vec<(String, bool)>> {
        let real = fs::canonicalize(self.folder.join(folder))?;
        if !real.starts_with(&self.folder) {
            return Err(io::ErrorKind::PermissionDenied.into());
        }
        let mut found = Vec::new();
        for entry in fs::read_dir(real)?.take(MOST_LISTED) {
            let entry = entry?;
            let Ok(name) = entry.file_name().into_string() else { continue };
            if !name.starts_with('.') {
                found.push((name, entry.path().is_dir()));
            }
        }
        found.sort();
        Ok(found)
    }

    /// A path below the root with `/` between names; `None` if it is elsewhere or not in Unicode.
    fn relative(&self, path: &Path) -> Option<String> {
        let inside = path.strip_prefix(&self.folder).ok()?;
        let names: Option<Vec<&str>> = inside.components().map(|part| part.as_os_str().to_str()).collect();
        names.map(|names| names.join("/"))
    }
}

impl Files for Root {
    fn read(&self, path: &str) -> Result<Arc<str>, ReadError> {
        let wanted = Path::new(path);
        let plain = |part: Component| matches!(part, Component::Normal(_) | Component::CurDir);
        if path.is_empty() || !wanted.components().all(plain) {
            return Err(ReadError::Outside);
        }
        let real = fs::canonicalize(self.folder.join(wanted)).map_err(failure)?;
        if !real.starts_with(&self.folder) {
            return Err(ReadError::Outside);
        }
        read(&real).map(Arc::from)
    }
}

/// The current folder, no links in it; empty where it cannot be had.
#[must_use]
pub fn here() -> PathBuf {
    std::env::current_dir().and_then(fs::canonicalize).unwrap_or_default()
}

/// Whether a path leads to a folder.
#[must_use]
pub fn is_folder(path: &Path) -> bool {
    path.is_dir()
}

/// Length and time of change of a file: others when its text is another.
#[must_use]
pub fn stamp(path: &Path) -> Option<(u64, u128)> {
    let about = fs::metadata(path).ok()?;
    let changed = about.modified().ok()?.duration_since(std::time::UNIX_EPOCH).ok()?;
    Some((about.len(), changed.as_nanos()))
}

/// Whether a process runs, where the system shows its processes as folders.
#[must_use]
pub fn runs(process: u32) -> Option<bool> {
    let all = Path::new("/proc");
    all.join("self").exists().then(|| all.join(process.to_string()).exists())
}

/// The text of a file.
///
/// # Errors
/// Says why there is none.
pub fn read(path: &Path) -> Result<String, ReadError> {
    // Asked before opening: to open a pipe would wait for its other end.
    let about = fs::metadata(path).map_err(failure)?;
    if about.is_dir() {
        return Err(ReadError::Other(String::from("it is a folder")));
    }
    if !about.is_file() {
        return Err(ReadError::Other(String::from("it is not a regular file")));
    }
    let limit =
        if path.extension().is_some_and(|ending| ending == SPEC_ENDING) { SPEC_LIMIT } else { TABLE_LIMIT };
    let file = fs::File::open(path).map_err(failure)?;
    take(file, limit, about.len())
}

/// The text of standard input.
///
/// # Errors
/// Says why there is none.
pub fn read_stdin() -> Result<String, ReadError> {
    take(io::stdin().lock(), SPEC_LIMIT, 0)
}

fn take(from: impl Read, limit: u64, expected: u64) -> Result<String, ReadError> {
    let mut bytes = Vec::with_capacity(expected.min(limit) as usize);
    from.take(limit + 1).read_to_end(&mut bytes).map_err(failure)?;
    if bytes.len() as u64 > limit {
        return Err(ReadError::TooLarge(limit));
    }
    String::from_utf8(bytes).map_err(|bad| ReadError::NotText(bad.utf8_error().valid_up_to()))
}

fn failure(error: io::Error) -> ReadError {
    match error.kind() {
        io::ErrorKind::NotFound | io::ErrorKind::NotADirectory => ReadError::Missing,
        _ => ReadError::Other(error.to_string()),
    }
}

/// Why a file could not be had, as the end of a sentence that begins with its name.
#[must_use]
pub fn reason(error: &ReadError) -> String {
    match error {
        ReadError::Missing => String::from("is not there"),
        ReadError::Outside => String::from("lies outside the root that its spec may read from"),
        ReadError::TooLarge(limit) => {
            format!("is larger than {} MB; split the spec with `use`", limit / 1_000_000)
        }
        ReadError::NotText(at) => {
            format!("is not UTF-8 text: the first wrong byte is number {}; save it as UTF-8", at + 1)
        }
        ReadError::Other(words) => format!("cannot be read: {words}"),
    }
}

/// Every spec below a folder, sorted by path. Folders that begin with a point are left out; links count only
/// where they lead to a file inside the folder.
///
/// # Errors
/// A folder cannot be listed.
pub fn specs_below(folder: &Path) -> io::Result<Vec<PathBuf>> {
    let real = fs::canonicalize(folder)?;
    let mut found = Vec::new();
    collect(folder, &real, 0, &mut found)?;
    found.sort();
    Ok(found)
}

fn collect(folder: &Path, top: &Path, depth: usize, found: &mut Vec<PathBuf>) -> io::Result<()> {
    for entry in fs::read_dir(folder)? {
        let entry = entry?;
        let (path, kind) = (entry.path(), entry.file_type()?);
        let hidden = entry.file_name().as_encoded_bytes().first() == Some(&b'.');
        if hidden {
            continue;
        }
        if kind.is_dir() {
            if depth < DEEPEST {
                collect(&path, top, depth + 1, found)?;
            }
        } else if path.extension().is_some_and(|ending| ending == SPEC_ENDING) {
            let leads_inside =
                || fs::canonicalize(&path).is_ok_and(|real| real.starts_with(top) && real.is_file());
            if kind.is_file() || (kind.is_symlink() && leads_inside()) {
                found.push(path);
            }
        }
    }
    Ok(())
}

/// Puts a new text in the place of a file's, whole or not at all: written beside it, then renamed. Keeps the
/// file's permissions, follows a link to its file.
///
/// # Errors
/// Nothing was changed; the temporary file is gone.
pub fn replace(path: &Path, text: &str) -> io::Result<()> {
    let target = fs::canonicalize(path)?;
    let permissions = fs::metadata(&target)?.permissions();
    if permissions.readonly() {
        return Err(io::Error::new(io::ErrorKind::PermissionDenied, "the file is read-only"));
    }
    let folder = target.parent().ok_or_else(|| io::Error::from(io::ErrorKind::NotFound))?;
    let (temporary, file) = beside(folder)?;
    let done = fill(file, text, permissions).and_then(|()| fs::rename(&temporary, &target));
    if done.is_err() {
        let _ = fs::remove_file(&temporary);
    }
    done
}

fn fill(mut file: fs::File, text: &str, permissions: fs::Permissions) -> io::Result<()> {
    file.write_all(text.as_bytes())?;
    file.set_permissions(permissions)?;
    file.sync_all()
}

/// A new file in a folder, by a name that nobody else has.
fn beside(folder: &Path) -> io::Result<(PathBuf, fs::File)> {
    let mut count = 0_u32;
    loop {
        let path = folder.join(format!(".layshaft-{}-{count}.tmp", std::process::id()));
        match fs::OpenOptions::new().write(true).create_new(true).open(&path) {
            Ok(file) => return Ok((path, file)),
            Err(error) if error.kind() == io::ErrorKind::AlreadyExists && count < 100 => count += 1,
            Err(error) => return Err(error),
        }
    }
}

/// Writes a new file; never over one that is there.
///
/// # Errors
/// The file exists, or cannot be written; then nothing is left behind.
pub fn create(path: &Path, text: &str) -> io::Result<()> {
    let mut file = fs::OpenOptions::new().write(true).create_new(true).open(path)?;
    let done = file.write_all(text.as_bytes());
    if done.is_err() {
        let _ = fs::remove_file(path);
    }
    done
}
