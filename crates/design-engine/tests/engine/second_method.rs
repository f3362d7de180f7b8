//! The same numbers by another road: yield lines, equilibrium of the stress block, moment distribution, bisection.

use design_engine::bs8110::coefficients::{PanelCase, restrained};
use design_engine::bs8110::curtailment::contraflexure;
use design_engine::bs8110::deflection::modification_factor;
use design_engine::bs8110::flexure::{K_LIMIT, bending};
use design_engine::bs8110::shear::vc;
use design_engine::bs8110::strip::{StripSpan, greatest_sagging, support_moments};
use design_engine::bs8110::tables::PRINTED_RATIOS;
use design_engine::criteria::Coefficients;
use design_engine::supports::{release, stiffness};

use crate::numbers::close;

/// The root of a function that changes sign between two points.
fn bisect(mut low: f64, mut high: f64, f: impl Fn(f64) -> f64) -> f64 {
    let rising = f(low) < 0.0;
    for _ in 0..200 {
        let middle = f64::midpoint(low, high);
        if (f(middle) < 0.0) == rising { low = middle } else { high = middle }
    }
    f64::midpoint(low, high)
}

/// Plastic moments of a rectangular slab per metre: midspan and the two ends, along each span.
struct Plastic {
    midspan: f64,
    ends: [f64; 2],
}

/// Johansen's collapse load of an orthotropic rectangle a x b (a: span of `along_a`):
/// m = (n ar2/24)(sqrt(3 + (ar/br)2) - ar/br)2 with the reduced sides ar <= br, else their roles swapped.
fn collapse_load(a: f64, b: f64, along_a: &Plastic, along_b: &Plastic) -> f64 {
    let reduced = |side: f64, strength: &Plastic| {
        let ends: f64 = strength.ends.iter().map(|end| (1.0 + end / strength.midspan).sqrt()).sum();
        2.0 * side / ends
    };
    let mu = along_b.midspan / along_a.midspan;
    let (ar, br) = (reduced(a, along_a), reduced(b, along_b) / mu.sqrt());
    let (ar, br) = (ar.min(br), ar.max(br));
    let t = (3.0 + (ar / br).powi(2)).sqrt() - ar / br;
    24.0 * along_a.midspan / (ar * t).powi(2)
}

#[test]
fn yield_lines_give_the_known_loads_of_square_and_strip() {
    let simple = Plastic { midspan: 1.0, ends: [0.0; 2] };
    let fixed = Plastic { midspan: 1.0, ends: [1.0; 2] };
    close(collapse_load(1.0, 1.0, &simple, &simple), 24.0, 1e-9);
    close(collapse_load(1.0, 1.0, &fixed, &fixed), 48.0, 1e-9);
    // A very long panel is a strip: n l2/8.
    close(collapse_load(1.0, 1e6, &simple, &simple), 8.0, 1e-4);
}

/// Collapse load over n of a panel with three quarters of its table moments (the middle strips are three
/// quarters of the width).
fn collapse_over_design(case: PanelCase, ratio: f64, how: Coefficients) -> f64 {
    let table = restrained(case, ratio, how);
    let plastic = |midspan: f64, edge: Option<f64>, discontinuous: u8| {
        let end = |index: u8| if index < discontinuous { 0.0 } else { 0.75 * edge.unwrap() };
        Plastic { midspan: 0.75 * midspan, ends: [end(0), end(1)] }
    };
    let short = plastic(table.short_midspan, table.long_edge, case.long_discontinuous);
    let long = plastic(table.long_midspan, table.short_edge, case.short_discontinuous);
    collapse_load(1.0, ratio, &short, &long)
}

#[test]
fn yield_lines_with_three_quarters_of_the_table_moments_carry_the_design_load() {
    for case in PanelCase::ALL {
        for ratio in PRINTED_RATIOS {
            for how in [Coefficients::Tabulated, Coefficients::Equations] {
                close(collapse_over_design(case, ratio, how), 1.0, 0.02);
            }
        }
    }
}

