//! From a design to the files of its pack, in memory.

use super::aids::Aids;
use super::cut_pieces::CutPiece;
use super::printed::{Bench, Masked, StationMask};
use super::station::{StationAids, stamp};
use super::{Check, Entry, Manifest, Pack, PackError, PackFile, bucket, checks, sheet, tables};
use crate::design::{Design, DxfRelease};
use crate::export::{Curves, Flavour, dxf, pdf, stl, svg_page};
use crate::units::number;
use crate::workshop::{Drawing, Layout, single_page};

/// Which kinds of files to make.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Kinds {
    /// Router files.
    pub cut: bool,
    /// Paper templates.
    pub print: bool,
    /// Printed masks.
    pub masks: bool,
    /// Tables.
    pub tables: bool,
    /// The build sheet.
    pub sheet: bool,
}

impl Kinds {
    /// Every kind.
    pub const ALL: Self = Self { cut: true, print: true, masks: true, tables: true, sheet: true };
}

/// Makes the pack of a design.
///
/// # Errors
/// When a shape cannot be made or a format refuses it. A check outside its limit is no error: the
/// pack says so.
pub fn build(design: &Design, kinds: Kinds) -> Result<Pack, PackError> {
    build_telling(design, kinds, &|_, _| ())
}

/// The same, telling how many of how many lift curves are done: they take the longest.
///
/// # Errors
/// As [`build`].
pub fn build_telling(
    design: &Design,
    kinds: Kinds,
    told: &(dyn Fn(usize, usize) + Sync),
) -> Result<Pack, PackError> {
    let wing = design.wing()?;
    let aids = Aids::of(design, &wing, told)?;
    let checks = checks::all(design, &aids);

    let mut files = Files { slug: design.slug(), files: Vec::new() };
    if kinds.cut {
        files.add_cut(design, &aids.cut, &aids.layout);
    }
    if kinds.print {
        files.add_print(design, &aids)?;
    }
    if kinds.masks {
        files.add_masks(design, &aids.stations, &aids.bench)?;
    }
    if kinds.tables {
        files.add_tables(design, &aids)?;
    }
    if kinds.sheet {
        let page = sheet::html(design, &aids, &checks, &files.files);
        files.add("sheet.html".to_owned(), "html", "build sheet", None, page.into_bytes());
    }
    Ok(pack(design, checks, files.files))
}

fn pack(design: &Design, checks: Vec<Check>, files: Vec<PackFile>) -> Pack {
    let manifest = Manifest {
        design: design.name.clone(),
        fingerprint: design.fingerprint(),
        passed: checks.iter().all(|check| check.passed),
        out: ".".to_owned(),
        files: files.iter().map(Entry::from).collect(),
    };
    Pack { manifest, checks, files }
}

struct Files {
    slug: String,
    files: Vec<PackFile>,
}

impl Files {
    fn add(
        &mut self,
        path: String,
        kind: &'static str,
        role: &'static str,
        station: Option<f64>,
        bytes: Vec<u8>,
    ) {
        self.files.push(PackFile { path, kind, role, station_mm: station, bytes });
    }

    /// File name without its ending: the design, then the station or what else it shows.
    fn stem(&self, at: f64) -> String {
        format!("{}-station-{}", self.slug, number(at, 3))
    }

    fn add_cut(&mut self, design: &Design, cut: &[CutPiece], layout: &Layout) {
        let curves = if design.router.splines { Curves::Splines } else { Curves::Arcs };
        let flavours: &[(Flavour, &str)] = match design.router.release {
            DxfRelease::R2000 => &[(Flavour::R2000, "")],
            DxfRelease::R12 => &[(Flavour::R12, "")],
            DxfRelease::Both => &[(Flavour::R2000, ""), (Flavour::R12, "-r12")],
        };
        for (flavour, flavour_ending) in flavours {
            for (i, sheet) in layout.sheets.iter().enumerate() {
                let path = format!("cut/{}-sheet-{}{flavour_ending}.dxf", self.slug, i + 1);
                let text = dxf(&sheet.drawing, *flavour, curves);
                self.add(path, "dxf", "sheet of stock", None, text.into_bytes());
            }
            for piece in cut {
                let stem = piece.station.map_or(self.slug.clone(), |at| self.stem(at));
                let ending =
                    if piece.ending.is_empty() { String::new() } else { format!("-{}", piece.ending) };
                let path = format!("cut/{stem}{ending}{flavour_ending}.dxf");
                let text = dxf(&piece.drawing, *flavour, curves);
                self.add(path, "dxf", piece.role, piece.station, text.into_bytes());
            }
        }
    }

