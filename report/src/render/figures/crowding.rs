//! Flat layouts in which atoms crowd each other, spread a little at the cost of even bonds.

use super::canvas::Point;
use super::overlap::distance;

/// Atoms nearer than this are pushed apart, bond lengths.
const ROOM: f64 = 0.6;

const STEPS: usize = 80;

/// Spreads the atoms until there is room, or the steps are used up; a layout with room comes back as it is.
pub(super) fn spread(points: &mut [Point], bonds: &[[usize; 2]]) {
    for _ in 0..STEPS {
        let mut crowded = false;
        for i in 0..points.len() {
            for j in 0..i {
                if distance(points[i], points[j]) < ROOM - 0.01
                    && !bonds.contains(&[i, j])
                    && !bonds.contains(&[j, i])
                {
                    crowded = true;
                    draw_together(points, i, j, ROOM);
                }
            }
        }
        if !crowded {
            return;
        }
        for &[a, b] in bonds {
            draw_together(points, a, b, 1.0);
        }
    }
}

/// Moves two atoms half of the way to the wanted distance.
fn draw_together(points: &mut [Point], a: usize, b: usize, wanted: f64) {
    let (p, q) = (points[a], points[b]);
    let apart = distance(p, q);
    // Atoms on the same spot part sideways.
    let way = if apart > 1e-6 {
        [(q[0] - p[0]) / apart, (q[1] - p[1]) / apart]
    } else {
        [1.0, 0.0]
    };
    let shift = 0.25 * (wanted - apart);
    points[a] = [p[0] - shift * way[0], p[1] - shift * way[1]];
    points[b] = [q[0] + shift * way[0], q[1] + shift * way[1]];
}
