//! Merged cells: the text stands in the first cell of a region and is filled into the others.

use calamine::Dimensions;
use csv::StringRecord;

use crate::intake::split::{Filled, Line};
use crate::ledger::WorkbookProblem;

/// Fills the regions into rows that have cells of their own; `spend` is told of every place and
/// how many bytes are filled into it.
///
/// # Errors
/// What `spend` says once a workbook has asked for too much.
pub(super) fn fill(
    lines: &mut [Line],
    regions: &[Dimensions],
    spend: &mut dyn FnMut(u64) -> Result<(), WorkbookProblem>,
) -> Result<(), WorkbookProblem> {
    let mut fills: Vec<Vec<Fill>> = vec![Vec::new(); lines.len()];
    // A title merged far past the table fills no more than the widest row.
    let width = lines.iter().map(|line| line.cells.len()).max().unwrap_or(0);
    let last = u32::try_from(width).unwrap_or(u32::MAX).saturating_sub(1);
    for region in regions {
        let (top, left) = (u64::from(region.start.0) + 1, region.start.1);
        let (bottom, right) = (u64::from(region.end.0) + 1, region.end.1);
        let first = lines.partition_point(|line| line.line < top);
        let Some(origin) = lines.get(first).filter(|line| line.line == top) else { continue };
        let text = origin.cells.get(left as usize).unwrap_or_default().to_owned();
        if text.is_empty() {
            continue;
        }
        let right = right.min(last);
        for (at, line) in lines.iter().enumerate().skip(first) {
            if line.line > bottom {
                break;
            }
            for column in left..=right {
                let at_origin = line.line == top && column == left;
                let own = line.cells.get(column as usize).unwrap_or_default();
                let fills_it = !at_origin && own.is_empty();
                spend(if fills_it { text.len() as u64 } else { 0 })?;
                if fills_it {
                    let across = column != left;
                    fills[at].push(Fill { text: text.clone(), column, across });
                }
            }
        }
    }
    for (line, fills) in lines.iter_mut().zip(fills) {
        if !fills.is_empty() {
            apply(line, &fills);
        }
    }
    Ok(())
}

/// One cell to fill.
#[derive(Clone)]
struct Fill {
    text: String,
    column: u32,
    across: bool,
}

fn apply(line: &mut Line, fills: &[Fill]) {
    let mut cells: Vec<String> = line.cells.iter().map(str::to_owned).collect();
    for fill in fills {
        let at = fill.column as usize;
        if cells.len() <= at {
            cells.resize(at + 1, String::new());
        }
        cells[at].clone_from(&fill.text);
    }
    line.cells = StringRecord::from(cells);
    line.filled = fills.iter().map(|f| Filled { column: f.column, across: f.across }).collect();
}

#[cfg(test)]
mod tests {
    use super::{Dimensions, Line, StringRecord, fill};

    #[test]
    fn a_region_is_filled_down_and_across_and_never_over_a_cell() {
        let mut lines = vec![
            Line::whole(2, StringRecord::from(vec!["MW-7", "1", "2"])),
            Line::whole(3, StringRecord::from(vec!["", "3", "4"])),
            Line::whole(5, StringRecord::from(vec!["own", "5"])),
        ];
        let region = Dimensions::new((1, 0), (4, 0));
        assert_eq!(fill(&mut lines, &[region], &mut |_| Ok(())), Ok(()));
        let first: Vec<&str> = lines.iter().filter_map(|line| line.cells.get(0)).collect();
        assert_eq!(first, ["MW-7", "MW-7", "own"]);
        assert_eq!(lines.iter().map(|line| line.filled.len()).collect::<Vec<_>>(), [0, 1, 0]);
        assert!(!lines[1].filled[0].across);
    }
}
