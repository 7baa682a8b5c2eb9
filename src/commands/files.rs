//! Files in and out: whole files, each complete or not at all.

use std::fs;
use std::io::{self, Write as _};
use std::path::{Path, PathBuf};

use tempfile::NamedTempFile;

use super::Refused;

/// A file's bytes.
pub(super) fn read(path: &Path) -> Result<Vec<u8>, Refused> {
    size(path)?;
    fs::read(path).map_err(|error| unreadable(path, error))
}

/// A file's size, bytes.
pub(super) fn size(path: &Path) -> Result<u64, Refused> {
    let about = fs::metadata(path).map_err(|error| match error.kind() {
        io::ErrorKind::NotFound | io::ErrorKind::NotADirectory => Refused::NoFile(path.to_owned()),
        _ => unreadable(path, error),
    })?;
    if about.is_dir() {
        return Err(Refused::Folder(path.to_owned()));
    }
    if !about.is_file() {
        return Err(Refused::NotAFile(path.to_owned()));
    }
    Ok(about.len())
}

fn unreadable(path: &Path, error: io::Error) -> Refused {
    Refused::Unreadable {
        path: path.to_owned(),
        error,
    }
}

/// Whether there is a file, a folder or a link of this name.
pub(super) fn exists(path: &Path) -> bool {
    fs::symlink_metadata(path).is_ok()
}

/// The folder that a path's last name stands in.
pub(super) fn folder_of(path: &Path) -> PathBuf {
    match path.parent() {
        Some(folder) if !folder.as_os_str().is_empty() => folder.to_owned(),
        _ => PathBuf::from("."),
    }
}

/// One name for each file, whatever way leads to it; a file that is not there yet by its folder's name.
pub(super) fn identity(path: &Path) -> PathBuf {
    if let Ok(found) = fs::canonicalize(path) {
        return found;
    }
    let folder = folder_of(path);
    let folder = fs::canonicalize(&folder).unwrap_or(folder);
    folder.join(path.file_name().unwrap_or_default())
}

/// Makes the folder if it is not there, and tries it with a file that leaves no trace.
pub(super) fn prepare(folder: &Path) -> Result<(), Refused> {
    let tried = fs::create_dir_all(folder).and_then(|()| temporary(folder));
    tried.map(drop).map_err(|error| Refused::Folderless {
        path: folder.to_owned(),
        error,
    })
}

/// A file that is written whole and has yet to take its name; without one it vanishes.
#[derive(Debug)]
pub(super) struct Nameless {
    path: PathBuf,
    file: NamedTempFile,
}

/// Writes a file that is still without its name, piece by piece.
pub(super) fn write<P: AsRef<[u8]>>(
    path: &Path,
    pieces: impl IntoIterator<Item = P>,
) -> Result<Nameless, Refused> {
    let unwritable = |error| Refused::Unwritable {
        path: path.to_owned(),
        error,
    };
    if path.is_dir() {
        return Err(unwritable(io::ErrorKind::IsADirectory.into()));
    }
    let mut file = temporary(&folder_of(path)).map_err(unwritable)?;
    pieces
        .into_iter()
        .try_for_each(|bytes| file.write_all(bytes.as_ref()))
        .and_then(|()| file.flush())
        .map_err(unwritable)?;
    Ok(Nameless {
        path: path.to_owned(),
        file,
    })
}

/// Gives these files their names: they are written whole before the first is named, so that none is written unless
/// there is room for all. Should a name then be refused to one, those before it have theirs.
pub(super) fn name(files: Vec<Nameless>) -> Result<(), Refused> {
    for Nameless { path, file } in files {
        file.persist(&path).map_err(|refusal| Refused::Unwritable {
            path,
            error: refusal.error,
        })?;
    }
    Ok(())
}

/// A file in the folder that vanishes unless it is given a name; readable as any new file of the user is.
fn temporary(folder: &Path) -> io::Result<NamedTempFile> {
    let mut builder = tempfile::Builder::new();
    builder.prefix(".tautplan-");
    #[cfg(unix)]
    {
        use std::os::unix::fs::PermissionsExt as _;
        builder.permissions(fs::Permissions::from_mode(0o666));
    }
    builder.tempfile_in(folder)
}
