//! Which kernel a mix of works is fastest on.

use crate::report::as_map;
use crate::units;
use crate::works::Work;
use serde::Serialize;

/// What one kernel takes for one round of the mix.
#[derive(Clone, Debug, PartialEq)]
pub struct Contender {
    /// The kernel's name.
    pub kernel: &'static str,
    /// What it holds on the heap.
    pub bytes: usize,
    /// Median times of each work of the mix, low end, median and high end, in nanoseconds, in the
    /// order of the mix.
    pub times: Vec<[f64; 3]>,
}

/// The answer.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Verdict {
    /// The kernel with the least total; `None` where none can do all of the mix.
    pub kernel: Option<&'static str>,
    /// Nanoseconds for one round of the mix, of every kernel that can do all of it, and of the bare
    /// arrays.
    #[serde(serialize_with = "as_map")]
    pub totals_ns: Vec<(&'static str, f64)>,
    /// Whether the kernel's interval lies below those of all other kernels.
    pub confident: bool,
    /// The same for people.
    pub sentence: String,
}

/// Low end, median and high end of a round.
///
/// The ends are the sums of the works' ends: wider than need be, since all medians would have to
/// lie at the same end at once, so never too sure.
fn total(contender: &Contender, mix: &[(Work, u64)]) -> [f64; 3] {
    let weigh = |k: usize| {
        contender.times.iter().zip(mix).map(|(time, &(_, count))| time[k] * count as f64).sum()
    };
    [weigh(0), weigh(1), weigh(2)]
}

