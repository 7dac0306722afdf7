//! The straight line beside other shapes: curvature, a plateau, two rates.

use chrono::NaiveDate;

use crate::fit::Fit;
use crate::judge::Facts;
use crate::numerics::comparison::PREFERRED_BY;
use crate::numerics::{Better, Comparison, Dropped, Points, compare, curvature};
use crate::project::dated;
use crate::terms::{Alternative, Flag, FlagCode, Model, ModelFit, WhyNoModel, date_after};

/// What other shapes say.
#[derive(Clone, Debug, Default)]
pub struct Shape {
    /// Raised flags.
    pub flags: Vec<Flag>,
    /// Every model on the same data.
    pub models: Vec<ModelFit>,
    /// The better one, where one is.
    pub alternative: Option<Alternative>,
}

/// The quadratic term is tested at this level.
const P: f64 = 0.05;

/// Compares the straight line with its alternatives.
#[must_use]
pub fn compare_models(facts: &Facts<'_>, fit: &Fit, points: Points<'_>) -> Shape {
    let mut out = Shape::default();
    if let Some(bend) = curvature(points, &fit.line).filter(|bend| bend.p < P) {
        // On a fall an upward bend is a slowing; on a rise it is a quickening.
        let slows = bend.coefficient * fit.line.slope < 0.0;
        let code = if slows { FlagCode::Slowing } else { FlagCode::Quickening };
        out.flags.push(Flag::raised(code, bend.p, P));
    }
    let compared = compare(points, &fit.line);
    let y0 = facts.limit().map(f64::ln);
    out.models = models(fit, &compared, y0);
    if let Some(line) = compared.first_order_aicc {
        if let Ok(two) = compared.two_rates.filter_lower(|two| two.aicc, line) {
            out.flags.push(Flag::raised(FlagCode::TwoRates, line - two.aicc, PREFERRED_BY));
        }
        if let Ok(plateau) = compared.plateau.filter_lower(|plateau| plateau.aicc, line) {
            let level = plateau.ln_plateau.exp();
            let mut flag = Flag::raised(FlagCode::LevelsOff, level, PREFERRED_BY);
            flag.threshold = facts.limit();
            out.flags.push(flag);
        }
    }
    out.alternative = compared.better.map(|better| {
        let crossing = y0.and_then(|y0| better.crossing(y0));
        let date = meets(fit, crossing);
        // A line that rose and falls again may never have been over the limit: no denial.
        let never_over =
            crossing.is_none() && matches!(better, Better::TwoRates(two) if two.after < 0.0);
        let after_goal = |date: NaiveDate| facts.series.goal_date.is_some_and(|goal| date > goal);
        Alternative {
            model: match better {
                Better::Plateau(_) => Model::Plateau,
                Better::TwoRates(_) => Model::TwoRates,
            },
            date,
            denies: y0.is_some() && !never_over && date.is_none_or(after_goal),
        }
    });
    out
}

/// Keeps a model whose criterion is lower than the line's by enough.
trait FilterLower<T> {
    fn filter_lower(self, aicc: impl Fn(&T) -> f64, line: f64) -> Result<T, ()>;
}

impl<T> FilterLower<T> for Result<T, Dropped> {
    fn filter_lower(self, aicc: impl Fn(&T) -> f64, line: f64) -> Result<T, ()> {
        self.ok().filter(|model| aicc(model) < line - PREFERRED_BY).ok_or(())
    }
}

/// A time at which a model meets the limit, as a date; one before the record is its first date.
fn meets(fit: &Fit, years: Option<f64>) -> Option<NaiveDate> {
    years.and_then(|years| dated(fit, years.max(0.0)).date())
}

fn models(fit: &Fit, compared: &Comparison, y0: Option<f64>) -> Vec<ModelFit> {
    let none = |model, aicc| ModelFit {
        model,
        aicc,
        meets_limit: None,
        plateau: None,
        break_date: None,
        why_not: None,
    };
    let line = y0.map(|y0| (y0 - fit.line.intercept) / fit.line.slope);
    let line = line.filter(|_| fit.line.slope < 0.0);
    vec![
        match compared.constant {
            Ok(constant) => none(Model::Constant, constant.aicc),
            Err(why) => ModelFit { why_not: Some(reason(why)), ..none(Model::Constant, None) },
        },
        ModelFit {
            meets_limit: meets(fit, line),
            ..none(Model::FirstOrder, compared.first_order_aicc)
        },
        match compared.plateau {
            Ok(plateau) => ModelFit {
                meets_limit: y0.and_then(|y0| meets(fit, plateau.crossing(y0))),
                plateau: Some(plateau.ln_plateau.exp()),
                ..none(Model::Plateau, Some(plateau.aicc))
            },
            Err(why) => ModelFit { why_not: Some(reason(why)), ..none(Model::Plateau, None) },
        },
        match compared.two_rates {
            Ok(two) => ModelFit {
                meets_limit: y0.and_then(|y0| meets(fit, two.crossing(y0))),
                break_date: date_after(fit.used.first, two.break_at),
                ..none(Model::TwoRates, Some(two.aicc))
            },
            Err(why) => ModelFit { why_not: Some(reason(why)), ..none(Model::TwoRates, None) },
        },
    ]
}

fn reason(why: Dropped) -> WhyNoModel {
    match why {
        Dropped::TooFewPoints { .. } => WhyNoModel::TooFewDates,
        Dropped::TooFewDetects { .. } => WhyNoModel::TooFewDetects,
        Dropped::NotFalling => WhyNoModel::NotFalling,
        Dropped::WrongCurvature => WhyNoModel::OtherBend,
        Dropped::NoPlateau => WhyNoModel::NoPlateau,
        Dropped::NoRoom => WhyNoModel::NoRoom,
        Dropped::NotConverged { .. } => WhyNoModel::NotConverged,
    }
}
