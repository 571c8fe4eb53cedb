//! `plankform new`: a commented design to start from.

use std::path::{Path, PathBuf};

use clap::ValueEnum;
use plankform::design::{Kind, SCHEMA_FILE, schema, starter};

use super::failure::Failure;
use super::{Outcome, as_json, save, say};

/// Write a commented design file to start from
#[derive(Debug, clap::Args)]
#[command(
    after_help = "Example:\n  plankform new my-foil.toml --kind main-foil\n\nThe schema is written beside it, for \
editors that complete and check by it: design and schema go together."
)]
pub(super) struct Arguments {
    /// The file to write; it must not exist yet
    #[arg(value_name = "FILE")]
    file: PathBuf,
    /// What the design is for
    #[arg(long, default_value = "main-foil")]
    kind: KindWord,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum KindWord {
    /// The foil that carries the boat
    MainFoil,
    /// The foil that trims it
    Elevator,
    /// What joins foil and hull
    Strut,
    /// A fin, on one side of the hull only
    Fin,
}

pub(super) fn run(arguments: &Arguments) -> Result<Outcome, Failure> {
    if arguments.file.exists() {
        return Err(Failure::Input(format!(
            "{} exists already: name a new file, nothing is overwritten",
            arguments.file.display()
        )));
    }
    let kind = match arguments.kind {
        KindWord::MainFoil => Kind::MainFoil,
        KindWord::Elevator => Kind::Elevator,
        KindWord::Strut => Kind::Strut,
        KindWord::Fin => Kind::Fin,
    };
    save(&arguments.file, &starter(kind))?;
    put_schema(&arguments.file.with_file_name(SCHEMA_FILE))?;
    say(&format!("{} written; next: plankform check {}", arguments.file.display(), arguments.file.display()));
    Ok(Outcome::Passed)
}

/// Writes the schema that the starter names, unless something else goes by that name.
fn put_schema(path: &Path) -> Result<(), Failure> {
    let schema = schema();
    let there = std::fs::read(path).map(|bytes| serde_json::from_slice::<serde_json::Value>(&bytes).ok());
    match there {
        Ok(Some(there)) if there == schema => Ok(()),
        // Of another version.
        Ok(Some(there)) if there["title"] == schema["title"] => save(path, &as_json(&schema)?),
        Err(error) if error.kind() == std::io::ErrorKind::NotFound => save(path, &as_json(&schema)?),
        _ => {
            say(&format!("{} is something else and stays; editors will not find the schema", path.display()));
            Ok(())
        }
    }
}
