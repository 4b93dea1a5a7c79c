//! What it comes to, in a sentence.

use super::Checked;
use merestone::geometry::{DefectKind, MeshReport};

/// What stands between a mesh and the boundary of a solid, seen as topology.
const DECISIVE: [DefectKind; 4] = [
    DefectKind::BoundaryEdges,
    DefectKind::NonManifoldEdges,
    DefectKind::MisorientedEdges,
    DefectKind::NonManifoldVertices,
];

/// What mars a boundary without opening it.
const FLAWS: [DefectKind; 4] = [
    DefectKind::CollapsedFaces,
    DefectKind::ZeroAreaFaces,
    DefectKind::DuplicateFaces,
    DefectKind::NonPlanarFaces,
];

/// The verdict, as what is to be said of the file.
pub(super) fn sentence(report: &MeshReport) -> String {
    if report.survey.faces == 0 {
        let what = if report.open { "is no sheet" } else { "does not bound a solid" };
        return format!("{what}: there are no faces");
    }
    let mut flaws = counted(report, &FLAWS);
    if report.is_inside_out() {
        flaws.insert(0, "faces that point inward (the volume is negative)".to_owned());
    }
    let decisive = counted(report, &DECISIVE);
    let name = if report.is_solid_boundary() {
        solid(report)
    } else if report.open {
        if !decisive.is_empty() {
            return format!("is no sound sheet: {}", listed(&decisive));
        }
        sheet(report)
    } else {
        return format!("does not bound a solid: {}", listed(&decisive));
    };
    if flaws.is_empty() { name } else { format!("{name}, but has {}", listed(&flaws)) }
}

fn solid(report: &MeshReport) -> String {
    let genus = report.survey.genus().unwrap_or(0);
    match report.survey.shells {
        1 => format!("bounds a solid of genus {genus}"),
        shells => format!("bounds solids: {shells} closed shells, genus {genus} in all"),
    }
}

fn sheet(report: &MeshReport) -> String {
    format!("is an open sheet with {}", loops(report.survey.boundary_loops))
}

fn loops(count: usize) -> String {
    format!("{count} boundary {}", if count == 1 { "loop" } else { "loops" })
}

fn counted(report: &MeshReport, kinds: &[DefectKind]) -> Vec<String> {
    let counts = kinds.iter().map(|&kind| (kind, report.defect_count(kind)));
    counts
        .filter(|&(_, count)| count > 0)
        .map(|(kind, count)| match kind {
            DefectKind::BoundaryEdges => {
                format!("{} in {}", kind.counted(count), loops(report.survey.boundary_loops))
            }
            DefectKind::MisorientedEdges if !report.survey.orientable => {
                format!("{} that no turning of faces can mend", kind.counted(count))
            }
            _ => kind.counted(count),
        })
        .collect()
}

fn listed(items: &[String]) -> String {
    match items {
        [] => String::new(),
        [one] => one.clone(),
        [most @ .., last] => format!("{} and {last}", most.join(", ")),
    }
}

/// What is worth a warning: the reader's notes, and what the counts do not show by themselves.
pub(super) fn warnings(checked: &Checked) -> Vec<String> {
    let report = &checked.report;
    let mut warnings: Vec<String> = checked.notes.iter().map(ToString::to_string).collect();
    if report.collapsed_faces > 0 {
        warnings.push(format!(
            "left out {}",
            DefectKind::CollapsedFaces.counted(report.collapsed_faces)
        ));
    }
    match report.survey.isolated_vertices {
        0 => {}
        1 => warnings.push("1 vertex is used by no face and was left out".to_owned()),
        count => warnings.push(format!("{count} vertices are used by no face and were left out")),
    }
    if let Some([x, y, z]) = report.turns_over_at {
        warnings.push(format!(
            "the surface comes back on its other side near {x}, {y}, {z}, so no choice of orientation fits"
        ));
    }
    if report.is_inside_out() {
        warnings.push("the volume is negative, so faces point inward; turn them around".to_owned());
    }
    if !report.area.is_finite() {
        warnings.push("the area is beyond what a double can hold; scale the model".to_owned());
    }
    warnings
}
