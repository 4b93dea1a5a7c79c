//! Every walk, borrowed and detached, by `next` and by `fold`.

use super::around::{sectors_by_handles, spokes_of};
use super::guard::fold_all;
use super::pairing::Paired;
use crate::conformance::Failure;
use crate::conformance::definitions::boundary_from;
use crate::conformance::reference::ListedBound;
use crate::walks::{Spoke, Walk, WalkState};
use crate::{FaceBound, OrientedEdgeId, Topology, TopologyExt};
use std::fmt::{Arguments, Debug};

/// What a walk is called and where it starts.
pub(super) type Named<'a> = (&'static str, Arguments<'a>);

/// The items of a walk by `next`, in the reference's names; stops a little beyond `most`.
pub(super) fn items<K: Topology, S: WalkState<K>, T>(
    walk: &Walk<'_, K, S>,
    most: usize,
    name: impl Fn(S::Item) -> Result<T, Failure>,
) -> Result<Vec<T>, Failure> {
    walk.clone().take(most + 2).map(name).collect()
}

/// Holds one walk to what it must yield, driven in every way there is: `next`, `fold` from every
/// place, beyond the end, detached from every place, and attached again.
pub(super) fn check_walk<K, S, T>(
    on: &Paired<'_, K>,
    (what, at): Named<'_>,
    walk: &Walk<'_, K, S>,
    expected: &[T],
    name: impl Fn(S::Item) -> Result<T, Failure>,
) -> Result<(), Failure>
where
    K: Topology,
    S: WalkState<K>,
    T: PartialEq + Debug,
{
    on.same(what, at, expected, &items(walk, expected.len(), &name)?[..])?;
    let mut left = walk.clone();
    let mut detached = walk.clone().detach();
    for done in 0..=expected.len() {
        // Begun, one step in, before the last item and at the end: where states differ in kind.
        if done < 2 || done + 1 >= expected.len() {
            let gather = |walk: Walk<'_, K, S>| -> Result<Vec<T>, Failure> {
                let Some(items) = fold_all(walk, expected.len()) else {
                    return Err(on.scene.fail(what, at, expected, "a fold that does not end"));
                };
                items.into_iter().map(&name).collect()
            };
            let folded: Vec<T> = gather(left.clone())?;
            let rest = &expected[done..];
            on.same(what, format_args!("{at}, fold after {done} by next"), rest, &folded[..])?;
            match detached.clone().attach(on.mesh) {
                Ok(attached) => {
                    let folded: Vec<T> = gather(attached)?;
                    let place = format_args!("{at}, attached after {done} detached");
                    on.same(what, place, rest, &folded[..])?;
                }
                Err(broken) => {
                    let place = format_args!("{at}, attached after {done} detached");
                    return Err(on.scene.fail(what, place, rest, broken));
                }
            }
        }
        let place = format_args!("{at}, step {done} by next");
        let by_next = left.next().map(&name).transpose()?;
        on.same(what, place, &expected.get(done), &by_next.as_ref())?;
        let place = format_args!("{at}, step {done} detached");
        let by_step = match detached.step(on.mesh) {
            Ok(item) => item.map(&name).transpose()?,
            Err(broken) => return Err(on.scene.fail(what, place, expected.get(done), broken)),
        };
        on.same(what, place, &expected.get(done), &by_step.as_ref())?;
    }
    for beyond in ["once beyond the end", "twice beyond the end"] {
        let ended = left.next().is_none() && matches!(detached.step(on.mesh), Ok(None));
        on.same(what, format_args!("{at}, {beyond}"), &true, &ended)?;
    }
    Ok(())
}

/// The corners of a face in the kernel's loop order: outer loop first, each from where the kernel
/// begins it.
pub(super) fn corners_of_face<K: Topology>(
    on: &Paired<'_, K>,
    face: crate::FaceId,
) -> Result<Vec<FaceBound<Vec<OrientedEdgeId>, crate::VertexId>>, Failure> {
    let theirs = on.ids.faces.theirs[&face];
    let mut loops = Vec::new();
    for (number, bound) in on.reference.faces[&face].iter().enumerate() {
        loops.push(match bound {
            ListedBound::VertexLoop(v) => FaceBound::VertexLoop(*v),
            ListedBound::EdgeLoop(corners) => {
                let first = match on.mesh.bound(theirs, number) {
                    Some(FaceBound::EdgeLoop(h)) => on.h("bound", h)?,
                    _ => corners[0],
                };
                FaceBound::EdgeLoop(turned_to(corners, first))
            }
        });
    }
    Ok(loops)
}

/// A cyclic list from `first` on.
pub(super) fn turned_to(cycle: &[OrientedEdgeId], first: OrientedEdgeId) -> Vec<OrientedEdgeId> {
    let mut turned = cycle.to_vec();
    turned.rotate_left(cycle.iter().position(|&h| h == first).unwrap_or(0));
    turned
}

