//! Results files become [`Tidy`]: one frame in canonical columns, each row with its record.
//!
//! A file is decoded, split into records, its header matched to columns, and every record read on
//! its own; then what needs more than one record is settled: listed names, depths, repeats of a
//! delivery, diluted analyses. Every record leaves with a provisional fate.

pub mod source;
pub mod decode;
pub mod split;
pub mod header;
pub mod texts;
pub mod number;
pub mod date;
pub mod date_order;
pub mod qualifier;
pub mod condition;
pub mod sample_type;
pub mod table;
pub mod value;
pub mod names;
pub mod record;
pub mod marks;
pub mod rows;
pub mod repeats;
pub mod depths;
pub mod frame;
pub mod tidy;
pub mod account;
pub mod arrived;

pub use arrived::{Arrived, Places};
pub use frame::FrameError;
pub use source::{Found, Sources};
pub use tidy::{Tidy, tidy};
