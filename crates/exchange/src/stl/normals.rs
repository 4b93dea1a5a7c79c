//! Facet normals, which say nothing that the corners do not: compared, counted and noted.

use merestone_geometry::{Note, NoteKind};

/// Counts of facet normals that are not what the corners say.
#[derive(Debug, Default)]
pub(super) struct NormalTally {
    missing: Count,
    invalid: Count,
    wrong: Count,
}

#[derive(Debug, Default)]
struct Count {
    count: usize,
    first: usize,
}

impl Count {
    fn add(&mut self, facet: usize) {
        if self.count == 0 {
            self.first = facet;
        }
        self.count += 1;
    }
}

impl NormalTally {
    pub(super) fn missing(&mut self, facet: usize) {
        self.missing.add(facet);
    }

    /// Compares a normal with the corners'. Wrong is more than 60° off: far beyond what rounding
    /// does to any but the thinnest facets.
    #[inline]
    pub(super) fn compare(&mut self, facet: usize, normal: [f64; 3], corners: [[f64; 3]; 3]) {
        let [a, b, c] = corners;
        let (u, v) = (sub(b, a), sub(c, a));
        let cross =
            [u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]];
        let (along, lengths) = (dot(cross, normal), dot(cross, cross) * dot(normal, normal));
        if along > 0.0 && along * along >= 0.25 * lengths {
            return;
        }
        self.explain(facet, normal, lengths);
    }

    #[cold]
    fn explain(&mut self, facet: usize, normal: [f64; 3], lengths: f64) {
        if normal.iter().any(|x| !x.is_finite()) {
            self.invalid.add(facet);
        } else if normal == [0.0; 3] {
            self.missing.add(facet);
        } else if lengths > 0.0 {
            // A facet of no area has no normal to differ from.
            self.wrong.add(facet);
        }
    }

    pub(super) fn notes(self) -> impl Iterator<Item = Note> {
        let note = |kind, count: Count, what: &str| {
            let Count { count, first } = count;
            let message = format!(
                "facet normals that {what}: {count}, the first at facet {first}; normals are taken from the corners"
            );
            (count > 0).then(|| Note::new(kind, count, message))
        };
        [
            note(NoteKind::MissingNormal, self.missing, "are missing or zero"),
            note(NoteKind::InvalidNormal, self.invalid, "are not finite numbers"),
            note(NoteKind::WrongNormal, self.wrong, "point more than 60° off their facets"),
        ]
        .into_iter()
        .flatten()
    }
}

fn sub(a: [f64; 3], b: [f64; 3]) -> [f64; 3] {
    [a[0] - b[0], a[1] - b[1], a[2] - b[2]]
}

fn dot(a: [f64; 3], b: [f64; 3]) -> f64 {
    a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
}
