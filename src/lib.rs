//! Ebbwell screens first-order attenuation of groundwater contaminants, well by well.
pub mod numerics;
pub mod terms;
pub mod site;
pub mod ledger;
pub mod intake;
pub mod series;
