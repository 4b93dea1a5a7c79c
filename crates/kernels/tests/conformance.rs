//! Every kernel against the naive reference topology.

use merestone_kernels::{HalfEdge, TriangleAdjacency};
use merestone_topology::conformance::Capabilities;
use merestone_topology::conformance_suite;

conformance_suite!(
    triangle,
    TriangleAdjacency,
    Capabilities { edge_numbers: true, ..Capabilities::triangles("triangle") }
);
conformance_suite!(half_edge, HalfEdge, Capabilities::everything("half-edge"));
