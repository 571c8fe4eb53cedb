//! The reader of drawings: the outline of a section as somebody traced it, from a DXF file.

use dxf::Drawing;
use dxf::entities::EntityType;
use dxf::enums::Units;

use super::curves::{Density, DrawnCurve};
use super::drawing_text::{Cleaned, clean};
use super::{ChordUnit, CoordinateError, Given, MOST};
use crate::geometry::{Point, Rect, Vec2};
use crate::units::clipped;

/// What the outline is followed within where the user says nothing, in chords.
pub(super) const DRAWN: f64 = 1e-5;
/// What is smaller than this share of the drawing is no section but a letter or a mark.
const MARK: f64 = 0.15;
/// Shares of the size of the drawing: ends that are nearer than the first are joined.
const JOIN: f64 = 1e-4;
const SAG: f64 = 1e-6;
const STEP: f64 = 0.01;
const STRAIGHT: f64 = 0.15;
/// The most curves that are joined.
const MOST_CURVES: usize = 5000;

/// An outline as it was drawn.
pub(super) struct Outline {
    pub(super) layer: String,
    pub(super) points: Vec<Given>,
    pub(super) closed: bool,
    pub(super) unit: ChordUnit,
    pub(super) notes: Vec<String>,
}

/// A curve with what it is called in the drawing.
struct Named {
    curve: DrawnCurve,
    kind: &'static str,
    layer: String,
    handle: String,
}

/// Curves joined end to end.
struct Chain {
    points: Vec<Point>,
    layer: String,
    handle: String,
}

/// The longer side of the box round some points; 0 where there are none.
fn extent(points: impl Iterator<Item = Point>) -> f64 {
    let around = |bounds: Option<Rect>, point| {
        Some(bounds.map_or(Rect::from_points(point, point), |bounds| bounds.union_pt(point)))
    };
    points.fold(None, around).map_or(0.0, |bounds| bounds.width().max(bounds.height()))
}

pub(super) fn read(bytes: &[u8]) -> Result<Outline, CoordinateError> {
    let Cleaned { text, passed_over } = clean(bytes)?;
    let drawing = Drawing::load(&mut text.as_bytes()).map_err(|error| {
        let why = format!("the drawing cannot be read ({}): save it again", clipped(&error.to_string()));
        CoordinateError::Form { why }
    })?;
    let curves = curves(&drawing)?;
    if curves.is_empty() || curves.len() > MOST_CURVES {
        let many = "the drawing has too many curves: leave the outline of the section and delete the rest";
        let none = "the drawing holds no polyline, spline, line or arc; an outline within a block has to be exploded";
        return Err(CoordinateError::Form { why: if curves.is_empty() { none } else { many }.to_owned() });
    }
    let size = extent(curves.iter().flat_map(|named| named.curve.corners()));
    let sized = size > 0.0 && size.is_finite();
    if !sized {
        return Err(CoordinateError::Flat);
    }
    let density = Density { sag: SAG * size, step: STEP * size, straight: STRAIGHT * size };
    let mut pieces = Vec::new();
    let mut count = 0;
    for Named { curve, kind, layer, handle } in curves {
        match curve.points(density) {
            Ok(points) => {
                count += points.len();
                if count > 2 * MOST {
                    return Err(CoordinateError::Count { count, least: super::FEWEST, most: MOST });
                }
                pieces.push(Chain { points, layer, handle });
            }
            Err(why) => return Err(CoordinateError::Curve { kind, layer, handle, why }),
        }
    }
    let mut chains = join(pieces, JOIN * size);
    let all = chains.len();
    // Letters and marks beside an outline.
    let is_large = |chain: &Chain| extent(chain.points.iter().copied()) > MARK * size;
    if chains.iter().any(is_large) {
        chains.retain(is_large);
    }
    let marks = all - chains.len();
    let mut lines = 0;
    if chains.iter().filter(|chain| meets(chain, JOIN * size)).count() == 1 {
        // Chord lines and the like do not close; an outline beside them does.
        let all = chains.len();
        chains.retain(|chain| meets(chain, JOIN * size));
        lines = all - chains.len();
    }
    let [chain] = chains.as_slice() else {
        let which: Vec<String> = chains
            .iter()
            .take(6)
            .map(|chain| format!("layer '{}' handle {}", chain.layer, chain.handle))
            .collect();
        let more = if chains.len() > 6 { ", and more" } else { "" };
        let which = format!("{}{more}", which.join(", "));
        return Err(CoordinateError::SeveralOutlines { count: chains.len(), which });
    };
    let closed = meets(chain, JOIN * size);
    let half = Vec2::new(0.5 * DRAWN * size, 0.5 * DRAWN * size);
    let points = chain.points.iter().enumerate();
    let points = points.map(|(i, &point)| Given { point, index: i + 1, half }).collect();
    let mut notes = if passed_over.is_empty() {
        Vec::new()
    } else {
        let kinds: Vec<String> = passed_over.iter().map(|(kind, count)| format!("{count} {kind}")).collect();
        vec![format!("Passed over in the drawing, since they are no outline: {}.", kinds.join(", "))]
    };
    if marks > 0 {
        notes.push(format!("Passed over in the drawing beside the outline: {marks} small marks."));
    }
    if lines > 0 {
        notes.push(format!("Passed over in the drawing beside the one closed outline: {lines} open lines."));
    }
    let unit = unit(drawing.header.default_drawing_units);
    Ok(Outline { layer: chain.layer.clone(), points, closed, unit, notes })
}

