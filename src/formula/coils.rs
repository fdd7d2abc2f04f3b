//! Coils and lengths: solid length, smallest gaps, pitch.

/// How the ends are made.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ends {
    /// Plain.
    Open,
    /// Plain, ground.
    OpenGround,
    /// Closed, not ground.
    Closed,
    /// Closed and ground.
    ClosedGround,
}

impl Ends {
    /// Whether the ends are ground.
    pub const fn ground(self) -> bool {
        matches!(self, Self::OpenGround | Self::ClosedGround)
    }

    /// Dead coils of both ends together: Machinery's Handbook, 31st ed., table 3 p. 318; closed hot-coiled ends 1.5 by
    /// EN 13906-1:2013 (from memory).
    pub const fn dead_coils(self, forming: Forming) -> f64 {
        match (self, forming) {
            (Self::Open, _) => 0.0,
            (Self::OpenGround, _) => 1.0,
            (Self::Closed | Self::ClosedGround, Forming::Cold) => 2.0,
            (Self::Closed | Self::ClosedGround, Forming::Hot) => 1.5,
        }
    }
}

/// Whether the wire is coiled cold or hot.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Forming {
    /// Cold.
    Cold,
    /// Hot.
    Hot,
}

/// Solid length Lc in mm with `total` coils nt of `wire` diameter d (mm).
///
/// Source: EN 13906-1:2013 for closed ends coiled cold, ground `nt·d`, not ground `(nt + 1.5)·d` (JIS B 2704-1 and
/// textbooks: `(nt + 1)·d`), coiled hot `(nt − 0.3)·d` and `(nt + 1.1)·d` (from memory); Machinery's Handbook, 31st ed.,
/// table 3 p. 318, for open ends `(nt + 1)·d`, ground `nt·d`.
pub fn solid_length(ends: Ends, forming: Forming, total: f64, wire: f64) -> f64 {
    let coils = match (ends, forming) {
        (Ends::ClosedGround, Forming::Hot) => total - 0.3,
        (Ends::Closed, Forming::Hot) => total + 1.1,
        (Ends::ClosedGround, Forming::Cold) | (Ends::OpenGround, _) => total,
        (Ends::Closed, Forming::Cold) => total + 1.5,
        (Ends::Open, _) => total + 1.0,
    };
    coils * wire
}

/// Sum of the smallest gaps between the active coils Sa, in mm, under static load; dynamic load asks for 1.5 times as much
/// (hot: twice; from memory).
///
/// Source: EN 13906-1:2013; cold `n·(0.0015·D²/d + 0.1·d)`, hot `0.02·n·(D + d)` (from memory).
pub fn smallest_gaps(forming: Forming, wire: f64, coil: f64, active: f64) -> f64 {
    match forming {
        Forming::Cold => active * (0.0015 * coil * coil / wire + 0.1 * wire),
        Forming::Hot => 0.02 * active * (coil + wire),
    }
}

/// Pitch of the active coils at no load, mm, from the free length.
///
/// Source: Shigley's Mechanical Engineering Design, table 10-1 (the same as Machinery's Handbook, table 3).
pub fn pitch(ends: Ends, free: f64, wire: f64, active: f64) -> f64 {
    match ends {
        Ends::Open => (free - wire) / active,
        Ends::OpenGround => free / (active + 1.0),
        Ends::Closed => (free - 3.0 * wire) / active,
        Ends::ClosedGround => (free - 2.0 * wire) / active,
    }
}
