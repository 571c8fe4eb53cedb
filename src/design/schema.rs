//! The JSON Schema of the design file, for editors that check and complete it while it is written.

use serde_json::{Map, Value, json};

use super::keys::{Key, Otherwise, ROOT, TABLES, Table, Takes, Times};
use crate::units::{ANGLE, LENGTH};

/// The JSON Schema (draft 7) of the design file, with descriptions, defaults and examples.
///
/// It says all that can be said of one value by itself; bounds of quantities stand in the
/// descriptions, since they are text, and what must agree between values only the reader checks.
#[must_use]
pub fn schema() -> Value {
    let tables = || TABLES.into_iter().filter(|table| !table.name.is_empty());
    let of_tables = tables().map(|table| (table.name.to_owned(), of_table(table)));
    let required = tables().filter(|table| table.required()).map(|table| table.name);
    let mut whole = Map::new();
    whole.insert("$schema".into(), json!("http://json-schema.org/draft-07/schema#"));
    whole.insert("title".into(), json!("Plankform design file"));
    whole.extend(object(&ROOT, of_tables, required));
    Value::Object(whole)
}

fn of_table(table: &'static Table) -> Value {
    let one = object(table, std::iter::empty(), std::iter::empty());
    match table.times {
        Times::Many(least, most) => json!({
            "description": table.doc,
            "type": "array",
            "minItems": least,
            "maxItems": most,
            "items": one,
        }),
        _ => Value::Object(one),
    }
}

/// The schema of a table with its keys, and with what else stands in it.
fn object(
    table: &'static Table,
    others: impl Iterator<Item = (String, Value)>,
    others_required: impl Iterator<Item = &'static str>,
) -> Map<String, Value> {
    let needed = table.keys.iter().filter(|key| matches!(key.otherwise, Otherwise::Required));
    let required: Vec<&str> = needed.map(|key| key.name).chain(others_required).collect();
    let keys = table.keys.iter().map(|key| (key.name.to_owned(), Value::Object(of_key(key))));
    let properties: Map<String, Value> = keys.chain(others).collect();
    let mut object = Map::new();
    object.insert("description".into(), json!(table.doc));
    object.insert("type".into(), json!("object"));
    object.insert("additionalProperties".into(), json!(false));
    if !required.is_empty() {
        object.insert("required".into(), json!(required));
    }
    object.insert("properties".into(), Value::Object(properties));
    object
}

fn of_key(key: &Key) -> Map<String, Value> {
    let constraint = match key.takes {
        Takes::Name => json!({ "type": "string", "pattern": "^[A-Za-z0-9][A-Za-z0-9 _-]{0,59}$" }),
        Takes::Text(most) => json!({ "type": "string", "maxLength": most }),
        Takes::Word(words) => json!({ "type": "string", "enum": words }),
        Takes::WordOrLength(words, ..) => json!({ "anyOf": [
            { "type": "string", "enum": words },
            { "type": "string", "pattern": LENGTH.pattern() },
        ] }),
        Takes::NumberOrLength([least, most], _) => json!({ "anyOf": [
            { "type": "number", "minimum": least, "maximum": most },
            { "type": "string", "pattern": LENGTH.pattern() },
        ] }),
        Takes::Length(..) => json!({ "type": "string", "pattern": LENGTH.pattern() }),
        Takes::Amount(quantity, ..) => json!({ "type": "string", "pattern": quantity.pattern() }),
        Takes::Angle(..) => json!({ "type": "string", "pattern": ANGLE.pattern() }),
        Takes::Number(least, most) => json!({ "type": "number", "minimum": least, "maximum": most }),
        Takes::Lengths(most, ..) => json!({
            "type": "array",
            "minItems": 1,
            "maxItems": most,
            "items": { "type": "string", "pattern": LENGTH.pattern() },
        }),
    };
    let mut schema = Map::new();
    schema.insert("description".into(), json!(format!("{} Takes {}.", key.doc, key.takes.describe())));
    schema.extend(constraint.as_object().cloned().unwrap_or_default());
    if let Otherwise::Default(text) = key.otherwise {
        schema.insert("default".into(), as_json(key, text));
    }
    schema.insert("examples".into(), json!([as_json(key, key.example)]));
    schema
}

/// A value of the registry as JSON writes it.
fn as_json(key: &Key, text: &str) -> Value {
    match key.takes {
        Takes::Number(..) | Takes::NumberOrLength(..) => {
            text.parse::<f64>().map_or_else(|_| json!(text), |number| json!(number))
        }
        Takes::Lengths(..) => text.split(", ").collect(),
        _ => json!(text),
    }
}
