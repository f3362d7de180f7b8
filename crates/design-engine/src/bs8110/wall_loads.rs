//! Walls on panels as equivalent uniform loads (3.5.2.2; for two-way panels plate theory).

use crate::floor::{Axis, LineLoad};

/// Characteristic equivalent uniform loads of the walls on a panel, kN/m2.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct WallEquivalents {
    /// For moments of the short span (of a one-way panel: of the span that carries).
    pub short_kn_m2: f64,
    /// For moments of the long span.
    pub long_kn_m2: f64,
    /// For shears and loads on supports.
    pub shear_kn_m2: f64,
}

/// Factors on wall load x span along it/panel area that give the panel's moments under a wall over the whole span at its
/// centre: simply supported plate, Poisson's ratio 0.2, Navier's series. Wall along ly: 2.75 short, 1.9 long; along lx:
/// 2.2 short, 3.0 ly/lx long. `ratio` is ly/lx.
#[must_use]
pub fn two_way_factors(wall_along_long_span: bool, ratio: f64) -> (f64, f64) {
    if wall_along_long_span { (2.75, 1.9) } else { (2.2, 3.0 * ratio) }
}

/// Equivalent loads on a two-way panel: `short_along` the axis of its short span, spans in m. For moments a wall counts as
/// if it ran over the whole span: one half as long bends the middle of the panel far more than half as much.
#[must_use]
pub fn two_way(walls: &[LineLoad], short_along: Axis, lx_m: f64, ly_m: f64) -> WallEquivalents {
    let mut sum = WallEquivalents::default();
    for wall in walls {
        let along_long_span = wall.along != short_along;
        let whole = wall.load_kn_m / if along_long_span { lx_m } else { ly_m };
        let (short, long) = two_way_factors(along_long_span, ly_m / lx_m);
        sum.short_kn_m2 += short * whole;
        sum.long_kn_m2 += long * whole;
        sum.shear_kn_m2 += wall.load_kn_m * wall.length_m() / (lx_m * ly_m);
    }
    sum
}

/// Width that a load `width_m` wide at `x_m` from a support of a span `l_m` is carried by (3.5.2.2): its own
/// width + 2.4 x (1 - x/l), no more than half of that beyond each side up to the panel's edges.
#[must_use]
pub fn effective_width(width_m: f64, x_m: f64, l_m: f64, to_edges_m: [f64; 2]) -> f64 {
    let spread = 1.2 * x_m * (1.0 - x_m / l_m);
    width_m + to_edges_m.map(|edge| spread.min(edge.max(0.0))).iter().sum::<f64>()
}

/// Equivalent load on a one-way panel spanning `l_m` along `span_axis`, `width_m` across. A wall along the span
/// counts over the whole span on the effective width at its middle; a wall across is a point load on its effective
/// width, made uniform so that neither free moment, fixed-end moment nor shear, of a free or built-in span, is less.
#[must_use]
pub fn one_way(walls: &[LineLoad], span_axis: Axis, l_m: f64, width_m: f64) -> WallEquivalents {
    let mut q = 0.0;
    for wall in walls {
        q += if wall.along == span_axis {
            let middle = (wall.from_m + wall.to_m) / 2.0;
            let edges = [wall.offset_m, width_m - wall.offset_m];
            wall.load_kn_m / effective_width(0.0, middle, l_m, edges).max(0.3)
        } else {
            let (a, b) = (wall.offset_m, l_m - wall.offset_m);
            let edges = [wall.from_m, width_m - wall.to_m];
            let point = wall.load_kn_m * wall.length_m()
                / effective_width(wall.length_m(), wall.offset_m, l_m, edges).min(width_m);
            let free = 8.0 * point * a * b / l_m.powi(3);
            let fixed_end = 12.0 * point * a * b * a.max(b) / l_m.powi(4);
            let shear = 2.0 * point * a.max(b) / (l_m * l_m);
            let built_in_shear = shear * a.max(b) * (3.0 * l_m - 2.0 * a.max(b)) / (l_m * l_m);
            free.max(fixed_end).max(shear).max(built_in_shear)
        };
    }
    WallEquivalents { short_kn_m2: q, long_kn_m2: q, shear_kn_m2: q }
}
