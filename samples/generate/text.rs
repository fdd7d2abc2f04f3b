//! Writing: numbers with a fixed count of decimals, whole files, folders.

use std::fs;
use std::path::Path;

/// Appends a number rounded to `decimals` places; `mark` is the decimal mark.
pub(crate) fn number(out: &mut Vec<u8>, value: f64, decimals: u32, mark: u8) {
    let scale = 10_u64.pow(decimals);
    let scaled = whole((value.abs() * scale as f64).round());
    if value < 0.0 && scaled > 0 {
        out.push(b'-');
    }
    digits(out, scaled / scale, 1);
    if decimals > 0 {
        out.push(mark);
        digits(out, scaled % scale, decimals);
    }
}

/// Appends a whole number with at least `width` digits.
fn digits(out: &mut Vec<u8>, value: u64, width: u32) {
    if value >= 10 || width > 1 {
        digits(out, value / 10, width.saturating_sub(1));
    }
    out.push(b'0' + u8::try_from(value % 10).unwrap_or(0));
}

#[expect(
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss,
    reason = "rounded readings of a bench, none near 2^63 and none negative"
)]
fn whole(value: f64) -> u64 {
    value as u64
}

/// The text in windows-1252; it holds only letters that are there in Latin-1 too.
pub(crate) fn latin(text: &str) -> Vec<u8> {
    text.chars()
        .map(|c| u8::try_from(u32::from(c)).unwrap_or(b'?'))
        .collect()
}

/// Writes a file and makes its folder.
///
/// # Errors
/// What the file system says.
pub(crate) fn file(path: &Path, bytes: impl AsRef<[u8]>) -> std::io::Result<()> {
    if let Some(folder) = path.parent() {
        fs::create_dir_all(folder)?;
    }
    fs::write(path, bytes)
}
