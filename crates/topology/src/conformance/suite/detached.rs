//! Detached walks that an edit overtakes.

use super::pairing::Scene;
use super::stage::Stage;
use crate::conformance::{Capabilities, Complex, Failure};
use crate::walks::{Spoke, Walk, WalkBroken, WalkState};
use crate::{Assemble, FaceBound, FaceId, Topology, TopologyExt};
use std::fmt::Debug;

/// A detached walk under way, to be finished after the edit.
type Probe<K> = Box<dyn Fn(&K, &Scene) -> Result<(), Failure>>;

/// How a walk's items say whether they live.
struct Kind<K, T> {
    what: &'static str,
    /// The item is what the walk stands on, so its fate decides the walk's.
    stands_on_item: bool,
    lives: fn(&K, T) -> bool,
}

/// Leaves walks standing at several places along `walk`.
fn leave<K, S>(
    probes: &mut Vec<Probe<K>>,
    kind: &Kind<K, S::Item>,
    place: impl Debug,
    walk: Walk<'_, K, S>,
) where
    K: Topology,
    S: WalkState<K, Item: Copy + PartialEq + Debug + 'static> + 'static,
    K: 'static,
{
    let items: Vec<S::Item> = walk.clone().collect();
    for done in 0..=items.len() {
        if done > 2 && done + 1 < items.len() {
            continue;
        }
        let mut left = walk.clone();
        for _ in 0..done {
            left.next();
        }
        let detached = left.detach();
        let (seen, awaited) = (items[..done].to_vec(), items.get(done).copied());
        let place = format!("{place:?}, left after {done} of {}", items.len());
        let &Kind { what, stands_on_item, lives } = kind;
        probes.push(Box::new(move |mesh, scene| {
            let mut walk = detached.clone();
            let step = walk.clone().step(mesh);
            if let Some(awaited) = awaited.filter(|_| stands_on_item) {
                let expected = if !lives(mesh, awaited) {
                    Some(Err(WalkBroken::Retired))
                } else if seen.iter().all(|&item| lives(mesh, item)) {
                    Some(Ok(Some(awaited)))
                } else {
                    None
                };
                if let Some(expected) = expected {
                    scene.same(what, format_args!("{place}"), &expected, &step)?;
                }
            }
            let slots = mesh.oriented_edge_bound() + mesh.face_bound() + mesh.edge_bound();
            // A relation may yield several items a cell; the square bounds any of them.
            for _ in 0..=(slots + 2) * (slots + 2) {
                match walk.step(mesh) {
                    Err(_) | Ok(None) => return Ok(()),
                    Ok(Some(item)) if lives(mesh, item) => {}
                    Ok(Some(item)) => {
                        return Err(scene.fail(what, format_args!("{place}"), "live cells", item));
                    }
                }
            }
            Err(scene.fail(what, format_args!("{place}"), "an end", "none"))
        }));
    }
}

fn spoke_lives<K: Topology>(mesh: &K, spoke: Spoke<K::OrientedEdge>) -> bool {
    mesh.has_oriented_edge(spoke.oriented_edge)
}

fn bound_lives<K: Topology>(mesh: &K, bound: FaceBound<K::OrientedEdge, K::Vertex>) -> bool {
    match bound {
        FaceBound::EdgeLoop(h) => mesh.has_oriented_edge(h),
        FaceBound::VertexLoop(v) => mesh.has_vertex(v),
    }
}

