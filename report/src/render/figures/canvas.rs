//! The SVG writer: lines, circles and words in pixels, boxes of what was written, the frame around all of it.
//!
//! Words are placed by their base line, since some viewers ignore `dominant-baseline`.

use std::fmt::Write as _;

/// A point or a vector in the plane, y downwards.
pub(super) type Point = [f64; 2];

/// Widest common sans-serif letters as a share of the font size; a box made with it is rather too wide.
const LETTER_WIDTH: f64 = 0.6;

/// Height of capitals as a share of the font size.
const CAPITAL_HEIGHT: f64 = 0.73;

/// Space around the drawing, px.
const MARGIN: f64 = 8.0;

/// The colour of what is strained where the page sets none.
const STRAIN: &str = "#b3430e";

/// How a stroke or a word looks.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Ink {
    /// The colour of the text.
    Plain,
    /// The same, light.
    Faint,
    /// The colour of strain.
    Strain,
}

impl Ink {
    /// The attributes that give `property` (stroke or fill) its colour, with a plain value for viewers without custom properties.
    fn attributes(self, property: &str) -> String {
        match self {
            Self::Plain => format!("{property}=\"currentColor\""),
            Self::Faint => format!("{property}=\"currentColor\" {property}-opacity=\"0.62\""),
            Self::Strain => {
                format!("{property}=\"{STRAIN}\" style=\"{property}:var(--strain,{STRAIN})\"")
            }
        }
    }
}

/// Where words stand on their point.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Anchor {
    Start,
    Middle,
    End,
}

impl Anchor {
    const fn word(self) -> &'static str {
        match self {
            Self::Start => "start",
            Self::Middle => "middle",
            Self::End => "end",
        }
    }
}

/// A rectangle with sides along the axes.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Rectangle {
    pub(super) low: Point,
    pub(super) high: Point,
}

impl Rectangle {
    /// The box of capitals of that size, centred in height on `at`.
    pub(super) fn of_words(text: &str, at: Point, size: f64, anchor: Anchor) -> Self {
        let width = words_width(text, size);
        let left = match anchor {
            Anchor::Start => at[0],
            Anchor::Middle => at[0] - width / 2.0,
            Anchor::End => at[0] - width,
        };
        let half = size * CAPITAL_HEIGHT / 2.0;
        Self {
            low: [left, at[1] - half],
            high: [left + width, at[1] + half],
        }
    }

    pub(super) fn grown(self, by: f64) -> Self {
        Self {
            low: self.low.map(|x| x - by),
            high: self.high.map(|x| x + by),
        }
    }

    pub(super) fn overlaps(self, other: Self) -> bool {
        (0..2).all(|axis| self.low[axis] < other.high[axis] && other.low[axis] < self.high[axis])
    }

    /// The parameters along `from` to `to` between which the segment is inside.
    pub(super) fn clip(self, from: Point, to: Point) -> Option<(f64, f64)> {
        let (mut enter, mut leave) = (0.0_f64, 1.0_f64);
        for axis in 0..2 {
            let step = to[axis] - from[axis];
            let (low, high) = (self.low[axis] - from[axis], self.high[axis] - from[axis]);
            if step.abs() < 1e-9 {
                if low > 0.0 || high < 0.0 {
                    return None;
                }
            } else {
                let (first, second) = (low / step, high / step);
                enter = enter.max(first.min(second));
                leave = leave.min(first.max(second));
            }
        }
        (enter < leave).then_some((enter, leave))
    }
}

/// Width of words, px, rather too wide than too narrow.
pub(super) fn words_width(text: &str, size: f64) -> f64 {
    text.chars()
        .map(|c| match c {
            '₀'..='₉' | '⁰' | '¹' | '²' | '³' | '⁴'..='⁹' | '⁺' | '⁻' => 0.45,
            'm' | 'w' | 'M' | 'W' => 0.95,
            'A'..='Z' => 0.76,
            _ => LETTER_WIDTH,
        })
        .sum::<f64>()
        * size
}

/// A drawing that grows.
#[derive(Debug, Default)]
pub(super) struct Canvas {
    body: String,
    frame: Option<Rectangle>,
}

