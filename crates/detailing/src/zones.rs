//! How many bars a zone takes, and where they lie.

/// The first and last bar of a zone lie this far from the faces of its supports, mm (common practice, no source).
pub const FROM_FACE_MM: f64 = 50.0;

/// Places across a zone `[from, to]`, mm: N = ceil((L - 100)/s) + 1 bars, the first and the last 50 mm from its ends, at the
/// spacing but for the last gap. A zone under 100 mm takes one bar in its middle, none where it has no width.
#[must_use]
pub fn between_faces(zone: [f64; 2], spacing_mm: f64) -> Vec<f64> {
    let inner = [zone[0] + FROM_FACE_MM, zone[1] - FROM_FACE_MM];
    if zone[1] - zone[0] <= 0.0 {
        Vec::new()
    } else if inner[1] <= inner[0] {
        vec![f64::midpoint(zone[0], zone[1])]
    } else {
        from_to(inner, spacing_mm)
    }
}

/// Places from one end of a stretch to the other, both included, not further apart than the spacing.
#[must_use]
pub fn from_to(stretch: [f64; 2], spacing_mm: f64) -> Vec<f64> {
    let mut places = Vec::new();
    let mut at = stretch[0];
    // A gap under a millimetre is none.
    while at < stretch[1] - 1.0 {
        places.push(at);
        at = stretch[0] + spacing_mm * count(places.len());
    }
    places.push(stretch[1]);
    places
}

#[expect(clippy::cast_precision_loss, reason = "bars of a zone are far below 2^53")]
fn count(bars: usize) -> f64 {
    bars as f64
}
