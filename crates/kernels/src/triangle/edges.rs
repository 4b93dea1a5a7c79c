//! Iterating over the sides of the triangle kernel, and over its edges: the sides that are the
//! lowest of their edge.

use super::TriangleAdjacency;
use crate::cells::Cells;
use crate::slots::Slots;
use merestone_topology::{EdgeId, FaceId, OrientedEdgeId};
use std::iter::FusedIterator;
use std::ops::Range;

/// The live edges, ascending. Made by [`edges`](merestone_topology::Topology::edges).
#[derive(Clone, Debug)]
pub struct TriangleEdges<'a> {
    mesh: &'a TriangleAdjacency,
    sides: Range<u32>,
    left: usize,
}

impl<'a> TriangleEdges<'a> {
    pub(super) fn new(mesh: &'a TriangleAdjacency) -> Self {
        Self { mesh, sides: 0..mesh.turns.len() as u32, left: mesh.edge_count }
    }

    #[inline(always)]
    fn is_edge(mesh: &TriangleAdjacency, side: u32) -> bool {
        mesh.faces.is_live(side / 3) && mesh.lowest_of(side) == side
    }
}

impl Iterator for TriangleEdges<'_> {
    type Item = EdgeId;

    #[inline]
    fn next(&mut self) -> Option<EdgeId> {
        let mesh = self.mesh;
        let side = self.sides.find(|&side| Self::is_edge(mesh, side))?;
        self.left -= 1;
        Some(EdgeId::from_u32(side))
    }

    fn size_hint(&self) -> (usize, Option<usize>) {
        (self.left, Some(self.left))
    }

    #[inline]
    fn fold<B, F: FnMut(B, EdgeId) -> B>(self, init: B, mut f: F) -> B {
        let mesh = self.mesh;
        self.sides.fold(init, |accumulated, side| {
            if Self::is_edge(mesh, side) {
                f(accumulated, EdgeId::from_u32(side))
            } else {
                accumulated
            }
        })
    }
}

impl ExactSizeIterator for TriangleEdges<'_> {}
impl FusedIterator for TriangleEdges<'_> {}

/// The live sides, ascending. Made by [`oriented_edges`](merestone_topology::Topology::oriented_edges).
#[derive(Clone, Debug)]
pub struct TriangleSides<'a> {
    faces: Cells<'a, FaceId>,
    /// What is left of the triangle begun.
    begun: Range<u32>,
}

impl<'a> TriangleSides<'a> {
    pub(super) fn new(faces: &'a Slots) -> Self {
        Self { faces: Cells::new(faces), begun: 0..0 }
    }
}

impl Iterator for TriangleSides<'_> {
    type Item = OrientedEdgeId;

    #[inline]
    fn next(&mut self) -> Option<OrientedEdgeId> {
        if self.begun.is_empty() {
            let first = 3 * self.faces.next()?.to_u32();
            self.begun = first..first + 3;
        }
        self.begun.next().map(OrientedEdgeId::from_u32)
    }

    fn size_hint(&self) -> (usize, Option<usize>) {
        let left = self.begun.len() + 3 * self.faces.len();
        (left, Some(left))
    }

    #[inline]
    fn fold<B, F: FnMut(B, OrientedEdgeId) -> B>(self, init: B, mut f: F) -> B {
        let begun = self.begun.fold(init, |b, side| f(b, OrientedEdgeId::from_u32(side)));
        self.faces.fold(begun, |b, face| {
            let first = 3 * face.to_u32();
            (first..first + 3).fold(b, |b, side| f(b, OrientedEdgeId::from_u32(side)))
        })
    }
}

impl ExactSizeIterator for TriangleSides<'_> {}
impl FusedIterator for TriangleSides<'_> {}
