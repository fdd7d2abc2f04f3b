//! Ways that spoil the lot's exports together; `place` is the export they begin with.

use super::File;

type Spoil = fn(&mut Vec<File>, usize);

fn body(file: &File) -> Vec<u8> {
    let at = file.1.iter().position(|byte| *byte == b'\n').unwrap();
    file.1[at + 1..].to_vec()
}

fn next(files: &[File], place: usize) -> usize {
    (place + 1) % files.len()
}

/// The body of the next export's rows, some lines of it.
fn lines(file: &File) -> Vec<Vec<u8>> {
    file.1
        .split_inclusive(|byte| *byte == b'\n')
        .map(<[u8]>::to_vec)
        .collect()
}

#[rustfmt::skip] // one way a line
pub(crate) const WAYS: &[(&str, Spoil)] = &[
    ("an export lost", |f, p| { f.remove(p); }),
    ("an export copied under another name", |f, p| { let copy = f[p].1.clone(); f.push(("7.csv".to_owned(), copy)); }),
    ("an export copied over another", |f, p| { let n = next(f, p); f[n].1 = f[p].1.clone(); }),
    ("two exports pasted together, header and all", |f, p| { let n = next(f, p); let more = f[n].1.clone(); f[p].1.extend(more); }),
    ("two exports pasted together", |f, p| { let n = next(f, p); let more = body(&f[n]); f[p].1.extend(more); }),
    ("two exports pasted together, one of them gone", |f, p| { let n = next(f, p); let more = body(&f[n]); f[p].1.extend(more); f.remove(n); }),
    ("thirty rows of another spring's last loading stroke in place of its own", |f, p| {
        let (mut own, other) = (lines(&f[p]), lines(&f[next(f, p)]));
        let (start, from) = (own.len() - 110, other.len() - 110);
        own[start..start + 30].clone_from_slice(&other[from..from + 30]);
        f[p].1 = own.concat();
    }),
    ("the last stroke of another spring in place of its own", |f, p| {
        let (own, other) = (lines(&f[p]), lines(&f[next(f, p)]));
        f[p].1 = [&own[..own.len() - 140], &other[other.len() - 140..]].concat().concat();
    }),
    ("a row of another spring among its own", |f, p| {
        let (mut own, other) = (lines(&f[p]), lines(&f[next(f, p)]));
        let row = own.len() - 90;
        own[row].clone_from(&other[other.len() - 60]);
        f[p].1 = own.concat();
    }),
    ("one export in another encoding", |f, p| { let t = String::from_utf8(f[p].1.clone()).unwrap(); f[p].1 = t.encode_utf16().flat_map(u16::to_be_bytes).collect(); }),
];
