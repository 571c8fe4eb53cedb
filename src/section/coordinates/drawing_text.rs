//! What of a DXF file concerns an outline, checked and written anew.
//!
//! A drawing holds much that is no outline, and may be cut off or mangled. Only the units and the
//! curves go on to the reader, each group with a value that is what its code promises: so the
//! reader never meets what it was not made for. Group codes are those of the published DXF
//! reference.

use super::CoordinateError;
use crate::units::clipped;

/// The largest drawing that is read, in bytes.
pub const LARGEST_DRAWING: usize = 10_000_000;

/// The most kinds of objects that are named; a mangled file could hold any number.
const MOST_KINDS: usize = 20;

/// A drawing cut down to its curves.
pub(super) struct Cleaned {
    /// A drawing of its own.
    pub(super) text: String,
    /// Objects that were passed over, by kind and number.
    pub(super) passed_over: Vec<(String, usize)>,
}

/// One group: its line, code and value.
#[derive(Clone, Copy)]
struct Group<'a> {
    line: usize,
    code: i32,
    value: &'a str,
}

pub(super) fn clean(bytes: &[u8]) -> Result<Cleaned, CoordinateError> {
    if bytes.len() > LARGEST_DRAWING {
        return Err(CoordinateError::TooLong { most: LARGEST_DRAWING });
    }
    if bytes.iter().take(200).any(|byte| *byte == 0) {
        let why = "this is not a DXF in text form: save the drawing as an ASCII DXF".to_owned();
        return Err(CoordinateError::Form { why });
    }
    let text = String::from_utf8_lossy(bytes);
    let groups = groups(&text)?;
    let mut writer = Writer::default();
    writer.start(units(&groups));
    let entities = section(&groups, "ENTITIES");
    let Some(entities) = entities else {
        let why = "the drawing has no ENTITIES section: it holds no objects".to_owned();
        return Err(CoordinateError::Form { why });
    };
    let mut passed_over: Vec<(String, usize)> = Vec::new();
    let mut in_polyline = false;
    for object in entities.chunk_by(|_, next| next.code != 0) {
        let Some((head, body)) = object.split_first() else { continue };
        let in_paper = body.iter().any(|group| group.code == 67 && group.value == "1");
        let part = matches!(head.value, "VERTEX" | "SEQEND");
        if in_polyline && head.value == "VERTEX" {
            writer.object(*head, body)?;
            continue;
        }
        if in_polyline {
            writer.pair(0, "SEQEND");
            in_polyline = false;
        }
        match head.value {
            _ if in_paper || part => {}
            "LINE" | "ARC" | "LWPOLYLINE" | "SPLINE" => writer.object(*head, body)?,
            "POLYLINE" => {
                writer.object(*head, body)?;
                in_polyline = true;
            }
            other => {
                let kind = clipped(other);
                if let Some((_, count)) = passed_over.iter_mut().find(|(known, _)| *known == kind) {
                    *count += 1;
                } else if passed_over.len() < MOST_KINDS {
                    passed_over.push((kind, 1));
                }
            }
        }
    }
    if in_polyline {
        writer.pair(0, "SEQEND");
    }
    writer.pair(0, "ENDSEC");
    writer.pair(0, "EOF");
    Ok(Cleaned { text: writer.text, passed_over })
}

/// The groups of a file: a line with a code, a line with a value, and so on.
fn groups(text: &str) -> Result<Vec<Group<'_>>, CoordinateError> {
    let mut groups = Vec::new();
    let mut lines = text.trim_start_matches('\u{feff}').lines().enumerate();
    while let Some((i, code)) = lines.next() {
        if code.trim().is_empty() && text.lines().nth(i + 1).is_none() {
            break;
        }
        let wrong = |why: &str| CoordinateError::Drawing { line: i + 1, why: why.to_owned() };
        let Ok(code) = code.trim().parse::<i32>() else {
            return Err(wrong("a group code was expected, a whole number: is this a DXF file?"));
        };
        let Some((_, value)) = lines.next() else {
            return Err(wrong("the file breaks off after this line: save the drawing again"));
        };
        let group = Group { line: i + 2, code, value: value.trim() };
        if (group.code, group.value) == (0, "EOF") {
            break;
        }
        groups.push(group);
    }
    Ok(groups)
}

