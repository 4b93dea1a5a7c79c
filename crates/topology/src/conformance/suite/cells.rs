//! Counts, bounds, whole-mesh iterators and lookups by index.

use super::guard::fold_all;
use super::pairing::Paired;
use crate::conformance::Failure;
use crate::{Id, Topology, TopologyExt};
use std::collections::BTreeSet;
use std::fmt::Debug;

/// The counts, and the bounds every index is below.
///
/// # Errors
/// [`Failure`] naming the first that is wrong.
pub fn check_counts<K: Topology>(on: &Paired<'_, K>) -> Result<(), Failure> {
    let (mesh, reference) = (on.mesh, on.reference);
    let whole = format_args!("the whole mesh");
    on.same("vertex_count", whole, &reference.vertices.len(), &mesh.vertex_count())?;
    on.same("edge_count", whole, &reference.edges.len(), &mesh.edge_count())?;
    on.same("face_count", whole, &reference.faces.len(), &mesh.face_count())?;
    on.same("oriented_edge_count", whole, &reference.uses.len(), &mesh.oriented_edge_count())?;
    let inner = reference.inner_loop_count();
    on.same("inner_loop_count", whole, &inner, &mesh.inner_loop_count())?;
    on.same("vertex_bound", whole, &reference.vertex_bound(), &mesh.vertex_bound())?;
    on.same("face_bound", whole, &reference.face_bound(), &mesh.face_bound())?;
    on.same("vertex_column", whole, &mesh.vertex_bound(), &mesh.vertex_column(0).values().len())?;
    on.same("edge_column", whole, &mesh.edge_bound(), &mesh.edge_column(0).values().len())?;
    on.same("face_column", whole, &mesh.face_bound(), &mesh.face_column(0).values().len())?;
    let column = mesh.oriented_edge_column(0);
    let length = column.values().len();
    on.same("oriented_edge_column", whole, &mesh.oriented_edge_bound(), &length)?;
    let n = |count: usize| count as i64;
    let euler = n(reference.vertices.len()) - n(reference.edges.len()) + n(reference.faces.len());
    on.same("euler_characteristic", whole, &(euler - n(inner)), &mesh.euler_characteristic())
}

/// The whole-mesh iterators: exactly the live cells, ascending, lawful in every way they can be
/// driven; and the lookups by index for live, dead and absurd indices.
///
/// # Errors
/// [`Failure`] naming the kind of cell and the first departure.
pub fn check_iterators<K: Topology>(on: &Paired<'_, K>) -> Result<(), Failure> {
    let (mesh, ids) = (on.mesh, on.ids);
    cells(
        on,
        ["vertices", "vertex_at", "has_vertex"],
        mesh.vertices(),
        &ids.vertices.theirs,
        (mesh.vertex_bound(), |i| mesh.vertex_at(i), |v| mesh.has_vertex(v)),
    )?;
    cells(
        on,
        ["edges", "edge_at", "has_edge"],
        mesh.edges(),
        &ids.edges.theirs,
        (mesh.edge_bound(), |i| mesh.edge_at(i), |e| mesh.has_edge(e)),
    )?;
    cells(
        on,
        ["faces", "face_at", "has_face"],
        mesh.faces(),
        &ids.faces.theirs,
        (mesh.face_bound(), |i| mesh.face_at(i), |f| mesh.has_face(f)),
    )?;
    cells(
        on,
        ["oriented_edges", "oriented_edge_at", "has_oriented_edge"],
        mesh.oriented_edges(),
        &ids.oriented_edges.theirs,
        (mesh.oriented_edge_bound(), |i| mesh.oriented_edge_at(i), |h| mesh.has_oriented_edge(h)),
    )
}

/// One kind of cell: its iterator, then its lookups.
fn cells<K, I, R>(
    on: &Paired<'_, K>,
    [iterator, at, has]: [&'static str; 3],
    walk: impl Iterator<Item = I> + Clone + Debug,
    live: &std::collections::BTreeMap<R, I>,
    (bound, lookup, lives): (usize, impl Fn(usize) -> Option<I>, impl Fn(I) -> bool),
) -> Result<(), Failure>
where
    K: Topology,
    I: Id,
    R: Id,
{
    let mut expected: Vec<I> = live.values().copied().collect();
    expected.sort_unstable_by_key(|id| id.index());
    let by_order: BTreeSet<I> = expected.iter().copied().collect();
    let ascending: Vec<I> = by_order.into_iter().collect();
    on.same(iterator, format_args!("order of ids"), &expected, &ascending)?;
    check_iterator(on, iterator, walk, &expected)?;
    let by_index: std::collections::BTreeMap<usize, I> =
        expected.iter().map(|&id| (id.index(), id)).collect();
    on.same(iterator, format_args!("indices"), &expected.len(), &by_index.len())?;
    if let Some((&last, id)) = by_index.last_key_value()
        && last >= bound
    {
        return Err(on.scene.fail(at, format_args!("{id:?}"), "an index below the bound", bound));
    }
    // Beyond the bound lie indices that only fit after their upper bits are lost.
    let absurd = [bound + 1, 1 << 31, (1 << 31) - 1, u32::MAX as usize, usize::MAX];
    let truncating = by_index.keys().flat_map(|&i| [i | 1 << 31, i.wrapping_add(1 << 32)]);
    for index in (0..=bound).chain(absurd).chain(truncating) {
        let expected = by_index.get(&index).copied();
        on.same(at, format_args!("index {index}"), &expected, &lookup(index))?;
    }
    for &id in &expected {
        on.same(has, format_args!("{id:?}"), &true, &lives(id))?;
    }
    Ok(())
}

/// An iterator driven in every way it can be: by `next`, by `fold` from every place, cloned, and
/// beyond its end.
fn check_iterator<K: Topology, T: Copy + PartialEq + Debug>(
    on: &Paired<'_, K>,
    what: &'static str,
    walk: impl Iterator<Item = T> + Clone,
    expected: &[T],
) -> Result<(), Failure> {
    let mut left = walk;
    for (done, item) in expected.iter().enumerate() {
        let (low, high) = left.size_hint();
        let remaining = expected.len() - done;
        if low > remaining || high.is_some_and(|high| high < remaining) {
            let place = format_args!("size_hint after {done}");
            return Err(on.scene.fail(what, place, remaining, (low, high)));
        }
        let place = format_args!("fold after {done} by next");
        match fold_all(left.clone(), remaining) {
            Some(folded) => on.same(what, place, &expected[done..], &folded[..])?,
            None => return Err(on.scene.fail(what, place, expected, "a fold that does not end")),
        }
        on.same(what, format_args!("count after {done}"), &remaining, &left.clone().count())?;
        on.same(what, format_args!("next number {done}"), &Some(*item), &left.next())?;
    }
    for beyond in ["end", "once beyond the end", "twice beyond the end"] {
        on.same(what, format_args!("{beyond}"), &None, &left.next())?;
    }
    on.same(what, format_args!("count at the end"), &0, &left.count())
}
