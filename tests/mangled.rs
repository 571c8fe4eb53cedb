//! Files as they look after a bad disk, a bad merge or a bad mood: seeds changed at random places, read by every reader of
//! what a user writes. Nothing may panic, hang, or come out as no number.
//!
//! The changes are the same in every run. `PLANKFORM_MANGLED=100000 cargo test --release --test mangled` tries that many of each
//! kind, further than the short run goes. An input that fails is put into `tests/corpus/`.

use std::collections::BTreeMap;
use std::fs;
use std::io;
use std::path::{Path, PathBuf};

use plankform::design::{Design, Kind, starter};
use plankform::geometry::Curve;
use plankform::section::coordinates::{from_dxf, from_table};
use plankform::section::{Beside, Expression, Section};

/// Words that readers stumble over.
const AWKWARD: [&str; 24] = [
    "NaN",
    "inf",
    "-inf",
    "1e400",
    "-1e-400",
    "0",
    "-0",
    "1e308",
    "99999999999999999999",
    "0x10",
    "1_0",
    "\"",
    "'''",
    "[[",
    "]",
    "= =",
    "\u{0}",
    "\u{feff}",
    "\u{202e}",
    "\r",
    "é",
    "𝛼",
    "../",
    "\\",
];

/// Random numbers that are the same in every run (Marsaglia, "Xorshift RNGs", 2003).
struct Dice(u64);

impl Dice {
    fn below(&mut self, most: usize) -> usize {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        (self.0 % most.max(1) as u64) as usize
    }

    fn range(&mut self, length: usize, longest: usize) -> std::ops::Range<usize> {
        let start = self.below(length + 1);
        start..(start + self.below(longest)).min(length)
    }
}

fn mangled(seeds: &[Vec<u8>], dice: &mut Dice) -> Vec<u8> {
    let mut bytes = seeds[dice.below(seeds.len())].clone();
    let changes = [1, 1, 1, 2, 5][dice.below(5)];
    for _ in 0..changes {
        let other = &seeds[dice.below(seeds.len())];
        match dice.below(10) {
            0 => drop(bytes.drain(dice.range(bytes.len(), 60))),
            1 => {
                let at = dice.below(bytes.len() + 1);
                let put = AWKWARD[dice.below(AWKWARD.len())];
                bytes.splice(at..at, put.bytes());
            }
            2 => {
                let at = dice.below(bytes.len());
                if let Some(byte) = bytes.get_mut(at) {
                    *byte ^= 1 << dice.below(8);
                }
            }
            3 => {
                let (at, piece) = (dice.below(bytes.len() + 1), other[dice.range(other.len(), 200)].to_vec());
                bytes.splice(at..at, piece);
            }
            4 => {
                let piece = bytes[dice.range(bytes.len(), 80)].repeat(dice.below(40));
                bytes.extend(piece);
            }
            // A number, with its unit or without, becomes another one.
            5 | 6 => {
                let digits: Vec<usize> = (0..bytes.len()).filter(|&i| bytes[i].is_ascii_digit()).collect();
                if !digits.is_empty() {
                    let start = digits[dice.below(digits.len())];
                    let is_of_number = |b: &u8| b.is_ascii_digit() || *b == b'.';
                    let end = start + bytes[start..].iter().take_while(|b| is_of_number(b)).count();
                    let put = if dice.below(2) == 0 {
                        AWKWARD[dice.below(9)].to_owned()
                    } else {
                        format!("{}", dice.below(2000) as f64 / 100.0)
                    };
                    bytes.splice(start..end, put.bytes());
                }
            }
            7 | 8 => {
                let digits: Vec<usize> = (0..bytes.len()).filter(|&i| bytes[i].is_ascii_digit()).collect();
                if !digits.is_empty() {
                    bytes[digits[dice.below(digits.len())]] = b'0' + dice.below(10) as u8;
                }
            }
            _ => {
                // Two lines change places.
                let mut lines: Vec<&[u8]> = bytes.split(|&b| b == b'\n').collect();
                let (a, b) = (dice.below(lines.len()), dice.below(lines.len()));
                lines.swap(a, b);
                bytes = lines.join(&b'\n');
            }
        }
    }
    bytes
}

/// Every seed as it stands, then as many mangled ones as asked for.
fn inputs(seeds: Vec<Vec<u8>>, usual: usize) -> impl Iterator<Item = Vec<u8>> {
    assert!(!seeds.is_empty());
    let asked = std::env::var("PLANKFORM_MANGLED").ok().and_then(|text| text.parse().ok());
    let mut dice = Dice(0x9e37_79b9_7f4a_7c15);
    let made = asked.unwrap_or(usual);
    seeds.clone().into_iter().chain((0..made).map(move |_| mangled(&seeds, &mut dice)))
}

/// Files of `folder` that are called so, in order.
fn seeds(folder: &str, begins: &str, ends: &str) -> Vec<Vec<u8>> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join(folder);
    let name =
        |path: &PathBuf| path.file_name().map_or(String::new(), |name| name.to_string_lossy().into_owned());
    let mut paths: Vec<PathBuf> =
        fs::read_dir(folder).expect("a folder").map(|entry| entry.expect("an entry").path()).collect();
    paths.retain(|path| name(path).starts_with(begins) && name(path).ends_with(ends));
    paths.sort();
    paths.iter().map(|path| fs::read(path).expect("a file")).collect()
}

