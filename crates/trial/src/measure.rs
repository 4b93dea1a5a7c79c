//! Taking times: jobs turn and turn about, until the time is spent.

use crate::statistics::{FEWEST, Summary};
use crate::values::Values;
use merestone::topology::ArrayBytes;
use std::time::{Duration, Instant};

/// A work on one kernel or on bare arrays, ready to be timed.
pub trait Job {
    /// Makes room for the results of so many runs, outside the clock.
    fn reserve(&mut self, _runs: usize) {}

    /// Does the work once. This is what is timed.
    fn run(&mut self);

    /// Drops what runs leave behind, outside the clock.
    fn clear(&mut self) {}

    /// Does the work once more and gives its results.
    fn values(&mut self) -> Values;

    /// The arrays it was given: what bare arrays hold for this work. Empty on kernels, which
    /// report their own footprint.
    fn arrays(&self) -> Vec<ArrayBytes> {
        Vec::new()
    }
}

/// The least number of rounds: one more than an interval needs, whatever time they take.
pub const FEWEST_ROUNDS: usize = FEWEST + 1;

/// A sample lasts at least so many steps of the clock.
const STEPS_PER_SAMPLE: u32 = 100;

/// Samples shorter than this come after an untimed run.
const SHORT: Duration = Duration::from_millis(100);

/// The times of one job.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Times {
    /// Nanoseconds a run.
    pub nanoseconds: Summary,
    /// How many runs make a sample.
    pub runs_per_sample: usize,
}

/// Times the jobs round by round (A B C, A B C, …), for about `budget` each and at least
/// [`FEWEST_ROUNDS`] rounds; gives each one's nanoseconds a run.
///
/// So a machine that grows slower for a while slows all of them. Each runs once to warm up, and as
/// many runs make a sample as last a hundred steps of the clock. Before each sample shorter than a
/// tenth of a second the job is run once untimed: to find its arrays in the cache again after the
/// others' turn, and the memory it allocates as it leaves it itself. (Which job came before made
/// assembling up to twice as slow, through what that one had given back to the system.)
pub fn interleaved(jobs: &mut [Box<dyn Job + '_>], budget: Duration) -> Vec<Times> {
    let least = clock_step() * STEPS_PER_SAMPLE;
    let batches: Vec<usize> = jobs.iter_mut().map(|job| batch_for(job.as_mut(), least)).collect();
    let mut samples: Vec<Vec<f64>> = vec![Vec::new(); jobs.len()];
    let mut lasted = vec![Duration::ZERO; jobs.len()];
    let budget = budget * jobs.len() as u32;
    let begin = Instant::now();
    loop {
        for (i, job) in jobs.iter_mut().enumerate() {
            if lasted[i] < SHORT {
                time(job.as_mut(), 1);
            }
            lasted[i] = time(job.as_mut(), batches[i]);
            samples[i].push(lasted[i].as_nanos() as f64 / batches[i] as f64);
        }
        let rounds = samples.first().map_or(FEWEST_ROUNDS, Vec::len);
        if rounds >= FEWEST_ROUNDS && begin.elapsed() >= budget {
            break;
        }
    }
    let summaries = samples.iter_mut().filter_map(|values| Summary::of(values));
    summaries
        .zip(batches)
        .map(|(nanoseconds, runs_per_sample)| Times { nanoseconds, runs_per_sample })
        .collect()
}

/// Times so many runs.
fn time(job: &mut (dyn Job + '_), runs: usize) -> Duration {
    job.reserve(runs);
    let begin = Instant::now();
    for _ in 0..runs {
        job.run();
    }
    let lasted = begin.elapsed();
    job.clear();
    lasted
}

/// How many runs last at least `least`: a power of two.
fn batch_for(job: &mut (dyn Job + '_), least: Duration) -> usize {
    let mut runs = 1;
    time(job, runs);
    while time(job, runs) < least && runs < 1 << 20 {
        runs *= 2;
    }
    runs
}

/// The smallest step the clock was seen to make.
fn clock_step() -> Duration {
    let step = || {
        let begin = Instant::now();
        loop {
            let passed = begin.elapsed();
            if !passed.is_zero() {
                return passed;
            }
        }
    };
    (0..50).map(|_| step()).min().unwrap_or(Duration::from_micros(1))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::values::Cells;
    use std::cell::RefCell;

    struct Counting<'a> {
        name: char,
        log: &'a RefCell<String>,
        open: usize,
    }

    impl Job for Counting<'_> {
        fn reserve(&mut self, runs: usize) {
            self.open = runs;
            self.log.borrow_mut().push(self.name);
        }
        fn run(&mut self) {
            assert!(self.open > 0, "room was made for as many runs as are made");
            self.open -= 1;
            std::thread::sleep(Duration::from_millis(2));
        }
        fn clear(&mut self) {
            assert_eq!(self.open, 0);
        }
        fn values(&mut self) -> Values {
            Values { numbers: Vec::new(), cells: Cells::FaceLabels, scale: 1.0 }
        }
    }

    #[test]
    fn jobs_take_turns_and_are_run_as_often_as_an_interval_needs() {
        let log = RefCell::new(String::new());
        let job = |name| Box::new(Counting { name, log: &log, open: 0 }) as Box<dyn Job + '_>;
        let mut jobs = [job('a'), job('b'), job('c')];
        let times = interleaved(&mut jobs, Duration::ZERO);
        assert_eq!(times.len(), 3);
        for time in &times {
            assert_eq!((time.nanoseconds.count, time.runs_per_sample), (FEWEST_ROUNDS, 1));
            assert!(time.nanoseconds.median >= 2e6, "a sleep lasts as long as it was asked to");
        }
        // To warm up, and then round by round; the first sample of each after an untimed run.
        let mut turns: Vec<char> = log.borrow().chars().collect();
        assert_eq!(turns[6..12], ['a', 'a', 'b', 'b', 'c', 'c']);
        turns.dedup();
        assert_eq!(String::from_iter(turns), "abc".repeat(FEWEST_ROUNDS + 1));
    }

    #[test]
    fn nothing_to_time_takes_no_time() {
        assert!(interleaved(&mut [], Duration::ZERO).is_empty());
    }
}
