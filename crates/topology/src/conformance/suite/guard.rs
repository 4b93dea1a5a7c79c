//! Keeping a faulty kernel from taking the suite down with it.

use std::any::Any;
use std::panic::{AssertUnwindSafe, catch_unwind, resume_unwind};

/// Thrown out of a fold that yields more than it can.
struct Runaway;

/// Everything an iterator's `fold` yields; `None` when it yields more than `most` items and would
/// perhaps never end. A fold can only be stopped by unwinding.
pub(super) fn fold_all<I: Iterator>(walk: I, most: usize) -> Option<Vec<I::Item>> {
    let gather = || {
        walk.fold(Vec::new(), |mut items, item| {
            if items.len() > most {
                resume_unwind(Box::new(Runaway));
            }
            items.push(item);
            items
        })
    };
    match catch_unwind(AssertUnwindSafe(gather)) {
        Ok(items) => Some(items),
        Err(thrown) if thrown.is::<Runaway>() => None,
        Err(thrown) => resume_unwind(thrown),
    }
}

/// The answer of `run`, or the words it panicked with.
pub(super) fn caught<T>(run: impl FnOnce() -> T) -> Result<T, String> {
    catch_unwind(AssertUnwindSafe(run)).map_err(|thrown| words(&*thrown))
}

fn words(thrown: &(dyn Any + Send)) -> String {
    let text = thrown.downcast_ref::<&str>().map(|text| (*text).to_owned());
    text.or_else(|| thrown.downcast_ref::<String>().cloned()).unwrap_or_default()
}
