//! Drawings for routers: DXF of release AC1015 (2000), in millimetres.
//!
//! Written by hand and not by a library, because the group codes in use are few, every handle is
//! the same from run to run, and other people's audits find nothing to repair. Group codes are
//! those of the published DXF reference.

use crate::geometry::ArcPath;
use crate::workshop::{Drawing, Label, Role};

/// Decimals of a coordinate: a tenth of a micrometre.
const PLACES: usize = 7;

/// The drawing as a DXF file. One layer for each role; closed contours are closed light-weight
/// polylines with arcs as bulges; labels are text.
#[must_use]
pub fn dxf(drawing: &Drawing) -> String {
    let mut file = Writer::default();
    file.document(drawing);
    file.text
}

/// Colour number of a role's layer.
fn colour(role: Role) -> u8 {
    match role {
        Role::CutOutside => 1,
        Role::CutInside => 2,
        Role::Reference => 5,
        Role::Label | Role::Caption => 3,
        Role::Check => 8,
    }
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
    text: String,
    next_handle: u32,
}

impl Default for Writer {
    fn default() -> Self {
        Self { text: String::new(), next_handle: handle::FIRST_FREE }
    }
}

impl Writer {
    fn pair(&mut self, code: u16, value: impl std::fmt::Display) {
        self.text.push_str(&format!("{code}\n{value}\n"));
    }

    fn pairs(&mut self, pairs: &[(u16, &str)]) {
        for (code, value) in pairs {
            self.pair(*code, value);
        }
    }

    fn real(&mut self, code: u16, value: f64) {
        // A real needs its decimal point to be read as one by strict readers.
        let short = crate::units::number(value, PLACES);
        let text = if short.contains('.') { short } else { format!("{short}.0") };
        self.pair(code, text);
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
        self.tables();
        self.blocks();
        self.entities(drawing);
        self.objects();
        self.pair(0, "EOF");
        let body = std::mem::take(&mut self.text);
        self.header(drawing);
        self.text.push_str(&body);
    }

    fn header(&mut self, drawing: &Drawing) {
        self.pairs(&[(0, "SECTION"), (2, "HEADER"), (9, "$ACADVER"), (1, "AC1015")]);
        self.pairs(&[(9, "$DWGCODEPAGE"), (3, "ANSI_1252")]);
        self.pair(9, "$HANDSEED");
        self.hex(5, self.next_handle);
        self.pairs(&[(9, "$INSUNITS"), (70, "4"), (9, "$MEASUREMENT"), (70, "1")]);
        let bounds = drawing.bounds();
        for (name, x, y) in [("$EXTMIN", bounds.x0, bounds.y0), ("$EXTMAX", bounds.x1, bounds.y1)] {
            self.pair(9, name);
            self.real(10, x);
            self.real(20, y);
            self.real(30, 0.0);
        }
        self.pair(0, "ENDSEC");
    }

    fn tables(&mut self) {
        self.pairs(&[(0, "SECTION"), (2, "TABLES")]);
        self.table("VPORT", 0, |_, _| {});
        self.table("LTYPE", 3, |file, table| {
            for (name, description) in [("ByBlock", ""), ("ByLayer", ""), ("Continuous", "Solid line")] {
                file.record("LTYPE", table, "AcDbLinetypeTableRecord");
                file.pairs(&[(2, name), (70, "0"), (3, description), (72, "65"), (73, "0")]);
                file.real(40, 0.0);
            }
        });
        self.table("LAYER", Role::LAYERS.len() + 1, |file, table| {
            let roles = Role::LAYERS.map(|role| (role.layer(), colour(role)));
            for (name, colour) in std::iter::once(("0", 7)).chain(roles) {
                file.record("LAYER", table, "AcDbLayerTableRecord");
                file.pairs(&[(2, name), (70, "0")]);
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
            self.polyline(line.role, &line.path);
        }
        for label in &drawing.labels {
            self.label(label);
        }
        self.pair(0, "ENDSEC");
    }

    fn polyline(&mut self, role: Role, path: &ArcPath) {
        self.entity("LWPOLYLINE", handle::MODEL_SPACE, role.layer(), "AcDbPolyline");
        self.pair(90, path.vertices().len());
        self.pair(70, u8::from(path.is_closed()));
        for vertex in path.vertices() {
            self.real(10, vertex.point.x);
            self.real(20, vertex.point.y);
            if vertex.bulge != 0.0 {
                // Bulges multiply lengths, so they need decimals of their own.
                self.pair(42, format_args!("{:.12}", vertex.bulge));
            }
        }
    }

    fn label(&mut self, label: &Label) {
        self.entity("TEXT", handle::MODEL_SPACE, label.role.layer(), "AcDbText");
        self.real(10, label.at.x);
        self.real(20, label.at.y);
        self.real(30, 0.0);
        self.real(40, label.height);
        self.pair(1, escaped(&label.text));
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

/// Text in plain ASCII, as every reader takes it: other characters by their number.
fn escaped(text: &str) -> String {
    text.chars()
        .map(|c| match c {
            '°' => "%%d".to_owned(),
            '²' => "2".to_owned(),
            ' '..='~' => c.to_string(),
            c if c.is_control() => " ".to_owned(),
            c => format!("\\U+{:04X}", u32::from(c)),
        })
        .collect()
}
