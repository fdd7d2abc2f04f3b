//! Which exports a lot file names, and the order of springs.

use std::cmp::Ordering;
use std::path::{Component, Path, PathBuf};

use crate::text::{Alphabet, beside, printable};

/// An export: its path as written, and where it lies.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Export {
    /// The path as written, or as the pattern found it.
    pub written: String,
    /// Where it lies.
    pub path: PathBuf,
}

/// The files a pattern in the file `named_in` stands for, in natural order of their names.
///
/// # Errors
/// In words, where the pattern is none or nothing matches.
pub fn resolve(named_in: &Path, pattern: &str) -> Result<Vec<Export>, String> {
    let shown = printable(pattern, &Alphabet::Any);
    if !pattern.contains(['*', '?', '[']) {
        return Ok(vec![Export {
            written: pattern.to_owned(),
            path: beside(named_in, pattern),
        }]);
    }
    // `glob` leaves out every `.`, and what it finds must begin as the folder does.
    let folder: PathBuf = named_in
        .parent()
        .unwrap_or(Path::new(""))
        .components()
        .filter(|part| *part != Component::CurDir)
        .collect();
    let full = beside(
        Path::new(&glob::Pattern::escape(&folder.to_string_lossy()))
            .join("x")
            .as_path(),
        pattern,
    );
    let paths = glob::glob(&full.to_string_lossy())
        .map_err(|fault| format!("\"{shown}\" is no pattern: {}", fault.msg))?;
    let mut found = Vec::new();
    for path in paths {
        let path = path.map_err(|fault| {
            format!(
                "\"{shown}\" leads to a folder that cannot be read: {}",
                fault.error()
            )
        })?;
        if !path.is_file() {
            continue;
        }
        let relative = path.strip_prefix(&folder).unwrap_or(&path);
        found.push(Export {
            written: relative.to_string_lossy().replace('\\', "/"),
            path: path.clone(),
        });
    }
    if found.is_empty() {
        return Err(format!("\"{shown}\" matches no file"));
    }
    found.sort_by(|a, b| natural_order(&a.written, &b.written));
    Ok(found)
}

/// Orders names as people do: digits by their value, everything else by its characters.
/// Names that differ only in leading zeros keep the order of their characters.
pub fn natural_order(a: &str, b: &str) -> Ordering {
    let (mut left, mut right) = (pieces(a), pieces(b));
    loop {
        match (left.next(), right.next()) {
            (None, None) => return a.cmp(b),
            (None, Some(_)) => return Ordering::Less,
            (Some(_), None) => return Ordering::Greater,
            (Some(x), Some(y)) => match piece_order(x, y) {
                Ordering::Equal => {}
                order => return order,
            },
        }
    }
}

fn piece_order(x: &str, y: &str) -> Ordering {
    let digits = |text: &str| text.starts_with(|c: char| c.is_ascii_digit());
    if digits(x) && digits(y) {
        let (x, y) = (x.trim_start_matches('0'), y.trim_start_matches('0'));
        return x.len().cmp(&y.len()).then_with(|| x.cmp(y));
    }
    x.cmp(y)
}

fn pieces(text: &str) -> impl Iterator<Item = &str> {
    let mut rest = text;
    std::iter::from_fn(move || {
        let first = rest.chars().next()?;
        let digit = first.is_ascii_digit();
        let end = rest
            .find(|c: char| c.is_ascii_digit() != digit)
            .unwrap_or(rest.len());
        let (piece, tail) = rest.split_at(end);
        rest = tail;
        Some(piece)
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_count_by_value() {
        let mut names = vec!["10", "9", "a10", "a9", "0044", "44", "", "1"];
        names.sort_by(|a, b| natural_order(a, b));
        assert_eq!(names, ["", "1", "9", "10", "0044", "44", "a9", "a10"]);
    }
}
