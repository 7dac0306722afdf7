//! `[[analyte]]` and `[[well]]` as written.

use super::super::choices::{Depths, Role};
use super::super::fraction::Fraction;
use super::super::written::table::{Entry, Open, table, table_schema};
use super::super::written::{Amount, At, Day, FromToml, Header, Need, Problems, UnitWritten};

table! {
    /// One analyte.
    AnalyteTable {
        /// The name shown in every output.
        name = "name": String, needed as "name = \"Benzene\"";
        /// The CAS number; results join on it first.
        cas = "cas": String;
        /// Other names under which results files know the analyte.
        aliases = "aliases": Vec<At<String>>;
        /// The unit of its numbers; a limit's unit goes before it.
        unit = "unit": UnitWritten;
        /// What the number counts: "N", "NO3".
        basis = "basis": String;
        /// The fraction that counts, and that results without one belong to.
        fraction = "fraction": Fraction;
        /// The medium that counts.
        medium = "medium": String;
        /// The limit: a number, a blank and a unit.
        limit = "limit": Amount;
        /// The law or guideline of the limit.
        limit_source = "limit-source": String;
        /// The date from which the limit is in force.
        limit_from = "limit-from": Day;
        /// Several limits in place of limit, each from its own date.
        limits = "limits": Vec<At<LimitTable>>;
        /// The date by which the limit is to be met.
        goal_date = "goal-date": Day;
    }
}

table! {
    /// A limit from its effective date.
    LimitTable {
        /// A number, a blank and a unit.
        value = "value": Amount, needed as "value = \"5 ug/L\"";
        /// The date from which it is in force.
        from = "from": Day;
        /// The law or guideline.
        source = "source": String;
    }
}

table! {
    /// One well.
    WellTable {
        /// The name, exactly as results files write it.
        name = "name": String, needed as "name = \"MW-1\"";
        /// What the well is for. Default "plume"; a background well never counts for the site's
        /// date.
        role = "role": Role;
        /// Degrees north, WGS 84.
        latitude = "latitude": f64;
        /// Degrees east, WGS 84.
        longitude = "longitude": f64;
        /// Easting in the site's own grid.
        x = "x": f64;
        /// Northing in the site's own grid.
        y = "y": f64;
        /// Other names, each with its dates and its reason.
        aliases = "aliases": Vec<At<AliasTable>>;
        /// What results from several depths are: a series each, or one.
        depths = "depths": Depths;
        /// Limits of this well alone.
        limits = "limits": Vec<At<WellLimitTable>>;
        /// The date by which limits are to be met here.
        goal_date = "goal-date": Day;
    }
}

table! {
    /// Another name of a well. A well that replaced another is no alias of it.
    AliasTable {
        /// The name as results files write it.
        name = "name": String, needed as "name = \"MW1\"";
        /// The first date on which it means this well.
        from = "from": Day;
        /// The last date on which it means this well.
        to = "to": Day;
        /// Who decided it.
        who = "who": String, needed as "who = \"…\": a decision says who, when and why";
        /// When it was decided.
        when = "when": Day, needed as "when = 2026-07-01: a decision says who, when and why";
        /// Why.
        why = "why": String, needed as "why = \"…\": a decision says who, when and why";
    }
}

table! {
    /// A limit of one analyte at one well.
    WellLimitTable {
        /// The analyte, as it is listed.
        analyte = "analyte": String, needed as "analyte = \"Benzene\"";
        /// A number, a blank and a unit.
        value = "value": Amount, needed as "value = \"5 ug/L\"";
        /// The date from which it is in force.
        from = "from": Day;
        /// The law or guideline.
        source = "source": String;
    }
}
