//! A file of any size, read block by block on a thread of its own, one block ahead, and hashed on the way.
//! Blocks are cut at line ends, so that no line is ever split over two of them.

use std::fs::File;
use std::io::Read;
use std::path::Path;
use std::sync::mpsc::{Receiver, SyncSender, sync_channel};

use super::printable::{Alphabet, printable};
use super::source::{Hasher, TextError};

/// A file being read; the thread behind it ends by itself when this is dropped.
#[derive(Debug)]
pub struct Blocks {
    name: String,
    from: Receiver<Message>,
}

/// What is done to the bytes of a file before lines are cut.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Decoding {
    /// They are UTF-16, its byte order told by the mark; what comes out is UTF-8.
    pub utf16: bool,
    /// Carriage returns end lines; what comes out has line feeds.
    pub carriage_returns: bool,
}

/// Whole lines of a file, as bytes.
#[derive(Debug)]
pub struct Block {
    /// The bytes, line ends included.
    pub bytes: Vec<u8>,
    /// How the last line of this block ends.
    pub tail: Tail,
}

/// How the last line of a block ends.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Tail {
    /// With its line end.
    Ended,
    /// With the file, without a line end.
    Open,
    /// Not at all: the line is longer than allowed and was cut; nothing follows.
    Overlong,
}

/// What comes next of a file.
#[derive(Debug)]
pub enum Next {
    /// Its next lines.
    Block(Block),
    /// Its end.
    End {
        /// SHA-256 of all its bytes, lower-case hexadecimal.
        sha256: String,
    },
}

#[derive(Debug)]
enum Message {
    Next(Next),
    Failed(std::io::Error),
}

impl Blocks {
    /// Opens `path` (`-`: standard input) and begins to read it in blocks of about `block_bytes` bytes.
    /// `as_written` is the path as the user wrote it; a line of more than `longest_line` bytes is cut and ends the reading.
    ///
    /// # Errors
    /// [`TextError::Read`] where the file cannot be opened.
    pub fn open(
        path: &Path,
        as_written: &str,
        block_bytes: usize,
        longest_line: usize,
        decoding: Decoding,
    ) -> Result<Self, TextError> {
        let name = printable(as_written, &Alphabet::Any);
        let (to, from) = sync_channel(0); // rendezvous: one block is worked on, one waits
        let sizes = (block_bytes.max(1), longest_line);
        let stream = Stream::new(decoding);
        if path.as_os_str() == "-" {
            std::thread::spawn(move || forward(std::io::stdin().lock(), sizes, stream, &to));
            return Ok(Self { name, from });
        }
        match File::open(path) {
            Ok(file) => {
                std::thread::spawn(move || forward(file, sizes, stream, &to));
                Ok(Self { name, from })
            }
            Err(cause) => Err(TextError::Read { name, cause }),
        }
    }

    /// The next lines, or the end of the file.
    ///
    /// # Errors
    /// [`TextError::Read`] where the file stops being readable.
    pub fn next_lines(&mut self) -> Result<Next, TextError> {
        let cause = match self.from.recv() {
            Ok(Message::Next(next)) => return Ok(next),
            Ok(Message::Failed(cause)) => cause,
            Err(gone) => std::io::Error::other(gone),
        };
        Err(TextError::Read {
            name: self.name.clone(),
            cause,
        })
    }
}

/// Turns the bytes of a file into those of its lines, piece by piece.
struct Stream {
    decoding: Decoding,
    decoder: Option<encoding_rs::Decoder>,
    mark: Vec<u8>,
}

impl Stream {
    fn new(decoding: Decoding) -> Self {
        Self {
            decoding,
            decoder: None,
            mark: Vec::new(),
        }
    }

    /// Appends what `raw` says to `held`; `last` at the end of the file.
    fn take(&mut self, raw: &[u8], last: bool, held: &mut Vec<u8>) -> std::io::Result<()> {
        let known = held.len();
        if self.decoding.utf16 {
            self.decode(raw, last, held)?;
        } else {
            held.extend_from_slice(raw);
        }
        if self.decoding.carriage_returns {
            let fresh = held.iter_mut().skip(known);
            for byte in fresh.filter(|byte| **byte == b'\r') {
                *byte = b'\n';
            }
        }
        Ok(())
    }

    fn decode(&mut self, raw: &[u8], last: bool, held: &mut Vec<u8>) -> std::io::Result<()> {
        let invalid =
            |what: &str| std::io::Error::new(std::io::ErrorKind::InvalidData, what.to_owned());
        let mut rest = raw;
        while self.decoder.is_none() && self.mark.len() < 2 {
            match rest.split_first() {
                Some((byte, more)) => {
                    self.mark.push(*byte);
                    rest = more;
                }
                None if last => return Err(invalid("UTF-16 begins with a mark of two bytes")),
                None => return Ok(()),
            }
        }
        let decoder = match &mut self.decoder {
            Some(decoder) => decoder,
            none => {
                let encoding = match self.mark.as_slice() {
                    [0xFF, 0xFE] => encoding_rs::UTF_16LE,
                    [0xFE, 0xFF] => encoding_rs::UTF_16BE,
                    _ => return Err(invalid("it does not begin with the mark of UTF-16")),
                };
                none.insert(encoding.new_decoder_without_bom_handling())
            }
        };
        let room = decoder.max_utf8_buffer_length_without_replacement(rest.len());
        let start = held.len();
        held.resize(start + room.unwrap_or(0), 0);
        let into = held.get_mut(start..).unwrap_or_default();
        let (result, _, written) = decoder.decode_to_utf8_without_replacement(rest, into, last);
        held.truncate(start + written);
        match result {
            encoding_rs::DecoderResult::InputEmpty => Ok(()),
            _ => Err(invalid("it is no valid UTF-16")),
        }
    }
}