/// All walks from all vertices, faces and oriented edges.
///
/// # Errors
/// [`Failure`] naming the walk, where it started, and how it was driven.
pub fn check_walks<K: Topology>(on: &Paired<'_, K>) -> Result<(), Failure> {
    walks_around_vertices(on)?;
    walks_over_faces(on)?;
    let mesh = on.mesh;
    for (&h, &theirs) in &on.ids.oriented_edges.theirs {
        let at = format_args!("{h}");
        let ring = turned_to(on.reference.loop_through(h), h);
        let named = ("loop_corners", at);
        check_walk(on, named, &mesh.loop_corners(theirs), &ring, |h| on.h("loop_corners", h))?;
        let uses = turned_to(on.reference.uses_beside(h), h);
        check_walk(on, ("uses", at), &mesh.uses(theirs), &uses, |h| on.h("uses", h))?;
        let boundary = boundary_from(on.reference, h);
        let walk = mesh.boundary_loop(theirs);
        check_walk(on, ("boundary_loop", at), &walk, &boundary, |h| on.h("boundary_loop", h))?;
    }
    for (&e, &theirs) in &on.ids.edges.theirs {
        let first = on.h("edge_use", mesh.edge_use(theirs))?;
        let uses = turned_to(&on.reference.edges[&e], first);
        let named = ("edge_uses", format_args!("{e}"));
        check_walk(on, named, &mesh.edge_uses(theirs), &uses, |h| on.h("edge_uses", h))?;
    }
    Ok(())
}

fn walks_around_vertices<K: Topology>(on: &Paired<'_, K>) -> Result<(), Failure> {
    let mesh = on.mesh;
    for (&v, &theirs) in &on.ids.vertices.theirs {
        let at = format_args!("{v}");
        let sectors = sectors_by_handles(on, v)?;
        let corners: Vec<Vec<OrientedEdgeId>> =
            sectors.iter().map(|s| s.corners.iter().map(|c| c.corner).collect()).collect();
        let handles: Vec<OrientedEdgeId> = corners.iter().map(|sector| sector[0]).collect();
        let named = ("vertex_sectors", at);
        let walk = mesh.vertex_sectors(theirs);
        check_walk(on, named, &walk, &handles, |h| on.h("vertex_sectors", h))?;
        for (sector, handle) in corners.iter().zip(&handles) {
            let at = format_args!("{v}, sector of {handle}");
            let walk = mesh.sector_corners(on.ids.oriented_edges.theirs[handle]);
            let named = ("sector_corners", at);
            check_walk(on, named, &walk, sector, |h| on.h("sector_corners", h))?;
        }
        let all = corners.concat();
        let named = ("vertex_corners", at);
        let walk = mesh.vertex_corners(theirs);
        check_walk(on, named, &walk, &all, |h| on.h("vertex_corners", h))?;

        let spokes = spokes_of(on, &sectors);
        let spoke_name = |what| {
            move |spoke: Spoke<K::OrientedEdge>| {
                Ok((on.h(what, spoke.oriented_edge)?, spoke.outgoing))
            }
        };
        let listed: Vec<(OrientedEdgeId, bool)> = spokes.iter().map(|s| (s.0, s.1)).collect();
        let walk = mesh.vertex_spokes(theirs);
        check_walk(on, ("vertex_spokes", at), &walk, &listed, spoke_name("vertex_spokes"))?;

        // Which of a non-manifold edge's uses stands for an end of it is not said; that exactly
        // one does, in the order of the spokes, is.
        let walk = mesh.vertex_edge_ends(theirs);
        let found = items(&walk, listed.len(), spoke_name("vertex_edge_ends"))?;
        let mut places = found.iter().map(|end| listed.iter().position(|spoke| spoke == end));
        if !places.by_ref().is_sorted() || found.iter().any(|end| !listed.contains(end)) {
            return Err(on.scene.fail("vertex_edge_ends", at, "some of the spokes", found));
        }
        let end_of = |spoke: &(OrientedEdgeId, bool)| {
            let record = on.reference.uses[&spoke.0];
            (record.edge, record.with != spoke.1)
        };
        let mut ends: Vec<_> = found.iter().map(end_of).collect();
        ends.sort_unstable();
        let mut expected: Vec<_> = spokes.iter().map(|s| s.2).collect();
        expected.sort_unstable();
        expected.dedup();
        on.same("vertex_edge_ends", at, &expected, &ends)?;
        check_walk(on, ("vertex_edge_ends", at), &walk, &found, spoke_name("vertex_edge_ends"))?;
    }
    Ok(())
}

fn walks_over_faces<K: Topology>(on: &Paired<'_, K>) -> Result<(), Failure> {
    let mesh = on.mesh;
    for (&f, &theirs) in &on.ids.faces.theirs {
        let at = format_args!("{f}");
        let loops = corners_of_face(on, f)?;
        let bounds: Vec<_> = loops
            .iter()
            .map(|bound| match bound {
                FaceBound::EdgeLoop(corners) => FaceBound::EdgeLoop(corners[0]),
                FaceBound::VertexLoop(v) => FaceBound::VertexLoop(*v),
            })
            .collect();
        let walk = mesh.face_bounds(theirs);
        check_walk(on, ("face_bounds", at), &walk, &bounds, |b| on.bound("face_bounds", b))?;
        let corners: Vec<OrientedEdgeId> = loops
            .iter()
            .flat_map(|bound| match bound {
                FaceBound::EdgeLoop(corners) => &corners[..],
                FaceBound::VertexLoop(_) => &[],
            })
            .copied()
            .collect();
        let walk = mesh.face_corners(theirs);
        check_walk(on, ("face_corners", at), &walk, &corners, |h| on.h("face_corners", h))?;
    }
    Ok(())
}
