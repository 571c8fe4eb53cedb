//! A stand-in for a hollow section.

use plankform::strength::{CoreElastic, Provenance};

/// A core that weighs and carries next to nothing.
pub(crate) fn air() -> CoreElastic {
    CoreElastic {
        name: "air".to_owned(),
        provenance: Provenance::Tested,
        along_span: 1e-9,
        across: 1e-9,
        g: 1e-9,
        shear: 1.0,
        compression: 1.0,
        density: 1e-9,
    }
}
