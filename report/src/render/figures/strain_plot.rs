//! Strain against ring size.

use super::canvas::{Anchor, Canvas, Ink, Point, Rectangle, span};
use super::clearance::Clearance;
use crate::document::{PlottedStrain, StrainPlot};

/// Ring sizes that the axis always shows.
const SIZES: (usize, usize) = (3, 17);

/// Left, top, width and height of the area of the points, px.
const AREA: [f64; 4] = [62.0, 14.0, 640.0, 320.0];

/// Font sizes, px.
const TICK_SIZE: f64 = 12.0;
const LABEL_SIZE: f64 = 12.5;

/// Radius of a point, px.
const RADIUS: f64 = 4.5;

/// Sideways distance of points that would hide each other, px.
const ASIDE: f64 = 12.0;

/// Draws the plot.
pub(super) fn draw(plot: &StrainPlot) -> Canvas {
    let axes = Axes::of(plot);
    let mut canvas = Canvas::default();
    let mut clearance = Clearance::with_leaders();
    axes.draw(&mut canvas, &mut clearance);
    let known = |point: &&PlottedStrain| {
        point.strain_kj_per_mol.is_finite() && point.expanded_kj_per_mol.is_finite()
    };
    for point in plot.background.iter().filter(known) {
        let at = axes.place(point);
        bar(point, at, &axes, Ink::Faint, &mut canvas, &mut clearance);
        canvas.circle(at, RADIUS - 0.5, Ink::Faint, false);
    }
    let case: Vec<&PlottedStrain> = plot.case.iter().filter(known).collect();
    let places = set_aside(&case, &axes);
    for (point, &at) in case.iter().zip(&places) {
        bar(point, at, &axes, Ink::Strain, &mut canvas, &mut clearance);
        canvas.circle(at, RADIUS, Ink::Strain, true);
    }
    for (point, &at) in case.iter().zip(&places) {
        name(point, at, &mut canvas, &mut clearance);
    }
    canvas
}

struct Axes {
    sizes: (usize, usize),
    low: f64,
    high: f64,
    step: f64,
}

impl Axes {
    fn of(plot: &StrainPlot) -> Self {
        let points = || plot.background.iter().chain(&plot.case);
        let largest = points().map(|p| p.size).max().unwrap_or(0);
        let ends = points().flat_map(|p| {
            [
                p.strain_kj_per_mol - p.expanded_kj_per_mol,
                p.strain_kj_per_mol + p.expanded_kj_per_mol,
            ]
        });
        let finite = || ends.clone().filter(|x| x.is_finite());
        let high = finite().fold(20.0, f64::max);
        let low = finite().fold(0.0, f64::min);
        let step = [10.0, 20.0, 50.0, 100.0]
            .into_iter()
            .find(|step| (high - low) / step <= 9.0)
            .unwrap_or(200.0);
        Self {
            sizes: (SIZES.0, SIZES.1.max(largest)),
            low: (low / step).floor() * step,
            high: (high / step).ceil() * step,
            step,
        }
    }

    fn x(&self, size: f64) -> f64 {
        let (first, last) = (self.sizes.0 as f64, self.sizes.1 as f64);
        AREA[0] + AREA[2] * (size - first + 0.6) / (last - first + 1.2)
    }

    fn y(&self, strain: f64) -> f64 {
        AREA[1] + AREA[3] * (self.high - strain) / (self.high - self.low)
    }

    fn place(&self, point: &PlottedStrain) -> Point {
        [self.x(point.size as f64), self.y(point.strain_kj_per_mol)]
    }

