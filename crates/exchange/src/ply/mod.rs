//! PLY: named elements of named properties (Turk 1994), text or binary of either byte order.
//!
//! Headers and rows are parsed by `ply-rs-bw`; what is ours is where rows go, the bounds, and the
//! places in errors. Vertices and faces become points and loops; their other scalar properties
//! become columns of their own; list properties and other elements are read over, with a note.
//!
//! Text coordinates are taken as written, even where the header calls them `float`. A row is a
//! line; a `nan` or `inf` in text is refused, in binary only as a coordinate.

mod columns;
mod header;
mod rows;

use crate::error::{Fault, ReadProblem};
use crate::format::Encoding;
use columns::{Columns, FaceRow, SkippedRow, VertexRow};
use header::Header;
use merestone_geometry::{Note, NoteKind, PolygonSoup};
use merestone_topology::{FaceListBuf, FaceListError, MAX_DENSE_INDEX};
use ply_rs_bw::ply::ElementDef;
use rows::Rows;

pub(crate) fn read(bytes: &[u8]) -> Result<(Encoding, PolygonSoup), Fault> {
    let header = Header::parse(bytes)?;
    let vertices = header.vertex_count()?;
    let mut rows = Rows::new(bytes, &header);
    let mut soup = PolygonSoup::default();
    for element in header.elements() {
        rows.begin(element)?;
        match element.name.as_str() {
            "vertex" => read_vertices(&mut rows, element, &mut soup)?,
            "face" => read_faces(&mut rows, element, vertices, &mut soup)?,
            _ => skip(&mut rows, element, &mut soup)?,
        }
    }
    soup.faces.set_vertex_count(soup.points.len());
    soup.notes.extend(rows.trailing());
    if soup.faces.as_list().face_count() == 0 && soup.empty_faces == 0 {
        soup.notes.push(Note::new(NoteKind::NoFaces, 1, "the file holds no face"));
    }
    Ok((header.encoding(), soup))
}

fn read_vertices(
    rows: &mut Rows<'_>,
    element: &ElementDef,
    soup: &mut PolygonSoup,
) -> Result<(), Fault> {
    let parser = ply_rs_bw::parser::Parser::<VertexRow>::new();
    let mut columns = Columns::new(element, &["x", "y", "z"]);
    soup.points.reserve_exact(rows.room_for(element));
    while let Some(row) = rows.next(&parser, element)? {
        let point = row.point();
        if let Some(axis) = point.iter().position(|x| !x.is_finite()) {
            let (axis, found) = (['x', 'y', 'z'][axis], point[axis].to_string());
            return Err(rows.fault(ReadProblem::NotFinite { axis, found }));
        }
        soup.points.push(point);
        columns.push(row.extras());
    }
    soup.vertex_columns = columns.finish(&mut soup.notes);
    Ok(())
}

fn read_faces(
    rows: &mut Rows<'_>,
    element: &ElementDef,
    vertices: usize,
    soup: &mut PolygonSoup,
) -> Result<(), Fault> {
    let parser = ply_rs_bw::parser::Parser::<FaceRow>::new();
    let mut columns = Columns::new(element, &header::INDEX_LISTS);
    let mut ends: Vec<u32> = Vec::with_capacity(rows.room_for(element));
    let mut corners: Vec<u32> = Vec::new();
    let mut first_empty = None;
    while let Some(row) = rows.next(&parser, element)? {
        let face = rows.row();
        let before = corners.len();
        row.corners(|index| match u32::try_from(index) {
            Ok(vertex) if (vertex as usize) < vertices => {
                corners.push(vertex);
                Ok(())
            }
            _ => Err(rows.fault(ReadProblem::IndexOutOfRange { face, index, vertices })),
        })?;
        if corners.len() == before {
            // A face list has no place for it; its values go with it.
            first_empty.get_or_insert(face);
            soup.empty_faces += 1;
            continue;
        }
        if corners.len() > MAX_DENSE_INDEX + 1 {
            let error = FaceListError::TooMany { what: "corners", count: corners.len() };
            return Err(rows.fault(error.into()));
        }
        ends.push(corners.len() as u32);
        columns.push(row.extras());
    }
    soup.faces = FaceListBuf::from_polygons(vertices, corners, ends)
        .map_err(|error| Fault::file(error.into()))?;
    soup.face_columns = columns.finish(&mut soup.notes);
    if let Some(first) = first_empty {
        let count = soup.empty_faces;
        soup.notes.push(Note::new(
            NoteKind::EmptyFaces,
            count,
            format!(
                "faces without a corner, counted as collapsed: {count}, the first in row {first}"
            ),
        ));
    }
    Ok(())
}

fn skip(rows: &mut Rows<'_>, element: &ElementDef, soup: &mut PolygonSoup) -> Result<(), Fault> {
    let parser = ply_rs_bw::parser::Parser::<SkippedRow>::new();
    while rows.next(&parser, element)?.is_some() {}
    soup.notes.push(Note::new(
        NoteKind::Skipped,
        element.count,
        format!(
            "element `{}` was read over: {} rows of {} properties",
            element.name,
            element.count,
            element.properties.len()
        ),
    ));
    Ok(())
}

#[cfg(test)]
mod tests;
