//! A gallery of files as people get them wrong, each with the answer it gets, word for word, in
//! `tests/gallery/`. The answers are meant to be read: `PLANKFORM_GALLERY=write cargo test --test
//! gallery` writes them anew, and the change shows what a user would see.

mod common;

use std::fs;
use std::path::PathBuf;

use common::Bench;

#[test]
fn wrong_files_get_the_answers_of_the_gallery() {
    let folder = PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("tests/gallery");
    let mut files: Vec<PathBuf> = fs::read_dir(&folder)
        .expect("the gallery")
        .map(|entry| entry.expect("an entry").path())
        .filter(|path| path.extension().is_some_and(|ending| ending == "toml"))
        .collect();
    files.sort();
    assert!(files.len() >= 20);
    let mut differing = Vec::new();
    for path in files {
        let name = path.file_name().and_then(|name| name.to_str()).expect("a name");
        let bench = Bench::new();
        bench.file(name, &fs::read_to_string(&path).expect("a file"));
        let answer = bench.run(&["check", name]);
        assert_eq!((answer.status, answer.out.as_str()), (2, ""), "{name}: {}", answer.err);
        assert_eq!(bench.listing(), [name], "nothing is written");
        let wanted = path.with_extension("txt");
        if std::env::var_os("PLANKFORM_GALLERY").is_some_and(|value| value == "write") {
            fs::write(&wanted, &answer.err).expect("the answer is written");
        } else if fs::read_to_string(&wanted).unwrap_or_default() != answer.err {
            differing.push(format!("{name}:\n{}", answer.err));
        }
    }
    assert!(differing.is_empty(), "not as in the gallery:\n\n{}", differing.join("\n"));
}
