//! The words of a chart: its headline, its foot, and its title and description for those who do not
//! see it.

use super::canvas::{Across, Along, Canvas, Words};
use super::style::{INK, LABEL, LIGHT, PLOT_X, SHOWN, SIZE, SMALL, TITLE};
use crate::findings::SeriesFinding;
use crate::terms::{Reading, Verdict, WhyNoDate};
use crate::words::clean::{shown, shown_short};
use crate::words::number::{counted, month};
use crate::words::{reason, series_sentence, verdict};

/// Characters of the headline, of the lines under it, and of the site's name, at most.
const LONGEST: (usize, usize, usize) = (80, 140, 56);

/// Well and analyte, verdict with rate, and the date or why there is none.
pub fn headline(canvas: &Canvas<'_>, series: &SeriesFinding, level: f64) {
    let left = f64::from(PLOT_X.0) - 120.0;
    let title = Words { size: TITLE, color: INK, bold: true, anchor: (Across::Left, Along::Top) };
    canvas.words(&shown_short(&name(series), LONGEST.0), (left, 18.0), &title);
    let line = Words { size: LABEL, bold: false, ..title };
    let rate = series_sentence::rate(series, level).or_else(|| {
        series.why_no_rate.map(|why| format!("no rate, since {}", reason::no_rate(why)))
    });
    let rate = rate.filter(|_| series.verdict != Verdict::Undetected);
    let rate = rate.unwrap_or_else(|| verdict::gloss(series.verdict).to_owned());
    let first = format!("{}: {rate}", verdict::label(series.verdict));
    canvas.words(&shown_short(&first, LONGEST.1), (left, 62.0), &line);
    if let Some(second) = date(series) {
        canvas.words(&shown_short(&second, LONGEST.1), (left, 94.0), &line);
    }
}

fn date(series: &SeriesFinding) -> Option<String> {
    if let Some(reach) = series_sentence::reach(series) {
        let goal = series.goal_date.map_or_else(String::new, |d| format!("; goal {}", month(d)));
        let meets = series_sentence::meets(series);
        return Some(format!("typical (median) level {meets} the limit {reach}{goal}"));
    }
    if series.exceed_date.is_some() {
        return series_sentence::exceed(series);
    }
    // The first line says these already.
    let said =
        |why: &WhyNoDate| matches!(why, WhyNoDate::NoRate | WhyNoDate::Rising | WhyNoDate::Below);
    let why = series.why_no_date.filter(|why| !said(why))?;
    Some(format!("no date, since {}", reason::no_date(why)))
}

/// Well, analyte, fraction and depth.
fn name(series: &SeriesFinding) -> String {
    let key = &series.key;
    let mut name = format!("{}, {}", shown(&key.well), shown(&key.analyte));
    if let Some(fraction) = key.fraction {
        name.push_str(&format!(", {}", fraction.code()));
    }
    if let Some(depth) = &key.depth {
        name.push_str(&format!(", depth {}", shown(depth)));
    }
    name
}

/// The caution under everything, and the site.
pub fn foot(canvas: &Canvas<'_>, series: &SeriesFinding, caution: &str) {
    let words =
        Words { size: SMALL, color: LIGHT, bold: false, anchor: (Across::Left, Along::Bottom) };
    let bottom = f64::from(SIZE.1) - 14.0;
    canvas.words(&shown(caution), (f64::from(PLOT_X.0) - 120.0, bottom), &words);
    let site = Words { anchor: (Across::Right, Along::Bottom), ..words };
    let right = f64::from(SIZE.0) - 30.0;
    canvas.words(&shown_short(&series.key.site, LONGEST.2), (right, bottom), &site);
}

/// The drawing with its role, title and description, at the size it is shown.
#[must_use]
pub fn with_words(svg: &str, series: &SeriesFinding, level: f64) -> String {
    // The backend's first tag ends at the first `>`; what follows is the drawing.
    let drawing = svg.split_once('>').map_or(svg, |(_, drawing)| drawing);
    let title = escaped(&name(series));
    let description = escaped(&description(series, level));
    format!(
        "<svg width=\"{}\" height=\"{}\" viewBox=\"0 0 {} {}\" \
         xmlns=\"http://www.w3.org/2000/svg\" role=\"img\">\n<title>{title}</title>\n\
         <desc>{description}</desc>{drawing}",
        SHOWN.0, SHOWN.1, SIZE.0, SIZE.1
    )
}

/// What the chart shows, in words: the readings by kind, then the sentence of the series.
fn description(series: &SeriesFinding, level: f64) -> String {
    let of = |is: fn(Reading) -> bool| series.values.iter().filter(|v| is(v.reading)).count();
    let measured = of(|r| matches!(r, Reading::Measured(_)));
    let below = of(|r| matches!(r, Reading::Below(_)));
    let other = of(|r| matches!(r, Reading::Above(_) | Reading::Between(..)));
    let mut parts = vec![counted(measured, "measured value", "measured values")];
    if below > 0 {
        parts.push(counted(below, "non-detect", "non-detects"));
    }
    if other > 0 {
        parts.push(counted(other, "other reading", "other readings"));
    }
    format!(
        "Concentration in {} on a logarithmic axis against time: {}. {}",
        series.unit.label(),
        parts.join(", "),
        series_sentence::series_sentence(series, level)
    )
}

/// Text as XML holds it.
#[must_use]
pub fn escaped(text: &str) -> String {
    let mut escaped = String::with_capacity(text.len());
    for c in shown(text).chars() {
        match c {
            '<' => escaped.push_str("&lt;"),
            '>' => escaped.push_str("&gt;"),
            '&' => escaped.push_str("&amp;"),
            '"' => escaped.push_str("&quot;"),
            '\'' => escaped.push_str("&apos;"),
            other => escaped.push(other),
        }
    }
    escaped
}