fn nothing_beside(_: &str, _: usize) -> io::Result<Vec<u8>> {
    Err(io::ErrorKind::NotFound.into())
}

/// The section stands: all of its outline is numbers.
fn stands(section: &Section) {
    for i in -40..=40 {
        let jet = section.jet(f64::from(i) / 40.0);
        assert!(
            jet.point.x.is_finite() && jet.point.y.is_finite() && jet.first.hypot().is_finite(),
            "{jet:?}"
        );
    }
}

#[test]
fn designs_are_read_or_refused() {
    let mut all = [(); 10].map(|()| seeds("demo-sections", "", ".toml")).concat();
    all.extend(seeds("tests/gallery", "", ".toml"));
    all.extend(seeds("tests/corpus", "design-", ".toml"));
    let (mut good, mut bad) = (0, 0);
    for bytes in inputs(all, 4000) {
        let text = String::from_utf8_lossy(&bytes);
        match Design::parse_beside(&text, "mangled.toml", &Beside::new(&nothing_beside)) {
            Ok(design) => {
                assert!(design.span.mm().is_finite() && !design.fingerprint().is_empty());
                good += 1;
            }
            Err(errors) => {
                assert!(errors.render(false).contains("mangled.toml:"));
                bad += 1;
            }
        }
    }
    println!("{good} read, {bad} refused");
    assert!(good > 0 && bad > good / 10, "the changes are too kind or too harsh: {good} read, {bad} refused");
}

#[test]
fn section_files_are_read_or_refused() {
    let mut all = seeds("demo-sections/sections", "", ".toml");
    all.extend(seeds("tests/corpus", "section-", ".toml"));
    let (mut good, mut bad) = (0, 0);
    for bytes in inputs(all, 2500) {
        let text = String::from_utf8_lossy(&bytes).into_owned();
        let read = |name: &str, _: usize| -> io::Result<Vec<u8>> {
            if name == "mangled.toml" { Ok(text.clone().into_bytes()) } else { nothing_beside(name, 0) }
        };
        match Beside::new(&read).section("mangled.toml") {
            Ok(section) => {
                stands(&section);
                good += 1;
            }
            Err(error) => {
                assert!(!error.render(false).is_empty());
                bad += 1;
            }
        }
    }
    println!("{good} read, {bad} refused");
    assert!(good > 0 && bad > good / 10, "the changes are too kind or too harsh: {good} read, {bad} refused");
}

#[test]
fn tables_of_coordinates_are_read_or_refused() {
    let mut all = seeds("demo-sections/sections", "", ".txt");
    all.extend(seeds("tests/corpus", "table-", ".txt"));
    let (mut good, mut bad) = (0, 0);
    for bytes in inputs(all, 1500) {
        match from_table(&String::from_utf8_lossy(&bytes), "mangled.txt", None) {
            Ok(traced) => {
                for i in -40..=40 {
                    assert!(traced.surfaces.at(f64::from(i) / 40.0).iter().all(|value| value.is_finite()));
                }
                good += 1;
            }
            Err(errors) => {
                assert!(errors.render(false).contains("mangled.txt:"));
                bad += 1;
            }
        }
    }
    println!("{good} read, {bad} refused");
    assert!(good > 0 && bad > good / 10, "the changes are too kind or too harsh: {good} read, {bad} refused");
}

#[test]
fn drawings_are_read_or_refused() {
    let design = Design::parse(&starter(Kind::Fin), "fin.toml").expect("a starter");
    let kinds = plankform::pack::Kinds {
        print: false,
        masks: false,
        tables: false,
        sheet: false,
        ..plankform::pack::Kinds::ALL
    };
    let pack = plankform::pack::build(&design, kinds).expect("its pack");
    let all: Vec<Vec<u8>> = pack.files.iter().take(2).map(|file| file.bytes.clone()).collect();
    for bytes in inputs(all, 300) {
        if let Err(error) = from_dxf(&bytes, "mangled.dxf", None) {
            assert!(!error.to_string().is_empty());
        }
    }
}

#[test]
fn expressions_are_read_or_refused() {
    let all = seeds("tests/corpus", "expression-", ".txt");
    let constants = BTreeMap::from([("m".to_owned(), 0.04)]);
    let (mut good, mut bad) = (0, 0);
    for bytes in inputs(all, 20_000) {
        match Expression::parse(&String::from_utf8_lossy(&bytes), &constants) {
            Ok(expression) => {
                for x in [0.0, 1e-300, 0.3, 1.0, -1.0, f64::MAX] {
                    // No number may come out, but something does.
                    let _ = expression.at(x).derivatives();
                    let _ = expression.at_root(x.abs()).derivatives();
                }
                good += 1;
            }
            Err(error) => {
                assert!(!error.to_string().is_empty());
                bad += 1;
            }
        }
    }
    println!("{good} read, {bad} refused");
    assert!(good > 0 && bad > good / 10, "the changes are too kind or too harsh: {good} read, {bad} refused");
}
