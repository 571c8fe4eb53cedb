//! The hand-book is run as it is printed: its commands, in order, in one folder, with its designs.

mod common;

use std::fs;
use std::path::Path;
use std::process::Command;

use common::Bench;

/// Fenced blocks of a page with their languages.
fn blocks(page: &str) -> Vec<(String, String)> {
    let mut found = Vec::new();
    let mut lines = page.lines();
    while let Some(line) = lines.next() {
        if let Some(language) = line.strip_prefix("```") {
            let text = lines.by_ref().take_while(|line| *line != "```").map(|line| line.to_owned() + "\n");
            found.push((language.to_owned(), text.collect()));
        }
    }
    found
}

fn shell(bench: &Bench, line: &str) -> (Option<i32>, String) {
    let script = line.replacen("plankform", concat!("'", env!("CARGO_BIN_EXE_plankform"), "'"), 1);
    let output =
        Command::new("sh").args(["-c", &script]).current_dir(bench.path()).output().expect("a shell");
    (output.status.code(), String::from_utf8_lossy(&output.stderr).into_owned())
}

/// Runs a page. Blocks of `sh` are commands; a block of `toml` whose first line is `# NAME` is that
/// file, and one that begins with `# add to NAME` goes to its end.
fn run(page: &str) -> usize {
    let text = fs::read_to_string(Path::new(env!("CARGO_MANIFEST_DIR")).join(page)).expect("a page");
    let bench = Bench::new();
    let mut commands = 0;
    for (language, block) in blocks(&text) {
        let heading = block.lines().next().and_then(|line| line.strip_prefix("# ")).unwrap_or("");
        match language.as_str() {
            "sh" => {
                for line in block.lines().filter(|line| line.starts_with("plankform ")) {
                    let (status, said) = shell(&bench, line);
                    assert_eq!(status, Some(0), "{page}: {line}\n{said}");
                    commands += 1;
                }
            }
            "toml" if heading.starts_with("add to ") => {
                let name = heading.trim_start_matches("add to ");
                let before = fs::read_to_string(bench.path().join(name)).expect(name);
                bench.file(name, &format!("{before}\n{block}"));
            }
            "toml" if heading.ends_with(".toml") => {
                bench.file(heading, &block);
            }
            _ => {}
        }
    }
    commands
}

#[test]
fn the_hand_book_runs_as_printed() {
    assert!(run("docs/handbook.md") > 8);
}

#[test]
fn links_between_the_pages_lead_somewhere() {
    let root = Path::new(env!("CARGO_MANIFEST_DIR"));
    let mut pages: Vec<_> =
        fs::read_dir(root.join("docs")).expect("docs").map(|entry| entry.expect("an entry").path()).collect();
    pages.extend([root.join("README.md"), root.join("DEVELOPERS.md")]);
    let mut links = 0;
    for page in pages.iter().filter(|page| page.extension().is_some_and(|ending| ending == "md")) {
        let text = fs::read_to_string(page).expect("a page");
        for link in text.split("](").skip(1).filter_map(|rest| rest.split(')').next()) {
            let (file, heading) = link.split_once('#').unwrap_or((link, ""));
            let target = if file.is_empty() { page.clone() } else { page.with_file_name(file) };
            assert!(target.exists(), "{}: {link}", page.display());
            if !heading.is_empty() {
                let anchor = |line: &str| {
                    let words = line.trim_start_matches('#').trim().to_lowercase();
                    words
                        .replace(' ', "-")
                        .replace(|c: char| !c.is_alphanumeric() && c != '-' && c != '_', "")
                };
                let there = fs::read_to_string(&target).expect("a page");
                let mut headings = there.lines().filter(|line| line.starts_with('#'));
                assert!(headings.any(|line| anchor(line) == heading), "{}: {link}", page.display());
            }
            links += 1;
        }
    }
    assert!(links > 20);
}
