//! `[site]`, `[settings]` and `[flags]` as written.

use super::super::choices::{Duplicates, NonDetects, RoundLength, SameDay, Setting};
use super::super::written::table::{Entry, Open, table, table_schema};
use super::super::written::{At, Day, FromToml, Header, Keyed, Need, Problems};

table! {
    /// What the site is.
    SiteTable {
        /// The site's name.
        name = "name": String, needed as "name = \"Former depot\"";
        /// The authority that decides.
        authority = "authority": String;
        /// The text printed with the caution.
        citation = "citation": String;
        /// Other names under which results files know the site.
        aliases = "aliases": Vec<At<String>>;
        /// First date of the site's monitoring.
        active_from = "active-from": Day;
        /// Last date of the site's monitoring.
        active_to = "active-to": Day;
    }
}

table! {
    /// Everything that changes a number of every series.
    SettingsTable {
        /// The confidence of every two-sided interval, 0.5 to 0.999. Default 0.90.
        confidence = "confidence": f64;
        /// The date by which limits are to be met.
        goal_date = "goal-date": Day;
        /// Years past the last used date beyond which a date is not told to people. Default 30.
        horizon_years = "horizon-years": f64;
        /// Years after which the newest result is stale. Default 1.5.
        stale_after_years = "stale-after-years": f64;
        /// The rate per year, either way, within which an interval shows a flat series. Default
        /// 0.0347, which is ln 2 over 20 years.
        flat_margin = "flat-margin": f64;
        /// The length of a round. Default "quarter".
        round = "round": RoundLength;
        /// Days by which a sample may miss its round's edge, at most a sixth of a round. Default
        /// 14, or a sixth of a round where that is less.
        round_grace_days = "round-grace-days": u64;
        /// The fewest data for a rate. Default { dates = 4, detects = 3 }.
        rate_needs = "rate-needs": RateNeedsTable;
        /// The fewest data for a date. Default { dates = 8, years = 1.5, detects = 5 }.
        date_needs = "date-needs": DateNeedsTable;
        /// What several detects of one date give. Default "mean".
        same_day = "same-day": SameDay;
        /// What field duplicates do. Default "primary".
        duplicates = "duplicates": Duplicates;
        /// What non-detects contribute to a fit. Default "censored".
        non_detects = "non-detects": NonDetects;
        /// Types of limits of the open water-quality standard that go before the others, the
        /// preferred first. Default: reporting limits before detection limits.
        limit_order = "limit-order": Vec<At<String>>;
        /// The reason for each statistical setting or threshold off its default, by its key.
        why = "why": Keyed<Setting, String>;
    }
}

table! {
    /// The fewest data for a rate.
    RateNeedsTable {
        /// Dates. Default 4.
        dates = "dates": u64;
        /// Measured values on distinct dates. Default 3.
        detects = "detects": u64;
    }
}

table! {
    /// The fewest data for a date.
    DateNeedsTable {
        /// Dates. Default 8.
        dates = "dates": u64;
        /// Years from the first to the last used date. Default 1.5.
        years = "years": f64;
        /// Measured values on distinct dates. Default 5.
        detects = "detects": u64;
    }
}

table! {
    /// Thresholds of flags. Each one off its default needs its reason in why of the settings.
    FlagsTable {
        /// A record shorter than this many years is short. Default 4.
        short_record_years = "short-record-years": f64;
        /// The share of non-detects over which a series is mostly non-detects. Default 0.5.
        mostly_non_detects = "mostly-non-detects": f64;
        /// The share of estimated detects over which the flag is raised. Default 0.25.
        estimated_results = "estimated-results": f64;
        /// The relative percent difference over which duplicates differ. Default 30.
        duplicates_rpd = "duplicates-rpd": f64;
    }
}
