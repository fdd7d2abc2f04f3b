//! Reading a file whole: path as written, SHA-256, UTF-8 text.

use std::fmt::Write;
use std::path::{Path, PathBuf};
use std::sync::Arc;

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};
use sha2::Digest;

/// Anything larger than this is no hand-written file; exports go by their own road.
const LARGEST_HAND_WRITTEN: u64 = 4 << 20;
/// Bytes of an export that are looked at to see how it is written.
const LOOKED_AT: u64 = 64 << 10;
/// Bytes at its end that are looked at.
const TAIL: u64 = 4 << 10;

/// Bytes of a file that are hashed at once.
const HASHED_AT_ONCE: usize = 1 << 20;

/// What a judgement was made from: the path as it was written, and the SHA-256 of its bytes.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord, Serialize, Deserialize, JsonSchema)]
pub struct InputFile {
    /// What the file is for: `lot`, `drawing`, `rig`, `export`, `findings`.
    pub role: String,
    /// The path as written on the command line or in the file that names it.
    pub path: String,
    /// SHA-256 of the bytes, lower-case hexadecimal.
    pub sha256: String,
}

/// A hand-written file, read whole.
#[derive(Clone, Debug)]
pub struct Source {
    /// The path as written, made printable.
    pub name: String,
    /// Where the file lies; paths inside it are relative to this path's folder.
    pub path: PathBuf,
    /// The text, without a byte-order mark.
    pub text: Arc<str>,
    /// SHA-256 of the bytes, lower-case hexadecimal.
    pub sha256: String,
}

/// Why a file could not be read as text.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
#[expect(missing_docs, reason = "the messages say it")]
pub enum TextError {
    #[error("cannot read `{name}`")]
    #[diagnostic(
        code(coilassay::text::read),
        help("check the path; a path inside a file is relative to the folder of that file")
    )]
    Read {
        name: String,
        #[source]
        cause: std::io::Error,
    },
    #[error("`{name}` is not UTF-8 text: byte {offset} does not belong to any character")]
    #[diagnostic(code(coilassay::text::encoding), help("save the file as UTF-8"))]
    Encoding { name: String, offset: usize },
    #[error("`{name}` is empty")]
    #[diagnostic(
        code(coilassay::text::empty),
        help("write the file, or name another one")
    )]
    Empty { name: String },
    #[error("`{name}` holds {bytes} bytes, more than a hand-written file does")]
    #[diagnostic(
        code(coilassay::text::size),
        help("is this an export? Name it under `exports` in the lot file")
    )]
    TooLarge { name: String, bytes: u64 },
}

impl Source {
    /// Reads `path`; `as_written` is the path as the user wrote it.
    ///
    /// # Errors
    /// [`TextError`] where the file is missing, empty, too large to be hand-written, or not UTF-8.
    pub fn open(path: &Path, as_written: &str) -> Result<Self, TextError> {
        let name = super::printable(as_written, &super::Alphabet::Any);
        let read = |cause| TextError::Read {
            name: name.clone(),
            cause,
        };
        let bytes = std::fs::metadata(path).map_err(read)?.len();
        if bytes > LARGEST_HAND_WRITTEN {
            return Err(TextError::TooLarge { name, bytes });
        }
        let bytes = std::fs::read(path).map_err(read)?;
        let sha256 = hex(&sha2::Sha256::digest(&bytes));
        let body = bytes.strip_prefix(b"\xEF\xBB\xBF").unwrap_or(&bytes);
        let text = std::str::from_utf8(body).map_err(|fault| TextError::Encoding {
            name: name.clone(),
            offset: fault.valid_up_to() + bytes.len() - body.len(),
        })?;
        if text.trim().is_empty() {
            return Err(TextError::Empty { name });
        }
        Ok(Self {
            name,
            path: path.to_owned(),
            text: text.into(),
            sha256,
        })
    }

    /// The same file with another text.
    #[must_use]
    pub fn with_text(&self, text: &str) -> Self {
        Self {
            text: text.into(),
            sha256: hex(&sha2::Sha256::digest(text.as_bytes())),
            ..self.clone()
        }
    }

    /// This file as a line of provenance.
    pub fn input(&self, role: &str) -> InputFile {
        InputFile {
            role: role.to_owned(),
            path: self.name.clone(),
            sha256: self.sha256.clone(),
        }
    }
}

/// All bytes of a file that is read whole, and their SHA-256.
///
/// # Errors
/// [`TextError`] where it cannot be read, is empty or holds more than `most` bytes.
pub fn read_bytes(
    path: &Path,
    as_written: &str,
    most: u64,
) -> Result<(Vec<u8>, String), TextError> {
    let name = super::printable(as_written, &super::Alphabet::Any);
    let read = |cause| TextError::Read {
        name: name.clone(),
        cause,
    };
    let size = std::fs::metadata(path).map_err(read)?.len();
    if size > most {
        return Err(TextError::TooLarge { name, bytes: size });
    }
    let bytes = std::fs::read(path).map_err(read)?;
    if bytes.is_empty() {
        return Err(TextError::Empty { name });
    }
    let sha256 = hex(&sha2::Sha256::digest(&bytes));
    Ok((bytes, sha256))
}

/// `path` as it stands in the folder of `file`, unless it is absolute.
pub fn beside(file: &Path, path: &str) -> PathBuf {
    file.parent().unwrap_or(Path::new("")).join(path)
}

