//! Units that are converted exactly, and the refusal of all others.

/// A unit: its spellings, what it measures, and its size as a fraction of the measure's base unit.
struct Unit {
    spellings: &'static [&'static str],
    measure: Measure,
    per: (f64, f64),
}

#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Measure {
    Length,
    Pressure,
    LineLoad,
    UnitWeight,
    Time,
}

/// Spellings are folded as [`folded`] does it. Base units: mm, N/m2, N/m, N/m3, min.
static UNITS: [Unit; 14] = [
    Unit { spellings: &["mm"], measure: Measure::Length, per: (1.0, 1.0) },
    Unit { spellings: &["cm"], measure: Measure::Length, per: (10.0, 1.0) },
    Unit { spellings: &["m"], measure: Measure::Length, per: (1000.0, 1.0) },
    Unit { spellings: &["n/m2", "pa"], measure: Measure::Pressure, per: (1.0, 1.0) },
    Unit { spellings: &["kn/m2", "kpa"], measure: Measure::Pressure, per: (1e3, 1.0) },
    Unit { spellings: &["n/mm2", "mpa", "mn/m2"], measure: Measure::Pressure, per: (1e6, 1.0) },
    Unit { spellings: &["n/m"], measure: Measure::LineLoad, per: (1.0, 1.0) },
    Unit { spellings: &["kn/m", "n/mm"], measure: Measure::LineLoad, per: (1e3, 1.0) },
    Unit { spellings: &["n/m3"], measure: Measure::UnitWeight, per: (1.0, 1.0) },
    Unit { spellings: &["kn/m3"], measure: Measure::UnitWeight, per: (1e3, 1.0) },
    Unit { spellings: &["mn/m3"], measure: Measure::UnitWeight, per: (1e6, 1.0) },
    Unit { spellings: &["h", "hr", "hour", "hours"], measure: Measure::Time, per: (60.0, 1.0) },
    Unit { spellings: &["min", "minutes"], measure: Measure::Time, per: (1.0, 1.0) },
    Unit { spellings: &["s"], measure: Measure::Time, per: (1.0, 60.0) },
];

/// How a number in the unit that was read becomes one in the stated unit.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Scale {
    times: f64,
    over: f64,
}

impl Scale {
    pub(crate) const SAME: Scale = Scale { times: 1.0, over: 1.0 };

    /// The number in the stated unit.
    pub(crate) fn apply(self, number: f64) -> f64 {
        number * self.times / self.over
    }

    /// Whether it changes a number.
    pub(crate) fn changes(self) -> bool {
        self != Scale::SAME
    }
}

/// A unit without case, spaces, and the several ways to write a power.
fn folded(unit: &str) -> String {
    let mut out = String::new();
    for c in unit.chars() {
        match c {
            '²' => out.push('2'),
            '³' => out.push('3'),
            '₂' => out.push('2'),
            '^' => {}
            c if c.is_whitespace() => {}
            c => out.extend(c.to_lowercase()),
        }
    }
    out
}

fn unit(folded: &str) -> Option<&'static Unit> {
    UNITS.iter().find(|unit| unit.spellings.contains(&folded))
}

/// The conversion from a unit that was read to the stated one; none where there is no exact one. Where the
/// stated unit is empty a dash may stand for it.
pub(crate) fn scale(read: &str, stated: &str) -> Option<Scale> {
    let (read, stated) = (folded(read), folded(stated));
    if read == stated || (stated.is_empty() && matches!(read.as_str(), "-" | "–" | "—")) {
        return Some(Scale::SAME);
    }
    let (from, to) = (unit(&read)?, unit(&stated)?);
    if from.measure != to.measure {
        return None;
    }
    let (times, over) = (from.per.0 * to.per.1, from.per.1 * to.per.0);
    // Dividing by a whole number is exact to the last digit where multiplying by its reciprocal is not.
    Some(if times >= over {
        Scale { times: times / over, over: 1.0 }
    } else {
        Scale { times: 1.0, over: over / times }
    })
}

/// The stated unit and every unit that is converted into it, in words.
pub(crate) fn allowed(stated: &str) -> String {
    let mut names = vec![stated];
    if let Some(to) = unit(&folded(stated)) {
        let printed = [
            "mm", "cm", "m", "N/m2", "kN/m2", "N/mm2", "N/m", "kN/m", "N/m3", "kN/m3", "MN/m3", "h", "min",
            "s",
        ];
        let others =
            UNITS.iter().zip(printed).filter(|(unit, name)| unit.measure == to.measure && *name != stated);
        names.extend(others.map(|(_, name)| name));
    }
    if stated.is_empty() { "no unit".to_owned() } else { names.join(", ") }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_unit_is_converted_exactly() {
        for (read, stated, number, expected) in [
            ("mm", "m", 6250.0, 6.25),
            ("m", "mm", 0.15, 150.0),
            ("cm", "mm", 15.0, 150.0),
            ("N/m²", "kN/m2", 2500.0, 2.5),
            ("kPa", "kN/m2", 2.5, 2.5),
            ("MPa", "N/mm2", 30.0, 30.0),
            ("N/m", "kN/m", 4100.0, 4.1),
            ("min", "h", 90.0, 1.5),
            ("KN / M^2", "kN/m2", 1.1, 1.1),
        ] {
            let scale = scale(read, stated).unwrap();
            assert!(
                (scale.apply(number) - expected).abs() == 0.0,
                "{read} to {stated}: {}",
                scale.apply(number)
            );
        }
    }

    #[test]
    fn another_measure_is_refused() {
        for (read, stated) in
            [("ft", "m"), ("m", "kN/m2"), ("kg/m3", "kN/m3"), ("psf", "kN/m2"), ("%", "h"), ("mm", "")]
        {
            assert_eq!(scale(read, stated), None, "{read} to {stated}");
        }
        assert_eq!(allowed("m"), "m, mm, cm");
    }
}
