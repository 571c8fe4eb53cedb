//! What the router is handed: each piece as it is to be cut, and the sheets of stock they come from.

use super::PackError;
use super::station::{StationAids, stamp};
use crate::design::Design;
use crate::units::number;
use crate::workshop::{
    Drawing, Layout, RouterSettings, StockPiece, StockSettings, engrave, on_stock, routed,
};

/// A piece to be routed.
pub(super) struct CutPiece {
    /// What it is for.
    pub(super) role: &'static str,
    /// Distance from the root of its station, mm.
    pub(super) station: Option<f64>,
    /// The ending of its file's name, empty for the finished outline of a station.
    pub(super) ending: &'static str,
    /// What it is called on its sheet.
    pub(super) name: String,
    /// As it is to be cut.
    pub(super) drawing: Drawing,
    /// Whether its name is engraved on it.
    pub(super) is_engraved: bool,
}

/// Every piece, ready for the router.
pub(super) fn cut_pieces(
    design: &Design,
    stations: &[StationAids<'_>],
    pattern: &Drawing,
) -> Result<Vec<CutPiece>, PackError> {
    let settings = router_settings(design);
    let fingerprint = stamp(design).fingerprint;
    let piece = |role, station: Option<f64>, ending: &'static str, drawing: &Drawing| {
        let failed = |source| PackError::Shape { at: station.unwrap_or(0.0), source };
        let at = station.map(|at| number(at, 2));
        let name = match (&at, ending) {
            (None, _) => "planform".to_owned(),
            (Some(at), "") => format!("{at} finished"),
            (Some(at), "main") => format!("{at} main body"),
            (Some(at), ending) => format!("{at} {ending}"),
        };
        let mut drawing = routed(drawing, settings).map_err(failed)?;
        drawing.caption(note(settings));
        let place = at.unwrap_or_default();
        let texts = [format!("{place} {ending} {fingerprint}"), format!("{place} {ending}"), place];
        let texts = texts.map(|text| text.split_whitespace().collect::<Vec<_>>().join(" "));
        let is_engraved = engrave(
            &mut drawing,
            &texts.map(|text| if text.is_empty() { fingerprint.clone() } else { text }),
        );
        Ok::<_, PackError>(CutPiece { role, station, ending, name, drawing, is_engraved })
    };
    let mut pieces = Vec::new();
    for station in stations {
        let at = Some(station.shape.at);
        pieces.push(piece("station template", at, "", &station.template)?);
        for (role, ending, drawing) in &station.wood.templates {
            pieces.push(piece(role, at, ending, drawing)?);
        }
    }
    pieces.push(piece("planform pattern", None, "planform", pattern)?);
    Ok(pieces)
}

/// The pieces on their sheets.
pub(super) fn layout(design: &Design, pieces: &[CutPiece]) -> Layout {
    let stock = &design.stock;
    let settings = StockSettings {
        length: stock.length.mm(),
        width: stock.width.mm(),
        margin: stock.margin.mm(),
        spacing: stock.spacing.mm(),
        may_turn: stock.may_turn,
    };
    let pieces: Vec<StockPiece> = pieces
        .iter()
        .map(|piece| StockPiece { name: piece.name.clone(), drawing: piece.drawing.clone() })
        .collect();
    on_stock(&stamp(design).to_string(), &note(router_settings(design)), &pieces, settings)
}

fn router_settings(design: &Design) -> RouterSettings {
    let router = &design.router;
    RouterSettings {
        cutter: router.cutter.mm(),
        is_path: router.is_path,
        corners: router.corners,
        tabs: router.tabs,
        tab_width: router.tab_width.mm(),
    }
}

/// What a contour is, in the file's own words.
fn note(settings: RouterSettings) -> String {
    let cutter = number(settings.cutter, 2);
    if settings.is_path {
        format!("mm; contours are the path of the middle of a cutter of {cutter} mm: set off no radius")
    } else {
        format!("mm; contours are the line of the piece: set off the radius of the cutter, {cutter} mm wide")
    }
}
