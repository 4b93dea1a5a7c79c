//! Which format a file has: by content first, then by ending.

use crate::error::ReadProblem;
use memchr::{memchr, memchr2_iter};
use std::fmt;
use std::path::Path;

/// A format that can be read.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
#[non_exhaustive]
pub enum Format {
    /// Polygon file format (Turk 1994), text or binary of either byte order.
    Ply,
    /// Stereolithography facets, text or binary.
    Stl,
}

impl Format {
    /// The formats that can be read.
    pub const ALL: [Self; 2] = [Self::Ply, Self::Stl];

    /// The format's usual ending, in lower case, without the dot.
    #[must_use]
    pub const fn ending(self) -> &'static str {
        match self {
            Self::Ply => "ply",
            Self::Stl => "stl",
        }
    }

    /// Whether vertices are numbered in the file. Where not, records that coincide are one vertex
    /// only after a weld.
    #[must_use]
    pub const fn has_index(self) -> bool {
        match self {
            Self::Ply => true,
            Self::Stl => false,
        }
    }

    /// The format of this ending or name, in any case.
    ///
    /// ```
    /// use merestone_exchange::Format;
    /// assert_eq!(Format::from_ending("STL"), Some(Format::Stl));
    /// assert_eq!(Format::from_ending("docx"), None);
    /// ```
    #[must_use]
    pub fn from_ending(ending: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|format| format.ending().eq_ignore_ascii_case(ending))
    }
}

impl fmt::Display for Format {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.ending())
    }
}

/// How numbers are written in a file.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Encoding {
    /// As text.
    Text,
    /// As bytes, the lowest first.
    LittleEndian,
    /// As bytes, the highest first.
    BigEndian,
}

/// Says which format these bytes have, by content first, then by the path's ending.
///
/// Content decides where it can, so a file of another format under a wrong ending is read as what
/// it is. O(1) for PLY and well-formed binary STL, else up to one pass over the bytes.
///
/// ```
/// use merestone_exchange::{Format, detect};
/// let format = detect(b"ply\nformat ascii 1.0\n", "bollard.stl".as_ref());
/// assert_eq!(format.unwrap(), Format::Ply);
/// ```
///
/// # Errors
/// [`ReadProblem::Empty`], [`ReadProblem::Unsupported`] for a format that is known but not read,
/// [`ReadProblem::UnknownFormat`] where neither content nor ending tells.
pub fn detect(bytes: &[u8], path: &Path) -> Result<Format, ReadProblem> {
    let text = without_mark(bytes);
    if text.trim_ascii().is_empty() {
        return Err(ReadProblem::Empty);
    }
    let first_line = text.split(|&byte| byte == b'\n' || byte == b'\r').next().unwrap_or(text);
    if first_line.trim_ascii().eq_ignore_ascii_case(b"ply") {
        return Ok(Format::Ply);
    }
    if has_binary_stl_size(bytes) || is_stl_text(bytes) {
        return Ok(Format::Stl);
    }
    if let Some(found) = other_format(text) {
        return Err(ReadProblem::Unsupported { found });
    }
    let ending = path.extension().and_then(|ending| ending.to_str()).unwrap_or("");
    if let Some(format) = Format::from_ending(ending) {
        return Ok(format);
    }
    match ending.to_ascii_lowercase().as_str() {
        "obj" => Err(ReadProblem::Unsupported { found: "an OBJ file" }),
        "3mf" => Err(ReadProblem::Unsupported { found: "a 3MF file" }),
        "gltf" | "glb" => Err(ReadProblem::Unsupported { found: "a glTF file" }),
        "step" | "stp" => Err(ReadProblem::Unsupported { found: "a STEP file" }),
        _ => Err(ReadProblem::UnknownFormat),
    }
}

/// The bytes after a UTF-8 byte order mark, which says nothing.
pub(crate) fn without_mark(bytes: &[u8]) -> &[u8] {
    bytes.strip_prefix(b"\xef\xbb\xbf").unwrap_or(bytes)
}

fn starts_with_word(text: &[u8], word: &[u8]) -> bool {
    text.get(..word.len()).is_some_and(|start| start.eq_ignore_ascii_case(word))
        && text.get(word.len()).is_none_or(u8::is_ascii_whitespace)
}

/// Whether the facet count in a binary STL's place accounts for every byte. That is the one sure
/// sign: binary headers may begin with `solid`, too.
pub(crate) fn has_binary_stl_size(bytes: &[u8]) -> bool {
    crate::stl::announced_facets(bytes)
        .is_some_and(|count| bytes.len() as u64 == 84 + 50 * u64::from(count))
}

