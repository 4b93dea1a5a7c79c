//! A kernel that does everything as another does, but for one fault.

use super::Fault;
use crate::*;
use std::cell::Cell;
use std::iter::FusedIterator;

thread_local! {
    /// The fault of the kernels this thread assembles.
    pub(super) static FAULT: Cell<Fault> = const { Cell::new(Fault::None) };
}

#[derive(Debug)]
pub(super) struct Planted<K: Topology> {
    inner: K,
    fault: Fault,
    all_faces: Vec<K::Face>,
    inner_loops: usize,
    /// The handles of every vertex when it was assembled.
    handles: Vec<Vec<K::OrientedEdge>>,
    buffer: Vec<[u32; 3]>,
    removed: bool,
    spoiled: bool,
}

impl<K: Topology> Planted<K> {
    fn has(&self, fault: Fault) -> bool {
        self.fault == fault
    }

    /// The uses of an edge in radial order from `h`.
    fn cycle(&self, h: K::OrientedEdge) -> Vec<K::OrientedEdge> {
        let mut uses = vec![h];
        let mut other = self.inner.radial(h);
        while other != h {
            uses.push(other);
            other = self.inner.radial(other);
        }
        uses
    }

    fn is_misoriented(&self, h: K::OrientedEdge) -> bool {
        self.inner.edge_kind_at(h) == EdgeKind::Misoriented
    }
}

/// The items of an iterator, perhaps with a fault in how it can be driven.
#[derive(Clone, Debug)]
pub(super) struct Items<T> {
    items: std::vec::IntoIter<T>,
    fold_drops_the_last: bool,
    /// What comes once more after the end.
    again: Option<T>,
    ended: bool,
}

impl<T: Clone> Items<T> {
    fn sound(items: impl Iterator<Item = T>) -> Self {
        let items = items.collect::<Vec<_>>().into_iter();
        Self { items, fold_drops_the_last: false, again: None, ended: false }
    }
}

impl<T: Clone> Iterator for Items<T> {
    type Item = T;

    fn next(&mut self) -> Option<T> {
        let item = self.items.next();
        if item.is_some() {
            return item;
        }
        if self.ended {
            return self.again.take();
        }
        self.ended = true;
        None
    }

    fn fold<B, F: FnMut(B, T) -> B>(mut self, init: B, f: F) -> B {
        if self.fold_drops_the_last {
            self.items.next_back();
        }
        self.items.fold(init, f)
    }
}

impl<T: Clone> FusedIterator for Items<T> {}

macro_rules! as_inner {
    ($(fn $name:ident(&self $(, $arg:ident: $kind:ty)*) -> $answer:ty;)*) => {
        $(fn $name(&self $(, $arg: $kind)*) -> $answer {
            self.inner.$name($($arg),*)
        })*
    };
}

#[deny(clippy::missing_trait_methods)]
impl<K: Topology> Topology for Planted<K> {
    type Vertex = K::Vertex;
    type Edge = K::Edge;
    type Face = K::Face;
    type OrientedEdge = K::OrientedEdge;
    type Vertices<'a>
        = Items<K::Vertex>
    where
        Self: 'a;
    type Edges<'a>
        = K::Edges<'a>
    where
        Self: 'a;
    type Faces<'a>
        = Items<K::Face>
    where
        Self: 'a;
    type OrientedEdges<'a>
        = K::OrientedEdges<'a>
    where
        Self: 'a;

    const COST: Costs = K::COST;

    as_inner! {
        fn oriented_edge_count(&self) -> usize;
        fn vertex_bound(&self) -> usize;
        fn edge_bound(&self) -> usize;
        fn face_bound(&self) -> usize;
        fn oriented_edge_bound(&self) -> usize;
        fn edge_at(&self, index: usize) -> Option<K::Edge>;
        fn oriented_edge_at(&self, index: usize) -> Option<K::OrientedEdge>;
        fn edges(&self) -> K::Edges<'_>;
        fn oriented_edges(&self) -> K::OrientedEdges<'_>;
        fn start(&self, h: K::OrientedEdge) -> K::Vertex;
        fn next(&self, h: K::OrientedEdge) -> K::OrientedEdge;
        fn face(&self, h: K::OrientedEdge) -> K::Face;
    }

    fn vertex_count(&self) -> usize {
        self.inner.vertex_count().saturating_sub(usize::from(self.spoiled))
    }

    fn edge_count(&self) -> usize {
        let off = self.has(Fault::EdgeCountOffAfterRemoval) && self.removed;
        self.inner.edge_count() + usize::from(off)
    }

    fn face_count(&self) -> usize {
        let off = self.has(Fault::FaceCountOffAfterRemoval) && self.removed;
        self.inner.face_count() + usize::from(off)
    }

    fn inner_loop_count(&self) -> usize {
        if self.has(Fault::KeepsInnerLoopCount) {
            return self.inner_loops;
        }
        self.inner.inner_loop_count()
    }

