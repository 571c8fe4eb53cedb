//! `plankform build`: the pack of a design, written as a whole or not at all.

use std::path::PathBuf;

use clap::ValueEnum;
use plankform::pack::{self, Kinds, Manifest};

use super::failure::Failure;
use super::progress::Progress;
use super::{Outcome, ReportFormat, check, design_source, print, print_json};

/// Build the pack of workshop files of a design
#[derive(Debug, clap::Args)]
#[command(
    after_help = "Example:\n  plankform new my-foil.toml\n  plankform build my-foil.toml --out my-pack"
)]
pub(super) struct Arguments {
    /// The design file
    #[arg(value_name = "DESIGN")]
    design: PathBuf,
    /// Folder for the pack [default: pack-NAME, after the design's name]
    #[arg(long, value_name = "DIR")]
    out: Option<PathBuf>,
    /// Only these kinds of files; an earlier pack is replaced by them as a whole
    #[arg(long, value_name = "KIND", value_delimiter = ',')]
    only: Vec<Kind>,
    /// How to print
    #[arg(long, default_value = "text")]
    format: ReportFormat,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum Kind {
    /// Router files
    Cut,
    /// Paper templates
    Print,
    /// Printed masks
    Masks,
    /// Tables of offsets, lift and pressure
    Tables,
    /// The build sheet
    Sheet,
}

pub(super) fn run(arguments: &Arguments) -> Result<Outcome, Failure> {
    let design = design_source::read(&arguments.design)?;
    let out = arguments.out.clone().unwrap_or_else(|| PathBuf::from(format!("pack-{}", design.slug())));
    let pack = {
        let progress = Progress::of("lift curves");
        pack::build_telling(&design, kinds(&arguments.only), &|done, total| progress.show(done, total))?
    };
    let replaced = pack::write(&pack, &out)?;

    match arguments.format {
        ReportFormat::Json => {
            let written = Manifest { out: out.display().to_string(), ..pack.manifest.clone() };
            print_json(&written)?;
        }
        ReportFormat::Text => {
            let mut text = format!("{}  {}\n\n", pack.manifest.design, pack.manifest.fingerprint);
            text.push_str(&check::listed(&pack.checks));
            let count = pack.files.len() + 1;
            text.push_str(&format!("{count} files written to {}\n", out.display()));
            if let Some(earlier) = replaced.filter(|earlier| earlier.fingerprint != pack.manifest.fingerprint)
            {
                let (old, new) = (&earlier.fingerprint, &pack.manifest.fingerprint);
                text.push_str(&format!("they replace {old}: do not mix its pieces with those of {new}\n"));
            }
            if pack.files.iter().any(|file| file.kind == "html") {
                text.push_str(&format!("start with {}\n", out.join("sheet.html").display()));
            }
            print(&text)?;
        }
    }
    Ok(if pack.manifest.passed { Outcome::Passed } else { Outcome::OutsideLimits })
}

fn kinds(only: &[Kind]) -> Kinds {
    let wanted = |kind| only.is_empty() || only.contains(&kind);
    Kinds {
        cut: wanted(Kind::Cut),
        print: wanted(Kind::Print),
        masks: wanted(Kind::Masks),
        tables: wanted(Kind::Tables),
        sheet: wanted(Kind::Sheet),
    }
}
