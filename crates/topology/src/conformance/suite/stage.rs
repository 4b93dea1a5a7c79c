//! A kernel and the reference taken through the same assembling, removals and compactions.

use super::check_everything;
use super::pairing::{Ids, Paired, Scene, pair};
use crate::conformance::{Capabilities, Complex, Failure, Reference};
use crate::{
    Assemble, AssembleError, Column, Correspondence, Cost, EditError, FaceId, FaceList, Id,
    Topology, TopologyExt, VertexId,
};
use std::collections::{BTreeMap, BTreeSet};
use std::fmt::Debug;

/// A face and a vertex of another topology.
type Foreign<K> = Option<(<K as Topology>::Face, <K as Topology>::Vertex)>;

/// Both in the same state.
pub(super) struct Stage<'c, K: Topology> {
    capabilities: &'c Capabilities,
    pub(super) mesh: K,
    pub(super) reference: Reference,
    pub(super) ids: Ids<K>,
    pub(super) scene: Scene,
    fresh: bool,
    /// Ids of before, which must stay dead until a compaction voids them.
    retired_faces: Vec<K::Face>,
    retired_vertices: Vec<K::Vertex>,
}

/// The complex as this kernel sees it: without edge numbers where it has no edges to number.
pub(super) fn as_held(capabilities: &Capabilities, complex: &Complex) -> Complex {
    let mut held = complex.clone();
    if !capabilities.edge_numbers {
        held.edge_uses = None;
    }
    held
}

impl<'c, K: Assemble> Stage<'c, K> {
    /// Assembles both. `None` where the kernel rightly refused what is beyond it.
    pub(super) fn assemble(
        capabilities: &'c Capabilities,
        complex: &Complex,
        by_triangles: bool,
    ) -> Result<Option<Self>, Failure> {
        let held = as_held(capabilities, complex);
        let scene = Scene::new(capabilities, &complex.name);
        let buffer = held.to_list();
        let triangles = held.as_triangles().filter(|_| by_triangles);
        let list = match &triangles {
            Some(triangles) => FaceList::triangles(held.vertex_count, triangles),
            None => buffer.as_list(),
        };
        let beyond = (0..held.faces.len()).any(|face| held.exceeds(face, capabilities));
        let place = format_args!("the face list");
        let mesh = match K::assemble(list) {
            Err(error) if !beyond => {
                return Err(scene.fail("assemble", place, "a topology", error));
            }
            Ok(_) if beyond => {
                return Err(scene.fail("assemble", place, "CannotHold", "a topology"));
            }
            Err(AssembleError::CannotHold { kernel, face, what, advice }) => {
                scene.same("kernel of CannotHold", place, &scene.kernel, &kernel)?;
                let named = held.exceeds(face, capabilities);
                scene.same("face of CannotHold", format_args!("face {face}"), &true, &named)?;
                let told = !what.is_empty() && !advice.is_empty();
                scene.same("words of CannotHold", place, &true, &told)?;
                return Ok(None);
            }
            Err(error) => return Err(scene.fail("assemble", place, "CannotHold", error)),
            Ok(mesh) => mesh,
        };
        let reference = Reference::assemble(list)
            .map_err(|error| scene.fail("the reference's assemble", place, "a topology", error))?;
        let ids = pair(&mesh, &reference, &scene)?;
        let retired_faces = Vec::new();
        let retired_vertices = Vec::new();
        Ok(Some(Self {
            capabilities,
            mesh,
            reference,
            ids,
            scene,
            fresh: true,
            retired_faces,
            retired_vertices,
        }))
    }

