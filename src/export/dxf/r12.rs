//! Release AC1009 (R12).

use super::{Flavour, Pairs, escaped, layers};
use crate::geometry::ArcPath;
use crate::workshop::{Drawing, Label, Role};

pub(super) fn dxf(drawing: &Drawing) -> String {
    let mut file = Pairs::default();
    // The format has no key for units.
    file.pair(999, "units: millimetres");
    header(&mut file, drawing);
    tables(&mut file, drawing);
    file.pairs(&[(0, "SECTION"), (2, "BLOCKS"), (0, "ENDSEC"), (0, "SECTION"), (2, "ENTITIES")]);
    for line in &drawing.lines {
        polyline(&mut file, line.role, &line.path);
    }
    for label in &drawing.labels {
        text(&mut file, label);
    }
    file.pairs(&[(0, "ENDSEC"), (0, "EOF")]);
    file.text
}

fn header(file: &mut Pairs, drawing: &Drawing) {
    file.pairs(&[(0, "SECTION"), (2, "HEADER"), (9, "$ACADVER"), (1, "AC1009")]);
    file.extents(drawing);
    file.pair(0, "ENDSEC");
}

fn tables(file: &mut Pairs, drawing: &Drawing) {
    let layers = layers(drawing);
    file.pairs(&[(0, "SECTION"), (2, "TABLES")]);
    file.pairs(&[(0, "TABLE"), (2, "LTYPE"), (70, "1"), (0, "LTYPE"), (2, "CONTINUOUS"), (70, "0")]);
    file.pairs(&[(3, "Solid line"), (72, "65"), (73, "0"), (40, "0.0"), (0, "ENDTAB")]);
    file.pairs(&[(0, "TABLE"), (2, "LAYER")]);
    file.pair(70, layers.len());
    for (name, colour) in layers {
        file.pairs(&[(0, "LAYER"), (2, &name), (70, "0")]);
        file.pair(62, colour);
        file.pair(6, "CONTINUOUS");
    }
    file.pair(0, "ENDTAB");
    file.pairs(&[
        (0, "TABLE"),
        (2, "STYLE"),
        (70, "1"),
        (0, "STYLE"),
        (2, "STANDARD"),
        (70, "0"),
        (40, "0.0"),
    ]);
    file.pairs(&[(41, "1.0"), (50, "0.0"), (71, "0"), (42, "2.5"), (3, "txt"), (4, ""), (0, "ENDTAB")]);
    file.pair(0, "ENDSEC");
}

fn polyline(file: &mut Pairs, role: Role, path: &ArcPath) {
    let layer = role.layer();
    let start = |file: &mut Pairs, kind: &str| {
        file.pair(0, kind);
        file.pair(8, &layer);
    };
    start(file, "POLYLINE");
    file.pairs(&[(66, "1"), (10, "0.0"), (20, "0.0"), (30, "0.0")]);
    file.pair(70, u8::from(path.is_closed()));
    for vertex in path.vertices() {
        start(file, "VERTEX");
        file.real(10, vertex.point.x);
        file.real(20, vertex.point.y);
        file.real(30, 0.0);
        file.bulge(vertex.bulge);
    }
    start(file, "SEQEND");
}

fn text(file: &mut Pairs, label: &Label) {
    file.pair(0, "TEXT");
    file.pair(8, label.role.layer());
    file.real(10, label.at.x);
    file.real(20, label.at.y);
    file.real(30, 0.0);
    file.real(40, label.height);
    file.pair(1, escaped(&label.text, Flavour::R12));
    file.real(50, label.turn.to_degrees());
}
