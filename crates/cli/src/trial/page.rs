//! A trial's findings for people.

use crate::table::{Align, Table};
use merestone_trial::units::{bytes, grouped, three_digits, time};
use merestone_trial::{MeshCounts, Outcome, Report};
use std::fmt::Write as _;
use std::io::Write as _;

/// Prints the mesh, the tables and the verdict; bold only on a terminal.
pub(super) fn print(report: &Report) -> std::io::Result<()> {
    anstream::stdout().lock().write_all(page(report).as_bytes())
}

fn page(report: &Report) -> String {
    let mut page = String::new();
    let bold = |text: &str| format!("\x1b[1m{text}\x1b[0m");
    let _ = writeln!(page, "{}  {}", bold(&report.mesh.file), mesh(&report.mesh));
    let _ = writeln!(page, "{}\n", machine(report));
    let _ = writeln!(page, "{}\n", times(report));
    let _ = writeln!(page, "{}\n", memory(report));
    for held in &report.kernels {
        if let Some(note) = &held.note {
            let _ = writeln!(page, "{}: {note}.", held.kernel);
        }
    }
    if let Some(disagreement) = &report.disagreement {
        let _ = writeln!(page, "{} {disagreement}\n", bold("Wrong results."));
    } else {
        let _ =
            writeln!(page, "All results agree with those of the bare arrays, value by value.\n");
    }
    let _ = writeln!(page, "{}", bold(&report.verdict.sentence));
    page
}

fn mesh(mesh: &MeshCounts) -> String {
    let count = |number: usize, one: &str, many: &str| {
        format!("{} {}", grouped(number as u64), if number == 1 { one } else { many })
    };
    let mut parts = vec![
        count(mesh.faces, "face", "faces"),
        count(mesh.edges, "edge", "edges"),
        count(mesh.vertices, "vertex", "vertices"),
        count(mesh.components, "component", "components"),
    ];
    parts.push(if mesh.closed {
        "closed".to_owned()
    } else {
        count(mesh.boundary_edges, "boundary edge", "boundary edges")
    });
    let odd = mesh.non_manifold_edges + mesh.non_manifold_vertices;
    parts.push(if mesh.manifold {
        "manifold".to_owned()
    } else {
        count(odd, "non-manifold place", "non-manifold places")
    });
    if mesh.misoriented_edges > 0 {
        parts.push(count(mesh.misoriented_edges, "misoriented edge", "misoriented edges"));
    }
    if let Some(genus) = mesh.genus {
        parts.push(format!("genus {genus}"));
    }
    parts.join(", ")
}

fn machine(report: &Report) -> String {
    let machine = &report.machine;
    let mut line = machine.processor.clone().unwrap_or_else(|| "processor unknown".to_owned());
    let cores = if machine.cores == 1 { "core" } else { "cores" };
    let _ = write!(line, ", {} {cores}, {} thread used", machine.cores, machine.threads);
    if let Some(compiler) = machine.compiler {
        let _ = write!(line, "; {compiler}");
    }
    if !machine.optimized {
        line += ", debug build: figures say nothing";
    }
    line
}

/// One row for each kernel under each work; ratios are to the bare arrays of the same work.
fn times(report: &Report) -> Table {
    let mut table = Table::new(&[
        ("work", Align::Left),
        ("kernel", Align::Left),
        ("median", Align::Right),
        ("95 % interval", Align::Right),
        ("ns per element", Align::Right),
        ("× bare", Align::Right),
    ]);
    for (group, rows) in report.results.chunk_by(|x, y| x.work == y.work).enumerate() {
        if group > 0 {
            table.gap();
        }
        let bare = rows.iter().find(|row| row.kernel == "bare").and_then(|row| row.median_ns);
        for (i, row) in rows.iter().enumerate() {
            let label = match i {
                0 => row.work.to_owned(),
                1 => format!("  {} {}", grouped(row.elements as u64), elements(row.work)),
                _ => String::new(),
            };
            table.row(cells(label, row, bare));
        }
    }
    table
}

fn elements(work: &str) -> &'static str {
    if work == "smooth" { "vertices" } else { "faces" }
}

fn cells(label: String, row: &Outcome, bare: Option<f64>) -> Vec<String> {
    let Some(median) = row.median_ns else {
        let none = || "–".to_owned();
        return vec![label, row.kernel.to_owned(), "cannot".to_owned(), none(), none(), none()];
    };
    let ends = row.low_ns.zip(row.high_ns);
    let interval = ends.map(|(low, high)| format!("{} – {}", time(low), time(high)));
    let ratio = bare.filter(|bare| *bare > 0.0).map(|bare| format!("{:.2}", median / bare));
    vec![
        label,
        row.kernel.to_owned(),
        time(median),
        interval.unwrap_or_default(),
        row.ns_per_element.map(three_digits).unwrap_or_default(),
        ratio.unwrap_or_default(),
    ]
}

fn memory(report: &Report) -> Table {
    let mut table = Table::new(&[
        ("kernel", Align::Left),
        ("memory", Align::Right),
        ("bytes per face", Align::Right),
        ("while assembling", Align::Right),
    ]);
    for held in &report.kernels {
        let or_dash = |text: Option<String>| text.unwrap_or_else(|| "–".to_owned());
        table.row(vec![
            held.kernel.to_owned(),
            or_dash(held.bytes.map(bytes)),
            or_dash(held.bytes_per_face.map(|each| format!("{each:.1}"))),
            or_dash(held.assembly_peak.map(bytes)),
        ]);
    }
    table
}
