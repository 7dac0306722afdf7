//! Why there is no rate and why there is no date, in words.

use crate::terms::{WhyNoDate, WhyNoRate};

/// A clause that completes "no rate can be given because".
#[must_use]
pub fn no_rate(why: WhyNoRate) -> &'static str {
    match why {
        WhyNoRate::NoDatesInWindow => "no sample date lies in the window of the fit",
        WhyNoRate::Dates => "there are fewer dates than a rate needs",
        WhyNoRate::Detects => "there are fewer measured values on distinct dates than a rate needs",
        WhyNoRate::OnALine => {
            "the measured values lie exactly on a line, which leaves no scatter to judge by"
        }
        WhyNoRate::NotConverged => "the search for the best fit did not arrive",
    }
}

/// A clause that completes "no date can be supported because".
#[must_use]
pub fn no_date(why: WhyNoDate) -> &'static str {
    match why {
        WhyNoDate::NoLimit => "no limit applies",
        WhyNoDate::Below => "the series is below its limit already",
        WhyNoDate::NoRate => "there is no rate",
        WhyNoDate::Dates => "there are fewer dates than a date needs",
        WhyNoDate::Years => "the record is shorter than a date needs",
        WhyNoDate::Detects => "there are fewer detects than a date needs",
        WhyNoDate::LowResults => "too many zero or negative results could not be used",
        WhyNoDate::Rising => "concentrations rise",
        WhyNoDate::NotLocated => "the data do not locate the date at all",
        WhyNoDate::IntervalHoldsZero => "the rate's interval holds zero: no fall is shown",
        WhyNoDate::ResultsDenyLine => {
            "the line lies under the limit while the last results do not show it"
        }
        WhyNoDate::BeforeRecord => "the line met the limit before the first used date",
        WhyNoDate::BeyondCalendar => "it would lie after the year 9999",
    }
}

/// The rule behind a missing rate.
#[must_use]
pub fn no_rate_meaning(why: WhyNoRate) -> &'static str {
    match why {
        WhyNoRate::NoDatesInWindow => {
            "Every dated value lies outside the window: before the last restart event, or outside \
             the window a decision sets."
        }
        WhyNoRate::Dates => "The window holds fewer dates than rate-needs asks for (default 4).",
        WhyNoRate::Detects => {
            "The window holds fewer measured values on distinct dates than rate-needs asks for \
             (default 3); with fewer the likelihood has no best line."
        }
        WhyNoRate::OnALine => {
            "The detects lie exactly on a line that no non-detect contradicts. Real results \
             scatter; look for copied or computed values."
        }
        WhyNoRate::NotConverged => {
            "The likelihood's maximum was not found, which concave likelihoods do not explain; \
             please report the series."
        }
    }
}

/// The rule behind a missing date.
#[must_use]
pub fn no_date_meaning(why: WhyNoDate) -> &'static str {
    match why {
        WhyNoDate::NoLimit => "Neither the site file nor the template gives this analyte a limit.",
        WhyNoDate::Below => "The verdict is below: there is nothing left to reach.",
        WhyNoDate::NoRate => "No rate was fitted; why_no_rate says why.",
        WhyNoDate::Dates => "The window holds fewer dates than date-needs asks for (default 8).",
        WhyNoDate::Years => "The window spans fewer years than date-needs asks for (default 1.5).",
        WhyNoDate::Detects => {
            "The window holds fewer measured values than date-needs asks for (default 5)."
        }
        WhyNoDate::LowResults => {
            "More than 10 % of the results were zero or negative without a mark. What is lost is the \
             low end, so the line would stand too high or too low."
        }
        WhyNoDate::Rising => "A rising line never comes down to the limit.",
        WhyNoDate::NotLocated => {
            "Fieller's set is the whole line: every date agrees with the data at this confidence."
        }
        WhyNoDate::IntervalHoldsZero => {
            "A rate of zero agrees with the data, so a date that rests on the fitted rate would \
             claim more than is known. Where the level is shown to be over the limit, reach_earliest \
             still says before which date the limit is not reached."
        }
        WhyNoDate::ResultsDenyLine => {
            "All that `below` asks of the line holds, yet one of the last 4 dates does not show the \
             limit met. A line through a plateau just over its limit looks like this."
        }
        WhyNoDate::BeforeRecord => {
            "The fitted line lies under the limit from the first used date on, so the meeting lies \
             outside the data."
        }
        WhyNoDate::BeyondCalendar => "The date would lie after 9999-12-31.",
    }
}
