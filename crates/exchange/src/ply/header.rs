//! The header: bytes made presentable for the parser, and what it says judged.

use crate::cursor::line_at;
use crate::error::{Fault, ReadProblem, quote};
use crate::format::{Encoding, without_mark};
use ply_rs_bw::parser::{Parser, Reader};
use ply_rs_bw::ply::{self, DefaultElement, ElementDef, PropertyType, ScalarType};
use std::collections::BTreeSet;

/// The two names the face's index list goes by.
pub(super) const INDEX_LISTS: [&str; 2] = ["vertex_indices", "vertex_index"];

/// A header that describes a mesh.
pub(super) struct Header {
    parsed: ply::Header,
    /// The first byte after the header.
    pub(super) end: usize,
}

impl Header {
    pub(super) fn parse(bytes: &[u8]) -> Result<Self, Fault> {
        let (text, end) = presentable(bytes)?;
        // Only for headers: no element is ever read as a map.
        let parser = Parser::<DefaultElement>::new();
        let mut parsed =
            parser.read_header(&mut Reader::new(text.as_bytes())).map_err(|error| {
                let Some(line) = error.line() else {
                    return Fault::file(ReadProblem::Header(
                        "the header has no valid `format` line".to_owned(),
                    ));
                };
                let shown = text.lines().nth(line.saturating_sub(1)).unwrap_or("");
                let why =
                    format!("the header says {}, which is not understood", quote(shown.as_bytes()));
                Fault::line(line, ReadProblem::Header(why))
            })?;
        if parsed.encoding == ply::Encoding::Ascii {
            as_written(&mut parsed);
        }
        let header = Self { parsed, end };
        header.check_vertices()?;
        header.check_faces()?;
        Ok(header)
    }

    pub(super) fn elements(&self) -> impl Iterator<Item = &ElementDef> {
        self.parsed.elements.values()
    }

    pub(super) fn encoding(&self) -> Encoding {
        match self.parsed.encoding {
            ply::Encoding::Ascii => Encoding::Text,
            ply::Encoding::BinaryLittleEndian => Encoding::LittleEndian,
            ply::Encoding::BinaryBigEndian => Encoding::BigEndian,
        }
    }

    /// How many vertices are announced. Rows are counted against it, so that it holds in the end.
    pub(super) fn vertex_count(&self) -> Result<usize, Fault> {
        self.parsed.elements.get("vertex").map(|vertex| vertex.count).ok_or_else(|| {
            Fault::file(ReadProblem::Header("the header has no element `vertex`".to_owned()))
        })
    }

    fn check_vertices(&self) -> Result<(), Fault> {
        let Some(vertex) = self.parsed.elements.get("vertex") else {
            return self.vertex_count().map(|_| ());
        };
        for axis in ["x", "y", "z"] {
            let scalar = vertex.properties.get(axis).map(|property| &property.data_type);
            if !matches!(scalar, Some(PropertyType::Scalar(_))) {
                return Err(Fault::file(ReadProblem::Header(format!(
                    "element `vertex` has no number `{axis}`"
                ))));
            }
        }
        Ok(())
    }

    fn check_faces(&self) -> Result<(), Fault> {
        let Some(face) = self.parsed.elements.get("face") else { return Ok(()) };
        let lists: Vec<_> =
            INDEX_LISTS.iter().filter_map(|&name| face.properties.get(name)).collect();
        let problem = match lists[..] {
            [] if face.count == 0 => return Ok(()),
            [] => "element `face` has no list `vertex_indices` or `vertex_index`",
            [list] => match list.data_type {
                PropertyType::List(ref length, ref index)
                    if is_integer(length) && is_integer(index) =>
                {
                    return Ok(());
                }
                _ => "the index list of element `face` is not a list of whole numbers",
            },
            _ => "element `face` has both `vertex_indices` and `vertex_index`",
        };
        Err(Fault::file(ReadProblem::Header(problem.to_owned())))
    }
}

fn is_integer(scalar: &ScalarType) -> bool {
    !matches!(scalar, ScalarType::Float | ScalarType::Double)
}

/// Reads text coordinates in full, whatever width the header gives them.
fn as_written(header: &mut ply::Header) {
    let Some(vertex) = header.elements.get_mut("vertex") else { return };
    for axis in ["x", "y", "z"] {
        if let Some(property) = vertex.properties.get_mut(axis)
            && property.data_type == PropertyType::Scalar(ScalarType::Float)
        {
            property.data_type = PropertyType::Scalar(ScalarType::Double);
        }
    }
}

/// The header's lines as the parser wants them, one for one: LF at their ends, no blanks around
/// them, no empty ones, no bytes that are not UTF-8. Also where the rows begin.
fn presentable(bytes: &[u8]) -> Result<(String, usize), Fault> {
    let mark = bytes.len() - without_mark(bytes).len();
    let mut text = String::new();
    let mut names = Names::default();
    let mut at = mark;
    // A return alone ends lines only where it ends the first one; else the first data byte after
    // `end_header` could be taken for part of the line's end, or the other way round.
    let lone_return = bytes[mark..].get(3) == Some(&b'\r') && bytes.get(mark + 4) != Some(&b'\n');
    let line_end = if lone_return { b'\r' } else { b'\n' };
    for number in 1.. {
        let rest = &bytes[at..];
        let length = memchr::memchr(line_end, rest);
        let line = rest[..length.unwrap_or(rest.len())].trim_ascii();
        if number == 1 && line != b"ply" {
            return Err(Fault::line(
                1,
                ReadProblem::Header(format!("a PLY file begins with `ply`, not {}", quote(line))),
            ));
        }
        at += length.map_or(rest.len(), |length| length + 1);
        let line = String::from_utf8_lossy(line);
        names.check(&line, number)?;
        text.push_str(if line.is_empty() { "comment" } else { &line });
        text.push('\n');
        if line == "end_header" {
            break;
        }
        if at == bytes.len() {
            let inside = "the header, which has no line `end_header`".to_owned();
            return Err(Fault::line(line_at(bytes, at), ReadProblem::Truncated { inside }));
        }
    }
    Ok((text, at))
}

/// Names seen so far. The parser takes the later of two equal ones and forgets the other, which
/// would shift every row.
#[derive(Default)]
struct Names {
    elements: BTreeSet<String>,
    properties: BTreeSet<String>,
}

impl Names {
    fn check(&mut self, line: &str, number: usize) -> Result<(), Fault> {
        let mut words = line.split_ascii_whitespace();
        let twice = match words.next() {
            Some("element") => {
                self.properties.clear();
                words.next().filter(|&name| !self.elements.insert(name.to_owned()))
            }
            Some("property") => {
                words.last().filter(|&name| !self.properties.insert(name.to_owned()))
            }
            _ => None,
        };
        match twice {
            None => Ok(()),
            Some(name) => {
                let why = format!("the header names {} twice", quote(name.as_bytes()));
                Err(Fault::line(number, ReadProblem::Header(why)))
            }
        }
    }
}
