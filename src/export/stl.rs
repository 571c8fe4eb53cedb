//! Solids for printers: binary STL, millimetres.

use stl_io::{Normal, Triangle, Vertex};

use super::ExportError;
use crate::geometry::Solid;

/// Bytes at the start of a binary STL file that readers skip.
const HEADER: usize = 80;

/// The solid as a binary STL file. `title` goes into its header, cut to 80 bytes of ASCII.
///
/// # Errors
/// When the library cannot write to memory.
pub fn stl(solid: &Solid, title: &str) -> Result<Vec<u8>, ExportError> {
    let facets = solid
        .triangles()
        .map(|corners| Triangle { normal: Normal::new(facing(corners)), vertices: corners.map(Vertex::new) });
    let mut bytes = Vec::with_capacity(HEADER + 4 + 50 * facets.len());
    stl_io::write_stl(&mut bytes, facets)
        .map_err(|error| ExportError { format: "STL", why: error.to_string() })?;
    // A header that starts with "solid" would be taken for the text form of the format.
    let title = format!("mm; {title}");
    for (slot, letter) in bytes[..HEADER].iter_mut().zip(title.chars()) {
        *slot = if letter.is_ascii_graphic() { letter as u8 } else { b' ' };
    }
    Ok(bytes)
}

/// Unit normal by the right-hand rule.
fn facing(corners: [[f32; 3]; 3]) -> [f32; 3] {
    let [a, b, c] = corners.map(|p| p.map(f64::from));
    let edge = |to: [f64; 3]| [to[0] - a[0], to[1] - a[1], to[2] - a[2]];
    let (u, v) = (edge(b), edge(c));
    let normal = [u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]];
    let length = normal.iter().map(|n| n * n).sum::<f64>().sqrt();
    normal.map(|n| (n / length) as f32)
}
