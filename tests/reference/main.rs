//! Published and constructed values, on every kernel. `README.md` says where they are from.
#![forbid(unsafe_code)]

mod solids;
mod surfaces;
mod values;

use merestone::kernels::{HalfEdge, TriangleAdjacency};
use merestone_topology::conformance::Reference;

/// Every value, on one kernel: `battery!(name, Kernel, whether it holds polygons)`.
macro_rules! battery {
    ($name:ident, $kernel:ty, $holds_polygons:expr) => {
        mod $name {
            use super::*;

            #[test]
            fn the_platonic_solids() {
                solids::platonic::<$kernel>($holds_polygons);
            }

            #[test]
            fn the_archimedean_solids() {
                solids::archimedean::<$kernel>($holds_polygons);
            }

            #[test]
            fn the_johnson_solids() {
                solids::johnson::<$kernel>($holds_polygons);
            }

            #[test]
            fn the_star_solids() {
                solids::stars::<$kernel>($holds_polygons);
            }

            #[test]
            fn toroids() {
                solids::toroids::<$kernel>($holds_polygons);
            }

            #[test]
            fn solids_of_exact_volume() {
                solids::exact_volumes::<$kernel>($holds_polygons);
            }

            #[test]
            fn tonons_tetrahedron() {
                solids::tonon::<$kernel>();
            }

            #[test]
            fn surfaces_of_one_side_are_refused() {
                surfaces::one_sided::<$kernel>($holds_polygons);
            }

            #[test]
            fn complexes_that_are_no_surfaces() {
                surfaces::non_manifold::<$kernel>($holds_polygons);
            }
        }
    };
}

battery!(triangle, TriangleAdjacency, false);
battery!(half_edge, HalfEdge, true);
battery!(reference, Reference, true);
