//! Colours, sizes and strokes of every chart, in one place.
//!
//! Lengths are in drawing units, two to a pixel: the SVG backend knows whole units only, so charts
//! are drawn at twice their size and scaled by the view box. Colours are of the Okabe-Ito palette or
//! grey, each at least 3:1 on white (computed), and differ in grey as well.

use plotters::style::RGBColor;

/// The drawing's width and height.
pub const SIZE: (u32, u32) = (1800, 1140);
/// The same as shown, in pixels.
pub const SHOWN: (u32, u32) = (900, 570);

/// Where the plot begins and ends from the left.
pub const PLOT_X: (i32, i32) = (150, 1580);
/// Where the plot begins from the top.
pub const PLOT_TOP: i32 = 180;
/// Where the lowest legend row ends.
pub const LEGEND_BOTTOM: i32 = 1080;
/// From the lower end of the plot to the first legend row.
pub const AXIS_ROOM: i32 = 100;
/// Height of a legend row.
pub const LEGEND_ROW: i32 = 40;
/// Width of a legend column.
pub const LEGEND_COLUMN: i32 = 560;

/// Readings, axes and words; 21:1 on white.
pub const INK: RGBColor = RGBColor(0, 0, 0);
/// The fitted line and its band; 5.2:1.
pub const LINE: RGBColor = RGBColor(0x00, 0x72, 0xb2);
/// The limit; 3.9:1.
pub const LIMIT: RGBColor = RGBColor(0xd5, 0x5e, 0x00);
/// What is not fitted, and lesser words; 4.5:1.
pub const LIGHT: RGBColor = RGBColor(0x76, 0x76, 0x76);
/// Grid lines, which carry no meaning of their own.
pub const GRID: RGBColor = RGBColor(0xe2, 0xe2, 0xe2);
/// Inside of hollow marks.
pub const PAPER: RGBColor = RGBColor(0xff, 0xff, 0xff);
/// How much of the band's fill covers the paper.
pub const BAND_OPACITY: f64 = 0.14;

/// Stroke of the fitted line.
pub const LINE_STROKE: u32 = 5;
/// Stroke of the limit.
pub const LIMIT_STROKE: u32 = 4;
/// Stroke of marks.
pub const MARK_STROKE: u32 = 3;
/// Stroke of axes, stems and the band's edges.
pub const THIN: u32 = 2;
/// Radius of a mark.
pub const RADIUS: i32 = 9;
/// Radius of the ring round an estimated value.
pub const RING: i32 = 16;
/// Dash and gap of the projection.
pub const DASH: (i32, i32) = (18, 12);
/// Dash and gap of the goal date.
pub const DOTS: (i32, i32) = (4, 8);

/// Text sizes as SVG writes them.
pub const TITLE: f64 = 34.0;
/// Size of the line under the title and of labels.
pub const LABEL: f64 = 24.0;
/// Size of the foot.
pub const SMALL: f64 = 20.0;
