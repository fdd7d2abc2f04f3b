//! Words for stresses held against what the wire bears.

use super::{Place, length, number, with_unit};
use crate::quantity::Unit;
use crate::record::{DrawingFinding, Permissible, StressPlace};
use crate::units::{Megapascals, System};

fn mpa(value: Megapascals, show_in: System) -> String {
    with_unit(
        Some(value),
        Unit::Megapascal,
        Place::Significant(4),
        show_in,
    )
}

pub(super) fn about_strength(of: &DrawingFinding, show_in: System) -> String {
    match of {
        DrawingFinding::StressAbove {
            member,
            place,
            rule,
            stress_mpa,
            limit_mpa,
        } => format!(
            "{member}, {}: the {} of {} is above {} ({}). Theory; the spring may set.",
            stress_place(*place, show_in),
            stress_taken(*rule),
            mpa(*stress_mpa, show_in),
            mpa(*limit_mpa, show_in),
            stress_limit(*rule)
        ),
        DrawingFinding::FatigueBelowOne { member, margin } => format!(
            "{member}: the fatigue margin for infinite life is {} by Goodman’s line with Zimmerli’s data, below 1. Theory.",
            number(Some(*margin), 3)
        ),
        _ => String::new(),
    }
}

/// Where a stress is taken.
pub(crate) fn stress_place(place: StressPlace, show_in: System) -> String {
    match place {
        StressPlace::TestLength { at_length_mm } => {
            format!("at {}", length(Some(at_length_mm), show_in))
        }
        StressPlace::Service { load_n } => format!(
            "at the service load {}",
            with_unit(Some(load_n), Unit::Newton, Place::Stated, show_in)
        ),
        StressPlace::Solid => "at solid".to_owned(),
    }
}

/// Which stress a rule takes.
pub(crate) const fn stress_taken(rule: Permissible) -> &'static str {
    match rule {
        Permissible::EnUncorrected => "stress without correction",
        Permissible::TextbookDynamicFactor => "stress with the curvature factor (τ dynamic)",
        Permissible::TextbookSetRemoved => "stress with the direct-shear factor (τ static)",
    }
}

/// Which limit a rule sets.
pub(crate) const fn stress_limit(rule: Permissible) -> &'static str {
    match rule {
        Permissible::EnUncorrected => {
            "0.56 Rm for wire coiled cold, EN 13906-1, 10.1.1 and 10.2; the share from memory"
        }
        Permissible::TextbookDynamicFactor => {
            "a share of Rm for springs whose set is not removed, Shigley’s table 10-6"
        }
        Permissible::TextbookSetRemoved => {
            "a share of Rm for springs whose set is removed, Shigley’s table 10-6, from memory"
        }
    }
}

/// A rule in short, for a table.
pub(crate) const fn stress_rule(rule: Permissible) -> &'static str {
    match rule {
        Permissible::EnUncorrected => "EN: τ",
        Permissible::TextbookDynamicFactor => "textbook: τ dynamic",
        Permissible::TextbookSetRemoved => "textbook: τ static",
    }
}
