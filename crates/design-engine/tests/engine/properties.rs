//! What holds for any floor.

use design_engine::bs8110::flexure::{K_LIMIT, bending};
use design_engine::criteria::Criteria;
use design_engine::design_floor;
use design_engine::floor::{Axis, Floor, Side, SupportKind};
use design_engine::ranges::Range;
use design_engine::result::{Action, FloorDesign};
use proptest::prelude::*;

use crate::grid::{Grid, mirrored_side, turned_side};
use crate::moved::{difference, settled_by_direction_alone};
use crate::random::{any_criteria, any_floor, config, likely_floor, number_in};
use crate::settings::{criteria, number};

fn designed(grid: &Grid) -> (Floor, FloorDesign) {
    let floor = grid.build();
    let design = design_floor(&floor, &Criteria::default());
    (floor, design)
}

/// The first word of a design that is no finite number, with what stands before it.
fn not_finite(design: &FloorDesign) -> Option<String> {
    let text = format!("{design:?}");
    let word = |text: &str| text.split(|c: char| !c.is_alphanumeric()).any(|w| w == "NaN" || w == "inf");
    let mut places = text.split_inclusive([',', '{', '}']).filter(|part| word(part));
    places.next().map(str::to_owned)
}

/// All coefficient moments of a design, panel by panel, section by section.
fn coefficient_moments(design: &FloorDesign) -> Vec<Vec<f64>> {
    let of = |panel: &design_engine::result::PanelDesign| {
        panel.sections.iter().filter_map(|section| section.moment_from_coefficient_knm_m).collect()
    };
    design.panels.iter().map(of).collect()
}

proptest! {
    #![proptest_config(config(400))]

    #[test]
    fn steel_grows_with_moment_at_a_fixed_depth(
        d in 40.0..900.0_f64,
        fcu in 20.0..60.0_f64,
        fy in prop::sample::select(&[250.0, 460.0, 500.0][..]),
        shares in (0.0..1.0_f64, 0.0..1.0_f64),
    ) {
        let greatest = K_LIMIT * fcu * d * d / 1000.0;
        let (less, more) = (shares.0.min(shares.1) * greatest, shares.0.max(shares.1) * greatest);
        let steel = |moment: f64| bending(moment, d, fcu, fy, 1.15, K_LIMIT).as_mm2_m.unwrap();
        prop_assert!(steel(less) <= steel(more));
        // At least in proportion: the lever arm never grows.
        prop_assert!(steel(less) * more <= steel(more) * less * (1.0 + 1e-9) );
    }
}

proptest! {
    #![proptest_config(config(60))]

    #[test]
    fn a_floor_from_anywhere_in_the_allowed_ranges_is_designed_in_finite_numbers(
        grid in any_floor(),
        criteria in any_criteria(),
    ) {
        let floor = grid.build();
        let design = design_floor(&floor, &criteria);
        prop_assert_eq!(design.panels.len(), floor.panels.len());
        prop_assert_eq!(not_finite(&design), None);
        for panel in &design.panels {
            prop_assert_eq!(panel.sections.is_empty(), panel.not_designed.is_some());
            prop_assert!(panel.basis.is_none_or(|basis| basis.lx_m > 0.0 && basis.ly_m >= basis.lx_m));
            for section in &panel.sections {
                prop_assert!(criteria.bar_sizes_mm.iter().any(|size| (size - section.bars.bar_mm).abs() < 1e-9));
                prop_assert!(section.bars.spacing_mm >= criteria.least_spacing_mm - 1e-9);
                prop_assert!(section.bars.spacing_mm <= criteria.greatest_spacing_mm + 1e-9);
                prop_assert!(section.d_mm >= 1.0);
                prop_assert!(section.k.is_none_or(|k| k >= 0.0));
            }
            for check in &panel.checks {
                prop_assert_eq!(check.ok, check.ratio.is_some_and(|ratio| ratio <= 1.0 + 1e-9));
            }
        }
    }

    #[test]
    fn a_floor_of_likely_panels_is_designed_in_finite_numbers(grid in likely_floor(), criteria in any_criteria()) {
        prop_assert_eq!(not_finite(&design_floor(&grid.build(), &criteria)), None);
    }
}

