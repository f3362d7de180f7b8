//! A bar on plan while it is being made: where it must reach, how far it may, how it ends.

use crate::bending::{Shape, down_to_5, down_to_25, least_between_bends, up_to_5, up_to_25};

/// How a bar ends.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) enum End {
    /// Straight.
    Straight,
    /// Bent at a right angle: a leg, mm.
    Leg(f64),
    /// Bent twice and back along itself: height and returning leg, mm.
    Hook {
        /// Between the faces.
        height_mm: f64,
        /// Back along the other face.
        back_mm: f64,
    },
}

/// One end of a bar along its own axis, mm on plan.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Reach {
    /// It reaches at least to here.
    pub(crate) needed: f64,
    /// It must not pass this.
    pub(crate) limit: f64,
    /// How it ends.
    pub(crate) end: End,
}

impl Reach {
    /// A straight end.
    pub(crate) fn straight(needed: f64, limit: f64) -> Reach {
        Reach { needed, limit, end: End::Straight }
    }

    /// A straight end at exactly this place.
    pub(crate) fn at(place: f64) -> Reach {
        Reach::straight(place, place)
    }
}

/// A bar of a set: its place across, and its two ends, lesser coordinate first.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Placed {
    pub(crate) across: f64,
    pub(crate) ends: [Reach; 2],
}

/// Extents on plan and shape of a bar made to its ends; none where nothing is left of it.
pub(crate) fn make(ends: [Reach; 2], size_mm: f64) -> Option<([f64; 2], Shape)> {
    let [low, high] = ends;
    // A limit inside what is needed binds.
    let needed = [low.needed.max(low.limit), high.needed.min(high.limit)];
    let room = high.limit - low.limit;
    if room < 5.0 || needed[1] <= needed[0] {
        return None;
    }
    match (low.end, high.end) {
        (End::Straight, End::Straight) => straight(ends, needed, room),
        (End::Leg(b), End::Straight) => {
            let a = dimension(needed, room);
            let start = low.limit;
            Some(([start, start + a], Shape::Bent { a, b: down_to_5(b) }))
        }
        (End::Straight, End::Leg(b)) => {
            let a = dimension(needed, room);
            Some(([high.limit - a, high.limit], Shape::Bent { a, b: down_to_5(b) }))
        }
        (End::Leg(b), End::Leg(c)) => {
            let a = down_to_5(room);
            let start = low.limit + (room - a) / 2.0;
            Some(([start, start + a], Shape::Double { a: down_to_5(b), b: a, c: down_to_5(c) }))
        }
        (End::Hook { height_mm, back_mm }, _) => {
            let a = dimension(needed, room);
            Some(([low.limit, low.limit + a], hooked(a, height_mm, back_mm, size_mm)))
        }
        (_, End::Hook { height_mm, back_mm }) => {
            let a = dimension(needed, room);
            Some(([high.limit - a, high.limit], hooked(a, height_mm, back_mm, size_mm)))
        }
    }
}

/// Two bends with a straight between them, or one half round where there is no room for that.
fn hooked(a: f64, height_mm: f64, back_mm: f64, size_mm: f64) -> Shape {
    let (b, c) = (down_to_5(height_mm), up_to_5(back_mm));
    if b >= least_between_bends(size_mm) - 1e-6 {
        Shape::Double { a, b, c }
    } else {
        Shape::Hairpin { a, b, c: c.max(up_to_5(b / 2.0 + 5.0 * size_mm)) }
    }
}

/// A dimension that reaches what is needed, up to 5 mm, or down where there is no room.
fn dimension(needed: [f64; 2], room: f64) -> f64 {
    let up = up_to_5(needed[1] - needed[0]);
    if up <= room + 1e-6 { up } else { down_to_5(room) }
}

/// A straight bar in whole 25 mm, or in whole 5 mm where only those fit; what it is longer than needed is shared between
/// its ends as far as their limits let it.
fn straight(ends: [Reach; 2], needed: [f64; 2], room: f64) -> Option<([f64; 2], Shape)> {
    let least = needed[1] - needed[0];
    let [up, down, fine] = [up_to_25(least), down_to_25(room), down_to_5(room)];
    let a = if up <= room + 1e-6 {
        up
    } else if down >= least - 1e-6 {
        down
    } else {
        fine
    };
    if a < 5.0 {
        return None;
    }
    let spare = a - least;
    let low_room = (needed[0] - ends[0].limit).max(0.0);
    let high_room = (ends[1].limit - needed[1]).max(0.0);
    let low = (spare / 2.0).clamp((spare - high_room).max(0.0).min(low_room), low_room);
    let start = needed[0] - low;
    Some(([start, start + a], Shape::Straight { a }))
}
