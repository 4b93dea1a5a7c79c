//! A kernel beside the reference, cell by cell.

use crate::conformance::reference::ListedBound;
use crate::conformance::{Capabilities, Departure, Failure, Reference};
use crate::{
    Compaction, Correspondence, Cost, EdgeId, FaceBound, FaceId, Id, OrientedEdgeId, Topology,
    VertexId,
};
use std::collections::{BTreeMap, BTreeSet};
use std::fmt::{Arguments, Debug};

/// Ids of one kind, the reference's and the kernel's, both ways.
#[derive(Clone, Debug)]
pub(super) struct TwoWay<R, I> {
    pub(super) theirs: BTreeMap<R, I>,
    pub(super) ours: BTreeMap<I, R>,
}

impl<R: Id, I: Id> TwoWay<R, I> {
    fn new() -> Self {
        Self { theirs: BTreeMap::new(), ours: BTreeMap::new() }
    }

    /// `false` when either was paired before.
    fn pair(&mut self, ours: R, theirs: I) -> bool {
        self.theirs.insert(ours, theirs).is_none() & self.ours.insert(theirs, ours).is_none()
    }

    fn keep(&mut self, lives: impl Fn(R) -> bool) {
        self.theirs.retain(|&r, _| lives(r));
        self.ours.retain(|_, &mut r| lives(r));
    }

    fn follow(&self, ours: &Correspondence<R, R>, theirs: &Correspondence<I, I>) -> Option<Self> {
        let mut moved = Self::new();
        for (&r, &i) in &self.theirs {
            if !moved.pair(ours.get(r)?, theirs.get(i)?) {
                return None;
            }
        }
        Some(moved)
    }
}

/// Which cell of a kernel is which of the reference.
#[derive(Debug)]
pub(super) struct Ids<K: Topology> {
    pub(super) vertices: TwoWay<VertexId, K::Vertex>,
    pub(super) edges: TwoWay<EdgeId, K::Edge>,
    pub(super) faces: TwoWay<FaceId, K::Face>,
    pub(super) oriented_edges: TwoWay<OrientedEdgeId, K::OrientedEdge>,
}

impl<K: Topology> Ids<K> {
    /// Forgets what the reference no longer has.
    pub(super) fn keep_live(&mut self, reference: &Reference) {
        self.vertices.keep(|v| reference.vertices.contains(&v));
        self.edges.keep(|e| reference.edges.contains_key(&e));
        self.faces.keep(|f| reference.faces.contains_key(&f));
        self.oriented_edges.keep(|h| reference.uses.contains_key(&h));
    }

    /// Pairs the edges anew, by the edge the kernel gives for their first uses.
    pub(super) fn pair_edges(&mut self, mesh: &K, reference: &Reference) {
        self.edges = TwoWay::new();
        for (&e, uses) in &reference.edges {
            if let Some(&h) = self.oriented_edges.theirs.get(&uses[0]) {
                self.edges.pair(e, mesh.edge(h));
            }
        }
    }

    /// The pairs after both were compacted; `None` where a live cell is not among the moved.
    pub(super) fn follow(
        &self,
        ours: &Compaction<VertexId, EdgeId, FaceId, OrientedEdgeId>,
        theirs: &Compaction<K::Vertex, K::Edge, K::Face, K::OrientedEdge>,
    ) -> Option<Self> {
        Some(Self {
            vertices: self.vertices.follow(&ours.vertices, &theirs.vertices)?,
            edges: self.edges.follow(&ours.edges, &theirs.edges)?,
            faces: self.faces.follow(&ours.faces, &theirs.faces)?,
            oriented_edges: self
                .oriented_edges
                .follow(&ours.oriented_edges, &theirs.oriented_edges)?,
        })
    }
}

/// What is being done, for [`Failure`]s to tell.
#[derive(Clone, Debug)]
pub(super) struct Scene {
    pub(super) kernel: &'static str,
    pub(super) case: String,
    pub(super) step: String,
}

impl Scene {
    pub(super) fn new(capabilities: &Capabilities, case: &str) -> Self {
        Self { kernel: capabilities.kernel, case: case.to_owned(), step: "assembled".to_owned() }
    }

    pub(super) fn fail(
        &self,
        what: &'static str,
        place: Arguments<'_>,
        expected: impl Debug,
        found: impl Debug,
    ) -> Failure {
        Failure::from(Departure {
            kernel: self.kernel,
            case: self.case.clone(),
            step: self.step.clone(),
            what,
            place: place.to_string(),
            expected: format!("{expected:?}"),
            found: format!("{found:?}"),
        })
    }

    pub(super) fn same<T: PartialEq + Debug + ?Sized>(
        &self,
        what: &'static str,
        place: Arguments<'_>,
        expected: &T,
        found: &T,
    ) -> Result<(), Failure> {
        if expected == found { Ok(()) } else { Err(self.fail(what, place, expected, found)) }
    }
}

/// A kernel and the reference in the same state, with the cells of one known in the other.
#[derive(Debug)]
pub struct Paired<'a, K: Topology> {
    pub(super) mesh: &'a K,
    pub(super) reference: &'a Reference,
    pub(super) ids: &'a Ids<K>,
    pub(super) scene: &'a Scene,
    /// Whether nothing has been removed since the face list was assembled.
    pub(super) fresh: bool,
}

