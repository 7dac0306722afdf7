//! Why a workbook cannot be read, and what to do about it.

use super::clean::shown;
use super::number::count;
use crate::ledger::{Cap, WorkbookProblem};

/// What was found, what was expected, and the next step.
#[must_use]
pub fn why(problem: &WorkbookProblem) -> String {
    match problem {
        WorkbookProblem::Locked => "it is under a password; expected an open workbook. Save it \
             without the password, or save each sheet as CSV (UTF-8)"
            .to_owned(),
        WorkbookProblem::OtherFormat { format } => format!(
            "it is of the kind .{format}, which is not read; expected .xlsx or CSV. Open it and \
             save it as .xlsx, or each sheet as CSV (UTF-8)"
        ),
        WorkbookProblem::OtherArchive => "it is a zip archive and no workbook; expected .xlsx or \
             CSV. Unpack it and put the results files it holds in its place"
            .to_owned(),
        WorkbookProblem::Damaged { why } => format!(
            "the workbook is damaged: {}; expected a whole .xlsx file. Ask for it again, or \
             open it and save each sheet as CSV (UTF-8)",
            shown(why)
        ),
        WorkbookProblem::OverCap { cap, found, most } => format!(
            "the workbook holds {} or more {}; at most {} are read, more than any table of results \
             needs. If it is one, save its sheets as CSV (UTF-8), which may be of any size",
            number(*found),
            what(*cap),
            number(*most)
        ),
    }
}

fn number(n: u64) -> String {
    usize::try_from(n).map_or_else(|_| n.to_string(), count)
}

fn what(cap: Cap) -> &'static str {
    match cap {
        Cap::FileBytes => "bytes",
        Cap::Entries => "parts",
        Cap::UnpackedBytes => "bytes when unpacked",
        Cap::Ratio => "bytes unpacked for each byte packed",
        Cap::Texts => "distinct texts",
        Cap::Rows => "rows in a sheet",
        Cap::Columns => "columns in a sheet",
        Cap::Cells => "filled cells",
        Cap::TextBytes => "bytes of text",
        Cap::Places => "cells between its corners, nearly all of them empty",
    }
}
