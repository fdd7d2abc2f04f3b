//! A file as read: its path as written, its SHA-256, its text, and the place a fault points at.
//! Here: reading from disk (whole, or block by block), the excerpt a fault shows, opening TOML, making a foreign string printable.
//! Elsewhere: what a file means (`drawing`, `rig`, `intake`), writing (`cli`).

mod blocks;
mod excerpt;
mod fault;
mod printable;
mod progress;
mod source;
mod table;
mod toml;
mod values;

pub use blocks::{Block, Blocks, Decoding, Next, Tail};
pub use excerpt::{Excerpt, Place};
pub use fault::{Fault, Faults};
pub use printable::{Alphabet, printable};
pub use progress::{announce, progress};
pub use source::{Hasher, Head, InputFile, Source, TextError, beside, hex, read_bytes, sha256_of};
pub use table::{At, Table};
pub use toml::{Keys, read_toml};
