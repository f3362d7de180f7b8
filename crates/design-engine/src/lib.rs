//! Design of reinforced concrete slab panels to BS 8110-1:1997.
//!
//! The main path is [`design_floor`]; each clause is a function of [`bs8110`].

pub mod bars;
pub mod bs8110;
pub mod check;
pub mod choose;
pub mod criteria;
pub mod design;
pub mod floor;
pub mod query;
pub mod ranges;
pub mod result;
pub mod supports;

pub use design::design_floor;
