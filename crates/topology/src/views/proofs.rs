//! The three views.

use super::defects::{DefectsOf, Wanted, check};
use crate::{Costs, FaceBound, Footprint, Topology};
use std::ops::Deref;

/// Passes every step on to the field that is a topology already.
macro_rules! topology_through {
    ($view:ident) => {
        #[deny(clippy::missing_trait_methods)]
        impl<K: Topology> Topology for $view<'_, K> {
            type Vertex = K::Vertex;
            type Edge = K::Edge;
            type Face = K::Face;
            type OrientedEdge = K::OrientedEdge;
            type Vertices<'b>
                = K::Vertices<'b>
            where
                Self: 'b;
            type Edges<'b>
                = K::Edges<'b>
            where
                Self: 'b;
            type Faces<'b>
                = K::Faces<'b>
            where
                Self: 'b;
            type OrientedEdges<'b>
                = K::OrientedEdges<'b>
            where
                Self: 'b;

            const COST: Costs = K::COST;

            topology_through! { @steps
                vertex_count() -> usize;
                edge_count() -> usize;
                face_count() -> usize;
                oriented_edge_count() -> usize;
                inner_loop_count() -> usize;
                vertex_bound() -> usize;
                edge_bound() -> usize;
                face_bound() -> usize;
                oriented_edge_bound() -> usize;
                vertex_at(index: usize) -> Option<K::Vertex>;
                edge_at(index: usize) -> Option<K::Edge>;
                face_at(index: usize) -> Option<K::Face>;
                oriented_edge_at(index: usize) -> Option<K::OrientedEdge>;
                vertices() -> K::Vertices<'_>;
                edges() -> K::Edges<'_>;
                faces() -> K::Faces<'_>;
                oriented_edges() -> K::OrientedEdges<'_>;
                start(h: K::OrientedEdge) -> K::Vertex;
                end(h: K::OrientedEdge) -> K::Vertex;
                next(h: K::OrientedEdge) -> K::OrientedEdge;
                prev(h: K::OrientedEdge) -> K::OrientedEdge;
                radial(h: K::OrientedEdge) -> K::OrientedEdge;
                turn(h: K::OrientedEdge) -> Option<K::OrientedEdge>;
                is_plain(h: K::OrientedEdge) -> bool;
                face(h: K::OrientedEdge) -> K::Face;
                edge(h: K::OrientedEdge) -> K::Edge;
                runs_with_edge(h: K::OrientedEdge) -> bool;
                edge_use(e: K::Edge) -> K::OrientedEdge;
                sector(v: K::Vertex, i: usize) -> Option<K::OrientedEdge>;
                vertex_loop(v: K::Vertex, i: usize) -> Option<K::Face>;
                bound(f: K::Face, i: usize) -> Option<FaceBound<K::OrientedEdge, K::Vertex>>;
                triangle(f: K::Face) -> Option<[K::OrientedEdge; 3]>;
                across(h: K::OrientedEdge) -> K::Face;
                index_buffer() -> Option<&[[u32; 3]]>;
                footprint() -> Footprint;
            }
        }
    };
    (@steps $($step:ident($($arg:ident: $ty:ty),*) -> $out:ty;)*) => {$(
        #[inline(always)]
        fn $step(&self, $($arg: $ty),*) -> $out {
            self.0.$step($($arg),*)
        }
    )*};
}

macro_rules! copy_view {
    ($view:ident) => {
        impl<K> Clone for $view<'_, K> {
            fn clone(&self) -> Self {
                *self
            }
        }

        impl<K> Copy for $view<'_, K> {}

        topology_through!($view);
    };
}

/// A topology whose edges have at most two uses and whose vertices one fan at most.
#[derive(Debug)]
pub struct Manifold<'a, K>(&'a K);

/// A [`Manifold`] without misoriented edges.
#[derive(Debug)]
pub struct OrientedManifold<'a, K>(Manifold<'a, K>);

/// An [`OrientedManifold`] with faces and without boundary: what bounds a solid, seen as topology.
#[derive(Debug)]
pub struct SolidBoundary<'a, K>(OrientedManifold<'a, K>);

copy_view!(Manifold);
copy_view!(OrientedManifold);
copy_view!(SolidBoundary);

impl<'a, K: Topology> Manifold<'a, K> {
    /// Checks that `mesh` is a manifold. O(uses).
    ///
    /// # Errors
    /// Every edge of more than two uses and every vertex of more than one fan.
    pub fn new(mesh: &'a K) -> Result<Self, DefectsOf<K>> {
        check(mesh, Wanted::Manifold).map(|()| Self(mesh))
    }
}

impl<'a, K: Topology> OrientedManifold<'a, K> {
    /// Checks that `mesh` is an oriented manifold. O(uses).
    ///
    /// # Errors
    /// As [`Manifold::new`], and every misoriented edge; where no turning around of faces can
    /// help, also the edge at which that shows.
    pub fn new(mesh: &'a K) -> Result<Self, DefectsOf<K>> {
        check(mesh, Wanted::Oriented).map(|()| Self(Manifold(mesh)))
    }
}

impl<'a, K: Topology> SolidBoundary<'a, K> {
    /// Checks that `mesh` can bound a solid: closed, manifold, oriented. O(uses).
    ///
    /// Says nothing about coordinates: whether the boundary crosses itself, or faces outward.
    ///
    /// # Errors
    /// As [`OrientedManifold::new`], and every boundary edge, or that there is no face.
    pub fn new(mesh: &'a K) -> Result<Self, DefectsOf<K>> {
        check(mesh, Wanted::Solid).map(|()| Self(OrientedManifold(Manifold(mesh))))
    }
}

impl<K> Deref for Manifold<'_, K> {
    type Target = K;

    fn deref(&self) -> &K {
        self.0
    }
}

impl<'a, K> Deref for OrientedManifold<'a, K> {
    type Target = Manifold<'a, K>;

    fn deref(&self) -> &Manifold<'a, K> {
        &self.0
    }
}

impl<'a, K> Deref for SolidBoundary<'a, K> {
    type Target = OrientedManifold<'a, K>;

    fn deref(&self) -> &OrientedManifold<'a, K> {
        &self.0
    }
}
