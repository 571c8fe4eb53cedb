//! From the values of a file to a design: what has to agree between one value and another.

use std::ops::Range;

use super::boat;
use super::keys;
use super::model::{
    Design, DxfRelease, Faces, Hands, Kind, Lift, MaskShapes, Masks, Paper, PaperSize, Printer, Router,
    Station, Stock,
};
use super::reader::{Row, Sheet};
use super::resolve_ends::{case_and_waterline, hands, tip};
use super::resolve_wood::{cut, flap, laminate, place_hinge, ply, wood};
use super::strength;
use crate::problems::{Problems, Wrong};
use crate::section::{Beside, Finish, SectionFileError};
use crate::units::{Angle, Length, clipped};
use crate::wing::Law;
use crate::workshop::Corners;

/// Two places along the span nearer than this are one, millimetres.
pub(super) const SAME: f64 = 0.001;

/// Builds the design, or notes why it cannot be.
///
/// Every part is looked at before any is given up, so that one run reports them all.
pub(super) fn design(
    sheet: &Sheet,
    beside: &Beside<'_>,
    follow: bool,
    problems: &mut Problems,
) -> Option<Design> {
    let root = sheet.one(&keys::ROOT)?;
    let kind = root.text("kind").and_then(Kind::from_word);
    let planform = sheet.one(&keys::PLANFORM);
    let span = planform.and_then(|row| row.length("span"));
    let reach = match (kind, planform, span) {
        (Some(kind), Some(row), Some(span)) => Some(Reach::new(kind, hands(row, kind), span)),
        _ => None,
    };

    let stations = stations(sheet.all(&keys::STATION), reach.as_ref(), beside, problems);
    let templates = templates(sheet.one(&keys::TEMPLATES), reach.as_ref(), problems);
    let flap = sheet.one(&keys::FLAP).map(|row| flap(sheet, row, reach.as_ref(), problems));
    let wood = wood(sheet.one(&keys::WOOD)?);
    let laminate = laminate(sheet.one(&keys::LAMINATE)?);
    let plies: Vec<_> =
        sheet.all(&keys::PLY).iter().map(|row| ply(sheet, row, reach.as_ref(), problems)).collect();
    let cuts: Vec<_> = sheet.all(&keys::CUT).iter().map(|row| cut(row, reach.as_ref(), problems)).collect();
    let density = wood.as_ref().map(|wood| wood.density);
    let strength = strength::strength(sheet, reach.as_ref(), density, problems);
    strength::refuse_halves(sheet, strength.as_ref(), problems);
    let lift = lift(sheet.one(&keys::LIFT)?, problems);
    let boat = boat::boat(sheet, kind, beside, follow, problems);
    let facts = (lift.as_ref(), reach.as_ref().map(|reach| reach.to));
    let duty = boat::duty(sheet.one(&keys::DUTY), kind, boat.as_ref(), facts, problems);
    let masks = masks(sheet.one(&keys::MASKS)?);
    let printer = printer(sheet.one(&keys::PRINTER)?, problems);
    let paper = paper(sheet.one(&keys::PAPER)?, problems);
    let stock = stock(sheet.one(&keys::STOCK)?, problems);
    let router = router(sheet.one(&keys::ROUTER)?, problems);
    if let (Some(stock), Some(router)) = (&stock, &router) {
        cutter_between_pieces(sheet.one(&keys::STOCK)?, stock, router, problems);
    }

    let fairing = sheet.one(&keys::TEMPLATES).and_then(|row| row.length("fairing"));
    let (stations, planform) = (stations?, planform?);
    let shaped = stations.last().and_then(|last| tip(planform, last, reach.as_ref(), problems));
    let depths = case_and_waterline(planform, kind?, reach.as_ref(), problems);
    let law = planform.text("law").and_then(Law::from_word)?;
    if law == Law::Elliptic && stations.len() != 2 {
        let message =
            format!("an elliptic chord goes with two stations, root and tip: there are {}", stations.len());
        let help = "name the others under [templates], or write law = \"smooth\"";
        problems.add(planform.place("law"), Wrong::new(message).help(help));
    }
    let mut design = Design {
        law,
        fairing,
        twist_about: planform.number("twist-about")?,
        name: root.text("name")?.to_owned(),
        kind: kind?,
        notes: root.text("notes").map(str::to_owned),
        span: span?,
        hands: hands(planform, kind?),
        templates: with_stations(templates.unwrap_or_default(), &stations, shaped.map(|tip| tip.length)),
        tip: shaped,
        in_case: depths?[0],
        waterline: depths?[1],
        stations,
        wood: wood?,
        laminate: laminate?,
        cuts: cuts.into_iter().collect::<Option<_>>()?,
        plies: plies.into_iter().collect::<Option<_>>()?,
        flap: match flap {
            Some(flap) => Some(flap?),
            None => None,
        },
        strength: strength?,
        lift: lift?,
        duty: duty?,
        boat,
        masks: masks?,
        printer: printer?,
        paper: paper?,
        stock: stock?,
        router: router?,
    };
    if let Some(row) = sheet.one(&keys::FLAP).filter(|_| problems.is_empty()) {
        place_hinge(&mut design, row, problems);
    }
    // What is wrong with the foil as a whole is found when it is made; here it only adds no places.
    if let Some(fairing) = fairing.filter(|_| design.law != Law::Straight)
        && problems.is_empty()
        && let Ok(places) = design.wing().and_then(|wing| wing.fewest_templates(fairing.mm()))
    {
        design.templates.extend(places.into_iter().map(Length::from_mm));
        design.templates.sort_by(|a, b| a.mm().total_cmp(&b.mm()));
        design.templates.dedup_by(|a, b| (a.mm() - b.mm()).abs() <= SAME);
    }
    Some(design)
}

