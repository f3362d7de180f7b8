//! Design of reinforced concrete slab panels to BS 8110-1:1997.
pub mod bs8110;
pub mod check;
pub mod criteria;
pub mod floor;
pub mod query;
pub mod ranges;
pub mod result;

use criteria::Criteria;
use floor::Floor;
use result::FloorDesign;

/// Designs every panel and support of a floor.
#[must_use]
pub fn design_floor(_floor: &Floor, _criteria: &Criteria) -> FloorDesign {
    FloorDesign { panels: vec![], supports: vec![], queries: vec![], assumptions: vec![] }
}