#[test]
fn yield_lines_agree_between_printed_ratios_too() {
    for case in PanelCase::ALL {
        for hundredths in 100..=200 {
            let ratio = f64::from(hundredths) / 100.0;
            close(collapse_over_design(case, ratio, Coefficients::Equations), 1.0, 0.02);
            close(collapse_over_design(case, ratio, Coefficients::Tabulated), 1.0, 0.025);
        }
    }
}

#[test]
fn lever_arm_is_that_of_the_stress_block_in_equilibrium() {
    let (d, fcu) = (125.0, 35.0);
    for step in 1..=156 {
        let k = f64::from(step) / 1000.0;
        let moment = k * fcu * d * d * 1000.0;
        // A block of 0.45 fcu over depth s (figure 3.3), not deeper than 0.9 x 0.5 d.
        let s = bisect(0.0, 0.46 * d, |s| 0.45 * fcu * 1000.0 * s * (d - s / 2.0) - moment);
        let section = bending(moment / 1e6, d, fcu, 460.0, 1.05, K_LIMIT + 1e-9);
        let z = (d - s / 2.0).min(0.95 * d);
        close(section.z_mm.unwrap(), z, 1e-6);
        // The steel balances the moment about the block's centre.
        close(section.as_mm2_m.unwrap() * 460.0 / 1.05 * z, moment, 1e-3);
    }
}

#[test]
fn vc_is_the_cube_root_by_bisection() {
    for (steel, d, fcu) in
        [(250.0, 119.0, 30.0), (523.0, 170.0, 25.0), (1340.0, 240.0, 40.0), (905.0, 95.0, 22.0)]
    {
        let rho: f64 = steel / (10.0 * d);
        // (1.25 vc/0.79)^12 = rho^4 (fcu/25)^4 (400/d)^3
        let twelfth = rho.powi(4) * (fcu / 25.0_f64).powi(4) * (400.0 / d).powi(3);
        let root = bisect(0.0, 10.0, |x| x.powi(12) - twelfth);
        close(vc(steel, d, fcu), 0.79 * root / 1.25, 1e-9);
    }
}

#[test]
fn modification_factor_satisfies_equation_7() {
    for fs in [120.0, 180.0, 250.0, 333.0] {
        for moment in [5.0, 12.0, 30.0] {
            let d = 120.0;
            let factor = modification_factor(fs, moment, d);
            let root =
                bisect(0.0, 10.0, |x| (x - 0.55) * 120.0 * (0.9 + moment * 1e3 / (d * d)) - (477.0 - fs));
            close(factor, root.min(2.0), 1e-9);
        }
    }
}

/// Moments at the middle support of a two-span strip by moment distribution to convergence, every joint
/// released in turn, far pinned ends too. `fixed_end` are the hogging moments there before release.
fn distribute(fixed_end: [f64; 2], i_over_l: [f64; 2], far_pinned: [bool; 2]) -> f64 {
    // Clockwise positive: hogging turns the left span's end one way, the right span's the other.
    let mut near = [fixed_end[0], -fixed_end[1]];
    let mut far = [0.0_f64; 2];
    for _ in 0..200 {
        let unbalanced = near[0] + near[1];
        for span in 0..2 {
            let share = -unbalanced * i_over_l[span] / (i_over_l[0] + i_over_l[1]);
            near[span] += share;
            far[span] += share / 2.0;
        }
        for span in 0..2 {
            if far_pinned[span] {
                near[span] -= far[span] / 2.0;
                far[span] = 0.0;
            }
        }
    }
    close(near[0], -near[1], 1e-9);
    near[0]
}

#[test]
fn release_is_moment_distribution_to_convergence() {
    for (h_a, l_a, h_b, l_b) in [(150.0, 4.0, 150.0, 6.0), (125.0, 3.2, 200.0, 7.1), (175.0, 5.0, 175.0, 5.0)]
    {
        for pinned in [[false, false], [true, false], [false, true], [true, true]] {
            let (m_a, m_b) = (14.0, 22.5);
            let moment = release(m_a, stiffness(h_a, l_a, pinned[0]), m_b, stiffness(h_b, l_b, pinned[1]));
            let i_over_l = [h_a * h_a * h_a / l_a, h_b * h_b * h_b / l_b];
            close(moment, distribute([m_a, m_b], i_over_l, pinned), 1e-9);
        }
    }
}