/// Compares kernels by their totals for the mix. `bare` is told beside them, and never wins.
/// `excluded` are the kernels that cannot do all of the mix, with the reason.
#[must_use]
pub fn decide(
    kernels: &[Contender],
    bare: Option<&Contender>,
    excluded: &[(&'static str, String)],
    mix: &[(Work, u64)],
) -> Verdict {
    let mut ranked: Vec<(&Contender, [f64; 3])> =
        kernels.iter().map(|kernel| (kernel, total(kernel, mix))).collect();
    let with_bare = ranked.iter().copied().chain(bare.map(|bare| (bare, total(bare, mix))));
    let totals_ns = with_bare.map(|(kernel, total)| (kernel.kernel, rounded(total[1]))).collect();
    // Stable: of equal totals the first in the list of kernels.
    ranked.sort_by(|x, y| x.1[1].total_cmp(&y.1[1]));
    let best = ranked.first().copied();
    let rivals: Vec<_> = ranked
        .iter()
        .skip(1)
        .copied()
        .filter(|(_, total)| best.is_some_and(|(_, best)| total[0] <= best[2]))
        .collect();
    let confident = best.is_some() && rivals.is_empty();
    let mut sentence = match best {
        None => "No kernel that was tried can do all of the mix on this mesh.".to_owned(),
        Some(best) => answer(best, &rivals, &ranked[1..], mix),
    };
    if let (Some(bare), Some(_)) = (bare, best) {
        let time = units::time(total(bare, mix)[1]);
        sentence += &format!(" Arrays written for these works alone take {time}.");
    }
    for (kernel, reason) in excluded {
        sentence += &format!(" Left out is {kernel}: {reason}.");
    }
    Verdict { kernel: best.map(|(kernel, _)| kernel.kernel), totals_ns, confident, sentence }
}

/// To a thousandth of a nanosecond: more digits only make lines longer.
pub(crate) fn rounded(nanoseconds: f64) -> f64 {
    (nanoseconds * 1e3).round() / 1e3
}

type Ranked<'a> = (&'a Contender, [f64; 3]);

fn answer(
    (best, time): Ranked<'_>,
    rivals: &[Ranked<'_>],
    others: &[Ranked<'_>],
    mix: &[(Work, u64)],
) -> String {
    let mix: Vec<String> = mix.iter().map(|(work, count)| format!("{count} × {work}")).collect();
    let mix = mix.join(", ");
    let spent = units::time(time[1]);
    let Some(&(next, next_time)) = others.first() else {
        return format!("Only {} was measured: {spent} for {mix}.", best.kernel);
    };
    let memory = memory(best, others);
    if rivals.is_empty() {
        let ratio = units::three_digits(next_time[1] / time[1]);
        let slower = units::time(next_time[1]);
        return format!(
            "Fastest is {}: {spent} for {mix}; {} takes {slower}, {ratio} times as long.{memory}",
            best.kernel, next.kernel
        );
    }
    let tied: Vec<String> =
        rivals.iter().map(|(k, t)| format!("{} {}", k.kernel, units::time(t[1]))).collect();
    format!(
        "Time does not decide for {mix}: {} takes {spent}, {}, and the intervals overlap.{memory} \
         Measure longer (--seconds) for a sharper answer.",
        best.kernel,
        tied.join(", ")
    )
}

/// What is to be said of memory, where kernels differ in it by more than a hundredth.
fn memory(best: &Contender, others: &[Ranked<'_>]) -> String {
    let Some(least) = others.iter().map(|(kernel, _)| *kernel).min_by_key(|kernel| kernel.bytes)
    else {
        return String::new();
    };
    let (here, there) = (units::bytes(best.bytes), units::bytes(least.bytes));
    let (held, other) = (best.bytes as f64, least.bytes as f64);
    if held < 0.99 * other {
        format!(" It also holds the least memory, {here} against {there} of {}.", least.kernel)
    } else if other < 0.99 * held {
        format!(" Memory speaks for {}: {there} against {here} of {}.", least.kernel, best.kernel)
    } else {
        String::new()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const MIX: [(Work, u64); 2] = [(Work::Assemble, 1), (Work::Smooth, 10)];

    fn contender(kernel: &'static str, bytes: usize, times: [[f64; 3]; 2]) -> Contender {
        Contender { kernel, bytes, times: times.to_vec() }
    }

    #[test]
    fn the_mix_decides() {
        let a = contender("a", 100, [[1e6, 1.1e6, 1.2e6], [4e5, 5e5, 6e5]]);
        let b = contender("b", 300, [[9e6, 9e6, 9e6], [1e4, 1e4, 1e4]]);
        let verdict = decide(&[a.clone(), b.clone()], None, &[], &MIX);
        assert_eq!((verdict.kernel, verdict.confident), (Some("a"), true));
        assert_eq!(verdict.totals_ns, [("a", 6.1e6), ("b", 9.1e6)]);
        assert!(verdict.sentence.contains("6.10 ms for 1 × assemble, 10 × smooth"));
        assert!(verdict.sentence.contains("1.49 times as long"), "{}", verdict.sentence);
        assert!(verdict.sentence.contains("least memory, 100 B against 300 B of b"));
        let often = [(Work::Assemble, 1), (Work::Smooth, 1000)];
        let verdict = decide(&[a, b], None, &[], &often);
        assert_eq!(verdict.kernel, Some("b"));
        assert!(verdict.sentence.contains("Memory speaks for a"), "{}", verdict.sentence);
    }

    #[test]
    fn overlapping_intervals_are_not_decided() {
        let a = contender("a", 100, [[1.0, 2.0, 3.0], [0.0; 3]]);
        let b = contender("b", 100, [[2.9, 4.0, 5.0], [0.0; 3]]);
        let c = contender("c", 100, [[8.0, 9.0, 9.5], [0.0; 3]]);
        let verdict = decide(&[a.clone(), b, c.clone()], None, &[], &MIX);
        assert_eq!((verdict.kernel, verdict.confident), (Some("a"), false));
        assert!(verdict.sentence.contains("does not decide") && !verdict.sentence.contains("c 9"));
        assert!(!verdict.sentence.contains("emory"), "{}", verdict.sentence);
        assert!(decide(&[a, c], None, &[], &MIX).confident);
    }

    #[test]
    fn bare_never_wins_and_what_is_left_out_is_said() {
        let a = contender("a", 100, [[1e3; 3], [1e2; 3]]);
        let bare = contender("bare", 10, [[10.0; 3], [1.0; 3]]);
        let excluded = [("b", "face 3 has four corners".to_owned())];
        let verdict = decide(std::slice::from_ref(&a), Some(&bare), &excluded, &MIX);
        assert_eq!((verdict.kernel, verdict.confident), (Some("a"), true));
        assert_eq!(verdict.totals_ns, [("a", 2e3), ("bare", 20.0)]);
        assert!(verdict.sentence.starts_with("Only a was measured: 2.00 µs"));
        assert!(verdict.sentence.contains("alone take 20.0 ns"));
        assert!(verdict.sentence.contains("Left out is b: face 3 has four corners."));
        let none = decide(&[], Some(&bare), &excluded, &MIX);
        assert_eq!((none.kernel, none.confident), (None, false));
    }
}
