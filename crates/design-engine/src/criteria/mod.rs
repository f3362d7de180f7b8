//! Every setting of a floor, valid by construction: one table of items drives the reader's checks and
//! messages, the starter book, the cover sheet, the results file and the test generators.

use std::ops::Deref;

mod table;

use crate::floor::{Axis, Corners};
pub use crate::ranges::Range;
pub use table::SETTINGS;

/// A setting's value as it is read and printed.
#[derive(Debug, Clone, PartialEq)]
pub enum Value {
    /// Nothing.
    Blank,
    /// A number in the item's unit.
    Number(f64),
    /// A list of numbers in the item's unit.
    Numbers(Vec<f64>),
    /// A word, a name or a date.
    Text(String),
}

/// What a setting may be.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Allowed {
    /// Any text.
    Text,
    /// A calendar date, `YYYY-MM-DD`.
    Date,
    /// A number in a range.
    Number(Range),
    /// One of some numbers.
    OneOf(&'static [f64]),
    /// One of some words.
    Words(&'static [&'static str]),
    /// A list of numbers, each in a range.
    List(Range),
    /// A list of numbers, each one of some.
    ListOf(&'static [f64]),
}

impl Allowed {
    /// The allowed values in words, for messages and drop-down notes.
    #[must_use]
    pub fn describe(&self) -> String {
        let join = |values: &[f64]| values.iter().map(f64::to_string).collect::<Vec<_>>().join(", ");
        match self {
            Allowed::Text => "any text".to_owned(),
            Allowed::Date => "a date written as 2026-03-31".to_owned(),
            Allowed::Number(range) => range.describe(),
            Allowed::OneOf(values) => format!("one of {}", join(values)),
            Allowed::Words(words) => words.join(" | "),
            Allowed::List(range) => format!("a list of numbers, each {}", range.describe()),
            Allowed::ListOf(values) => format!("a list from {}", join(values)),
        }
    }

    /// Whether a value is allowed; [`Value::Blank`] always is.
    #[must_use]
    pub fn accepts(&self, value: &Value) -> bool {
        let among = |n: f64, values: &[f64]| values.iter().any(|v| (v - n).abs() < 1e-9);
        match (self, value) {
            (_, Value::Blank) | (Allowed::Text, Value::Text(_)) => true,
            (Allowed::Date, Value::Text(text)) => is_iso_date(text),
            (Allowed::Number(range), Value::Number(n)) => range.contains(*n),
            (Allowed::OneOf(values), Value::Number(n)) => among(*n, values),
            (Allowed::Words(words), Value::Text(text)) => words.contains(&text.as_str()),
            (Allowed::List(range), Value::Numbers(list)) => {
                !list.is_empty() && list.iter().all(|n| range.contains(*n))
            }
            (Allowed::ListOf(values), Value::Numbers(list)) => {
                !list.is_empty() && list.iter().all(|n| among(*n, values))
            }
            _ => false,
        }
    }
}

/// True for a calendar date written `YYYY-MM-DD`, years 1900 to 9999.
#[must_use]
pub fn is_iso_date(text: &str) -> bool {
    let parts: Vec<&str> = text.split('-').collect();
    let [year, month, day] = parts[..] else { return false };
    let number = |part: &str, width: usize| {
        (part.len() == width && part.bytes().all(|b| b.is_ascii_digit())).then(|| part.parse::<u32>().ok())?
    };
    let (Some(year), Some(month), Some(day)) = (number(year, 4), number(month, 2), number(day, 2)) else {
        return false;
    };
    let leap = (year % 4 == 0 && year % 100 != 0) || year % 400 == 0;
    let days = match month {
        2 => 28 + u32::from(leap),
        4 | 6 | 9 | 11 => 30,
        1..=12 => 31,
        _ => return false,
    };
    (1900..=9999).contains(&year) && (1..=days).contains(&day)
}

/// How Table 3.14 (and 3.13) coefficients are taken between printed span ratios.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Coefficients {
    /// Linear interpolation in the printed tables.
    Tabulated,
    /// The generating equations (12) to (18).
    Equations,
}

/// Exposure classes of Table 3.3 that suspended floors in buildings meet.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Exposure {
    /// Mild.
    Mild,
    /// Moderate.
    Moderate,
    /// Severe.
    Severe,
}

