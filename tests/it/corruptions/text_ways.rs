//! Ways that spoil the text of one export.

use crate::random::Random;

/// What an export becomes.
pub(crate) type Spoil = fn(&str, &mut Random) -> Vec<u8>;

fn lines(text: &str) -> Vec<String> {
    text.lines().map(str::to_owned).collect()
}

fn joined(lines: &[String]) -> Vec<u8> {
    (lines.join("\n") + "\n").into_bytes()
}

/// One cell of one row in the middle of the last loading stroke changed.
fn cell(text: &str, column: usize, change: impl Fn(&str) -> String) -> Vec<u8> {
    let mut lines = lines(text);
    let row = lines.len() - 75;
    let mut cells: Vec<String> = lines[row].split(',').map(str::to_owned).collect();
    cells[column] = change(&cells[column]);
    lines[row] = cells.join(",");
    joined(&lines)
}

/// A number with its first digit turned to another one.
fn first_digit(cell: &str, by: u8) -> String {
    let mut bytes = cell.as_bytes().to_vec();
    let at = bytes.iter().position(u8::is_ascii_digit).unwrap();
    bytes[at] = b'0' + (bytes[at] - b'0' + by) % 10;
    String::from_utf8(bytes).unwrap()
}

fn below_header(text: &str, change: impl Fn(&str) -> String) -> Vec<u8> {
    let (header, body) = text.split_once('\n').unwrap();
    format!("{header}\n{}", change(body)).into_bytes()
}

fn flip(text: &str, random: &mut Random, bits: &[u8], count: usize) -> Vec<u8> {
    let mut bytes = text.as_bytes().to_vec();
    for _ in 0..count {
        let share = random.unit();
        let at = (0..bytes.len())
            .find(|at| *at as f64 + 1.0 > share * bytes.len() as f64)
            .unwrap();
        let bit = bits[usize::from(bytes[at]) % bits.len()];
        bytes[at] ^= bit;
    }
    bytes
}