/// Leaves every kind of walk at every cell.
fn leave_everywhere<K: Assemble + 'static>(stage: &Stage<'_, K>) -> Vec<Probe<K>> {
    let mesh = &stage.mesh;
    let mut probes = Vec::new();
    let p = &mut probes;
    macro_rules! kind {
        ($what:literal, $stands:literal, |$mesh:ident, $item:ident| $lives:expr) => {
            &Kind { what: $what, stands_on_item: $stands, lives: |$mesh: &K, $item| $lives }
        };
    }
    for v in mesh.vertices() {
        leave(
            p,
            kind!("vertex_sectors", false, |m, h| m.has_oriented_edge(h)),
            v,
            mesh.vertex_sectors(v),
        );
        leave(
            p,
            kind!("vertex_corners", true, |m, h| m.has_oriented_edge(h)),
            v,
            mesh.vertex_corners(v),
        );
        leave(p, kind!("vertex_spokes", false, |m, s| spoke_lives(m, s)), v, mesh.vertex_spokes(v));
        leave(
            p,
            kind!("vertex_edge_ends", false, |m, s| spoke_lives(m, s)),
            v,
            mesh.vertex_edge_ends(v),
        );
        leave(
            p,
            kind!("vertex_vertices", false, |m, v| m.has_vertex(v)),
            v,
            mesh.vertex_vertices(v),
        );
        leave(p, kind!("vertex_edges", false, |m, e| m.has_edge(e)), v, mesh.vertex_edges(v));
        leave(p, kind!("vertex_faces", false, |m, f| m.has_face(f)), v, mesh.vertex_faces(v));
        for handle in mesh.vertex_sectors(v) {
            leave(
                p,
                kind!("sector_corners", true, |m, h| m.has_oriented_edge(h)),
                handle,
                mesh.sector_corners(handle),
            );
        }
    }
    for e in mesh.edges() {
        leave(p, kind!("edge_uses", true, |m, h| m.has_oriented_edge(h)), e, mesh.edge_uses(e));
        leave(p, kind!("edge_faces", false, |m, f| m.has_face(f)), e, mesh.edge_faces(e));
        leave(p, kind!("edge_edges", false, |m, e| m.has_edge(e)), e, mesh.edge_edges(e));
    }
    for f in mesh.faces() {
        leave(p, kind!("face_bounds", false, |m, b| bound_lives(m, b)), f, mesh.face_bounds(f));
        leave(
            p,
            kind!("face_corners", true, |m, h| m.has_oriented_edge(h)),
            f,
            mesh.face_corners(f),
        );
        leave(p, kind!("face_vertices", false, |m, v| m.has_vertex(v)), f, mesh.face_vertices(f));
        leave(p, kind!("face_edges", false, |m, e| m.has_edge(e)), f, mesh.face_edges(f));
        leave(p, kind!("face_faces", false, |m, f| m.has_face(f)), f, mesh.face_faces(f));
    }
    for h in mesh.oriented_edges() {
        leave(
            p,
            kind!("loop_corners", true, |m, h| m.has_oriented_edge(h)),
            h,
            mesh.loop_corners(h),
        );
        leave(p, kind!("uses", true, |m, h| m.has_oriented_edge(h)), h, mesh.uses(h));
        leave(
            p,
            kind!("boundary_loop", true, |m, h| m.has_oriented_edge(h)),
            h,
            mesh.boundary_loop(h),
        );
    }
    probes
}

/// Leaves walks standing everywhere, removes one face, and goes on with each of them: it says
/// `Retired` where its ground is gone, yields live cells only, and ends.
///
/// # Errors
/// [`Failure`] naming the walk and where it stood.
pub fn check_overtaken_walks<K: Assemble + 'static>(
    capabilities: &Capabilities,
    complex: &Complex,
    face: usize,
) -> Result<(), Failure> {
    let Some(mut stage) = Stage::<K>::assemble(capabilities, complex, false)? else {
        return Ok(());
    };
    let Ok(face) = FaceId::new(face) else { return Ok(()) };
    if !stage.reference.faces.contains_key(&face) {
        return Ok(());
    }
    let probes = leave_everywhere(&stage);
    stage.remove(face)?;
    probes.iter().try_for_each(|probe| probe(&stage.mesh, &stage.scene))
}

#[cfg(test)]
mod tests {
    use crate::conformance::Reference;
    use crate::walks::WalkBroken;
    use crate::{Assemble, FaceList, Topology, TopologyExt};

    /// The last spoke of an open sector is where its first corner is entered: gone with it.
    #[test]
    fn spokes_end_when_the_corner_they_return_to_is_retired() {
        let list = FaceList::triangles(4, &[[0, 1, 2], [0, 2, 3]]);
        let mut mesh = Reference::assemble(list).unwrap();
        let v = mesh.vertices().next().unwrap();
        let mut walk = mesh.vertex_spokes(v).detach();
        let mut first = None;
        for _ in 0..2 {
            let spoke = walk.step(&mesh).unwrap().unwrap();
            first = first.or(Some(spoke.oriented_edge));
        }
        let face = mesh.face(first.unwrap());
        mesh.remove_face(face).unwrap();
        assert_eq!(walk.step(&mesh), Err(WalkBroken::Retired));
    }

    /// Four corners on one edge meet three others each: more items than there are slots.
    #[test]
    fn a_relation_longer_than_the_slots_is_not_taken_for_endless() {
        let list = FaceList::polygons(2, &[0, 1, 0, 1], &[4]).unwrap();
        let mesh = Reference::assemble(list).unwrap();
        let mut walk = mesh.face_faces(mesh.faces().next().unwrap()).detach();
        let mut count = 0;
        while walk.step(&mesh).unwrap().is_some() {
            count += 1;
        }
        assert_eq!(count, 12);
    }

    #[test]
    fn steps_beyond_the_end_are_not_counted() {
        let list = FaceList::polygons(1, &[0], &[1]).unwrap();
        let mesh = Reference::assemble(list).unwrap();
        let mut walk = mesh.loop_corners(mesh.oriented_edges().next().unwrap()).detach();
        assert!(walk.step(&mesh).unwrap().is_some());
        for _ in 0..9 {
            assert_eq!(walk.step(&mesh), Ok(None));
        }
    }
}
