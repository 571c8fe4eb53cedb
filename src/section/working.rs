//! What a maker changes of a section: thickness, camber, where they are greatest, and the edge.

/// One round of changes to the half thickness and the camber of a section.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Working {
    pub(super) thickness: Change,
    pub(super) camber: Change,
    pub(super) edge: Option<Edge>,
}

/// A curve over the chord, made higher and moved along it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Change {
    /// Factor of the height.
    pub(super) factor: f64,
    pub(super) shift: Shift,
}

/// A change of station that leaves both ends where they are: the new curve has at x what the old
/// one had at g(x) = a x / (1 + (a - 1) x).
///
/// It multiplies x / (1 - x) by `a`, so that it is smooth and never turns back, and two of them
/// one after the other are a third.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Shift {
    a: f64,
}

/// What is added to the half thickness behind a station, so that the trailing edge gets a
/// thickness of its own: with the cube of the distance, which leaves the curvature continuous.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Edge {
    /// Added to the half thickness at the trailing edge, in chords.
    pub(super) step: f64,
    /// Where it begins, a fraction of the chord.
    pub(super) from: f64,
}

impl Working {
    pub(super) const NONE: Self = Self { thickness: Change::NONE, camber: Change::NONE, edge: None };

    /// The changed half thickness at x = `root`² with two derivatives by `root`, from those of
    /// the unchanged one.
    pub(super) fn half(&self, unchanged: impl Fn(f64) -> [f64; 3], root: f64) -> [f64; 3] {
        let half = self.thickness.at_root(unchanged, root);
        let added = self.edge.map_or([0.0; 3], |edge| edge.at_root(root));
        std::array::from_fn(|i| half[i] + added[i])
    }
}

impl Change {
    pub(super) const NONE: Self = Self { factor: 1.0, shift: Shift { a: 1.0 } };

    /// Value and two derivatives by the root of x.
    pub(super) fn at_root(&self, unchanged: impl Fn(f64) -> [f64; 3], root: f64) -> [f64; 3] {
        let [place, first, second] = self.shift.root(root);
        let [y, y1, y2] = unchanged(place);
        [y, y1 * first, y2 * first * first + y1 * second].map(|v| v * self.factor)
    }

    /// Value and three derivatives by x.
    pub(super) fn at(&self, unchanged: impl Fn(f64) -> [f64; 4], x: f64) -> [f64; 4] {
        let [place, g1, g2, g3] = self.shift.station(x);
        let [y, y1, y2, y3] = unchanged(place);
        [y, y1 * g1, y2 * g1 * g1 + y1 * g2, y3 * g1 * g1 * g1 + 3.0 * y2 * g1 * g2 + y1 * g3]
            .map(|v| v * self.factor)
    }
}

impl Shift {
    /// Brings what was at station `from` to station `to`, both inside (0, 1).
    pub(super) fn bringing(from: f64, to: f64) -> Self {
        Self { a: from * (1.0 - to) / (to * (1.0 - from)) }
    }

    /// This shift and then `next`.
    pub(super) fn then(self, next: Self) -> Self {
        Self { a: self.a * next.a }
    }

    /// By how much it stretches the chord where it stretches it most, 1 or more.
    pub(super) fn stretch(self) -> f64 {
        self.a.max(1.0 / self.a)
    }

    /// Where what was at `station` has gone.
    pub(super) fn moved(self, station: f64) -> f64 {
        station / (self.a - (self.a - 1.0) * station)
    }

    fn station(self, x: f64) -> [f64; 4] {
        let (a, b) = (self.a, self.a - 1.0);
        let d = 1.0 + b * x;
        [a * x / d, a / (d * d), -2.0 * a * b / (d * d * d), 6.0 * a * b * b / (d * d * d * d)]
    }

    /// The root of the old station, over the root of the new one.
    fn root(self, root: f64) -> [f64; 3] {
        let b = self.a - 1.0;
        let (d, scale) = (1.0 + b * root * root, self.a.sqrt());
        let cube = d * d.sqrt();
        [scale * root / d.sqrt(), scale / cube, -3.0 * scale * b * root / (cube * d)]
    }
}

impl Edge {
    fn at_root(self, root: f64) -> [f64; 3] {
        let rear = 1.0 - self.from;
        let u = (root * root - self.from) / rear;
        if u <= 0.0 {
            return [0.0; 3];
        }
        let (u1, u2) = (2.0 * root / rear, 2.0 / rear);
        [u * u * u, 3.0 * u * u * u1, 6.0 * u * u1 * u1 + 3.0 * u * u * u2].map(|v| v * self.step)
    }
}

/// The half thickness after every round of changes, the first one first.
pub(super) fn worked_half(rounds: &[Working], base: &dyn Fn(f64) -> [f64; 3], root: f64) -> [f64; 3] {
    match rounds.split_last() {
        None => base(root),
        Some((last, before)) => last.half(|root| worked_half(before, base, root), root),
    }
}

/// The camber by the root of x after every round of changes.
pub(super) fn worked_camber_root(rounds: &[Working], base: &dyn Fn(f64) -> [f64; 3], root: f64) -> [f64; 3] {
    match rounds.split_last() {
        None => base(root),
        Some((last, before)) => last.camber.at_root(|root| worked_camber_root(before, base, root), root),
    }
}

/// The camber by x after every round of changes.
pub(super) fn worked_camber(rounds: &[Working], base: &dyn Fn(f64) -> [f64; 4], x: f64) -> [f64; 4] {
    match rounds.split_last() {
        None => base(x),
        Some((last, before)) => last.camber.at(|x| worked_camber(before, base, x), x),
    }
}

/// Where joints of the unchanged thickness (`thickness`) and camber have gone, and new ones.
pub(super) fn worked_joints(rounds: &[Working], thickness: Vec<f64>, camber: Vec<f64>) -> Vec<f64> {
    let (mut thickness, mut camber) = (thickness, camber);
    for round in rounds {
        thickness.iter_mut().for_each(|x| *x = round.thickness.shift.moved(*x));
        camber.iter_mut().for_each(|x| *x = round.camber.shift.moved(*x));
        thickness.extend(round.edge.map(|edge| edge.from));
    }
    thickness.extend(camber);
    thickness
}
