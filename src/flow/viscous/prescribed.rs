//! A layer along speeds that are given and stay so: similar flows, plates, and any measured
//! pressure.

use super::march::march;
use super::side::{Station, Surroundings};
use super::solution::LayerPoint;
use super::{Conditions, ViscousError};
use crate::geometry::Point;

/// The layer along a wall from its leading edge or stagnation point, with edge speed given at
/// lengths along it.
///
/// `stations` are pairs of length and speed, positive and growing in length; to the first, the
/// speed is taken to have grown with the power of the length that the first two have. Transition
/// is by the conditions, whose `trip_upper` is here the length of the trip. The answer ends where
/// no attached layer goes with the speed.
///
/// # Errors
/// When the conditions are out of range, or a station is not finite, positive and beyond the one
/// before ([`ViscousError::Station`]).
pub fn layer_along(stations: &[[f64; 2]], conditions: &Conditions) -> Result<Vec<LayerPoint>, ViscousError> {
    conditions.check()?;
    let mut before = 0.0;
    for (i, &[length, speed]) in stations.iter().enumerate() {
        let right = length.is_finite() && speed.is_finite() && length > before && speed > 0.0;
        if !right {
            return Err(ViscousError::Station(i));
        }
        before = length;
    }
    let exponent = match stations {
        [[l0, u0], [l1, u1], ..] => (u1 / u0).ln() / (l1 / l0).ln(),
        _ => return Err(ViscousError::Station(stations.len())),
    };
    let mut layer: Vec<Station> = stations
        .iter()
        .enumerate()
        .map(|(i, &[length, speed])| Station::new(i, 1.0, length, 0.0, speed))
        .collect();
    let around = Surroundings {
        reynolds: conditions.reynolds,
        critical: conditions.amplification,
        trip: conditions.trip_upper,
        window: None,
        wake: false,
    };
    let (_, departed) = march(&mut layer, &around, exponent);
    layer.truncate(departed.unwrap_or(stations.len()));
    Ok(layer
        .iter()
        .map(|station| LayerPoint::of(station, Point::new(station.xi, 0.0), conditions.reynolds, false))
        .collect())
}