    pub(super) fn paired(&self) -> Paired<'_, K> {
        Paired {
            mesh: &self.mesh,
            reference: &self.reference,
            ids: &self.ids,
            scene: &self.scene,
            fresh: self.fresh,
        }
    }

    /// Holds everything to the reference.
    pub(super) fn check(&self) -> Result<(), Failure> {
        check_everything(&self.paired())
    }

    fn edge_ids(&self) -> BTreeMap<crate::EdgeId, K::Edge> {
        self.ids.edges.theirs.clone()
    }

    /// Removes a face from both, and holds what the removal reports to what it did.
    pub(super) fn remove(&mut self, face: FaceId) -> Result<(), Failure> {
        let place = format_args!("{face}");
        self.scene.step = format!("{}, removed {face}", self.scene.step);
        self.fresh = false;
        let theirs = self.ids.faces.theirs[&face];
        let before = self.edge_ids();
        let ours = self.reference.remove_face(face);
        let found = self.mesh.remove_face(theirs);
        let (ours, found) = match (ours, found) {
            (Ok(ours), Ok(found)) => (ours, found),
            (ours, found) => return Err(self.scene.fail("remove_face", place, ours, found)),
        };
        self.retired_faces.push(theirs);
        self.ids.keep_live(&self.reference);
        let expected: BTreeSet<K::Edge> = ours.retired_edges.iter().map(|e| before[e]).collect();
        let mut retired = found.retired_edges.clone();
        retired.sort_unstable();
        let expected: Vec<K::Edge> = expected.into_iter().collect();
        self.scene.same("retired_edges", place, &expected, &retired)?;
        if K::COST.edge == Cost::Constant {
            // Records of edges stay; only places move.
            return self.scene.same("moved_edges", place, &Vec::new(), &found.moved_edges);
        }
        self.ids.pair_edges(&self.mesh, &self.reference);
        let now = self.edge_ids();
        let mut expected: Vec<(K::Edge, K::Edge)> =
            now.iter().map(|(e, &new)| (before[e], new)).filter(|(old, new)| old != new).collect();
        let mut moved = found.moved_edges;
        expected.sort_unstable();
        moved.sort_unstable();
        self.scene.same("moved_edges", place, &expected, &moved)
    }

    /// Removes a vertex from both; in use it must be refused by both.
    pub(super) fn remove_vertex(&mut self, v: VertexId) -> Result<(), Failure> {
        let place = format_args!("{v}");
        let theirs = self.ids.vertices.theirs[&v];
        let ours = self.reference.remove_isolated_vertex(v);
        let found = self.mesh.remove_isolated_vertex(theirs);
        match (&ours, &found) {
            (Ok(()), Ok(())) => {
                self.scene.step = format!("{}, removed {v}", self.scene.step);
                self.fresh = false;
                self.retired_vertices.push(theirs);
                self.ids.keep_live(&self.reference);
                Ok(())
            }
            (Err(EditError::VertexInUse { .. }), Err(EditError::VertexInUse { vertex, face }))
                if *vertex == v.index() && self.passes(*face, v) =>
            {
                Ok(())
            }
            _ => Err(self.scene.fail("remove_isolated_vertex", place, ours, found)),
        }
    }

    /// Whether a loop of face number `face` passes `v`.
    fn passes(&self, face: usize, v: VertexId) -> bool {
        let corner = self.reference.uses.values().any(|u| u.face.index() == face && u.start == v);
        corner || self.reference.vertex_loops_at(v).iter().any(|f| f.index() == face)
    }

    /// Everything that must be refused, and that refusing changed nothing: ids of retired cells,
    /// ids no topology of this size has, vertices in use.
    pub(super) fn check_refusals(&mut self) -> Result<(), Failure> {
        let beyond = self.foreign_ids()?;
        let dead_faces: Vec<K::Face> =
            self.retired_faces.iter().copied().chain(beyond.map(|ids| ids.0)).collect();
        for f in dead_faces {
            let expected = Err(EditError::stale("face", f));
            let found = self.mesh.remove_face(f);
            self.scene.same(
                "remove_face of a dead face",
                format_args!("{f:?}"),
                &expected,
                &found,
            )?;
        }
        let dead_vertices: Vec<K::Vertex> =
            self.retired_vertices.iter().copied().chain(beyond.map(|ids| ids.1)).collect();
        for v in dead_vertices {
            let expected = Err(EditError::stale("vertex", v));
            let found = self.mesh.remove_isolated_vertex(v);
            let what = "remove_isolated_vertex of a dead vertex";
            self.scene.same(what, format_args!("{v:?}"), &expected, &found)?;
        }
        let used: Vec<VertexId> =
            self.reference.vertices.iter().copied().filter(|&v| self.is_used(v)).collect();
        for v in used {
            self.remove_vertex(v)?;
        }
        let step = self.scene.step.clone();
        self.scene.step = format!("{step}, refused edits");
        self.check()?;
        self.scene.step = step;
        Ok(())
    }

    pub(super) fn is_used(&self, v: VertexId) -> bool {
        self.reference.sectors.contains_key(&v) || !self.reference.vertex_loops_at(v).is_empty()
    }

    /// A face and a vertex of a larger topology, beyond the bounds of this one.
    fn foreign_ids(&self) -> Result<Foreign<K>, Failure> {
        let faces = self.reference.face_bound() + 1;
        let vertices = self.reference.vertex_bound() + 3;
        let triangles = vec![[0, 1, 2]; faces];
        let place = format_args!("{faces} copies of a triangle");
        let larger = K::assemble(FaceList::triangles(vertices, &triangles))
            .map_err(|error| self.scene.fail("assemble", place, "a topology", error))?;
        Ok(larger.face_at(faces - 1).zip(larger.vertex_at(vertices - 1)))
    }

    /// Compacts both and holds the correspondence, columns and bounds to each other.
    pub(super) fn compact(&mut self) -> Result<(), Failure> {
        let place = format_args!("compaction");
        self.scene.step = format!("{}, compacted", self.scene.step);
        self.fresh = false;
        let mesh = &self.mesh;
        let bounds =
            [mesh.vertex_bound(), mesh.edge_bound(), mesh.face_bound(), mesh.oriented_edge_bound()];
        let vertices = filled(mesh.vertex_column(None), &self.ids.vertices.ours);
        let edges = filled(mesh.edge_column(None), &self.ids.edges.ours);
        let faces = filled(mesh.face_column(None), &self.ids.faces.ours);
        let oriented_edges = filled(mesh.oriented_edge_column(None), &self.ids.oriented_edges.ours);
        let old = Ids::<K> {
            vertices: self.ids.vertices.clone(),
            edges: self.ids.edges.clone(),
            faces: self.ids.faces.clone(),
            oriented_edges: self.ids.oriented_edges.clone(),
        };
        let theirs = self.mesh.compact();
        let ours = self.reference.compact();
        self.retired_faces.clear();
        self.retired_vertices.clear();
        let Some(ids) = old.follow(&ours, &theirs) else {
            return Err(self.scene.fail("compact", place, "where each live cell went", theirs));
        };
        let mesh = &self.mesh;
        let scene = &self.scene;
        let live = &old.vertices.ours;
        followed(
            scene,
            "vertices",
            live,
            bounds[0],
            mesh.vertex_bound(),
            &theirs.vertices,
            vertices,
        )?;
        let live = &old.edges.ours;
        followed(scene, "edges", live, bounds[1], mesh.edge_bound(), &theirs.edges, edges)?;
        let live = &old.faces.ours;
        followed(scene, "faces", live, bounds[2], mesh.face_bound(), &theirs.faces, faces)?;
        let live = &old.oriented_edges.ours;
        let bound = mesh.oriented_edge_bound();
        let moved = &theirs.oriented_edges;
        followed(scene, "oriented edges", live, bounds[3], bound, moved, oriented_edges)?;
        self.ids = ids;
        self.check_bounds_are_those_of_a_fresh_one()
    }

    fn check_bounds_are_those_of_a_fresh_one(&self) -> Result<(), Failure> {
        let left = as_held(self.capabilities, &Complex::from(&self.reference)).to_list();
        let place = format_args!("bounds after compaction");
        let fresh = K::assemble(left.as_list())
            .map_err(|error| self.scene.fail("assemble", place, "a topology", error))?;
        let bounds = |mesh: &K| {
            [mesh.vertex_bound(), mesh.edge_bound(), mesh.face_bound(), mesh.oriented_edge_bound()]
        };
        self.scene.same("compact", place, &bounds(&fresh), &bounds(&self.mesh))?;
        let retired = self.mesh.footprint().retired();
        self.scene.same("retired bytes after compaction", place, &0, &retired)
    }
}

