//! Release AC1015 (2000).

use super::{Curves, Flavour, Pairs, escaped, layers};
use crate::geometry::{ArcPath, Point};
use crate::workshop::{Drawing, Label, Role};

/// How far a spline may lie from the arcs that it stands for, mm.
const SPLINE_TOLERANCE: f64 = 1e-4;

pub(super) fn dxf(drawing: &Drawing, curves: Curves) -> String {
    let mut file = Writer { pairs: Pairs::default(), next_handle: handle::FIRST_FREE, curves };
    file.document(drawing);
    file.pairs.text
}

/// Handles of the objects that others point to. Those handed out in passing follow them.
mod handle {
    pub(super) const ROOT_DICTIONARY: u32 = 0x1;
    pub(super) const GROUP_DICTIONARY: u32 = 0x2;
    pub(super) const MODEL_SPACE: u32 = 0x3;
    pub(super) const PAPER_SPACE: u32 = 0x4;
    pub(super) const LAYOUT_DICTIONARY: u32 = 0x5;
    pub(super) const MODEL_LAYOUT: u32 = 0x6;
    pub(super) const PAPER_LAYOUT: u32 = 0x7;
    pub(super) const FIRST_FREE: u32 = 0x10;
}

struct Writer {
    pairs: Pairs,
    next_handle: u32,
    curves: Curves,
}

impl Writer {
    fn pair(&mut self, code: u16, value: impl std::fmt::Display) {
        self.pairs.pair(code, value);
    }

    fn pairs(&mut self, pairs: &[(u16, &str)]) {
        self.pairs.pairs(pairs);
    }

    fn real(&mut self, code: u16, value: f64) {
        self.pairs.real(code, value);
    }

    fn hex(&mut self, code: u16, value: u32) {
        self.pair(code, format_args!("{value:X}"));
    }

    fn new_handle(&mut self) -> u32 {
        self.next_handle += 1;
        self.next_handle - 1
    }

    fn document(&mut self, drawing: &Drawing) {
        // The header names the first handle that is free, which only the body knows.
        self.tables(drawing);
        self.blocks();
        self.entities(drawing);
        self.objects();
        self.pair(0, "EOF");
        let body = std::mem::take(&mut self.pairs.text);
        self.header(drawing);
        self.pairs.text.push_str(&body);
    }

    fn header(&mut self, drawing: &Drawing) {
        self.pairs(&[(0, "SECTION"), (2, "HEADER"), (9, "$ACADVER"), (1, "AC1015")]);
        self.pairs(&[(9, "$DWGCODEPAGE"), (3, "ANSI_1252")]);
        self.pair(9, "$HANDSEED");
        self.hex(5, self.next_handle);
        self.pairs(&[(9, "$INSUNITS"), (70, "4"), (9, "$MEASUREMENT"), (70, "1")]);
        self.pairs.extents(drawing);
        self.pair(0, "ENDSEC");
    }

    fn tables(&mut self, drawing: &Drawing) {
        let layers = layers(drawing);
        self.pairs(&[(0, "SECTION"), (2, "TABLES")]);
        self.table("VPORT", 0, |_, _| {});
        self.table("LTYPE", 3, |file, table| {
            for (name, description) in [("ByBlock", ""), ("ByLayer", ""), ("Continuous", "Solid line")] {
                file.record("LTYPE", table, "AcDbLinetypeTableRecord");
                file.pairs(&[(2, name), (70, "0"), (3, description), (72, "65"), (73, "0")]);
                file.real(40, 0.0);
            }
        });
        self.table("LAYER", layers.len(), |file, table| {
            for (name, colour) in layers {
                file.record("LAYER", table, "AcDbLayerTableRecord");
                file.pairs(&[(2, &name), (70, "0")]);
                file.pair(62, colour);
                file.pair(6, "Continuous");
            }
        });
        self.table("STYLE", 1, |file, table| {
            file.record("STYLE", table, "AcDbTextStyleTableRecord");
            file.pairs(&[(2, "Standard"), (70, "0"), (40, "0.0"), (41, "1.0"), (50, "0.0")]);
            file.pairs(&[(71, "0"), (42, "2.5"), (3, "txt"), (4, "")]);
        });
        self.table("VIEW", 0, |_, _| {});
        self.table("UCS", 0, |_, _| {});
        self.table("APPID", 1, |file, table| {
            file.record("APPID", table, "AcDbRegAppTableRecord");
            file.pairs(&[(2, "ACAD"), (70, "0")]);
        });
        self.table("DIMSTYLE", 0, |_, _| {});
        self.table("BLOCK_RECORD", 2, |file, table| {
            for (name, own, layout) in [
                ("*Model_Space", handle::MODEL_SPACE, handle::MODEL_LAYOUT),
                ("*Paper_Space", handle::PAPER_SPACE, handle::PAPER_LAYOUT),
            ] {
                file.pair(0, "BLOCK_RECORD");
                file.hex(5, own);
                file.hex(330, table);
                file.pairs(&[(100, "AcDbSymbolTableRecord"), (100, "AcDbBlockTableRecord"), (2, name)]);
                file.hex(340, layout);
            }
        });
        self.pair(0, "ENDSEC");
    }

