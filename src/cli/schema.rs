//! `plankform schema`: the JSON Schema of the design file, for editors.

use super::failure::Failure;
use super::{Outcome, print_json};

/// Print the JSON Schema of the design file
#[derive(Debug, clap::Args)]
#[command(after_help = "Example:\n  plankform schema > plankform-schema.json")]
pub(super) struct Arguments {}

pub(super) fn run(_: &Arguments) -> Result<Outcome, Failure> {
    print_json(&plankform::design::schema())?;
    Ok(Outcome::Passed)
}