impl Canvas {
    /// A straight stroke with round ends; `dashes` as SVG writes them.
    pub(super) fn line(
        &mut self,
        from: Point,
        to: Point,
        width: f64,
        ink: Ink,
        dashes: Option<&str>,
    ) {
        self.cover(span(from, to).grown(width / 2.0));
        let pattern = dashes.map_or_else(
            || " stroke-linecap=\"round\"".to_owned(),
            |dashes| format!(" stroke-dasharray=\"{dashes}\""),
        );
        self.write(format_args!(
            "<line x1=\"{:.2}\" y1=\"{:.2}\" x2=\"{:.2}\" y2=\"{:.2}\" stroke-width=\"{width}\"{pattern} {}/>",
            from[0],
            from[1],
            to[0],
            to[1],
            ink.attributes("stroke")
        ));
    }

    /// A circle, filled or open.
    pub(super) fn circle(&mut self, centre: Point, radius: f64, ink: Ink, filled: bool) {
        self.cover(span(centre, centre).grown(radius + 1.0));
        let paint = if filled {
            ink.attributes("fill")
        } else {
            format!(
                "fill=\"none\" stroke-width=\"1.4\" {}",
                ink.attributes("stroke")
            )
        };
        self.write(format_args!(
            "<circle cx=\"{:.2}\" cy=\"{:.2}\" r=\"{radius}\" {paint}/>",
            centre[0], centre[1]
        ));
    }

    /// Words whose capitals are centred in height on `at`.
    pub(super) fn words(&mut self, text: &str, at: Point, size: f64, anchor: Anchor, ink: Ink) {
        self.cover(Rectangle::of_words(text, at, size, anchor).grown(0.25 * size));
        self.write(format_args!(
            "<text x=\"{:.2}\" y=\"{:.2}\" font-size=\"{size}\" text-anchor=\"{}\" {}>{}</text>",
            at[0],
            at[1] + size * CAPITAL_HEIGHT / 2.0,
            anchor.word(),
            ink.attributes("fill"),
            escaped(text)
        ));
    }

    /// Makes room for a box.
    pub(super) fn cover(&mut self, part: Rectangle) {
        let frame = self.frame.get_or_insert(part);
        for axis in 0..2 {
            frame.low[axis] = frame.low[axis].min(part.low[axis]);
            frame.high[axis] = frame.high[axis].max(part.high[axis]);
        }
    }

    /// The drawing for a page that sets the colours.
    pub(super) fn inline(&self, id: &str, title: &str) -> String {
        self.wrapped(id, title, "", "")
    }

    /// The drawing as a file: its own ink on its own paper.
    pub(super) fn file(&self, id: &str, title: &str) -> String {
        let [x, y, width, height] = self.view();
        let paper = format!(
            "<rect x=\"{x:.1}\" y=\"{y:.1}\" width=\"{width:.1}\" height=\"{height:.1}\" fill=\"#fcfbf8\"/>\n"
        );
        self.wrapped(id, title, " color=\"#1d2326\"", &paper)
    }

    fn wrapped(&self, id: &str, title: &str, colour: &str, paper: &str) -> String {
        let [x, y, width, height] = self.view();
        format!(
            "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{width:.1}\" height=\"{height:.1}\" viewBox=\"{x:.1} {y:.1} {width:.1} {height:.1}\" \
             role=\"img\" aria-labelledby=\"{id}-title\" font-family=\"'Helvetica Neue', Arial, 'DejaVu Sans', sans-serif\"{colour}>\n\
             <title id=\"{id}-title\">{}</title>\n{paper}{}</svg>\n",
            escaped(title),
            self.body
        )
    }

    fn view(&self) -> [f64; 4] {
        let nothing = span([0.0; 2], [0.0; 2]);
        let frame = self.frame.unwrap_or(nothing).grown(MARGIN);
        [
            frame.low[0],
            frame.low[1],
            frame.high[0] - frame.low[0],
            frame.high[1] - frame.low[1],
        ]
    }

    fn write(&mut self, element: std::fmt::Arguments<'_>) {
        // Writing to a string cannot fail.
        let _ = writeln!(self.body, "{element}");
    }
}

/// The box with two points at opposite corners.
pub(super) fn span(a: Point, b: Point) -> Rectangle {
    Rectangle {
        low: [a[0].min(b[0]), a[1].min(b[1])],
        high: [a[0].max(b[0]), a[1].max(b[1])],
    }
}

/// The one place where text becomes SVG or an HTML attribute.
pub(in crate::render) fn escaped(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '"' => out.push_str("&quot;"),
            '\'' => out.push_str("&#39;"),
            // XML allows no other control characters.
            _ if c.is_control() => out.push(' '),
            _ => out.push(c),
        }
    }
    out
}
