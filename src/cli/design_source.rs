//! The design file a command line names.

use std::path::Path;

use plankform::design::Design;

use super::failure::Failure;

/// Reads and understands a design file; every problem of it is reported at once.
pub(super) fn read(path: &Path) -> Result<Design, Failure> {
    let bytes = std::fs::read(path).map_err(|e| Failure::reading(path.display(), &e))?;
    let text = String::from_utf8(bytes).map_err(|e| {
        let at = e.utf8_error().valid_up_to();
        Failure::Input(format!(
            "{}: byte {at} is not UTF-8 text: a design file is plain text in TOML",
            path.display()
        ))
    })?;
    let colour = std::env::var_os("NO_COLOR").is_none_or(|v| v.is_empty())
        && std::io::IsTerminal::is_terminal(&std::io::stderr());
    Design::parse(&text, &path.display().to_string()).map_err(|errors| Failure::Input(errors.render(colour)))
}
