//! The loops of a face list, laid out as links.

use super::{Full, HalfEdge};
use crate::TOP;
use crate::memory::Peak;
use crate::side::SideTable;
use merestone_topology::{EdgeUse, FaceList, ListedLoop};
use std::borrow::Cow;

/// What a face list holds beyond one edge loop a face.
#[derive(Clone, Copy, Debug)]
pub(super) struct Survey {
    /// The number of corners every face has, where each is one edge loop of as many.
    pub(super) corners_each: Option<usize>,
    /// How many loops are bare vertices.
    pub(super) vertex_loops: usize,
    /// How many faces are not just one edge loop.
    faces_aside: usize,
    inner_loops: usize,
}

impl Survey {
    pub(super) fn of(list: &FaceList<'_>) -> Self {
        let mut survey =
            Self { corners_each: Some(3), vertex_loops: 0, faces_aside: 0, inner_loops: 0 };
        if list.as_triangles().is_some() {
            return survey;
        }
        let loops = (0..list.loop_count()).filter_map(|index| list.listed_loop(index));
        let first = list.listed_loop(0).map_or(3, |listed| listed.corners.len());
        let mut all_alike = true;
        for listed in loops {
            survey.vertex_loops += usize::from(listed.is_vertex_loop);
            all_alike &= listed.corners.len() == first;
        }
        survey.inner_loops = list.loop_count() - list.face_count();
        if survey.inner_loops + survey.vertex_loops > 0 {
            let is_aside = |&face: &usize| {
                let mut loops = list.loops(face);
                loops.len() > 1 || loops.any(|listed| listed.is_vertex_loop)
            };
            survey.faces_aside = (0..list.face_count()).filter(is_aside).count();
        }
        survey.corners_each = (all_alike && survey.faces_aside == 0).then_some(first);
        survey
    }
}

/// The vertex loops of a list as (vertex, face), ascending.
pub(super) fn listed_vertex_loops(
    list: &FaceList<'_>,
    count: usize,
    peak: &mut Peak,
) -> Vec<(u32, u32)> {
    let mut found = peak.held(Vec::with_capacity(count));
    if count > 0 {
        for face in 0..list.face_count() {
            let bare = list.loops(face).filter(|listed| listed.is_vertex_loop);
            found.extend(bare.map(|listed| (listed.corners[0], face as u32)));
        }
        found.sort_unstable();
    }
    found
}

fn edge_loops<'a>(list: &FaceList<'a>) -> impl Iterator<Item = ListedLoop<'a>> {
    let all = (0..list.loop_count()).filter_map(|number| list.listed_loop(number));
    all.filter(|listed| !listed.is_vertex_loop)
}

/// The edge uses of the `count` corners that are oriented edges: those of vertex loops are left
/// out.
pub(super) fn oriented_uses<'a>(
    list: &FaceList<'a>,
    uses: &'a [EdgeUse],
    count: usize,
    peak: &mut Peak,
) -> Cow<'a, [EdgeUse]> {
    if count == uses.len() {
        return Cow::Borrowed(uses);
    }
    let mut oriented = peak.held(Vec::with_capacity(count));
    for listed in edge_loops(list) {
        oriented.extend_from_slice(&uses[listed.first_corner..][..listed.corners.len()]);
    }
    Cow::Owned(oriented)
}

/// The corner of oriented edge `h` in the list.
pub(super) fn corner_of(list: &FaceList<'_>, h: usize) -> usize {
    let mut before = 0;
    for listed in edge_loops(list) {
        if h < before + listed.corners.len() {
            return listed.first_corner + h - before;
        }
        before += listed.corners.len();
    }
    h
}

impl HalfEdge<Full> {
    /// Fills `next`, `prev`, `face` and the face entries.
    pub(super) fn lay_out(&mut self, list: &FaceList<'_>, survey: &Survey, peak: &mut Peak) {
        let count = list.corner_count() - survey.vertex_loops;
        self.in_threes = survey.corners_each == Some(3);
        self.inner_loops = survey.inner_loops;
        match survey.corners_each {
            Some(3) => return self.lay_out_alike::<3>(count, peak),
            Some(4) => return self.lay_out_alike::<4>(count, peak),
            _ => {}
        }
        let links = &mut self.links;
        links.next = peak.held(Vec::with_capacity(count));
        links.prev = peak.held(Vec::with_capacity(count));
        links.face = peak.held(Vec::with_capacity(count));
        self.face = peak.held(Vec::with_capacity(list.face_count()));
        self.face_bounds = SideTable::with_capacity(survey.faces_aside);
        for face in 0..list.face_count() {
            let mut loops = list.loops(face);
            let aside = loops.len() != 1;
            let entry = match loops.next() {
                Some(listed) if !aside && !listed.is_vertex_loop => {
                    push_loop(links, listed.corners.len(), face as u32)
                }
                _ => {
                    let loops = list.loops(face);
                    let how_many = loops.len();
                    let bounds = loops.map(|listed| {
                        if listed.is_vertex_loop {
                            return listed.corners[0] | TOP;
                        }
                        push_loop(links, listed.corners.len(), face as u32)
                    });
                    self.face_bounds.push(face as u32, (how_many, bounds)) | TOP
                }
            };
            self.face.push(entry);
        }
        peak.hold(self.face_bounds.bytes());
    }

    /// The same where every face is one loop of `K` corners.
    fn lay_out_alike<const K: usize>(&mut self, count: usize, peak: &mut Peak) {
        let links = &mut self.links;
        links.next = peak.held(vec![0; count]);
        links.prev = peak.held(vec![0; count]);
        links.face = peak.held(vec![0; count]);
        self.face = peak.held(vec![0; count / K]);
        let faces = (links.next.as_chunks_mut::<K>().0.iter_mut())
            .zip(links.prev.as_chunks_mut::<K>().0)
            .zip(links.face.as_chunks_mut::<K>().0)
            .zip(&mut self.face);
        let (mut number, mut first) = (0, 0);
        for (((next, prev), face), entry) in faces {
            for i in 0..K {
                next[i] = first + ((i + 1) % K) as u32;
                prev[i] = first + ((i + K - 1) % K) as u32;
                face[i] = number;
            }
            *entry = first;
            number += 1;
            first += K as u32;
        }
    }
}

/// Adds the records of one loop of `count` corners; returns the first.
#[inline]
fn push_loop(links: &mut Full, count: usize, face: u32) -> u32 {
    let first = links.next.len() as u32;
    let last = first + count as u32 - 1;
    links.next.extend(first + 1..last + 1);
    links.next.push(first);
    links.prev.push(last);
    links.prev.extend(first..last);
    links.face.extend(std::iter::repeat_n(face, count));
    first
}