/// The places named, the stations, and where a tip of that length begins, ascending: the foil bends at
/// these, and a batten laid past one without a template would cut the bend off.
fn with_stations(mut places: Vec<Length>, stations: &[Station], tip: Option<Length>) -> Vec<Length> {
    let end = stations.last().map_or(0.0, |last| last.at.mm());
    let begins = tip.map(|length| Length::from_mm(end - length.mm())).filter(|at| at.mm() > SAME);
    for at in stations.iter().map(|station| station.at).chain(begins) {
        if places.iter().all(|place| (place.mm() - at.mm()).abs() > SAME) {
            places.push(at);
        }
    }
    places.sort_by(|a, b| a.mm().total_cmp(&b.mm()));
    places
}

/// How far the built piece reaches, and how to say why.
pub(super) struct Reach {
    pub(super) to: Length,
    pub(super) because: String,
}

impl Reach {
    fn new(kind: Kind, hands: Hands, span: Length) -> Self {
        if kind.mirrored() && hands == Hands::Mirrored {
            let to = Length::from_mm(span.mm() / 2.0);
            Self { to, because: format!("half the span of {span} is {to}") }
        } else {
            Self { to: span, because: format!("the span is {span}") }
        }
    }

    /// Notes when a place lies beyond the end.
    pub(super) fn holds(&self, what: &str, place: Length, span: Range<usize>, problems: &mut Problems) {
        if place.mm() > self.to.mm() + SAME {
            let wrong = Wrong::new(format!("{what} lies at {place}, but {}", self.because))
                .help(format!("it lies at \"{}\" at most", self.to));
            problems.add(span, wrong);
        }
    }
}

fn stations(
    rows: &[Row],
    reach: Option<&Reach>,
    beside: &Beside<'_>,
    problems: &mut Problems,
) -> Option<Vec<Station>> {
    let places: Vec<(Length, Range<usize>)> =
        rows.iter().filter_map(|row| Some((row.length("at")?, row.place("at")))).collect();
    let ordered = ascending("station", &places, problems);
    // The ends mean nothing while the order is in doubt.
    if ordered && places.len() == rows.len() {
        ends(&places, reach, problems);
    }
    let stations: Vec<Option<Station>> = rows.iter().map(|row| station(row, beside, problems)).collect();
    stations.into_iter().collect()
}

/// Notes every place that does not lie beyond the one before it.
fn ascending(what: &str, places: &[(Length, Range<usize>)], problems: &mut Problems) -> bool {
    let mut ordered = true;
    for pair in places.windows(2) {
        let [(before, _), (here, span)] = pair else { continue };
        let step = here.mm() - before.mm();
        if step > SAME {
            continue;
        }
        ordered = false;
        let message = if step < -SAME {
            format!("this {what} lies at {here}, nearer to the root than the one before it at {before}")
        } else {
            format!("this {what} lies at {here}, the same place as the one before it")
        };
        let help =
            format!("give each {what} a place of its own, from the root outwards: this one beyond {before}");
        problems.add(span.clone(), Wrong::new(message).help(help));
    }
    ordered
}