    fn draw(&self, canvas: &mut Canvas, clearance: &mut Clearance) {
        let [left, top, width, height] = AREA;
        let (right, bottom) = (left + width, top + height);
        let base = self.y(0.0);
        canvas.line([left, top], [left, bottom], 1.0, Ink::Plain, None);
        canvas.line([left, base], [right, base], 1.0, Ink::Plain, None);
        clearance.block_stroke([left, base], [right, base], 3.0);
        // Words stay inside the area.
        let far = 1e4;
        clearance.block(span([-far, -far], [left + 2.0, far]));
        clearance.block(span([right + 6.0, -far], [far, far]));
        clearance.block(span([-far, -far], [far, top - 6.0]));
        clearance.block(span([-far, bottom - 2.0], [far, far]));
        let steps = ((self.high - self.low) / self.step).round() as i32;
        for index in 0..=steps {
            let strain = self.low + self.step * f64::from(index);
            let y = self.y(strain);
            canvas.line([left - 5.0, y], [left, y], 1.0, Ink::Plain, None);
            let text = crate::document::rounding::fixed(strain, 0);
            canvas.words(&text, [left - 9.0, y], TICK_SIZE, Anchor::End, Ink::Plain);
        }
        for size in self.sizes.0..=self.sizes.1 {
            let x = self.x(size as f64);
            canvas.line([x, bottom], [x, bottom + 5.0], 1.0, Ink::Plain, None);
            canvas.words(
                &size.to_string(),
                [x, bottom + 16.0],
                TICK_SIZE,
                Anchor::Middle,
                Ink::Plain,
            );
        }
        if base < bottom - 1.0 {
            canvas.line([left, bottom], [right, bottom], 1.0, Ink::Plain, None);
        }
        let below = [left + width / 2.0, bottom + 38.0];
        canvas.words(
            "Atoms in the ring",
            below,
            LABEL_SIZE,
            Anchor::Middle,
            Ink::Plain,
        );
        let title = [left + 8.0, top + 6.0];
        canvas.words(
            "Strain, kJ/mol",
            title,
            LABEL_SIZE,
            Anchor::Start,
            Ink::Plain,
        );
        clearance.block(Rectangle::of_words(
            "Strain, kJ/mol",
            title,
            LABEL_SIZE,
            Anchor::Start,
        ));
    }
}

/// Where the points of the case go: aside of those of the same size that they would hide.
fn set_aside(case: &[&PlottedStrain], axes: &Axes) -> Vec<Point> {
    let mut places: Vec<Point> = Vec::new();
    for point in case {
        let at = axes.place(point);
        let free = |x: f64| {
            places
                .iter()
                .all(|p| (p[0] - x).abs() > ASIDE - 1.0 || (p[1] - at[1]).abs() > 2.5 * RADIUS)
        };
        let aside = (0..9).map(|step: i32| {
            at[0] + ASIDE * f64::from((step + 1) / 2) * if step % 2 == 1 { 1.0 } else { -1.0 }
        });
        let x = aside.into_iter().find(|&x| free(x)).unwrap_or(at[0]);
        places.push([x, at[1]]);
    }
    places
}

fn bar(
    point: &PlottedStrain,
    at: Point,
    axes: &Axes,
    ink: Ink,
    canvas: &mut Canvas,
    clearance: &mut Clearance,
) {
    let [low, high] =
        [-1.0, 1.0].map(|sign| axes.y(point.strain_kj_per_mol + sign * point.expanded_kj_per_mol));
    clearance.block(span(at, at).grown(RADIUS + 2.5));
    // A bar that the point would cover is left out.
    if low - high > 2.0 * RADIUS {
        canvas.line([at[0], low], [at[0], high], 1.3, ink, None);
        for y in [low, high] {
            canvas.line([at[0] - 4.0, y], [at[0] + 4.0, y], 1.3, ink, None);
        }
        clearance.block_stroke([at[0], low], [at[0], high], 10.0);
    }
}

/// The name of a point beside it, with a thin line to it when it had to go far.
fn name(point: &PlottedStrain, at: Point, canvas: &mut Canvas, clearance: &mut Clearance) {
    let radii: Vec<f64> = (0..50).map(|step| 15.0 + 5.0 * f64::from(step)).collect();
    let place = clearance.place(&point.label, LABEL_SIZE, at, &radii, 0.0);
    let words = Rectangle::of_words(&point.label, place, LABEL_SIZE, Anchor::Middle).grown(2.0);
    if let Some((enter, _)) = words.clip(at, place) {
        let edge = [
            at[0] + enter * (place[0] - at[0]),
            at[1] + enter * (place[1] - at[1]),
        ];
        if (edge[0] - at[0]).hypot(edge[1] - at[1]) > 18.0 {
            canvas.line(at, edge, 0.8, Ink::Faint, None);
            clearance.block_stroke(at, edge, 1.0);
        }
    }
    canvas.words(&point.label, place, LABEL_SIZE, Anchor::Middle, Ink::Strain);
}
