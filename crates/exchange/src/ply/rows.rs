//! Rows, one at a time, in any of the three encodings.

use super::header::Header;
use crate::cursor::{line_at, number};
use crate::error::{Fault, ReadProblem, quote};
use crate::format::Encoding;
use merestone_geometry::{Note, NoteKind};
use ply_rs_bw::parser::{ParseError, Parser};
use ply_rs_bw::ply::{ElementDef, PropertyAccess, PropertyType, ScalarType};
use std::io::ErrorKind;

/// The rows after the header, in order.
pub(super) struct Rows<'a> {
    bytes: &'a [u8],
    encoding: Encoding,
    at: usize,
    /// Where the current row begins.
    row_start: usize,
    /// Rows of the current element that were handed out.
    read: usize,
}

impl<'a> Rows<'a> {
    pub(super) fn new(bytes: &'a [u8], header: &Header) -> Self {
        let at = header.end;
        Self { bytes, encoding: header.encoding(), at, row_start: at, read: 0 }
    }

    /// Starts on the next element. Refuses at once what the rest of the file cannot hold.
    pub(super) fn begin(&mut self, element: &ElementDef) -> Result<(), Fault> {
        self.read = 0;
        self.row_start = self.at;
        let room = self.most_rows(element);
        if element.count > room && !element.properties.is_empty() {
            let inside = format!(
                "element `{}`: {} rows are announced, and what is left has room for {room} at most",
                element.name, element.count
            );
            return Err(self.at_end(inside));
        }
        Ok(())
    }

    /// How many rows to reserve for: those announced, as far as the bytes can hold them.
    pub(super) fn room_for(&self, element: &ElementDef) -> usize {
        element.count.min(self.most_rows(element))
    }

    fn most_rows(&self, element: &ElementDef) -> usize {
        let left = self.bytes.len() - self.at;
        match self.encoding {
            // A digit and a blank for each property; the last line may lack its end.
            Encoding::Text => (left + 1) / (2 * element.properties.len()).max(1),
            _ => left / smallest_row(element).max(1),
        }
    }

    /// The current row's number, from 0.
    pub(super) fn row(&self) -> usize {
        self.read.saturating_sub(1)
    }

    /// The next row of the element, `None` after the last.
    pub(super) fn next<E: PropertyAccess>(
        &mut self,
        parser: &Parser<E>,
        element: &ElementDef,
    ) -> Result<Option<E>, Fault> {
        // Rows without a property take no room, so their number could be anything.
        if self.read == element.count || element.properties.is_empty() {
            return Ok(None);
        }
        let row = match self.encoding {
            Encoding::Text => self.text_row(parser, element)?,
            _ => self.binary_row(parser, element)?,
        };
        self.read += 1;
        Ok(Some(row))
    }

    fn binary_row<E: PropertyAccess>(
        &mut self,
        parser: &Parser<E>,
        element: &ElementDef,
    ) -> Result<E, Fault> {
        self.row_start = self.at;
        let mut rest = &self.bytes[self.at..];
        let row = match self.encoding {
            Encoding::BigEndian => parser.read_big_endian_element(&mut rest, element),
            _ => parser.read_little_endian_element(&mut rest, element),
        };
        match row {
            Ok(row) => {
                self.at = self.bytes.len() - rest.len();
                Ok(row)
            }
            Err(error) if error.kind() == ErrorKind::UnexpectedEof => {
                Err(self.at_end(self.inside(element)))
            }
            Err(error) => Err(self.unfit(element, reason(&error))),
        }
    }

    fn text_row<E: PropertyAccess>(
        &mut self,
        parser: &Parser<E>,
        element: &ElementDef,
    ) -> Result<E, Fault> {
        let line = loop {
            if self.at == self.bytes.len() {
                return Err(self.at_end(self.inside(element)));
            }
            self.row_start = self.at;
            let rest = &self.bytes[self.at..];
            let length = memchr::memchr2(b'\n', b'\r', rest);
            self.at += length.map_or(rest.len(), |length| length + 1);
            let line = rest[..length.unwrap_or(rest.len())].trim_ascii();
            // The second half of CR LF, or a line left empty.
            if !line.is_empty() {
                break line;
            }
        };
        let Ok(line) = std::str::from_utf8(line) else {
            return Err(self.unfit(element, format!("{} is not text", quote(line))));
        };
        if has_more_than(element, line) {
            return Err(
                self.unfit(element, "the line holds more numbers than it should".to_owned())
            );
        }
        let error = match parser.read_ascii_element(line, element) {
            Ok(row) => return Ok(row),
            Err(error) => error,
        };
        // Numbers with nothing before or after the point are numbers all the same.
        if let Some(padded) = pad_points(line)
            && let Ok(row) = parser.read_ascii_element(&padded, element)
        {
            return Ok(row);
        }
        Err(self.judge(element, line, &error))
    }

