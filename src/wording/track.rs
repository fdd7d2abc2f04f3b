//! Words for a characteristic over lots.

use super::figure::{Place, number, with_unit};
use super::{count, sentence};
use crate::record::{ChartKind, Culprit, Rule, StepFacts, TrackCaution, TrackRecord, Unclear};
use crate::units::{Finite, System};

/// A chart's name.
pub(crate) const fn chart(of: ChartKind) -> &'static str {
    match of {
        ChartKind::Mean => "means",
        ChartKind::Spread => "standard deviations",
        ChartKind::Ewma => "EWMA",
        ChartKind::Cusum => "CUSUM",
    }
}

/// A rule in words.
pub(crate) const fn rule(of: Rule) -> &'static str {
    match of {
        Rule::Beyond => "a point beyond a limit",
        Rule::NineOneSide => "nine in a row on one side",
        Rule::SixSteady => "six in a row steadily up or down",
        Rule::FourteenAlternating => "fourteen in a row up and down by turns",
        Rule::TwoOfThree => "two of three beyond 2σ on one side",
        Rule::FourOfFive => "four of five beyond 1σ on one side",
        Rule::FifteenWithin => "fifteen in a row within 1σ",
        Rule::EightBeyondOne => "eight in a row beyond 1σ",
    }
}

/// Whose a shift is, in words.
pub(crate) const fn culprit(of: Culprit) -> &'static str {
    match of {
        Culprit::Rig => "the rig: the reference spring moved with the lots",
        Culprit::Springs => "the springs: the reference spring did not move with them",
        Culprit::CannotBeTold(why) => match why {
            Unclear::NoChecks => "springs or rig, cannot be told: no checks on a reference spring",
            Unclear::TooFew => {
                "springs or rig, cannot be told: fewer than 3 checks before or 5 after"
            }
            Unclear::SeveralRigs => {
                "springs or rig, cannot be told: the lots of one side were measured on several rigs"
            }
            Unclear::TooUncertain => {
                "springs or rig, cannot be told: the checks scatter too much to show half the shift"
            }
        },
    }
}

/// A change point in a sentence.
pub(crate) fn step(of: &StepFacts, record: &TrackRecord, show_in: System) -> String {
    let value = |value: Finite| with_unit(Some(value), record.unit, Place::Significant(5), show_in);
    let name = |at: u32| {
        record
            .lots
            .get(at as usize)
            .map_or("", |lot| lot.lot.as_str())
    };
    let percent = 100.0 * of.jump.get() / of.before.get();
    let mut text = format!(
        "It moved from {} to {} ({}{} %) between lot {} and lot {} (95 %: first lot {} to {}). Whose: {}.",
        value(of.before),
        value(of.after),
        if percent > 0.0 { "+" } else { "−" },
        number(Some(percent.abs()), 2),
        of.lot_before,
        of.lot_after,
        name(of.from),
        name(of.to),
        culprit(of.culprit)
    );
    if !of.changed_with.is_empty() {
        text = format!("{text} With it changed {}.", of.changed_with.join("; "));
    }
    text
}

/// How fast, in a sentence.
pub(crate) fn trend(record: &TrackRecord, show_in: System) -> Option<String> {
    let of = record.trend.as_ref()?;
    let value = |value: Finite| with_unit(Some(value), record.unit, Place::Significant(2), show_in);
    let moves = if of.moves {
        "moves by"
    } else {
        "shows no trend:"
    };
    let mut text = format!(
        "Over all lots it {moves} {} per lot (95 %: {} to {}; p {})",
        value(of.slope_per_lot),
        value(of.lower),
        value(of.upper),
        chance(Some(of.p))
    );
    if of.moves && !record.steps.is_empty() {
        text.push_str(", its jumps counted in");
    }
    match &of.crossing {
        Some(at) => {
            let latest = at
                .latest
                .map_or("never".to_owned(), |lots| number(Some(lots), 2));
            text = format!(
                "{text}; at that pace it crosses {} after {} lots (95 %: {} to {latest})",
                with_unit(Some(at.limit), record.unit, Place::Stated, show_in),
                number(Some(at.lots), 2),
                number(Some(at.earliest), 2)
            );
        }
        None if of.moves => text.push_str("; it moves towards no limit"),
        None => {}
    }
    text.push('.');
    Some(text)
}

/// A chance; below a ten-thousandth its digits say nothing.
pub(crate) fn chance(p: Option<Finite>) -> String {
    match p {
        Some(p) if p.get() < 1e-4 => "below 0.0001".to_owned(),
        _ => number(p, 2),
    }
}

/// A caution in a sentence.
pub(crate) fn tracked(of: &TrackCaution) -> String {
    let text = match of {
        TrackCaution::FewBaselineLots { lots, short, long } => format!(
            "limits from {} are uncertain: one false alarm of the chart of means in 370 lots may truly be one in {} to {} (80 % of such baselines)",
            count(*lots, "lot"),
            number(Some(*short), 2),
            number(Some(*long), 2)
        ),
        TrackCaution::BaselineFires { lots } => format!(
            "rules fire on {} of the baseline itself: limits from it may be too wide, name a quiet one with --baseline",
            count(*lots, "lot")
        ),
        TrackCaution::SizesDiffer { fewest, most } => format!(
            "the lots have {fewest} to {most} springs with a value; the chart of means takes their means as equally certain"
        ),
        TrackCaution::SeveralRigs { rigs } => format!(
            "the lots were measured on {}: differences across rigs hold what each rig has of its own",
            count(*rigs, "rig")
        ),
        TrackCaution::LotsWithout { lots } => format!(
            "{} without a value of it: in no chart and no figure",
            count(*lots, "lot")
        ),
        TrackCaution::LimitsChanged => {
            "the drawing's limits changed over the lots; those of the newest lot are shown"
                .to_owned()
        }
    };
    sentence(&text) + "."
}