    fn table(&mut self, name: &str, count: usize, records: impl FnOnce(&mut Self, u32)) {
        let own = self.new_handle();
        self.pairs(&[(0, "TABLE"), (2, name)]);
        self.hex(5, own);
        self.hex(330, 0);
        self.pair(100, "AcDbSymbolTable");
        self.pair(70, count);
        if name == "DIMSTYLE" {
            self.pairs(&[(100, "AcDbDimStyleTable"), (71, "0")]);
        }
        records(self, own);
        self.pair(0, "ENDTAB");
    }

    fn record(&mut self, kind: &str, table: u32, class: &str) {
        let own = self.new_handle();
        self.pair(0, kind);
        self.hex(5, own);
        self.hex(330, table);
        self.pairs(&[(100, "AcDbSymbolTableRecord"), (100, class)]);
    }

    fn blocks(&mut self) {
        self.pairs(&[(0, "SECTION"), (2, "BLOCKS")]);
        for (name, record) in [("*Model_Space", handle::MODEL_SPACE), ("*Paper_Space", handle::PAPER_SPACE)] {
            self.entity("BLOCK", record, "0", "AcDbBlockBegin");
            self.pairs(&[(2, name), (70, "0"), (10, "0.0"), (20, "0.0"), (30, "0.0"), (3, name), (1, "")]);
            self.entity("ENDBLK", record, "0", "AcDbBlockEnd");
        }
        self.pair(0, "ENDSEC");
    }

    fn entity(&mut self, kind: &str, owner: u32, layer: &str, class: &str) {
        let own = self.new_handle();
        self.pair(0, kind);
        self.hex(5, own);
        self.hex(330, owner);
        self.pairs(&[(100, "AcDbEntity"), (8, layer), (100, class)]);
    }

    fn entities(&mut self, drawing: &Drawing) {
        self.pairs(&[(0, "SECTION"), (2, "ENTITIES")]);
        for line in &drawing.lines {
            let is_curved = line.path.segments().any(|segment| segment.radius().is_some());
            if is_curved && self.curves == Curves::Splines {
                self.spline(line.role, &line.path);
            } else {
                self.polyline(line.role, &line.path);
            }
        }
        for label in &drawing.labels {
            self.label(label);
        }
        self.pair(0, "ENDSEC");
    }

    fn polyline(&mut self, role: Role, path: &ArcPath) {
        self.entity("LWPOLYLINE", handle::MODEL_SPACE, &role.layer(), "AcDbPolyline");
        self.pair(90, path.vertices().len());
        self.pair(70, u8::from(path.is_closed()));
        for vertex in path.vertices() {
            self.real(10, vertex.point.x);
            self.real(20, vertex.point.y);
            self.pairs.bulge(vertex.bulge);
        }
    }

