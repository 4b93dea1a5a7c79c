//! First steps: build a part, ask why it bounds no solid, look around the place, build it better.
//!
//! The foundry's bracket has two plates that were drawn to meet along one edge. Along an edge no
//! metal can hold, and the topology says so.
//!
//! Run it with `cargo run -p merestone-examples --example first_steps`.
#![forbid(unsafe_code)]
#![allow(clippy::print_stdout, reason = "an example talks")]

use merestone::prelude::*;
use merestone::topology::floods::fan_count;
use std::error::Error;

/// The eight corners of a plate, in mm.
fn corners(x: [f64; 2], y: [f64; 2], z: [f64; 2]) -> [[f64; 3]; 8] {
    std::array::from_fn(|i| [x[i & 1], y[i >> 1 & 1], z[i >> 2]])
}

/// The six faces of a plate, counter-clockwise seen from outside.
const PLATE: [[u32; 4]; 6] =
    [[0, 2, 3, 1], [4, 5, 7, 6], [0, 1, 5, 4], [2, 6, 7, 3], [0, 4, 6, 2], [1, 3, 7, 5]];

fn main() -> Result<(), Box<dyn Error>> {
    // The base plate lies flat. The upright plate stands behind it, one edge on its rear upper edge.
    let base = corners([0.0, 60.0], [0.0, 40.0], [0.0, 6.0]);
    let upright = corners([-6.0, 0.0], [0.0, 40.0], [6.0, 56.0]);
    // Corners 1 and 3 of the upright plate are corners 4 and 6 of the base: named once, they are
    // one vertex each.
    let mut points = base.to_vec();
    let number = upright.map(|corner| {
        let known = points.iter().position(|&point| point == corner);
        known.unwrap_or_else(|| {
            points.push(corner);
            points.len() - 1
        }) as u32
    });
    let upright_faces = PLATE.map(|face| face.map(|corner| number[corner as usize]));
    let bracket = Mesh::from_polygons(points, PLATE.iter().chain(&upright_faces))?;

    let counts = [bracket.vertex_count(), bracket.edge_count(), bracket.face_count()];
    println!("bracket: {counts:?} vertices, edges and faces");

    // Parse, don't validate: the proof is to be had only by a check that passes.
    let defects = match bracket.solid_boundary() {
        Ok(_) => return Err("plates that meet along one edge bound no solid".into()),
        Err(defects) => defects,
    };
    println!("{defects}");

    // Where is it? Every cell leads to its neighbours, and vertices to their points.
    let joint = bracket
        .edges()
        .find(|&edge| bracket.edge_kind(edge) == EdgeKind::NonManifold)
        .ok_or("an edge of more than two uses")?;
    let [start, end] = bracket.edge_vertices(joint);
    println!("the joint runs from {:?} to {:?}", bracket.point(start), bracket.point(end));
    for h in bracket.edge_uses(joint) {
        let normal = bracket.face_normal(bracket.face(h));
        println!("  a face that looks along ({:+}, {:+}, {:+})", normal.x, normal.y, normal.z);
    }

    // Around its start: one sector of faces for each plate, which the joint makes one fan.
    for (i, handle) in bracket.vertex_sectors(start).enumerate() {
        println!("sector {i} at {:?}:", bracket.point(start));
        for h in bracket.sector_corners(handle) {
            let beyond = match bracket.turn(h) {
                Some(_) => "on to the next face",
                None => "here the sector ends",
            };
            println!("  along the edge to {:?}, {beyond}", bracket.point(bracket.end(h)));
        }
    }
    println!("fans at that vertex: {}", fan_count(bracket.topology(), start));

    // Drawn as one profile, pulled 40 mm wide, the plates share metal instead of an edge.
    let profile = [[-6.0, 0.0], [60.0, 0.0], [60.0, 6.0], [0.0, 6.0], [0.0, 56.0], [-6.0, 56.0]];
    let points: Vec<[f64; 3]> =
        [0.0, 40.0].iter().flat_map(|&y| profile.map(|[x, z]| [x, y, z])).collect();
    let n = profile.len() as u32;
    let mut faces: Vec<Vec<u32>> = vec![(0..n).collect(), (n..2 * n).rev().collect()];
    faces.extend((0..n).map(|i| {
        let next = (i + 1) % n;
        vec![i, i + n, next + n, next]
    }));
    let mended = Mesh::from_polygons(points, faces)?;
    mended.solid_boundary()?;
    let genus = Survey::of(mended.topology()).genus();
    println!("drawn as one profile, it bounds a solid of genus {}", genus.ok_or("closed")?);

    // Grey iron, 7.2 g/cm³.
    let volume = mended.signed_volume();
    println!("{volume} mm³, about {:.3} kg of iron", volume * 7.2e-6);
    println!("Before anything hangs on it: have a licensed person check it against local codes.");
    Ok(())
}