/// Reads `input` to its end and sends it on; stops early where nobody listens any more.
fn forward(
    mut input: impl Read,
    sizes: (usize, usize),
    mut stream: Stream,
    to: &SyncSender<Message>,
) {
    let (block_bytes, longest_line) = sizes;
    let mut hasher = Hasher::default();
    let mut held: Vec<u8> = Vec::new();
    let mut raw: Vec<u8> = Vec::new();
    let plain = stream.decoding == Decoding::default();
    let send = |bytes, tail| {
        to.send(Message::Next(Next::Block(Block { bytes, tail })))
            .is_ok()
    };
    loop {
        let known = held.len(); // these bytes hold no line end
        let read = if plain {
            next_plain(&mut input, block_bytes, &mut held, &mut hasher)
        } else {
            raw.clear();
            next_plain(&mut input, block_bytes, &mut raw, &mut hasher)
                .and_then(|read| stream.take(&raw, read == 0, &mut held).map(|()| read))
        };
        let read = match read {
            Ok(read) => read,
            Err(fault) => {
                let _ = to.send(Message::Failed(fault)); // nobody may listen any more
                return;
            }
        };
        if read == 0 {
            break;
        }
        let fresh = held.get(known..).unwrap_or_default();
        if let Some(at) = fresh.iter().rposition(|byte| *byte == b'\n') {
            let rest = held.split_off(known + at + 1);
            if !send(std::mem::replace(&mut held, rest), Tail::Ended) {
                return;
            }
        }
        if held.len() > longest_line {
            send(held, Tail::Overlong);
            return;
        }
    }
    if !held.is_empty() && !send(held, Tail::Open) {
        return;
    }
    let sha256 = hasher.finish();
    let _ = to.send(Message::Next(Next::End { sha256 })); // nobody may listen any more
}

/// Appends the next bytes of `input` to `held`, hashed; how many there were.
fn next_plain(
    input: &mut impl Read,
    block_bytes: usize,
    held: &mut Vec<u8>,
    hasher: &mut Hasher,
) -> std::io::Result<usize> {
    let known = held.len();
    held.reserve(block_bytes);
    input.by_ref().take(block_bytes as u64).read_to_end(held)?;
    let fresh = held.get(known..).unwrap_or_default();
    hasher.update(fresh);
    super::progress::note(fresh.len());
    Ok(fresh.len())
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, clippy::panic, reason = "tests")]
    use super::*;
    use std::io::Write;

    fn read(bytes: &[u8], block_bytes: usize, longest: usize) -> (Vec<(Vec<u8>, Tail)>, String) {
        let mut file = tempfile::NamedTempFile::new().unwrap();
        file.write_all(bytes).unwrap();
        let mut blocks =
            Blocks::open(file.path(), "x", block_bytes, longest, Decoding::default()).unwrap();
        let mut seen = Vec::new();
        loop {
            match blocks.next_lines() {
                Ok(Next::Block(block)) => seen.push((block.bytes, block.tail)),
                Ok(Next::End { sha256 }) => return (seen, sha256),
                Err(_) => return (seen, String::new()),
            }
        }
    }

    #[test]
    fn lines_stay_whole_and_nothing_is_lost() {
        let text = b"one\ntwo and more\n\nthree\nopen";
        for block_bytes in 1..40 {
            let (blocks, _) = read(text, block_bytes, 1000);
            assert_eq!(
                blocks
                    .iter()
                    .flat_map(|(bytes, _)| bytes.clone())
                    .collect::<Vec<_>>(),
                text
            );
            let (open, whole) = blocks.split_last().unwrap();
            assert_eq!(open, &(b"open".to_vec(), Tail::Open));
            for (bytes, tail) in whole {
                assert_eq!((bytes.last(), *tail), (Some(&b'\n'), Tail::Ended));
            }
        }
    }

    /// FIPS 180-4 example "abc"; the digest of nothing is that of the NIST CAVP short messages, Len = 0.
    #[test]
    fn hashes_what_it_reads() {
        let abc = "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad";
        let nothing = "e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855";
        assert_eq!(read(b"abc", 1, 100).1, abc);
        assert_eq!(read(b"abc", 8, 100).1, abc);
        assert_eq!(read(b"", 8, 100), (Vec::new(), nothing.to_owned()));
    }

    #[test]
    fn a_line_without_end_is_cut_and_ends_the_reading() {
        let (blocks, _) = read(&[&b"a\n"[..], &[b'x'; 5000]].concat(), 64, 1000);
        let (bytes, tail) = blocks.last().unwrap();
        assert_eq!(*tail, Tail::Overlong);
        assert!(bytes.len() > 1000 && bytes.len() < 1200);
    }

    #[test]
    fn what_is_no_file_is_a_fault() {
        let folder = tempfile::tempdir().unwrap();
        assert!(
            Blocks::open(
                &folder.path().join("none"),
                "none",
                8,
                8,
                Decoding::default()
            )
            .is_err()
        );
        let Ok(mut blocks) = Blocks::open(folder.path(), "folder", 8, 8, Decoding::default())
        else {
            return; // some systems refuse to open a folder at all
        };
        let Err(TextError::Read { name, .. }) = blocks.next_lines() else {
            panic!("a folder was read");
        };
        assert_eq!(name, "folder");
    }
}