/// The groups of a section, without its first and last.
fn section<'a, 'b>(groups: &'b [Group<'a>], name: &str) -> Option<&'b [Group<'a>]> {
    let is = |group: &Group<'_>, code, value| (group.code, group.value) == (code, value);
    let start = groups.windows(2).position(|pair| is(&pair[0], 0, "SECTION") && is(&pair[1], 2, name))? + 2;
    let rest = groups.get(start..)?;
    let length = rest.iter().position(|group| is(group, 0, "ENDSEC")).unwrap_or(rest.len());
    rest.get(..length)
}

/// The number of the unit in the header; nought where there is none.
fn units(groups: &[Group<'_>]) -> i16 {
    let header = section(groups, "HEADER").unwrap_or_default();
    let named = header.windows(2).find(|pair| pair[0].code == 9 && pair[0].value == "$INSUNITS");
    let number = named.and_then(|pair| pair[1].value.parse().ok()).unwrap_or(0);
    if (0..=24).contains(&number) { number } else { 0 }
}

#[derive(Default)]
struct Writer {
    text: String,
}

impl Writer {
    fn pair(&mut self, code: i32, value: impl std::fmt::Display) {
        self.text.push_str(&format!("{code}\n{value}\n"));
    }

    fn start(&mut self, units: i16) {
        self.pair(0, "SECTION");
        self.pair(2, "HEADER");
        self.pair(9, "$ACADVER");
        self.pair(1, "AC1015");
        self.pair(9, "$INSUNITS");
        self.pair(70, units);
        self.pair(0, "ENDSEC");
        self.pair(0, "SECTION");
        self.pair(2, "ENTITIES");
    }

    /// Writes the groups of an object that describe its shape.
    fn object(&mut self, head: Group<'_>, body: &[Group<'_>]) -> Result<(), CoordinateError> {
        self.pair(0, head.value);
        let splines = head.value == "SPLINE";
        // Places come in pairs of groups, and go on in threes.
        let mut waiting: Option<(i32, f64)> = None;
        for group in body {
            match group.code {
                5 if group.value.len() <= 16 && group.value.bytes().all(|byte| byte.is_ascii_hexdigit()) => {
                    self.pair(5, group.value);
                }
                8 => {
                    let layer: String =
                        clipped(group.value).chars().filter(|c| *c != '^' && *c != '\\').collect();
                    self.pair(8, layer);
                }
                10 | 11 => waiting = Some((group.code, real(group)?)),
                20 | 21 => {
                    let y = real(group)?;
                    let Some((code, x)) = waiting.take().filter(|(code, _)| code + 10 == group.code) else {
                        return Err(wrong(group, "a y stands here without its x"));
                    };
                    self.real(code, x);
                    self.real(code + 10, y);
                    if head.value != "LWPOLYLINE" {
                        self.real(code + 20, 0.0);
                    }
                }
                // Knots and weights of a spline, bulges, radius and angles, normal.
                40 | 41 if splines => self.real(group.code, real(group)?),
                40 | 50 | 51 if head.value == "ARC" => self.real(group.code, real(group)?),
                42 if !splines => self.real(42, real(group)?),
                210 | 220 | 230 if head.value != "VERTEX" => self.real(group.code, real(group)?),
                70 => self.pair(70, whole(group)?),
                71 if splines => self.pair(71, whole(group)?),
                _ => {}
            }
        }
        if waiting.is_some() {
            return Err(wrong(&head, "an x in this object has no y"));
        }
        Ok(())
    }

    fn real(&mut self, code: i32, value: f64) {
        self.pair(code, format_args!("{value:?}"));
    }
}

fn wrong(group: &Group<'_>, why: &str) -> CoordinateError {
    CoordinateError::Drawing { line: group.line, why: why.to_owned() }
}

fn real(group: &Group<'_>) -> Result<f64, CoordinateError> {
    let value = group.value.parse::<f64>().ok().filter(|value| value.abs() < 1e12);
    value.ok_or_else(|| wrong(group, "a number was expected, finite and below 1e12"))
}

fn whole(group: &Group<'_>) -> Result<i16, CoordinateError> {
    group.value.parse::<i16>().map_err(|_| wrong(group, "a whole number was expected"))
}