/// How spans are measured (3.4.1).
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum SpanBasis {
    /// Centre to centre of supports.
    CentreToCentre,
    /// Clear span plus effective depth where a span is discontinuous at both ends, if that is less.
    ClearPlusDepth,
}

/// Which bars lie nearest the face.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Layering {
    /// Bars of the short span (of a one-way panel: of the span that carries).
    ShortSpanOuter,
    /// Bars along one plan axis over the whole floor.
    Outer(Axis),
}

/// Steel of the edge strips (3.5.3.5).
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum EdgeStrips {
    /// Middle-strip bars over the full width.
    AsMiddleStrip,
    /// Minimum steel in the outer eighths.
    MinimumSteel,
}

/// Curtailment of bottom bars.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum BottomBars {
    /// Every bar the full length.
    FullLength,
    /// Alternate bars stopped short where allowed.
    AlternateCurtailed,
}

/// Arrangement of top bars over a support.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum TopBars {
    /// One bar, long to one side and short to the other, alternate bars reversed.
    AlternateReversed,
    /// Every bar the full extent both sides.
    AllFullLength,
}

/// The settings' values. Read them through [`Criteria`], which alone can make one.
#[derive(Debug, Clone, PartialEq)]
#[expect(missing_docs, reason = "each field is an item of SETTINGS, which carries its meaning and unit")]
pub struct Settings {
    pub project: String,
    pub job_number: String,
    pub floor: String,
    pub drawing_number: String,
    pub revision: String,
    pub prepared_by: String,
    pub checked_by: String,
    pub date: String,
    pub coefficients: Coefficients,
    pub fcu_n_mm2: f64,
    pub fy_n_mm2: f64,
    pub(crate) stated_steel_partial_factor: Option<f64>,
    pub(crate) stated_bar_type_letter: Option<String>,
    pub concrete_density_kn_m3: f64,
    pub maximum_aggregate_mm: f64,
    pub bottom_cover_mm: f64,
    pub top_cover_mm: f64,
    pub exposure: Exposure,
    pub fire_resistance_h: f64,
    pub thickness_mm: f64,
    pub finishes_kn_m2: f64,
    pub partitions_kn_m2: f64,
    pub imposed_kn_m2: f64,
    pub dead_load_factor: f64,
    pub imposed_load_factor: f64,
    pub support_width_mm: f64,
    pub span_basis: SpanBasis,
    pub corners: Corners,
    pub bar_sizes_mm: Vec<f64>,
    pub spacing_step_mm: f64,
    pub least_spacing_mm: f64,
    pub greatest_spacing_mm: f64,
    pub layering: Layering,
    pub plan_tolerance_mm: f64,
    pub balance_threshold_pct: f64,
    pub edge_strips: EdgeStrips,
    pub bottom_bars: BottomBars,
    pub top_bars: TopBars,
    pub bar_kinds_limit: Option<f64>,
    pub stock_length_m: f64,
    pub bending_deduction_mm: f64,
    pub thickness_options_mm: Vec<f64>,
    pub concrete_rate_per_m3: Option<f64>,
    pub steel_rate_per_t: Option<f64>,
    pub formwork_rate_per_m2: Option<f64>,
    pub currency: String,
    pub rate_source: String,
    pub concrete_carbon_kgco2e_m3: Option<f64>,
    pub steel_carbon_kgco2e_kg: Option<f64>,
    pub carbon_source: String,
}

impl Settings {
    /// Partial factor on steel: as stated, else 1.05 for fy 250 and 460 (1997 to Amendment 2), 1.15 for
    /// fy 500 (Amendment 3).
    #[must_use]
    pub fn steel_partial_factor(&self) -> f64 {
        self.stated_steel_partial_factor.unwrap_or(if self.fy_n_mm2 > 480.0 { 1.15 } else { 1.05 })
    }

    /// Letter of the bar type in callouts: as stated, else R (250), T (460), H (500).
    #[must_use]
    pub fn bar_type_letter(&self) -> &str {
        self.stated_bar_type_letter.as_deref().unwrap_or(if self.fy_n_mm2 < 300.0 {
            "R"
        } else if self.fy_n_mm2 < 480.0 {
            "T"
        } else {
            "H"
        })
    }

