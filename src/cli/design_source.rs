//! The design file a command line names.

use std::io::{self, Read};
use std::path::Path;

use plankform::design::{Design, LARGEST_FILE};
use plankform::problems;
use plankform::section::Beside;

use super::failure::Failure;

/// Reads and understands a design file; every problem of it is reported at once.
pub(super) fn read(path: &Path) -> Result<Design, Failure> {
    let text = text_of(path, LARGEST_FILE, "a design file")?;
    let read = reader_beside(path);
    Design::parse_beside(&text, &path.display().to_string(), &Beside::new(&read))
        .map_err(|errors| Failure::Input(errors.render(in_colour())))
}

/// The text of a file, read no further than just past `largest` bytes: the parser refuses it then.
pub(super) fn text_of(path: &Path, largest: usize, what: &str) -> Result<String, Failure> {
    let failed = |e: std::io::Error| Failure::reading(path.display(), &e);
    let file = std::fs::File::open(path).map_err(failed)?;
    let mut bytes = Vec::new();
    file.take(largest as u64 + 1).read_to_end(&mut bytes).map_err(failed)?;
    problems::text_of(bytes, largest).map_err(|at| {
        let path = path.display();
        Failure::Input(format!("{path}: byte {at} is not UTF-8 text: {what} is plain text in TOML"))
    })
}

/// Whether reports on standard error may be coloured.
pub(super) fn in_colour() -> bool {
    std::env::var_os("NO_COLOR").is_none_or(|v| v.is_empty())
        && std::io::IsTerminal::is_terminal(&std::io::stderr())
}

/// Reads files beside `path` or in folders below it, never such as a link leads out of there.
pub(super) fn reader_beside(path: &Path) -> impl Fn(&str, usize) -> io::Result<Vec<u8>> + use<> {
    let folder = path.parent().filter(|folder| !folder.as_os_str().is_empty()).unwrap_or(Path::new("."));
    let (folder, own) = (folder.to_owned(), path.file_name().map(Path::new).map(Path::to_owned));
    move |name, most| {
        let wanted = folder.join(name);
        // The file that the user named may be a link; what it names in turn may not lead out.
        if own.as_deref() != Some(Path::new(name))
            && !wanted.canonicalize()?.starts_with(folder.canonicalize()?)
        {
            return Err(io::Error::other("a link leads out of the folder"));
        }
        let file = std::fs::File::open(wanted)?;
        if !file.metadata()?.is_file() {
            return Err(io::Error::other("it is no file"));
        }
        let mut bytes = Vec::new();
        file.take(most as u64).read_to_end(&mut bytes)?;
        Ok(bytes)
    }
}
