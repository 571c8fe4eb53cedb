//! How two foils share a boat: plain statics, steady and level.
//!
//! Forces up add to the weights; moments are taken about the forward foil, so that its lift falls out:
//!
//! L_after (x_after - x_forward) = Σ W (x - x_forward) - T (z_sail - z_drag) + Σ M
//!
//! A drive T above the drag that holds it back presses the bow down, which takes lift from the after foil
//! and puts it on the forward one. M are the foils' own pitching moments about their root quarter chords.

use super::LoadingError;
use super::error::checked;

/// Something heavy.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Weight {
    /// N, not negative.
    pub force: f64,
    /// Distance aft of any mark that is the same for all, mm.
    pub aft: f64,
}

/// What drives the boat, and as much drag that holds it back.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Drive {
    /// Forward, N. In steady sailing the drag is as much.
    pub force: f64,
    /// Height of the sail's centre of effort above any mark, mm.
    pub effort_height: f64,
    /// Height of the drag's centre above the same mark, mm; below it, negative.
    pub drag_height: f64,
}

/// A boat on two foils.
#[derive(Debug, Clone, PartialEq)]
pub struct TwoFoils {
    /// The forward foil's root quarter chord, aft of the mark, mm.
    pub forward: f64,
    /// The after foil's, mm.
    pub after: f64,
    /// All weights: hull, crew, rig.
    pub weights: Vec<Weight>,
    /// The sail's drive; none by default.
    pub drive: Drive,
    /// The foils' own pitching moments together, nose up, N m.
    pub own_moment: f64,
}

/// What each foil carries, N.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Shares {
    /// The forward foil.
    pub forward: f64,
    /// The after foil.
    pub after: f64,
}

impl TwoFoils {
    /// What each foil carries.
    ///
    /// # Errors
    /// When a quantity makes no sense, the foils lie at one place, or a foil would have to pull down.
    pub fn shares(&self) -> Result<Shares, LoadingError> {
        let finite = |what, value| checked(what, value, "a finite number", |_| true);
        finite("the forward foil's place", self.forward)?;
        finite("the after foil's place", self.after)?;
        finite("the sail's drive", self.drive.force)?;
        finite("the height of the sail's effort", self.drive.effort_height)?;
        finite("the height of the drag", self.drive.drag_height)?;
        finite("the foils' own moment", self.own_moment)?;
        for weight in &self.weights {
            checked("a weight", weight.force, "not negative", |force| force >= 0.0)?;
            finite("the place of a weight", weight.aft)?;
        }
        if self.forward == self.after {
            return Err(LoadingError::SamePlace { at: self.forward });
        }
        checked("the after foil's place", self.after, "aft of the forward foil", |x| x > self.forward)?;
        let total: f64 = self.weights.iter().map(|weight| weight.force).sum();
        // N mm, nose up about the forward foil.
        let of_weights: f64 = self.weights.iter().map(|w| w.force * (w.aft - self.forward)).sum();
        let of_drive = self.drive.force * (self.drive.effort_height - self.drive.drag_height);
        let after = (of_weights - of_drive + 1e3 * self.own_moment) / (self.after - self.forward);
        let forward = total - after;
        for (foil, lift) in [("forward", forward), ("after", after)] {
            checked("a foil's share", lift, "a finite force: a weight or a distance is too great", |_| true)?;
            if lift < 0.0 {
                return Err(LoadingError::PullsDown { foil, force: -lift });
            }
        }
        Ok(Shares { forward, after })
    }
}
