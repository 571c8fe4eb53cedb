//! `plankform check`: a design against its limits, without writing anything.

use std::path::PathBuf;

use plankform::pack::{Check, run_checks_telling};
use plankform::units::number;
use serde_json::json;

use super::failure::Failure;
use super::progress::Progress;
use super::{Outcome, ReportFormat, design_source, print, print_json};

/// Check a design against its limits, without writing anything
#[derive(Debug, clap::Args)]
#[command(after_help = "Example:\n  plankform new my-foil.toml\n  plankform check my-foil.toml")]
pub(super) struct Arguments {
    /// The design file
    #[arg(value_name = "DESIGN")]
    design: PathBuf,
    /// How to print
    #[arg(long, default_value = "text")]
    format: ReportFormat,
}

pub(super) fn run(arguments: &Arguments) -> Result<Outcome, Failure> {
    let design = design_source::read(&arguments.design)?;
    let checks = {
        let progress = Progress::of("lift curves");
        run_checks_telling(&design, &|done, total| progress.show(done, total))?
    };
    let passed = checks.iter().all(|check| check.passed);
    match arguments.format {
        ReportFormat::Text => {
            let heading = format!("{}  {}\n\n", design.name, design.fingerprint());
            print(&(heading + &listed(&checks)))?;
        }
        ReportFormat::Json => print_json(&json!({
            "design": design.name,
            "fingerprint": design.fingerprint(),
            "passed": passed,
            "checks": checks,
        }))?,
    }
    Ok(if passed { Outcome::Passed } else { Outcome::OutsideLimits })
}

/// The checks line by line and a count; those outside their limit last, where they are seen.
pub(super) fn listed(checks: &[Check]) -> String {
    let mut text = String::new();
    let outside = checks.iter().filter(|check| !check.passed);
    for check in checks.iter().filter(|check| check.passed).chain(outside) {
        let mark = if check.passed { "passed " } else { "OUTSIDE" };
        let unit = &check.unit;
        let (value, limit) = (number(check.value, 3), number(check.limit, 3));
        text.push_str(&format!("{mark}  {}: {}\n", check.place, check.name));
        text.push_str(&format!(
            "         {}",
            format_args!("{value} against {limit} {unit}").to_string().trim_end()
        ));
        text.push_str(&format!("; {}\n", check.why));
    }
    let outside = checks.iter().filter(|check| !check.passed).count();
    text.push_str(&format!("\n{} checks, {outside} outside their limit\n", checks.len()));
    text
}
