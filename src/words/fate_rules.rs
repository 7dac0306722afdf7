//! The rule behind each reason for setting a record aside, in full, for `explain`.

use crate::ledger::SetAside;

/// The rule.
#[must_use]
pub fn set_aside(why: SetAside) -> &'static str {
    match why {
        SetAside::UnreadableNumber => {
            "The result is not a finite number with the declared decimal sign and separators: \
             `1e400`, `NaN`, `5,1,2`, `O.5` with a letter."
        }
        SetAside::UnreadableDate => "The date is not a calendar date in a form that is read.",
        SetAside::AmbiguousDate => {
            "Day and month of the file's dates could be either way round: the order is not declared, \
             and no date of the column has a part above 12."
        }
        SetAside::NoWell => "The record names no well.",
        SetAside::NoAnalyte => "The record names no analyte.",
        SetAside::NoDate => "The record has no date.",
        SetAside::NoResult => {
            "The record has neither a result nor a mark or code that says why there is none."
        }
        SetAside::NoUnit => "The result has no unit, and none is given for the analyte.",
        SetAside::NoReportingLimit => {
            "The result is a non-detect, and neither the result, a reporting limit nor a detection \
             limit says under which value."
        }
        SetAside::UnknownUnit => {
            "The unit is not in the closed list; ppb and ppm are read only where the site file \
             declares them."
        }
        SetAside::OtherDimension => {
            "The unit measures another thing than the series' unit (mass, amount or activity)."
        }
        SetAside::OtherBasis => "The unit counts another thing than the series, as N or as NO3.",
        SetAside::OtherFraction => {
            "The result is dissolved where the site file lists total, or the reverse."
        }
        SetAside::OtherMedium => "The sample's medium is not the one declared for the analyte.",
        SetAside::OtherSite => "The record belongs to another site than the site file's.",
        SetAside::AnalyteNotListed => {
            "The site file or template does not list the analyte, by CAS number, name or alias."
        }
        SetAside::DepthDiffers => {
            "The well has results at more than one depth, and the site file does not yet say \
             whether they are separate series or one."
        }
        SetAside::UnknownSampleType => {
            "The sample type is neither known nor mapped in the site file."
        }
        SetAside::QualifierNeedsLegend => {
            "The qualifier (B, E, N, NJ or an unknown code) means different things at different \
             laboratories; the site file has to say which."
        }
        SetAside::ConditionNeedsLegend => {
            "The detection condition is neither a non-detect, an above-range result nor a gap; the \
             site file has to say what it means."
        }
        SetAside::Rejected => "The result carries the qualifier R, or the status Rejected.",
        SetAside::AboveRange => "The result is above the instrument's range and gives no value.",
        SetAside::LowResult => {
            "The result is zero or negative and carries no mark; a logarithm of it does not exist, \
             and replacing it would be a guess."
        }
        SetAside::Superseded => {
            "The same sample has an unequal result in a later file, which is used instead."
        }
        SetAside::UnmatchedLimit => "A detection-limit row of the open standard matches no result.",
        SetAside::Ragged => {
            "The record has fewer cells than the header and a required one is missing, or more cells \
             that are not empty."
        }
        SetAside::CellError => "The workbook's cell holds an error such as #N/A.",
        SetAside::AfterAsOf => "The sample is dated after the as-of date of the run.",
    }
}
