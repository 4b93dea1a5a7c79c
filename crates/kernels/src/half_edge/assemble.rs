//! Assembling.

use super::loops::{Every, Linked, Survey, lay_out};
use super::pairing::{Buckets, number_edges, pair};
use super::vertices::listed_vertex_loops;
use super::{Full, HalfEdge, numbered};
use crate::memory::Peak;
use crate::slots::Slots;
use merestone_topology::{
    Assemble, AssembleError, Compaction, EdgeId, EdgeUse, EditError, FaceId, FaceList,
    FaceListError, OrientedEdgeId, RemovedFace, VertexId,
};

#[deny(clippy::missing_trait_methods)]
impl Assemble for HalfEdge<Full> {
    fn assemble(list: FaceList<'_>) -> Result<Self, AssembleError> {
        list.check()?;
        let mut peak = Peak::default();
        let survey = Survey::of(&list);
        let mut mesh = Self::default();
        lay_out(&mut mesh, &list, &survey, &mut peak);
        let buckets = Buckets::new(&mesh.links.start, list.vertex_count(), &mut peak);
        let loops = listed_vertex_loops(&list, survey.vertex_loops, &mut peak);
        match list.edge_uses() {
            None => mesh.pair_by_corners(&survey, buckets, &loops, &mut peak),
            Some(uses) => mesh.link_by_numbers(&list, uses, buckets, &loops, &mut peak)?,
        }
        mesh.vertices = Slots::new(list.vertex_count());
        mesh.edges = Slots::new(mesh.links.edge_use.len());
        mesh.faces = Slots::new(mesh.face.len());
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

impl HalfEdge<Full> {
    /// Makes one edge for each pair of vertices.
    fn pair_by_corners(
        &mut self,
        survey: &Survey,
        buckets: Buckets,
        vertex_loops: &[(u32, u32)],
        peak: &mut Peak,
    ) {
        let Full { next, prev, start, face, radial, .. } = &mut self.links;
        *radial = peak.held(vec![0; start.len()]);
        self.vertex = peak.held(vec![0; buckets.ends.len()]);
        let entries = &mut self.vertex;
        let edges = match survey.corners_each {
            Some(3) => pair(&Every::<3>, start, &buckets, face, radial, entries, peak),
            Some(4) => pair(&Every::<4>, start, &buckets, face, radial, entries, peak),
            _ => pair(&Linked { next, prev }, start, &buckets, face, radial, entries, peak),
        };
        self.settle(&buckets, vertex_loops, peak);
        let Full { next, prev, start, face, radial, edge, edge_use } = &mut self.links;
        // The buckets have served: their array becomes the edges'.
        *edge = buckets.corners;
        peak.drop(buckets.ends);
        *edge_use = number_edges(&Linked { next, prev }, start, face, radial, edge, edges, peak);
    }

    /// Makes the edges that the list numbers.
    fn link_by_numbers(
        &mut self,
        list: &FaceList<'_>,
        uses: &[EdgeUse],
        buckets: Buckets,
        vertex_loops: &[(u32, u32)],
        peak: &mut Peak,
    ) -> Result<(), FaceListError> {
        let links = &mut self.links;
        links.edge = numbered::oriented_uses(list, uses, links.start.len(), peak);
        let loops = Linked { next: &links.next, prev: &links.prev };
        let linked = numbered::link(&links.start, &links.edge, &loops, list, peak)?;
        (links.radial, links.edge_use) = linked;
        self.vertex = peak.held(numbered::enter_ordinary(&loops, &buckets, &links.radial));
        self.settle(&buckets, vertex_loops, peak);
        Ok(())
    }
}
