//! Reading a published designation such as "NACA 4412".

use super::{MeanLine, Section, SectionError, ThicknessForm, TrailingEdge};

/// Thickness that a designation may ask for, percent of chord.
const THICKNESS_PERCENT: std::ops::RangeInclusive<u32> = 1..=40;

pub(super) fn parse(text: &str, trailing_edge: TrailingEdge) -> Result<Section, SectionError> {
    let unknown = || SectionError::Unknown { text: text.to_owned() };
    let trimmed = text.trim();
    let digits = match trimmed.get(..4) {
        Some(prefix) if prefix.eq_ignore_ascii_case("naca") => trimmed[4..].trim_start(),
        _ if matches!(trimmed.len(), 4 | 5) && trimmed.bytes().all(|byte| byte.is_ascii_digit()) => {
            return Err(SectionError::NoFamily { digits: trimmed.to_owned() });
        }
        _ => return Err(unknown()),
    };
    if digits.is_empty() || !digits.bytes().all(|byte| byte.is_ascii_digit()) {
        return Err(unknown());
    }
    if !(4..=5).contains(&digits.len()) {
        return Err(SectionError::DigitCount { text: text.to_owned(), count: digits.len() });
    }

    let digit: Vec<u8> = digits.bytes().map(|byte| byte - b'0').collect();
    let (line_digits, thickness_digits) = digit.split_at(digit.len() - 2);
    let percent = u32::from(thickness_digits[0]) * 10 + u32::from(thickness_digits[1]);
    if !THICKNESS_PERCENT.contains(&percent) {
        return Err(SectionError::Thickness { text: text.to_owned(), percent });
    }
    let line = match *line_digits {
        [camber, position] => four_digit(text, camber, position)?,
        [lift, position, kind] => five_digit(text, lift, position, kind, percent)?,
        _ => return Err(unknown()),
    };
    let form = ThicknessForm::new(f64::from(percent) / 100.0, trailing_edge);
    Section::new(format!("NACA {digits}"), line, form)
}

fn four_digit(text: &str, camber: u8, position: u8) -> Result<MeanLine, SectionError> {
    match (camber, position) {
        (0, 0) => Ok(MeanLine::Straight),
        (0, _) | (_, 0) => Err(SectionError::CamberPosition { text: text.to_owned(), camber, position }),
        _ => Ok(MeanLine::FourDigit {
            camber: f64::from(camber) / 100.0,
            position: f64::from(position) / 10.0,
        }),
    }
}

fn five_digit(
    text: &str,
    lift: u8,
    position: u8,
    kind: u8,
    thickness: u32,
) -> Result<MeanLine, SectionError> {
    if lift == 0 {
        return Err(SectionError::DesignLift { text: text.to_owned(), thickness });
    }
    if kind > 1 {
        return Err(SectionError::FiveDigitKind { text: text.to_owned(), digit: kind });
    }
    MeanLine::five_digit(f64::from(lift) * 0.15, position, kind == 1)
}
