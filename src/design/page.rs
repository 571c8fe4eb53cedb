//! The tables of keys in the hand-book, written from the registry so that they cannot go stale.

use std::fmt::Write;

use super::keys::{Otherwise, TABLES, Times};

/// Every table of the design file with its keys, what each takes, and what holds without it, as
/// Markdown.
#[must_use]
pub fn key_tables() -> String {
    let mut page = String::new();
    for table in TABLES {
        let title = match table.name {
            "" => "Above all tables".to_owned(),
            _ => format!("`{}`", table.header()),
        };
        let times = match table.times {
            Times::Once => "",
            Times::AtMostOnce => " May be left out; then the defaults hold.",
            Times::Absent => " Leave it out if there is none.",
            Times::Many(0, _) => {
                " Stands once for each, as often as there are; leave it out if there is none."
            }
            Times::Many(..) => " Stands once for each station, two at least.",
        };
        let head = "| key | takes | if left out | meaning | example |\n| --- | --- | --- | --- | --- |";
        // Writing to a string cannot fail.
        let _ = write!(page, "### {title}\n\n{}{times}\n\n{head}\n", table.doc);
        for key in table.keys {
            let otherwise = match key.otherwise {
                Otherwise::Required => "required".to_owned(),
                Otherwise::Default(text) => format!("`{}`", key.quoted(text)),
                Otherwise::Left(words) => words.to_owned(),
            };
            let _ = writeln!(
                page,
                "| `{}` | {} | {otherwise} | {} | `{}` |",
                key.name,
                key.takes.describe(),
                key.doc,
                key.quoted(key.example)
            );
        }
        page.push('\n');
    }
    page.truncate(page.trim_end().len());
    page.push('\n');
    page
}
