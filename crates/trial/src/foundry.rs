//! Parts of an invented small foundry that casts for harbour works, made in code.
//!
//! All dimensions are invented and in millimetres; nothing here is a drawing. Whatever is to be
//! cast, lifted or put under pressure must be designed and checked by a licensed person against
//! local codes.

use crate::shapes::TriangleMesh;
use std::f64::consts::TAU;

/// Half the body's length along the flow.
const HALF_LENGTH: f64 = 110.0;
/// Thickness of the flanges at both ends.
const FLANGE: f64 = 18.0;
/// Radius of the flanges.
const FLANGE_RADIUS: f64 = 75.0;

/// The names of the demonstrations.
pub const DEMOS: [&str; 1] = ["valve-body"];

/// A valve body with a flow passage right through it: closed, outward, genus 1, 2944 · fineness²
/// triangles on half as many vertices. A fineness of 0 is taken as 1.
///
/// The flow runs along x through a bore of radius 30 that has a weir at its bottom and a chamber at
/// its top; outside there are two flanges, a belly and the boss that a bonnet would sit on.
/// Vertices lie ring by ring, so neighbours are close in memory.
///
/// ```
/// let body = merestone_trial::foundry::valve_body(4);
/// assert_eq!((body.points.len(), body.triangles.len()), (23_552, 47_104));
/// ```
#[must_use]
pub fn valve_body(fineness: u32) -> TriangleMesh {
    let fineness = fineness.max(1);
    let around = 32 * fineness;
    let rings = profile(fineness);
    let mut points = Vec::with_capacity(rings.len() * around as usize);
    for ring in &rings {
        for j in 0..around {
            let (sin, cos) = (TAU * f64::from(j) / f64::from(around)).sin_cos();
            let (x, radius) = ring.at(sin);
            points.push([x, radius * cos, radius * sin]);
        }
    }
    let count = rings.len() as u32;
    let mut triangles = Vec::with_capacity(2 * points.len());
    for i in 0..count {
        let (here, behind) = (i * around, (i + 1) % count * around);
        for j in 0..around {
            let beside = (j + 1) % around;
            let [a, b, c, d] = [here + j, here + beside, behind + beside, behind + j];
            triangles.extend([[a, b, c], [a, c, d]]);
        }
    }
    TriangleMesh { points, triangles }
}

/// Distance of the outer skin from the axis; `up` is the sine of the angle from the horizontal.
fn skin(x: f64, up: f64) -> f64 {
    46.0 + 24.0 * hump(x / 45.0) + 34.0 * hump(x / 38.0) * towards(up).powi(4)
}

/// Distance of the passage's wall from the axis.
fn bore(x: f64, up: f64) -> f64 {
    30.0 - 12.0 * hump(x / 18.0) * towards(-up).powi(2)
        + 16.0 * hump(x / 42.0) * towards(up).powi(4)
}

/// A smooth hump of height 1 over −1 to 1.
fn hump(t: f64) -> f64 {
    (1.0 - t * t).max(0.0).powi(2)
}

/// 1 where the direction is reached, 0 opposite.
fn towards(sine: f64) -> f64 {
    (1.0 + sine) / 2.0
}

/// One ring of vertices around the axis.
#[derive(Clone, Copy)]
enum Ring {
    /// On a flange's rim.
    Rim(f64),
    /// On the skin between the flanges.
    Skin(f64),
    /// On the passage's wall.
    Bore(f64),
    /// On a flat ring at x, this far from its inner edge (0) to the flange's rim (1).
    Back(f64, f64),
    Face(f64, f64),
}

impl Ring {
    /// Place along the axis and distance from it.
    fn at(self, up: f64) -> (f64, f64) {
        let blend = |from: f64, t: f64| from + t * (FLANGE_RADIUS - from);
        match self {
            Self::Rim(x) => (x, FLANGE_RADIUS),
            Self::Skin(x) => (x, skin(x, up)),
            Self::Bore(x) => (x, bore(x, up)),
            Self::Back(x, t) => (x, blend(skin(x, up), t)),
            Self::Face(x, t) => (x, blend(bore(x, up), t)),
        }
    }
}

/// The rings in order: along the outside, in at the far end, back through the passage, out again.
fn profile(fineness: u32) -> Vec<Ring> {
    let (end, back) = (HALF_LENGTH, HALF_LENGTH - FLANGE);
    let mut rings = Vec::new();
    let mut run = |cells: u32, from: f64, to: f64, ring: &dyn Fn(f64) -> Ring| {
        let steps = cells * fineness;
        let step = |k| from + (to - from) * f64::from(k) / f64::from(steps);
        rings.extend((0..steps).map(|k| ring(step(k))));
    };
    run(2, -end, -back, &Ring::Rim);
    run(3, 1.0, 0.0, &|t| Ring::Back(-back, t));
    run(14, -back, back, &Ring::Skin);
    run(3, 0.0, 1.0, &|t| Ring::Back(back, t));
    run(2, back, end, &Ring::Rim);
    run(3, 1.0, 0.0, &|t| Ring::Face(end, t));
    run(16, end, -end, &Ring::Bore);
    run(3, 0.0, 1.0, &|t| Ring::Face(-end, t));
    rings
}

#[cfg(test)]
mod tests {
    use super::*;
    use merestone::geometry::TriangleMesh as Mesh;
    use merestone::topology::floods::Survey;

    #[test]
    fn valve_body_bounds_one_solid_of_genus_1() {
        for fineness in [0, 1, 3] {
            let body = valve_body(fineness);
            let triangles = 2944 * fineness.max(1).pow(2) as usize;
            assert_eq!((body.triangles.len(), body.points.len()), (triangles, triangles / 2));
            let mesh = Mesh::from_triangles(body.points, &body.triangles).unwrap();
            let survey = Survey::of(mesh.topology());
            assert!(survey.is_closed() && survey.is_manifold() && survey.is_oriented());
            assert_eq!((survey.components, survey.genus()), (1, Some(1)));
        }
    }

    #[test]
    fn valve_body_has_the_volume_of_its_skin_less_its_bore() {
        // In rings around the axis: V = ∫∫ (R² − r²) / 2 dx dα, by the midpoint rule. Flat
        // triangles cut off less than the 128-gon does from its circle, 0.04 %, and some more at
        // the belly.
        let (along, around) = (2000, 360);
        let mut volume = 0.0;
        for i in 0..along {
            let x = HALF_LENGTH * (2.0 * (f64::from(i) + 0.5) / f64::from(along) - 1.0);
            for j in 0..around {
                let up = (TAU * f64::from(j) / f64::from(around)).sin();
                let is_flange = x.abs() > HALF_LENGTH - FLANGE;
                let outer = if is_flange { FLANGE_RADIUS } else { skin(x, up) };
                volume += (outer.powi(2) - bore(x, up).powi(2)) / 2.0;
            }
        }
        volume *= 2.0 * HALF_LENGTH / f64::from(along) * TAU / f64::from(around);
        let body = valve_body(4);
        let mesh = Mesh::from_triangles(body.points, &body.triangles).unwrap();
        let ratio = mesh.signed_volume() / volume;
        assert!((0.995..1.005).contains(&ratio), "{ratio}");
    }

    #[test]
    fn walls_are_thick_everywhere() {
        for i in -110..=110 {
            for j in 0..64 {
                let (x, up) = (f64::from(i), (TAU * f64::from(j) / 64.0).sin());
                assert!(bore(x, up) >= 18.0 && skin(x, up) - bore(x, up) >= 15.0);
            }
        }
    }
}
