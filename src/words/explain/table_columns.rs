//! The columns of the tables beside the summary.

use super::{Entry, Kind, OURS};

const WELLS: &str = "wells.csv";
const LEDGER: &str = "ledger.csv";
const FLAGS: &str = "flags.csv";
const USED: &str = "used.csv";
const KEYED: &str = "flags.csv, used.csv";

const fn of(place: &'static str, word: &'static str, meaning: &'static str) -> Entry {
    Entry { word, kind: Kind::Column, place, meaning, formula: None, source: OURS }
}

/// Every column of wells.csv, ledger.csv, flags.csv and used.csv.
pub const OTHERS: [Entry; 52] = [
    of("wells.csv, flags.csv, used.csv", "site", "The site of the row, as in summary.csv."),
    of("wells.csv, flags.csv, used.csv", "well", "The well of the row, as in summary.csv."),
    of(KEYED, "analyte", "The analyte of the row, as in summary.csv."),
    of(KEYED, "fraction", "The fraction of the row, as in summary.csv."),
    of(KEYED, "depth", "The depth of the row, as in summary.csv."),
    of(WELLS, "well_role", "plume, source, sentinel or background, from the site file."),
    of(WELLS, "series", "How many series the well has."),
    of(WELLS, "undetected", "How many of them are undetected."),
    of(WELLS, "too_few", "How many of them have too few data."),
    of(WELLS, "rising", "How many of them rise."),
    of(WELLS, "below", "How many of them are below their limit."),
    of(WELLS, "attenuating", "How many of them fall."),
    of(WELLS, "flat", "How many of them stand still."),
    of(WELLS, "undecided", "How many of them show neither."),
    of(
        WELLS,
        "over_limit_now",
        "How many series have a last result that is a detect over the limit.",
    ),
    of(
        WELLS,
        "controlling_analyte",
        "The analyte with the latest reach date, else the one that stands in the way of a date.",
    ),
    of(WELLS, "reach_date", "The latest reach date of the well's series."),
    of(WELLS, "reach_earliest", "Its early end."),
    of(WELLS, "reach_latest", "Its late end."),
    of(WELLS, "stands_in_the_way", "How many series stand in the way of the site's date."),
    of(WELLS, "last_sampled", "The newest used date of the well."),
    of(
        LEDGER,
        "file",
        "The file: its path below the site folder, or the shortest telling tail of the path given; - is standard input.",
    ),
    of(LEDGER, "sheet", "The workbook's sheet."),
    of(
        LEDGER,
        "record",
        "The line the record starts on, counted from 1; the row of a sheet, the cell of a cross-tab.",
    ),
    of(LEDGER, "site", "The site as written, or the site file's."),
    of(LEDGER, "well", "The well, after aliases."),
    of(LEDGER, "date", "The sample date; as written where it cannot be read."),
    of(LEDGER, "analyte", "The analyte as shown; as written where it is not listed."),
    of(LEDGER, "fraction", "The fraction."),
    of(LEDGER, "depth", "The depth as written."),
    of(LEDGER, "reported", "The result as written."),
    of(LEDGER, "unit", "The unit as written."),
    of(LEDGER, "qualifier", "The qualifier as written."),
    of(LEDGER, "reporting_limit", "The reporting limit as written."),
    of(LEDGER, "sample_id", "The sample id as written."),
    of(
        LEDGER,
        "outcome",
        "What became of the record: used, merged, non-result, quality-control or set-aside.",
    ),
    of(LEDGER, "reason", "Why; empty for used. decision:<id> names a decision of the site file."),
    of(LEDGER, "detail", "What was told about the record."),
    of(FLAGS, "flag", "The flag's code."),
    of(
        FLAGS,
        "figure",
        "The figure that raised the flag; empty where the test could not be made, or no figure applies.",
    ),
    of(FLAGS, "threshold", "The threshold in force, where it is a number."),
    of(FLAGS, "source", "Where the threshold comes from."),
    of(
        FLAGS,
        "note",
        "The flag in a sentence; says so where the test could not be made, which is never `passed`.",
    ),
    of(USED, "date", "The sample date."),
    of(
        USED,
        "value",
        "The value of the date in the series' unit: measured, or the limit a mark refers to.",
    ),
    of(
        USED,
        "mark",
        "`<` for a value somewhere under, `>` for one somewhere above, empty for a measured one.",
    ),
    of(USED, "estimated", "yes if any result of the date is estimated, else no."),
    of(USED, "in_fit", "yes if the date lies in the window of the fit, else no."),
    of(USED, "fitted_median", "The line's median concentration on the date."),
    Entry {
        formula: Some("ln value - ln fitted_median"),
        ..of(USED, "residual", "How far the value lies off the line; empty for non-detects.")
    },
    of(
        USED,
        "files_and_records",
        "file:record of every record that enters the value, joined by `; `.",
    ),
    of(
        "summary.json",
        "records",
        "How many records of the series ended in each outcome and reason.",
    ),
];
