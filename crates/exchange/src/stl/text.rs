//! STL text: any case, any number of solids, blanks or line ends between words.

use super::check_record_count;
use super::normals::NormalTally;
use crate::cursor::{Cursor, number};
use crate::error::{Fault, ReadProblem, quote};
use crate::format::without_mark;
use merestone_geometry::{AttributeColumn, AttributeValues, Note, NoteKind, PolygonSoup};
use merestone_topology::FaceListBuf;

pub(super) fn read(bytes: &[u8]) -> Result<PolygonSoup, Fault> {
    let text = without_mark(bytes);
    let mut reader = Reader { text, cursor: Cursor::new(text), ..Reader::default() };
    reader.solids()?;
    reader.finish()
}

#[derive(Default)]
struct Reader<'a> {
    text: &'a [u8],
    cursor: Cursor<'a>,
    points: Vec<[f64; 3]>,
    faces: FaceListBuf,
    solid_of_face: Vec<u32>,
    names: Vec<&'a [u8]>,
    normals: NormalTally,
    facets: usize,
    empty_facets: usize,
    odd_facets: Seen,
    unclosed: Seen,
    unopened: Seen,
    renamed: Seen,
}

/// How often something was seen, and on which line first.
#[derive(Default)]
struct Seen {
    count: usize,
    line: usize,
}

impl Seen {
    fn add(&mut self, line: impl FnOnce() -> usize) {
        if self.count == 0 {
            self.line = line();
        }
        self.count += 1;
    }
}

impl<'a> Reader<'a> {
    fn solids(&mut self) -> Result<(), Fault> {
        let mut open = false;
        loop {
            if self.cursor.peek().is_none() {
                if open {
                    self.unclosed.add(|| self.cursor.line());
                }
                return Ok(());
            }
            if self.cursor.accept(b"facet") {
                if !open {
                    self.unopened.add(|| self.cursor.line());
                    self.names.push(b"");
                    open = true;
                }
                self.facet()?;
            } else if self.cursor.accept(b"solid") {
                if open {
                    self.unclosed.add(|| self.cursor.line());
                }
                let name = self.name();
                self.names.push(name);
                open = true;
            } else if open && self.cursor.accept(b"endsolid") {
                self.end_name();
                open = false;
            } else {
                return Err(self.expected(if open { "`facet` or `endsolid`" } else { "`solid`" }));
            }
        }
    }