fn unit(units: Units) -> ChordUnit {
    let (name, mm) = match units {
        Units::Inches => ("inches", 25.4),
        Units::Feet => ("feet", 304.8),
        Units::Yards => ("yards", 914.4),
        Units::Mils => ("thousandths of an inch", 0.0254),
        Units::Microns => ("micrometres", 0.001),
        Units::Millimeters => ("millimetres", 1.0),
        Units::Centimeters => ("centimetres", 10.0),
        Units::Decimeters => ("decimetres", 100.0),
        Units::Meters => ("metres", 1000.0),
        _ => return ChordUnit::Unitless,
    };
    ChordUnit::Named(name, mm)
}

/// The curves of a drawing in its own plane.
fn curves(drawing: &Drawing) -> Result<Vec<Named>, CoordinateError> {
    let mut found = Vec::new();
    for entity in drawing.entities() {
        let (kind, curve, normal) = match &entity.specific {
            EntityType::Line(line) => {
                let corners = vec![(place(&line.p1), 0.0), (place(&line.p2), 0.0)];
                // A line is given in the plane of the drawing whatever its normal.
                ("line", DrawnCurve::Polyline { corners, closed: false }, None)
            }
            EntityType::Arc(arc) => {
                let (from, to) = (arc.start_angle.to_radians(), arc.end_angle.to_radians());
                let curve = DrawnCurve::Arc { centre: place(&arc.center), radius: arc.radius, from, to };
                ("arc", curve, Some(&arc.normal))
            }
            EntityType::LwPolyline(line) => {
                let corners =
                    line.vertices.iter().map(|corner| (Point::new(corner.x, corner.y), corner.bulge));
                let curve = DrawnCurve::Polyline { corners: corners.collect(), closed: line.is_closed() };
                ("polyline", curve, Some(&line.extrusion_direction))
            }
            EntityType::Polyline(line) if !line.is_3d_polygon_mesh() && !line.is_polyface_mesh() => {
                let shown = line.vertices().filter(|corner| !corner.is_spline_frame_control_point());
                let corners = shown.map(|corner| (place(&corner.location), corner.bulge));
                let curve = DrawnCurve::Polyline { corners: corners.collect(), closed: line.is_closed() };
                ("polyline", curve, (!line.is_3d_polyline()).then_some(&line.normal))
            }
            EntityType::Spline(spline) => {
                let weighted = spline.weight_values.len() == spline.control_points.len();
                let weight = |i: usize| if weighted { spline.weight_values.get(i).copied() } else { None };
                let poles = spline.control_points.iter().enumerate();
                let poles = poles.map(|(i, pole)| (place(pole), weight(i).unwrap_or(1.0))).collect();
                let degree = usize::try_from(spline.degree_of_curve).unwrap_or(0);
                ("spline", DrawnCurve::Spline { degree, knots: spline.knot_values.clone(), poles }, None)
            }
            _ => continue,
        };
        let layer = clipped(&entity.common.layer);
        let handle = entity.common.handle.as_string();
        let Some(curve) = in_plane(curve, normal) else {
            let why =
                "it does not lie in the plane of the drawing: draw the outline in the top view".to_owned();
            return Err(CoordinateError::Curve { kind, layer, handle, why });
        };
        if !curve.corners().is_empty() {
            found.push(Named { curve, kind, layer, handle });
        }
    }
    Ok(found)
}

