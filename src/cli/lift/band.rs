//! The band of a curve between still and natural water: the same section at its greatest and at its
//! least amplification exponent.

use super::curve::Curve;

/// Two curves that differ in the amplification exponent alone.
pub(super) struct Band<'a> {
    /// At the greatest exponent: the stillest water.
    pub(super) still: &'a Curve,
    /// At the least.
    pub(super) natural: &'a Curve,
}

/// What lies between them at one incidence, the lesser value first.
pub(super) struct Between {
    /// Degrees.
    pub(super) angle: f64,
    pub(super) cl: [f64; 2],
    pub(super) cd: [f64; 2],
}

impl<'a> Band<'a> {
    /// Every band among the curves, in their order.
    pub(super) fn all(curves: &'a [Curve]) -> Vec<Self> {
        let mut groups: Vec<Vec<&Curve>> = Vec::new();
        for curve in curves.iter().filter(|curve| curve.viscous().is_some()) {
            let like = |group: &&mut Vec<&Curve>| {
                let first = group[0];
                first.flap == curve.flap && first.running == curve.running && first.finish == curve.finish
            };
            match groups.iter_mut().find(like) {
                Some(group) => group.push(curve),
                None => groups.push(vec![curve]),
            }
        }
        let band = |group: Vec<&'a Curve>| {
            let by_exponent = |a: &&&Curve, b: &&&Curve| a.amplification().total_cmp(&b.amplification());
            let (natural, still) = (*group.iter().min_by(by_exponent)?, *group.iter().max_by(by_exponent)?);
            (natural.amplification() < still.amplification()).then_some(Band { still, natural })
        };
        groups.into_iter().filter_map(band).collect()
    }

    /// Where both curves have a flow.
    pub(super) fn between(&self) -> Vec<Between> {
        let pairs = std::iter::zip(self.still.rows(), self.natural.rows());
        let between = pairs.filter_map(|(still, natural)| {
            let (angle, still, natural) = (still.angle, still.at?, natural.at?);
            let (cl, cd) = ([still.cl, natural.cl], [still.cd?, natural.cd?]);
            Some(Between { angle, cl: sorted(cl), cd: sorted(cd) })
        });
        between.collect()
    }
}

fn sorted([a, b]: [f64; 2]) -> [f64; 2] {
    [a.min(b), a.max(b)]
}