/// Each live cell's column value is its name in the reference.
fn filled<I: Id, R: Id>(
    mut column: Column<I, Option<R>>,
    names: &BTreeMap<I, R>,
) -> Column<I, Option<R>> {
    for (&id, &name) in names {
        column[id] = Some(name);
    }
    column
}

/// Holds one kind's correspondence to the promise: cells move down in order, the dead go nowhere,
/// and a column arrives with them.
fn followed<I: Id, R: Id + Debug>(
    scene: &Scene,
    what: &'static str,
    live: &BTreeMap<I, R>,
    old_bound: usize,
    new_bound: usize,
    moved: &Correspondence<I, I>,
    column: Column<I, Option<R>>,
) -> Result<(), Failure> {
    let place = format_args!("compaction");
    scene.same(what, format_args!("slots before"), &old_bound, &moved.targets().len())?;
    scene.same(what, format_args!("bound after"), &new_bound, &moved.new_bound())?;
    let gone = moved.targets().iter().filter(|target| target.is_some()).count();
    scene.same(what, format_args!("cells that live on"), &live.len(), &gone)?;
    let targets: Vec<usize> =
        moved.targets().iter().flatten().map(|target| target.index()).collect();
    let ascending = targets.windows(2).all(|pair| pair[0] < pair[1]);
    scene.same(what, format_args!("order kept in {targets:?}"), &true, &ascending)?;
    let column = column.follow(moved, None);
    scene.same(what, place, &new_bound, &column.values().len())?;
    for (&id, name) in live {
        let arrived = moved.get(id).and_then(|new| column.get(new).copied().flatten());
        scene.same(what, format_args!("column at {id:?}"), &Some(*name), &arrived)?;
    }
    Ok(())
}