fn place(point: &dxf::Point) -> Point {
    Point::new(point.x, point.y)
}

/// A curve as it is seen from above; one that was drawn from below is the other way round.
fn in_plane(curve: DrawnCurve, normal: Option<&dxf::Vector>) -> Option<DrawnCurve> {
    let Some(normal) = normal else { return Some(curve) };
    let level = normal.x.abs() + normal.y.abs() < 1e-6 * normal.z.abs();
    if !level {
        return None;
    }
    if normal.z > 0.0 {
        return Some(curve);
    }
    let turned = |point: Point| Point::new(-point.x, point.y);
    Some(match curve {
        DrawnCurve::Polyline { corners, closed } => {
            let corners = corners.into_iter().map(|(point, bulge)| (turned(point), -bulge)).collect();
            DrawnCurve::Polyline { corners, closed }
        }
        DrawnCurve::Arc { centre, radius, from, to } => {
            let half_turn = std::f64::consts::PI;
            DrawnCurve::Arc { centre: turned(centre), radius, from: half_turn - to, to: half_turn - from }
        }
        spline @ DrawnCurve::Spline { .. } => spline,
    })
}

fn meets(chain: &Chain, near: f64) -> bool {
    match (chain.points.first(), chain.points.last()) {
        (Some(first), Some(last)) => chain.points.len() > 2 && first.distance(*last) <= near,
        _ => false,
    }
}

/// Joins curves whose ends meet, each end to the nearest.
fn join(mut pieces: Vec<Chain>, near: f64) -> Vec<Chain> {
    let mut chains = Vec::new();
    while let Some(mut chain) = pieces.pop() {
        while !meets(&chain, near) {
            let (Some(&first), Some(&last)) = (chain.points.first(), chain.points.last()) else { break };
            // Of each piece that is left: how far it is, whether at our last end, and by its first.
            let reach = |(i, piece): (usize, &Chain)| {
                let (start, end) = (piece.points.first()?, piece.points.last()?);
                let ways = [
                    (last.distance(*start), i, true, true),
                    (last.distance(*end), i, true, false),
                    (first.distance(*start), i, false, true),
                    (first.distance(*end), i, false, false),
                ];
                ways.into_iter().min_by(|a, b| a.0.total_cmp(&b.0))
            };
            let open = |(_, piece): &(usize, &Chain)| !meets(piece, near);
            let nearest = pieces.iter().enumerate().filter(open).filter_map(reach);
            let Some((distance, i, at_last, by_first)) = nearest.min_by(|a, b| a.0.total_cmp(&b.0)) else {
                break;
            };
            if distance.is_nan() || distance > near {
                break;
            }
            let mut added = pieces.swap_remove(i).points;
            if at_last != by_first {
                added.reverse();
            }
            // The common end stands once.
            if at_last {
                chain.points.extend(added.into_iter().skip(1));
            } else {
                added.pop();
                added.append(&mut chain.points);
                chain.points = added;
            }
        }
        chains.push(chain);
    }
    chains
}
