//! A page for the browser: one file, nothing fetched, prints on paper.

use std::fmt::Write as _;

/// Text with the characters that mean something to HTML and SVG made harmless.
#[must_use]
pub fn escaped(text: &str) -> String {
    text.replace('&', "&amp;").replace('<', "&lt;").replace('>', "&gt;").replace('"', "&quot;")
}

/// A table: heading and rows of plain text; rows for which `marked` holds stand out.
#[must_use]
pub fn table<const COLUMNS: usize>(
    heading: [&str; COLUMNS],
    rows: &[[String; COLUMNS]],
    marked: impl Fn(&[String; COLUMNS]) -> bool,
) -> String {
    let mut html = String::from("<table><thead><tr>");
    for cell in heading {
        let _ = write!(html, "<th>{}</th>", escaped(cell));
    }
    html.push_str("</tr></thead><tbody>");
    for row in rows {
        html.push_str(if marked(row) { "<tr class=\"marked\">" } else { "<tr>" });
        for cell in row {
            let _ = write!(html, "<td>{}</td>", escaped(cell));
        }
        html.push_str("</tr>");
    }
    html.push_str("</tbody></table>\n");
    html
}

/// A complete document round a `body` that is HTML already.
#[must_use]
pub fn document(title: &str, body: &str) -> String {
    const STYLE: &str = "
body { font: 16px/1.5 'DejaVu Sans', Verdana, sans-serif; max-width: 62rem; margin: 2rem auto; padding: 0 1rem; color: #111; background: #fff }
h1 { margin-bottom: 0 } h2 { margin-top: 2.5rem; border-bottom: 2px solid #111 }
table { border-collapse: collapse; margin: 1rem 0; display: block; overflow-x: auto } th, td { border: 1px solid #777; padding: .3rem .6rem; text-align: left }
th { background: #eee } .good::before { content: '\\2714  ' } .bad { font-weight: bold } .bad::before { content: '\\2718  ' }
.caution { border: 3px solid #111; padding: .5rem 1rem } figure { margin: 1.5rem 0 } figcaption { font-size: 14px }
code { font-size: 15px } .small { display: flex; flex-wrap: wrap; gap: 1rem } .small figure { margin: 0; width: 15rem } svg { max-width: 100%; height: auto } tr.marked { background: #ddd; font-weight: bold }
@media print {
  body { margin: 0; padding: 0; font-size: 11pt } h2 { break-after: avoid } figure, tr { break-inside: avoid }
  table { display: table; width: 100%; font-size: 8.5pt; overflow-wrap: break-word } th, td { padding: .15rem .3rem }
  svg { max-height: 22cm } .small figure { width: 57mm }
}
";
    format!(
        "<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n<meta name=\"viewport\" \
         content=\"width=device-width\">\n<title>{}</title>\n<style>{STYLE}</style>\n</head>\n<body>\n{body}</body>\n</html>\n",
        escaped(title)
    )
}
