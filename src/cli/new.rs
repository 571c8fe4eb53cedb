//! `plankform new`: a commented design to start from.

use std::path::PathBuf;

use clap::ValueEnum;
use plankform::design::{Kind, starter};

use super::failure::Failure;
use super::{Outcome, save, say};

/// Write a commented design file to start from
#[derive(Debug, clap::Args)]
#[command(after_help = "Example:\n  plankform new my-foil.toml --kind main-foil")]
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
    say(&format!("{} written; next: plankform check {}", arguments.file.display(), arguments.file.display()));
    Ok(Outcome::Passed)
}
