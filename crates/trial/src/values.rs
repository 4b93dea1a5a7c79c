//! The results of a work as plain numbers, and how two lists of them are compared.

/// What the numbers of a work stand for, to name the place where two results part.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Cells {
    /// Three numbers a vertex.
    VertexVectors,
    /// Three numbers a face.
    FaceVectors,
    /// One number a face, then how many different ones there are.
    FaceLabels,
    /// One number a corner of the face list, then counts of edges.
    Corners {
        /// What is counted, in order.
        counts: &'static [&'static str],
    },
}

/// The results of a work: numbers in the order of the file's cells, the same on every kernel.
#[derive(Clone, Debug, PartialEq)]
pub struct Values {
    /// The numbers.
    pub numbers: Vec<f64>,
    /// What they stand for.
    pub cells: Cells,
    /// The size that differences are judged by: the mesh's for lengths, 1 for unit vectors and
    /// counts, which have no unit of length.
    pub scale: f64,
}

/// Relative to the scale, how far two results may lie apart.
pub const TOLERANCE: f64 = 1e-9;

/// The first place where two results part.
#[derive(Clone, Debug, PartialEq)]
pub struct Difference {
    /// Which cell, and which of its numbers.
    pub cell: String,
    /// What was found there; `None` where the list ends before.
    pub found: Option<f64>,
    /// What the bare arrays gave.
    pub expected: Option<f64>,
}

impl Values {
    /// The first place where these numbers and the expected ones lie farther apart than
    /// [`TOLERANCE`] × scale, if there is one. O(numbers).
    #[must_use]
    pub fn first_difference(&self, expected: &Self) -> Option<Difference> {
        let tolerance = TOLERANCE * expected.scale;
        let agree =
            |x: f64, y: f64| x == y || (x - y).abs() <= tolerance || x.is_nan() && y.is_nan();
        let (found, wanted) = (&self.numbers, &expected.numbers);
        let place = found
            .iter()
            .zip(wanted)
            .position(|(&x, &y)| !agree(x, y))
            .or_else(|| (found.len() != wanted.len()).then(|| found.len().min(wanted.len())))?;
        let (found, expected_number) = (found.get(place).copied(), wanted.get(place).copied());
        Some(Difference { cell: expected.cell(place), found, expected: expected_number })
    }

    /// The wrapping sum of floor(x / q + 0.381966) over all numbers, where q is 1e-6 × scale.
    ///
    /// Rounding does not show in it unless a number lies by chance within rounding of a step; that
    /// no simple fraction is one is what the odd summand is for.
    #[must_use]
    pub fn checksum(&self) -> i64 {
        let step = 1e-6 * self.scale;
        // The cast saturates, and makes 0 of NaN: the same on every machine.
        let count = |x: f64| (x / step + 0.381_966).floor() as i64;
        self.numbers.iter().fold(0, |sum: i64, &x| sum.wrapping_add(count(x)))
    }

    /// The name of the cell that number `place` belongs to.
    fn cell(&self, place: usize) -> String {
        let axis = ['x', 'y', 'z'][place % 3];
        let last = self.numbers.len().saturating_sub(1);
        match self.cells {
            Cells::VertexVectors => format!("vertex {}, {axis}", place / 3),
            Cells::FaceVectors => format!("face {}, {axis}", place / 3),
            Cells::FaceLabels if place == last => "the number of components".to_owned(),
            Cells::FaceLabels => format!("face {place}"),
            Cells::Corners { counts } => {
                let corners = self.numbers.len().saturating_sub(counts.len());
                match place.checked_sub(corners).and_then(|count| counts.get(count)) {
                    Some(count) => format!("the number of {count}"),
                    None => format!("corner {place} of the face list"),
                }
            }
        }
    }
}

/// Vectors as one list of numbers.
#[must_use]
pub(crate) fn flattened(vectors: &[[f64; 3]]) -> Vec<f64> {
    vectors.as_flattened().to_vec()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn values(numbers: &[f64], cells: Cells, scale: f64) -> Values {
        Values { numbers: numbers.to_vec(), cells, scale }
    }

    #[test]
    fn the_first_difference_beyond_the_tolerance_is_named() {
        let expected = values(&[0.0; 9], Cells::VertexVectors, 100.0);
        let mut found = expected.clone();
        found.numbers[3] = 0.9e-7;
        assert_eq!(found.first_difference(&expected), None);
        found.numbers[5] = 1.1e-7;
        found.numbers[8] = 5.0;
        let difference = found.first_difference(&expected).unwrap();
        assert_eq!(difference.cell, "vertex 1, z");
        assert_eq!((difference.found, difference.expected), (Some(1.1e-7), Some(0.0)));
        found.numbers[0] = f64::NAN;
        assert_eq!(found.first_difference(&expected).unwrap().cell, "vertex 0, x");
    }

    #[test]
    fn missing_numbers_and_counts_are_differences() {
        let expected = values(&[0.0, 1.0, 2.0], Cells::FaceLabels, 1.0);
        let short = values(&[0.0, 1.0], Cells::FaceLabels, 1.0);
        let difference = short.first_difference(&expected).unwrap();
        assert_eq!((&difference.cell[..], difference.found), ("the number of components", None));
        let cells = Cells::Corners { counts: &["edges", "boundary edges"] };
        let expected = values(&[5.0, 6.0, 2.0, 1.0], cells, 1.0);
        for (place, name) in [
            (0, "corner 0 of the face list"),
            (2, "the number of edges"),
            (3, "the number of boundary edges"),
        ] {
            let mut found = expected.clone();
            found.numbers[place] += 1.0;
            assert_eq!(found.first_difference(&expected).unwrap().cell, name);
        }
    }

    #[test]
    fn checksums_by_hand() {
        // q is 1e-5: 2.5 q + 0.38 → 2, −1 q + 0.38 → −1, 0.7 q + 0.38 → 1.
        let by_hand = values(&[2.5e-5, -1e-5, 0.7e-5], Cells::FaceVectors, 10.0);
        assert_eq!(by_hand.checksum(), 2);
        // The same numbers up to rounding have the same sum.
        let third = values(&[0.1 + 0.2, 0.6, 0.3], Cells::FaceVectors, 1.0);
        let other = values(&[0.3, 0.1 + 0.5, 0.1 + 0.1 + 0.1], Cells::FaceVectors, 1.0);
        assert_eq!(third.checksum(), other.checksum());
        assert_eq!(
            values(&[f64::INFINITY, f64::NAN, 1.0], Cells::FaceVectors, 1.0).checksum(),
            i64::MAX.wrapping_add(1_000_000)
        );
    }
}
