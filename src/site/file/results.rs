//! `[[results]]` as written.

use super::super::delivery::{
    Column, DateOrder, Decimal, Encoding, Layout, SampleType, SerialDates, Sigma,
};
use super::super::written::table::{Entry, Open, table, table_schema};
use super::super::written::{At, FromToml, Header, Keyed, Need, OneChar, Problems};

table! {
    /// How the results files that match a pattern are read. Blocks stand in order of delivery.
    ResultsTable {
        /// The files, as a pattern with / between folders, relative to the site folder.
        files = "files": String, needed as "files = \"results/*.csv\"";
        /// How the files are laid out: one result a line, or one result a cell. Default: as they show.
        layout = "layout": Layout;
        /// The sheet of a workbook that holds the results. Default: every sheet that holds a table.
        sheet = "sheet": String;
        /// The encoding, where it should not be found out.
        encoding = "encoding": Encoding;
        /// The character between cells, where it should not be found out.
        separator = "separator": OneChar;
        /// The file's header for each of our columns: { result = "Conc.", well = "Bore" }.
        columns = "columns": Keyed<Column, String>;
        /// The order of day and month, where the files do not prove it.
        date_order = "date-order": DateOrder;
        /// Whether years of two digits are read, 70 to 99 as 19xx and 00 to 69 as 20xx. Default
        /// false.
        two_digit_years = "two-digit-years": bool;
        /// Whether bare numbers in the date column are spreadsheet serials, and of which
        /// calendar. Default "no".
        serial_dates = "serial-dates": SerialDates;
        /// The decimal mark. Default "point".
        decimal = "decimal": Decimal;
        /// The mark between thousands.
        thousands = "thousands": OneChar;
        /// Whether ppb and ppm mean ug/L and mg/L of water. Default false.
        ppb_in_water = "ppb-in-water": bool;
        /// What the uncertainty column holds.
        uncertainty = "uncertainty": Sigma;
        /// The files' own words for sample types: { "7" = "duplicate" }.
        sample_types = "sample-types": Keyed<String, SampleType>;
        /// To what stage the files were validated, and by whom; printed in the statement on
        /// quality.
        validation = "validation": String;
    }
}
