//! The suite: public generic functions, each holding one part of a kernel to the contract.

mod around;
mod cells;
mod detached;
mod guard;
mod lists;
mod pairing;
mod relations;
mod stage;
mod steps;
mod walks;

pub use around::check_sectors;
pub use cells::{check_counts, check_iterators};
pub use detached::check_overtaken_walks;
pub use lists::check_malformed_lists;
pub use pairing::Paired;
pub use relations::check_relations;
pub use steps::{check_bounds, check_edges, check_fast_ways, check_footprint, check_steps};
pub use walks::check_walks;

use super::random::Random;
use super::{Capabilities, Complex, Failure};
use crate::{Assemble, FaceId, Topology, VertexId};
use guard::caught;
use pairing::Scene;
use stage::Stage;

/// How many cases a kernel held, and how many it refused as beyond it.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Ran {
    /// Held, and found to agree with the reference throughout.
    pub held: usize,
    /// Rightly refused: a skip that was counted.
    pub refused: usize,
}

/// Everything that can be asked of a topology without changing it.
///
/// # Errors
/// [`Failure`] naming the first departure.
pub fn check_everything<K: Topology>(on: &Paired<'_, K>) -> Result<(), Failure> {
    check_counts(on)?;
    check_iterators(on)?;
    check_steps(on)?;
    check_edges(on)?;
    check_bounds(on)?;
    check_sectors(on)?;
    check_walks(on)?;
    check_relations(on)?;
    check_fast_ways(on)?;
    check_footprint(on)
}

/// Takes a kernel through a complex beside the reference: assembles, removes faces and vertices
/// in an order drawn from `seed`, compacts on the way and at the end, and checks everything after
/// each step. `Ok(false)` where the kernel rightly refused to hold the complex.
///
/// ```
/// use merestone_topology::conformance::{Capabilities, Complex, Reference, check_complex};
/// let complex = Complex::triangles("two triangles", 4, &[[0, 1, 2], [0, 2, 3]]);
/// let capabilities = Capabilities::everything("reference");
/// assert!(check_complex::<Reference>(&capabilities, &complex, 7)?);
/// # Ok::<(), merestone_topology::conformance::Failure>(())
/// ```
///
/// # Errors
/// [`Failure`] naming the kernel, the complex, the steps so far and the cells; a panic of the
/// kernel's is one too.
pub fn check_complex<K: Assemble + 'static>(
    capabilities: &Capabilities,
    complex: &Complex,
    seed: u64,
) -> Result<bool, Failure> {
    let scene = Scene::new(capabilities, &complex.name);
    caught(|| take_through::<K>(capabilities, complex, seed)).unwrap_or_else(|words| {
        let place = format_args!("seed {seed} of the removals");
        Err(scene.fail("a step", place, "an answer", format!("a panic: {words}")))
    })
}

fn take_through<K: Assemble + 'static>(
    capabilities: &Capabilities,
    complex: &Complex,
    seed: u64,
) -> Result<bool, Failure> {
    let mut random = Random::new(seed);
    let by_triangles = random.chance(1, 2);
    let Some(mut stage) = Stage::<K>::assemble(capabilities, complex, by_triangles)? else {
        return Ok(false);
    };
    stage.check()?;
    if random.chance(1, 4) {
        // A compaction with nothing to drop moves nothing.
        stage.compact()?;
        stage.check()?;
    }
    let mut removed = 0;
    loop {
        let faces: Vec<FaceId> = stage.reference.faces.keys().copied().collect();
        let Some(pick) = random.below_len(faces.len()) else { break };
        stage.remove(faces[pick])?;
        removed += 1;
        let isolated: Vec<VertexId> = stage.reference.vertices.iter().copied().collect();
        for v in isolated {
            if !stage.is_used(v) && random.chance(1, 2) {
                stage.remove_vertex(v)?;
            }
        }
        // About three states of each complex are looked at in full, however large it is.
        let wanted = complex.faces.len().min(3) as u32;
        if random.chance(wanted, complex.faces.len() as u32) {
            stage.check()?;
        }
        if removed == 1 {
            stage.check_refusals()?;
        }
        if random.chance(1, wanted + 3) {
            stage.compact()?;
            stage.check()?;
        }
    }
    stage.check_refusals()?;
    stage.compact()?;
    stage.check()?;
    if let Some(face) = random.below_len(complex.faces.len()) {
        check_overtaken_walks::<K>(capabilities, complex, face)?;
    }
    Ok(true)
}

/// [`check_complex`] over many, the `i`-th with the seed `seed + i`.
///
/// # Errors
/// The first [`Failure`].
pub fn check_corpus<K: Assemble + 'static>(
    capabilities: &Capabilities,
    corpus: impl IntoIterator<Item = Complex>,
    seed: u64,
) -> Result<Ran, Failure> {
    let mut ran = Ran::default();
    for (complex, i) in corpus.into_iter().zip(0u64..) {
        if check_complex::<K>(capabilities, &complex, seed.wrapping_add(i))? {
            ran.held += 1;
        } else {
            ran.refused += 1;
        }
    }
    Ok(ran)
}