fn ends(places: &[(Length, Range<usize>)], reach: Option<&Reach>, problems: &mut Problems) {
    if let Some((at, span)) = places.first()
        && at.mm() > SAME
    {
        let wrong = Wrong::new(format!("the first station lies at {at}: the root is at 0"))
            .help("write at = \"0 mm\"");
        problems.add(span.clone(), wrong);
    }
    if let (Some((at, span)), Some(reach)) = (places.last(), reach)
        && places.len() > 1
        && (at.mm() - reach.to.mm()).abs() > SAME
    {
        let wrong = Wrong::new(format!("the last station lies at {at}, but {}", reach.because))
            .help(format!("write at = \"{}\"", reach.to));
        problems.add(span.clone(), wrong);
    }
}

fn station(row: &Row, beside: &Beside<'_>, problems: &mut Problems) -> Option<Station> {
    let chord = row.length("chord");
    let from = row.number("edge-from");
    let finish = match (row.length("trailing-edge"), chord, from) {
        (Some(thickness), Some(chord), Some(from)) => {
            Some(Finish::Thick { thickness: thickness.mm() / chord.mm(), from })
        }
        (Some(_), ..) => None,
        (None, ..) if row.text("trailing-edge") == Some("closed") => Some(Finish::Closed),
        (None, ..) => Some(Finish::Published),
    };
    let section = row.text("section").and_then(|named| {
        let made = beside.named(named.trim(), finish.unwrap_or_default());
        made.map_err(|error| problems.add(row.place("section"), wrong_section(named, &error))).ok()
    });
    Some(Station {
        at: row.length("at")?,
        chord: chord?,
        section: section?,
        designation: row.text("section")?.trim().to_owned(),
        finish: finish?,
        twist: row.angle("twist")?,
        sweep: row.length("sweep")?,
        rise: row.length("rise")?,
    })
}

fn wrong_section(named: &str, error: &SectionFileError) -> Wrong {
    let wrong = Wrong::new(error.to_string());
    match error {
        SectionFileError::Text(_) | SectionFileError::Drawing { .. } => wrong
            .help(format!("`plankform section \"{}\"` shows what is wrong with that file", clipped(named))),
        SectionFileError::Reading { .. } => wrong.help("it is looked for beside the design file"),
        _ => wrong,
    }
}

fn templates(row: Option<&Row>, reach: Option<&Reach>, problems: &mut Problems) -> Option<Vec<Length>> {
    let places = row?.lengths("at")?;
    ascending("template", places, problems);
    if let Some(reach) = reach {
        for (at, span) in places {
            reach.holds("this template", *at, span.clone(), problems);
        }
    }
    Some(places.iter().map(|(at, _)| *at).collect())
}

fn lift(row: &Row, problems: &mut Problems) -> Option<Lift> {
    let (from, to, step): (Angle, Angle, Angle) = (row.angle("from")?, row.angle("to")?, row.angle("step")?);
    let lift = Lift {
        from,
        to,
        step,
        speed: row.number("speed")?,
        depth: row.length("depth")?,
        top_speed: row.number("top-speed"),
        cavitation_margin: row.number("cavitation-margin")?,
        sea: row.text("water")? == "sea",
        temperature: row.number("temperature")?,
        quietness: row.number("quietness")?,
        design: row.number("design")?,
    };
    if to.degrees() <= from.degrees() {
        let wrong =
            Wrong::new(format!("the angles run from {from} to {to}: the last must lie above the first"));
        problems.add(row.place("to"), wrong);
    } else if lift.points() > Lift::MOST_POINTS {
        let least = (to.degrees() - from.degrees()) / (Lift::MOST_POINTS - 1) as f64;
        // Rounded up, so that the value we name is one that we take.
        let least = Angle::from_degrees((least * 1000.0).ceil() / 1000.0);
        let message = format!(
            "{from} to {to} in steps of {step} makes {} angles: {} at most",
            lift.points(),
            Lift::MOST_POINTS
        );
        problems.add(
            row.place("step"),
            Wrong::new(message).help(format!("a step of \"{least}\" or more will do")),
        );
    }
    Some(lift)
}

fn masks(row: &Row) -> Option<Masks> {
    Some(Masks {
        shapes: row.text("for").and_then(MaskShapes::from_word)?,
        clearance: row.length("clearance")?,
        wall: row.length("wall")?,
        thickness: row.length("thickness")?,
        cradles: row.text("cradles").and_then(Faces::from_word)?,
        cradle_length: row.length("cradle-length")?,
        rails: row.text("rails").and_then(Faces::from_word)?,
        rail_offset: row.length("rail-offset")?,
    })
}

