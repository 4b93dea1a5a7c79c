//! The median of a sample, and an interval it lies in.

use statrs::distribution::{Binomial, DiscreteCDF};

/// The median of some measurements with an interval that holds the true one in at least 95 of 100
/// cases.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Summary {
    /// The median: of an even number of values, the mean of the middle two.
    pub median: f64,
    /// The interval's lower end, one of the values.
    pub low: f64,
    /// The interval's upper end, one of the values.
    pub high: f64,
    /// How many values there were.
    pub count: usize,
}

/// The fewest values that bound their median with 95 % confidence: between the least and the
/// greatest of six it lies in 31 of 32 cases.
pub const FEWEST: usize = 6;

impl Summary {
    /// Sorts the values and sums them up; `None` without any. With fewer than [`FEWEST`] values the
    /// interval is as wide as they are, and holds the median less often.
    ///
    /// Nothing is assumed of how the values are distributed: as many of n independent values lie
    /// below the true median as n tosses of a coin give heads, so order statistics bound it
    /// (W. R. Thompson, *On confidence ranges for the median …*, Annals of Mathematical
    /// Statistics 7, 1936; from memory). O(n log n).
    ///
    /// ```
    /// use merestone_trial::statistics::Summary;
    /// let summary = Summary::of(&mut [9.0, 1.0, 2.0, 4.0, 3.0, 8.0, 7.0, 5.0, 6.0]).unwrap();
    /// assert_eq!((summary.low, summary.median, summary.high), (2.0, 5.0, 8.0));
    /// ```
    #[must_use]
    pub fn of(values: &mut [f64]) -> Option<Self> {
        values.sort_unstable_by(f64::total_cmp);
        let (&least, &greatest) = (values.first()?, values.last()?);
        let count = values.len();
        let median = f64::midpoint(values[(count - 1) / 2], values[count / 2]);
        let outside = values_outside(count);
        let low = values.get(outside).copied().unwrap_or(least);
        let high = values.get(count - 1 - outside).copied().unwrap_or(greatest);
        Some(Self { median, low, high, count })
    }
}

/// How many values may be left out at either end and the interval still holds the median with 95 %
/// confidence.
fn values_outside(count: usize) -> usize {
    let Ok(heads) = Binomial::new(0.5, count as u64) else { return 0 };
    // The interval from value k to value n − 1 − k misses where at most k heads fall, or tails.
    let misses = |outside: usize| heads.cdf(outside as u64);
    let (mut fits, mut too_many) = (0, count.div_ceil(2));
    while fits + 1 < too_many {
        let middle = usize::midpoint(fits, too_many);
        if misses(middle) <= 0.025 { fits = middle } else { too_many = middle }
    }
    fits
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::shapes::Random;

    #[test]
    fn medians_of_odd_and_even_samples() {
        assert_eq!(Summary::of(&mut []), None);
        let one = Summary::of(&mut [3.0]).unwrap();
        assert_eq!((one.low, one.median, one.high, one.count), (3.0, 3.0, 3.0, 1));
        assert_eq!(Summary::of(&mut [4.0, 1.0, 3.0, 2.0]).unwrap().median, 2.5);
        assert_eq!(Summary::of(&mut [5.0, 1.0, 3.0]).unwrap().median, 3.0);
    }

    #[test]
    fn ranks_are_those_of_published_tables() {
        // Ranks (from 1) of the 95 % interval of a median, as tables of the sign test print them:
        // n = 6: 1 and 6, 9: 2 and 8, 10: 2 and 9, 15: 4 and 12, 20: 6 and 15, 30: 10 and 21,
        // 50: 18 and 33, 100: 40 and 61; from memory.
        let ranks =
            [(6, 1), (8, 1), (9, 2), (10, 2), (15, 4), (20, 6), (30, 10), (50, 18), (100, 40)];
        for (count, rank) in ranks {
            let mut values: Vec<f64> = (1..=count).rev().map(f64::from).collect();
            let summary = Summary::of(&mut values).unwrap();
            let expected = (f64::from(rank), f64::from(count + 1 - rank));
            assert_eq!((summary.low, summary.high), expected, "{count} values");
        }
    }

    #[test]
    fn few_values_give_all_they_have() {
        for count in 2..FEWEST as i32 {
            let mut values: Vec<f64> = (0..count).map(f64::from).collect();
            let summary = Summary::of(&mut values).unwrap();
            assert_eq!((summary.low, summary.high), (0.0, f64::from(count - 1)));
        }
    }

    #[test]
    fn intervals_hold_the_median_of_a_skewed_distribution_as_often_as_they_say() {
        // Exponential waiting times: the median is ln 2. Coverage is at least 95 %; 2000 trials
        // fall below 93.5 % once in a thousand such tests, and this one always draws the same.
        let mut random = Random::new(11);
        let mut held = 0;
        for _ in 0..2000 {
            let mut values: Vec<f64> = (0..25).map(|_| -(1.0 - random.unit()).ln()).collect();
            let summary = Summary::of(&mut values).unwrap();
            let median = std::f64::consts::LN_2;
            held += u32::from(summary.low <= median && median <= summary.high);
        }
        // And not much more than they say: 25 values give 95.7 %.
        assert!((1870..=1960).contains(&held), "{held}");
    }
}
