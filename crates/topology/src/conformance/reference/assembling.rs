//! [`Assemble`] of the reference: lists written down, struck out and renumbered.

use super::{Bounds, ListedBound, Reference, Use};
use crate::{
    Assemble, AssembleError, Compaction, Correspondence, EdgeId, EditError, FaceId, FaceList,
    FaceListError, Id, OrientedEdgeId, RemovedFace, VertexId,
};
use std::collections::BTreeMap;

/// Start and end of an edge.
type Ends = (u32, u32);

/// Which edge every corner uses, and whether it runs with it, by the corner's number in the list;
/// corners of vertex loops have no entry.
type EdgeOfCorner = BTreeMap<usize, (EdgeId, bool)>;

/// The corners of all edge loops with the vertices they run between, in the order of the list.
fn listed_sides(list: FaceList<'_>) -> Vec<(usize, Ends)> {
    let mut sides = Vec::new();
    for listed in (0..list.face_count()).flat_map(|face| list.loops(face)) {
        if listed.is_vertex_loop {
            continue;
        }
        let corners = listed.corners;
        for (i, &start) in corners.iter().enumerate() {
            let end = corners[(i + 1) % corners.len()];
            sides.push((listed.first_corner + i, (start, end)));
        }
    }
    sides
}

/// One edge for each unordered pair of vertices, running as its first use does.
fn edges_by_vertices(sides: &[(usize, Ends)]) -> EdgeOfCorner {
    let mut made: BTreeMap<Ends, (EdgeId, Ends, usize)> = BTreeMap::new();
    let mut edges = EdgeOfCorner::new();
    for &(corner, (start, end)) in sides {
        let fresh = EdgeId::from_u32(made.len() as u32);
        let pair = (start.min(end), start.max(end));
        let (edge, way, uses) = made.entry(pair).or_insert((fresh, (start, end), 0));
        // An edge from a vertex to itself has no way to be told by its ends: uses take turns.
        let with = if start == end { uses.is_multiple_of(2) } else { *way == (start, end) };
        *uses += 1;
        edges.insert(corner, (*edge, with));
    }
    edges
}

/// The edges as the list numbers them, once it is sure that the numbers make sense.
fn edges_by_number(
    list: FaceList<'_>,
    sides: &[(usize, Ends)],
) -> Result<Option<EdgeOfCorner>, FaceListError> {
    let Some(uses) = list.edge_uses() else { return Ok(None) };
    let mut made: BTreeMap<u32, Ends> = BTreeMap::new();
    let mut edges = EdgeOfCorner::new();
    for &(corner, (start, end)) in sides {
        let (edge, with) = (uses[corner].edge(), uses[corner].runs_with_edge());
        let way = if with { (start, end) } else { (end, start) };
        if *made.entry(edge).or_insert(way) != way {
            return Err(FaceListError::InconsistentEdge { edge, corner });
        }
        edges.insert(corner, (EdgeId::from_u32(edge), with));
    }
    for (expected, (&edge, _)) in made.iter().enumerate() {
        let expected = expected as u32;
        if edge != expected {
            let above = |side: &&(usize, Ends)| uses[side.0].edge() > expected;
            let corner = sides.iter().find(above).map_or(0, |side| side.0);
            return Err(FaceListError::InconsistentEdge { edge: expected, corner });
        }
    }
    Ok(Some(edges))
}

/// New ids for the live ones: each moves down to the place behind those below it.
fn moved_down<I: Id>(
    live: impl Iterator<Item = I>,
    old_bound: usize,
    id: impl Fn(u32) -> I,
) -> Correspondence<I, I> {
    let mut targets = vec![None; old_bound];
    let mut new_bound = 0;
    for old in live {
        targets[old.index()] = Some(id(new_bound));
        new_bound += 1;
    }
    Correspondence::new(targets, new_bound as usize)
}

