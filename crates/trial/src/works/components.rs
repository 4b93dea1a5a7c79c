//! `components`: faces joined through shared edges, numbered by their smallest faces.

use super::assemble::half_edge_arrays;
use super::{Layout, array};
use crate::bare::assemble::{self as sides, Adjacency};
use crate::bare::components::{by_half_edges, by_turns};
use crate::bare::half_edge::{self, HalfEdges};
use crate::measure::Job;
use crate::values::{Cells, Values};
use crate::{Subject, TrialError};
use merestone::geometry::Brep;
use merestone::topology::floods::Components;
use merestone::topology::{ArrayBytes, Topology};

/// The work: a label for each face, in memory that is used again. O(corners) as good as.
pub fn on_kernel<K: Topology>(mesh: &Brep<K, f64>, found: &mut Components<K::Face>) {
    found.update(mesh.topology());
}

pub(super) fn job<K: Topology>(mesh: &Brep<K, f64>) -> Box<dyn Job + '_> {
    Box::new(OnKernel { mesh, found: Components::of(mesh.topology()) })
}

struct OnKernel<'a, K: Topology> {
    mesh: &'a Brep<K, f64>,
    found: Components<K::Face>,
}

impl<K: Topology> Job for OnKernel<'_, K> {
    fn run(&mut self) {
        on_kernel(self.mesh, &mut self.found);
    }

    fn values(&mut self) -> Values {
        self.run();
        let labels = self.mesh.faces().map(|face| self.found.number(face) as f64);
        labelled(labels, self.found.count())
    }
}

/// The work on bare arrays, adjacency given.
pub(super) fn bare(
    subject: &Subject,
    layout: Layout,
) -> Result<Option<Box<dyn Job + '_>>, TrialError> {
    let vertices = subject.points().len();
    let labels = Vec::new();
    match (layout, subject.triangles()) {
        (Layout::Turns, None) => Ok(None),
        (Layout::Best | Layout::Turns, Some(triangles)) => {
            let mut links = Adjacency::default();
            sides::assemble(triangles, vertices, &mut Default::default(), &mut links)?;
            let arrays = vec![array("turns", &links.turn)];
            let mut queue = Vec::new();
            let run = move |labels: &mut Vec<u32>| by_turns(&links, labels, &mut queue);
            Ok(Some(Box::new(OnBare { run, labels, count: 0, arrays })))
        }
        (Layout::Best | Layout::HalfEdges, _) => {
            let mut links = HalfEdges::default();
            let (corners, ends) = (subject.corners(), subject.face_ends());
            let scratch = &mut half_edge::Scratch::default();
            half_edge::assemble(corners, ends, vertices, scratch, &mut links)?;
            let mut arrays = half_edge_arrays(&links);
            arrays.retain(|array| ["face", "radial"].contains(&array.name));
            let run = move |labels: &mut Vec<u32>| by_half_edges(&links, labels);
            Ok(Some(Box::new(OnBare { run, labels, count: 0, arrays })))
        }
    }
}

struct OnBare<R> {
    run: R,
    labels: Vec<u32>,
    count: u32,
    arrays: Vec<ArrayBytes>,
}

impl<R: FnMut(&mut Vec<u32>) -> u32> Job for OnBare<R> {
    fn run(&mut self) {
        self.count = (self.run)(&mut self.labels);
    }

    fn values(&mut self) -> Values {
        self.run();
        labelled(self.labels.iter().map(|&label| f64::from(label)), self.count as usize)
    }

    fn arrays(&self) -> Vec<ArrayBytes> {
        self.arrays.clone()
    }
}

fn labelled(labels: impl Iterator<Item = f64>, count: usize) -> Values {
    let numbers = labels.chain([count as f64]).collect();
    Values { numbers, cells: Cells::FaceLabels, scale: 1.0 }
}
