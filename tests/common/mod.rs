//! What several tests share: the built program in an empty folder.

#![allow(dead_code, reason = "each test file uses its own part")]

use std::path::{Path, PathBuf};
use std::process::{Command, Output};

/// An empty folder of a test's own, gone when it ends.
pub(crate) struct Bench {
    folder: tempfile::TempDir,
}

impl Bench {
    pub(crate) fn new() -> Self {
        Self { folder: tempfile::tempdir().expect("a temporary folder") }
    }

    pub(crate) fn path(&self) -> &Path {
        self.folder.path()
    }

    pub(crate) fn file(&self, name: &str, text: &str) -> PathBuf {
        let path = self.path().join(name);
        std::fs::write(&path, text).expect("a file in the temporary folder");
        path
    }

    /// Runs the program here.
    pub(crate) fn run(&self, arguments: &[&str]) -> Answer {
        let output = Command::new(env!("CARGO_BIN_EXE_plankform"))
            .args(arguments)
            .current_dir(self.path())
            .output()
            .expect("the program starts");
        Answer::from(output)
    }

    /// Every file and folder here and below, in order.
    pub(crate) fn listing(&self) -> Vec<String> {
        fn walk(folder: &Path, root: &Path, found: &mut Vec<String>) {
            for entry in std::fs::read_dir(folder).expect("a folder") {
                let path = entry.expect("an entry").path();
                found.push(path.strip_prefix(root).expect("inside").display().to_string());
                if path.is_dir() {
                    walk(&path, root, found);
                }
            }
        }
        let mut found = Vec::new();
        walk(self.path(), self.path(), &mut found);
        found.sort();
        found
    }
}

/// What the program answered.
pub(crate) struct Answer {
    pub(crate) status: i32,
    pub(crate) out: String,
    pub(crate) err: String,
}

impl From<Output> for Answer {
    fn from(output: Output) -> Self {
        let text = |bytes: Vec<u8>| String::from_utf8(bytes).expect("UTF-8");
        Self {
            status: output.status.code().expect("an exit status"),
            out: text(output.stdout),
            err: text(output.stderr),
        }
    }
}

impl Answer {
    pub(crate) fn json(&self) -> serde_json::Value {
        assert!(self.out.starts_with('{'), "no JSON: {} {}", self.out, self.err);
        serde_json::from_str(&self.out).expect("JSON")
    }
}

/// A demo design of the repository.
pub(crate) fn demo(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("demo-sections").join(name)
}

/// A small sound design to vary.
pub(crate) const DESIGN: &str = r#"name = "Trial foil"
kind = "main-foil"

[planform]
span = "400 mm"

[[station]]
at = "0 mm"
chord = "100 mm"
section = "NACA 4412"

[[station]]
at = "200 mm"
chord = "70 mm"
section = "NACA 2412"
twist = "-1 deg"
"#;

/// Whether two drawings are the same but for the rounding of other machines.
pub(crate) fn alike(a: &str, b: &str) -> bool {
    let split = |text: &str| -> Vec<String> {
        text.split_inclusive(|c: char| !(c.is_ascii_digit() || c == '.')).map(str::to_owned).collect()
    };
    let (a, b) = (split(a), split(b));
    a.len() == b.len()
        && a.iter().zip(&b).all(|(a, b)| {
            let number =
                |text: &str| text.trim_end_matches(|c: char| !c.is_ascii_digit()).parse::<f64>().ok();
            match (number(a), number(b)) {
                (Some(a), Some(b)) => (a - b).abs() <= 0.002 + 0.01 * b.abs(),
                _ => a == b,
            }
        })
}
