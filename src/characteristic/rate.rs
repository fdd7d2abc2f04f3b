//! The rate: least squares of load on deflection in the window, and what stands beside it.

use crate::curve::{Curve, CurveError, Node, Path, WindowMiss};
use crate::drawing::{Method, Way};
use crate::fit::{LackOfFit, LineFit, TypeA, lack_of_fit, two_point_slope, type_a};
use crate::stats::{Dof, StatsError, incomplete_theil_slope, standard_deviation};

use super::budget::{Estimate, Line, Part, with_repeatability};
use super::measure::{Absence, Setup};
use super::scales;

/// The fitted rate of one spring.
#[derive(Clone, Debug)]
pub struct RateFit {
    /// The export.
    pub export: String,
    /// First and last line of the export in the window.
    pub lines: (u64, u64),
    /// Travel at the window's two ends, in mm of `u`.
    pub window: (f64, f64),
    /// The line; its abscissae are `u`.
    pub line: LineFit,
    /// Travel of the fitted points.
    pub travel: Vec<f64>,
    /// Type A of the slope.
    pub type_a: TypeA,
    /// Largest residual over Fn, 0 … 1.
    pub straightness: f64,
    /// Lack of fit.
    pub lack: Option<LackOfFit>,
    /// Rate from the two ends of the window, N/mm.
    pub two_point: Option<f64>,
    /// Robust rate, N/mm.
    pub robust: Option<f64>,
}

impl RateFit {
    /// Lets go of the points, once they are drawn: a lot of ten thousand springs keeps figures only.
    pub fn forget_points(&mut self) {
        self.travel = Vec::new();
        self.line.residuals = Vec::new();
    }
}

/// The strokes of the judged way, those of presetting left out.
fn strokes<'c>(setup: &Setup<'_>, curve: &'c Curve) -> &'c [Path] {
    let all = match setup.stroke.way {
        Way::Loading => &curve.loading,
        Way::Unloading => &curve.unloading,
    };
    let preset = usize::try_from(setup.conditions.presetting_recorded).unwrap_or(usize::MAX);
    all.get(preset..).unwrap_or(&[])
}

/// The judged stroke of a curve, counted after the presetting strokes; `None` where the export does not hold it.
pub fn judged<'c>(setup: &Setup<'_>, curve: &'c Curve) -> Option<&'c Path> {
    let strokes = strokes(setup, curve);
    setup
        .stroke
        .index
        .map_or(strokes.last(), |index| strokes.get(index))
}

/// Fits the rate on `path`.
///
/// # Errors
/// Outer: a [`CurveError`] that ends the run. Inner: why there is no rate.
pub(super) fn fit(
    setup: &Setup<'_>,
    curve: &Curve,
    path: &Path,
    free: Option<f64>,
) -> Result<Result<RateFit, Absence>, CurveError> {
    let (from, to) = match setup.bounds.on(curve, path, free) {
        Ok(window) => window,
        Err(WindowMiss::NotReached) => {
            return match setup.bounds.loads_inside(path) {
                Some(points) if points < 3 => Err(few_points(curve, points)),
                _ => Ok(Err(Absence::WindowNotReached {
                    loads: setup.bounds.loads_short(path),
                })),
            };
        }
        Err(WindowMiss::NoAbsoluteLength) => return Ok(Err(Absence::NoAbsoluteLength)),
    };
    let resolution = curve.travel_resolution;
    if to - from < 20.0 * resolution {
        return Err(CurveError::NarrowWindow {
            spring: curve.id.clone(),
            export: curve.export.clone(),
            window: to - from,
            resolution,
        });
    }
    let nodes = path.between(from, to);
    let travel: Vec<f64> = nodes.iter().map(|node| node.u).collect();
    let load: Vec<f64> = nodes.iter().map(|node| node.load).collect();
    let few = || few_points(curve, nodes.len());
    let line = LineFit::through(&travel, &load).map_err(|_| few())?;
    let type_a = type_a(&line, &travel).map_err(|_| few())?;
    let largest = line
        .residuals
        .iter()
        .fold(0.0_f64, |most, one| most.max(one.abs()));
    Ok(Ok(RateFit {
        export: curve.export.clone(),
        lines: lines(&nodes),
        window: (from, to),
        type_a,
        straightness: largest / setup.full_load_of(curve),
        lack: lack_of_fit(&travel, &load, &line),
        two_point: two_point_slope(&travel, &load),
        robust: incomplete_theil_slope(&travel, &load),
        line,
        travel,
    }))
}

