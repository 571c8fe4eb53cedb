//! Lists and ranges of numbers on the command line.

/// Most values one list may hold: a slip in the step must not fill the memory.
const MOST: usize = 2001;

/// `FROM:TO:STEP`, both ends included, or a single value.
pub(super) fn range(text: &str) -> Result<Vec<f64>, String> {
    let parts: Vec<f64> = text.split(':').map(number).collect::<Result<_, _>>()?;
    match *parts.as_slice() {
        [single] => Ok(vec![single]),
        [from, to, step] => {
            if step <= 0.0 || to < from {
                return Err("FROM:TO:STEP goes upwards: FROM is the smaller, STEP more than zero".to_owned());
            }
            // The slack takes up the rounding of steps such as 0.1.
            let steps = ((to - from) / step + 1e-9).floor();
            if steps >= MOST as f64 {
                return Err(format!("that is {} values: {MOST} are the most", steps + 1.0));
            }
            Ok((0..=steps as usize).map(|i| from + i as f64 * step).collect())
        }
        _ => Err("write a single value or FROM:TO:STEP, such as -4:10:1".to_owned()),
    }
}

/// Values with commas between them, each more than zero.
pub(super) fn positive_list(text: &str) -> Result<Vec<f64>, String> {
    let values: Vec<f64> = text.split(',').map(number).collect::<Result<_, _>>()?;
    match values.iter().find(|v| **v <= 0.0) {
        Some(bad) => Err(format!("{bad} is not possible: it must be more than zero")),
        None => Ok(values),
    }
}

/// Values with commas between them.
pub(super) fn list(text: &str) -> Result<Vec<f64>, String> {
    text.split(',').map(number).collect()
}

fn number(text: &str) -> Result<f64, String> {
    match text.trim().parse::<f64>() {
        Ok(value) if value.is_finite() => Ok(value),
        _ => Err(format!("'{text}' is not a number")),
    }
}
