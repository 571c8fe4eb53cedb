//! The whole pack of the main demo: made, and written, against plain writing of the same bytes.
//!
//! Both are timed in turn in the same run, so that the ratio holds on a machine whose speed drifts.

#![allow(clippy::print_stdout, reason = "a bench reports on standard output")]
#![allow(clippy::unwrap_used, reason = "a bench may stop at the first surprise")]

use std::fs;
use std::path::Path;
use std::time::{Duration, Instant};

use plankform::design::Design;
use plankform::pack::{self, Kinds, Pack};

const ROUNDS: usize = 31;

fn main() {
    let file = Path::new(env!("CARGO_MANIFEST_DIR")).join("demo-sections/main-foil.toml");
    let text = fs::read_to_string(&file).unwrap();
    let folder = tempfile::tempdir().unwrap();
    let make = || pack::build(&Design::parse(&text, "main-foil.toml").unwrap(), Kinds::ALL).unwrap();
    let made = make();
    let size: usize = made.files.iter().map(|file| file.bytes.len()).sum();

    let (mut building, mut writing, mut plain) = (Vec::new(), Vec::new(), Vec::new());
    for round in 0..ROUNDS {
        building.push(timed(|| drop(make())));
        let out = folder.path().join(format!("pack-{round}"));
        writing.push(timed(|| drop(pack::write(&made, &out).unwrap())));
        let out = folder.path().join(format!("plain-{round}"));
        plain.push(timed(|| write_plainly(&made, &out)));
    }
    let (building, writing, plain) = (median(building), median(writing), median(plain));
    let rate = |time: Duration| size as f64 / 1e6 / time.as_secs_f64();
    println!(
        "pack of the main demo: {} files, {:.2} MB; medians of {ROUNDS}",
        made.files.len() + 1,
        size as f64 / 1e6
    );
    println!("  made in memory      {:8.2} ms  {:8.1} MB/s", building.as_secs_f64() * 1e3, rate(building));
    println!("  written atomically  {:8.2} ms  {:8.1} MB/s", writing.as_secs_f64() * 1e3, rate(writing));
    println!("  plain writing       {:8.2} ms  {:8.1} MB/s", plain.as_secs_f64() * 1e3, rate(plain));
    println!("  atomic to plain     {:8.2}", writing.as_secs_f64() / plain.as_secs_f64());
}

fn write_plainly(pack: &Pack, folder: &Path) {
    for file in &pack.files {
        let path = folder.join(&file.path);
        fs::create_dir_all(path.parent().unwrap()).unwrap();
        fs::write(path, &file.bytes).unwrap();
    }
}

fn timed(work: impl FnOnce()) -> Duration {
    let start = Instant::now();
    work();
    start.elapsed()
}

fn median(mut times: Vec<Duration>) -> Duration {
    times.sort_unstable();
    times[times.len() / 2]
}
