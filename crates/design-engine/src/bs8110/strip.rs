//! Elastic analysis of one-way strips (3.2.1.2.2, 3.5.2.3): three-moment equations, load cases, 20 % reduction.

use super::curtailment::contraflexure;

/// Share of the elastic support moment that is kept (3.5.2.3).
pub const SUPPORT_SHARE: f64 = 0.8;
/// No section is designed for less than this share of the elastic envelope (3.2.2.1 condition 3).
pub const LEAST_SHARE: f64 = 0.7;

/// One span of a strip a metre wide.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct StripSpan {
    /// Span, m.
    pub l_m: f64,
    /// Thickness, mm; stiffness goes with its cube.
    pub h_mm: f64,
    /// Ultimate load n, kN/m2.
    pub ultimate_kn_m2: f64,
    /// Least load, 1.0 gk, kN/m2.
    pub least_kn_m2: f64,
}

/// Moments and shears of one span after the reduction, per metre width. Ends: lesser coordinate first.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SpanForces {
    /// Greatest sagging moment, kNm/m.
    pub sagging_knm_m: f64,
    /// Greatest hogging moment at midspan, kNm/m; 0 where midspan never hogs.
    pub midspan_hogging_knm_m: f64,
    /// Hogging moments at the two ends, kNm/m.
    pub ends_knm_m: [f64; 2],
    /// Greatest shears at the two ends, kN/m, whichever their direction: an end may be held down in some case.
    pub shears_kn_m: [f64; 2],
    /// How far hogging reaches from the two ends before any reduction, as a share of the span: the furthest of all
    /// cases; 1 where some case hogs throughout.
    pub hogging_reach: [f64; 2],
}

/// Elastic hogging moments at the supports of a strip, kNm/m, under one load per span, by the three-moment
/// equations: M0 f1 + 2 M1 (f1 + f2) + M2 f2 = (w1 l1^2 f1 + w2 l2^2 f2)/4 with f = l/h^3. An end is simple
/// (moment 0) or built in.
#[must_use]
pub fn support_moments(spans: &[StripSpan], loads_kn_m2: &[f64], built_in: [bool; 2]) -> Vec<f64> {
    let count = spans.len();
    let f: Vec<f64> = spans.iter().map(|span| span.l_m / span.h_mm.powi(3)).collect();
    let load = |i: usize| loads_kn_m2[i] * spans[i].l_m * spans[i].l_m * f[i] / 4.0;
    // Row i: lower[i] M(i-1) + diagonal[i] M(i) + upper[i] M(i+1) = right[i].
    let (mut lower, mut diagonal) = (vec![0.0; count + 1], vec![1.0; count + 1]);
    let (mut upper, mut right) = (vec![0.0; count + 1], vec![0.0; count + 1]);
    for i in 0..=count {
        let (before, after) = (i.checked_sub(1), (i < count).then_some(i));
        let solved = match (before, after) {
            (None, _) => built_in[0],
            (_, None) => built_in[1],
            _ => true,
        };
        if solved {
            lower[i] = before.map_or(0.0, |s| f[s]);
            upper[i] = after.map_or(0.0, |s| f[s]);
            diagonal[i] = 2.0 * (lower[i] + upper[i]);
            right[i] = before.map_or(0.0, load) + after.map_or(0.0, load);
        }
    }
    for i in 1..=count {
        let factor = lower[i] / diagonal[i - 1];
        diagonal[i] -= factor * upper[i - 1];
        right[i] -= factor * right[i - 1];
    }
    let mut moments = vec![0.0; count + 1];
    for i in (0..=count).rev() {
        let next = if i < count { upper[i] * moments[i + 1] } else { 0.0 };
        moments[i] = (right[i] - next) / diagonal[i];
    }
    moments
}

/// Greatest sagging moment of a uniformly loaded span with hogging end moments (statics), kNm/m:
/// M(x) = w x (l - x)/2 - mL (1 - x/l) - mR x/l. Below zero where the span hogs throughout.
#[must_use]
pub fn greatest_sagging(w_kn_m2: f64, l_m: f64, near: f64, far: f64) -> f64 {
    let at = |x: f64| w_kn_m2 * x * (l_m - x) / 2.0 - near * (1.0 - x / l_m) - far * x / l_m;
    at((l_m / 2.0 + (near - far) / (w_kn_m2 * l_m)).clamp(0.0, l_m))
}

