//! The loops of a face list, laid out as links.

use super::{Full, HalfEdge, TOP};
use crate::memory::Peak;
use crate::side::SideTable;
use merestone_topology::FaceList;

/// What a face list holds beyond one edge loop a face.
#[derive(Clone, Copy, Debug)]
pub(super) struct Survey {
    /// Whether every face is one loop of three corners.
    pub(super) in_threes: bool,
    /// How many loops are bare vertices.
    pub(super) vertex_loops: usize,
    /// How many faces are not just one edge loop.
    faces_aside: usize,
    inner_loops: usize,
}

impl Survey {
    pub(super) fn of(list: &FaceList<'_>) -> Self {
        let mut survey = Self { in_threes: true, vertex_loops: 0, faces_aside: 0, inner_loops: 0 };
        if list.as_triangles().is_some() {
            return survey;
        }
        for face in 0..list.face_count() {
            let (mut loops, mut bare) = (0, 0);
            for listed in list.loops(face) {
                loops += 1;
                bare += usize::from(listed.is_vertex_loop);
                survey.in_threes &= listed.corners.len() == 3;
            }
            survey.vertex_loops += bare;
            survey.inner_loops += loops - 1;
            survey.faces_aside += usize::from(loops > 1 || bare > 0);
        }
        survey.in_threes &= survey.faces_aside == 0;
        survey
    }
}

/// One way to step in the loops: by arithmetic or by links.
pub(super) trait Loops {
    fn next(&self, h: u32) -> u32;
    fn prev(&self, h: u32) -> u32;
}

/// Every three oriented edges are a loop.
pub(super) struct Threes;

impl Loops for Threes {
    #[inline(always)]
    fn next(&self, h: u32) -> u32 {
        if h % 3 == 2 { h - 2 } else { h + 1 }
    }

    #[inline(always)]
    fn prev(&self, h: u32) -> u32 {
        if h.is_multiple_of(3) { h + 2 } else { h - 1 }
    }
}

/// Loops as the links say.
pub(super) struct Linked<'a> {
    pub(super) next: &'a [u32],
    pub(super) prev: &'a [u32],
}

impl Loops for Linked<'_> {
    #[inline(always)]
    fn next(&self, h: u32) -> u32 {
        self.next[h as usize]
    }

    #[inline(always)]
    fn prev(&self, h: u32) -> u32 {
        self.prev[h as usize]
    }
}

/// Fills `next`, `prev`, `start`, `face` and the face entries.
pub(super) fn lay_out(
    mesh: &mut HalfEdge<Full>,
    list: &FaceList<'_>,
    survey: &Survey,
    peak: &mut Peak,
) {
    let count = list.corner_count() - survey.vertex_loops;
    mesh.in_threes = survey.in_threes;
    mesh.inner_loops = survey.inner_loops;
    let links = &mut mesh.links;
    if survey.in_threes {
        links.start = peak.held(list.corners().to_vec());
        links.next = peak.held(vec![0; count]);
        links.prev = peak.held(vec![0; count]);
        links.face = peak.held(vec![0; count]);
        mesh.face = peak.held(vec![0; count / 3]);
        (0..).step_by(3).zip(&mut mesh.face).for_each(|(first, entry)| *entry = first);
        fill_threes(&mut links.next, |h| [h + 1, h + 2, h]);
        fill_threes(&mut links.prev, |h| [h + 2, h, h + 1]);
        fill_threes(&mut links.face, |h| [h / 3; 3]);
        return;
    }
    links.next = peak.held(Vec::with_capacity(count));
    links.prev = peak.held(Vec::with_capacity(count));
    links.face = peak.held(Vec::with_capacity(count));
    links.start = peak.held(Vec::with_capacity(count));
    mesh.face = peak.held(Vec::with_capacity(list.face_count()));
    mesh.face_bounds = SideTable::with_capacity(survey.faces_aside);
    for face in 0..list.face_count() {
        let mut loops = list.loops(face);
        let aside = loops.len() != 1;
        let first = links.next.len() as u32;
        let entry = match loops.next() {
            Some(listed) if !aside && !listed.is_vertex_loop => {
                push_loop(links, listed.corners, face as u32);
                first
            }
            _ => {
                let loops = list.loops(face);
                let how_many = loops.len();
                let bounds = loops.map(|listed| {
                    if listed.is_vertex_loop {
                        return listed.corners[0] | TOP;
                    }
                    push_loop(links, listed.corners, face as u32)
                });
                mesh.face_bounds.push(face as u32, (how_many, bounds)) | TOP
            }
        };
        mesh.face.push(entry);
    }
    peak.hold(mesh.face_bounds.bytes());
}

fn fill_threes(links: &mut [u32], of: impl Fn(u32) -> [u32; 3]) {
    for (three, first) in links.as_chunks_mut::<3>().0.iter_mut().zip((0..).step_by(3)) {
        *three = of(first);
    }
}

/// Adds the records of one loop; returns the first.
#[inline]
fn push_loop(links: &mut Full, corners: &[u32], face: u32) -> u32 {
    let first = links.next.len() as u32;
    let last = first + corners.len() as u32 - 1;
    links.next.extend(first + 1..last + 1);
    links.next.push(first);
    links.prev.push(last);
    links.prev.extend(first..last);
    links.start.extend_from_slice(corners);
    links.face.extend(std::iter::repeat_n(face, corners.len()));
    first
}