    fn add_print(
        &mut self,
        design: &Design,
        Aids { stations, pattern, prints, .. }: &Aids<'_>,
    ) -> Result<(), PackError> {
        let sheet = |drawing: &Drawing| svg_page(&single_page(drawing)).into_bytes();
        for station in stations {
            let (at, path) = (station.shape.at, format!("print/{}.svg", self.stem(station.shape.at)));
            self.add(path, "svg", "station template", Some(at), sheet(&station.template));
            for (role, ending, drawing) in &station.wood.templates {
                let path = format!("print/{}-{ending}.svg", self.stem(at));
                self.add(path, "svg", role, Some(at), sheet(drawing));
            }
        }
        let path = format!("print/{}-planform.svg", self.slug);
        self.add(path, "svg", "planform pattern", None, sheet(pattern));

        let title = stamp(design).to_string();
        let bytes = pdf(&title, &prints.finished)?;
        self.add(format!("print/{}.pdf", self.slug), "pdf", "all templates, tiled", None, bytes);
        if !prints.wood.is_empty() {
            let bytes = pdf(&title, &prints.wood)?;
            self.add(format!("print/{}-wood.pdf", self.slug), "pdf", "wood templates, tiled", None, bytes);
        }
        Ok(())
    }

    fn add_masks(
        &mut self,
        design: &Design,
        stations: &[StationAids<'_>],
        bench: &Bench,
    ) -> Result<(), PackError> {
        let stamp = stamp(design);
        for station in stations {
            let at = station.shape.at;
            for StationMask { part, mask, .. } in &station.masks {
                let (role, ending) = match part {
                    Masked::Core => ("core mask half", "core-"),
                    Masked::Finished => ("mask half", ""),
                };
                for piece in &mask.pieces {
                    let name = piece.name();
                    let title = format!("{stamp} station {} mm {ending}{name}", number(at, 3));
                    let path = format!("masks/{}-{ending}{name}.stl", self.stem(at));
                    self.add(path, "stl", role, Some(at), stl(&piece.plate.solid, &title)?);
                }
            }
        }
        for (name, role, station, words, solid) in bench.pieces() {
            let path = format!("masks/{}-{name}.stl", self.slug);
            self.add(path, "stl", role, station, stl(solid, &format!("{stamp} {words}"))?);
        }
        Ok(())
    }

    fn add_tables(
        &mut self,
        design: &Design,
        Aids { stations, flows, curves, pieces, water, duty, strength, .. }: &Aids<'_>,
    ) -> Result<(), PackError> {
        let fingerprint = design.fingerprint();
        let text = tables::stations(stations, &fingerprint)?;
        self.add("tables/stations.csv".to_owned(), "csv", "where each station lies", None, text);
        let text = tables::offsets(stations, &fingerprint)?;
        self.add("tables/offsets.csv".to_owned(), "csv", "table of offsets", None, text);
        let text = tables::pieces(design, pieces, &fingerprint)?;
        self.add("tables/pieces.csv".to_owned(), "csv", "pieces of wood", None, text);
        let text = tables::lift(design, flows, &fingerprint)?;
        self.add("tables/lift.csv".to_owned(), "csv", "lift curves without friction", None, text);
        let text = tables::friction(curves, &fingerprint)?;
        self.add(
            "tables/lift-with-friction.csv".to_owned(),
            "csv",
            "lift and drag with friction",
            None,
            text,
        );
        if let Some(foil) = duty {
            let text = super::duty::speeds(foil, &fingerprint)?;
            self.add("tables/flight.csv".to_owned(), "csv", "the foil at each speed", None, text);
            let text = super::duty::span(foil, &fingerprint)?;
            self.add("tables/span-load.csv".to_owned(), "csv", "lift along the span", None, text);
        }
        let text = bucket::table(design, water, curves)?;
        self.add("tables/cavitation.csv".to_owned(), "csv", "speeds of cavitation", None, text);
        if let Ok(part) = strength {
            let text = super::strength::table(part, &fingerprint)?;
            self.add("tables/strength.csv".to_owned(), "csv", "strength along the span", None, text);
        }
        let text = tables::pressure(design, flows, &fingerprint)?;
        let role = "pressure at the design lift, without friction";
        self.add("tables/pressure.csv".to_owned(), "csv", role, None, text);
        Ok(())
    }
}
