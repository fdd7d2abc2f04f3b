//! The decision by variables on one characteristic: raw values, uncut limits, the common part as a shift of the whole lot.

use crate::drawing::{Limits, Rule};
use crate::process::{Observation, common_of_mean};
use crate::sampling::{FREE_OF_SCATTER, PlanError, VariablesPlan, most_share};
use crate::stats::{mean, share_beyond, standard_deviation};

use super::reason::Decision;

/// Common standard uncertainties by which the lot is shifted either way: the one-sided 95 % point of the normal
/// distribution.
const SHIFT: f64 = 1.644_853_626_951_472_2;

/// What a plan by variables says of one characteristic.
#[derive(Clone, Debug, PartialEq)]
pub struct ByVariables {
    /// Springs the plan asks for, raised for the bench's own scatter.
    pub wanted: u64,
    /// Springs with a value that were used.
    pub measured: u64,
    /// The figures; `None` where springs are missing.
    pub figures: Option<Statistic>,
    /// Whether the values speak for rejection, which the raised number of springs would have to bear out.
    pub withheld: bool,
    /// The decision.
    pub decision: Decision,
}

/// What is compared with the plan's constant.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Compared {
    /// Distance of the mean from the one limit in standard deviations, against k: as measured, and at its least and most
    /// under the shifts.
    Distance {
        /// Q.
        found: f64,
        /// At the less favourable shift.
        least: f64,
        /// At the more favourable shift.
        most: f64,
        /// k.
        wanted: f64,
    },
    /// Estimated share outside both limits, against M.
    Share {
        /// Estimate.
        found: f64,
        /// At the more favourable shift.
        least: f64,
        /// At the less favourable shift.
        most: f64,
        /// M.
        wanted: f64,
    },
}

/// Mean, standard deviation and what is compared.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Statistic {
    /// Mean.
    pub mean: f64,
    /// Standard deviation.
    pub spread: f64,
    /// Common standard uncertainty of the mean.
    pub common: f64,
    /// What is compared.
    pub compared: Compared,
}

/// Decides by `plan` on the `observations` in the order of the sample, `None` for a spring without a value whose
/// uncertainty is known; under [`Rule::Simple`] the bench counts as without uncertainty.
///
/// Accepted where the plan accepts at both ends of the shift, rejected where it accepts nowhere between them, else
/// undecided. Where the bench's own scatter exceeds 0.1 s, n grows by 1 + (own/σ)² before a rejection stands. An
/// acceptance stands with the plan's own n: the scatter makes s larger and the distance in it smaller, so that no lot is
/// accepted more easily than on a bench without scatter.
///
/// # Errors
/// [`PlanError::Statistics`] where the estimator cannot answer.
pub fn by_variables(
    plan: &VariablesPlan,
    observations: &[Option<Observation>],
    limits: &Limits,
    rule: Rule,
) -> Result<ByVariables, PlanError> {
    let first = taken(observations, plan.sample_size);
    let missing = |measured: usize| ByVariables {
        wanted: plan.sample_size,
        measured: measured as u64,
        figures: None,
        withheld: false,
        decision: Decision::Undecided,
    };
    if (first.len() as u64) < plan.sample_size {
        let size = usize::try_from(plan.sample_size).unwrap_or(usize::MAX);
        return Ok(missing(observations.iter().take(size).flatten().count()));
    }
    let (wanted, reach) = match rule {
        Rule::Simple => (plan.sample_size, 0.0),
        Rule::Guarded => (raised(plan, &first), SHIFT),
    };
    let sample = taken(observations, wanted);
    let values: Vec<f64> = sample.iter().map(|one| one.value).collect();
    let (Some(centre), Some(spread)) = (mean(&values), standard_deviation(&values)) else {
        return Ok(missing(sample.len()));
    };
    let used = sample.len() as u64;
    let most = if used == plan.sample_size {
        plan.most
    } else {
        most_share(used, plan.k)?
    };
    let common = common_of_mean(&sample);
    let judged = Judged {
        n: used,
        centre,
        spread,
        reach: reach * common,
    };
    let (compared, decision) = match (limits.lower, limits.upper) {
        (Some(lower), Some(upper)) => judged.two(lower, upper, most)?,
        (Some(lower), None) => judged.one(centre - lower, plan.k),
        (None, Some(upper)) => judged.one(upper - centre, plan.k),
        (None, None) => return Ok(missing(sample.len())),
    };
    let withheld = decision == Decision::Rejected && used < wanted;
    Ok(ByVariables {
        wanted,
        measured: used,
        withheld,
        figures: Some(Statistic {
            mean: centre,
            spread,
            common,
            compared,
        }),
        decision: if withheld {
            Decision::Undecided
        } else {
            decision
        },
    })
}

/// The values of the first `size` springs, up to a spring without one: none is passed over in favour of the next.
fn taken(observations: &[Option<Observation>], size: u64) -> Vec<Observation> {
    let size = usize::try_from(size).unwrap_or(usize::MAX);
    let first = observations.iter().take(size);
    first.map_while(Clone::clone).collect()
}

/// Springs wanted on this bench. Where its scatter explains all that was seen, no number is enough.
fn raised(plan: &VariablesPlan, sample: &[Observation]) -> u64 {
    let values: Vec<f64> = sample.iter().map(|one| one.value).collect();
    let squares: Vec<f64> = sample.iter().map(|one| one.own * one.own).collect();
    let (Some(spread), Some(own)) = (standard_deviation(&values), mean(&squares)) else {
        return plan.sample_size;
    };
    if own.sqrt() <= FREE_OF_SCATTER * spread {
        return plan.sample_size;
    }
    let springs = spread * spread - own;
    if springs <= 0.0 {
        return u64::MAX;
    }
    plan.raised((own / springs).sqrt())
}

struct Judged {
    n: u64,
    centre: f64,
    spread: f64,
    reach: f64,
}

impl Judged {
    /// A distance in standard deviations; without spread it is beyond every constant.
    fn standard(&self, distance: f64) -> f64 {
        if self.spread > 0.0 {
            distance / self.spread
        } else if distance >= 0.0 {
            f64::MAX
        } else {
            f64::MIN
        }
    }

    fn one(&self, inside: f64, k: f64) -> (Compared, Decision) {
        let at = |shift: f64| self.standard(inside + shift);
        let (found, least, most) = (at(0.0), at(-self.reach), at(self.reach));
        let decision = if least >= k {
            Decision::Accepted
        } else if most < k {
            Decision::Rejected
        } else {
            Decision::Undecided
        };
        let wanted = k;
        let compared = Compared::Distance {
            found,
            least,
            most,
            wanted,
        };
        (compared, decision)
    }

    fn two(&self, lower: f64, upper: f64, wanted: f64) -> Result<(Compared, Decision), PlanError> {
        let at = |shift: f64| {
            let centre = self.centre + shift;
            let above = share_beyond(self.n, self.standard(upper - centre))?;
            let below = share_beyond(self.n, self.standard(centre - lower))?;
            Ok::<_, PlanError>(above + below)
        };
        let found = at(0.0)?;
        let most = at(-self.reach)?.max(at(self.reach)?);
        // the most favourable shift brings the mean as near to the middle as it may
        let middle = (f64::midpoint(lower, upper) - self.centre).clamp(-self.reach, self.reach);
        let least = at(middle)?;
        let decision = if most <= wanted {
            Decision::Accepted
        } else if least > wanted {
            Decision::Rejected
        } else {
            Decision::Undecided
        };
        let compared = Compared::Share {
            found,
            least,
            most,
            wanted,
        };
        Ok((compared, decision))
    }
}