impl<K: Topology> Paired<'_, K> {
    pub(super) fn same<T: PartialEq + Debug + ?Sized>(
        &self,
        what: &'static str,
        place: Arguments<'_>,
        expected: &T,
        found: &T,
    ) -> Result<(), Failure> {
        self.scene.same(what, place, expected, found)
    }

    /// The reference's name for a vertex the kernel gave.
    pub(super) fn v(&self, what: &'static str, v: K::Vertex) -> Result<VertexId, Failure> {
        self.named(what, &self.ids.vertices.ours, v)
    }

    pub(super) fn e(&self, what: &'static str, e: K::Edge) -> Result<EdgeId, Failure> {
        self.named(what, &self.ids.edges.ours, e)
    }

    pub(super) fn f(&self, what: &'static str, f: K::Face) -> Result<FaceId, Failure> {
        self.named(what, &self.ids.faces.ours, f)
    }

    pub(super) fn h(
        &self,
        what: &'static str,
        h: K::OrientedEdge,
    ) -> Result<OrientedEdgeId, Failure> {
        self.named(what, &self.ids.oriented_edges.ours, h)
    }

    fn named<I: Id, R: Id>(
        &self,
        what: &'static str,
        names: &BTreeMap<I, R>,
        id: I,
    ) -> Result<R, Failure> {
        names
            .get(&id)
            .copied()
            .ok_or_else(|| self.scene.fail(what, format_args!("{id:?}"), "a live cell", id))
    }

    /// The bound of the reference in this place, or the failure to have one there.
    pub(super) fn bound(
        &self,
        what: &'static str,
        bound: FaceBound<K::OrientedEdge, K::Vertex>,
    ) -> Result<FaceBound<OrientedEdgeId, VertexId>, Failure> {
        Ok(match bound {
            FaceBound::EdgeLoop(h) => FaceBound::EdgeLoop(self.h(what, h)?),
            FaceBound::VertexLoop(v) => FaceBound::VertexLoop(self.v(what, v)?),
        })
    }
}

/// Finds out which cell is which right after assembling: vertices and faces by index, oriented
/// edges by face, bound and position in the loop, edges by their uses.
pub(super) fn pair<K: Topology>(
    mesh: &K,
    reference: &Reference,
    scene: &Scene,
) -> Result<Ids<K>, Failure> {
    let mut ids = Ids {
        vertices: TwoWay::new(),
        edges: TwoWay::new(),
        faces: TwoWay::new(),
        oriented_edges: TwoWay::new(),
    };
    for &v in &reference.vertices {
        let Some(theirs) = mesh.vertex_at(v.index()).filter(|t| t.index() == v.index()) else {
            return Err(scene.fail("vertex_at", format_args!("{v}"), v, mesh.vertex_at(v.index())));
        };
        ids.vertices.pair(v, theirs);
    }
    for &f in reference.faces.keys() {
        let Some(theirs) = mesh.face_at(f.index()).filter(|t| t.index() == f.index()) else {
            return Err(scene.fail("face_at", format_args!("{f}"), f, mesh.face_at(f.index())));
        };
        ids.faces.pair(f, theirs);
    }
    for (&f, bounds) in &reference.faces {
        for (number, bound) in bounds.iter().enumerate() {
            let theirs = mesh.bound(ids.faces.theirs[&f], number);
            let place = format_args!("{f}, bound {number}");
            match (bound, theirs) {
                (ListedBound::VertexLoop(v), Some(FaceBound::VertexLoop(theirs)))
                    if ids.vertices.theirs[v] == theirs => {}
                (ListedBound::EdgeLoop(corners), Some(FaceBound::EdgeLoop(first))) => {
                    pair_loop(mesh, reference, scene, &mut ids, corners, first)?;
                }
                _ => return Err(scene.fail("bound", place, bound, theirs)),
            }
        }
    }
    for (&e, uses) in &reference.edges {
        let theirs: BTreeSet<K::Edge> =
            uses.iter().map(|h| mesh.edge(ids.oriented_edges.theirs[h])).collect();
        match theirs.first() {
            Some(&theirs_first) if theirs.len() == 1 && ids.edges.pair(e, theirs_first) => {
                if K::COST.edge == Cost::Constant {
                    let index = theirs_first.index();
                    scene.same("index of edge", format_args!("{e}"), &e.index(), &index)?;
                }
            }
            _ => {
                let place = format_args!("{e}, used by {uses:?}");
                return Err(scene.fail("edge", place, "one edge, of these uses alone", theirs));
            }
        }
    }
    Ok(ids)
}

/// Pairs the oriented edges of one loop, which the kernel may begin at any corner of it.
fn pair_loop<K: Topology>(
    mesh: &K,
    reference: &Reference,
    scene: &Scene,
    ids: &mut Ids<K>,
    corners: &[OrientedEdgeId],
    first: K::OrientedEdge,
) -> Result<(), Failure> {
    let place = format_args!("loop {corners:?}");
    let mut theirs = vec![first];
    let mut h = mesh.next(first);
    while h != first && theirs.len() <= corners.len() {
        theirs.push(h);
        h = mesh.next(h);
    }
    if theirs.len() != corners.len() {
        return Err(scene.fail("next", place, corners, theirs));
    }
    let n = corners.len();
    let starts: Vec<VertexId> = corners.iter().map(|&c| reference.uses[&c].start).collect();
    let begins_there = |shift: &usize| {
        (0..n).all(|i| {
            ids.vertices.ours.get(&mesh.start(theirs[i])) == Some(&starts[(i + shift) % n])
        })
    };
    let Some(shift) = (0..n).find(begins_there) else {
        let found: Vec<_> = theirs.iter().map(|&h| mesh.start(h)).collect();
        return Err(scene.fail("start", place, starts, found));
    };
    for (i, &h) in theirs.iter().enumerate() {
        if !ids.oriented_edges.pair(corners[(i + shift) % n], h) {
            return Err(scene.fail("next", place, "each oriented edge in one place", &theirs));
        }
    }
    Ok(())
}