#[rustfmt::skip] // one way a line
pub(crate) const WAYS: &[(&str, Spoil)] = &[
    ("delimiter turned to semicolons", |t, _| t.replace(',', ";").into_bytes()),
    ("delimiter turned to tabs", |t, _| t.replace(',', "\t").into_bytes()),
    ("delimiter turned to blanks below the header", |t, _| below_header(t, |b| b.replace(',', " "))),
    ("decimal points turned to commas", |t, _| below_header(t, |b| b.replace('.', ","))),
    ("semicolons and decimal commas", |t, _| t.replace(',', ";").replace('.', ",").into_bytes()),
    ("decimal points lost in every cell", |t, _| below_header(t, |b| b.replace('.', ""))),
    ("header lost", |t, _| joined(&lines(t)[1..])),
    ("header twice", |t, _| { let l = lines(t); joined(&[&l[..1], &l].concat()) }),
    ("a line put above the header", |t, _| format!("Export of bench 1\n{t}").into_bytes()),
    ("header shifted by one column", |t, _| t.replacen("Time [s],Length [mm],Load [N]", "Length [mm],Load [N],Time [s]", 1).into_bytes()),
    ("header cells shifted by one, one lost", |t, _| t.replacen("Time [s],Length [mm],Load [N]", "Length [mm],Load [N],", 1).into_bytes()),
    ("load and length swapped in the header", |t, _| t.replacen("Length [mm],Load [N]", "Load [N],Length [mm]", 1).into_bytes()),
    ("header relabelled lbf", |t, _| t.replacen("[N]", "[lbf]", 1).into_bytes()),
    ("header relabelled kN", |t, _| t.replacen("[N]", "[kN]", 1).into_bytes()),
    ("header relabelled inch", |t, _| t.replacen("[mm]", "[in]", 1).into_bytes()),
    ("header name misspelt", |t, _| t.replacen("Load", "Laod", 1).into_bytes()),
    ("a column inserted in the rows only", |t, _| below_header(t, |b| b.replace('\n', ",0\n"))),
    ("a column lost in the rows only", |t, _| below_header(t, |b| b.lines().map(|l| l.rsplit_once(',').unwrap().0.to_owned() + "\n").collect())),
    ("cut in the middle of a row", |t, _| t.as_bytes()[..t.len() * 2 / 3].to_vec()),
    ("cut in the middle of the last number", |t, _| t.as_bytes()[..t.len() - 3].to_vec()),
    ("cut to the header", |t, _| joined(&lines(t)[..1])),
    ("cut to nothing", |_, _| Vec::new()),
    ("pasted onto itself, header and all", |t, _| format!("{t}{t}").into_bytes()),
    ("a NUL byte", |t, _| t.replacen("7,", "\0,", 1).into_bytes()),
    ("a blank line in the rows", |t, _| { let mut l = lines(t); l.insert(60, String::new()); joined(&l) }),
    ("a footer below the rows", |t, _| format!("{t}End of test\n").into_bytes()),
    ("a trailing delimiter on every row", |t, _| below_header(t, |b| b.replace('\n', ",\n"))),
    ("a trailing delimiter on one row", |t, _| { let mut l = lines(t); l[99].push(','); joined(&l) }),
    ("quotes about every cell", |t, _| joined(&t.lines().map(|l| format!("\"{}\"", l.replace(',', "\",\""))).collect::<Vec<_>>())),
    ("CR instead of LF", |t, _| t.replace('\n', "\r").into_bytes()),
    ("CR LF", |t, _| t.replace('\n', "\r\n").into_bytes()),
    ("mark of UTF-8", |t, _| format!("\u{FEFF}{t}").into_bytes()),
    ("UTF-16", |t, _| [0xFEFF].into_iter().chain(t.encode_utf16()).flat_map(u16::to_le_bytes).collect()),
    ("thousands marks", |t, _| below_header(t, |b| b.lines().map(|l| l.replacen(',', ",1'0", 1) + "\n").collect())),
    ("an empty cell", |t, _| cell(t, 2, |_| String::new())),
    ("`NaN` in a cell", |t, _| cell(t, 2, |_| "NaN".to_owned())),
    ("`---` in a cell", |t, _| cell(t, 2, |_| "---".to_owned())),
    ("`#N/A` in a cell", |t, _| cell(t, 1, |_| "#N/A".to_owned())),
    ("a unit in a cell", |t, _| cell(t, 2, |c| format!("{c} N"))),
    ("minus before one load", |t, _| cell(t, 2, |c| format!("-{c}"))),
    ("minus before one length", |t, _| cell(t, 1, |c| format!("-{c}"))),
    ("decimal point lost in one load", |t, _| cell(t, 2, |c| c.replace('.', ""))),
    ("decimal point lost in one length", |t, _| cell(t, 1, |c| c.replace('.', ""))),
    ("`e2` after one load", |t, _| cell(t, 2, |c| format!("{c}e2"))),
    ("first digit of one load + 1", |t, _| cell(t, 2, |c| first_digit(c, 1))),
    ("first digit of one load + 7", |t, _| cell(t, 2, |c| first_digit(c, 7))),
    ("first digit of one length + 1", |t, _| cell(t, 1, |c| first_digit(c, 1))),
    ("first digit of one length + 8", |t, _| cell(t, 1, |c| first_digit(c, 8))),
    ("last digit of one length lost", |t, _| cell(t, 1, |c| c[..c.len() - 1].to_owned())),
    ("one bit of a byte flipped", |t, r| flip(t, r, &[1, 2, 4, 8], 1)),
    ("five low bits flipped", |t, r| flip(t, r, &[1, 2, 4], 5)),
    ("thirty low bits flipped", |t, r| flip(t, r, &[1, 2], 30)),
    ("high bit of a byte flipped", |t, r| flip(t, r, &[128], 1)),
];
