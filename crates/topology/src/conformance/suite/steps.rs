//! The steps between cells, one by one.

use super::pairing::Paired;
use crate::conformance::Failure;
use crate::conformance::definitions::{ends_of, kind_of};
use crate::conformance::reference::ListedBound;
use crate::{Cost, FaceBound, Id, Topology, TopologyExt, VertexId};

/// Every step from every oriented edge.
///
/// # Errors
/// [`Failure`] naming the step and the oriented edge.
pub fn check_steps<K: Topology>(on: &Paired<'_, K>) -> Result<(), Failure> {
    let (mesh, reference) = (on.mesh, on.reference);
    for (&h, &theirs) in &on.ids.oriented_edges.theirs {
        let at = format_args!("{h}");
        let ring = reference.loop_through(h);
        let n = ring.len();
        let record = reference.uses[&h];
        let next = ring[(record.position + 1) % n];
        let prev = ring[(record.position + n - 1) % n];
        on.same("next", at, &next, &on.h("next", mesh.next(theirs))?)?;
        on.same("prev", at, &prev, &on.h("prev", mesh.prev(theirs))?)?;
        on.same("start", at, &record.start, &on.v("start", mesh.start(theirs))?)?;
        on.same("end", at, &reference.uses[&next].start, &on.v("end", mesh.end(theirs))?)?;
        on.same("face", at, &record.face, &on.f("face", mesh.face(theirs))?)?;
        on.same("edge", at, &record.edge, &on.e("edge", mesh.edge(theirs))?)?;
        let uses = &reference.edges[&record.edge];
        let place = uses.iter().position(|&other| other == h).unwrap_or(0);
        let radial = uses[(place + 1) % uses.len()];
        on.same("radial", at, &radial, &on.h("radial", mesh.radial(theirs))?)?;
        let plain = uses.len() == 2 && reference.uses[&radial].with != record.with;
        on.same("is_plain", at, &plain, &mesh.is_plain(theirs))?;
        let behind = reference.loop_through(radial);
        let turned = behind[(reference.uses[&radial].position + 1) % behind.len()];
        let turn = mesh.turn(theirs).map(|t| on.h("turn", t)).transpose()?;
        on.same("turn", at, &plain.then_some(turned), &turn)?;
        // The fused step and the single steps of the same kernel.
        let by_steps = mesh.is_plain(theirs).then(|| mesh.next(mesh.radial(theirs)));
        on.same("turn against next and radial", at, &by_steps, &mesh.turn(theirs))?;
        let by_steps = mesh.face(mesh.radial(theirs));
        on.same("across against radial and face", at, &by_steps, &mesh.across(theirs))?;
        if K::COST.edge == Cost::Constant {
            on.same("runs_with_edge", at, &record.with, &mesh.runs_with_edge(theirs))?;
        }
    }
    for (&h, &theirs) in &on.ids.oriented_edges.theirs {
        let kind = kind_of(reference, reference.uses[&h].edge);
        on.same("edge_kind_at", format_args!("{h}"), &kind, &mesh.edge_kind_at(theirs))?;
    }
    Ok(())
}

/// Every edge: its representative use, its kind, its vertices, and which way its uses run.
///
/// Where edges are places (finding them is not constant) their own direction is the kernel's
/// choice, and the uses are held to each other only.
///
/// # Errors
/// [`Failure`] naming the edge.
pub fn check_edges<K: Topology>(on: &Paired<'_, K>) -> Result<(), Failure> {
    let (mesh, reference) = (on.mesh, on.reference);
    for (&e, &theirs) in &on.ids.edges.theirs {
        let at = format_args!("{e}");
        let first = on.h("edge_use", mesh.edge_use(theirs))?;
        on.same("edge of edge_use", at, &e, &reference.uses[&first].edge)?;
        on.same("edge_use twice", at, &mesh.edge_use(theirs), &mesh.edge_use(theirs))?;
        let kind = kind_of(reference, e);
        on.same("edge_kind", at, &kind, &mesh.edge_kind(theirs))?;
        let single = reference.edges[&e].len() == 1;
        on.same("is_boundary", at, &single, &mesh.is_boundary(theirs))?;
        // Whether the kernel's edge runs against the reference's.
        let with = |h| mesh.runs_with_edge(on.ids.oriented_edges.theirs[h]);
        let turned = with(&first) != reference.uses[&first].with;
        if K::COST.edge == Cost::Constant {
            on.same("direction of edge", at, &false, &turned)?;
        }
        for h in &reference.edges[&e] {
            let expected = reference.uses[h].with != turned;
            on.same("runs_with_edge", format_args!("{h} of {e}"), &expected, &with(h))?;
        }
        let mut ends = ends_of(reference, e);
        if turned {
            ends.reverse();
        }
        let [a, b] = mesh.edge_vertices(theirs);
        let found = [on.v("edge_vertices", a)?, on.v("edge_vertices", b)?];
        on.same("edge_vertices", at, &ends, &found)?;
    }
    Ok(())
}

