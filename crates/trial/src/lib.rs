//! Trying the kernels against each other, and against bare arrays, on a mesh.
//!
//! [`run`] is the whole of it: the [`works`] on each of the [`kernels`] and on [`bare`] arrays,
//! [measured](measure) turn and turn about, compared [value by value](values), and a
//! [verdict] for the mix of works that the caller's program does. [`bare`] is the
//! yardstick: hand-written arrays, one purpose each. [`shapes`] makes meshes to measure on,
//! [`foundry`] the parts that demonstrations show.
//!
//! ```
//! use merestone_trial::{Options, Subject, foundry, run};
//!
//! let body = foundry::valve_body(4);
//! let subject = Subject::from_triangles(body.points, &body.triangles)?;
//! let report = run(&subject, &Options { seconds: 0.001, ..Options::default() }, &mut |_| {})?;
//! assert!(report.disagreement.is_none());
//! println!("{}", report.verdict.sentence);
//! # Ok::<(), merestone_trial::TrialError>(())
//! ```

#![forbid(unsafe_code)]

pub mod bare;
mod choice;
mod error;
pub mod foundry;
pub mod kernels;
mod machine;
pub mod measure;
mod report;
mod run;
pub mod shapes;
pub mod statistics;
mod subject;
pub mod units;
pub mod values;
pub mod verdict;
pub mod works;

pub use choice::{ChoiceError, kernels_named, mix_named};
pub use error::TrialError;
pub use machine::Machine;
pub use report::{BreakEven, Disagreement, Held, MeshCounts, MixPart, Outcome, Report};
pub use run::{Options, Step, run};
pub use subject::Subject;
