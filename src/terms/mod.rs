//! The words every stage shares: names, units, concentrations, readings, times, rates, verdicts,
//! paces, flags. Nothing here reads, computes a statistic or speaks to people.

pub mod name;
pub mod unit;
pub mod reading;
pub mod time;
pub mod verdict;
pub mod reasons;
pub mod flag;
pub mod band;
pub mod stage;
pub mod doubt;

pub use band::BandPoint;
pub use doubt::{
    Adjusted, Alternative, Answer, Choice, ChoiceKind, ChoiceSpan, Model, ModelFit, MoreRounds,
    WhyNoModel,
};
pub use flag::{Figure, Flag, FlagCode, Standing};
pub use name::{folded, nearest};
pub use reading::{Concentration, Reading};
pub use reasons::{WhyNoDate, WhyNoRate};
pub use stage::Stage;
pub use time::{PerYear, Span, Years, date_after, years_between};
pub use unit::{Dimension, Unit, UnitText};
pub use verdict::{Effort, Method, Pace, Verdict};
