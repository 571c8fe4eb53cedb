//! What to cut and to print, how many, in which order, each with a small picture.

use std::fmt::Write as _;

use crate::design::{Design, DxfRelease};
use crate::export::html::{escaped, table};
use crate::export::{numbered_picture, page_picture, solid_view};
use crate::pack::PackFile;
use crate::pack::aids::Aids;
use crate::pack::printed::Masked;
use crate::units::number;
use crate::workshop::Page;

pub(super) fn pieces_and_pages(body: &mut String, design: &Design, aids: &Aids<'_>, files: &[PackFile]) {
    let has = |kind: &str| files.iter().any(|file| file.kind == kind);
    if !(has("dxf") || has("pdf") || has("stl")) {
        return;
    }
    body.push_str("<h2>What to cut and print</h2>\n");
    order(body, design, aids, files);
    if has("dxf") {
        sheets(body, design, aids);
    }
    if has("stl") {
        masks(body, design, aids);
    }
    if has("pdf") {
        pages(body, "Paper", &aids.prints.finished);
        pages(body, "Paper, wood", &aids.prints.wood);
    }
}

/// What is made of which files, in the order in which the bench wants it.
fn order(body: &mut String, design: &Design, aids: &Aids<'_>, files: &[PackFile]) {
    let count = |role: &str| files.iter().filter(|file| file.role == role).count();
    let both_halves = if design.in_halves() { "; each serves both halves of the foil" } else { "" };
    let mut rows: Vec<[String; 4]> = Vec::new();
    let mut row = |what: &str, which: &str, many: String, when: &str| {
        rows.push([(rows.len() + 1).to_string(), format!("{what}: {which}"), many, when.to_owned()]);
    };
    let pages = aids.prints.finished.len() + aids.prints.wood.len();
    if count("all templates, tiled") > 0 {
        row(
            "Print on paper",
            "print/*.pdf",
            counted(pages, "page"),
            "to mark out by, and to check everything else against",
        );
    }
    if count("sheet of stock") > 0 {
        let sheets = aids.layout.sheets.len();
        let pieces = aids.cut.len();
        let release = if design.router.release == DxfRelease::Both { ", in two releases" } else { "" };
        let many = format!("{} with {pieces} pieces{release}{both_halves}", counted(sheets, "sheet"));
        row("Rout", "cut/*-sheet-*.dxf", many, "or the pieces one by one from the other files in cut/");
    }
    for (role, what, which, when) in [
        ("core mask half", "Print masks of the wood", "masks/*-core-*.stl", "to shape the wood to"),
        (
            "mask half",
            "Print masks of the finished foil",
            "masks/*-upper*.stl and *-lower*.stl",
            "to fill and sand to",
        ),
        ("cradle", "Print cradles", "masks/*-cradle-*.stl", "to hold the half-shaped wood"),
        ("end rail", "Print rails", "masks/*-rail-*.stl", "to guide a straight edge or a router sled"),
    ] {
        if count(role) > 0 {
            // Taper and twist of a cradle run along the span.
            let is_handed = role == "cradle" && design.in_halves();
            let halves = if is_handed { "; once more, mirrored, for the other half" } else { both_halves };
            let many = format!("{}{halves}", count(role));
            row(what, which, many, when);
        }
    }
    body.push_str(&table(["order", "what", "how many", "when it is used"], &rows, |_| false));
}

fn counted(count: usize, what: &str) -> String {
    if count == 1 { format!("1 {what}") } else { format!("{count} {what}s") }
}

/// The sheets of stock: what lies on each, and what is left.
fn sheets(body: &mut String, design: &Design, aids: &Aids<'_>) {
    let stock = &design.stock;
    let layout = &aids.layout;
    let used: f64 =
        layout.sheets.iter().map(|sheet| sheet.used).sum::<f64>() / layout.sheets.len().max(1) as f64;
    let _ = writeln!(
        body,
        "<h3>Sheets of stock</h3>\n<p>{} of {} by {} mm, {} mm thick; {:.0} % of it is waste. {}</p>",
        counted(layout.sheets.len(), "sheet"),
        number(stock.length.mm(), 1),
        number(stock.width.mm(), 1),
        number(stock.thickness.mm(), 1),
        100.0 * (1.0 - used),
        if design.router.is_path {
            "Contours are the path of the cutter's middle: set off no radius."
        } else {
            "Contours are the line of the piece: set the cutter's radius off in the router's program."
        }
    );
    if !layout.too_large.is_empty() {
        let _ = writeln!(
            body,
            "<p class=\"bad\">On no sheet: {}. They have files of their own.</p>",
            escaped(&layout.too_large.join(", "))
        );
    }
    let plain: Vec<String> =
        aids.cut.iter().filter(|piece| !piece.is_engraved).map(|piece| piece.name.clone()).collect();
    if !plain.is_empty() {
        let _ =
            writeln!(body, "<p>Too small to engrave, write on by hand: {}.</p>", escaped(&plain.join(", ")));
    }
    for (i, sheet) in layout.sheets.iter().enumerate() {
        let names = sheet.pieces.iter().enumerate().map(|(i, (name, _))| format!("{}: {name}", i + 1));
        let _ = writeln!(
            body,
            "<figure>{}<figcaption>Sheet {}: {:.0} % used. {}.</figcaption></figure>",
            numbered_picture(&sheet.drawing, &sheet.pieces.iter().map(|(_, at)| *at).collect::<Vec<_>>()),
            i + 1,
            100.0 * sheet.used,
            escaped(&names.collect::<Vec<_>>().join("; "))
        );
    }
}