    fn vertex_at(&self, index: usize) -> Option<K::Vertex> {
        let loses = self.has(Fault::LookupLosesUpperBits);
        self.inner.vertex_at(if loses { index as u32 as usize } else { index })
    }

    fn face_at(&self, index: usize) -> Option<K::Face> {
        if self.has(Fault::LooksUpRetiredFaces) {
            return self.all_faces.get(index).copied();
        }
        self.inner.face_at(index)
    }

    fn vertices(&self) -> Items<K::Vertex> {
        let mut items = Items::sound(self.inner.vertices());
        items.fold_drops_the_last = self.has(Fault::FoldDropsTheLast);
        if self.has(Fault::GoesOnAfterTheEnd) {
            items.again = self.inner.vertices().next();
        }
        if self.has(Fault::IteratesBackwards) {
            items.items = items.items.rev().collect::<Vec<_>>().into_iter();
        }
        items
    }

    fn faces(&self) -> Items<K::Face> {
        if self.has(Fault::IteratesRetiredFaces) {
            return Items::sound(self.all_faces.iter().copied());
        }
        Items::sound(self.inner.faces())
    }

    fn end(&self, h: K::OrientedEdge) -> K::Vertex {
        if self.has(Fault::EndIsStart) { self.inner.start(h) } else { self.inner.end(h) }
    }

    fn prev(&self, h: K::OrientedEdge) -> K::OrientedEdge {
        let prev = self.inner.prev(h);
        let next = self.inner.next(h);
        let is_last = self.inner.bound(self.inner.face(h), 0) == Some(FaceBound::EdgeLoop(next));
        if self.has(Fault::PrevOfTheLastCorner) && is_last { h } else { prev }
    }

    fn radial(&self, h: K::OrientedEdge) -> K::OrientedEdge {
        let uses = self.cycle(h);
        let radial = self.inner.radial(h);
        if uses.len() < 3 {
            return radial;
        }
        if self.has(Fault::ReversesRadialOrder) {
            return uses[uses.len() - 1];
        }
        // The highest use is left out of the cycle.
        let skipped = uses.iter().copied().max();
        if self.has(Fault::MissesTheThirdUse) && Some(radial) == skipped {
            return self.inner.radial(radial);
        }
        radial
    }

    fn turn(&self, h: K::OrientedEdge) -> Option<K::OrientedEdge> {
        let faulty = match self.fault {
            Fault::TurnsAtMisorientedEdges => self.is_misoriented(h),
            Fault::TurnsAtBoundaries => self.inner.radial(h) == h,
            _ => false,
        };
        if faulty { Some(self.inner.next(self.inner.radial(h))) } else { self.inner.turn(h) }
    }

    fn is_plain(&self, h: K::OrientedEdge) -> bool {
        let faulty = self.has(Fault::MisorientedIsPlain) && self.is_misoriented(h);
        faulty || self.inner.is_plain(h)
    }

    fn edge(&self, h: K::OrientedEdge) -> K::Edge {
        let uses = self.cycle(h);
        if self.has(Fault::ThirdUseOfAnEdgeOfItsOwn)
            && uses.len() > 2
            && uses.iter().max() == Some(&h)
            && let Some(other) = self.inner.edges().find(|&e| e != self.inner.edge(h))
        {
            return other;
        }
        self.inner.edge(h)
    }

    fn runs_with_edge(&self, h: K::OrientedEdge) -> bool {
        self.has(Fault::AllUsesRunWithTheirEdge) || self.inner.runs_with_edge(h)
    }

    fn edge_use(&self, e: K::Edge) -> K::OrientedEdge {
        if self.has(Fault::EdgeUseOfAnotherEdge)
            && let Some(other) = self.inner.edges().next()
        {
            return self.inner.edge_use(other);
        }
        self.inner.edge_use(e)
    }

    fn sector(&self, v: K::Vertex, i: usize) -> Option<K::OrientedEdge> {
        let count = (0..).take_while(|&i| self.inner.sector(v, i).is_some()).count();
        match self.fault {
            Fault::DropsTheSecondSector if i > 0 => None,
            Fault::NumbersSectorsBackwards if i < count => self.inner.sector(v, count - 1 - i),
            Fault::OneSectorTooMany if i == count => self.inner.sector(v, 0),
            Fault::KeepsTheHandlesOfBefore if self.removed => {
                let lives = |h: &&K::OrientedEdge| self.inner.has_oriented_edge(**h);
                self.handles[v.index()].iter().filter(lives).nth(i).copied()
            }
            Fault::HandleInsideAnOpenSector => {
                let handle = self.inner.sector(v, i)?;
                // One corner in, where there is one and it is not the handle again.
                Some(self.inner.turn(handle).unwrap_or(handle))
            }
            _ => self.inner.sector(v, i),
        }
    }

    fn vertex_loop(&self, v: K::Vertex, i: usize) -> Option<K::Face> {
        if self.has(Fault::OneVertexLoopOnly) && i > 0 {
            return None;
        }
        self.inner.vertex_loop(v, i)
    }

