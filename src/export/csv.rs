//! Tables as comma-separated values, after RFC 4180.

use super::ExportError;

/// A table from its heading and rows.
///
/// # Errors
/// When a row has another length than the heading.
pub fn csv<const COLUMNS: usize>(
    heading: [&str; COLUMNS],
    rows: impl IntoIterator<Item = [String; COLUMNS]>,
) -> Result<String, ExportError> {
    let failed = |why: String| ExportError { format: "CSV", why };
    let mut writer = ::csv::Writer::from_writer(Vec::new());
    writer.write_record(heading).map_err(|e| failed(e.to_string()))?;
    for row in rows {
        writer.write_record(row).map_err(|e| failed(e.to_string()))?;
    }
    let bytes = writer.into_inner().map_err(|e| failed(e.to_string()))?;
    String::from_utf8(bytes).map_err(|e| failed(e.to_string()))
}
