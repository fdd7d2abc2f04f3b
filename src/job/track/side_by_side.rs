//! Lots of each supplier, rig or tag side by side.

use std::collections::BTreeMap;

use super::found::{Charted, Series};
use super::moved::parts;
use super::{TrackError, count, finite};
use crate::drift::{LotPoint, components};
use crate::record::GroupFacts;

/// The groups by `key`, in the order of their values.
pub(super) fn groups(series: &Series, key: Option<&str>) -> Result<Vec<GroupFacts>, TrackError> {
    let Some(key) = key else {
        return Ok(Vec::new());
    };
    let value = |lot: &Charted| match key {
        "supplier" => lot.head.supplier.clone(),
        "rig" => Some(lot.head.rig.clone()),
        tag => lot.head.tags.get(tag).cloned(),
    };
    let mut groups: BTreeMap<Option<String>, Vec<LotPoint>> = BTreeMap::new();
    for lot in &series.lots {
        groups.entry(value(lot)).or_default().push(lot.point);
    }
    if groups.keys().all(Option::is_none) {
        return Err(TrackError::NoTag {
            tag: key.to_owned(),
        });
    }
    groups
        .into_iter()
        .map(|(value, lots)| group(value, &lots))
        .collect()
}

fn group(value: Option<String>, lots: &[LotPoint]) -> Result<GroupFacts, TrackError> {
    let springs: u64 = lots.iter().map(|lot| lot.springs).sum();
    let sum: f64 = lots.iter().map(|lot| lot.springs as f64 * lot.mean).sum();
    let found = components(lots).as_ref().map(parts).transpose()?;
    Ok(GroupFacts {
        value,
        lots: count(lots.len()),
        springs,
        mean: finite(sum / springs as f64, "a mean")?,
        between: found.map(|of| of.between),
        within: found.map(|of| of.within),
    })
}
