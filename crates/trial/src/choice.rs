//! From words to kernels and works.

use crate::kernels::{BARE, KERNELS, Kernel, PLANNED};
use crate::works::Work;

/// A word that names no kernel or work, or names one in a way that makes no sense.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum ChoiceError {
    /// A name that will come.
    #[error("the {kind} `{name}` is not built yet; available are {available}")]
    NotBuilt {
        /// Kernel or work.
        kind: &'static str,
        /// The name as given.
        name: String,
        /// What may stand there.
        available: String,
    },
    /// A name that is none.
    #[error("there is no {kind} `{name}`; available are {available}")]
    Unknown {
        /// Kernel or work.
        kind: &'static str,
        /// The name as given.
        name: String,
        /// What may stand there.
        available: String,
    },
    /// A name given twice.
    #[error("the {kind} `{name}` is named twice; name it once{advice}")]
    Twice {
        /// Kernel or work.
        kind: &'static str,
        /// The name as given.
        name: String,
        /// What to do instead.
        advice: &'static str,
    },
    /// A count that is none.
    #[error(
        "`{count}` is no count for the work `{work}`: give a whole number from 1 to 1000000000, \
         as in `{work}=20`, or leave the work out"
    )]
    Count {
        /// The work's name.
        work: &'static str,
        /// The count as given.
        count: String,
    },
}

/// Works that there will be.
const PLANNED_WORKS: [&str; 8] = [
    "vertex-normals",
    "boundary",
    "relations",
    "flip",
    "collapse",
    "subdivide",
    "extrude",
    "convert",
];

/// The largest count: totals stay far from where nanoseconds lose digits.
const LARGEST_COUNT: u64 = 1_000_000_000;

/// The kernels of these names, in the order of [`KERNELS`]; all of them where none is named. The
/// yardstick `bare` is always measured, so naming it changes nothing.
///
/// # Errors
/// [`ChoiceError`] where a name is unknown, not built yet, or given twice.
pub fn kernels_named<S: AsRef<str>>(names: &[S]) -> Result<Vec<Kernel>, ChoiceError> {
    if names.is_empty() {
        return Ok(KERNELS.to_vec());
    }
    let available = KERNELS.iter().map(Kernel::name).chain([BARE]).collect::<Vec<_>>().join(", ");
    for (i, name) in names.iter().enumerate() {
        let name = name.as_ref().trim();
        if names[..i].iter().any(|other| other.as_ref().trim() == name) {
            return Err(ChoiceError::Twice { kind: "kernel", name: name.to_owned(), advice: "" });
        }
        let is_known = name == BARE || KERNELS.iter().any(|kernel| kernel.name() == name);
        if !is_known {
            return Err(unknown("kernel", name, available, PLANNED.contains(&name)));
        }
    }
    let is_named =
        |kernel: &&Kernel| names.iter().any(|name| name.as_ref().trim() == kernel.name());
    Ok(KERNELS.iter().filter(is_named).copied().collect())
}

/// The works of these words, each `NAME` or `NAME=COUNT`, in the order given; every work once
/// where there is no word.
///
/// ```
/// use merestone_trial::{mix_named, works::Work};
/// let mix = mix_named(&["smooth=20", "assemble"])?;
/// assert_eq!(mix, [(Work::Smooth, 20), (Work::Assemble, 1)]);
/// # Ok::<(), merestone_trial::ChoiceError>(())
/// ```
///
/// # Errors
/// [`ChoiceError`] where a name is unknown, not built yet or given twice, or a count is none.
pub fn mix_named<S: AsRef<str>>(words: &[S]) -> Result<Vec<(Work, u64)>, ChoiceError> {
    if words.is_empty() {
        return Ok(Work::ALL.map(|work| (work, 1)).to_vec());
    }
    let mut mix: Vec<(Work, u64)> = Vec::with_capacity(words.len());
    for word in words {
        let (name, count) = match word.as_ref().split_once('=') {
            Some((name, count)) => (name.trim(), Some(count.trim())),
            None => (word.as_ref().trim(), None),
        };
        let Some(work) = Work::ALL.into_iter().find(|work| work.name() == name) else {
            let available = Work::ALL.map(Work::name).join(", ");
            return Err(unknown("work", name, available, PLANNED_WORKS.contains(&name)));
        };
        if mix.iter().any(|&(other, _)| other == work) {
            let advice = ", with a count: NAME=COUNT";
            return Err(ChoiceError::Twice { kind: "work", name: name.to_owned(), advice });
        }
        let count = match count {
            None => 1,
            Some(count) => count
                .parse()
                .ok()
                .filter(|number| (1..=LARGEST_COUNT).contains(number))
                .ok_or_else(|| ChoiceError::Count { work: work.name(), count: count.to_owned() })?,
        };
        mix.push((work, count));
    }
    Ok(mix)
}

fn unknown(kind: &'static str, name: &str, available: String, planned: bool) -> ChoiceError {
    let name = name.to_owned();
    if planned {
        ChoiceError::NotBuilt { kind, name, available }
    } else {
        ChoiceError::Unknown { kind, name, available }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn names(kernels: &[Kernel]) -> Vec<&str> {
        kernels.iter().map(Kernel::name).collect()
    }

    #[test]
    fn kernels_are_found_by_name_and_bare_is_no_kernel() {
        assert_eq!(kernels_named::<&str>(&[]).unwrap().len(), KERNELS.len());
        assert_eq!(names(&kernels_named(&["bare", " triangle"]).unwrap()), ["triangle"]);
        assert!(kernels_named(&["bare"]).unwrap().is_empty());
        for (name, word) in [("incidence", "not built yet"), ("triangel", "no kernel")] {
            let message = kernels_named(&["triangle", name]).unwrap_err().to_string();
            assert!(message.contains(word) && message.contains("triangle, "), "{message}");
        }
        let twice = kernels_named(&["triangle", "triangle"]).unwrap_err();
        assert!(matches!(twice, ChoiceError::Twice { kind: "kernel", .. }));
    }

    #[test]
    fn works_take_counts() {
        assert_eq!(mix_named::<&str>(&[]).unwrap(), Work::ALL.map(|work| (work, 1)));
        let refused = |word: &str| mix_named(&["assemble", word]).unwrap_err().to_string();
        for count in ["0", "", "-1", "1.5", "x", "1000000001", "99999999999999999999"] {
            let message = refused(&format!("smooth={count}"));
            assert!(message.contains(&format!("`{count}` is no count")), "{message}");
        }
        assert!(refused("flip=3").contains("not built yet"));
        assert!(refused("polish").contains("available are assemble, face-normals, smooth"));
        assert!(refused("assemble=2").contains("named twice"));
    }
}
