//! `pack.json`: what the pack holds.

use serde::{Deserialize, Serialize};
use sha2::{Digest, Sha256};

use super::PackFile;

/// Name of the manifest inside its pack.
pub(super) const FILE_NAME: &str = "pack.json";

/// What a pack holds and whether its checks passed.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct Manifest {
    /// Name of the design.
    pub design: String,
    /// Its fingerprint.
    pub fingerprint: String,
    /// Whether every check passed.
    pub passed: bool,
    /// The pack's folder. In the manifest on disk it is ".", the folder the manifest lies in, so
    /// that a pack can be moved and is the same wherever it was built.
    pub out: String,
    /// Its files, but for the manifest itself.
    pub files: Vec<Entry>,
}

/// One file of a pack.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct Entry {
    /// Place inside the pack.
    pub path: String,
    /// Format.
    pub kind: String,
    /// What it is for.
    pub role: String,
    /// Distance from the root of the station it belongs to, mm.
    pub station_mm: Option<f64>,
    /// SHA-256 of its contents, in hex.
    pub sha256: String,
}

impl From<&PackFile> for Entry {
    fn from(file: &PackFile) -> Self {
        Self {
            path: file.path.clone(),
            kind: file.kind.to_owned(),
            role: file.role.to_owned(),
            station_mm: file.station_mm,
            sha256: sha256(&file.bytes),
        }
    }
}

pub(super) fn sha256(bytes: &[u8]) -> String {
    use std::fmt::Write as _;
    Sha256::digest(bytes).iter().fold(String::with_capacity(64), |mut hex, byte| {
        let _ = write!(hex, "{byte:02x}");
        hex
    })
}
