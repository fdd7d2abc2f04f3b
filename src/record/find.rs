//! Finding a characteristic in a record.

use super::accept::AcceptRecord;
use super::spring::{CharacteristicResult, SpringResult};
use crate::quantity::Unit;
use crate::units::Millimetres;

/// A characteristic as a key: its name and the length of a load.
pub type Key = (String, Option<Millimetres>);

/// Every characteristic that has a value or a verdict on some spring, in the order of the drawing.
pub fn occurring(record: &AcceptRecord) -> Vec<(Key, Unit)> {
    let mut keys: Vec<(Key, Unit)> = Vec::new();
    for of in record
        .springs
        .iter()
        .flat_map(|spring| &spring.characteristics)
    {
        let key = (of.name.clone(), of.at_length_mm);
        let says = of.value.is_some() || of.verdict.is_some();
        if says && !keys.iter().any(|(known, _)| *known == key) {
            keys.push((key, of.unit));
        }
    }
    keys
}

/// A spring's characteristic of that name.
pub fn find<'a>(spring: &'a SpringResult, key: &Key) -> Option<&'a CharacteristicResult> {
    spring
        .characteristics
        .iter()
        .find(|of| of.name == key.0 && of.at_length_mm == key.1)
}
