//! Assembling.

use super::loops::{Survey, corner_of, listed_vertex_loops, oriented_uses};
use super::{Full, HalfEdge};
use crate::TOP;
use crate::memory::Peak;
use crate::pairing::{
    AnyLoops, Corners, Every, Kept, Links, Paired, pair_by_number, pair_by_vertices,
};
use crate::slots::Slots;
use merestone_topology::{
    Assemble, AssembleError, Compaction, EdgeId, EdgeUse, EditError, FaceId, FaceList,
    FaceListError, OrientedEdgeId, RemovedFace, VertexId,
};
use std::borrow::Cow;

#[deny(clippy::missing_trait_methods)]
impl Assemble for HalfEdge<Full> {
    fn assemble(list: FaceList<'_>) -> Result<Self, AssembleError> {
        list.check()?;
        let mut peak = Peak::default();
        let survey = Survey::of(&list);
        let vertex_loops = listed_vertex_loops(&list, survey.vertex_loops, &mut peak);
        let mut mesh = Self::default();
        mesh.lay_out(&list, &survey, &mut peak);
        let flat = list.corners();
        let job = Job { list, vertex_loops: &vertex_loops, peak: &mut peak };
        match survey.corners_each {
            Some(3) => mesh.pair(Every(flat.as_chunks::<3>().0), job)?,
            Some(4) => mesh.pair(Every(flat.as_chunks::<4>().0), job)?,
            _ => mesh.pair(AnyLoops::new(list, survey.vertex_loops), job)?,
        }
        mesh.assembly_peak = peak.most();
        Ok(mesh)
    }

    fn remove_face(&mut self, face: FaceId) -> Result<RemovedFace<EdgeId>, EditError> {
        self.remove(face)
    }

    fn remove_isolated_vertex(&mut self, vertex: VertexId) -> Result<(), EditError> {
        self.remove_isolated(vertex)
    }

    fn compact(&mut self) -> Compaction<VertexId, EdgeId, FaceId, OrientedEdgeId> {
        self.compact_all()
    }
}

/// What pairing takes besides the corners.
struct Job<'a> {
    list: FaceList<'a>,
    /// As (vertex, face), ascending.
    vertex_loops: &'a [(u32, u32)],
    peak: &'a mut Peak,
}

impl HalfEdge<Full> {
    /// Makes all that the corners decide once the loops are laid out.
    fn pair(&mut self, corners: impl Corners, job: Job<'_>) -> Result<(), FaceListError> {
        let Job { list, vertex_loops, peak } = job;
        let vertices = list.vertex_count();
        self.vertices = Slots::new(vertices);
        self.faces = Slots::new(list.face_count());
        // Steps are asked for while pairing; all oriented edges live.
        self.oriented_edges = Slots::new(corners.count());
        self.links.radial = peak.held(vec![0; corners.count()]);
        let uses = list.edge_uses().map(|uses| oriented_uses(&list, uses, corners.count(), peak));
        let paired = match &uses {
            None => pair_by_vertices(corners, vertices, vertex_loops, self, peak),
            Some(uses) => pair_by_number(corners, uses, vertices, vertex_loops, self, peak)
                .map_err(|error| in_the_list(error, &list))?,
        };
        let Paired { edges, all_plain, vertices, selves, memory } = paired;
        peak.drop(selves);
        self.sectors = vertices;
        self.edges = Slots::new(edges);
        self.links.start = if corners.count() == list.corner_count() {
            peak.reused(Kept::into_numbers(memory), list.corners().iter().copied())
        } else {
            peak.drop(memory);
            let mut start = peak.held(Vec::with_capacity(corners.count()));
            corners.for_each(|vertex, _| start.push(vertex));
            start
        };
        match &uses {
            None => self.number_edges(edges, all_plain, peak),
            Some(uses) => self.take_numbers(uses, edges, peak),
        }
        if let Some(Cow::Owned(uses)) = uses {
            peak.drop(uses);
        }
        Ok(())
    }

    /// Takes over the edge numbers of the list.
    fn take_numbers(&mut self, uses: &[EdgeUse], edges: usize, peak: &mut Peak) {
        let mut edge = peak.held(Vec::with_capacity(uses.len()));
        let mut first = peak.held(vec![0; edges]);
        edge.extend(uses.iter().map(|u| u.edge() | if u.runs_with_edge() { 0 } else { TOP }));
        for (h, listed) in uses.iter().enumerate().rev() {
            first[listed.edge() as usize] = h as u32;
        }
        (self.links.edge, self.links.edge_use) = (edge, first);
    }

    /// Numbers the `edges` edges by their first use.
    ///
    /// An edge runs the way its first use does; uses of a self-edge run with, against, with … it.
    fn number_edges(&mut self, edges: usize, all_plain: bool, peak: &mut Peak) {
        let count = self.links.radial.len();
        // An edge that is not plain is numbered all at once, at its first use: the only one that
        // has no number then.
        let unset = if all_plain { 0 } else { u32::MAX };
        self.links.edge = peak.held(vec![unset; count]);
        self.links.edge_use = peak.held(vec![0; edges]);
        let mut number = 0_u32;
        for h in 0..count {
            let Full { radial, edge, edge_use, .. } = &mut self.links;
            let other = radial[h];
            if other < TOP {
                // Written without a branch on which of the two comes first: nobody could predict it.
                let is_first = other > h as u32;
                let of_other = edge[(other as usize).min(h)] | TOP;
                edge[h] = if is_first { number } else { of_other };
                if let Some(place) = edge_use.get_mut(number as usize) {
                    *place = h as u32;
                }
                number += u32::from(is_first);
            } else if edge[h] == unset {
                edge_use[number as usize] = h as u32;
                self.number_cycle(h, number);
                number += 1;
            }
        }
        debug_assert_eq!(number as usize, edges, "every edge has a first use");
    }

    /// Numbers all uses of an edge that is not plain, from its first on.
    fn number_cycle(&mut self, first: usize, number: u32) {
        let Full { next, start, radial, edge, .. } = &mut self.links;
        let tail = start[first];
        let is_self_edge = start[next[first] as usize] == tail;
        let (mut h, mut with) = (first, true);
        loop {
            edge[h] = number | if with { 0 } else { TOP };
            h = (radial[h] & !TOP) as usize;
            if h == first {
                return;
            }
            with = if is_self_edge { !with } else { start[h] == tail };
        }
    }
}

impl Links for HalfEdge<Full> {
    #[inline(always)]
    fn link(twin: u32, _behind: u32) -> u32 {
        twin
    }

    #[inline(always)]
    fn plain(&mut self, leaving: u32, link: u32) {
        self.links.radial[leaving as usize] = link;
    }

    #[inline(always)]
    fn behind(&self, list: impl Corners, leaving: u32) -> u32 {
        list.next(self.links.radial[leaving as usize], &self.links.next)
    }

    fn cycle(&mut self, uses: &[u32], is_plain: bool) {
        let bit = if is_plain { 0 } else { TOP };
        for (i, &h) in uses.iter().enumerate() {
            self.links.radial[h as usize] = uses[(i + 1) % uses.len()] | bit;
        }
    }
}

/// The same error, naming the corner by its number in the list, vertex loops counted.
#[cold]
fn in_the_list(error: FaceListError, list: &FaceList<'_>) -> FaceListError {
    match error {
        FaceListError::InconsistentEdge { edge, corner } => {
            FaceListError::InconsistentEdge { edge, corner: corner_of(list, corner) }
        }
        other => other,
    }
}