    /// Every spacing the design may use, least first, mm.
    #[must_use]
    pub fn spacings_mm(&self) -> Vec<f64> {
        let mut spacings = Vec::new();
        let mut spacing = self.least_spacing_mm;
        while spacing <= self.greatest_spacing_mm + 1e-9 {
            spacings.push(spacing);
            spacing += self.spacing_step_mm;
        }
        spacings
    }

    /// Plan tolerance in tenths of a millimetre.
    #[must_use]
    #[expect(clippy::cast_possible_truncation, reason = "0 to 100 mm by its range")]
    pub fn plan_tolerance_tenths(&self) -> i64 {
        (self.plan_tolerance_mm * 10.0).round() as i64
    }
}

/// The criteria of a floor: [`Settings`] whose every value is in its allowed range.
///
/// ```
/// use design_engine::criteria::{Criteria, Value};
/// let criteria = Criteria::new(&[("fcu_n_mm2", Value::Number(35.0))]).unwrap();
/// assert_eq!(criteria.fcu_n_mm2, 35.0);
/// assert!(Criteria::new(&[("fcu_n_mm2", Value::Number(500.0))]).is_err());
/// ```
#[derive(Debug, Clone, PartialEq)]
pub struct Criteria(Settings);

impl Deref for Criteria {
    type Target = Settings;
    fn deref(&self) -> &Settings {
        &self.0
    }
}

impl Default for Criteria {
    fn default() -> Self {
        Criteria(Settings::defaults())
    }
}

/// A value that a setting may not have.
#[derive(Debug, Clone, PartialEq)]
pub struct NotAllowed {
    /// The item at fault.
    pub setting: &'static Setting,
    /// What is allowed, in words.
    pub allowed: String,
}

impl std::fmt::Display for NotAllowed {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "{}: allowed {}", self.setting.item, self.allowed)
    }
}

impl std::error::Error for NotAllowed {}

impl Criteria {
    /// Criteria from values by key; what is not named, or [`Value::Blank`], takes its default.
    ///
    /// # Errors
    /// Every value that is out of its range, and every pair of values that contradict each other.
    ///
    /// # Panics
    /// Never for a key of [`SETTINGS`]; an unknown key is a fault of the caller.
    pub fn new(values: &[(&str, Value)]) -> Result<Criteria, Vec<NotAllowed>> {
        let mut settings = Settings::defaults();
        let mut faults = Vec::new();
        for (key, value) in values {
            let setting = setting(key).unwrap_or_else(|| panic!("no setting has the key {key}"));
            if !setting.allowed.accepts(value) {
                faults.push(NotAllowed { setting, allowed: setting.allowed.describe() });
            } else if *value != Value::Blank {
                (setting.set)(&mut settings, value);
            }
        }
        if settings.least_spacing_mm > settings.greatest_spacing_mm {
            let allowed = format!("not above the greatest spacing, {} mm", settings.greatest_spacing_mm);
            faults.extend(setting("least_spacing_mm").map(|setting| NotAllowed { setting, allowed }));
        }
        if faults.is_empty() { Ok(Criteria(settings)) } else { Err(faults) }
    }

    /// The value of a setting as it is printed: by-fy settings resolved, blank where there is none.
    #[must_use]
    pub fn value(&self, setting: &Setting) -> Value {
        (setting.get)(&self.0)
    }
}

/// One item of the `Criteria` sheet.
pub struct Setting {
    /// Name on the sheet, without its unit.
    pub item: &'static str,
    /// Key in the results file.
    pub key: &'static str,
    /// Unit as the sheet prints it; empty where there is none.
    pub unit: &'static str,
    /// What it may be.
    pub allowed: Allowed,
    /// What it is for, in words.
    pub meaning: &'static str,
    get: fn(&Settings) -> Value,
    set: fn(&mut Settings, &Value),
}

impl std::fmt::Debug for Setting {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "Setting({})", self.key)
    }
}

impl PartialEq for Setting {
    fn eq(&self, other: &Self) -> bool {
        self.key == other.key
    }
}

impl Setting {
    /// Its default, as it is printed.
    #[must_use]
    pub fn default_value(&self) -> Value {
        (self.get)(&Settings::defaults())
    }
}

/// The setting with a key.
#[must_use]
pub fn setting(key: &str) -> Option<&'static Setting> {
    SETTINGS.iter().find(|setting| setting.key == key)
}
