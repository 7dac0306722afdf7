//! Sample types: words that laboratories and the open standard use.

use crate::site::SampleType;
use crate::terms::folded;

/// Words for each type (common practice, no source). The open standard's `Quality Control …`
/// values are read by what they name.
const WORDS: [(SampleType, &[&str]); 12] = [
    (
        SampleType::Regular,
        &[
            "regular",
            "routine",
            "normal",
            "n",
            "sample",
            "primary",
            "reg",
            "field sample",
            "sample routine",
            "sample routine resample",
            "sample - routine, regular",
            "sample other",
            "field msr/obs",
            "parent",
        ],
    ),
    (
        SampleType::Duplicate,
        &[
            "duplicate",
            "field duplicate",
            "dup",
            "fd",
            "replicate",
            "field replicate",
            "rep",
            "lab duplicate",
            "split",
            "field split",
            "sample field split",
            "blind duplicate",
        ],
    ),
    (
        SampleType::Blank,
        &[
            "blank",
            "trip blank",
            "tb",
            "field blank",
            "fb",
            "equipment blank",
            "eb",
            "rinsate blank",
            "rinse blank",
            "method blank",
            "mb",
            "lab blank",
            "laboratory blank",
        ],
    ),
    (
        SampleType::Spike,
        &[
            "spike",
            "matrix spike",
            "ms",
            "msd",
            "matrix spike duplicate",
            "surrogate",
            "lcs",
            "lcsd",
        ],
    ),
    (SampleType::Reference, &["reference", "reference material", "reference sample", "standard"]),
    (SampleType::Dry, &["dry", "dry well", "well dry"]),
    (SampleType::Destroyed, &["destroyed", "abandoned", "decommissioned"]),
    (SampleType::NoAccess, &["no access", "inaccessible", "not accessible", "blocked"]),
    (SampleType::FreeProduct, &["free product", "product", "napl", "lnapl", "dnapl"]),
    (SampleType::NotSampled, &["not sampled", "ns"]),
    (SampleType::NotAnalysed, &["not analysed", "not analyzed", "na"]),
    (SampleType::NotReported, &["not reported", "nr"]),
];

/// The type that a cell names; the site file's own words come before this list.
#[must_use]
pub fn sample_type(text: &str) -> Option<SampleType> {
    let written = folded(text);
    let known = WORDS
        .iter()
        .find(|(_, words)| words.iter().any(|word| folded(word) == written))
        .map(|(kind, _)| *kind);
    known.or_else(|| quality_control(&written))
}

/// The open standard's `Quality Control …` values.
fn quality_control(written: &str) -> Option<SampleType> {
    let rest = written.strip_prefix("qualitycontrol")?;
    let has = |words: &[&str]| words.iter().any(|word| rest.contains(word));
    Some(if has(&["blank"]) {
        SampleType::Blank
    } else if has(&["spike"]) {
        SampleType::Spike
    } else if has(&["replicate", "duplicate", "split", "reanalysis"]) {
        SampleType::Duplicate
    } else {
        SampleType::Reference
    })
}

/// Words in the result cell that say there is no result. Only words that mean nothing else.
#[must_use]
pub fn non_result(text: &str) -> Option<SampleType> {
    let kind = sample_type(text)?;
    let spelled_out = folded(text).len() > 2;
    let is_gap = !matches!(
        kind,
        SampleType::Regular
            | SampleType::Duplicate
            | SampleType::Blank
            | SampleType::Spike
            | SampleType::Reference
    );
    (spelled_out && is_gap).then_some(kind)
}