    /// The path as one cubic spline: each knot where two cubics meet counts three times.
    fn spline(&mut self, role: Role, path: &ArcPath) {
        let controls = controls(path);
        let cubics = (controls.len() - 1) / 3;
        self.entity("SPLINE", handle::MODEL_SPACE, &role.layer(), "AcDbSpline");
        // Bits: 1 closed, 8 in a plane.
        self.pair(70, 8 + u8::from(path.is_closed()));
        self.pair(71, 3);
        self.pair(72, controls.len() + 4);
        self.pair(73, controls.len());
        self.pair(74, 0);
        self.real(40, 0.0);
        for knot in 0..=cubics {
            for _ in 0..3 {
                self.real(40, knot as f64);
            }
        }
        self.real(40, cubics as f64);
        for Point { x, y } in controls {
            self.real(10, x);
            self.real(20, y);
            self.real(30, 0.0);
        }
    }

    fn label(&mut self, label: &Label) {
        self.entity("TEXT", handle::MODEL_SPACE, &label.role.layer(), "AcDbText");
        self.real(10, label.at.x);
        self.real(20, label.at.y);
        self.real(30, 0.0);
        self.real(40, label.height);
        self.pair(1, escaped(&label.text, Flavour::R2000));
        self.real(50, label.turn.to_degrees());
        self.pair(100, "AcDbText");
    }

    fn objects(&mut self) {
        self.pairs(&[(0, "SECTION"), (2, "OBJECTS")]);
        self.dictionary(
            handle::ROOT_DICTIONARY,
            0,
            &[("ACAD_GROUP", handle::GROUP_DICTIONARY), ("ACAD_LAYOUT", handle::LAYOUT_DICTIONARY)],
        );
        self.dictionary(handle::GROUP_DICTIONARY, handle::ROOT_DICTIONARY, &[]);
        self.dictionary(
            handle::LAYOUT_DICTIONARY,
            handle::ROOT_DICTIONARY,
            &[("Model", handle::MODEL_LAYOUT), ("Layout1", handle::PAPER_LAYOUT)],
        );
        self.layout("Model", 0, handle::MODEL_LAYOUT, handle::MODEL_SPACE);
        self.layout("Layout1", 1, handle::PAPER_LAYOUT, handle::PAPER_SPACE);
        self.pair(0, "ENDSEC");
    }

    fn dictionary(&mut self, own: u32, owner: u32, entries: &[(&str, u32)]) {
        self.pair(0, "DICTIONARY");
        self.hex(5, own);
        self.hex(330, owner);
        self.pairs(&[(100, "AcDbDictionary"), (281, "1")]);
        for (name, target) in entries {
            self.pair(3, name);
            self.hex(350, *target);
        }
    }

    fn layout(&mut self, name: &str, order: u8, own: u32, block: u32) {
        self.pair(0, "LAYOUT");
        self.hex(5, own);
        self.hex(330, handle::LAYOUT_DICTIONARY);
        self.pairs(&[(100, "AcDbPlotSettings"), (1, ""), (2, "none_device"), (4, ""), (6, "")]);
        // 1024 marks the settings of the model layout.
        self.pair(70, if order == 0 { 1024 } else { 0 });
        self.pairs(&[(72, "1"), (100, "AcDbLayout"), (1, name), (70, "1")]);
        self.pair(71, order);
        self.hex(330, block);
    }
}

/// Control points of a path's cubics, those that two share once.
fn controls(path: &ArcPath) -> Vec<Point> {
    use kurbo::PathEl;
    let mut controls: Vec<Point> = Vec::new();
    let line = |controls: &mut Vec<Point>, to: Point| {
        let from = controls.last().copied().unwrap_or(to);
        controls.extend([from.lerp(to, 1.0 / 3.0), from.lerp(to, 2.0 / 3.0), to]);
    };
    for element in path.to_bezier(SPLINE_TOLERANCE).elements() {
        match *element {
            PathEl::MoveTo(p) => controls.push(p),
            PathEl::LineTo(p) => line(&mut controls, p),
            PathEl::QuadTo(q, p) => {
                let from = controls.last().copied().unwrap_or(p);
                controls.extend([from.lerp(q, 2.0 / 3.0), p.lerp(q, 2.0 / 3.0), p]);
            }
            PathEl::CurveTo(a, b, p) => controls.extend([a, b, p]),
            PathEl::ClosePath => {
                if let (Some(&first), Some(&last)) = (controls.first(), controls.last())
                    && first.distance(last) > 1e-9
                {
                    line(&mut controls, first);
                }
            }
        }
    }
    controls
}
