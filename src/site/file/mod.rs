//! The site file as written, every value with its line.
//!
//! The tables here are the one declaration of the file's keys: the reader, the JSON schema and
//! the messages about unknown keys come from it. What is checked is [`super::checked::Site`].

mod history;
mod later;
mod measures;
mod results;
mod settings;
mod subjects;

pub use history::{DecisionTable, EventTable, ExpectedTable, QualifierTable};
pub use later::{
    AttainmentTable, ChainTable, FlowpathTable, FlowpathWell, PeriodTable, VapourTable,
};
pub use measures::{Measure, RangeTable};
pub use results::ResultsTable;
pub use settings::{DateNeedsTable, FlagsTable, RateNeedsTable, SettingsTable, SiteTable};
pub use subjects::{AliasTable, AnalyteTable, LimitTable, WellLimitTable, WellTable};

use super::written::table::{Entry, Open, table, table_schema};
use super::written::{At, FromToml, Header, Need, Problems};

table! {
    /// A site file: what the site is, how its results are read and judged, and every decision
    /// that changes a number.
    SiteFile {
        /// What the site is.
        site = "site": SiteTable, needed as "[site], and below it name = \"Former depot\"";
        /// Everything that changes a number of every series.
        settings = "settings": SettingsTable;
        /// Thresholds of flags.
        flags = "flags": FlagsTable;
        /// How results files are read, in order of delivery.
        results = "results": Vec<At<ResultsTable>>;
        /// The analytes of the site; any other is set aside. Without any, everything is fitted.
        analyte = "analyte": Vec<At<AnalyteTable>>;
        /// The wells of the site; any other is used and told.
        well = "well": Vec<At<WellTable>>;
        /// What each round should hold.
        expected = "expected": Vec<At<ExpectedTable>>;
        /// What happened at the site.
        event = "event": Vec<At<EventTable>>;
        /// Exclusions, windows and meanings for named records.
        decision = "decision": Vec<At<DecisionTable>>;
        /// What the laboratory's qualifiers and detection conditions mean.
        qualifier = "qualifier": Vec<At<QualifierTable>>;
        /// Not built yet. Wells along a flow path, for the bulk rate.
        flowpath = "flowpath": Vec<At<FlowpathTable>>;
        /// Not built yet. A parent and its daughters.
        chain = "chain": Vec<At<ChainTable>>;
        /// Not built yet. Conditions under which soil vapour is converted.
        vapour = "vapour": VapourTable;
        /// Not built yet. How meeting the limit is worded and counted.
        attainment = "attainment": AttainmentTable;
    }
}
