//! Fresh and sea water at one atmosphere, and when it boils at a foil.

/// Kinds of water.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Salinity {
    /// Fresh water.
    Fresh,
    /// Sea water of practical salinity 35.
    Sea,
}

/// What the flow needs to know of water.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Water {
    /// In kg/m³.
    pub density: f64,
    /// Kinematic viscosity in m²/s.
    pub viscosity: f64,
    /// Vapour pressure in Pa, absolute.
    pub vapour_pressure: f64,
}

/// Pressure of the air at the surface, in Pa.
pub const ATMOSPHERE: f64 = 101_325.0;
/// Standard gravity, in m/s².
pub const GRAVITY: f64 = 9.806_65;

/// Columns of the tables, in °C.
const COLUMNS: [f64; 7] = [0.0, 5.0, 10.0, 15.0, 20.0, 25.0, 30.0];

/// Density in kg/m³, viscosity in 1e-6 m²/s and vapour pressure in kPa, for fresh and sea water:
/// the formulations that ITTC 7.5-02-01-03 (2011) rests on (IAPWS-95, IAPWS R12-08 and the
/// saturation equation of Wagner and Pruss; TEOS-10 and the viscosity ratio of Sharqawy, Lienhard
/// and Zubair 2010), computed at these temperatures.
const TABLES: [[[f64; 7]; 3]; 2] = [
    [
        [999.8431, 999.9666, 999.7025, 999.1026, 998.2072, 997.0476, 995.6495],
        [1.79203, 1.51822, 1.30629, 1.13859, 1.00340, 0.89266, 0.80071],
        [0.61121, 0.87253, 1.22811, 1.70568, 2.33919, 3.16982, 4.24692],
    ],
    [
        [1028.1072, 1027.6756, 1026.9541, 1025.9760, 1024.7660, 1023.3436, 1021.7261],
        [1.85439, 1.57631, 1.36047, 1.18922, 1.05082, 0.93717, 0.84256],
        [0.59992, 0.85634, 1.20526, 1.67387, 2.29551, 3.11056, 4.16747],
    ],
];

impl Water {
    /// Water at a temperature in °C, 0 to 30; `None` outside.
    #[must_use]
    pub fn at(salinity: Salinity, celsius: f64) -> Option<Self> {
        if !(0.0..=30.0).contains(&celsius) {
            return None;
        }
        let [density, viscosity, vapour] = &TABLES[usize::from(salinity == Salinity::Sea)];
        // What falls or grows manifold is interpolated in logarithms.
        let by_logarithm = |table: &[f64; 7]| between(&table.map(f64::ln), celsius).exp();
        Some(Self {
            density: between(density, celsius),
            viscosity: 1e-6 * by_logarithm(viscosity),
            vapour_pressure: 1e3 * by_logarithm(vapour),
        })
    }

    /// Reynolds number by chord in m and speed in m/s.
    #[must_use]
    pub fn reynolds(&self, chord: f64, speed: f64) -> f64 {
        chord * speed / self.viscosity
    }

    /// Cavitation number σ = (p_atm + ρ g h − p_v)/(½ ρ V²) at `depth` in m and `speed` in m/s.
    ///
    /// Where −cp reaches it, the water boils.
    #[must_use]
    pub fn cavitation_number(&self, depth: f64, speed: f64) -> f64 {
        self.head(depth) / (0.5 * self.density * speed * speed)
    }

    /// Speed in m/s from which on water boils at `depth` in m where the pressure coefficient is
    /// `cp_min`; `None` where that is no suction.
    #[must_use]
    pub fn inception_speed(&self, depth: f64, cp_min: f64) -> Option<f64> {
        let square = 2.0 * self.head(depth) / (self.density * -cp_min);
        (cp_min < 0.0 && square > 0.0).then(|| square.sqrt())
    }

    /// Pressure above that of vapour, in Pa.
    fn head(&self, depth: f64) -> f64 {
        ATMOSPHERE + self.density * GRAVITY * depth - self.vapour_pressure
    }
}

/// The cubic through the four columns about a temperature.
fn between(table: &[f64; 7], celsius: f64) -> f64 {
    let first = ((celsius / 5.0) as usize).saturating_sub(1).min(3);
    (first..first + 4)
        .map(|i| {
            let others = (first..first + 4).filter(|&k| k != i);
            let weight: f64 = others.map(|k| (celsius - COLUMNS[k]) / (COLUMNS[i] - COLUMNS[k])).product();
            weight * table[i]
        })
        .sum()
}
