//! The clauses of BS 8110-1:1997 used, one file per group.

pub mod coefficients;
