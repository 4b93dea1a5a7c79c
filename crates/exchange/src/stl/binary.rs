//! Binary STL: 80 bytes of header, a facet count, 50 bytes a facet.

use super::normals::NormalTally;
use super::{announced_facets, check_record_count};
use crate::error::{Fault, ReadProblem};
use merestone_geometry::{AttributeColumn, AttributeValues, Note, NoteKind, PolygonSoup, Welder};
use merestone_topology::FaceListBuf;

const HEADER: usize = 84;
const FACET: usize = 50;

/// Reads all records, or their vertices only: then three corners a facet name them, and the
/// records, six times as many on a closed mesh, are never held.
pub(super) fn read(bytes: &[u8], weld: bool) -> Result<PolygonSoup, Fault> {
    let truncated = |inside: &str| {
        Fault::byte(bytes.len(), ReadProblem::Truncated { inside: inside.to_owned() })
    };
    let announced = announced_facets(bytes)
        .ok_or_else(|| truncated("the 84 bytes a binary STL file begins with"))?
        as usize;
    let body = &bytes[HEADER..];
    let whole = body.len() / FACET;
    // Facets that fill the file to the last byte are all taken, whatever the count says: a count
    // that was never filled in is more common than a tail that happens to have that length.
    let facets = if body.len().is_multiple_of(FACET) { whole } else { announced.min(whole) };
    if facets == 0 && announced > 0 {
        return Err(truncated(&format!("the first of {announced} facets")));
    }
    check_record_count(3 * facets)?;
    let body = &body[..facets * FACET];

    let mut sink = if weld {
        let welder = Welder::with_capacity(3 * facets);
        Sink::Vertices { welder, corners: Vec::with_capacity(3 * facets) }
    } else {
        Sink::Records(Vec::with_capacity(3 * facets))
    };
    let mut normals = NormalTally::default();
    let mut any_attribute = 0;
    let mut batch = [[[0.0; 3]; 3]; BATCH];
    for (turn, chunk) in body.as_chunks::<FACET>().0.chunks(BATCH).enumerate() {
        for (place, facet) in chunk.iter().enumerate() {
            let index = turn * BATCH + place;
            let [normal, a, b, c] = [0, 12, 24, 36].map(|at| vector(facet, at));
            let corners = [a, b, c];
            // Without a branch for each: they are all finite but for one file in thousands.
            if !corners.as_flattened().iter().fold(true, |all, x| all & x.is_finite()) {
                return Err(not_finite(index, &corners));
            }
            normals.compare(index, normal, corners);
            any_attribute |= u16::from_le_bytes([facet[48], facet[49]]);
            batch[place] = corners;
        }
        sink.take(batch[..chunk.len()].as_flattened());
    }

    let (points, corners) = sink.finish();
    let mut soup = PolygonSoup {
        faces: triangles(points.len(), corners, facets)?,
        points,
        ..PolygonSoup::default()
    };
    if any_attribute != 0 {
        let values = body.as_chunks::<FACET>().0.iter();
        let values = values.map(|facet| u16::from_le_bytes([facet[48], facet[49]])).collect();
        soup.face_columns.push(AttributeColumn::new("attribute", AttributeValues::U16(values)));
    }
    if announced != facets {
        soup.notes.push(Note::new(
            NoteKind::WrongCount,
            announced.abs_diff(facets),
            format!(
                "the header announces {announced} facets, the file holds {facets}; those were read"
            ),
        ));
    }
    let rest = bytes.len() - HEADER - body.len();
    if rest > 0 {
        soup.notes.push(Note::new(
            NoteKind::TrailingBytes,
            rest,
            format!(
                "{rest} bytes follow the last facet, from byte {}; they were not read, and if they make no sense the facets may not either",
                HEADER + body.len()
            ),
        ));
    }
    if facets == 0 {
        soup.notes.push(Note::new(NoteKind::NoFaces, 1, "the file holds no facet"));
    }
    soup.notes.extend(normals.notes());
    Ok(soup)
}

/// Facets decoded before their corners are handed on together.
const BATCH: usize = 21;

/// Where corners go.
enum Sink {
    Records(Vec<[f64; 3]>),
    Vertices { welder: Welder, corners: Vec<u32> },
}

impl Sink {
    #[inline]
    fn take(&mut self, records: &[[f64; 3]]) {
        match self {
            Self::Records(points) => points.extend_from_slice(records),
            Self::Vertices { welder, corners } => welder.add(records, corners),
        }
    }

    /// The points and the corners that name them.
    fn finish(self) -> (Vec<[f64; 3]>, Vec<u32>) {
        match self {
            Self::Records(points) => {
                let corners = (0..points.len() as u32).collect();
                (points, corners)
            }
            Self::Vertices { welder, corners } => (welder.into_points(), corners),
        }
    }
}

fn triangles(vertices: usize, corners: Vec<u32>, facets: usize) -> Result<FaceListBuf, Fault> {
    let ends = (1..=facets as u32).map(|facet| 3 * facet).collect();
    FaceListBuf::from_polygons(vertices, corners, ends).map_err(|error| Fault::file(error.into()))
}

#[inline(always)]
fn vector(facet: &[u8; FACET], at: usize) -> [f64; 3] {
    [0, 4, 8].map(|axis| {
        let at = at + axis;
        f64::from(f32::from_le_bytes([facet[at], facet[at + 1], facet[at + 2], facet[at + 3]]))
    })
}

#[cold]
fn not_finite(facet: usize, corners: &[[f64; 3]; 3]) -> Fault {
    let place = corners.as_flattened().iter().position(|x| !x.is_finite()).unwrap_or(0);
    Fault::byte(
        HEADER + FACET * facet + 12 + 4 * place,
        ReadProblem::NotFinite {
            axis: ['x', 'y', 'z'][place % 3],
            found: corners.as_flattened()[place].to_string(),
        },
    )
}
