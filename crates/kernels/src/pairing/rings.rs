//! The second stride: whether each regular vertex is one ring of corners.

use super::{Corners, Links, Marks, Paired};

/// Marks the vertices where two or more rings meet.
///
/// All edges at an unmarked vertex are plain, so its corners form rings; going once around from
/// one corner counts one ring. When the counts add up to all corners there is nothing more to do.
/// O(corners), without scratch unless rings are missing.
pub(super) fn find_pinched<C: Corners>(
    corners: C,
    handles: &[u32],
    marks: &mut Marks,
    links: &impl Links,
    paired: &mut Paired,
) {
    let mut met = 0;
    for (vertex, &handle) in handles.iter().enumerate() {
        if handle != u32::MAX && !marks.is_marked(vertex as u32) {
            met += ring_length(handle, links);
        }
    }
    let mut expected = corners.count();
    if marks.any() {
        corners.for_each_use(|_, start, _| expected -= usize::from(marks.is_marked(start)));
    }
    if met != expected {
        mark_pinched(corners, handles, marks, links, paired);
    }
}

#[inline(always)]
fn ring_length(handle: u32, links: &impl Links) -> usize {
    let mut length = 1;
    let mut c = links.behind(handle);
    while c != handle {
        length += 1;
        c = links.behind(c);
    }
    length
}

#[cold]
fn mark_pinched<C: Corners>(
    corners: C,
    handles: &[u32],
    marks: &mut Marks,
    links: &impl Links,
    paired: &mut Paired,
) {
    let mut missing = vec![0u32; handles.len()];
    paired.held(size_of_val(handles) + size_of_val(&missing[..]) + marks.bytes() + handles.len());
    corners.for_each_use(|_, start, _| missing[start as usize] += 1);
    for (vertex, (&handle, &count)) in handles.iter().zip(&missing).enumerate() {
        if handle != u32::MAX
            && !marks.is_marked(vertex as u32)
            && ring_length(handle, links) != count as usize
        {
            marks.mark(vertex as u32);
        }
    }
}
