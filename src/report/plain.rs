//! A page as plain text for the terminal: the same strings as in HTML and PDF, tables set with blanks.

use crate::model::{Column, Holds, Page, Section, Table};
use crate::text::{Alphabet, printable};

/// Letters of a line of text.
const WIDE: usize = 110;
/// Letters of a column of words before it is broken.
const WORDS: usize = 34;

/// The page; it ends with a line end, foreign strings made printable.
pub(super) fn text(page: &Page) -> String {
    let mut lines = vec![format!("{}: {}", page.decision.word, page.subject)];
    for reason in &page.decision.why {
        lines.extend(wrapped(reason, "  - ", "    "));
    }
    for caution in &page.cautions {
        lines.extend(wrapped(&format!("Caution: {caution}"), "  - ", "    "));
    }
    for facts in &page.facts {
        lines.push(String::new());
        let wide = facts
            .rows
            .iter()
            .map(|one| count(&one.name))
            .max()
            .unwrap_or(0);
        for one in &facts.rows {
            let name = padded(&one.name, wide, false);
            let indent = " ".repeat(wide + 4);
            lines.extend(wrapped(&one.value, &format!("  {name}  "), &indent));
        }
    }
    if !page.tables.is_empty() {
        lines.push(String::new());
    }
    lines.extend(page.tables.iter().flat_map(of_table));
    for section in &page.sections {
        lines.extend(of_section(section));
    }
    lines.push(String::new());
    for caution in &page.standing {
        lines.extend(wrapped(caution, "", ""));
    }
    let clean: Vec<String> = lines
        .iter()
        .map(|line| printable(line.trim_end(), &Alphabet::Any))
        .collect();
    clean.join("\n") + "\n"
}

fn of_section(section: &Section) -> Vec<String> {
    if section.text.is_empty() && section.tables.is_empty() {
        return Vec::new();
    }
    let mut lines = vec![String::new(), section.title.to_uppercase()];
    for paragraph in &section.text {
        lines.extend(wrapped(paragraph, "  ", "  "));
    }
    for table in &section.tables {
        lines.extend(of_table(table));
    }
    lines
}

fn of_table(table: &Table) -> Vec<String> {
    let head: Vec<String> = table.columns.iter().map(title).collect();
    let rows = table.rows.iter().map(|row| {
        let cells = row.cells.iter().map(|cell| cell.text.clone());
        cells.collect::<Vec<String>>()
    });
    let all: Vec<Vec<Vec<String>>> = std::iter::once(head)
        .chain(rows)
        .map(|cells| {
            let broken = cells.iter().zip(&table.columns);
            broken
                .map(|(text, column)| broken_cell(text, column))
                .collect()
        })
        .collect();
    let widths: Vec<usize> = (0..table.columns.len())
        .map(|column| {
            let cells = all.iter().filter_map(|row| row.get(column)).flatten();
            cells.map(|line| count(line)).max().unwrap_or(0)
        })
        .collect();
    let mut lines = vec![format!("  {}", table.caption)];
    for row in &all {
        let high = row.iter().map(Vec::len).max().unwrap_or(0);
        for line in 0..high {
            let cells = row.iter().zip(&table.columns).zip(&widths);
            let set: Vec<String> = cells
                .map(|((cell, column), wide)| {
                    let text = cell.get(line).map_or("", String::as_str);
                    padded(text, *wide, column.holds == Holds::Figures)
                })
                .collect();
            lines.push(format!("    {}", set.join("  ")));
        }
    }
    if !table.note.is_empty() {
        lines.extend(wrapped(&table.note, "    ", "    "));
    }
    lines
}

fn title(column: &Column) -> String {
    if column.unit.is_empty() {
        column.title.clone()
    } else {
        format!("{} ({})", column.title, column.unit)
    }
}

fn broken_cell(text: &str, column: &Column) -> Vec<String> {
    match column.holds {
        Holds::Words => folded(text, WORDS),
        Holds::Figures | Holds::Hash => vec![text.to_owned()],
    }
}

/// A text in lines of the terminal, the first after `first`, the others after `then`.
fn wrapped(text: &str, first: &str, then: &str) -> Vec<String> {
    let room = WIDE.saturating_sub(count(first)).max(20);
    folded(text, room)
        .into_iter()
        .enumerate()
        .map(|(place, line)| format!("{}{line}", if place == 0 { first } else { then }))
        .collect()
}

/// A text in lines of at most `wide` letters, broken at blanks; a longer word stands alone.
fn folded(text: &str, wide: usize) -> Vec<String> {
    let mut lines: Vec<String> = Vec::new();
    for word in text.split(' ') {
        match lines.last_mut() {
            Some(line) if count(line) + 1 + count(word) <= wide => {
                line.push(' ');
                line.push_str(word);
            }
            _ => lines.push(word.to_owned()),
        }
    }
    lines
}

fn count(text: &str) -> usize {
    text.chars().count()
}

fn padded(text: &str, wide: usize, right: bool) -> String {
    let blanks = " ".repeat(wide.saturating_sub(count(text)));
    if right {
        format!("{blanks}{text}")
    } else {
        format!("{text}{blanks}")
    }
}
