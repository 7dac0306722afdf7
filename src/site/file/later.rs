//! Tables whose work is not built yet: they are read and typed, and then refused.

use super::super::choices::NonDetects;
use super::super::written::table::{Entry, Open, table, table_schema};
use super::super::written::{At, Day, FromToml, Header, Need, Problems};
use super::measures::Measure;

table! {
    /// Not built yet. Wells along a flow path, for the bulk rate.
    FlowpathTable {
        /// The path's name.
        name = "name": String, needed as "name = \"main axis\"";
        /// The wells with their distances.
        wells = "wells": Vec<At<FlowpathWell>>, needed as "wells = [{ well = \"MW-1\", distance-m = 0 }]";
        /// Seepage velocity in metres a year; in place of conductivity, gradient and porosity.
        seepage_velocity = "seepage-velocity": Measure;
        /// Hydraulic conductivity in metres a day.
        conductivity = "conductivity": Measure;
        /// Hydraulic gradient, metres a metre.
        gradient = "gradient": Measure;
        /// Effective porosity, a share.
        porosity = "porosity": Measure;
        /// Retardation factor; in place of bulk-density, koc and foc.
        retardation = "retardation": Measure;
        /// Bulk density in kilograms a litre.
        bulk_density = "bulk-density": Measure;
        /// Partition coefficient to organic carbon in litres a kilogram.
        koc = "koc": Measure;
        /// Organic carbon of the soil, a share.
        foc = "foc": Measure;
        /// Longitudinal dispersivity in metres.
        dispersivity = "dispersivity": Measure;
        /// An analyte that does not degrade, for comparison.
        companion = "companion": String;
        /// The dates taken together.
        period = "period": PeriodTable;
    }
}

table! {
    /// A well on a flow path.
    FlowpathWell {
        /// The well.
        well = "well": String, needed as "well = \"MW-1\"";
        /// Its distance along the path in metres.
        distance_m = "distance-m": f64, needed as "distance-m = 120";
    }
}

table! {
    /// A first and a last date.
    PeriodTable {
        /// The first date.
        from = "from": Day;
        /// The last date.
        to = "to": Day;
    }
}

table! {
    /// Not built yet. A parent and its daughters.
    ChainTable {
        /// The chain's name.
        name = "name": String, needed as "name = \"ethenes\"";
        /// The analytes in order of decay.
        members = "members": Vec<At<String>>, needed as "members = [\"PCE\", \"TCE\"]";
        /// Moles of daughter from a mole of parent, one for each step. Default 1 each.
        yields = "yields": Vec<At<f64>>;
        /// An analyte that does not degrade, for comparison.
        companion = "companion": String;
    }
}

table! {
    /// Not built yet. Conditions under which soil vapour is converted.
    VapourTable {
        /// The temperature with its unit, in quotes.
        temperature = "temperature": String;
        /// The pressure with its unit, in quotes.
        pressure = "pressure": String;
    }
}

table! {
    /// Not built yet. How meeting the limit is worded and counted.
    AttainmentTable {
        /// The statistic that is held against the limit.
        statistic = "statistic": String, needed as "statistic = \"each result\"";
        /// How many rounds it needs.
        rounds = "rounds": u64, needed as "rounds = 8";
        /// How many months they span at least.
        months = "months": u64;
        /// What non-detects count as.
        non_detects = "non-detects": NonDetects;
        /// The condition on the trend.
        trend = "trend": String;
        /// The rule's citation.
        citation = "citation": String, needed as "citation = \"…\"";
    }
}
