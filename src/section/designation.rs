//! Reading a published designation such as "NACA 4412", "NACA 0012-34" or "NACA 16-209".

use super::{MeanLine, Section, SectionError, ThicknessForm, TrailingEdge, UniformLoad};

/// Thickness that a designation may ask for, percent of chord.
const THICKNESS_PERCENT: std::ops::RangeInclusive<u32> = 1..=40;

pub(super) fn parse(text: &str, trailing_edge: TrailingEdge) -> Result<Section, SectionError> {
    let unknown = || SectionError::Unknown { text: text.to_owned() };
    let trimmed = text.trim();
    let words = match trimmed.get(..4) {
        Some(prefix) if prefix.eq_ignore_ascii_case("naca") => trimmed[4..].trim_start(),
        _ if matches!(trimmed.len(), 4 | 5) && trimmed.bytes().all(|byte| byte.is_ascii_digit()) => {
            return Err(SectionError::NoFamily { digits: trimmed.to_owned() });
        }
        _ => return Err(unknown()),
    };
    let reading = Reading { text, trailing_edge };
    match words.split_once('-') {
        Some(("16", rest)) => reading.series_16(rest),
        Some((main, nose_and_position)) => {
            reading.numbered(digits(main).ok_or_else(unknown)?, Some(nose_and_position))
        }
        None => reading.numbered(digits(words).ok_or_else(unknown)?, None),
    }
}

/// The digits of a text that is nothing else.
fn digits(text: &str) -> Option<Vec<u8>> {
    let all = !text.is_empty() && text.bytes().all(|byte| byte.is_ascii_digit());
    all.then(|| text.bytes().map(|byte| byte - b'0').collect())
}

struct Reading<'a> {
    text: &'a str,
    trailing_edge: TrailingEdge,
}

impl Reading<'_> {
    /// Four or five digits, and after a dash the two that modify the thickness form.
    fn numbered(&self, digit: Vec<u8>, modifier: Option<&str>) -> Result<Section, SectionError> {
        let text = || self.text.to_owned();
        if !(4..=5).contains(&digit.len()) {
            return Err(SectionError::DigitCount { text: text(), count: digit.len() });
        }
        let (line_digits, thickness_digits) = digit.split_at(digit.len() - 2);
        let percent = self.percent(thickness_digits)?;
        let line = match *line_digits {
            [camber, position] => self.four_digit(camber, position)?,
            [lift, position, kind] => self.five_digit(lift, position, kind, percent)?,
            _ => return Err(SectionError::Unknown { text: text() }),
        };
        let thickness = f64::from(percent) / 100.0;
        let name: String = digit.iter().map(|d| char::from(d + b'0')).collect();
        let Some(modifier) = modifier else {
            let form = ThicknessForm::four_digit(thickness, self.trailing_edge);
            return Section::new(format!("NACA {name}"), line, form);
        };
        let form = match digits(modifier).as_deref() {
            Some([nose, position]) => ThicknessForm::modified(
                thickness,
                f64::from(*nose),
                f64::from(*position) / 10.0,
                self.trailing_edge,
            ),
            _ => None,
        };
        let form =
            form.ok_or_else(|| SectionError::Modifier { text: text(), modifier: modifier.to_owned() })?;
        Section::new(format!("NACA {name}-{modifier}"), line, form)
    }

    /// The 16-series: design lift in tenths, thickness in percent; the a = 1 mean line unless
    /// another is named, as in "NACA 16-209, a = 0.8".
    ///
    /// Sources: Stack, NACA Report 763 (1943); Lindsey, Stevenson and Daley, NACA TN 1546 (1948).
    fn series_16(&self, rest: &str) -> Result<Section, SectionError> {
        let wrong = || SectionError::Series16 { text: self.text.to_owned() };
        let (number, line) = match rest.find(|c: char| !c.is_ascii_digit()) {
            Some(end) => rest.split_at(end),
            None => (rest, ""),
        };
        let digit = digits(number).filter(|digit| digit.len() == 3).ok_or_else(wrong)?;
        let percent = self.percent(&digit[1..])?;
        let a: f64 = match line.trim_start_matches([',', ' ']).strip_prefix('a') {
            Some(value) => value.trim_matches([' ', '=']).parse().map_err(|_| wrong())?,
            None if line.trim().is_empty() => 1.0,
            None => return Err(wrong()),
        };
        let line = match digit[0] {
            0 => MeanLine::Straight,
            tenths => {
                UniformLoad::new(a, f64::from(tenths) / 10.0).map(MeanLine::UniformLoad).ok_or_else(wrong)?
            }
        };
        // The thickness form is the modified one with nose index 4 and position 5.
        let form = ThicknessForm::modified(f64::from(percent) / 100.0, 4.0, 0.5, self.trailing_edge)
            .ok_or_else(wrong)?;
        let suffix = if a == 1.0 { String::new() } else { format!(", a = {a}") };
        Section::new(format!("NACA 16-{number}{suffix}"), line, form)
    }

    fn percent(&self, digits: &[u8]) -> Result<u32, SectionError> {
        let percent = digits.iter().fold(0, |sum, digit| 10 * sum + u32::from(*digit));
        if THICKNESS_PERCENT.contains(&percent) {
            Ok(percent)
        } else {
            Err(SectionError::Thickness { text: self.text.to_owned(), percent })
        }
    }

    fn four_digit(&self, camber: u8, position: u8) -> Result<MeanLine, SectionError> {
        match (camber, position) {
            (0, 0) => Ok(MeanLine::Straight),
            (0, _) | (_, 0) => {
                Err(SectionError::CamberPosition { text: self.text.to_owned(), camber, position })
            }
            _ => Ok(MeanLine::FourDigit {
                camber: f64::from(camber) / 100.0,
                position: f64::from(position) / 10.0,
            }),
        }
    }

    fn five_digit(&self, lift: u8, position: u8, kind: u8, thickness: u32) -> Result<MeanLine, SectionError> {
        let text = || self.text.to_owned();
        if lift == 0 {
            return Err(SectionError::DesignLift { text: text(), thickness });
        }
        if kind > 1 {
            return Err(SectionError::FiveDigitKind { text: text(), digit: kind });
        }
        MeanLine::five_digit(f64::from(lift) * 0.15, position, kind == 1)
    }
}