/// Whether the bytes read as STL text: the word `facet`, or a solid without any, and no zero byte
/// before it, which text never holds and a binary file has in its first facet.
pub(crate) fn is_stl_text(bytes: &[u8]) -> bool {
    let text = without_mark(bytes);
    let is_word_start = |at: usize| at == 0 || text[at - 1].is_ascii_whitespace();
    let facet = memchr2_iter(b'f', b'F', text)
        .find(|&at| is_word_start(at) && starts_with_word(&text[at..], b"facet"));
    match facet {
        Some(at) => memchr(0, &text[..at]).is_none(),
        None => starts_with_word(text.trim_ascii_start(), b"solid") && memchr(0, text).is_none(),
    }
}

/// The name of a format that is not read, where the first bytes show it.
fn other_format(text: &[u8]) -> Option<&'static str> {
    let head = &text[..text.len().min(4096)];
    if head.starts_with(b"glTF") {
        return Some("a binary glTF file");
    }
    if head.starts_with(b"PK\x03\x04") {
        return Some("a zip archive, as 3MF files are");
    }
    if head.starts_with(b"ISO-10303-21") {
        return Some("a STEP file");
    }
    if head.trim_ascii_start().starts_with(b"{") {
        return Some("a JSON file, as glTF may be");
    }
    looks_like_obj(head).then_some("an OBJ file")
}

/// Whether a line begins with a vertex and its numbers, and no line with a word OBJ does not have.
fn looks_like_obj(head: &[u8]) -> bool {
    const WORDS: [&[u8]; 14] = [
        b"v", b"vn", b"vt", b"vp", b"f", b"l", b"p", b"o", b"g", b"s", b"mtllib", b"usemtl",
        b"cstype", b"deg",
    ];
    let mut vertices = 0;
    // The last line may be cut off by the look being a short one.
    for line in head.split(|&byte| byte == b'\n' || byte == b'\r') {
        let mut words = line.split(u8::is_ascii_whitespace).filter(|word| !word.is_empty());
        match words.next() {
            None => {}
            Some(word) if word.starts_with(b"#") => {}
            Some(b"v") => {
                vertices += usize::from(
                    words.next().is_some_and(|word| crate::cursor::number(word).is_some()),
                );
            }
            Some(word) if WORDS.contains(&word) => {}
            Some(_) => break,
        }
    }
    vertices > 0
}

#[cfg(test)]
mod tests {
    use super::*;

    fn found(bytes: &[u8], path: &str) -> Result<Format, String> {
        detect(bytes, path.as_ref()).map_err(|problem| problem.to_string())
    }

    #[test]
    fn content_goes_before_the_ending() {
        assert_eq!(found(b"ply\r\nformat", "a.stl"), Ok(Format::Ply));
        assert_eq!(found(b"\xef\xbb\xbfply\nformat", ""), Ok(Format::Ply));
        assert_eq!(found(b"Solid x FACET normal", "a.ply"), Ok(Format::Stl));
        assert_eq!(found(b"solid nothing\nendsolid nothing", "a.obj"), Ok(Format::Stl));
        let mut binary = b"solid but binary, with a facet ".to_vec();
        binary.resize(80, b' ');
        binary.extend(1_u32.to_le_bytes());
        binary.extend([1; 50]);
        assert_eq!(found(&binary, "a.ply"), Ok(Format::Stl));
        assert_eq!(found(&[0; 84], ""), Ok(Format::Stl));
    }

    #[test]
    fn the_ending_decides_what_the_content_does_not() {
        let garbage = [7; 100];
        assert_eq!(found(&garbage, "dir.ply/a.STL"), Ok(Format::Stl));
        assert_eq!(found(&garbage, "a.ply"), Ok(Format::Ply));
        assert!(found(&garbage, "stl").unwrap_err().contains("PLY and STL"));
        assert!(found(b"", "a.stl").unwrap_err().contains("empty"));
        assert!(found(b" \r\n", "a.stl").unwrap_err().contains("empty"));
    }

    #[test]
    fn formats_that_are_not_read_are_named() {
        let obj = b"# made by hand\nmtllib a.mtl\no thing\nv 0 0 0\nv 1 0 0\nf 1 2 3\n";
        for name in ["a.obj", "a.stl", ""] {
            let message = found(obj, name).unwrap_err();
            assert!(message.contains("OBJ") && message.contains("not supported yet"), "{message}");
        }
        assert!(found(b"glTF\x02\0\0\0", "a.ply").unwrap_err().contains("glTF"));
        assert!(found(b"PK\x03\x04....", "a.stl").unwrap_err().contains("3MF"));
        assert!(found(b"ISO-10303-21;\nHEADER;", "").unwrap_err().contains("STEP"));
        assert!(found(b"{\"asset\":{}}", "").unwrap_err().contains("glTF"));
        assert!(found(b"nothing known", "a.obj").unwrap_err().contains("OBJ"));
    }
}
