//! Shares seen in a sample: exact bounds of a proportion, draws without replacement, the share that a normal sample
//! puts beyond a limit.

use statrs::function::beta::checked_beta_reg;

use super::StatsError;
use super::numeric::root;

/// Most trials; the same limit as the binomial sum's.
const MOST_TRIALS: u64 = 100_000;

/// Below this a chance is none; the product of a huge lot's factors ends here.
const NOTHING: f64 = 1e-30;

/// Exact (Clopper–Pearson) bounds of a share after `hits` in `trials`, at this two-sided `confidence` (0 to 1).
///
/// # Errors
/// [`StatsError::Trials`] above 100 000 trials, [`StatsError::Argument`] for more hits than trials or none,
/// [`StatsError::Probability`] for a confidence outside 0…1.
pub fn clopper_pearson(hits: u64, trials: u64, confidence: f64) -> Result<(f64, f64), StatsError> {
    if trials > MOST_TRIALS {
        let (found, most) = (trials, MOST_TRIALS);
        return Err(StatsError::Trials { found, most });
    }
    if trials == 0 || hits > trials {
        return Err(StatsError::Argument { found: hits as f64 });
    }
    if !(confidence > 0.0 && confidence < 1.0) {
        return Err(StatsError::Probability { found: confidence });
    }
    let (x, n) = (hits as f64, trials as f64);
    let tail = (1.0 - confidence) / 2.0;
    let lower = if hits == 0 {
        0.0
    } else {
        beta_quantile(tail, x, n - x + 1.0)?
    };
    let upper = if hits == trials {
        1.0
    } else {
        // from the other side: 1 − p keeps the digits of a share near 1
        1.0 - beta_quantile(tail, n - x, x + 1.0)?
    };
    Ok((lower, upper))
}

fn beta_quantile(p: f64, a: f64, b: f64) -> Result<f64, StatsError> {
    root(0.0, 1.0, |x| beta_cdf(x, a, b).map(|below| below - p))
}

fn beta_cdf(x: f64, a: f64, b: f64) -> Result<f64, StatsError> {
    checked_beta_reg(a, b, x).map_err(|_| StatsError::Argument { found: x })
}

/// Chance that none of the `marked` things among `all` is among `drawn` of them: C(all − marked, drawn)/C(all, drawn).
///
/// # Errors
/// [`StatsError::Argument`] where more are marked or drawn than there are.
pub fn none_drawn(all: u64, marked: u64, drawn: u64) -> Result<f64, StatsError> {
    for found in [marked, drawn] {
        if found > all {
            return Err(StatsError::Argument {
                found: found as f64,
            });
        }
    }
    if drawn > all - marked {
        return Ok(0.0);
    }
    // The product is the same with marked and drawn exchanged; the shorter one is taken.
    let (fewer, more) = (marked.min(drawn), marked.max(drawn));
    let mut chance = 1.0;
    for i in 0..fewer {
        chance *= (all - more - i) as f64 / (all - i) as f64;
        if chance < NOTHING {
            return Ok(0.0);
        }
    }
    Ok(chance)
}

/// The share of a normal population beyond a limit, unbiased of least variance, from a sample of `n` whose mean lies
/// `q` sample standard deviations inside the limit; 0 to 1.
///
/// I_x(n/2 − 1, n/2 − 1), x = ½ − ½·q·√n/(n − 1), cut to 0 … 1.
/// Source: Lieberman and Resnikoff, J. Am. Stat. Assoc. 50 (1955) 457; MIL-STD-414 (1957) appendix; from memory.
///
/// # Errors
/// [`StatsError::Trials`] for n above 100 000, [`StatsError::Argument`] for n under 3 or a q that is not a number.
pub fn share_beyond(n: u64, q: f64) -> Result<f64, StatsError> {
    if n > MOST_TRIALS {
        let (found, most) = (n, MOST_TRIALS);
        return Err(StatsError::Trials { found, most });
    }
    if n < 3 || q.is_nan() {
        return Err(StatsError::Argument { found: q });
    }
    let count = n as f64;
    let x = (0.5 - 0.5 * q * count.sqrt() / (count - 1.0)).clamp(0.0, 1.0);
    let shape = count / 2.0 - 1.0;
    beta_cdf(x, shape, shape)
}
