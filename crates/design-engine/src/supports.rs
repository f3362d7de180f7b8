//! Balancing at shared supports (3.5.3.6): release of the difference of two fixed-end moments.

/// Share of stiffness of a span whose far end is discontinuous.
pub const FAR_END_DISCONTINUOUS: f64 = 0.75;

/// Relative stiffness of a panel's span across a support, mm3/m: h3/l, times 0.75 where the far end is
/// discontinuous. h in mm, l in m.
#[must_use]
pub fn stiffness(h_mm: f64, l_m: f64, far_end_discontinuous: bool) -> f64 {
    h_mm.powi(3) / l_m * if far_end_discontinuous { FAR_END_DISCONTINUOUS } else { 1.0 }
}

/// Support moment of two panels after release: m = mA - (mA - mB) kA/(kA + kB). Symmetric in the panels.
#[must_use]
pub fn release(m_a: f64, k_a: f64, m_b: f64, k_b: f64) -> f64 {
    (m_a * k_b + m_b * k_a) / (k_a + k_b)
}

/// Difference of two moments as a share of the larger; 0 where both are 0.
#[must_use]
pub fn difference(m_a: f64, m_b: f64) -> f64 {
    let larger = m_a.max(m_b);
    if larger > 0.0 { (m_a - m_b).abs() / larger } else { 0.0 }
}

/// A support's moment: balanced where the two differ by more than the threshold (a share of the larger), else
/// the larger. The flag tells which.
#[must_use]
pub fn shared_moment(m_a: f64, k_a: f64, m_b: f64, k_b: f64, threshold: f64) -> (f64, bool) {
    if difference(m_a, m_b) > threshold + 1e-9 {
        (release(m_a, k_a, m_b, k_b), true)
    } else {
        (m_a.max(m_b), false)
    }
}
