//! The meshes that works are measured on.

use merestone::exchange::{Records, read_path};
use merestone_benches::is_test;
use merestone_trial::Subject;
use merestone_trial::shapes::icosphere;

/// Calls with the file named in `MERESTONE_BENCH_FILE`, or else with closed meshes of 20,480 (S)
/// and 1,310,720 (M) triangles in coherent and in random order; as a test, with small ones.
///
/// # Panics
/// When the file cannot be read or tried.
pub(crate) fn for_each(mut visit: impl FnMut(&str, &Subject)) {
    if let Some(path) = std::env::var_os("MERESTONE_BENCH_FILE") {
        let file = read_path(&path, None, Records::WeldedUnlessIndexed)
            .unwrap_or_else(|error| panic!("{error}"));
        let soup = file.soup.clean().unwrap_or_else(|error| panic!("{error}"));
        let subject = Subject::from_clean(soup).unwrap_or_else(|error| panic!("{error}"));
        return visit("file", &subject);
    }
    let sizes: &[(&str, u32)] = if is_test() { &[("S", 3)] } else { &[("S", 5), ("M", 8)] };
    for &(size, subdivisions) in sizes {
        let coherent = icosphere(subdivisions);
        let shuffled = coherent.shuffled(1);
        for (order, mesh) in [("coherent", coherent), ("shuffled", shuffled)] {
            let subject = Subject::from_triangles(mesh.points, &mesh.triangles)
                .expect("spheres can be tried");
            visit(&format!("{size}/{order}"), &subject);
        }
    }
}
