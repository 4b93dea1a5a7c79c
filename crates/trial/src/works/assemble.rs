//! `assemble`: from the face list to all links.
//!
//! Every run takes fresh memory, on kernels and on bare arrays alike, since that is what a program
//! does that assembles a mesh; what was assembled is dropped outside the clock. The results are,
//! for every corner of the face list, the corner whose side is the next use of its edge, and how
//! many edges of each kind there are.

use super::{Layout, array};
use crate::bare::assemble::{self as sides, Adjacency, EdgeCounts, NOT_PLAIN, previous_side};
use crate::bare::half_edge::{self, HalfEdges};
use crate::measure::Job;
use crate::values::{Cells, Values};
use crate::{Subject, TrialError};
use merestone::topology::{
    ArrayBytes, Assemble, AssembleError, EdgeKind, FaceList, Id, TopologyExt,
};

/// The work: a kernel from a face list.
///
/// # Errors
/// Where the kernel cannot hold a face.
pub fn on_kernel<K: Assemble>(faces: FaceList<'_>) -> Result<K, AssembleError> {
    K::assemble(faces)
}

pub(super) fn job<'a, K: Assemble + 'a>(subject: &'a Subject) -> Box<dyn Job + 'a> {
    let make = || on_kernel::<K>(subject.faces()).ok();
    let values = |mesh: &Option<K>| mesh.as_ref().map_or_else(|| corners(&[], [0; 4]), read);
    Box::new(Making { make, values, arrays: |_: &Option<K>| Vec::new(), made: Vec::new() })
}

/// The work on bare arrays.
pub(super) fn bare(
    subject: &Subject,
    layout: Layout,
) -> Result<Option<Box<dyn Job + '_>>, TrialError> {
    let vertices = subject.points().len();
    match (layout, subject.triangles()) {
        (Layout::Turns, None) => Ok(None),
        (Layout::Best | Layout::Turns, Some(triangles)) => {
            let make = move || {
                let mut out = Adjacency::default();
                sides::assemble(triangles, vertices, &mut Default::default(), &mut out)
                    .map(|()| out)
            };
            make()?;
            let values = |made: &Result<Adjacency, _>| {
                made.as_ref().map_or_else(|_| corners(&[], [0; 4]), read_sides)
            };
            let arrays = |made: &Result<Adjacency, _>| {
                made.as_ref().map_or_else(
                    |_| Vec::new(),
                    |links| {
                        let [end, turn] =
                            [array("index buffer", &links.end), array("turns", &links.turn)];
                        vec![end, turn, array("handles", &links.outgoing)]
                    },
                )
            };
            Ok(Some(Box::new(Making { make, values, arrays, made: Vec::new() })))
        }
        (Layout::Best | Layout::HalfEdges, _) => {
            let make = move || {
                let mut out = HalfEdges::default();
                let (corners, ends) = (subject.corners(), subject.face_ends());
                let scratch = &mut half_edge::Scratch::default();
                half_edge::assemble(corners, ends, vertices, scratch, &mut out).map(|()| out)
            };
            make()?;
            let values = |made: &Result<HalfEdges, _>| {
                made.as_ref().map_or_else(|_| corners(&[], [0; 4]), read_half_edges)
            };
            let arrays = |made: &Result<HalfEdges, _>| {
                made.as_ref().map_or_else(|_| Vec::new(), half_edge_arrays)
            };
            Ok(Some(Box::new(Making { make, values, arrays, made: Vec::new() })))
        }
    }
}

/// The arrays of half-edges, named as the kernel's would be.
pub(super) fn half_edge_arrays(mesh: &HalfEdges) -> Vec<ArrayBytes> {
    vec![
        array("next", &mesh.next),
        array("prev", &mesh.prev),
        array("start", &mesh.start),
        array("face", &mesh.face),
        array("radial", &mesh.radial),
        array("edge", &mesh.edge),
        array("edge handles", &mesh.edge_first),
        array("face handles", &mesh.face_first),
        array("handles", &mesh.outgoing),
    ]
}

/// A job whose every run makes something new, kept until it is dropped outside the clock.
struct Making<T, M, V, A> {
    make: M,
    values: V,
    arrays: A,
    made: Vec<T>,
}

impl<T, M: Fn() -> T, V: Fn(&T) -> Values, A: Fn(&T) -> Vec<ArrayBytes>> Job
    for Making<T, M, V, A>
{
    fn reserve(&mut self, runs: usize) {
        self.made.reserve(runs);
    }

    fn run(&mut self) {
        self.made.push((self.make)());
    }

    fn clear(&mut self) {
        self.made.clear();
    }

    fn values(&mut self) -> Values {
        (self.values)(&(self.make)())
    }

    fn arrays(&self) -> Vec<ArrayBytes> {
        (self.arrays)(&(self.make)())
    }
}

fn corners(radial: &[u32], [edges, boundary, non_manifold, misoriented]: [usize; 4]) -> Values {
    let counts = [edges, boundary, non_manifold, misoriented].map(|count| count as f64);
    let cells = Cells::Corners {
        counts: &["edges", "boundary edges", "non-manifold edges", "misoriented edges"],
    };
    let numbers = radial.iter().map(|&corner| f64::from(corner)).chain(counts).collect();
    Values { numbers, cells, scale: 1.0 }
}

/// What a kernel says of every corner, asked through the shared trait.
fn read<K: Assemble>(mesh: &K) -> Values {
    let mut number = mesh.oriented_edge_column(u32::MAX);
    let mut order = Vec::with_capacity(mesh.oriented_edge_count());
    mesh.faces().for_each(|face| {
        mesh.face_corners(face).for_each(|h| {
            number[h] = order.len() as u32;
            order.push(h);
        });
    });
    let radial: Vec<u32> = order.iter().map(|&h| number[mesh.radial(h)]).collect();
    let mut counts = [mesh.edge_count(), 0, 0, 0];
    mesh.edges().for_each(|edge| match mesh.edge_kind(edge) {
        EdgeKind::Plain => {}
        EdgeKind::Boundary => counts[1] += 1,
        EdgeKind::NonManifold => counts[2] += 1,
        EdgeKind::Misoriented => counts[3] += 1,
    });
    debug_assert!(order.iter().all(|h| h.index() < mesh.oriented_edge_bound()));
    corners(&radial, counts)
}

fn read_sides(links: &Adjacency) -> Values {
    let radial = links.turn.iter().map(|turn| previous_side(turn & !NOT_PLAIN));
    bare_corners(radial.collect(), links.counts)
}

fn read_half_edges(mesh: &HalfEdges) -> Values {
    let radial = mesh.radial.iter().map(|radial| radial & !NOT_PLAIN);
    bare_corners(radial.collect(), mesh.counts)
}

fn bare_corners(radial: Vec<u32>, counts: EdgeCounts) -> Values {
    // Uses ascend around an edge: from its greatest, and only from there, the next is not greater.
    let edges = (0u32..).zip(&radial).filter(|&(corner, &next)| next <= corner).count();
    corners(&radial, [edges, counts.boundary, counts.non_manifold, counts.misoriented])
}
