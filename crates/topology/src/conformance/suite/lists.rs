//! Lists that no kernel may assemble.

use super::pairing::Scene;
use crate::conformance::{Capabilities, Complex, Failure, Reference, Ring};
use crate::{Assemble, AssembleError, EdgeUse, FaceList, FaceListError, MAX_DENSE_INDEX, Topology};

/// Malformed lists of every shape the kernel takes: each is refused with the reference's error.
///
/// Returns how many were tried and how many left out for want of capabilities.
///
/// # Errors
/// [`Failure`] naming the list.
pub fn check_malformed_lists<K: Assemble>(
    capabilities: &Capabilities,
) -> Result<super::Ran, Failure> {
    let mut ran = super::Ran::default();
    for vertex in [3, 7, u32::MAX] {
        for corner in 0..6 {
            let mut triangles = [[0, 1, 2], [0, 2, 1]];
            triangles.as_flattened_mut()[corner] = vertex;
            let scene = Scene::new(capabilities, &format!("corner {corner} names {vertex}"));
            refused::<K>(&scene, FaceList::triangles(3, &triangles))?;
            ran.held += 1;
        }
    }
    let scene = Scene::new(capabilities, "more vertices than can be numbered");
    refused::<K>(&scene, FaceList::triangles(MAX_DENSE_INDEX + 2, &[]))?;
    refused::<K>(&scene, FaceList::triangles(usize::MAX, &[[0, 1, 2]]))?;
    ran.held += 2;

    let edges = |rings: Vec<Ring>| Complex {
        name: "a bound beyond the vertices".to_owned(),
        vertex_count: 5,
        faces: vec![vec![Ring::Edges(vec![0, 1, 2, 3])], rings],
        edge_uses: None,
    };
    let beyond = [
        (capabilities.polygons, edges(vec![Ring::Edges(vec![0, 1, 2, 3, 5])])),
        (capabilities.polygons, edges(vec![Ring::Edges(vec![6])])),
        (capabilities.holes, edges(vec![Ring::Edges(vec![0, 1, 2]), Ring::Edges(vec![3, 5, 4])])),
        (capabilities.holes, edges(vec![Ring::Vertex(5)])),
        (capabilities.holes, edges(vec![Ring::Edges(vec![0, 1, 2]), Ring::Vertex(9)])),
    ];
    let numbered = misnumbered().map(|complex| (capabilities.edge_numbers, complex));
    for (can, complex) in beyond.into_iter().chain(numbered) {
        if can {
            let scene = Scene::new(capabilities, &complex.name);
            refused::<K>(&scene, complex.to_list().as_list())?;
            ran.held += 1;
        } else {
            ran.refused += 1;
        }
    }
    Ok(ran)
}

/// Two triangles over one edge with something wrong about the edge numbers.
fn misnumbered() -> [Complex; 6] {
    let sound = [(0, true), (1, true), (2, true), (2, false), (3, true), (4, true)];
    let with = |name: &str, changes: &[(usize, (u32, bool))]| {
        let mut uses = sound;
        for &(corner, using) in changes {
            uses[corner] = using;
        }
        let mut complex = Complex::triangles(name, 4, &[[0, 1, 2], [0, 2, 3]]);
        complex.edge_uses = Some(uses.map(|(edge, way)| EdgeUse::new(edge, way)).to_vec());
        complex
    };
    [
        with("an edge number without a use", &[(5, (5, true))]),
        with("no edge number 0", &[(0, (5, true))]),
        with("an edge number far beyond the corners", &[(4, (u32::MAX >> 1, false))]),
        with("an edge between other vertices", &[(5, (0, true))]),
        with("an edge of the same vertices the wrong way", &[(3, (2, true))]),
        with("an edge that shares one vertex", &[(4, (2, false))]),
    ]
}

/// Whether both refuse the list alike. Which corner stands for a number that no corner has is
/// left open.
fn refused<K: Assemble>(scene: &Scene, list: FaceList<'_>) -> Result<(), Failure> {
    let place = format_args!("the face list");
    let no_use = |error: &FaceListError| match *error {
        FaceListError::InconsistentEdge { edge, .. } => {
            list.edge_uses().is_some_and(|uses| uses.iter().all(|u| u.edge() != edge))
        }
        _ => false,
    };
    let expected = match Reference::assemble(list) {
        Err(AssembleError::List(error)) => error,
        other => {
            let counts = other.map(|mesh| mesh.face_count());
            return Err(scene.fail("the reference's assemble", place, "a refusal", counts));
        }
    };
    match K::assemble(list) {
        Err(AssembleError::List(error)) => {
            let same = match (error, expected) {
                (
                    FaceListError::InconsistentEdge { edge: a, .. },
                    FaceListError::InconsistentEdge { edge: b, .. },
                ) if no_use(&expected) => a == b,
                _ => error == expected,
            };
            if same { Ok(()) } else { Err(scene.fail("assemble", place, expected, error)) }
        }
        Err(error) => Err(scene.fail("assemble", place, expected, error)),
        Ok(_) => Err(scene.fail("assemble", place, expected, "a topology")),
    }
}