/// Lower-case hexadecimal of some bytes.
pub fn hex(bytes: &[u8]) -> String {
    bytes
        .iter()
        .fold(String::with_capacity(2 * bytes.len()), |mut text, byte| {
            let _ = write!(text, "{byte:02x}"); // writing into a string cannot fail
            text
        })
}

/// SHA-256 of a file of any size, lower-case hexadecimal.
///
/// # Errors
/// [`TextError::Read`] where it cannot be read; `as_written` names it.
pub fn sha256_of(path: &Path, as_written: &str) -> Result<String, TextError> {
    let read = |cause| TextError::Read {
        name: super::printable(as_written, &super::Alphabet::Any),
        cause,
    };
    let mut file = std::fs::File::open(path).map_err(read)?;
    let mut hasher = Hasher::default();
    let mut block = vec![0; HASHED_AT_ONCE];
    loop {
        match std::io::Read::read(&mut file, &mut block).map_err(read)? {
            0 => return Ok(hasher.finish()),
            some => hasher.update(block.get(..some).unwrap_or_default()),
        }
    }
}

/// A running SHA-256 for files that are read block by block.
#[derive(Clone, Debug, Default)]
pub struct Hasher(sha2::Sha256);

impl Hasher {
    /// Takes in the next block.
    pub fn update(&mut self, block: &[u8]) {
        self.0.update(block);
    }

    /// The digest, lower-case hexadecimal.
    pub fn finish(self) -> String {
        hex(&self.0.finalize())
    }
}

/// The first lines of an export of any size, for a look at how it is written.
#[derive(Clone, Debug)]
pub struct Head {
    /// The path as written, made printable.
    pub name: String,
    /// The first 64 KB as text, whole lines only.
    pub text: String,
    /// Whether they are UTF-8; Windows-1252 otherwise.
    pub is_utf8: bool,
    /// Whether they are UTF-16 with its mark.
    pub is_utf16: bool,
    /// Whether carriage returns alone end the lines.
    pub carriage_returns: bool,
    /// The last 4 KB as text, cut anywhere.
    pub tail: String,
    /// The very first bytes.
    pub start: Vec<u8>,
}

impl Head {
    /// Reads the first lines of `path`; `as_written` is the path as the user wrote it.
    ///
    /// # Errors
    /// [`TextError`] where the file is missing or empty.
    pub fn read(path: &Path, as_written: &str) -> Result<Self, TextError> {
        let name = super::printable(as_written, &super::Alphabet::Any);
        let read = |cause| TextError::Read {
            name: name.clone(),
            cause,
        };
        let mut bytes = Vec::new();
        let file = std::fs::File::open(path).map_err(read)?;
        std::io::Read::read_to_end(&mut std::io::Read::take(file, LOOKED_AT), &mut bytes)
            .map_err(read)?;
        if bytes.is_empty() {
            return Err(TextError::Empty { name });
        }
        let start = bytes.get(..4).unwrap_or(&bytes).to_vec();
        let is_whole = (bytes.len() as u64) < LOOKED_AT;
        let wide = match start.as_slice() {
            [0xFF, 0xFE, ..] => Some(encoding_rs::UTF_16LE),
            [0xFE, 0xFF, ..] => Some(encoding_rs::UTF_16BE),
            _ => None,
        };
        if let Some(encoding) = wide {
            let (text, ..) = encoding.decode(&bytes); // a half character at the end is cut with its line
            bytes = text.into_owned().into_bytes();
        }
        let carriage_returns = !bytes.contains(&b'\n') && bytes.contains(&b'\r');
        if carriage_returns {
            for byte in bytes.iter_mut().filter(|byte| **byte == b'\r') {
                *byte = b'\n';
            }
        }
        let end = bytes
            .iter()
            .rposition(|byte| *byte == b'\n')
            .map_or(bytes.len(), |end| end + 1);
        let body = bytes
            .get(..if is_whole { bytes.len() } else { end })
            .unwrap_or(&bytes);
        let body = body.strip_prefix(b"\xEF\xBB\xBF").unwrap_or(body);
        let (text, is_utf8) = match std::str::from_utf8(body) {
            Ok(text) => (text.to_owned(), true),
            Err(_) => (
                encoding_rs::WINDOWS_1252
                    .decode_without_bom_handling(body)
                    .0
                    .into_owned(),
                false,
            ),
        };
        let tail = if is_whole {
            text.clone()
        } else {
            tail(path, wide, carriage_returns).map_err(read)?
        };
        Ok(Self {
            name,
            text,
            is_utf8,
            is_utf16: wide.is_some(),
            carriage_returns,
            tail,
            start,
        })
    }
}

/// The last bytes of a file as text, whatever does not decode made printable.
fn tail(
    path: &Path,
    wide: Option<&'static encoding_rs::Encoding>,
    carriage_returns: bool,
) -> std::io::Result<String> {
    let mut file = std::fs::File::open(path)?;
    let size = file.metadata()?.len();
    let from = size.saturating_sub(TAIL) / 2 * 2; // whole units of UTF-16
    std::io::Seek::seek(&mut file, std::io::SeekFrom::Start(from))?;
    let mut bytes = Vec::new();
    std::io::Read::read_to_end(&mut std::io::Read::take(file, TAIL + 2), &mut bytes)?;
    let text = match wide {
        Some(encoding) => encoding.decode_without_bom_handling(&bytes).0.into_owned(),
        None => String::from_utf8_lossy(&bytes).into_owned(),
    };
    Ok(if carriage_returns {
        text.replace('\r', "\n")
    } else {
        text
    })
}