fn few_points(curve: &Curve, points: usize) -> CurveError {
    CurveError::FewPoints {
        spring: curve.id.clone(),
        export: curve.export.clone(),
        first: curve.lines.0,
        last: curve.lines.1,
        points,
    }
}

fn lines(nodes: &[Node]) -> (u64, u64) {
    let first = nodes.iter().map(|node| node.first_line).min().unwrap_or(0);
    (
        first,
        nodes.iter().map(|node| node.last_line).max().unwrap_or(0),
    )
}

/// The rate of `fit` with its budget, N/mm.
///
/// # Errors
/// [`StatsError`] from the coverage factor.
pub(super) fn estimate(
    setup: &Setup<'_>,
    curve: &Curve,
    fit: &RateFit,
    free: Option<f64>,
) -> Result<Estimate, StatsError> {
    let rig = setup.rig;
    let rate = match setup.method {
        Method::Fit => fit.line.slope,
        Method::TwoPoint => fit.two_point.unwrap_or(fit.line.slope),
    };
    let wide = fit.window.1 - fit.window.0;
    let difference = 6.0_f64.sqrt(); // two readings of one step each
    let scatter = scatter_lines(fit, stroke_rates(setup, curve, free).as_slice());
    let known = scatter.iter().any(|line| line.counted);
    let mut shown: Vec<Line> = scatter;
    shown.push(Line::new(
        "resolution of load",
        Part::Own,
        curve.load_resolution / difference / wide,
    ));
    shown.push(Line::new(
        "resolution of travel",
        Part::Own,
        rate * curve.travel_resolution / difference / wide,
    ));
    let repeatability = setup.repeatability("rate");
    let mut lines = with_repeatability(shown, repeatability);
    if let Some(two_point) = fit.two_point {
        // Fit and two-point rate are both the rate by common practice: rectangular between the two.
        lines.push(Line::new(
            "shape",
            Part::Own,
            (fit.line.slope - two_point).abs() / 12.0_f64.sqrt(),
        ));
    }
    lines.extend(scales::force_scale(rig, rate));
    lines.extend(scales::travel_scale(rig, -rate));
    lines.extend(scales::frame(rig, rate * rate, rate));
    lines.push(scales::temperature(setup.conditions.temperature, rate));
    if known || repeatability.is_some() {
        Estimate::new(rate, lines)
    } else {
        Ok(Estimate::without_uncertainty(rate, lines))
    }
}

/// Scatter about the line, and from stroke to stroke: the larger is counted.
fn scatter_lines(fit: &RateFit, strokes: &[f64]) -> Vec<Line> {
    let of_fit = match fit.type_a {
        TypeA::Known {
            standard_uncertainty,
            dof,
            ..
        } => Some(Line::new("fit", Part::Own, standard_uncertainty).with_dof(dof)),
        TypeA::TooFewEffective { .. } => None,
    };
    let of_strokes = standard_deviation(strokes).map(|sd| {
        Line::new("stroke to stroke", Part::Own, sd)
            .with_dof(Dof::Finite(strokes.len() as f64 - 1.0))
    });
    let mut lines: Vec<Line> = of_fit.into_iter().chain(of_strokes).collect();
    if let [fit, strokes] = lines.as_mut_slice() {
        let smaller = if fit.contribution >= strokes.contribution {
            strokes
        } else {
            fit
        };
        smaller.counted = false;
    }
    lines
}

/// The rates of all strokes of the judged way after presetting, N/mm; none where there is only one.
fn stroke_rates(setup: &Setup<'_>, curve: &Curve, free: Option<f64>) -> Vec<f64> {
    let strokes = strokes(setup, curve);
    if strokes.len() < 2 {
        return Vec::new();
    }
    let rate = |path: &Path| {
        let window = setup.bounds.on(curve, path, free);
        let (from, to) = window.ok()?;
        let nodes = path.between(from, to);
        let travel: Vec<f64> = nodes.iter().map(|node| node.u).collect();
        let load: Vec<f64> = nodes.iter().map(|node| node.load).collect();
        LineFit::through(&travel, &load).ok().map(|line| line.slope)
    };
    strokes.iter().filter_map(rate).collect()
}