proptest! {
    #![proptest_config(config(100))]

    #[test]
    fn a_panel_turned_by_90_degrees_is_the_same_panel(grid in likely_floor()) {
        let (floor, design) = designed(&grid);
        prop_assume!(!settled_by_direction_alone(&design));
        let (turned_floor, turned) = designed(&grid.turned());
        prop_assert_eq!(difference((&floor, &design), (&turned_floor, &turned), turned_side, Axis::across), None);
    }

    #[test]
    fn a_mirrored_floor_is_the_same_floor(grid in likely_floor()) {
        let (floor, design) = designed(&grid);
        let (mirrored_floor, mirrored) = designed(&grid.mirrored());
        prop_assert_eq!(difference((&floor, &design), (&mirrored_floor, &mirrored), mirrored_side, |axis| axis), None);
    }

    #[test]
    fn no_moment_falls_where_all_loads_are_scaled_by_one_factor(grid in likely_floor(), factor in number_in(Range::new(1.0, 1.25))) {
        let floor = grid.build();
        let with = |factor: f64| {
            let scaled = [("dead_load_factor", number(1.4 * factor)), ("imposed_load_factor", number(1.6 * factor))];
            design_floor(&floor, &criteria(&scaled))
        };
        let (before, after) = (with(1.0), with(factor));
        for (before, after) in before.panels.iter().zip(&after.panels) {
            for (before, after) in before.sections.iter().zip(&after.sections) {
                if let (Some(before), Some(after)) = (before.moment_knm_m, after.moment_knm_m) {
                    prop_assert!(after >= before * (1.0 - 1e-9), "{before} to {after}");
                }
            }
        }
        for (before, after) in before.supports.iter().zip(&after.supports) {
            prop_assert!(after.moment_knm_m.unwrap_or(0.0) >= before.moment_knm_m.unwrap_or(0.0) * (1.0 - 1e-9));
        }
    }

    #[test]
    fn a_panel_with_more_load_has_greater_moments_of_its_own(grid in likely_floor(), which in any::<prop::sample::Index>()) {
        let mut floor = grid.build();
        prop_assume!(!floor.panels.is_empty());
        let before = design_floor(&floor, &Criteria::default());
        let index = which.index(floor.panels.len());
        floor.panels[index].loads.imposed_kn_m2 += 1.0;
        let after = design_floor(&floor, &Criteria::default());
        let two_way = |design: &FloorDesign| {
            design.panels[index].basis.is_some_and(|basis| basis.action != Action::OneWay)
        };
        prop_assume!(two_way(&before));
        let moments = [&before, &after].map(coefficient_moments);
        for (panel, (before, after)) in moments[0].iter().zip(&moments[1]).enumerate() {
            for (before, after) in before.iter().zip(after) {
                if panel == index {
                    prop_assert!(after > before);
                } else {
                    prop_assert!((after - before).abs() < 1e-9, "another panel's own moments do not move");
                }
            }
        }
    }

    #[test]
    fn midspan_plus_the_mean_of_its_supports_is_what_the_table_gave(grid in likely_floor()) {
        let (_, design) = designed(&grid);
        for panel in &design.panels {
            let Some(basis) = panel.basis.filter(|basis| basis.action == Action::TwoWayRestrained) else { continue };
            for midspan in panel.sections.iter().filter(|s| s.support.is_none()) {
                // A hogging midspan has a second section, without a coefficient.
                let Some(table) = midspan.moment_from_coefficient_knm_m else { continue };
                let ends: Vec<_> = panel
                    .sections
                    .iter()
                    .filter(|s| s.support.is_some() && s.bars_along == midspan.bars_along)
                    .filter(|s| s.moment_knm_m.is_some())
                    .collect();
                let before: f64 = ends.iter().filter_map(|s| s.moment_from_coefficient_knm_m).sum();
                let after: f64 = ends.iter().filter_map(|s| s.moment_balanced_knm_m).sum();
                let balanced = midspan.moment_balanced_knm_m.unwrap();
                prop_assert!((table + before / 2.0 - balanced - after / 2.0).abs() < 1e-9, "{basis:?}");
                // The design moment is never below the table's or the balanced one.
                prop_assert!((midspan.moment_knm_m.unwrap() - table.max(balanced)).abs() < 1e-9);
            }
        }
    }

    #[test]
    fn both_panels_of_a_support_see_the_same_bars_moment_and_depth(grid in likely_floor()) {
        let (floor, design) = designed(&grid);
        for support in &design.supports {
            let laid = floor.support(support.support);
            let seen = laid.sides().filter(|side| design.panels[side.panel.0].not_designed.is_none());
            for side in seen {
                let panel = &design.panels[side.panel.0];
                let section = panel.sections.iter().find(|s| s.support == Some(support.support)).unwrap();
                prop_assert_eq!(section.moment_knm_m, support.moment_knm_m);
                prop_assert_eq!(section.bars, support.bars);
                prop_assert_eq!(section.layer, support.layer);
                prop_assert!((section.d_mm - support.d_mm).abs() < 1e-9);
                prop_assert_eq!(laid.kind == SupportKind::Crossing, section.moment_knm_m.is_none());
            }
            // Balanced between the two moments; else the larger.
            if let (Some(moment), [near, far]) = (support.moment_knm_m, support.sides.as_slice()) {
                let [a, b] = [near, far].map(|side| side.moment_from_coefficient_knm_m.unwrap());
                let inside = moment >= a.min(b) - 1e-9 && moment <= a.max(b) + 1e-9;
                prop_assert!(inside && (support.balanced || (moment - a.max(b)).abs() < 1e-9));
            }
        }
    }

    #[test]
    fn the_four_edges_carry_the_load_of_a_two_way_panel_within_two_percent(grid in likely_floor()) {
        let (floor, design) = designed(&grid);
        for panel in &design.panels {
            let Some(basis) = panel.basis.filter(|basis| basis.case.is_some()) else { continue };
            let laid = floor.panel(panel.panel);
            let carried: f64 = Side::ALL
                .into_iter()
                .filter_map(|side| {
                    let load = panel.side_loads[side.index()]?;
                    Some(load.ultimate_kn_m * load.loaded_share * laid.span_m(side.span_axis().across()))
                })
                .sum();
            let load = panel.loads.ultimate_kn_m2 * basis.lx_m * basis.ly_m;
            prop_assert!((carried / load - 1.0).abs() < 0.02, "{carried} of {load}");
        }
    }
}

proptest! {
    #![proptest_config(config(12))]

    #[test]
    fn the_number_of_threads_does_not_matter(grid in likely_floor()) {
        let floor = grid.build();
        let with = |threads: usize| {
            let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build().unwrap();
            pool.install(|| design_floor(&floor, &Criteria::default()))
        };
        prop_assert_eq!(with(1), with(4));
    }
}
