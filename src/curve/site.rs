//! What is refused of one spring's rows before and after correction.

use crate::export::RawCurve;
use crate::rig::Means;

use super::correct::Curve;
use super::error::CurveError;
use super::solid;

/// One spring's rows, for what is refused of them.
pub(super) struct Site<'a> {
    pub(super) raw: &'a RawCurve,
    /// Line of the last row.
    pub(super) last: u64,
}

impl Site<'_> {
    fn names(&self) -> (String, String, u64, u64) {
        (
            self.raw.id.clone(),
            self.raw.export.clone(),
            self.raw.first_line,
            self.last,
        )
    }

    pub(super) fn no_contact(&self, rise: f64, contact: f64) -> CurveError {
        let (spring, export, first, last) = self.names();
        CurveError::NoContact {
            spring,
            export,
            first,
            last,
            rise,
            contact,
        }
    }

    pub(super) fn one_reading(&self) -> CurveError {
        let (spring, export, line, _) = self.names();
        CurveError::OneReading {
            spring,
            export,
            line,
        }
    }

    pub(super) fn length_twice(&self, length: f64) -> CurveError {
        let (spring, export, first, last) = self.names();
        CurveError::LengthTwice {
            spring,
            export,
            first,
            last,
            length,
        }
    }

    pub(super) fn load_falls_at(&self, length: f64, fall: f64) -> CurveError {
        let (spring, export, first, last) = self.names();
        CurveError::ReadingFalls {
            spring,
            export,
            first,
            last,
            length,
            fall,
        }
    }

    /// Refuses a loading stroke in which the load stands still while the platen goes on.
    pub(super) fn check_rising(&self, curve: &Curve) -> Result<(), CurveError> {
        for path in &curve.loading {
            let still = path
                .rate
                .and_then(|rate| solid::standstill(path, path.start, rate));
            if let Some(still) = still {
                let (spring, export, ..) = self.names();
                let (first, last) = still.lines;
                return Err(CurveError::StandsStill {
                    spring,
                    export,
                    first,
                    last,
                    load: still.load,
                    travel: still.travel,
                });
            }
        }
        Ok(())
    }

    /// Travel as `u`, growing with compression.
    pub(super) fn travel(&self, means: Means) -> Result<Vec<f64>, CurveError> {
        let (spring, export, first, last) = self.names();
        let travel = &self.raw.travel;
        match means {
            Means::Deflection => Ok(travel.clone()),
            Means::Length => match travel.iter().find(|length| **length < 0.0) {
                Some(length) => Err(CurveError::NegativeLength {
                    spring,
                    export,
                    first,
                    last,
                    length: *length,
                }),
                None => Ok(travel.iter().map(|length| -length).collect()),
            },
            Means::PlatenPosition { at_zero_gap: gap } => {
                let above = travel.iter().any(|position| *position > gap);
                let below = travel.iter().any(|position| *position < gap);
                if above && below {
                    return Err(CurveError::GapCrossed {
                        spring,
                        export,
                        first,
                        last,
                        gap,
                    });
                }
                Ok(travel
                    .iter()
                    .map(|position| -(position - gap).abs())
                    .collect())
            }
        }
    }

    pub(super) fn check_direction(
        &self,
        u: &[f64],
        loads: &[f64],
        contact: f64,
        means: Means,
    ) -> Result<(), CurveError> {
        let (Some(start), Some(from)) = (loads.first(), u.first()) else {
            return Err(self.no_contact(0.0, contact));
        };
        let most = loads
            .iter()
            .zip(u)
            .max_by(|a, b| a.0.total_cmp(b.0))
            .unwrap_or((start, from));
        let lowest = loads.iter().copied().fold(*start, f64::min);
        let (rise, fall) = (most.0 - start, start - lowest);
        let (spring, export, first, last) = self.names();
        if fall > rise.max(contact) {
            return Err(CurveError::LoadFalls {
                spring,
                export,
                first,
                last,
                fall,
            });
        }
        if rise <= contact {
            return Err(self.no_contact(rise, contact));
        }
        if most.1 <= from {
            let means = match means {
                Means::Deflection => "a deflection",
                Means::Length => "a length",
                Means::PlatenPosition { .. } => "a platen position",
            };
            return Err(CurveError::WrongWay {
                spring,
                export,
                first,
                last,
                means,
            });
        }
        Ok(())
    }
}
