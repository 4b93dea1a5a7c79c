//! The nine adjacency relations, and what is built on them.

use super::around::{sectors_by_handles, spokes_of};
use super::pairing::Paired;
use super::walks::{check_walk, corners_of_face, items, turned_to};
use crate::conformance::Failure;
use crate::conformance::definitions::{EdgeEnd, ends_of};
use crate::relations::distinct;
use crate::walks::{Walk, WalkState};
use crate::{EdgeId, FaceBound, FaceId, Id, OrientedEdgeId, Topology, TopologyExt, VertexId};
use std::collections::BTreeMap;
use std::fmt::{Arguments, Debug};

/// A relation: as a walk, then without repeats.
fn check_relation<K, S, T>(
    on: &Paired<'_, K>,
    (what, at): (&'static str, Arguments<'_>),
    walk: &Walk<'_, K, S>,
    expected: &[T],
    name: impl Fn(S::Item) -> Result<T, Failure>,
) -> Result<(), Failure>
where
    K: Topology,
    S: WalkState<K, Item: Id>,
    T: Copy + Debug + PartialEq,
{
    check_walk(on, (what, at), walk, expected, &name)?;
    let mut once: Vec<T> = Vec::new();
    for &item in expected {
        if !once.contains(&item) {
            once.push(item);
        }
    }
    let found: Vec<T> = distinct(walk.clone()).map(name).collect::<Result<_, _>>()?;
    on.same(what, format_args!("{at}, distinct"), &once[..], &found[..])
}

/// All nine relations from every cell, `edge_between` for every two vertices.
///
/// # Errors
/// [`Failure`] naming the relation and the cell.
pub fn check_relations<K: Topology>(on: &Paired<'_, K>) -> Result<(), Failure> {
    let mut around: BTreeMap<VertexId, Vec<(OrientedEdgeId, bool, EdgeEnd)>> = BTreeMap::new();
    for &v in on.ids.vertices.theirs.keys() {
        around.insert(v, spokes_of(on, &sectors_by_handles(on, v)?));
    }
    from_vertices(on, &around)?;
    from_edges(on, &around)?;
    from_faces(on)
}

fn from_vertices<K: Topology>(
    on: &Paired<'_, K>,
    around: &BTreeMap<VertexId, Vec<(OrientedEdgeId, bool, EdgeEnd)>>,
) -> Result<(), Failure> {
    let (mesh, reference) = (on.mesh, on.reference);
    let far_end = |end: EdgeEnd| ends_of(reference, end.0)[usize::from(!end.1)];
    for (&v, spokes) in around {
        let at = format_args!("{v}");
        let theirs = on.ids.vertices.theirs[&v];
        let vertices: Vec<VertexId> = spokes.iter().map(|s| far_end(s.2)).collect();
        let walk = mesh.vertex_vertices(theirs);
        check_relation(on, ("vertex_vertices", at), &walk, &vertices, |v| {
            on.v("vertex_vertices", v)
        })?;
        let edges: Vec<EdgeId> = spokes.iter().map(|s| s.2.0).collect();
        let walk = mesh.vertex_edges(theirs);
        check_relation(on, ("vertex_edges", at), &walk, &edges, |e| on.e("vertex_edges", e))?;

        let sectors = sectors_by_handles(on, v)?;
        let corners = sectors.iter().flat_map(|sector| &sector.corners);
        let mut faces: Vec<FaceId> = corners.map(|c| reference.uses[&c.corner].face).collect();
        let walk = mesh.vertex_faces(theirs);
        let loops = reference.vertex_loops_at(v);
        let found = items(&walk, faces.len() + loops.len(), |f| on.f("vertex_faces", f))?;
        // Vertex loops come behind the corners, in an order of the kernel's own.
        let mut tail = found.get(faces.len()..).unwrap_or_default().to_vec();
        faces.extend(&tail);
        tail.sort_unstable();
        on.same("vertex_faces by vertex loops", at, &loops[..], &tail[..])?;
        check_relation(on, ("vertex_faces", at), &walk, &faces, |f| on.f("vertex_faces", f))?;

        for (&w, &their_w) in &on.ids.vertices.theirs {
            let at = format_args!("{v} and {w}");
            let between = spokes.iter().any(|s| far_end(s.2) == w);
            let found = mesh.edge_between(theirs, their_w);
            on.same("edge_between", at, &between, &found.is_some())?;
            if let Some(edge) = found {
                let mut ends = ends_of(reference, on.e("edge_between", edge)?);
                ends.sort_unstable();
                on.same("edge_between", at, &[v.min(w), v.max(w)], &ends)?;
                let first = mesh.vertex_edge_ends(theirs).find(|s| s.far_end(mesh) == their_w);
                let first = first.map(|spoke| mesh.edge(spoke.oriented_edge));
                on.same("edge_between, the first of several", at, &first, &Some(edge))?;
            }
        }
    }
    Ok(())
}

fn from_edges<K: Topology>(
    on: &Paired<'_, K>,
    around: &BTreeMap<VertexId, Vec<(OrientedEdgeId, bool, EdgeEnd)>>,
) -> Result<(), Failure> {
    let (mesh, reference) = (on.mesh, on.reference);
    for (&e, &theirs) in &on.ids.edges.theirs {
        let at = format_args!("{e}");
        let first = on.h("edge_use", mesh.edge_use(theirs))?;
        let uses = turned_to(&reference.edges[&e], first);
        let faces: Vec<FaceId> = uses.iter().map(|h| reference.uses[h].face).collect();
        let walk = mesh.edge_faces(theirs);
        check_relation(on, ("edge_faces", at), &walk, &faces, |f| on.f("edge_faces", f))?;

        let mut ends = ends_of(reference, e).to_vec();
        // Edges that are places have a direction of the kernel's own.
        if mesh.runs_with_edge(mesh.edge_use(theirs)) != reference.uses[&first].with {
            ends.reverse();
        }
        ends.dedup();
        let met = ends.iter().flat_map(|v| &around[v]).map(|s| s.2.0);
        let edges: Vec<EdgeId> = met.filter(|&other| other != e).collect();
        let walk = mesh.edge_edges(theirs);
        check_relation(on, ("edge_edges", at), &walk, &edges, |e| on.e("edge_edges", e))?;
    }
    Ok(())
}

fn from_faces<K: Topology>(on: &Paired<'_, K>) -> Result<(), Failure> {
    let (mesh, reference) = (on.mesh, on.reference);
    for (&f, &theirs) in &on.ids.faces.theirs {
        let at = format_args!("{f}");
        let (mut vertices, mut edges, mut faces) = (Vec::new(), Vec::new(), Vec::new());
        for bound in corners_of_face(on, f)? {
            let corners = match bound {
                FaceBound::EdgeLoop(corners) => corners,
                FaceBound::VertexLoop(v) => {
                    vertices.push(v);
                    continue;
                }
            };
            for h in corners {
                let record = reference.uses[&h];
                vertices.push(record.start);
                edges.push(record.edge);
                let others = turned_to(&reference.edges[&record.edge], h).into_iter().skip(1);
                faces.extend(others.map(|other| reference.uses[&other].face));
            }
        }
        let walk = mesh.face_vertices(theirs);
        check_relation(on, ("face_vertices", at), &walk, &vertices, |v| on.v("face_vertices", v))?;
        let walk = mesh.face_edges(theirs);
        check_relation(on, ("face_edges", at), &walk, &edges, |e| on.e("face_edges", e))?;
        let walk = mesh.face_faces(theirs);
        check_relation(on, ("face_faces", at), &walk, &faces, |f| on.f("face_faces", f))?;
    }
    Ok(())
}
