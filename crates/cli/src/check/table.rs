//! The answer for people.

use super::{Checked, verdict};
use clap::builder::styling::{AnsiColor, Style};
use merestone::exchange::Encoding;
use merestone::geometry::{DefectKind, MeshReport};
use std::io::{self, Write};

const HEADING: Style = Style::new().bold();
const GOOD: Style = AnsiColor::Green.on_default().bold();
const BAD: Style = AnsiColor::Red.on_default().bold();
const QUIET: Style = Style::new().dimmed();
const PLAIN: Style = Style::new();

/// Characters for a name, and for a value behind it.
const NAME: usize = 21;
const VALUE: usize = 11;
const WIDTH: usize = NAME + VALUE;
/// Characters between columns.
const GAP: usize = 6;

/// One line of a column: a name, what is there, and how to show it.
struct Row {
    name: &'static str,
    value: String,
    style: Style,
}

pub(super) fn write(
    out: &mut impl Write,
    name: &str,
    checked: &Checked,
    limit: usize,
) -> io::Result<()> {
    let report = &checked.report;
    let style = if report.is_sound() { GOOD } else { BAD };
    let sentence = verdict::sentence(report);
    let encoding = match checked.encoding {
        Encoding::Text => "text",
        Encoding::LittleEndian | Encoding::BigEndian => "binary",
    };
    let format = checked.format.ending().to_uppercase();
    writeln!(out, "{HEADING}{name}{HEADING:#} {QUIET}({format}, {encoding}){QUIET:#}")?;
    writeln!(out, "{style}{sentence}{style:#}")?;
    writeln!(out)?;
    side_by_side(out, &cells(report), &joints(report))?;
    writeln!(out)?;
    side_by_side(out, &whole(report), &faces(report))?;
    defects(out, report, limit)
}

fn cells(report: &MeshReport) -> Vec<Row> {
    let survey = &report.survey;
    vec![
        heading("Cells"),
        plain("vertices", survey.vertices),
        plain("edges", survey.edges),
        plain("faces", survey.faces),
        plain("inner loops", survey.inner_loops),
        plain("isolated vertices", survey.isolated_vertices),
    ]
}

fn joints(report: &MeshReport) -> Vec<Row> {
    let survey = &report.survey;
    vec![
        heading("Joints"),
        fault("boundary edges", survey.boundary_edges, !report.open),
        fault("boundary loops", survey.boundary_loops, !report.open),
        fault("non-manifold edges", survey.non_manifold_edges, true),
        fault("non-manifold vertices", survey.non_manifold_vertices, true),
        fault("misoriented edges", survey.misoriented_edges, true),
        fault(
            "unbalanced edges",
            survey.unbalanced_edges,
            report.defect_count(DefectKind::UnbalancedEdges) > 0,
        ),
    ]
}

fn whole(report: &MeshReport) -> Vec<Row> {
    let survey = &report.survey;
    let or_none = |value: Option<String>| value.unwrap_or_else(|| "none".to_owned());
    let yes =
        |name, is| Row { name, value: if is { "yes" } else { "no" }.to_owned(), style: PLAIN };
    vec![
        heading("Whole"),
        yes("closed", survey.is_closed()),
        yes("manifold", survey.is_manifold()),
        yes("oriented", survey.is_oriented()),
        yes("orientable", survey.orientable),
        plain("components", survey.components),
        plain("joined at vertices", survey.vertex_components),
        plain("closed shells", survey.shells),
        Row {
            name: "Euler characteristic",
            value: survey.euler_characteristic().to_string(),
            style: PLAIN,
        },
        Row { name: "genus", value: or_none(survey.genus().map(|g| g.to_string())), style: PLAIN },
        Row { name: "area", value: measure(report.area), style: PLAIN },
        Row { name: "volume", value: or_none(report.volume.map(measure)), style: PLAIN },
    ]
}

fn faces(report: &MeshReport) -> Vec<Row> {
    vec![
        heading("Faces"),
        fault("collapsed", report.collapsed_faces, true),
        fault("without area", report.zero_area_faces, true),
        fault("duplicate", report.duplicate_faces, true),
        fault("not flat", report.non_planar_faces, true),
    ]
}

fn heading(name: &'static str) -> Row {
    Row { name, value: String::new(), style: HEADING }
}

fn plain(name: &'static str, count: usize) -> Row {
    Row { name, value: grouped(count), style: PLAIN }
}

