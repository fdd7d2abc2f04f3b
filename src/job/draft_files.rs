//! Commented starter files: a drawing, a lot.

/// A file to start from.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Starter {
    /// A drawing.
    Drawing,
    /// A lot file.
    Lot,
}

/// The text of a starter file; its figures are invented and agree with one another.
pub const fn starter(of: Starter) -> &'static str {
    match of {
        Starter::Drawing => include_str!("../../templates/draft/drawing.toml"),
        Starter::Lot => include_str!("../../templates/draft/lot.toml"),
    }
}
