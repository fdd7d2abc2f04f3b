//! Lines of a drafted file: keys with the reason beside them, doubts above them.

/// A drafted file, written top to bottom.
#[derive(Debug, Default)]
pub(super) struct Sheet(Vec<String>);

impl Sheet {
    /// The text.
    pub(super) fn finish(self) -> String {
        self.0.join("\n") + "\n"
    }

    /// A comment.
    pub(super) fn comment(&mut self, text: &str) {
        self.0.push(format!("# {text}"));
    }

    /// Lines to look at before the file is used.
    pub(super) fn doubts<'d>(&mut self, texts: impl IntoIterator<Item = &'d String>) {
        for text in texts {
            self.doubt(text);
        }
    }

    /// A line to look at before the file is used.
    pub(super) fn doubt(&mut self, text: &str) {
        self.0.push(format!("# DOUBT: {text}"));
    }

    /// A table's head.
    pub(super) fn table(&mut self, name: &str) {
        self.0.push(format!("\n[{name}]"));
    }

    /// A key with its value as TOML, and why it has it.
    pub(super) fn key(&mut self, key: &str, value: &str, why: &str) {
        self.0.push(format!("# {why}\n{key} = {value}"));
    }
}

/// A text as TOML.
pub(super) fn quoted(text: &str) -> String {
    toml::Value::String(text.to_owned()).to_string()
}

/// A name from the export as comments show it: printable, on one line.
pub(super) fn shown(text: &str) -> String {
    crate::text::printable(text, &crate::text::Alphabet::Any)
}
