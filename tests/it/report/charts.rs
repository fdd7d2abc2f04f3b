//! Charts are checked by what a reader would see: every text inside the drawing, no two texts on each other.

use coilassay::record::AcceptRecord;
use coilassay::report::{self, Templates};
use coilassay::units::System;

use super::{lots, springs::curves};

/// A text's place on the paper: left, top, right, bottom.
#[derive(Clone, Debug)]
struct Box {
    text: String,
    sides: [f64; 4],
}

fn attribute<'a>(tag: &'a str, name: &str) -> Option<&'a str> {
    let from = tag.find(&format!(" {name}=\""))? + name.len() + 3;
    tag[from..].split('"').next()
}

fn boxes(svg: &str) -> Vec<Box> {
    let regular = include_bytes!("../../../templates/fonts/OpenSans-Regular.ttf");
    let bold = include_bytes!("../../../templates/fonts/OpenSans-Bold.ttf");
    let (regular, bold) = (
        ttf_parser::Face::parse(regular, 0).unwrap(),
        ttf_parser::Face::parse(bold, 0).unwrap(),
    );
    let mut found = Vec::new();
    for part in svg.split("<text").skip(1) {
        let (tag, rest) = part.split_once('>').unwrap();
        let text = rest
            .split("</text>")
            .next()
            .unwrap()
            .trim()
            .replace("&lt;", "<")
            .replace("&gt;", ">")
            .replace("&amp;", "&")
            .replace("&quot;", "\"")
            .replace("&apos;", "'");
        let number = |name: &str| attribute(tag, name).unwrap().parse::<f64>().unwrap();
        let (x, y, size) = (number("x"), number("y"), number("font-size"));
        let face = if attribute(tag, "font-weight") == Some("bold") {
            &bold
        } else {
            &regular
        };
        let units: f64 = text
            .chars()
            .map(|letter| {
                f64::from(
                    face.glyph_hor_advance(face.glyph_index(letter).expect("a letter of the font"))
                        .unwrap(),
                )
            })
            .sum();
        let wide = units / f64::from(face.units_per_em()) * size;
        let left = match attribute(tag, "text-anchor").unwrap() {
            "start" => x,
            "middle" => x - wide / 2.0,
            _ => x - wide,
        };
        let (up, down) = (0.40 * size, 0.36 * size); // what letters cover about the middle of a line
        let sides = if tag.contains("rotate(270") {
            [x - up, y + (x - left - wide), x + down, y + (x - left)]
        } else {
            [left, y - up, left + wide, y + down]
        };
        found.push(Box { text, sides });
    }
    found
}

fn faults(name: &str, record: &AcceptRecord, show_in: System) -> Vec<String> {
    let files =
        report::accept(record, &curves(record, 60), show_in, &Templates::built_in()).unwrap();
    let mut faults = Vec::new();
    for file in files.iter().filter(|file| file.path.starts_with("charts/")) {
        let svg = std::str::from_utf8(&file.bytes).unwrap();
        let head = svg.split_once('>').unwrap().0;
        assert!(
            head.contains("role=\"img\"") && !head.contains(" width=") && svg.contains("<title>"),
            "{}",
            file.path
        );
        let view: Vec<f64> = attribute(head, "viewBox")
            .unwrap()
            .split(' ')
            .map(|side| side.parse().unwrap())
            .collect();
        let all = boxes(svg);
        assert!(all.len() > 3, "{}", file.path);
        for (number, one) in all.iter().enumerate() {
            let [left, top, right, bottom] = one.sides;
            if left < 0.0 || top < 0.0 || right > view[2] || bottom > view[3] {
                faults.push(format!(
                    "{name} {}: `{}` leaves the drawing",
                    file.path, one.text
                ));
            }
            for other in &all[number + 1..] {
                let [l, t, r, b] = other.sides;
                if left < r && l < right && top < b && t < bottom {
                    faults.push(format!(
                        "{name} {}: `{}` on `{}`",
                        file.path, one.text, other.text
                    ));
                }
            }
        }
    }
    faults
}

#[test]
fn every_text_is_inside_and_none_on_another() {
    let mut all = Vec::new();
    for (name, record) in [
        ("one", lots::one()),
        ("accepted", lots::accepted()),
        ("undecided", lots::undecided()),
        ("rejected", lots::rejected()),
        ("nested", lots::nested()),
        ("hostile", lots::hostile()),
    ] {
        for show_in in [System::MmN, System::InLbf] {
            all.extend(faults(name, &record, show_in));
        }
    }
    assert!(all.is_empty(), "{}", all.join("\n"));
}