    /// The name after `solid`: the rest of the line, or up to a facet that begins on it.
    fn name(&mut self) -> &'a [u8] {
        let mut name: Option<(usize, usize)> = None;
        loop {
            let before = self.cursor.position();
            let Some(token) = self.cursor.token_on_line() else { break };
            let is_facet = token.eq_ignore_ascii_case(b"facet")
                && self.cursor.peek().is_some_and(|next| next.eq_ignore_ascii_case(b"normal"));
            if is_facet || token.eq_ignore_ascii_case(b"endsolid") {
                self.cursor.go_to(before);
                break;
            }
            let end = self.cursor.position();
            name = Some((name.map_or(end - token.len(), |(start, _)| start), end));
        }
        name.map_or(b"", |(start, end)| &self.text[start..end])
    }

    /// The name after `endsolid`: the solid's own, or the rest of the line up to another solid.
    fn end_name(&mut self) {
        let name = self.names.last().copied().unwrap_or(b"");
        if !name.is_empty() {
            // First, since the name may contain the word that would else begin the next solid.
            self.cursor.accept_on_line(name);
        }
        loop {
            let before = self.cursor.position();
            match self.cursor.token_on_line() {
                None => return,
                Some(token) if token.eq_ignore_ascii_case(b"solid") => {
                    self.cursor.go_to(before);
                    return;
                }
                Some(_) => self.renamed.add(|| crate::cursor::line_at(self.text, before)),
            }
        }
    }

    fn facet(&mut self) -> Result<(), Fault> {
        let normal = self.normal()?;
        self.keyword(b"outer", "`outer loop`")?;
        self.keyword(b"loop", "`outer loop`")?;
        let first = self.points.len();
        while self.cursor.accept(b"vertex") {
            let point = [self.coordinate('x')?, self.coordinate('y')?, self.coordinate('z')?];
            self.points.push(point);
        }
        self.keyword(b"endloop", "`vertex` or `endloop`")?;
        self.keyword(b"endfacet", "`endfacet`")?;

        check_record_count(self.points.len())?;
        let facet = self.facets;
        self.facets += 1;
        match (normal, &self.points[first..]) {
            (None, _) => self.normals.missing(facet),
            (Some(normal), &[a, b, c]) => self.normals.compare(facet, normal, [a, b, c]),
            _ => {}
        }
        let corners = self.points.len() - first;
        if corners != 3 {
            self.odd_facets.add(|| self.cursor.line());
        }
        match corners {
            0 => self.empty_facets += 1,
            3 => self.faces.push_face(&[first as u32, first as u32 + 1, first as u32 + 2]),
            _ => {
                let all: Vec<u32> = (first as u32..self.points.len() as u32).collect();
                self.faces.push_face(&all);
            }
        }
        if corners > 0 {
            self.solid_of_face.push(self.names.len() as u32 - 1);
        }
        Ok(())
    }

    /// The three numbers after `normal`; `None` where the word or any number is missing.
    fn normal(&mut self) -> Result<Option<[f64; 3]>, Fault> {
        let has_normal = self.cursor.accept(b"normal");
        let mut normal = [0.0; 3];
        for (read, x) in normal.iter_mut().enumerate() {
            match self.cursor.peek() {
                None => return Err(self.expected("the facet's normal")),
                Some(token) if token.eq_ignore_ascii_case(b"outer") => return Ok(None),
                Some(token) => match number(token) {
                    Some(value) if has_normal => *x = value,
                    _ if read == 0 && !has_normal => {
                        return Err(self.expected("`normal` or `outer loop`"));
                    }
                    _ => return Err(self.expected("a number of the facet's normal")),
                },
            }
            self.cursor.token();
        }
        Ok(Some(normal))
    }

    fn coordinate(&mut self, axis: char) -> Result<f64, Fault> {
        let before = self.cursor.clone();
        match self.cursor.token().map(|token| (token, number(token))) {
            Some((_, Some(value))) if value.is_finite() => Ok(value),
            Some((token, Some(_))) => {
                let found = String::from_utf8_lossy(token).into_owned();
                Err(Fault::line(before.line(), ReadProblem::NotFinite { axis, found }))
            }
            _ => {
                self.cursor = before;
                Err(self.expected("a coordinate"))
            }
        }
    }

    fn keyword(&mut self, word: &[u8], expected: &'static str) -> Result<(), Fault> {
        if self.cursor.accept(word) { Ok(()) } else { Err(self.expected(expected)) }
    }

    #[cold]
    fn expected(&self, expected: &'static str) -> Fault {
        let problem = match self.cursor.peek() {
            Some(token) => ReadProblem::Expected { expected, found: quote(token) },
            None => ReadProblem::Truncated { inside: format!("a facet, where {expected} is due") },
        };
        Fault::line(self.cursor.line(), problem)
    }

    fn finish(mut self) -> Result<PolygonSoup, Fault> {
        let mut notes = Vec::new();
        let mut note = |kind, seen: &Seen, what: &str| {
            if seen.count > 0 {
                let message = format!("{what}: {}, the first on line {}", seen.count, seen.line);
                notes.push(Note::new(kind, seen.count, message));
            }
        };
        note(NoteKind::Unclosed, &self.unclosed, "solids without `endsolid`");
        note(NoteKind::Unclosed, &self.unopened, "runs of facets without `solid`");
        note(
            NoteKind::NameMismatch,
            &self.renamed,
            "words after `endsolid` that are not the solid's name",
        );
        note(
            NoteKind::FacetCorners,
            &self.odd_facets,
            "facets of other than three vertices, kept as polygons",
        );
        if self.empty_facets > 0 {
            notes.push(Note::new(
                NoteKind::EmptyFaces,
                self.empty_facets,
                format!("facets without a vertex, counted as collapsed: {}", self.empty_facets),
            ));
        }
        if self.facets == 0 {
            notes.push(Note::new(NoteKind::NoFaces, 1, "the file holds no facet"));
        }
        notes.extend(self.normals.notes());
        self.faces.set_vertex_count(self.points.len());
        let names = self.names.iter();
        Ok(PolygonSoup {
            points: self.points,
            faces: self.faces,
            vertex_columns: Vec::new(),
            face_columns: vec![AttributeColumn::new(
                "solid",
                AttributeValues::U32(self.solid_of_face),
            )],
            part_names: names.map(|name| String::from_utf8_lossy(name).into_owned()).collect(),
            empty_faces: self.empty_facets,
            notes,
        })
    }
}