/// Every face's bounds by number, and every vertex's vertex loops.
///
/// # Errors
/// [`Failure`] naming the face and bound.
pub fn check_bounds<K: Topology>(on: &Paired<'_, K>) -> Result<(), Failure> {
    let (mesh, reference) = (on.mesh, on.reference);
    for (&f, bounds) in &reference.faces {
        let theirs = on.ids.faces.theirs[&f];
        for (number, bound) in bounds.iter().enumerate() {
            let at = format_args!("{f}, bound {number}");
            let found = mesh.bound(theirs, number).map(|b| on.bound("bound", b)).transpose()?;
            let right = match (bound, found) {
                (ListedBound::EdgeLoop(corners), Some(FaceBound::EdgeLoop(h))) => {
                    corners.contains(&h)
                }
                (ListedBound::VertexLoop(v), Some(FaceBound::VertexLoop(found))) => *v == found,
                _ => false,
            };
            if !right {
                return Err(on.scene.fail("bound", at, bound, found));
            }
        }
        for beyond in [bounds.len(), bounds.len() + 1, usize::MAX] {
            let at = format_args!("{f}, bound {beyond}");
            on.same("bound", at, &None, &mesh.bound(theirs, beyond))?;
        }
    }
    for (&v, &theirs) in &on.ids.vertices.theirs {
        let at = format_args!("{v}");
        let mut expected = reference.vertex_loops_at(v);
        let mut found = Vec::new();
        while found.len() <= expected.len()
            && let Some(f) = mesh.vertex_loop(theirs, found.len())
        {
            found.push(on.f("vertex_loop", f)?);
        }
        expected.sort_unstable();
        found.sort_unstable();
        on.same("vertex_loop", at, &expected, &found)?;
        for beyond in [expected.len() + 1, usize::MAX] {
            on.same("vertex_loop beyond the last", at, &None, &mesh.vertex_loop(theirs, beyond))?;
        }
    }
    Ok(())
}

/// The fast ways in, where a kernel offers them: `triangle` runs as the face's walks do, and the
/// index buffer has a three for each face slot.
///
/// # Errors
/// [`Failure`] naming the face.
pub fn check_fast_ways<K: Topology>(on: &Paired<'_, K>) -> Result<(), Failure> {
    let (mesh, reference) = (on.mesh, on.reference);
    for (&f, bounds) in &reference.faces {
        let theirs = on.ids.faces.theirs[&f];
        let at = format_args!("{f}");
        let Some(corners) = mesh.triangle(theirs) else { continue };
        let single = match &bounds[..] {
            [ListedBound::EdgeLoop(corners)] => corners.len() == 3,
            _ => false,
        };
        on.same("triangle for a face of three corners only", at, &true, &single)?;
        if let Some(FaceBound::EdgeLoop(h)) = mesh.bound(theirs, 0) {
            let walked = [h, mesh.next(h), mesh.next(mesh.next(h))];
            on.same("triangle against bound and next", at, &walked, &corners)?;
        }
    }
    let Some(buffer) = mesh.index_buffer() else { return Ok(()) };
    let whole = format_args!("the whole mesh");
    on.same("length of index_buffer", whole, &reference.face_bound(), &buffer.len())?;
    for (&f, bounds) in &reference.faces {
        let [ListedBound::EdgeLoop(corners)] = &bounds[..] else {
            return Err(on.scene.fail("index_buffer", format_args!("{f}"), "none", buffer));
        };
        let mut listed: Vec<VertexId> = corners.iter().map(|h| reference.uses[h].start).collect();
        let found = buffer[f.index()].map(VertexId::from_u32);
        let rotations = 0..listed.len();
        let is_rotation = rotations.into_iter().any(|_| {
            listed.rotate_left(1);
            listed == found
        });
        if !is_rotation {
            return Err(on.scene.fail("index_buffer", format_args!("{f}"), listed, found));
        }
    }
    Ok(())
}

/// The footprint: arrays with names of their own, sums that agree, and, freshly assembled, a peak
/// no lower than what is held and nothing retired.
///
/// # Errors
/// [`Failure`] naming the array.
pub fn check_footprint<K: Topology>(on: &Paired<'_, K>) -> Result<(), Failure> {
    let footprint = on.mesh.footprint();
    let whole = format_args!("footprint");
    let mut names: Vec<&str> = footprint.arrays.iter().map(|array| array.name).collect();
    names.sort_unstable();
    if let Some(twice) = names.windows(2).find(|pair| pair[0] == pair[1]) {
        return Err(on.scene.fail("names of arrays", whole, "each once", twice));
    }
    for array in &footprint.arrays {
        let fits = array.retired <= array.bytes;
        on.same("retired bytes within all bytes", format_args!("{}", array.name), &true, &fits)?;
    }
    let sum: usize = footprint.arrays.iter().map(|array| array.bytes).sum();
    on.same("sum of bytes", whole, &sum, &footprint.bytes())?;
    if !on.reference.uses.is_empty() && sum == 0 {
        return Err(on.scene.fail("bytes", whole, "more than none for live faces", sum));
    }
    on.same(
        "peak at least what is held",
        whole,
        &true,
        &(footprint.assembly_peak >= sum || !on.fresh),
    )?;
    if on.fresh {
        on.same("retired bytes when assembled", whole, &0, &footprint.retired())?;
    }
    Ok(())
}
