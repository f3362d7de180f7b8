//! End anchorage of bottom bars at a discontinuous edge (3.12.9.4, 3.12.8.23).

use std::f64::consts::FRAC_PI_2;

use crate::bars::bar_size;

/// How a bottom bar is anchored at a discontinuous edge.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum EndAnchorage {
    /// 3.12.9.4 (c): a third of the support width, not under 30 mm, past the centre line; v < vc/2.
    ThirdOfSupport,
    /// 3.12.9.4 (a): 12 bar sizes past the centre line, straight.
    Straight,
    /// 3.12.9.4 (b): the bar turns up (shape 11).
    Bent,
    /// 3.12.9.4 (b): too shallow to bend up; the bar laps with the U-bar of the edge.
    LapsEdgeBar,
    /// None of them fits.
    None,
}

/// End anchorage with the lengths compared.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct EndAnchorageWorking {
    /// Which way.
    pub kind: EndAnchorage,
    /// Clause with its letter.
    pub clause: &'static str,
    /// Length needed, mm.
    pub needed_mm: f64,
    /// Length there is, mm.
    pub available_mm: f64,
    /// How far the bar reaches past the support centre line on plan, mm.
    pub past_centre_line_mm: f64,
    /// Length of the leg that turns up, mm; 0 for a straight bar.
    pub leg_mm: f64,
}

/// What the end of a bottom bar has to fit into.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct EndSpace {
    /// Width of the support, mm.
    pub support_width_mm: f64,
    /// Cover to the end of the bar, mm.
    pub end_cover_mm: f64,
    /// Height for a leg: thickness less covers, deduction and bars outside it, mm.
    pub height_mm: f64,
}

/// Anchorage of a bottom bar at a discontinuous edge: (c) where v < vc/2 and it fits, else (a) where it fits,
/// else (b). `v` and `vc` in N/mm2 with the bottom steel, sizes in mm.
#[must_use]
pub fn end_anchorage(bar_mm: f64, d_mm: f64, v: f64, vc: f64, space: EndSpace) -> EndAnchorageWorking {
    let past_centre = space.support_width_mm / 2.0 - space.end_cover_mm;
    let third = (space.support_width_mm / 3.0).max(30.0);
    let straight = |kind, clause, needed: f64| EndAnchorageWorking {
        kind,
        clause,
        needed_mm: needed,
        available_mm: past_centre,
        past_centre_line_mm: needed,
        leg_mm: 0.0,
    };
    if v < vc / 2.0 && past_centre >= third {
        return straight(EndAnchorage::ThirdOfSupport, "3.12.9.4 (c)", third);
    }
    if past_centre >= 12.0 * bar_mm {
        return straight(EndAnchorage::Straight, "3.12.9.4 (a)", 12.0 * bar_mm);
    }
    bent(bar_mm, d_mm, space)
}

/// (b): 12 bar sizes + d/2 from the face with the bend no nearer than d/2. A 90 degree bend counts from its
/// start as the greater of 4r (not over 12 bar sizes) and the bar's own length to 4 bar sizes past the bend;
/// a leg longer than that counts in full (3.12.8.23).
fn bent(bar_mm: f64, d_mm: f64, space: EndSpace) -> EndAnchorageWorking {
    let made = bar_size(bar_mm);
    let start_of_bend = space.support_width_mm - space.end_cover_mm - made.radius_mm - bar_mm;
    let own_leg = space.height_mm >= made.projection_mm;
    let leg_past_bend = space.height_mm - made.radius_mm - bar_mm;
    let past_bend = if own_leg { leg_past_bend.max(4.0 * bar_mm) } else { 4.0 * bar_mm };
    let along_bend = FRAC_PI_2 * (made.radius_mm + bar_mm / 2.0) + past_bend;
    let bend = along_bend.max((4.0 * made.radius_mm).min(12.0 * bar_mm));
    let (needed, available) = (12.0 * bar_mm + d_mm / 2.0, start_of_bend + bend);
    // Both conditions are lengths from the face: show the one that is nearer to failing.
    let by_bend = d_mm / 2.0 / start_of_bend.max(1.0);
    let (needed_mm, available_mm) = if start_of_bend <= 0.0 || by_bend > needed / available {
        (d_mm / 2.0, start_of_bend.max(1.0))
    } else {
        (needed, available)
    };
    let fits = needed_mm <= available_mm;
    let kind = match (fits, own_leg) {
        (true, true) => EndAnchorage::Bent,
        (true, false) => EndAnchorage::LapsEdgeBar,
        (false, _) => EndAnchorage::None,
    };
    EndAnchorageWorking {
        kind,
        clause: "3.12.9.4 (b)",
        needed_mm,
        available_mm,
        past_centre_line_mm: (space.support_width_mm / 2.0 - space.end_cover_mm).max(0.0),
        leg_mm: if own_leg { space.height_mm } else { 0.0 },
    }
}
