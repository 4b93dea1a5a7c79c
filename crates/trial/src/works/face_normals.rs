//! `face-normals`: the unit Newell vector of every face, 0 where it vanishes.

use super::{Layout, array};
use crate::Subject;
use crate::bare::faces::{loop_normals, triangle_normals, triangle_normals_in_lanes};
use crate::measure::Job;
use crate::values::{Cells, Values, flattened};
use merestone::geometry::Brep;
use merestone::topology::{ArrayBytes, Column, Topology, TopologyExt};

/// The work: one normal for each face. O(corners).
pub fn on_kernel<K: Topology>(mesh: &Brep<K, f64>, normals: &mut Column<K::Face, [f64; 3]>) {
    mesh.face_normals_into(normals);
}

pub(super) fn job<K: Topology>(mesh: &Brep<K, f64>) -> Box<dyn Job + '_> {
    Box::new(OnKernel { mesh, normals: mesh.face_column([0.0; 3]) })
}

struct OnKernel<'a, K: Topology> {
    mesh: &'a Brep<K, f64>,
    normals: Column<K::Face, [f64; 3]>,
}

impl<K: Topology> Job for OnKernel<'_, K> {
    fn run(&mut self) {
        on_kernel(self.mesh, &mut self.normals);
    }

    fn values(&mut self) -> Values {
        self.run();
        vectors(self.normals.values())
    }
}

/// The work on bare arrays. The layout makes no difference but for polygons and for the best way.
pub(super) fn bare(subject: &Subject, layout: Layout) -> Option<Box<dyn Job + '_>> {
    let (points, normals) = (subject.points(), Vec::new());
    match (layout, subject.triangles()) {
        (Layout::Best, Some(triangles)) => {
            let run = move |normals: &mut Vec<[f64; 3]>| {
                triangle_normals_in_lanes(points, triangles, normals);
            };
            let arrays = vec![array("index buffer", triangles)];
            Some(Box::new(OnBare { run, normals, arrays }))
        }
        (Layout::Turns, Some(triangles)) => {
            let run =
                move |normals: &mut Vec<[f64; 3]>| triangle_normals(points, triangles, normals);
            Some(Box::new(OnBare { run, normals, arrays: vec![array("index buffer", triangles)] }))
        }
        (Layout::Turns, None) => None,
        (Layout::Best | Layout::HalfEdges, _) => {
            let (corners, ends) = (subject.corners(), subject.face_ends());
            let run =
                move |normals: &mut Vec<[f64; 3]>| loop_normals(points, corners, ends, normals);
            let arrays = vec![array("index buffer", corners), array("face ends", ends)];
            Some(Box::new(OnBare { run, normals, arrays }))
        }
    }
}

struct OnBare<R> {
    run: R,
    normals: Vec<[f64; 3]>,
    arrays: Vec<ArrayBytes>,
}

impl<R: Fn(&mut Vec<[f64; 3]>)> Job for OnBare<R> {
    fn run(&mut self) {
        (self.run)(&mut self.normals);
    }

    fn values(&mut self) -> Values {
        self.run();
        vectors(&self.normals)
    }

    fn arrays(&self) -> Vec<ArrayBytes> {
        self.arrays.clone()
    }
}

fn vectors(normals: &[[f64; 3]]) -> Values {
    Values { numbers: flattened(normals), cells: Cells::FaceVectors, scale: 1.0 }
}