    /// Why a text row was not taken.
    fn judge(&self, element: &ElementDef, line: &str, error: &ParseError) -> Fault {
        for (token, place) in line.split_ascii_whitespace().zip(0..) {
            match number(token.as_bytes()) {
                Some(value) if !value.is_finite() => {
                    let property =
                        element.properties.get_index(place).map(|(name, _)| name.as_str());
                    let lists =
                        element.properties.values().take(place).any(|p| is_list(&p.data_type));
                    return match property {
                        Some(axis @ ("x" | "y" | "z")) if !lists && element.name == "vertex" => {
                            self.fault(ReadProblem::NotFinite {
                                axis: axis.chars().next().unwrap_or('x'),
                                found: token.to_owned(),
                            })
                        }
                        _ => self.unfit(
                            element,
                            format!("{} is not a finite number", quote(token.as_bytes())),
                        ),
                    };
                }
                Some(_) => {}
                None => {
                    return self
                        .unfit(element, format!("{} is not a number", quote(token.as_bytes())));
                }
            }
        }
        self.unfit(element, reason(error))
    }

    /// A problem with the current row, at its line or byte.
    pub(super) fn fault(&self, problem: ReadProblem) -> Fault {
        match self.encoding {
            Encoding::Text => Fault::line(line_at(self.bytes, self.row_start), problem),
            _ => Fault::byte(self.row_start, problem),
        }
    }

    fn unfit(&self, element: &ElementDef, reason: String) -> Fault {
        self.fault(ReadProblem::Row { element: element.name.clone(), row: self.read, reason })
    }

    fn inside(&self, element: &ElementDef) -> String {
        format!("row {} of the {} of element `{}`", self.read, element.count, element.name)
    }

    fn at_end(&self, inside: String) -> Fault {
        let problem = ReadProblem::Truncated { inside };
        match self.encoding {
            Encoding::Text => {
                let end = self.bytes.trim_ascii_end().len();
                Fault::line(line_at(self.bytes, end), problem)
            }
            _ => Fault::byte(self.bytes.len(), problem),
        }
    }

    /// A note about what follows the last row.
    pub(super) fn trailing(&self) -> Option<Note> {
        let rest = &self.bytes[self.at..];
        let (count, place) = match self.encoding {
            Encoding::Text => {
                let blank = rest.len() - rest.trim_ascii_start().len();
                (rest.trim_ascii().len(), format!("line {}", line_at(self.bytes, self.at + blank)))
            }
            _ => (rest.len(), format!("byte {}", self.at)),
        };
        (count > 0).then(|| {
            let message =
                format!("{count} bytes follow the last row, from {place}; they were not read");
            Note::new(NoteKind::TrailingBytes, count, message)
        })
    }
}

fn is_list(property: &PropertyType) -> bool {
    matches!(property, PropertyType::List(..))
}

/// Bytes of a row whose lists are all empty.
fn smallest_row(element: &ElementDef) -> usize {
    let size = |scalar: &ScalarType| match scalar {
        ScalarType::Char | ScalarType::UChar => 1,
        ScalarType::Short | ScalarType::UShort => 2,
        ScalarType::Int | ScalarType::UInt | ScalarType::Float => 4,
        ScalarType::Double => 8,
    };
    let sizes = element.properties.values().map(|property| match &property.data_type {
        PropertyType::Scalar(scalar) | PropertyType::List(scalar, _) => size(scalar),
    });
    sizes.sum()
}

/// Whether a line has words left after all properties had theirs. The parser would drop them.
fn has_more_than(element: &ElementDef, line: &str) -> bool {
    let mut tokens = line.split_ascii_whitespace();
    for property in element.properties.values() {
        let Some(token) = tokens.next() else { return false };
        if is_list(&property.data_type)
            && let Some(last) = token.parse().ok().and_then(|length: usize| length.checked_sub(1))
            && tokens.nth(last).is_none()
        {
            return false;
        }
    }
    tokens.next().is_some()
}

/// The parser's own words without the line it repeats.
fn reason(error: &ParseError) -> String {
    error
        .to_string()
        .lines()
        .next()
        .unwrap_or_default()
        .trim_end_matches(['.', ',', ' '])
        .to_owned()
}

/// The line with a digit on both sides of every point; `None` when all have them already.
fn pad_points(line: &str) -> Option<String> {
    let mut padded = String::with_capacity(line.len() + 8);
    let mut before = ' ';
    let mut after = line.chars().skip(1);
    for c in line.chars() {
        let next = after.next().unwrap_or(' ');
        if c == '.' && !before.is_ascii_digit() && next.is_ascii_digit() {
            padded.push('0');
        }
        padded.push(c);
        if c == '.' && before.is_ascii_digit() && !next.is_ascii_digit() {
            padded.push('0');
        }
        before = c;
    }
    (padded.len() > line.len()).then_some(padded)
}
