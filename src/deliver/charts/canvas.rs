//! Drawing on SVG text: the only file that names the backend's calls.

use plotters::backend::SVGBackend;
use plotters::coord::Shift;
use plotters::drawing::{DrawingArea, IntoDrawingArea};
use plotters::element::{Circle, PathElement, Polygon};
use plotters::style::text_anchor::{HPos, Pos, VPos};
use plotters::style::{Color, FontFamily, FontStyle, IntoFont, RGBColor, TextStyle};

use super::clip::{self, Rectangle};
use super::frame::{Spot, whole};
use super::style::{PAPER, SIZE};

/// The backend writes a text size divided by this.
const FONT_SCALE: f64 = 1.24;

/// Which way words run from their point.
pub use plotters::style::text_anchor::{HPos as Across, VPos as Along};

/// A drawing in the making.
pub struct Canvas<'a> {
    area: DrawingArea<SVGBackend<'a>, Shift>,
}

/// How words look.
#[derive(Clone, Copy)]
pub struct Words {
    /// Their size as SVG writes it.
    pub size: f64,
    /// Their colour.
    pub color: RGBColor,
    /// Whether they are bold.
    pub bold: bool,
    /// Which part of them stands at the point.
    pub anchor: (HPos, VPos),
}

impl<'a> Canvas<'a> {
    /// An empty drawing that ends up in `svg`.
    pub fn on(svg: &'a mut String) -> Self {
        let area = SVGBackend::with_string(svg, SIZE).into_drawing_area();
        done(area.fill(&PAPER));
        Self { area }
    }

    /// Closes the drawing.
    pub fn finish(&self) {
        done(self.area.present());
    }

    /// A straight or broken line.
    pub fn path(&self, spots: &[Spot], color: RGBColor, stroke: u32) {
        let path: Vec<(i32, i32)> = spots.iter().map(|s| (whole(s.0), whole(s.1))).collect();
        done(self.area.draw(&PathElement::new(path, color.stroke_width(stroke))));
    }

    /// A broken line cut at a rectangle.
    pub fn clipped(&self, spots: &[Spot], inside: Rectangle, color: RGBColor, stroke: u32) {
        let mut run: Vec<Spot> = Vec::new();
        for pair in spots.windows(2) {
            let Some((a, b)) = clip::segment(pair[0], pair[1], inside) else { continue };
            if run.last().is_none_or(|last| *last != a) {
                self.run(&std::mem::take(&mut run), color, stroke);
                run.push(a);
            }
            run.push(b);
        }
        self.run(&run, color, stroke);
    }

    fn run(&self, run: &[Spot], color: RGBColor, stroke: u32) {
        if run.len() > 1 {
            self.path(run, color, stroke);
        }
    }

    /// A broken line in dashes, cut at a rectangle. Dashes run on over its corners.
    pub fn dashed(
        &self,
        spots: &[Spot],
        inside: Rectangle,
        color: RGBColor,
        stroke: u32,
        (dash, gap): (i32, i32),
    ) {
        let (dash, gap) = (f64::from(dash), f64::from(gap));
        let mut walked = 0.0;
        for pair in spots.windows(2) {
            let Some((a, b)) = clip::segment(pair[0], pair[1], inside) else { continue };
            let length = (b.0 - a.0).hypot(b.1 - a.1);
            let at = |d: f64| (a.0 + (b.0 - a.0) * d / length, a.1 + (b.1 - a.1) * d / length);
            // The dash that the walk stands in, or the next one, counted from the line's beginning.
            let mut start = (walked / (dash + gap)).floor() * (dash + gap) - walked;
            while start < length && length > 0.0 {
                let (from, to) = (start.max(0.0), (start + dash).min(length));
                if to > from {
                    self.path(&[at(from), at(to)], color, stroke);
                }
                start += dash + gap;
            }
            walked += length;
        }
    }

    /// A filled area; `opacity` of 1 covers what lies under it.
    pub fn area(&self, outline: &[Spot], color: RGBColor, opacity: f64) {
        let spots: Vec<(i32, i32)> = outline.iter().map(|s| (whole(s.0), whole(s.1))).collect();
        if spots.len() > 2 {
            done(self.area.draw(&Polygon::new(spots, color.mix(opacity).filled())));
        }
    }

    /// A filled circle.
    pub fn disc(&self, at: Spot, radius: i32, color: RGBColor) {
        done(self.area.draw(&Circle::new((whole(at.0), whole(at.1)), radius, color.filled())));
    }

    /// A circle.
    pub fn ring(&self, at: Spot, radius: i32, color: RGBColor, stroke: u32) {
        let style = color.stroke_width(stroke);
        done(self.area.draw(&Circle::new((whole(at.0), whole(at.1)), radius, style)));
    }

    /// A closed outline, hollow: the paper inside, the stroke around.
    pub fn hollow(&self, outline: &[Spot], color: RGBColor, stroke: u32) {
        self.area(outline, PAPER, 1.0);
        let mut closed = outline.to_vec();
        closed.extend(outline.first());
        self.path(&closed, color, stroke);
    }

    /// Words at a point. They are escaped by the backend.
    pub fn words(&self, text: &str, at: Spot, words: &Words) {
        let family = FontFamily::SansSerif;
        let font = (family, words.size * FONT_SCALE).into_font();
        let font = if words.bold { font.style(FontStyle::Bold) } else { font };
        let style =
            TextStyle::from(font).color(&words.color).pos(Pos::new(words.anchor.0, words.anchor.1));
        done(self.area.draw_text(text, &style, (whole(at.0), whole(at.1))));
    }
}

/// The result of drawing into a text.
fn done<T, E: std::fmt::Debug>(drawn: Result<T, E>) -> T {
    // The SVG backend with a string as its target has no operation that can fail.
    drawn.expect("drawing into a string does not fail")
}
