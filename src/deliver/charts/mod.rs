//! One SVG chart a series: true time axis, log concentration axis, limit, readings, line and band.
//!
//! Nothing is told by colour alone: detects are filled, non-detects hollow with a stem down to the
//! axis, values above the range hollow triangles; the line is solid between the first and the last
//! used date and dashed beyond. Text from files is made harmless and escaped.

pub mod style;
pub mod log_axis;
pub mod time_axis;
pub mod frame;
pub mod canvas;
pub mod clip;
pub mod axes;
pub mod marks;
pub mod line;
pub mod reach;
pub mod legend;
pub mod describe;
pub mod chosen;

pub use chosen::{Chosen, chosen};

use canvas::Canvas;
use frame::Frame;

use crate::findings::SeriesFinding;

/// What a chart has to know besides its series.
#[derive(Clone, Copy, Debug)]
pub struct ChartFacts<'a> {
    /// The two-sided confidence of every interval.
    pub confidence: f64,
    /// The caution at the foot.
    pub caution: &'a str,
}

/// The chart as SVG text; empty axes where the series has no dated value.
#[must_use]
pub fn series_svg(series: &SeriesFinding, facts: &ChartFacts<'_>) -> String {
    let dates = time_axis::range(series);
    let legend = legend::entries(series, dates, facts.confidence);
    let frame = Frame::of(series, dates, legend::rows(legend.len()));
    let mut svg = String::new();
    {
        let canvas = Canvas::on(&mut svg);
        describe::headline(&canvas, series, facts.confidence);
        axes::grid(&canvas, &frame);
        line::band(&canvas, &frame, series);
        axes::limit(&canvas, &frame, series);
        axes::goal(&canvas, &frame, series);
        line::line(&canvas, &frame, series);
        reach::interval(&canvas, &frame, series);
        marks::readings(&canvas, &frame, series);
        axes::axes(&canvas, &frame, series.unit.label());
        legend::draw(&canvas, &frame, &legend);
        describe::foot(&canvas, series, facts.caution);
        canvas.finish();
    }
    describe::with_words(&svg, series, facts.confidence)
}