/// Notes when margins on both edges, and what else is lost, leave nothing of a side.
fn leaves_room(row: &Row, lost: Length, sides: &[(&str, Length)], problems: &mut Problems) {
    for (name, side) in sides {
        if side.mm() <= lost.mm() {
            let wrong =
                Wrong::new(format!("nothing is left of {name} ({side}): the edges take {lost} of it"))
                    .help("take less margin or a larger size");
            problems.add(row.place("margin"), wrong);
        }
    }
}

fn printer(row: &Row, problems: &mut Problems) -> Option<Printer> {
    let printer = Printer {
        bed_x: row.length("bed-x")?,
        bed_y: row.length("bed-y")?,
        bed_z: row.length("bed-z")?,
        margin: row.length("margin")?,
    };
    let lost = Length::from_mm(2.0 * printer.margin.mm());
    leaves_room(row, lost, &[("bed-x", printer.bed_x), ("bed-y", printer.bed_y)], problems);
    Some(printer)
}

fn paper(row: &Row, problems: &mut Problems) -> Option<Paper> {
    let paper = Paper {
        size: match row.length("size") {
            Some(_) => PaperSize::A4,
            None => row.text("size").and_then(PaperSize::from_word)?,
        },
        roll: row.length("size"),
        margin: row.length("margin")?,
        overlap: row.length("overlap")?,
    };
    let (width, height) = match paper.roll {
        Some(width) => (width, width),
        None => paper.size.dimensions(),
    };
    let lost = Length::from_mm(2.0 * paper.margin.mm() + paper.overlap.mm());
    leaves_room(row, lost, &[("the paper's width", width), ("the paper's height", height)], problems);
    Some(paper)
}

fn stock(row: &Row, problems: &mut Problems) -> Option<Stock> {
    let stock = Stock {
        length: row.length("length")?,
        width: row.length("width")?,
        thickness: row.length("thickness")?,
        margin: row.length("margin")?,
        spacing: row.length("spacing")?,
        may_turn: row.text("grain")? == "any",
    };
    let lost = Length::from_mm(2.0 * stock.margin.mm());
    leaves_room(row, lost, &[("length", stock.length), ("width", stock.width)], problems);
    Some(stock)
}

/// Notes when the cutter does not go between two pieces.
fn cutter_between_pieces(row: &Row, stock: &Stock, router: &Router, problems: &mut Problems) {
    if stock.spacing.mm() < router.cutter.mm() {
        let (spacing, cutter) = (stock.spacing, router.cutter);
        let wrong = Wrong::new(format!(
            "pieces lie {spacing} apart, and the cutter of {cutter} does not go between them"
        ))
        .help(format!("write spacing = \"{cutter}\" or more, or take a smaller cutter under [router]"));
        problems.add(row.place("spacing"), wrong);
    }
}

fn router(row: &Row, problems: &mut Problems) -> Option<Router> {
    let tabs = row.number("tabs")?;
    if tabs.fract() != 0.0 {
        let wrong = Wrong::new(format!("tabs is {tabs}: there is no part of a tab"))
            .help(format!("write tabs = {}", tabs.round()));
        problems.add(row.place("tabs"), wrong);
    }
    let router = Router {
        tolerance: row.length("tolerance")?,
        cutter: row.length("cutter")?,
        is_path: row.text("contour")? == "path",
        corners: row.text("corners").and_then(Corners::from_word)?,
        tabs: tabs as usize,
        tab_width: row.length("tab-width")?,
        splines: row.text("curves")? == "splines",
        release: row.text("dxf").and_then(DxfRelease::from_word)?,
    };
    if router.is_path && router.corners != Corners::Sharp {
        let wrong = Wrong::new(
            "a relieved corner is as wide as the cutter, and leaves no path of its middle",
        )
        .help("write corners = \"sharp\", or contour = \"piece\" and let the machine set off the radius");
        problems.add(row.place("corners"), wrong);
    }
    if router.splines && router.release != DxfRelease::R2000 {
        let wrong = Wrong::new("R12 has no splines").help("write dxf = \"2000\", or curves = \"arcs\"");
        problems.add(row.place("curves"), wrong);
    }
    Some(router)
}