/// The printed pieces, with how they close.
fn masks(body: &mut String, design: &Design, aids: &Aids<'_>) {
    let all =
        || aids.stations.iter().flat_map(|station| station.masks.iter().map(move |mask| (station, mask)));
    let rows: Vec<[String; 5]> = all()
        .map(|(station, mask)| {
            [
                number(station.shape.at, 3),
                mask.part.words().to_owned(),
                mask.mask.pieces.len().to_string(),
                format!("{:.2} to {:.2}", mask.fit.least, mask.fit.greatest),
                if mask.mask.pieces.iter().all(|piece| piece.plate.is_labelled) {
                    "yes"
                } else {
                    "no room: write on by hand"
                }
                .to_owned(),
            ]
        })
        .collect();
    let _ = writeln!(
        body,
        "<h3>Masks</h3>\n<p>Closed on its part in a trial before printing, every mask left these gaps; {} are asked.</p>",
        design.masks.clearance
    );
    let heading = ["station, mm from root", "closes on", "pieces", "gap all round, mm", "label engraved"];
    body.push_str(&table(heading, &rows, |_| false));
    body.push_str("<div class=\"small\">\n");
    for (station, mask) in all() {
        let part = if mask.part == Masked::Core { "core" } else { "finished" };
        for piece in &mask.mask.pieces {
            let words = format!("{} {part}, {}", number(station.shape.at, 3), piece.name());
            let view = solid_view(&piece.plate.solid, &words);
            let _ = writeln!(body, "<figure>{view}<figcaption>{words}</figcaption></figure>");
        }
    }
    for (_, _, _, words, solid) in aids.bench.pieces() {
        let _ = writeln!(
            body,
            "<figure>{}<figcaption>{}</figcaption></figure>",
            solid_view(solid, &words),
            escaped(&words)
        );
    }
    body.push_str("</div>\n");
    cradles(body, aids);
}

/// How the wood lies in its cradles.
fn cradles(body: &mut String, aids: &Aids<'_>) {
    if aids.bench.cradles.is_empty() && aids.bench.rails.is_empty() {
        return;
    }
    body.push_str(
        "<p>Cradles and rails stand on one flat board, as high above it as the design has them: twist and rise are set when \
         they are screwed down along a straight line at their distances from the root. The upper face lies in its cradles with \
         all turned over. A straight edge, or a sled, runs over the same tick of two neighbouring rails.</p>\n",
    );
    if aids.bench.cradles.is_empty() {
        return;
    }
    let rows: Vec<[String; 3]> = aids
        .bench
        .cradles
        .iter()
        .map(|cradle| {
            let [from, to] = cradle.span.map(|at| number(at, 1));
            let gap = format!("{:.2} to {:.2}", cradle.fit.least, cradle.fit.greatest);
            [format!("{from} to {to}"), cradle.face.word().to_owned(), gap]
        })
        .collect();
    body.push_str(&table(
        ["cradle, mm from root", "face in it", "gap with the wood laid in, mm"],
        &rows,
        |_| false,
    ));
}

/// Pages of paper, small.
fn pages(body: &mut String, title: &str, pages: &[Page]) {
    if pages.is_empty() {
        return;
    }
    let _ = writeln!(body, "<h3>{title}: {}</h3>\n<div class=\"small\">", counted(pages.len(), "page"));
    for (i, page) in pages.iter().enumerate() {
        let _ =
            writeln!(body, "<figure>{}<figcaption>page {}</figcaption></figure>", page_picture(page), i + 1);
    }
    body.push_str("</div>\n");
}
