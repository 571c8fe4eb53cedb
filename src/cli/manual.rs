//! `plankform manual`: the help as manual pages.

use clap::CommandFactory;
use clap_mangen::Man;

use super::failure::Failure;
use super::{Outcome, print};

/// Print a manual page: the help, for man
#[derive(Debug, clap::Args)]
#[command(
    after_help = "Example:\n  plankform manual > plankform.1\n  plankform manual build > plankform-build.1"
)]
pub(super) struct Arguments {
    /// The page of this verb; of all in short when left out
    #[arg(value_name = "VERB")]
    verb: Option<String>,
}

pub(super) fn run(arguments: &Arguments) -> Result<Outcome, Failure> {
    let mut whole = super::Arguments::command();
    // Gives the verbs their full names, and what they take over from the whole.
    whole.build();
    let command = match &arguments.verb {
        None => whole,
        Some(verb) => {
            let names: Vec<&str> = whole.get_subcommands().map(clap::Command::get_name).collect();
            let unknown = || Failure::Input(format!("'{verb}' is no verb: one of {}", names.join(", ")));
            let found = whole.find_subcommand(verb).ok_or_else(unknown)?;
            found.clone()
        }
    };
    let mut page = Vec::new();
    Man::new(command).render(&mut page).map_err(|error| Failure::writing("the page", &error))?;
    print(&String::from_utf8_lossy(&page))?;
    Ok(Outcome::Passed)
}
