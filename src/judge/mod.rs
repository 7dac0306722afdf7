//! The verdict, which dates are shown and why one is not, the pace, the flags that need no refit.

pub mod facts;
pub mod verdict;
pub mod dates;
pub mod pace;
pub mod record_flags;
pub mod value_flags;
pub mod fit_flags;

pub use dates::{Shown, shown};
pub use facts::{Facts, JudgeRules};
pub use pace::pace;
pub use verdict::{Judged, verdict};

use crate::terms::{Flag, FlagCode};

/// Every flag that needs no refit, in the order of the list.
#[must_use]
pub fn flags(facts: &Facts<'_>, judged: &Judged, shown: &Shown) -> Vec<Flag> {
    let mut flags = record_flags::flags(facts);
    flags.extend(value_flags::flags(facts));
    flags.extend(fit_flags::flags(facts, judged, shown));
    sort_flags(&mut flags);
    flags
}

/// Puts flags in the order of the list.
pub fn sort_flags(flags: &mut [Flag]) {
    let place = |code: FlagCode| FlagCode::ALL.iter().position(|known| *known == code);
    flags.sort_by_key(|flag| place(flag.code));
}
