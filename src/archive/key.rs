//! Names as parts of paths.

use sha2::{Digest, Sha256};

use crate::text::hex;

/// The longest readable part of a key, in characters.
const LONGEST: usize = 40;

/// A name as a folder's name: a readable part in lower-case letters, digits and hyphens, then the first 8 digits of the
/// SHA-256 of the name's UTF-8 bytes.
///
/// `0044` and `44`, `A` and `a`, `a/b` and `a b` give different keys on any disk; none of them looks like a number or a date,
/// so that no engine turns it into one.
///
/// ```
/// use coilassay::archive::key;
/// assert_eq!(key("GV-118"), "gv-118-6018e700");
/// assert_ne!(key("0044"), key("44"));
/// assert!(key("..").starts_with("name-"));
/// ```
pub fn key(name: &str) -> String {
    let mut slug = String::new();
    for letter in name.chars() {
        if letter.is_ascii_alphanumeric() {
            slug.push(letter.to_ascii_lowercase());
        } else if !slug.is_empty() && !slug.ends_with('-') {
            slug.push('-');
        }
        if slug.len() >= LONGEST {
            break;
        }
    }
    let slug = slug.trim_end_matches('-');
    let slug = if slug.is_empty() { "name" } else { slug };
    let digest = hex(&Sha256::digest(name.as_bytes()));
    format!("{slug}-{}", digest.get(..8).unwrap_or(&digest))
}

#[cfg(test)]
mod tests {
    use std::collections::BTreeSet;

    use super::*;

    #[test]
    fn names_that_a_disk_would_confuse_stay_apart() {
        let long = "x".repeat(500);
        let longer = "x".repeat(501);
        let names = [
            "0044",
            "44",
            "a/b",
            "a\\b",
            "a b",
            "..",
            ".",
            "",
            "A",
            "a",
            "CON",
            "nul",
            "é",
            "弹",
            "-",
            "1e5",
            "2026-01-02",
            &long,
            &longer,
        ];
        let keys: BTreeSet<String> = names.iter().map(|name| key(name)).collect();
        assert_eq!(keys.len(), names.len());
        let plain =
            |letter: char| letter.is_ascii_lowercase() || letter.is_ascii_digit() || letter == '-';
        for key in &keys {
            assert!(key.chars().all(plain) && key.len() <= LONGEST + 9, "{key}");
            assert!(
                key.parse::<f64>().is_err() && !key.starts_with('-'),
                "{key}"
            );
        }
    }

    /// SHA-256 of the empty string and of "abc": FIPS 180-4 examples.
    #[test]
    fn the_digits_are_those_of_sha_256() {
        assert_eq!(key(""), "name-e3b0c442");
        assert_eq!(key("abc"), "abc-ba7816bf");
    }
}
