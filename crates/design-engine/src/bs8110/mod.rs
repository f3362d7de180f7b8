//! The clauses of BS 8110-1:1997 used, one file per group.

pub mod anchorage;
pub mod bond;
pub mod coefficients;
pub mod corners;
pub mod cover;
pub mod curtailment;
pub mod deflection;
pub mod flexure;
pub mod loads;
pub mod one_way;
pub mod shear;
pub mod spacing;
pub mod strip;
pub mod tables;
pub mod wall_loads;
