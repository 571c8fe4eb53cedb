//! `plankform completions`: what a shell needs to complete verbs and options.

use clap::CommandFactory;
use clap_complete::Shell;

use super::failure::Failure;
use super::{Outcome, print};

/// Print completions of verbs and options for a shell
#[derive(Debug, clap::Args)]
#[command(
    after_help = "Example:\n  plankform completions bash > plankform.bash\n\nThe shell's own handbook says \
which folder such files belong in."
)]
pub(super) struct Arguments {
    /// The shell
    #[arg(value_name = "SHELL")]
    shell: Shell,
}

pub(super) fn run(arguments: &Arguments) -> Result<Outcome, Failure> {
    let mut script = Vec::new();
    clap_complete::generate(arguments.shell, &mut super::Arguments::command(), "plankform", &mut script);
    print(&String::from_utf8_lossy(&script))?;
    Ok(Outcome::Passed)
}
