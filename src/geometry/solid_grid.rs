//! A block with a curved upper side.

use super::{GeometryError, Solid};

impl Solid {
    /// A block that stands on z = 0 under a surface given by rows of corners: x grows along a row, y from
    /// row to row, and z is the height. Every row has as many corners.
    ///
    /// # Errors
    /// When the rows do not run so, or the surface reaches down to the floor.
    pub fn under(rows: &[Vec<[f64; 3]>]) -> Result<Self, GeometryError> {
        let count = rows.first().map_or(0, Vec::len);
        let failed = |why: &str| GeometryError::Triangulation { why: why.to_owned() };
        if rows.len() < 2 || count < 2 || rows.iter().any(|row| row.len() != count) {
            return Err(failed("a surface needs two rows of as many corners at least"));
        }
        // Rounded first, so that what is checked is what is printed.
        let single = |row: &Vec<[f64; 3]>| row.iter().map(|p| p.map(|v| v as f32)).collect::<Vec<_>>();
        let top: Vec<Vec<[f32; 3]>> = rows.iter().map(single).collect();
        let along = top.iter().all(|row| row.windows(2).all(|pair| pair[0][0] < pair[1][0]));
        let across = top.windows(2).all(|pair| (0..count).all(|i| pair[0][i][1] < pair[1][i][1]));
        if !(along && across && top.iter().flatten().all(|p| p[2] > 0.0 && p[2].is_finite())) {
            return Err(failed("the rows of the surface cross, or reach down to the floor"));
        }
        let floor = top.iter().flatten().map(|&[x, y, _]| [x, y, 0.0]);
        let vertices: Vec<[f32; 3]> = top.iter().flatten().copied().chain(floor).collect();
        let below = rows.len() * count;
        let mut facets = Vec::with_capacity(4 * below);
        for j in 0..rows.len() - 1 {
            for i in 0..count - 1 {
                let (a, b) = (j * count + i, j * count + i + 1);
                let (c, d) = (b + count, a + count);
                facets.extend([[a, b, c], [a, c, d]]);
                facets.extend([[a, c, b], [a, d, c]].map(|facet| facet.map(|v| v + below)));
            }
        }
        let mut wall = |a: usize, b: usize| facets.extend([[a + below, b + below, b], [a + below, b, a]]);
        let last = (rows.len() - 1) * count;
        for i in 0..count - 1 {
            wall(i, i + 1);
            wall(last + i + 1, last + i);
        }
        for j in 0..rows.len() - 1 {
            wall((j + 1) * count, j * count);
            wall(j * count + count - 1, (j + 1) * count + count - 1);
        }
        Self::checked(vertices, facets)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_roof_has_the_volume_of_its_prism() {
        // 3 wide, 2 deep, from 1 to 2 high and back.
        let row = |y: f64| vec![[0.0, y, 1.0], [1.5, y, 2.0], [3.0, y, 1.0]];
        let roof = Solid::under(&[row(0.0), row(0.7), row(2.0)]).expect("a roof");
        assert!((roof.volume() - 2.0 * 4.5).abs() < 1e-5, "{}", roof.volume());
        assert_eq!(roof.overhang(), 0.0);
        assert!(Solid::under(&[row(0.0), row(-1.0)]).is_err() && Solid::under(&[row(0.0)]).is_err());
    }
}