/// A count that should be nought.
fn fault(name: &'static str, count: usize, is_defect: bool) -> Row {
    let style = match count {
        0 => QUIET,
        _ if is_defect => BAD,
        _ => PLAIN,
    };
    Row { name, value: grouped(count), style }
}

fn side_by_side(out: &mut impl Write, left: &[Row], right: &[Row]) -> io::Result<()> {
    for line in 0..left.len().max(right.len()) {
        write!(out, "  ")?;
        match (left.get(line), right.get(line)) {
            (Some(left), Some(right)) => {
                column(out, left)?;
                // A heading ends where its word does.
                let gap = if left.value.is_empty() { WIDTH - left.name.len() } else { 0 };
                write!(out, "{:1$}", "", gap + GAP)?;
                column(out, right)?;
            }
            (Some(left), None) => column(out, left)?,
            (None, Some(right)) => {
                write!(out, "{:1$}", "", WIDTH + GAP)?;
                column(out, right)?;
            }
            (None, None) => {}
        }
        writeln!(out)?;
    }
    Ok(())
}

fn column(out: &mut impl Write, Row { name, value, style }: &Row) -> io::Result<()> {
    if value.is_empty() {
        return write!(out, "{style}{name}{style:#}");
    }
    write!(out, "{style}{name:NAME$}{value:>VALUE$}{style:#}")
}

fn defects(out: &mut impl Write, report: &MeshReport, limit: usize) -> io::Result<()> {
    // Whether an edge is balanced is said with each boundary, misoriented and non-manifold edge.
    let told = DefectKind::ALL.into_iter().filter(|&kind| kind != DefectKind::UnbalancedEdges);
    for kind in told {
        let count = report.defect_count(kind);
        if count == 0 || limit == 0 {
            continue;
        }
        writeln!(out)?;
        write!(out, "  {BAD}{}{BAD:#}", kind.counted(count))?;
        let of_kind = report.defects.iter().filter(|defect| defect.kind == kind);
        let listed = of_kind.clone().count();
        if listed < count {
            let first = if listed == 1 { String::new() } else { format!(" {listed}") };
            write!(out, "{QUIET}, the first{first} (--limit {count} lists all){QUIET:#}")?;
        }
        writeln!(out)?;
        for defect in of_kind {
            let [x, y, z] = defect.at.map(place);
            writeln!(out, "    at ({x}, {y}, {z}): {}", defect.message)?;
        }
    }
    Ok(())
}

/// A count with its thousands apart.
fn grouped(count: usize) -> String {
    let digits = count.to_string();
    let mut text = String::with_capacity(digits.len() * 4 / 3);
    for (i, digit) in digits.chars().enumerate() {
        if i > 0 && (digits.len() - i).is_multiple_of(3) {
            text.push(' ');
        }
        text.push(digit);
    }
    text
}

/// A measure with seven significant digits, in few characters.
fn measure(value: f64) -> String {
    significant(value, 7)
}

/// A coordinate, near enough to find it.
fn place(value: f64) -> String {
    significant(value, 6)
}

fn significant(value: f64, digits: usize) -> String {
    let magnitude = value.abs();
    if value == 0.0 {
        return "0".to_owned();
    }
    if !(1e-4..1e7).contains(&magnitude) {
        let text = format!("{value:.*e}", digits - 1);
        let (mantissa, exponent) = text.split_once('e').unwrap_or((&text, "0"));
        return format!("{}e{exponent}", without_trailing_zeros(mantissa));
    }
    let before_point = magnitude.log10().floor() as i32 + 1;
    let decimals = (digits as i32 - before_point).max(0) as usize;
    without_trailing_zeros(&format!("{value:.decimals$}")).to_owned()
}

fn without_trailing_zeros(text: &str) -> &str {
    if text.contains('.') { text.trim_end_matches('0').trim_end_matches('.') } else { text }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_are_short_and_right() {
        for (value, text) in [
            (0.0, "0"),
            (-0.5, "-0.5"),
            (12.25, "12.25"),
            (1_000_000.0, "1000000"),
            (1.343_597_877e-5, "1.343598e-5"),
            (7.03e28, "7.03e28"),
            (0.166_666_666_7, "0.1666667"),
            (9_999_999.96, "10000000"),
        ] {
            assert_eq!(significant(value, 7), text);
        }
        assert_eq!(grouped(0), "0");
        assert_eq!(grouped(999), "999");
        assert_eq!(grouped(1_310_720), "1 310 720");
    }
}
