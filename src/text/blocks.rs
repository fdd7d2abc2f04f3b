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
    ) -> Result<Self, TextError> {
        let name = printable(as_written, &Alphabet::Any);
        let (to, from) = sync_channel(0); // rendezvous: one block is worked on, one waits
        let sizes = (block_bytes.max(1), longest_line);
        if path.as_os_str() == "-" {
            std::thread::spawn(move || forward(std::io::stdin().lock(), sizes, &to));
            return Ok(Self { name, from });
        }
        match File::open(path) {
            Ok(file) => {
                std::thread::spawn(move || forward(file, sizes, &to));
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

/// Reads `input` to its end and sends it on; stops early where nobody listens any more.
fn forward(mut input: impl Read, sizes: (usize, usize), to: &SyncSender<Message>) {
    let (block_bytes, longest_line) = sizes;
    let mut hasher = Hasher::default();
    let mut held: Vec<u8> = Vec::new();
    let send = |bytes, tail| {
        to.send(Message::Next(Next::Block(Block { bytes, tail })))
            .is_ok()
    };
    loop {
        let known = held.len(); // these bytes hold no line end
        held.reserve(block_bytes);
        let mut some = input.by_ref().take(block_bytes as u64);
        if let Err(fault) = some.read_to_end(&mut held) {
            let _ = to.send(Message::Failed(fault)); // nobody may listen any more
            return;
        }
        let fresh = held.get(known..).unwrap_or_default();
        if fresh.is_empty() {
            break;
        }
        hasher.update(fresh);
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

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, clippy::panic, reason = "tests")]
    use super::*;
    use std::io::Write;

    fn read(bytes: &[u8], block_bytes: usize, longest: usize) -> (Vec<(Vec<u8>, Tail)>, String) {
        let mut file = tempfile::NamedTempFile::new().unwrap();
        file.write_all(bytes).unwrap();
        let mut blocks = Blocks::open(file.path(), "x", block_bytes, longest).unwrap();
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
        assert!(Blocks::open(&folder.path().join("none"), "none", 8, 8).is_err());
        let Ok(mut blocks) = Blocks::open(folder.path(), "folder", 8, 8) else {
            return; // some systems refuse to open a folder at all
        };
        let Err(TextError::Read { name, .. }) = blocks.next_lines() else {
            panic!("a folder was read");
        };
        assert_eq!(name, "folder");
    }
}
