//! A merge sort that tells which places pass which, and is fast on what is nearly sorted.

/// Runs this short (a count) are sorted by insertion. Source: measured; 8 to 32 differ little.
const SHORT: usize = 16;

/// A point and where it stands.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Place {
    /// What is sorted by.
    pub over: f64,
    /// Which point it is.
    pub index: u32,
}

/// What is done where a place goes before others that stood before it.
pub trait Passing {
    /// One place goes before one other.
    fn passes_one(&mut self, earlier: &Place, later: &Place);

    /// One place goes before all of these.
    fn passes(&mut self, earlier: &[Place], later: &Place);

    /// These places are about to be merged with later ones.
    fn begin(&mut self, _earlier: &[Place]) {}

    /// One of them has found its place and is passed no more.
    fn placed(&mut self, _earlier: &Place) {}
}

/// Sorts places, and tells of every pair that changes its order.
///
/// # Formula
/// ```text
/// { (i, j) : i stands before j, j goes before i }
/// ```
/// by merging. Of two runs only the stretch is merged in which they overlap.
///
/// # Units
/// Places are sorted by value and, in one value, by index.
///
/// # Limits
/// Order n·log n; order n·log d where no place moves by more than d.
///
/// # Reference
/// Knight (1966), J. Am. Stat. Assoc. 61:436–439, for counting by merging.
pub fn merge_sort(all: &mut [Place], passing: &mut impl Passing) {
    let mut spare = all.to_vec();
    merge(all, &mut spare, passing);
}

fn goes_before(one: &Place, other: &Place) -> bool {
    one.over < other.over || one.over == other.over && one.index < other.index
}

fn merge(all: &mut [Place], spare: &mut [Place], passing: &mut impl Passing) {
    if all.len() <= SHORT {
        return insert(all, passing);
    }
    let half = all.len() / 2;
    merge(&mut all[..half], spare, passing);
    merge(&mut all[half..], spare, passing);
    let (left, right) = all.split_at(half);
    let start = left.partition_point(|one| !goes_before(&right[0], one));
    if start == half {
        return;
    }
    let end = half + right.partition_point(|one| goes_before(one, &left[half - 1]));
    let overlap = &mut all[start..end];
    let spare = &mut spare[..overlap.len()];
    spare.copy_from_slice(overlap);
    let (left, right) = spare.split_at(half - start);
    passing.begin(left);
    let (mut i, mut j) = (0, 0);
    for place in overlap {
        if j == right.len() || i < left.len() && !goes_before(&right[j], &left[i]) {
            *place = left[i];
            passing.placed(&left[i]);
            i += 1;
        } else {
            *place = right[j];
            passing.passes(&left[i..], &right[j]);
            j += 1;
        }
    }
}

fn insert(all: &mut [Place], passing: &mut impl Passing) {
    for end in 1..all.len() {
        let one = all[end];
        let mut at = end;
        while at > 0 && goes_before(&one, &all[at - 1]) {
            passing.passes_one(&all[at - 1], &one);
            all[at] = all[at - 1];
            at -= 1;
        }
        all[at] = one;
    }
}
