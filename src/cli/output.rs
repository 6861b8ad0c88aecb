//! Writing a file: whole or not at all.

use std::io::{ErrorKind, Write};
use std::path::Path;

use super::Answer;

/// Writes beside the target and renames, so that a reader never meets half a file.
pub(super) fn write_whole(path: &Path, bytes: &[u8]) -> std::io::Result<()> {
    if path.is_dir() {
        return Err(std::io::Error::other("this is a folder"));
    }
    let folder = match path.parent() {
        Some(folder) if folder != Path::new("") => folder,
        _ => Path::new("."),
    };
    let mut builder = tempfile::Builder::new();
    builder.prefix(".modewright-");
    #[cfg(unix)]
    {
        // As any other file: the user's mask decides, instead of "for nobody else".
        use std::os::unix::fs::PermissionsExt;
        builder.permissions(std::fs::Permissions::from_mode(0o666));
    }
    let mut file = builder.tempfile_in(folder).map_err(|error| plain(&error))?;
    file.write_all(bytes)?;
    file.flush()?;
    file.persist(path).map_err(|error| plain(&error.error))?;
    Ok(())
}

/// Writes a table, or says why that cannot be done.
pub(super) fn write_table(path: &Path, table: Result<Vec<u8>, csv::Error>) -> Result<(), Answer> {
    let table =
        table.map_err(|error| Answer::fault(format!("the table cannot be written: {error}")))?;
    write_whole(path, &table).map_err(|error| {
        let path = path.display().to_string();
        Answer::wrong(format!(
            "error: cannot write the table {}: {error}\n",
            path.escape_debug()
        ))
    })
}

/// The error in words that do not speak of the temporary file.
fn plain(error: &std::io::Error) -> std::io::Error {
    std::io::Error::other(match error.kind() {
        ErrorKind::NotFound => "its folder does not exist".into(),
        ErrorKind::PermissionDenied => "its folder may not be written to".into(),
        kind => kind.to_string(),
    })
}
