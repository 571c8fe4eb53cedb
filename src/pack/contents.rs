//! From a design to the files of its pack, in memory.

use super::aids::{self, Aids, StationAids};
use super::{Check, Entry, Manifest, Pack, PackError, PackFile, checks, sheet, tables};
use crate::design::Design;
use crate::export::{dxf, pdf, stl, svg_page};
use crate::units::number;
use crate::workshop::{Drawing, Half, Page, PaperSettings, single_page, tiled};

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
    let wing = design.wing()?;
    let aids = Aids::of(design, &wing)?;
    let checks = checks::all(design, &aids);

    let mut files = Files { slug: design.slug(), files: Vec::new() };
    if kinds.cut {
        files.add_cut(&aids.stations, &aids.pattern);
    }
    if kinds.print {
        files.add_print(design, &aids.stations, &aids.pattern)?;
    }
    if kinds.masks {
        files.add_masks(design, &aids.stations)?;
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

    fn add_cut(&mut self, stations: &[StationAids<'_>], pattern: &Drawing) {
        for station in stations {
            let (at, path) = (station.shape.at, format!("cut/{}.dxf", self.stem(station.shape.at)));
            self.add(path, "dxf", "station template", Some(at), dxf(&station.template).into_bytes());
            for (role, ending, drawing) in &station.wood.templates {
                let path = format!("cut/{}-{ending}.dxf", self.stem(at));
                self.add(path, "dxf", role, Some(at), dxf(drawing).into_bytes());
            }
        }
        let path = format!("cut/{}-planform.dxf", self.slug);
        self.add(path, "dxf", "planform pattern", None, dxf(pattern).into_bytes());
    }

    fn add_print(
        &mut self,
        design: &Design,
        stations: &[StationAids<'_>],
        pattern: &Drawing,
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

        let (width, height) = design.paper.size.dimensions();
        let (width, height) = (width.mm(), height.mm());
        let paper = PaperSettings {
            width,
            height,
            margin: design.paper.margin.mm(),
            overlap: design.paper.overlap.mm(),
        };
        let title = aids::stamp(design).to_string();
        let tiles = |drawings: Vec<&Drawing>| -> Vec<Page> {
            drawings.into_iter().flat_map(|drawing| tiled(drawing, paper)).collect()
        };
        let finished = std::iter::once(pattern).chain(stations.iter().map(|s| &s.template));
        let bytes = pdf(&title, &tiles(finished.collect()))?;
        self.add(format!("print/{}.pdf", self.slug), "pdf", "all templates, tiled", None, bytes);
        let wood = stations.iter().flat_map(|s| s.wood.templates.iter().map(|(_, _, drawing)| drawing));
        let pages = tiles(wood.collect());
        if !pages.is_empty() {
            let bytes = pdf(&title, &pages)?;
            self.add(format!("print/{}-wood.pdf", self.slug), "pdf", "wood templates, tiled", None, bytes);
        }
        Ok(())
    }

    fn add_masks(&mut self, design: &Design, stations: &[StationAids<'_>]) -> Result<(), PackError> {
        let stamp = aids::stamp(design);
        for station in stations {
            let at = station.shape.at;
            for (half, solid) in [(Half::Upper, &station.mask.upper), (Half::Lower, &station.mask.lower)] {
                let title = format!("{stamp} station {} mm {}", number(at, 3), half.word());
                let path = format!("masks/{}-{}.stl", self.stem(at), half.word());
                self.add(path, "stl", "mask half", Some(at), stl(solid, &title)?);
            }
        }
        Ok(())
    }

    fn add_tables(
        &mut self,
        design: &Design,
        Aids { stations, flows, curves, duty, strength, .. }: &Aids<'_>,
    ) -> Result<(), PackError> {
        let fingerprint = design.fingerprint();
        let text = tables::stations(stations, &fingerprint)?;
        self.add("tables/stations.csv".to_owned(), "csv", "where each station lies", None, text);
        let text = tables::offsets(stations, &fingerprint)?;
        self.add("tables/offsets.csv".to_owned(), "csv", "table of offsets", None, text);
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
