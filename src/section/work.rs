//! Working a section: bringing its thickness, camber and trailing edge to what a maker asks for.

use super::form::Form;
use super::working::{Change, Edge, Shift, Working};
use super::{Section, SectionError, edge_of};
use crate::geometry::Curve;
use crate::units::plain;

/// What a section is to measure; what is left out stays as it is. All in chords.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Work {
    /// Greatest thickness, 0.005 to 0.5.
    pub thickness: Option<f64>,
    /// Where it lies, 0.05 to 0.9.
    pub thickness_at: Option<f64>,
    /// Greatest camber, -0.3 to 0.3.
    pub camber: Option<f64>,
    /// Where it lies, 0.05 to 0.9.
    pub camber_at: Option<f64>,
    /// Thickness of the trailing edge, 0 to 0.1.
    pub trailing_edge: Option<f64>,
    /// Station behind which the thickness is changed for the trailing edge, 0.1 to 0.98. The change
    /// grows with the cube of the distance from here.
    pub edge_from: f64,
}

impl Work {
    /// Nothing is changed.
    pub const NONE: Self = Self {
        thickness: None,
        thickness_at: None,
        camber: None,
        camber_at: None,
        trailing_edge: None,
        edge_from: Self::EDGE_FROM,
    };
    /// Where the change of the trailing edge begins unless another place is asked for.
    pub const EDGE_FROM: f64 = 0.6;

    /// The bounds of every quantity: its name, what is asked, least and most.
    fn bounds(&self) -> [(&'static str, Option<f64>, f64, f64); 6] {
        [
            ("thickness", self.thickness, 0.005, 0.5),
            ("thickness-at", self.thickness_at, 0.05, 0.9),
            ("camber", self.camber, -0.3, 0.3),
            ("camber-at", self.camber_at, 0.05, 0.9),
            ("trailing-edge", self.trailing_edge, 0.0, 0.1),
            ("edge-from", Some(self.edge_from), 0.1, 0.98),
        ]
    }
}

/// Attempts after which a section that does not come to what is asked is given up.
const MOST_ATTEMPTS: usize = 60;
/// How close thickness, camber and edge come to what is asked, in chords.
const CLOSE: f64 = 1e-11;
/// How close their places come: a flat greatest value is found to the root of its rounding.
const CLOSE_PLACE: f64 = 1e-8;
/// Camber below this is none, in chords.
const FLAT: f64 = 1e-9;

impl Section {
    /// The section brought to what `work` asks. Thickness and camber are scaled, places moved by a
    /// smooth change of station that keeps nose and trailing edge, and the edge opened or closed;
    /// then, since these touch each other, again until all hold together.
    ///
    /// # Errors
    /// When something asked is out of bounds or cannot be had, and when the result folds or crosses.
    pub fn worked(&self, work: &Work) -> Result<Self, SectionError> {
        let cannot = |why: String| SectionError::Work { name: self.name().to_owned(), why };
        for (what, value, least, most) in work.bounds() {
            if let Some(value) = value
                && !(least..=most).contains(&value)
            {
                let [value, least, most] = [value, least, most].map(|share| plain(100.0 * share));
                return Err(cannot(format!(
                    "{what} is to be {value} % of the chord, and takes {least} to {most} %"
                )));
            }
        }
        let asks_camber = work.camber.is_some_and(|camber| camber != 0.0) || work.camber_at.is_some();
        if asks_camber && self.form.greatest_camber().1.abs() < FLAT {
            return Err(cannot("it has no camber that could be scaled or moved".to_owned()));
        }
        let mut round = Working {
            edge: work.trailing_edge.map(|_| Edge { step: 0.0, from: work.edge_from }),
            ..Working::NONE
        };
        for _ in 0..MOST_ATTEMPTS {
            let form = self.form.worked(round, self.name())?;
            if work.brings_nearer(&form, &mut round) {
                let edge = edge_of(form.unflapped());
                let worked = Self { form, edge, ..self.clone() }.without_folds()?;
                worked.refuse_crossing_surfaces()?;
                return Ok(worked);
            }
            for (what, change) in [("thickness-at", round.thickness), ("camber-at", round.camber)] {
                if change.shift.stretch() > Self::MOST_STRETCH {
                    let most = Self::MOST_STRETCH;
                    return Err(cannot(format!(
                        "{what} lies too far from where it is now: the chord would be stretched more than {most} times"
                    )));
                }
            }
        }
        Err(cannot("what is asked of it cannot be had together".to_owned()))
    }

    /// By how much the chord may be stretched where a position asks for most: what lies at a
    /// quarter of the chord and is brought to half of it stretches the chord by 3.
    pub const MOST_STRETCH: f64 = 5.0;
}

impl Work {
    /// Betters `round` by what `form`, made with it, still lacks. Whether it lacked nothing.
    fn brings_nearer(&self, form: &Form, round: &mut Working) -> bool {
        let whole = form.unflapped();
        let (thickness_at, thickness) = whole.greatest_thickness();
        let (camber_at, camber) = whole.greatest_camber();
        let mut settled =
            change(&mut round.thickness, [self.thickness, self.thickness_at], [thickness, thickness_at]);
        if self.camber == Some(0.0) {
            settled &= round.camber.factor == 0.0;
            round.camber.factor = 0.0;
        } else {
            settled &= change(&mut round.camber, [self.camber, self.camber_at], [camber, camber_at]);
        }
        if let (Some(asked), Some(edge)) = (self.trailing_edge, &mut round.edge) {
            // A closed edge that was overdone would open again the other way round.
            let gap = whole.jet(-1.0).point - whole.jet(1.0).point;
            let lacks = asked - gap.hypot().copysign(gap.y);
            settled &= lacks.abs() < CLOSE;
            edge.step += 0.5 * lacks;
        }
        settled
    }
}

/// Betters a change of height and place, from what is asked and what is there.
fn change(change: &mut Change, asked: [Option<f64>; 2], now: [f64; 2]) -> bool {
    let mut settled = true;
    if let Some(height) = asked[0] {
        settled &= (height - now[0]).abs() < CLOSE;
        change.factor *= height / now[0];
    }
    if let Some(place) = asked[1] {
        settled &= (place - now[1]).abs() < CLOSE_PLACE;
        change.shift = change.shift.then(Shift::bringing(now[1], place));
    }
    settled
}