#[test]
fn contraflexure_is_the_first_root_of_the_moment_diagram() {
    for (free, near, far) in [(20.0, 12.0, 8.0), (20.0, 8.0, 12.0), (20.0, 12.0, 0.0), (15.0, 13.0, 13.0)] {
        let l = 5200.0;
        let moment = |x: f64| {
            let s = x / l;
            4.0 * free * s * (1.0 - s) - near * (1.0 - s) - far * s
        };
        // The moment rises to its greatest at u = 1/2 + (near - far)/(8 free).
        let summit = l * (0.5 + (near - far) / (8.0 * free));
        assert!(moment(summit) > 0.0);
        close(contraflexure(free, near, far, l).unwrap(), bisect(0.0, summit, moment), 1e-6);
    }
}

#[test]
fn no_contraflexure_where_the_span_hogs_throughout() {
    assert!(contraflexure(10.0, 14.0, 12.0, 5000.0).is_none());
    assert!(contraflexure(0.0, 5.0, 5.0, 5000.0).is_none());
}

/// Support moments of a strip by moment distribution to convergence: fixed-end moments w l2/12, shares by h3/l.
fn distributed_strip(spans: &[StripSpan], loads: &[f64], built_in: [bool; 2]) -> Vec<f64> {
    let count = spans.len();
    let stiffness: Vec<f64> = spans.iter().map(|span| span.h_mm.powi(3) / span.l_m).collect();
    // Clockwise moments on the two ends of each span.
    let mut ends: Vec<[f64; 2]> = (0..count)
        .map(|i| {
            let fixed = loads[i] * spans[i].l_m * spans[i].l_m / 12.0;
            [-fixed, fixed]
        })
        .collect();
    for _ in 0..2000 {
        for joint in 0..=count {
            let (before, after) = (joint.checked_sub(1), (joint < count).then_some(joint));
            let held = (before.is_none() && built_in[0]) || (after.is_none() && built_in[1]);
            if held {
                continue;
            }
            let at_joint = [before.map(|span| (span, 1)), after.map(|span| (span, 0))];
            let unbalanced: f64 = at_joint.iter().flatten().map(|&(span, end)| ends[span][end]).sum();
            let total: f64 = at_joint.iter().flatten().map(|&(span, _)| stiffness[span]).sum();
            for &(span, end) in at_joint.iter().flatten() {
                let share = -unbalanced * stiffness[span] / total;
                ends[span][end] += share;
                ends[span][1 - end] += share / 2.0;
            }
        }
    }
    (0..=count).map(|joint| if joint < count { -ends[joint][0] } else { ends[count - 1][1] }).collect()
}

#[test]
fn strips_by_three_moment_equations_are_moment_distribution_to_convergence() {
    let span = |l_m: f64, h_mm: f64| StripSpan { l_m, h_mm, ultimate_kn_m2: 0.0, least_kn_m2: 0.0 };
    let spans = [span(4.2, 150.0), span(5.5, 150.0), span(3.1, 200.0), span(6.0, 175.0)];
    let loads = [12.0, 6.5, 14.2, 9.0];
    for built_in in [[false, false], [true, false], [false, true], [true, true]] {
        for count in 1..=4 {
            let direct = support_moments(&spans[..count], &loads[..count], built_in);
            let distributed = distributed_strip(&spans[..count], &loads[..count], built_in);
            for (direct, distributed) in direct.iter().zip(distributed) {
                close(*direct, distributed, 1e-9);
            }
        }
    }
}

#[test]
fn the_greatest_sagging_moment_is_the_summit_of_the_diagram() {
    for (w, l, near, far) in [(10.0, 5.0, 12.0, 20.0), (10.0, 5.0, 0.0, 31.0), (8.0, 6.0, 50.0, 40.0)] {
        let steps = (0..=20_000).map(|i| f64::from(i) / 20_000.0 * l);
        let moments = steps.map(|x| w * x * (l - x) / 2.0 - near * (1.0 - x / l) - far * x / l);
        close(greatest_sagging(w, l, near, far), moments.fold(f64::NEG_INFINITY, f64::max), 1e-6);
    }
}
