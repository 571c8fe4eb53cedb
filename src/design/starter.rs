//! A design to start from.

use std::fmt::Write;

use super::keys::{Otherwise, TABLES, Table, Times};
use super::model::Kind;

/// Name of the file beside a starter in which editors look for the schema.
pub const SCHEMA_FILE: &str = "plankform-schema.json";

/// A commented design of that kind: it is valid as it stands, and holds every default that may be
/// changed, commented out. Its first line names [`SCHEMA_FILE`], for editors that complete and check
/// by it.
#[must_use]
pub fn starter(kind: Kind) -> String {
    let mut text = format!("#:schema ./{SCHEMA_FILE}\n");
    text.push_str(match kind {
        Kind::MainFoil => MAIN_FOIL,
        Kind::Elevator => ELEVATOR,
        Kind::Strut => STRUT,
        Kind::Fin => FIN,
    });
    text.push_str(
        "\n# What follows are the defaults. To change one, remove the # before its table and its key.\n",
    );
    for table in TABLES.into_iter().filter(|table| table.times == Times::AtMostOnce) {
        defaults(table, &mut text);
    }
    text
}

/// A table whose keys all have defaults, commented out. A key without one follows from the rest of
/// the design, and is left to the hand-book.
fn defaults(table: &Table, text: &mut String) {
    let keys: Vec<_> = table
        .keys
        .iter()
        .filter_map(|key| match key.otherwise {
            Otherwise::Default(value) => Some((key, value)),
            _ => None,
        })
        .collect();
    if keys.is_empty() {
        return;
    }
    // Writing to a string cannot fail.
    let _ = write!(text, "\n# {}\n# [{}]\n", table.doc, table.name);
    for (key, value) in keys {
        let line = format!("{} = {}", key.name, key.quoted(value));
        let _ = writeln!(text, "# {line:<24} # {}", key.doc);
    }
}

const MAIN_FOIL: &str = r#"# A main foil: two mirrored halves, drawn from the root outwards.
# A quantity is text with its unit: "900 mm", "35 in", "2.5 cm", "-1.5 deg".

name = "Main foil"              # files are named after it
kind = "main-foil"

[planform]
span = "900 mm"                 # tip to tip

# One [[station]] for each section along the span; between two the foil runs straight.
[[station]]
at = "0 mm"                     # the root
chord = "140 mm"
section = "NACA 4412"

[[station]]
at = "450 mm"                   # the tip: half the span
chord = "80 mm"
section = "NACA 2412"
twist = "-1.5 deg"              # nose down, so that the tip stalls last
sweep = "15 mm"                 # quarter chord this far aft of the root's

# Templates and masks are made at the stations, unless you name other places:
# [templates]
# at = ["0 mm", "150 mm", "300 mm", "450 mm"]
"#;

const ELEVATOR: &str = r#"# An elevator: two mirrored halves, drawn from the root outwards.
# A quantity is text with its unit: "500 mm", "20 in", "2.5 cm", "-1.5 deg".

name = "Elevator"               # files are named after it
kind = "elevator"

[planform]
span = "500 mm"                 # tip to tip

# One [[station]] for each section along the span; between two the foil runs straight.
[[station]]
at = "0 mm"                     # the root
chord = "90 mm"
section = "NACA 0012"

[[station]]
at = "250 mm"                   # the tip: half the span
chord = "60 mm"
section = "NACA 0012"

# Templates and masks are made at the stations, unless you name other places:
# [templates]
# at = ["0 mm", "125 mm", "250 mm"]
"#;

const STRUT: &str = r#"# A strut: one piece, drawn from the hull downwards.
# A quantity is text with its unit: "850 mm", "33 in", "2.5 cm".

name = "Strut"                  # files are named after it
kind = "strut"

[planform]
span = "850 mm"                 # from the hull to the foil

# One [[station]] for each section along the span; between two the strut runs straight.
[[station]]
at = "0 mm"                     # the hull end
chord = "110 mm"
section = "NACA 0012"

[[station]]
at = "850 mm"                   # the foil end: the whole span
chord = "110 mm"
section = "NACA 0012"

# Templates and masks are made at the stations, unless you name other places:
# [templates]
# at = ["0 mm", "425 mm", "850 mm"]
"#;

const FIN: &str = r#"# A fin: one piece, drawn from the hull downwards.
# A quantity is text with its unit: "300 mm", "12 in", "2.5 cm".

name = "Fin"                    # files are named after it
kind = "fin"

[planform]
span = "300 mm"                 # from the hull to the tip

# One [[station]] for each section along the span; between two the fin runs straight.
[[station]]
at = "0 mm"                     # the hull end
chord = "120 mm"
section = "NACA 0012"

[[station]]
at = "300 mm"                   # the tip: the whole span
chord = "80 mm"
section = "NACA 0010"
sweep = "60 mm"                 # quarter chord this far aft of the first station's

# Templates and masks are made at the stations, unless you name other places:
# [templates]
# at = ["0 mm", "150 mm", "300 mm"]
"#;
