//! The answer for other programs: one compact object a file.

use super::{Checked, verdict};
use merestone::geometry::{DefectCell, MeshDefect};
use serde::Serialize;
use std::io::{self, Write};

#[derive(Serialize)]
struct Answer<'a> {
    file: &'a str,
    format: &'static str,
    verdict: String,
    sound: bool,
    vertices: usize,
    edges: usize,
    faces: usize,
    inner_loops: usize,
    isolated_vertices: usize,
    collapsed_faces: usize,
    zero_area_faces: usize,
    degenerate_faces: usize,
    duplicate_faces: usize,
    components: usize,
    vertex_components: usize,
    boundary_edges: usize,
    boundary_loops: usize,
    non_manifold_edges: usize,
    misoriented_edges: usize,
    unbalanced_edges: usize,
    non_manifold_vertices: usize,
    non_planar_faces: usize,
    euler_characteristic: i64,
    genus: Option<i64>,
    manifold: bool,
    closed: bool,
    oriented: bool,
    orientable: bool,
    shells: usize,
    solids: Option<usize>,
    voids: Option<usize>,
    area: f64,
    volume: Option<f64>,
    inside_out_components: Option<usize>,
    defects: Vec<Defect<'a>>,
    notes: Vec<Note<'a>>,
}

#[derive(Serialize)]
struct Defect<'a> {
    kind: &'static str,
    at: [f64; 3],
    cells: Vec<Cell>,
    message: &'a str,
}

#[derive(Serialize)]
#[serde(rename_all = "snake_case")]
enum Cell {
    Vertex(usize),
    Edge([usize; 2]),
    Face(usize),
}

#[derive(Serialize)]
struct Note<'a> {
    count: usize,
    message: &'a str,
}

#[derive(Serialize)]
struct Refusal<'a> {
    file: &'a str,
    error: &'a str,
}

pub(super) fn write(out: &mut impl Write, file: &str, checked: &Checked) -> io::Result<()> {
    let report = &checked.report;
    let survey = &report.survey;
    let notes = checked.notes.iter();
    line(
        out,
        &Answer {
            file,
            format: checked.format.ending(),
            verdict: verdict::sentence(report),
            sound: report.is_sound(),
            vertices: survey.vertices,
            edges: survey.edges,
            faces: survey.faces,
            inner_loops: survey.inner_loops,
            isolated_vertices: survey.isolated_vertices,
            collapsed_faces: report.collapsed_faces,
            zero_area_faces: report.zero_area_faces,
            degenerate_faces: report.degenerate_faces(),
            duplicate_faces: report.duplicate_faces,
            components: survey.components,
            vertex_components: survey.vertex_components,
            boundary_edges: survey.boundary_edges,
            boundary_loops: survey.boundary_loops,
            non_manifold_edges: survey.non_manifold_edges,
            misoriented_edges: survey.misoriented_edges,
            unbalanced_edges: survey.unbalanced_edges,
            non_manifold_vertices: survey.non_manifold_vertices,
            non_planar_faces: report.non_planar_faces,
            euler_characteristic: survey.euler_characteristic(),
            genus: survey.genus(),
            manifold: survey.is_manifold(),
            closed: survey.is_closed(),
            oriented: survey.is_oriented(),
            orientable: survey.orientable,
            shells: survey.shells,
            solids: report.solids,
            voids: report.voids,
            area: report.area,
            volume: report.volume,
            inside_out_components: report.inside_out_components,
            defects: report.defects.iter().map(defect).collect(),
            notes: notes.map(|note| Note { count: note.count, message: &note.message }).collect(),
        },
    )
}

pub(super) fn write_error(out: &mut impl Write, file: &str, error: &str) -> io::Result<()> {
    line(out, &Refusal { file, error })
}

fn line(out: &mut impl Write, object: &impl Serialize) -> io::Result<()> {
    serde_json::to_writer(&mut *out, object)?;
    writeln!(out)
}

fn defect(defect: &MeshDefect) -> Defect<'_> {
    let cell = |cell: &DefectCell| match *cell {
        DefectCell::Vertex(v) => Cell::Vertex(v),
        DefectCell::Edge(ends) => Cell::Edge(ends),
        DefectCell::Face(f) => Cell::Face(f),
    };
    Defect {
        kind: defect.kind.key(),
        at: defect.at,
        cells: defect.cells.iter().map(cell).collect(),
        message: &defect.message,
    }
}
