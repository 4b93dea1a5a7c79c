//! The loops of a face list, laid out as links.

use super::{Full, HalfEdge, TOP};
use crate::memory::Peak;
use crate::side::SideTable;
use merestone_topology::FaceList;

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
        let first = list.listed_loop(0).map_or(3, |listed| listed.corners.len());
        let mut all_alike = true;
        for face in 0..list.face_count() {
            let (mut loops, mut bare) = (0, 0);
            for listed in list.loops(face) {
                loops += 1;
                bare += usize::from(listed.is_vertex_loop);
                all_alike &= listed.corners.len() == first;
            }
            survey.vertex_loops += bare;
            survey.inner_loops += loops - 1;
            survey.faces_aside += usize::from(loops > 1 || bare > 0);
        }
        survey.corners_each = (all_alike && survey.faces_aside == 0).then_some(first);
        survey
    }
}

/// A way to step in the loops: by arithmetic or by links.
pub(super) trait Loops {
    fn next(&self, h: u32) -> u32;
    fn prev(&self, h: u32) -> u32;
}

/// Every `K` oriented edges are a loop.
pub(super) struct Every<const K: u32>;

impl<const K: u32> Loops for Every<K> {
    #[inline(always)]
    fn next(&self, h: u32) -> u32 {
        if h % K == K - 1 { h + 1 - K } else { h + 1 }
    }

    #[inline(always)]
    fn prev(&self, h: u32) -> u32 {
        if h.is_multiple_of(K) { h + K - 1 } else { h - 1 }
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
    mesh.in_threes = survey.corners_each == Some(3);
    mesh.inner_loops = survey.inner_loops;
    match survey.corners_each {
        Some(3) => return lay_out_alike::<3>(mesh, list, peak),
        Some(4) => return lay_out_alike::<4>(mesh, list, peak),
        _ => {}
    }
    let links = &mut mesh.links;
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

/// The same where every face is one loop of `K` corners.
fn lay_out_alike<const K: usize>(mesh: &mut HalfEdge<Full>, list: &FaceList<'_>, peak: &mut Peak) {
    let count = list.corner_count();
    let links = &mut mesh.links;
    links.start = peak.held(list.corners().to_vec());
    links.next = peak.held(vec![0; count]);
    links.prev = peak.held(vec![0; count]);
    links.face = peak.held(vec![0; count]);
    mesh.face = peak.held(vec![0; count / K]);
    let faces = (links.next.as_chunks_mut::<K>().0.iter_mut())
        .zip(links.prev.as_chunks_mut::<K>().0)
        .zip(links.face.as_chunks_mut::<K>().0)
        .zip(&mut mesh.face);
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
