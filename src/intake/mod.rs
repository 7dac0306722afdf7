//! Results files become [`Tidy`]: one frame in canonical columns, each row with its record.
//!
//! A file's bytes become tables of records in canonical columns (`layout`), and every record is
//! read on its own; then what needs more than one record is settled: listed names, depths, repeats of a
//! delivery, diluted analyses. Every record leaves with a provisional fate. Detection-limit tables
//! and station files of the open standard are read before the results that they describe.

pub mod source;
pub mod address;
pub mod decode;
pub mod split;
pub mod open_names;
pub mod header;
pub mod texts;
pub mod number;
pub mod month_names;
pub mod date;
pub mod date_order;
pub mod qualifier;
pub mod condition;
pub mod cell;
pub mod basis;
pub mod sample_type;
pub mod table;
pub mod layout;
pub mod value;
pub mod cas_dates;
pub mod names;
pub mod limit_types;
pub mod limit_table;
pub mod stations;
pub mod companions;
pub mod record;
pub mod marks;
pub mod rows;
pub mod twins;
pub mod repeats;
pub mod depths;
pub mod frame;
pub mod arrival;
pub mod tidy;
pub mod account;
pub mod arrived;

pub use arrived::{Arrived, Places};
pub use frame::FrameError;
pub use source::{Found, Sources};
pub use stations::Station;
pub use tidy::{Tidy, tidy};
