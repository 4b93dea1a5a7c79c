//! What people write by hand: assembling with the standard hash map, keyed by the vertex pair.
//!
//! Not a yardstick of what is possible, but of what the arrays in [`super::assemble`] save.

use super::assemble::{Adjacency, EdgeCounts, NONE, NOT_PLAIN, next_side};
use std::collections::HashMap;

/// The uses of one edge, in ascending order; nearly all edges have at most two.
#[derive(Debug)]
enum Uses {
    One(u32),
    Two(u32, u32),
    More(Vec<u32>),
}

/// Links the triangles' sides through a map from vertex pairs to uses: the same arrays as
/// [`super::assemble::assemble`] gives, for index buffers that it accepts.
///
/// O(F) expected, one look-up a side. The order in which the map is walked does not show.
///
/// # Panics
/// When a triangle names a vertex that is not below `vertices`: this job is for measuring, on
/// meshes that the other one took.
#[must_use]
pub fn assemble(triangles: &[[u32; 3]], vertices: usize) -> Adjacency {
    let mut edges: HashMap<(u32, u32), Uses> = HashMap::with_capacity(triangles.len() * 3 / 2);
    let mut end = Vec::with_capacity(3 * triangles.len());
    let mut outgoing = vec![NONE; vertices];
    for &[a, b, c] in triangles {
        for (from, to) in [(a, b), (b, c), (c, a)] {
            let side = end.len() as u32;
            edges
                .entry((from.min(to), from.max(to)))
                .and_modify(|uses| match uses {
                    Uses::One(first) => *uses = Uses::Two(*first, side),
                    Uses::Two(first, second) => *uses = Uses::More(vec![*first, *second, side]),
                    Uses::More(list) => list.push(side),
                })
                .or_insert(Uses::One(side));
            outgoing[from as usize] = side;
            end.push(to);
        }
    }
    let mut counts = EdgeCounts::default();
    let mut turn = vec![0; end.len()];
    let mut open = vec![NONE; vertices];
    let mut cycle = |list: &[u32]| {
        for (k, &side) in list.iter().enumerate() {
            turn[side as usize] = next_side(list[(k + 1) % list.len()]) | NOT_PLAIN;
            let handle = &mut open[end[side as usize] as usize];
            if *handle == NONE || *handle < next_side(side) {
                *handle = next_side(side);
            }
        }
    };
    let mut plain = Vec::with_capacity(edges.len());
    for uses in edges.values() {
        match uses {
            &Uses::One(side) => {
                counts.boundary += 1;
                cycle(&[side]);
            }
            &Uses::Two(first, second) if end[first as usize] != end[second as usize] => {
                plain.push((first, second));
            }
            &Uses::Two(first, second) => {
                counts.misoriented += 1;
                cycle(&[first, second]);
            }
            Uses::More(list) => {
                counts.non_manifold += 1;
                cycle(list);
            }
        }
    }
    for (first, second) in plain {
        turn[first as usize] = next_side(second);
        turn[second as usize] = next_side(first);
    }
    for (handle, open) in outgoing.iter_mut().zip(open) {
        if open != NONE {
            *handle = open;
        }
    }
    Adjacency { end, turn, outgoing, counts }
}