/// Forces of a strip. One load case where 3.5.2.3 allows it (`single_case`): 1.4gk + 1.6qk on all spans, support
/// moments x 0.8, spans by statics. Else (3.2.1.2.2): all spans loaded, and alternate spans 1.4gk + 1.6qk with
/// the others 1.0gk; support envelope x 0.8, each case's supports not above that, spans by statics, nothing under
/// 70 % of the elastic envelope.
#[must_use]
pub fn analyse(spans: &[StripSpan], built_in: [bool; 2], single_case: bool) -> Vec<SpanForces> {
    let full: Vec<f64> = spans.iter().map(|span| span.ultimate_kn_m2).collect();
    let mut cases = vec![full];
    if !single_case {
        cases.extend([0, 1].map(|loaded| {
            let load = |(i, span): (usize, &StripSpan)| {
                if i % 2 == loaded { span.ultimate_kn_m2 } else { span.least_kn_m2 }
            };
            spans.iter().enumerate().map(load).collect::<Vec<f64>>()
        }));
    }
    let elastic: Vec<Vec<f64>> = cases.iter().map(|loads| support_moments(spans, loads, built_in)).collect();
    let reduced: Vec<f64> = (0..=spans.len())
        .map(|i| SUPPORT_SHARE * elastic.iter().map(|case| case[i]).fold(0.0, f64::max))
        .collect();
    (0..spans.len()).map(|i| span_forces(&spans[i], i, &cases, &elastic, &reduced)).collect()
}

fn span_forces(
    span: &StripSpan,
    i: usize,
    cases: &[Vec<f64>],
    elastic: &[Vec<f64>],
    reduced: &[f64],
) -> SpanForces {
    let l = span.l_m;
    let mut forces = SpanForces {
        sagging_knm_m: f64::NEG_INFINITY,
        midspan_hogging_knm_m: 0.0,
        ends_knm_m: [reduced[i], reduced[i + 1]],
        shears_kn_m: [0.0; 2],
        hogging_reach: [0.0; 2],
    };
    for (loads, moments) in cases.iter().zip(elastic) {
        let w = loads[i];
        let (near, far) = (moments[i].min(reduced[i]), moments[i + 1].min(reduced[i + 1]));
        let elastic_sagging = greatest_sagging(w, l, moments[i], moments[i + 1]);
        let sagging = greatest_sagging(w, l, near, far).max(LEAST_SHARE * elastic_sagging);
        let elastic_hogging = (moments[i] + moments[i + 1]) / 2.0 - w * l * l / 8.0;
        let hogging = ((near + far) / 2.0 - w * l * l / 8.0).max(LEAST_SHARE * elastic_hogging);
        forces.sagging_knm_m = forces.sagging_knm_m.max(sagging);
        forces.midspan_hogging_knm_m = forces.midspan_hogging_knm_m.max(hogging);
        let ends = [moments[i], moments[i + 1]];
        for (end, reach) in forces.hogging_reach.iter_mut().enumerate() {
            *reach = reach.max(hogging_reach(w * l * l / 8.0, ends[end], ends[1 - end]));
        }
        let tilt = (near - far) / l;
        forces.shears_kn_m[0] = forces.shears_kn_m[0].max((w * l / 2.0 + tilt).abs());
        forces.shears_kn_m[1] = forces.shears_kn_m[1].max((w * l / 2.0 - tilt).abs());
    }
    forces
}

/// How far hogging reaches from an end with a hogging moment `near`, as a share of the span; 0 where it does not hog,
/// 1 where the whole span does. `free_moment` is w l2/8.
#[must_use]
pub fn hogging_reach(free_moment: f64, near: f64, far: f64) -> f64 {
    if near <= 0.0 { 0.0 } else { contraflexure(free_moment, near, far, 1.0).unwrap_or(1.0) }
}

/// Moments at the two supports beyond a back-span that a cantilever's moment turns up, kNm/m (hogging above zero), by the
/// three-moment equations: at the far support of the back-span, and at the end of the span after it. Each span carries
/// its least load. The end of the second span is simple or built in; with no second span known the far support is built
/// in.
#[must_use]
pub fn beyond_back_span(root: f64, back: StripSpan, next: Option<(StripSpan, bool)>) -> (f64, f64) {
    let load = |span: &StripSpan| span.least_kn_m2 * span.l_m * span.l_m / 4.0;
    let Some((next, end_built_in)) = next else { return ((load(&back) - root) / 2.0, 0.0) };
    let [f_back, f_next] = [back, next].map(|span| span.l_m / span.h_mm.powi(3));
    let right = load(&back) * f_back + load(&next) * f_next - root * f_back;
    if end_built_in {
        // The built-in end: 2 m2 + m1 = w l2/4.
        let m1 = (right - load(&next) * f_next / 2.0) / (2.0 * (f_back + f_next) - f_next / 2.0);
        (m1, (load(&next) - m1) / 2.0)
    } else {
        (right / (2.0 * (f_back + f_next)), 0.0)
    }
}