    fn bound(&self, f: K::Face, i: usize) -> Option<FaceBound<K::OrientedEdge, K::Vertex>> {
        if self.has(Fault::BoundsBackwards) {
            let count = (0..).take_while(|&i| self.inner.bound(f, i).is_some()).count();
            return self.inner.bound(f, count.checked_sub(i)?.checked_sub(1)?);
        }
        self.inner.bound(f, i)
    }

    fn triangle(&self, f: K::Face) -> Option<[K::OrientedEdge; 3]> {
        let [a, b, c] = self.inner.triangle(f)?;
        Some(if self.has(Fault::TriangleBeginsElsewhere) { [b, c, a] } else { [a, b, c] })
    }

    fn across(&self, h: K::OrientedEdge) -> K::Face {
        if self.has(Fault::AcrossStaysHere) { self.inner.face(h) } else { self.inner.across(h) }
    }

    fn index_buffer(&self) -> Option<&[[u32; 3]]> {
        (self.has(Fault::IndexBufferBackwards) && !self.buffer.is_empty()).then_some(&self.buffer)
    }

    fn footprint(&self) -> Footprint {
        let mut footprint = self.inner.footprint();
        if self.has(Fault::TwoArraysOfOneName) {
            footprint.arrays[1].name = footprint.arrays[0].name;
        }
        footprint
    }
}

#[deny(clippy::missing_trait_methods)]
impl<K: Assemble> Assemble for Planted<K> {
    fn assemble(list: FaceList<'_>) -> Result<Self, AssembleError> {
        let fault = FAULT.get();
        let inner = K::assemble(list).map_err(|error| match error {
            AssembleError::List(FaceListError::VertexOutOfRange {
                corner,
                vertex,
                vertex_count,
            }) if fault == Fault::ErrorNamesTheNextCorner => {
                let corner = corner + 1;
                FaceListError::VertexOutOfRange { corner, vertex, vertex_count }.into()
            }
            error => error,
        })?;
        let backwards = |t: &[u32; 3]| [t[2], t[1], t[0]];
        Ok(Self {
            fault,
            all_faces: inner.faces().collect(),
            inner_loops: inner.inner_loop_count(),
            handles: inner.vertices().map(|v| inner.vertex_sectors(v).collect()).collect(),
            buffer: list.as_triangles().unwrap_or_default().iter().map(backwards).collect(),
            inner,
            removed: false,
            spoiled: false,
        })
    }

    fn remove_face(&mut self, face: K::Face) -> Result<RemovedFace<K::Edge>, EditError> {
        let mut removed = match self.inner.remove_face(face) {
            Err(EditError::Stale { .. }) if self.has(Fault::StaleFaceAccepted) => {
                return Ok(RemovedFace { retired_edges: Vec::new(), moved_edges: Vec::new() });
            }
            other => other?,
        };
        self.removed = true;
        if self.has(Fault::RetiredEdgesUnreported) {
            removed.retired_edges.clear();
        }
        if self.has(Fault::MovedEdgesUnreported) {
            removed.moved_edges.clear();
        }
        Ok(removed)
    }

    fn remove_isolated_vertex(&mut self, vertex: K::Vertex) -> Result<(), EditError> {
        match self.inner.remove_isolated_vertex(vertex) {
            Err(EditError::Stale { .. }) if self.has(Fault::StaleVertexAccepted) => Ok(()),
            Err(EditError::VertexInUse { .. }) if self.has(Fault::UsedVertexAccepted) => Ok(()),
            Err(error) => {
                self.spoiled = self.has(Fault::RefusalLeavesATrace);
                Err(error)
            }
            other => other,
        }
    }

    fn compact(&mut self) -> Compaction<K::Vertex, K::Edge, K::Face, K::OrientedEdge> {
        let oriented_edge_bound = self.inner.oriented_edge_bound();
        let before: Vec<_> = self.inner.oriented_edges().collect();
        let mut moved = self.inner.compact();
        self.all_faces = self.inner.faces().collect();
        self.handles =
            self.inner.vertices().map(|v| self.inner.vertex_sectors(v).collect()).collect();
        self.inner_loops = self.inner.inner_loop_count();
        self.buffer.clear();
        if self.has(Fault::CompactionLeavesAColumnBehind) {
            // As if nothing had moved, though new ids are what the rest of the kernel answers.
            let mut targets = vec![None; oriented_edge_bound];
            for h in before {
                targets[h.index()] = Some(h);
            }
            let bound = self.inner.oriented_edge_bound();
            moved.oriented_edges = Correspondence::new(targets, bound);
        }
        if self.has(Fault::CompactionSwapsFaces) {
            let mut targets = moved.faces.targets().to_vec();
            let live: Vec<usize> = (0..targets.len()).filter(|&i| targets[i].is_some()).collect();
            if let [first, second, ..] = live[..] {
                targets.swap(first, second);
            }
            moved.faces = Correspondence::new(targets, moved.faces.new_bound());
        }
        moved
    }
}
