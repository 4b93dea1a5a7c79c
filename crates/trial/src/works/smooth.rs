//! `smooth`: every vertex to the mean of its neighbours along edges, each edge once; all old
//! points are read before any new one is used. Vertices without edges keep their place.

use super::{Layout, array};
use crate::bare::assemble::{self as sides, Adjacency};
use crate::bare::half_edge::{self, HalfEdges};
use crate::bare::smooth::{Neighbours, by_half_edges, by_lists, by_turns};
use crate::measure::Job;
use crate::values::{Cells, Values, flattened};
use crate::{Subject, TrialError};
use merestone::geometry::Brep;
use merestone::topology::{ArrayBytes, Id, Topology, TopologyExt};

/// The work: one point for each vertex slot. O(corners).
pub fn on_kernel<K: Topology>(mesh: &Brep<K, f64>, moved: &mut [[f64; 3]]) {
    let (topology, points) = (mesh.topology(), mesh.points());
    topology.vertices().for_each(|v| {
        let add = |([x, y, z], count): ([f64; 3], u32), far: [f64; 3]| {
            ([x + far[0], y + far[1], z + far[2]], count + 1)
        };
        let ends = topology.vertex_edge_ends(v);
        let (sum, count) =
            ends.fold(([0.0; 3], 0), |sum, spoke| add(sum, points[spoke.far_end(topology)]));
        moved[v.index()] = if count == 0 {
            points[v]
        } else {
            let weight = 1.0 / f64::from(count);
            sum.map(|x| x * weight)
        };
    });
}

pub(super) fn job<'a, K: Topology>(mesh: &'a Brep<K, f64>, subject: &Subject) -> Box<dyn Job + 'a> {
    let moved = vec![[0.0; 3]; mesh.vertex_bound()];
    let run = move |moved: &mut Vec<[f64; 3]>| on_kernel(mesh, moved);
    Box::new(Moving { run, moved, size: subject.size(), arrays: Vec::new() })
}

/// The work on bare arrays: neighbour lists, which hold nothing else, are the fastest.
pub(super) fn bare(
    subject: &Subject,
    layout: Layout,
) -> Result<Option<Box<dyn Job + '_>>, TrialError> {
    let (points, size) = (subject.points(), subject.size());
    let (corners, ends) = (subject.corners(), subject.face_ends());
    let mut moved = Vec::new();
    match (layout, subject.triangles()) {
        (Layout::Best, _) => {
            let lists = Neighbours::from_loops(corners, ends, points.len());
            let arrays =
                vec![array("neighbour ends", &lists.ends), array("neighbours", &lists.list)];
            let run = move |moved: &mut Vec<[f64; 3]>| by_lists(points, &lists, moved);
            Ok(Some(Box::new(Moving { run, moved, size, arrays })))
        }
        (Layout::Turns, None) => Ok(None),
        (Layout::Turns, Some(triangles)) => {
            let mut links = Adjacency::default();
            sides::assemble(triangles, points.len(), &mut Default::default(), &mut links)?;
            if !by_turns(points, &links, &mut moved) {
                return Ok(None);
            }
            let run = move |moved: &mut Vec<[f64; 3]>| {
                let _ = by_turns(points, &links, moved);
            };
            Ok(Some(Box::new(Moving { run, moved, size, arrays: Vec::new() })))
        }
        (Layout::HalfEdges, _) => {
            let mut links = HalfEdges::default();
            let scratch = &mut half_edge::Scratch::default();
            half_edge::assemble(corners, ends, points.len(), scratch, &mut links)?;
            if !by_half_edges(points, &links, &mut moved) {
                return Ok(None);
            }
            let run = move |moved: &mut Vec<[f64; 3]>| {
                let _ = by_half_edges(points, &links, moved);
            };
            Ok(Some(Box::new(Moving { run, moved, size, arrays: Vec::new() })))
        }
    }
}

struct Moving<R> {
    run: R,
    moved: Vec<[f64; 3]>,
    size: f64,
    arrays: Vec<ArrayBytes>,
}

impl<R: Fn(&mut Vec<[f64; 3]>)> Job for Moving<R> {
    fn run(&mut self) {
        (self.run)(&mut self.moved);
    }

    fn values(&mut self) -> Values {
        self.run();
        let numbers = flattened(&self.moved);
        Values { numbers, cells: Cells::VertexVectors, scale: self.size }
    }

    fn arrays(&self) -> Vec<ArrayBytes> {
        self.arrays.clone()
    }
}
