//! What a section file changes of its section.

use std::ops::Range;

use toml::de::DeTable;

use super::reader::{Reader, Wronged};
use crate::problems::Wrong;
use crate::section::{Flap, FlapSurface, HingeHeight, Section, Work};

/// The changes of a file, each with its place.
pub(super) struct Changes {
    work: Option<(Work, Range<usize>)>,
    flap: Option<(Flap, Range<usize>)>,
}

const WORK_KEYS: &[&str] =
    &["thickness", "thickness-at", "camber", "camber-at", "trailing-edge", "edge-from"];
const FLAP_KEYS: &[&str] = &["hinge", "axis", "angle", "bend"];

pub(super) fn read(reader: &mut Reader<'_>, root: &DeTable<'_>) -> Option<Changes> {
    let work = match root.get("work") {
        None => Ok(None),
        Some(raw) => reader.table("work", raw).ok_or(Wronged).and_then(|table| {
            reader.refuse_unknown(table, WORK_KEYS, "[work]");
            work(reader, table).map(|work| Some((work, raw.span())))
        }),
    };
    let flap = match root.get("flap") {
        None => Ok(None),
        Some(raw) => reader.table("flap", raw).ok_or(Wronged).and_then(|table| {
            reader.refuse_unknown(table, FLAP_KEYS, "[flap]");
            flap(reader, table, raw.span()).map(|flap| Some((flap, raw.span())))
        }),
    };
    Some(Changes { work: work.ok()?, flap: flap.ok()? })
}

fn work(reader: &mut Reader<'_>, table: &DeTable<'_>) -> Result<Work, Wronged> {
    // Every key is looked at before any is given up.
    let [thickness, thickness_at, camber, camber_at, trailing_edge, edge_from] = [
        ("thickness", 0.005..=0.5),
        ("thickness-at", 0.05..=0.9),
        ("camber", -0.3..=0.3),
        ("camber-at", 0.05..=0.9),
        ("trailing-edge", 0.0..=0.1),
        ("edge-from", 0.1..=0.98),
    ]
    .map(|(key, bounds)| reader.share(table, key, bounds));
    Ok(Work {
        thickness: thickness?,
        thickness_at: thickness_at?,
        camber: camber?,
        camber_at: camber_at?,
        trailing_edge: trailing_edge?,
        edge_from: edge_from?.unwrap_or(Work::EDGE_FROM),
    })
}

fn flap(reader: &mut Reader<'_>, table: &DeTable<'_>, place: Range<usize>) -> Result<Flap, Wronged> {
    let hinge = reader.share(table, "hinge", 0.2..=0.98);
    let angle = reader.angle(table, "angle");
    let bend = reader.share(table, "bend", 0.001..=0.8);
    let axis = reader.word(table, "axis", &["middle", "upper", "lower"]);
    let hinge = match hinge? {
        Some(hinge) => hinge,
        None => return reader.missing(place, "hinge", "write hinge = 0.7, the station of the hinge's axis"),
    };
    let angle = match angle? {
        Some(angle) => angle,
        None => return reader.missing(place, "angle", "write angle = \"10 deg\", trailing edge down"),
    };
    let height = match axis? {
        "upper" => HingeHeight::Upper,
        "lower" => HingeHeight::Lower,
        _ => HingeHeight::Middle,
    };
    let surface = bend?.map_or(FlapSurface::Broken, |over| FlapSurface::Smooth { over });
    Ok(Flap { hinge, height, angle: angle.radians(), surface })
}

impl Changes {
    /// The section with the changes made.
    pub(super) fn made(
        &self,
        reader: &mut Reader<'_>,
        section: Section,
        place: &Range<usize>,
    ) -> Option<Section> {
        let mut made = Ok(section);
        let mut blamed = place.clone();
        if let (Ok(section), Some((work, place))) = (&made, &self.work) {
            blamed = place.clone();
            made = section.worked(work);
        }
        if let (Ok(section), Some((flap, place))) = (&made, &self.flap) {
            blamed = place.clone();
            made = section.flapped(*flap);
        }
        made.map_err(|error| reader.problems.add(blamed, Wrong::new(error.to_string()))).ok()
    }
}
