//! Free places for words among what is drawn already.

use std::f64::consts::TAU;

use super::canvas::{Anchor, Point, Rectangle};

/// Directions that are tried around a point.
const DIRECTIONS: usize = 24;

/// What words must not cover.
#[derive(Debug, Default)]
pub(super) struct Clearance {
    boxes: Vec<Rectangle>,
    segments: Vec<(Point, Point, f64)>,
    words: Vec<Rectangle>,
    /// Whether words need a free line to the point that they belong to.
    with_leaders: bool,
}

impl Clearance {
    /// For words that thin lines may lead to.
    pub(super) fn with_leaders() -> Self {
        Self {
            with_leaders: true,
            ..Self::default()
        }
    }

    pub(super) fn block(&mut self, part: Rectangle) {
        self.boxes.push(part);
    }

    /// A stroke of that width.
    pub(super) fn block_stroke(&mut self, from: Point, to: Point, width: f64) {
        self.segments.push((from, to, width / 2.0));
    }

    pub(super) fn is_free(&self, part: Rectangle) -> bool {
        !self.boxes.iter().any(|other| other.overlaps(part))
            && !self
                .segments
                .iter()
                .any(|&(from, to, half)| part.grown(half).clip(from, to).is_some())
    }

    fn has_leader(&self, from: Point, to: Point) -> bool {
        !self.with_leaders
            || self
                .words
                .iter()
                .all(|other| other.clip(from, to).is_none())
    }

    /// A free place for words centred as near to `about` as the radii allow, first tried in the direction `towards`; the place is taken
    /// then. Where all are taken, the outermost is used.
    pub(super) fn place(
        &mut self,
        text: &str,
        size: f64,
        about: Point,
        radii: &[f64],
        towards: f64,
    ) -> Point {
        let boxed = |at: Point| Rectangle::of_words(text, at, size, Anchor::Middle).grown(1.0);
        let half_width = (boxed([0.0; 2]).high[0]).max(size / 2.0);
        let around = |radius: f64, step: usize| {
            // 0, 1, -1, 2, -2 ...: near the wanted direction first.
            let turn = step.div_ceil(2) as f64 * if step % 2 == 1 { 1.0 } else { -1.0 };
            let angle = towards + TAU * turn / DIRECTIONS as f64;
            // Words are wider than high: sideways they go farther out.
            [
                about[0] + (radius + half_width - size / 2.0) * angle.cos(),
                about[1] + radius * angle.sin(),
            ]
        };
        let place = radii
            .iter()
            .flat_map(|&radius| (0..DIRECTIONS).map(move |step| (radius, step)))
            .map(|(radius, step)| around(radius, step))
            .find(|&at| self.is_free(boxed(at)) && self.has_leader(about, at))
            .unwrap_or_else(|| around(radii.last().copied().unwrap_or(0.0), 0));
        self.block(boxed(place));
        self.words.push(boxed(place));
        place
    }
}

/// The middle of the widest gap between directions seen from a point; upwards when there is none.
pub(super) fn widest_gap(directions: impl Iterator<Item = f64>) -> f64 {
    let mut angles: Vec<f64> = directions.map(|angle| angle.rem_euclid(TAU)).collect();
    angles.sort_by(f64::total_cmp);
    let Some(&first) = angles.first() else {
        return -TAU / 4.0;
    };
    let followers = angles.iter().skip(1).copied().chain([first + TAU]);
    let mut widest = (0.0, 0.0);
    for (&from, to) in angles.iter().zip(followers) {
        if to - from > widest.0 + 1e-9 {
            widest = (to - from, f64::midpoint(from, to));
        }
    }
    widest.1
}
