//! Crossed analysis of variance with random parts and operators.
//! Sources: AIAG, Measurement Systems Analysis (the table and the components; that an interaction is pooled above
//! p = 0.25 is from memory); the sums of squares are the plain definitions, taken about the means.

use super::Crossed;
use crate::stats::f_upper_tail;

/// Above this p an interaction is taken for scatter and pooled with it (AIAG MSA, from memory).
const POOLED_ABOVE: f64 = 0.25;

/// One line of the table.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Effect {
    /// Sum of squares.
    pub sum: f64,
    /// Degrees of freedom.
    pub dof: f64,
    /// F against the line below it in the model; `None` where that has no scatter, or for the last lines.
    pub f: Option<f64>,
    /// Chance of such an F or a larger one.
    pub p: Option<f64>,
}

impl Effect {
    const fn plain(sum: f64, dof: f64) -> Self {
        Self {
            sum,
            dof,
            f: None,
            p: None,
        }
    }

    /// Mean square.
    pub fn mean_square(&self) -> f64 {
        self.sum / self.dof
    }

    fn against(self, other: &Self) -> Self {
        let f = Some(self.mean_square() / other.mean_square()).filter(|f| f.is_finite());
        let p = f.and_then(|f| f_upper_tail(f, self.dof, other.dof).ok());
        Self { f, p, ..self }
    }
}

/// Which model the components are taken from.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Model {
    /// The interaction of part and operator stands by itself.
    Full,
    /// It is pooled with the scatter.
    Pooled,
}

/// A part of the variance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Component {
    /// As the mean squares give it; may be negative.
    pub raw: f64,
}

impl Component {
    /// The variance: a negative one is 0.
    pub const fn variance(self) -> f64 {
        self.raw.max(0.0)
    }
}

/// The components of one model. An operator's and the interaction's are absent with one operator; the interaction's in
/// the pooled model too.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Components {
    /// Scatter of repeats.
    pub repeatability: Component,
    /// Operators.
    pub operator: Option<Component>,
    /// Operators that differ from part to part.
    pub interaction: Option<Component>,
    /// Parts.
    pub part: Component,
}

impl Components {
    /// Variance within a part: repeats, operators and interaction.
    pub fn within(&self) -> f64 {
        let of = |one: Option<Component>| one.map_or(0.0, Component::variance);
        self.repeatability.variance() + of(self.operator) + of(self.interaction)
    }

    /// Variance of operators and interaction.
    pub fn reproducibility(&self) -> f64 {
        self.within() - self.repeatability.variance()
    }

    /// The whole study's variance.
    pub fn total(&self) -> f64 {
        self.within() + self.part.variance()
    }
}

/// The table and its components.
#[derive(Clone, Debug, PartialEq)]
pub struct Anova {
    /// Parts.
    pub part: Effect,
    /// Operators; absent with one operator.
    pub operator: Option<Effect>,
    /// Interaction; absent with one operator.
    pub interaction: Option<Effect>,
    /// Repeats.
    pub error: Effect,
    /// All.
    pub total: Effect,
    /// The model whose components count.
    pub model: Model,
    /// The components of the full model.
    pub full: Components,
    /// Those of the pooled model; absent with one operator.
    pub pooled: Option<Components>,
}

impl Anova {
    /// The components that count.
    pub fn components(&self) -> &Components {
        match (self.model, &self.pooled) {
            (Model::Pooled, Some(pooled)) => pooled,
            _ => &self.full,
        }
    }

    /// Degrees of freedom of the repeatability that counts.
    pub fn repeatability_dof(&self) -> f64 {
        match (self.model, self.interaction) {
            (Model::Pooled, Some(interaction)) => self.error.dof + interaction.dof,
            _ => self.error.dof,
        }
    }
}

/// Analyses a study; one operator gives parts and repeats only.
pub fn analyse(study: &Crossed) -> Anova {
    let (parts, operators) = (study.parts.len() as f64, study.operators.len() as f64);
    let trials = study.trials as f64;
    let grand = study.mean();
    let off = |means: Vec<f64>| means.iter().map(|mean| mean - grand).collect::<Vec<_>>();
    let (by_part, by_operator) = (off(study.part_means()), off(study.operator_means()));
    let squares = |values: &[f64]| values.iter().map(|value| value * value).sum::<f64>();
    let mut interaction = 0.0;
    let (mut error, mut total) = (0.0, 0.0);
    for cell in &study.cells {
        let mean = cell.mean();
        let part = by_part.get(cell.part).copied().unwrap_or(0.0);
        let operator = by_operator.get(cell.operator).copied().unwrap_or(0.0);
        interaction += trials * (mean - grand - part - operator).powi(2);
        error += cell.values.iter().map(|y| (y - mean).powi(2)).sum::<f64>();
        total += cell.values.iter().map(|y| (y - grand).powi(2)).sum::<f64>();
    }
    let error = Effect::plain(error, parts * operators * (trials - 1.0));
    let part = Effect::plain(operators * trials * squares(&by_part), parts - 1.0);
    let total = Effect::plain(total, parts * operators * trials - 1.0);
    if study.operators.len() < 2 {
        let full = Components {
            repeatability: Component {
                raw: error.mean_square(),
            },
            operator: None,
            interaction: None,
            part: Component {
                raw: (part.mean_square() - error.mean_square()) / trials,
            },
        };
        return Anova {
            part: part.against(&error),
            operator: None,
            interaction: None,
            error,
            total,
            model: Model::Full,
            full,
            pooled: None,
        };
    }
    let operator = Effect::plain(parts * trials * squares(&by_operator), operators - 1.0);
    let interaction = Effect::plain(interaction, (parts - 1.0) * (operators - 1.0)).against(&error);
    let sizes = (parts, operators, trials);
    let pool = Effect::plain(interaction.sum + error.sum, interaction.dof + error.dof);
    let apart = (interaction.mean_square() - error.mean_square()) / trials;
    Anova {
        part: part.against(&interaction),
        operator: Some(operator.against(&interaction)),
        interaction: Some(interaction),
        error,
        total,
        model: match interaction.p {
            Some(p) if p > POOLED_ABOVE => Model::Pooled,
            _ => Model::Full,
        },
        full: components(sizes, (part, operator), &interaction, error, Some(apart)),
        pooled: Some(components(sizes, (part, operator), &pool, pool, None)),
    }
}

/// Components where parts and operators are held against `over`, and repeats scatter by `error`.
fn components(
    (parts, operators, trials): (f64, f64, f64),
    (part, operator): (Effect, Effect),
    over: &Effect,
    error: Effect,
    interaction: Option<f64>,
) -> Components {
    let beyond = |effect: Effect, count: f64| Component {
        raw: (effect.mean_square() - over.mean_square()) / count,
    };
    Components {
        repeatability: Component {
            raw: error.mean_square(),
        },
        operator: Some(beyond(operator, parts * trials)),
        interaction: interaction.map(|raw| Component { raw }),
        part: beyond(part, operators * trials),
    }
}
