//! Numbers of the results file: finite, or the file is refused with the key of the first that is not.

use std::cell::RefCell;
use std::io::{self, Write};

use serde::{Serialize, Serializer};
use serde_json::ser::{Formatter, PrettyFormatter};

use super::WriteError;

/// A number that must be finite.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Finite(pub(super) f64);

impl From<f64> for Finite {
    fn from(number: f64) -> Self {
        Finite(number)
    }
}

impl Serialize for Finite {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        if self.0.is_finite() {
            serializer.serialize_f64(self.0)
        } else {
            Err(serde::ser::Error::custom("a number that is not finite"))
        }
    }
}

/// Writes a document, one key a line, and names the key of a number that is not finite.
///
/// # Errors
/// [`WriteError::NotFinite`], or where `out` refuses.
pub(super) fn write_document(document: &impl Serialize, mut out: &mut dyn Write) -> Result<(), WriteError> {
    let path = RefCell::new(Vec::new());
    let formatter = PathFormatter { inner: PrettyFormatter::with_indent(b" "), path: &path, in_key: false };
    let mut serializer = serde_json::Serializer::with_formatter(&mut out, formatter);
    match document.serialize(&mut serializer) {
        Ok(()) => {}
        Err(error) if error.is_data() => {
            return Err(WriteError::NotFinite { place: in_words(&path.borrow()) });
        }
        Err(error) if error.is_io() => return Err(WriteError::Io(error.into())),
        Err(error) => return Err(error.into()),
    }
    out.write_all(b"\n")?;
    Ok(())
}

/// A step of the way to the value that is being written.
enum Step {
    Key(String),
    /// Position in an array, from 1; 0 before its first value.
    Index(usize),
}

fn in_words(path: &[Step]) -> String {
    let mut words = String::from("results");
    for step in path {
        match step {
            Step::Key(key) => {
                words.push('.');
                words.push_str(key);
            }
            Step::Index(index) => words.push_str(&format!("[{}]", index.saturating_sub(1))),
        }
    }
    words
}

/// Keeps the way to the current value beside writing it.
struct PathFormatter<'a> {
    inner: PrettyFormatter<'static>,
    path: &'a RefCell<Vec<Step>>,
    in_key: bool,
}

impl Formatter for PathFormatter<'_> {
    fn begin_object<W: ?Sized + Write>(&mut self, writer: &mut W) -> io::Result<()> {
        self.path.borrow_mut().push(Step::Key(String::new()));
        self.inner.begin_object(writer)
    }

    fn end_object<W: ?Sized + Write>(&mut self, writer: &mut W) -> io::Result<()> {
        self.path.borrow_mut().pop();
        self.inner.end_object(writer)
    }

    fn begin_object_key<W: ?Sized + Write>(&mut self, writer: &mut W, first: bool) -> io::Result<()> {
        if let Some(Step::Key(key)) = self.path.borrow_mut().last_mut() {
            key.clear();
        }
        self.in_key = true;
        self.inner.begin_object_key(writer, first)
    }

    fn end_object_key<W: ?Sized + Write>(&mut self, writer: &mut W) -> io::Result<()> {
        self.in_key = false;
        self.inner.end_object_key(writer)
    }

    fn write_string_fragment<W: ?Sized + Write>(&mut self, writer: &mut W, fragment: &str) -> io::Result<()> {
        if self.in_key
            && let Some(Step::Key(key)) = self.path.borrow_mut().last_mut()
        {
            key.push_str(fragment);
        }
        self.inner.write_string_fragment(writer, fragment)
    }

    fn begin_object_value<W: ?Sized + Write>(&mut self, writer: &mut W) -> io::Result<()> {
        self.inner.begin_object_value(writer)
    }

    fn end_object_value<W: ?Sized + Write>(&mut self, writer: &mut W) -> io::Result<()> {
        self.inner.end_object_value(writer)
    }

    fn begin_array<W: ?Sized + Write>(&mut self, writer: &mut W) -> io::Result<()> {
        self.path.borrow_mut().push(Step::Index(0));
        self.inner.begin_array(writer)
    }

    fn end_array<W: ?Sized + Write>(&mut self, writer: &mut W) -> io::Result<()> {
        self.path.borrow_mut().pop();
        self.inner.end_array(writer)
    }

    fn begin_array_value<W: ?Sized + Write>(&mut self, writer: &mut W, first: bool) -> io::Result<()> {
        if let Some(Step::Index(index)) = self.path.borrow_mut().last_mut() {
            *index += 1;
        }
        self.inner.begin_array_value(writer, first)
    }

    fn end_array_value<W: ?Sized + Write>(&mut self, writer: &mut W) -> io::Result<()> {
        self.inner.end_array_value(writer)
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::collections::BTreeMap;

    #[test]
    fn a_document_is_written_with_every_digit() {
        let mut out = Vec::new();
        let document = BTreeMap::from([("a", vec![Some(Finite(0.1 + 0.2)), None]), ("b", vec![])]);
        write_document(&document, &mut out).unwrap();
        let expected = "{\n \"a\": [\n  0.30000000000000004,\n  null\n ],\n \"b\": []\n}\n";
        assert_eq!(String::from_utf8(out).unwrap(), expected);
    }

    #[test]
    fn a_number_that_is_not_finite_is_refused_by_its_key() {
        for wrong in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY] {
            let row = |d| BTreeMap::from([("before", Finite(1.0)), ("d_mm", Finite(d))]);
            let document = BTreeMap::from([("panels", vec![row(120.0), row(wrong)])]);
            let error = write_document(&document, &mut Vec::new()).unwrap_err();
            assert!(error.to_string().starts_with("results.panels[1].d_mm:"), "{error}");
        }
    }
}
