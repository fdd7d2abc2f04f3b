//! Rooms import only from rooms above them; only some touch the disk. Every file is parsed, paths of every kind followed.

use std::collections::BTreeSet;
use std::path::{Path, PathBuf};

use syn::visit::Visit;

/// The rooms, top to bottom, as DEVELOPERS.md lists them.
const ROOMS: &[&str] = &[
    "units",
    "stats",
    "text",
    "quantity",
    "formula",
    "material",
    "standard",
    "spring",
    "drawing",
    "rig",
    "export",
    "oddity",
    "intake",
    "curve",
    "review",
    "draft",
    "fit",
    "characteristic",
    "doubt",
    "verdict",
    "bench",
    "sampling",
    "process",
    "drift",
    "lot",
    "cause",
    "record",
    "archive",
    "wording",
    "sheet",
    "charts",
    "model",
    "report",
    "job",
    "cli",
    "main",
];
/// Rooms that read the disk, and rooms that write it.
const READS: [&str; 3] = ["text", "archive", "cli"];
const WRITES: [&str; 2] = ["archive", "cli"];

/// The rooms a piece of code names, seen from the module path `here` (room first).
struct Paths<'a> {
    here: &'a [String],
    rooms: BTreeSet<String>,
    std: BTreeSet<String>,
}

impl Paths<'_> {
    fn take(&mut self, segments: &[String]) {
        let Some(first) = segments.first() else {
            return;
        };
        let up = segments
            .iter()
            .take_while(|segment| *segment == "super")
            .count();
        if first == "crate" || first == "coilassay" {
            self.rooms.extend(segments.get(1).cloned());
        } else if up > 0 {
            if up >= self.here.len() {
                self.rooms.extend(segments.get(up).cloned());
            }
        } else if first == "std" {
            self.std.extend(segments.get(1).cloned());
        }
    }

    fn tree(&mut self, before: &[String], tree: &syn::UseTree) {
        let mut path = before.to_vec();
        match tree {
            syn::UseTree::Path(one) => {
                path.push(one.ident.to_string());
                self.tree(&path, &one.tree);
            }
            syn::UseTree::Name(name) => {
                path.push(name.ident.to_string());
                self.take(&path);
            }
            syn::UseTree::Rename(name) => {
                path.push(name.ident.to_string());
                self.take(&path);
            }
            syn::UseTree::Group(group) => {
                for item in &group.items {
                    self.tree(&path, item);
                }
            }
            syn::UseTree::Glob(_) => self.take(&path),
        }
    }
}

impl<'ast> Visit<'ast> for Paths<'_> {
    fn visit_item_use(&mut self, item: &'ast syn::ItemUse) {
        self.tree(&[], &item.tree);
    }

    fn visit_path(&mut self, path: &'ast syn::Path) {
        let segments: Vec<String> = path
            .segments
            .iter()
            .map(|segment| segment.ident.to_string())
            .collect();
        self.take(&segments);
        syn::visit::visit_path(self, path);
    }

    fn visit_item_mod(&mut self, item: &'ast syn::ItemMod) {
        // A test module inside a file stands one `super` deeper.
        let mut here = self.here.to_vec();
        here.push(item.ident.to_string());
        let mut inner = Paths {
            here: &here,
            rooms: BTreeSet::new(),
            std: BTreeSet::new(),
        };
        syn::visit::visit_item_mod(&mut inner, item);
        self.rooms.append(&mut inner.rooms);
        self.std.append(&mut inner.std);
    }
}

/// What `code` at module path `here` names: rooms, and modules of std.
fn names(here: &[String], code: &str) -> (BTreeSet<String>, BTreeSet<String>) {
    let file = syn::parse_file(code).unwrap();
    let mut paths = Paths {
        here,
        rooms: BTreeSet::new(),
        std: BTreeSet::new(),
    };
    paths.visit_file(&file);
    (paths.rooms, paths.std)
}

/// What is wrong with `code` at module path `here`.
fn faults(here: &[String], code: &str) -> Vec<String> {
    let place = |room: &str| ROOMS.iter().position(|known| *known == room);
    let room = &here[0];
    let Some(own) = place(room) else {
        return vec![format!("`{room}` is no room of the list")];
    };
    let (rooms, std) = names(here, code);
    let upward = |named: &&String| place(named).is_none_or(|other| other > own);
    let mut found: Vec<String> = rooms
        .iter()
        .filter(upward)
        .map(|named| format!("{} names `{named}`", here.join("::")))
        .collect();
    let disk =
        std.contains("fs") && !READS.contains(&room.as_str()) && !WRITES.contains(&room.as_str());
    if disk {
        found.push(format!("{} touches the disk", here.join("::")));
    }
    found
}

fn source_files(dir: &Path) -> Vec<PathBuf> {
    let mut found = Vec::new();
    for entry in std::fs::read_dir(dir).unwrap() {
        let path = entry.unwrap().path();
        if path.is_dir() {
            found.extend(source_files(&path));
        } else if path.extension().is_some_and(|end| end == "rs") {
            found.push(path);
        }
    }
    found
}

fn module_of(root: &Path, file: &Path) -> Vec<String> {
    let relative = file.strip_prefix(root).unwrap().with_extension("");
    let mut parts: Vec<String> = relative
        .iter()
        .map(|part| part.to_string_lossy().into_owned())
        .collect();
    if parts.last().is_some_and(|last| last == "mod") {
        parts.pop();
    }
    parts
}

#[test]
fn data_flows_down() {
    let root = Path::new(env!("CARGO_MANIFEST_DIR")).join("src");
    let mut found = Vec::new();
    let mut seen = BTreeSet::new();
    for file in source_files(&root) {
        let here = module_of(&root, &file);
        if here == ["lib"] {
            continue;
        }
        seen.insert(here[0].clone());
        found.extend(faults(&here, &std::fs::read_to_string(&file).unwrap()));
    }
    assert!(found.is_empty(), "{found:#?}");
    assert_eq!(
        seen,
        ROOMS.iter().map(|room| (*room).to_owned()).collect(),
        "a room of the list is not there"
    );
}

#[test]
fn the_crate_root_re_exports_nothing() {
    let root = Path::new(env!("CARGO_MANIFEST_DIR")).join("src/lib.rs");
    let file = syn::parse_file(&std::fs::read_to_string(root).unwrap()).unwrap();
    assert!(
        file.items
            .iter()
            .all(|item| matches!(item, syn::Item::Mod(_)))
    );
}

#[test]
fn a_planted_upward_import_is_found() {
    let here = ["curve".to_owned(), "path".to_owned()];
    let planted = [
        "use crate::record::Verdict;",
        "use crate::{stats::mean, lot::{self, decide}};",
        "use super::super::report as pages;",
        "fn f() { let x = crate::job::accept(); }",
        "fn f(x: crate::verdict::Verdict) {}",
        "mod tests { use super::super::super::cli; }",
        "use std::fs::File;",
        "fn f() { std::fs::read(\"x\").ok(); }",
    ];
    for code in planted {
        assert_eq!(faults(&here, code).len(), 1, "{code}");
    }
    assert!(
        faults(
            &here,
            "use super::window::Bounds; use crate::rig::Rig; use std::ops::Range;"
        )
        .is_empty()
    );
    assert_eq!(faults(&["pantry".to_owned()], "").len(), 1);
}
