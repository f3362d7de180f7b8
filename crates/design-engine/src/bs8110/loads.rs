//! Loads (2.4.3, Table 2.1).

use crate::criteria::Settings;
use crate::floor::AreaLoads;
use crate::result::LoadBuildUp;

/// Load build-up of a slab: gk = self-weight + finishes + partitions, n = 1.4 gk + 1.6 qk (factors of the
/// criteria). Thickness in mm, density in kN/m3, loads in kN/m2.
#[must_use]
pub fn build_up(thickness_mm: f64, loads: &AreaLoads, settings: &Settings) -> LoadBuildUp {
    let self_weight_kn_m2 = thickness_mm / 1000.0 * settings.concrete_density_kn_m3;
    let dead_kn_m2 = self_weight_kn_m2 + loads.finishes_kn_m2 + loads.partitions_kn_m2;
    LoadBuildUp {
        self_weight_kn_m2,
        finishes_kn_m2: loads.finishes_kn_m2,
        partitions_kn_m2: loads.partitions_kn_m2,
        dead_kn_m2,
        imposed_kn_m2: loads.imposed_kn_m2,
        ultimate_kn_m2: settings.dead_load_factor * dead_kn_m2
            + settings.imposed_load_factor * loads.imposed_kn_m2,
    }
}
