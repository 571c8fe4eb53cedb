//! The verbs. The only place that prints and sets the exit status.

mod build;
mod check;
mod completions;
mod design_source;
mod failure;
mod lift;
mod manual;
mod new;
mod number_list;
mod progress;
mod schema;
mod section;
mod section_source;

use std::io::{self, Write};
use std::process::ExitCode;

use clap::{Parser, Subcommand, ValueEnum};

use failure::Failure;

/// From one design file to a checked pack of workshop files for home-built hydrofoils.
#[derive(Debug, Parser)]
#[command(name = "plankform", version, propagate_version = true, disable_help_subcommand = true)]
#[command(after_help = "Exit status: 0 done and every check passed; 1 done, but a check is outside \
its limit; 2 the input is wrong, nothing written; 3 reading or writing failed, nothing half-written.")]
struct Arguments {
    #[command(subcommand)]
    verb: Verb,
}

#[derive(Debug, Subcommand)]
enum Verb {
    New(new::Arguments),
    Section(section::Arguments),
    Lift(lift::Arguments),
    Check(check::Arguments),
    Build(build::Arguments),
    Schema(schema::Arguments),
    Completions(completions::Arguments),
    Manual(manual::Arguments),
}

/// How data is printed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum Format {
    /// For people.
    Text,
    /// Comma-separated values.
    Csv,
    /// For programs.
    Json,
}

/// As [`Format`], for the verbs that have no table.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum ReportFormat {
    /// For people.
    Text,
    /// For programs.
    Json,
}

/// What a verb that did its work has to say of its checks.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Outcome {
    Passed,
    OutsideLimits,
}

/// Runs the verb that the command line names.
pub(crate) fn run() -> ExitCode {
    let arguments = Arguments::parse();
    let outcome = match arguments.verb {
        Verb::New(a) => new::run(&a),
        Verb::Section(a) => section::run(&a),
        Verb::Lift(a) => lift::run(&a),
        Verb::Check(a) => check::run(&a),
        Verb::Build(a) => build::run(&a),
        Verb::Schema(a) => schema::run(&a),
        Verb::Completions(a) => completions::run(&a),
        Verb::Manual(a) => manual::run(&a),
    };
    match outcome {
        Ok(Outcome::Passed) => ExitCode::SUCCESS,
        Ok(Outcome::OutsideLimits) => ExitCode::from(1),
        Err(failure) => {
            say(&failure.to_string());
            ExitCode::from(failure.exit_status())
        }
    }
}

/// Prints data to standard output. A reader that has gone away is no failure of ours.
fn print(text: &str) -> Result<(), Failure> {
    let mut out = io::stdout().lock();
    match out.write_all(text.as_bytes()).and_then(|()| out.flush()) {
        Err(error) if error.kind() != io::ErrorKind::BrokenPipe => {
            Err(Failure::writing("standard output", &error))
        }
        _ => Ok(()),
    }
}

fn print_json(value: &impl serde::Serialize) -> Result<(), Failure> {
    print(&as_json(value)?)
}

fn as_json(value: &impl serde::Serialize) -> Result<String, Failure> {
    let text = serde_json::to_string_pretty(value).map_err(|e| Failure::writing("JSON", &e.into()))?;
    Ok(format!("{text}\n"))
}

/// Says something to the person, on standard error.
fn say(text: &str) {
    // Nothing sensible can be done when standard error is closed.
    let _ = writeln!(io::stderr().lock(), "{text}");
}

/// Writes a file the user asked for by name, as a whole or not at all.
fn save(path: &std::path::Path, text: &str) -> Result<(), Failure> {
    let failed = |error: io::Error| Failure::writing(path.display(), &error);
    let folder = path.parent().filter(|p| !p.as_os_str().is_empty()).unwrap_or(std::path::Path::new("."));
    if path.is_dir() {
        return Err(Failure::Input(format!("{} is a folder: name a file to write", path.display())));
    }
    let mut file = tempfile::NamedTempFile::new_in(folder).map_err(failed)?;
    file.write_all(text.as_bytes()).map_err(failed)?;
    let kept = file.persist(path).map_err(|e| failed(e.error))?;
    // Temporary files are private; one the user asked for is like any other.
    #[cfg(unix)]
    {
        use std::os::unix::fs::PermissionsExt;
        kept.set_permissions(std::fs::Permissions::from_mode(0o644)).map_err(failed)?;
    }
    Ok(())
}
