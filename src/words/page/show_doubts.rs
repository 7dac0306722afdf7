//! The part of a series' page that refits fill: other models, other choices, more rounds.

use crate::findings::SeriesFinding;
use crate::words::doubt;
use crate::words::layout::{Align, Lines};

/// Writes what refits found out; nothing where nothing was refitted.
pub fn doubts(lines: &mut Lines, series: &SeriesFinding) {
    if !series.models.is_empty() {
        lines.heading("Models on the same data (AICc: lower is better, by more than 4 to count)");
        let unit = series.unit.label();
        let rows: Vec<Vec<String>> = series
            .models
            .iter()
            .map(|fit| vec![doubt::model(fit.model).to_owned(), doubt::model_line(fit, unit)])
            .collect();
        lines.rows(&rows, &[Align::Left, Align::Left], 2);
    }
    if let Some(adjusted) = &series.adjusted {
        lines.heading("Correlation");
        lines.hanging(&doubt::adjusted(adjusted), 2, 4);
    }
    if !series.spans.is_empty() {
        lines.heading("What would change the answer");
        let rows: Vec<Vec<String>> = series
            .spans
            .iter()
            .map(|span| vec![doubt::choice_kind(span.kind).to_owned(), doubt::span(span)])
            .collect();
        lines.rows(&rows, &[Align::Left, Align::Left], 2);
        if let Some(choice) = &series.most_telling {
            let text = doubt::most_telling(choice, series.verdict);
            lines.hanging(&format!("most telling: {text}"), 2, 4);
        }
    }
    let rounds = doubt::more_rounds(series);
    if !rounds.is_empty() {
        lines.heading("How much more sampling");
        let rows: Vec<Vec<String>> =
            rounds.into_iter().map(|(name, text)| vec![name.to_owned(), text]).collect();
        lines.rows(&rows, &[Align::Left, Align::Left], 2);
        lines.paragraph(doubt::ROUNDS_CAUTION, 2);
    }
}
