//! Two results held against each other, figure by figure.

use serde::Serialize;
use serde_json::Value;

/// Relative difference up to which figures of two versions of the tool are the same.
pub const ACROSS_VERSIONS: f64 = 1e-9;

/// How close two figures must be.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Closeness {
    /// Bit for bit: one version of the tool.
    Exact,
    /// Within [`ACROSS_VERSIONS`], relative to the larger: two versions.
    AcrossVersions,
}

impl Closeness {
    /// Whether two figures are the same.
    pub fn holds(self, a: f64, b: f64) -> bool {
        match self {
            Self::Exact => a.to_bits() == b.to_bits(),
            Self::AcrossVersions => {
                a.to_bits() == b.to_bits()
                    || (a - b).abs() <= ACROSS_VERSIONS * a.abs().max(b.abs())
            }
        }
    }
}

/// Something that is not as it was stored.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Difference {
    /// Where, e.g. `springs "TG-07" / characteristics "load" at 70 / value`.
    pub place: String,
    /// As stored; `nothing` where it is new.
    pub stored: String,
    /// As it comes out now; `nothing` where it is gone.
    pub recomputed: String,
}

/// Every place where `now` differs from `stored`, in the order of the result; the second figure counts what was compared.
///
/// Across versions a key that only the newer result has is no difference.
pub fn differences(stored: &Value, now: &Value, closeness: Closeness) -> (Vec<Difference>, u64) {
    let mut walk = Walk {
        closeness,
        found: Vec::new(),
        compared: 0,
    };
    walk.values("", stored, now);
    (walk.found, walk.compared)
}

struct Walk {
    closeness: Closeness,
    found: Vec<Difference>,
    compared: u64,
}

impl Walk {
    fn values(&mut self, place: &str, stored: &Value, now: &Value) {
        match (stored, now) {
            (Value::Object(old), Value::Object(new)) => {
                for (key, value) in old {
                    match new.get(key) {
                        Some(other) => self.values(&below(place, key), value, other),
                        None => self.differ(&below(place, key), Some(value), None),
                    }
                }
                for (key, value) in new.iter().filter(|(key, _)| !old.contains_key(*key)) {
                    if self.closeness == Closeness::Exact {
                        self.differ(&below(place, key), None, Some(value));
                    }
                }
            }
            (Value::Array(old), Value::Array(new)) => {
                for number in 0..old.len().max(new.len()) {
                    let (a, b) = (old.get(number), new.get(number));
                    let here = format!("{place}{}", label(number, a.or(b)));
                    match (a, b) {
                        (Some(a), Some(b)) => self.values(&here, a, b),
                        (a, b) => self.differ(&here, a, b),
                    }
                }
            }
            _ => self.leaves(place, stored, now),
        }
    }

    fn leaves(&mut self, place: &str, stored: &Value, now: &Value) {
        self.compared += 1;
        let same = match (stored.as_f64(), now.as_f64()) {
            (Some(a), Some(b)) => self.closeness.holds(a, b),
            _ => stored == now,
        };
        if !same {
            self.differ(place, Some(stored), Some(now));
        }
    }

    fn differ(&mut self, place: &str, stored: Option<&Value>, now: Option<&Value>) {
        let text =
            |value: Option<&Value>| value.map_or_else(|| "nothing".to_owned(), Value::to_string);
        self.found.push(Difference {
            place: place.to_owned(),
            stored: text(stored),
            recomputed: text(now),
        });
    }
}

fn below(place: &str, key: &str) -> String {
    if place.is_empty() {
        key.to_owned()
    } else {
        format!("{place} / {key}")
    }
}

/// An element of a list by what people call it, else by its number from 1.
fn label(number: usize, value: Option<&Value>) -> String {
    let text = |key: &str| {
        value
            .and_then(|value| value.get(key))
            .and_then(Value::as_str)
    };
    let at = value
        .and_then(|value| value.get("at_length_mm"))
        .and_then(Value::as_f64);
    let called = ["id", "name", "source", "path", "class", "code"]
        .into_iter()
        .find_map(text);
    match (called, at) {
        (Some(called), Some(at)) => format!(" \"{called}\" at {at}"),
        (Some(called), None) => format!(" \"{called}\""),
        (None, _) => format!(" {}", number + 1),
    }
}

#[cfg(test)]
mod tests {
    use serde_json::json;

    use super::*;

    #[test]
    fn places_are_called_by_name() {
        let stored = json!({"springs": [{"id": "S-1", "characteristics": [{"name": "load", "at_length_mm": 70.0, "value": 1.5}]}]});
        let now = json!({"springs": [{"id": "S-1", "characteristics": [{"name": "load", "at_length_mm": 70.0, "value": 1.25}]}]});
        let (found, compared) = differences(&stored, &now, Closeness::Exact);
        assert_eq!(compared, 4);
        assert_eq!(
            found,
            [Difference {
                place: "springs \"S-1\" / characteristics \"load\" at 70 / value".to_owned(),
                stored: "1.5".to_owned(),
                recomputed: "1.25".to_owned(),
            }]
        );
    }

    #[test]
    fn one_version_is_held_to_the_bit_and_two_to_nine_digits() {
        let last_bit = f64::from_bits(10.5_f64.to_bits() + 1);
        let pairs = [
            (10.5, last_bit, false, true),
            (10.5, 10.5 * (1.0 + 9e-10), false, true),
            (10.5, 10.5 * (1.0 + 2e-9), false, false),
            (0.0, 1e-300, false, false),
            (-0.0, 0.0, false, true),
        ];
        for (a, b, exact, across) in pairs {
            assert_eq!(Closeness::Exact.holds(a, b), exact, "{a} {b}");
            assert_eq!(Closeness::AcrossVersions.holds(a, b), across, "{a} {b}");
        }
    }

    #[test]
    fn what_is_gone_or_new_is_named() {
        let (stored, now) = (json!({"a": 1, "b": [1, 2]}), json!({"b": [1], "c": null}));
        let count = |closeness| differences(&stored, &now, closeness).0.len();
        assert_eq!(
            (count(Closeness::Exact), count(Closeness::AcrossVersions)),
            (3, 2)
        );
    }

    #[test]
    fn words_and_nulls_differ_in_any_version() {
        let (stored, now) = (
            json!({"v": "conforms", "u": null}),
            json!({"v": "fails", "u": 0.1}),
        );
        assert_eq!(
            differences(&stored, &now, Closeness::AcrossVersions)
                .0
                .len(),
            2
        );
    }
}