#[deny(clippy::missing_trait_methods)]
impl Assemble for Reference {
    fn assemble(list: FaceList<'_>) -> Result<Self, AssembleError> {
        list.check()?;
        let sides = listed_sides(list);
        let edge_of = match edges_by_number(list, &sides)? {
            Some(edges) => edges,
            None => edges_by_vertices(&sides),
        };
        let mut mesh = Self {
            vertices: (0..list.vertex_count() as u32).map(VertexId::from_u32).collect(),
            edges: BTreeMap::new(),
            faces: BTreeMap::new(),
            uses: BTreeMap::new(),
            bounds: Bounds::default(),
            joints: Default::default(),
            sectors: BTreeMap::new(),
        };
        for number in 0..list.face_count() {
            let face = FaceId::from_u32(number as u32);
            let mut bounds = Vec::new();
            for (bound, listed) in list.loops(number).enumerate() {
                if listed.is_vertex_loop {
                    bounds.push(ListedBound::VertexLoop(VertexId::from_u32(listed.corners[0])));
                    continue;
                }
                let mut corners = Vec::new();
                for (position, &start) in listed.corners.iter().enumerate() {
                    let h = OrientedEdgeId::from_u32(mesh.uses.len() as u32);
                    let (edge, with) = edge_of[&(listed.first_corner + position)];
                    let start = VertexId::from_u32(start);
                    mesh.uses.insert(h, Use { start, edge, with, face, bound, position });
                    mesh.edges.entry(edge).or_default().push(h);
                    corners.push(h);
                }
                bounds.push(ListedBound::EdgeLoop(corners));
            }
            mesh.faces.insert(face, bounds);
        }
        mesh.bounds = Bounds {
            vertices: mesh.vertices.len(),
            edges: mesh.edges.len(),
            faces: mesh.faces.len(),
            oriented_edges: mesh.uses.len(),
        };
        mesh.refresh();
        Ok(mesh)
    }

    fn remove_face(&mut self, face: FaceId) -> Result<RemovedFace<EdgeId>, EditError> {
        self.faces.remove(&face).ok_or_else(|| EditError::stale("face", face))?;
        self.uses.retain(|_, u| u.face != face);
        for uses in self.edges.values_mut() {
            uses.retain(|h| self.uses.contains_key(h));
        }
        let unused = self.edges.iter().filter(|(_, uses)| uses.is_empty());
        let retired_edges: Vec<EdgeId> = unused.map(|(&e, _)| e).collect();
        self.edges.retain(|_, uses| !uses.is_empty());
        self.refresh();
        Ok(RemovedFace { retired_edges, moved_edges: Vec::new() })
    }

    fn remove_isolated_vertex(&mut self, vertex: VertexId) -> Result<(), EditError> {
        if !self.vertices.contains(&vertex) {
            return Err(EditError::stale("vertex", vertex));
        }
        let corner = self.uses.values().find(|u| u.start == vertex).map(|u| u.face);
        if let Some(face) = corner.or_else(|| self.vertex_loops_at(vertex).first().copied()) {
            return Err(EditError::VertexInUse { vertex: vertex.index(), face: face.index() });
        }
        self.vertices.remove(&vertex);
        Ok(())
    }

    fn compact(&mut self) -> Compaction<VertexId, EdgeId, FaceId, OrientedEdgeId> {
        let old = self.bounds;
        let vertices = moved_down(self.vertices.iter().copied(), old.vertices, VertexId::from_u32);
        let edges = moved_down(self.edges.keys().copied(), old.edges, EdgeId::from_u32);
        let faces = moved_down(self.faces.keys().copied(), old.faces, FaceId::from_u32);
        let oriented_edges =
            moved_down(self.uses.keys().copied(), old.oriented_edges, OrientedEdgeId::from_u32);
        let v = |id| vertices.get(id).unwrap_or(id);
        let e = |id| edges.get(id).unwrap_or(id);
        let f = |id| faces.get(id).unwrap_or(id);
        let h = |id| oriented_edges.get(id).unwrap_or(id);
        let bound = |bound: &ListedBound| match bound {
            ListedBound::EdgeLoop(corners) => {
                ListedBound::EdgeLoop(corners.iter().map(|&c| h(c)).collect())
            }
            ListedBound::VertexLoop(vertex) => ListedBound::VertexLoop(v(*vertex)),
        };
        let faces_moved =
            self.faces.iter().map(|(&id, bounds)| (f(id), bounds.iter().map(bound).collect()));
        let faces_moved = faces_moved.collect();
        self.edges = self
            .edges
            .iter()
            .map(|(&id, uses)| (e(id), uses.iter().map(|&u| h(u)).collect()))
            .collect();
        self.uses = self
            .uses
            .iter()
            .map(|(&id, u)| {
                (h(id), Use { start: v(u.start), edge: e(u.edge), face: f(u.face), ..*u })
            })
            .collect();
        self.vertices = self.vertices.iter().map(|&id| v(id)).collect();
        self.faces = faces_moved;
        self.bounds = Bounds {
            vertices: self.vertices.len(),
            edges: self.edges.len(),
            faces: self.faces.len(),
            oriented_edges: self.uses.len(),
        };
        self.refresh();
        Compaction { vertices, edges, faces, oriented_edges }
    }
}
