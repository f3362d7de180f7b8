//! The table of settings: name, key, unit, allowed values, default and meaning of each item.

use super::{
    Allowed, BottomBars, Coefficients, EdgeStrips, Exposure, Layering, Setting, Settings, SpanBasis, TopBars,
    Value,
};
use crate::floor::{Axis, Corners};
use crate::ranges::*;

const CODE: &str = "BS 8110-1:1997";

/// Words of a setting beside what each stands for.
struct Choice<T: 'static, const N: usize>([&'static str; N], [T; N]);

static COEFFICIENTS: Choice<Coefficients, 2> =
    Choice(["tabulated", "equations"], [Coefficients::Tabulated, Coefficients::Equations]);
static EXPOSURE: Choice<Exposure, 3> =
    Choice(["mild", "moderate", "severe"], [Exposure::Mild, Exposure::Moderate, Exposure::Severe]);
static SPAN_BASIS: Choice<SpanBasis, 2> = Choice(
    ["centre to centre", "clear plus effective depth"],
    [SpanBasis::CentreToCentre, SpanBasis::ClearPlusDepth],
);
static CORNERS: Choice<Corners, 2> =
    Choice(["held down", "free to lift"], [Corners::HeldDown, Corners::FreeToLift]);
static LAYERING: Choice<Layering, 3> = Choice(
    ["short span outer", "x outer", "y outer"],
    [Layering::ShortSpanOuter, Layering::Outer(Axis::X), Layering::Outer(Axis::Y)],
);
static EDGE_STRIPS: Choice<EdgeStrips, 2> =
    Choice(["as middle strip", "minimum steel"], [EdgeStrips::AsMiddleStrip, EdgeStrips::MinimumSteel]);
static BOTTOM_BARS: Choice<BottomBars, 2> =
    Choice(["full length", "alternate curtailed"], [BottomBars::FullLength, BottomBars::AlternateCurtailed]);
static TOP_BARS: Choice<TopBars, 2> =
    Choice(["alternate reversed", "all full length"], [TopBars::AlternateReversed, TopBars::AllFullLength]);

fn number(value: &Value) -> f64 {
    if let Value::Number(n) = value { *n } else { unreachable!("accepted by Allowed first") }
}

fn word(value: &Value) -> String {
    if let Value::Text(text) = value { text.clone() } else { unreachable!("accepted by Allowed first") }
}

fn sorted(value: &Value) -> Vec<f64> {
    let Value::Numbers(list) = value else { unreachable!("accepted by Allowed first") };
    let mut list = list.clone();
    list.sort_by(f64::total_cmp);
    list.dedup();
    list
}

fn text(text: &str) -> Value {
    if text.is_empty() { Value::Blank } else { Value::Text(text.to_owned()) }
}

fn list(list: &[f64]) -> Value {
    if list.is_empty() { Value::Blank } else { Value::Numbers(list.to_vec()) }
}

fn pick<T: PartialEq, const N: usize>(value: &T, choice: &Choice<T, N>) -> Value {
    let index = choice.1.iter().position(|v| v == value).unwrap_or(0);
    Value::Text(choice.0[index].to_owned())
}

fn chosen<T: Copy, const N: usize>(value: &Value, choice: &Choice<T, N>) -> T {
    let word = word(value);
    choice.1[choice.0.iter().position(|w| **w == *word).unwrap_or(0)]
}

impl Settings {
    pub(super) fn defaults() -> Settings {
        Settings {
            project: String::new(),
            job_number: String::new(),
            floor: String::new(),
            drawing_number: String::new(),
            revision: String::new(),
            prepared_by: String::new(),
            checked_by: String::new(),
            date: String::new(),
            coefficients: Coefficients::Tabulated,
            fcu_n_mm2: 30.0,
            fy_n_mm2: 500.0,
            stated_steel_partial_factor: None,
            stated_bar_type_letter: None,
            concrete_density_kn_m3: 24.0,
            maximum_aggregate_mm: 20.0,
            bottom_cover_mm: 25.0,
            top_cover_mm: 25.0,
            exposure: Exposure::Mild,
            fire_resistance_h: 1.0,
            thickness_mm: 150.0,
            finishes_kn_m2: 1.5,
            partitions_kn_m2: 1.0,
            imposed_kn_m2: 2.5,
            dead_load_factor: 1.4,
            imposed_load_factor: 1.6,
            support_width_mm: 250.0,
            span_basis: SpanBasis::CentreToCentre,
            corners: Corners::HeldDown,
            bar_sizes_mm: vec![10.0, 12.0, 16.0],
            spacing_step_mm: 25.0,
            least_spacing_mm: 100.0,
            greatest_spacing_mm: 300.0,
            layering: Layering::ShortSpanOuter,
            plan_tolerance_mm: 1.0,
            balance_threshold_pct: 10.0,
            edge_strips: EdgeStrips::AsMiddleStrip,
            bottom_bars: BottomBars::FullLength,
            top_bars: TopBars::AlternateReversed,
            bar_kinds_limit: None,
            stock_length_m: 12.0,
            bending_deduction_mm: 20.0,
            thickness_options_mm: Vec::new(),
            concrete_rate_per_m3: None,
            steel_rate_per_t: None,
            formwork_rate_per_m2: None,
            currency: String::new(),
            rate_source: String::new(),
            concrete_carbon_kgco2e_m3: None,
            steel_carbon_kgco2e_kg: None,
            carbon_source: String::new(),
        }
    }
}

/// Every item of the `Criteria` sheet, in its order.
pub static SETTINGS: &[Setting] = &[
    Setting {
        item: "Project",
        key: "project",
        unit: "",
        allowed: Allowed::Text,
        meaning: "title block",
        get: |s| text(&s.project),
        set: |s, v| s.project = word(v),
    },
    Setting {
        item: "Job number",
        key: "job_number",
        unit: "",
        allowed: Allowed::Text,
        meaning: "title block",
        get: |s| text(&s.job_number),
        set: |s, v| s.job_number = word(v),
    },
    Setting {
        item: "Floor",
        key: "floor",
        unit: "",
        allowed: Allowed::Text,
        meaning: "title block",
        get: |s| text(&s.floor),
        set: |s, v| s.floor = word(v),
    },
    Setting {
        item: "Drawing number",
        key: "drawing_number",
        unit: "",
        allowed: Allowed::Text,
        meaning: "title block",
        get: |s| text(&s.drawing_number),
        set: |s, v| s.drawing_number = word(v),
    },
    Setting {
        item: "Revision",
        key: "revision",
        unit: "",
        allowed: Allowed::Text,
        meaning: "title block",
        get: |s| text(&s.revision),
        set: |s, v| s.revision = word(v),
    },
    Setting {
        item: "Prepared by",
        key: "prepared_by",
        unit: "",
        allowed: Allowed::Text,
        meaning: "title block",
        get: |s| text(&s.prepared_by),
        set: |s, v| s.prepared_by = word(v),
    },
    Setting {
        item: "Checked by",
        key: "checked_by",
        unit: "",
        allowed: Allowed::Text,
        meaning: "title block",
        get: |s| text(&s.checked_by),
        set: |s, v| s.checked_by = word(v),
    },
    Setting {
        item: "Date",
        key: "date",
        unit: "",
        allowed: Allowed::Date,
        meaning: "title block; also the workbook's creation date",
        get: |s| text(&s.date),
        set: |s, v| s.date = word(v),
    },
    Setting {
        item: "Code of practice",
        key: "code_of_practice",
        unit: "",
        allowed: Allowed::Words(&[CODE]),
        meaning: "the code used for every check",
        get: |_| Value::Text(CODE.to_owned()),
        set: |_, _| {},
    },
    Setting {
        item: "Coefficients",
        key: "coefficients",
        unit: "",
        allowed: Allowed::Words(&COEFFICIENTS.0),
        meaning: "moments between printed span ratios: linear interpolation in the printed tables, or the generating equations",
        get: |s| pick(&s.coefficients, &COEFFICIENTS),
        set: |s, v| s.coefficients = chosen(v, &COEFFICIENTS),
    },
    Setting {
        item: "Cube strength fcu",
        key: "fcu_n_mm2",
        unit: "N/mm2",
        allowed: Allowed::Number(Range::new(20.0, 60.0)),
        meaning: "characteristic cube strength of the concrete",
        get: |s| Value::Number(s.fcu_n_mm2),
        set: |s, v| s.fcu_n_mm2 = number(v),
    },
    Setting {
        item: "Yield strength fy",
        key: "fy_n_mm2",
        unit: "N/mm2",
        allowed: Allowed::OneOf(FY_N_MM2),
        meaning: "characteristic yield strength of the bars",
        get: |s| Value::Number(s.fy_n_mm2),
        set: |s, v| s.fy_n_mm2 = number(v),
    },
    Setting {
        item: "Steel partial factor",
        key: "steel_partial_factor",
        unit: "",
        allowed: Allowed::Number(Range::new(1.0, 1.5)),
        meaning: "by fy: 1.05 for 250 and 460, 1.15 for 500",
        get: |s| Value::Number(s.steel_partial_factor()),
        set: |s, v| s.stated_steel_partial_factor = Some(number(v)),
    },
    Setting {
        item: "Bar type letter",
        key: "bar_type_letter",
        unit: "",
        allowed: Allowed::Words(&["R", "T", "H", "B"]),
        meaning: "by fy: R 250, T 460, H 500; used in every callout",
        get: |s| text(s.bar_type_letter()),
        set: |s, v| s.stated_bar_type_letter = Some(word(v)),
    },
    Setting {
        item: "Concrete density",
        key: "concrete_density_kn_m3",
        unit: "kN/m3",
        allowed: Allowed::Number(Range::new(15.0, 30.0)),
        meaning: "self-weight is always computed from the thickness",
        get: |s| Value::Number(s.concrete_density_kn_m3),
        set: |s, v| s.concrete_density_kn_m3 = number(v),
    },
    Setting {
        item: "Maximum aggregate",
        key: "maximum_aggregate_mm",
        unit: "mm",
        allowed: Allowed::Number(Range::new(5.0, 40.0)),
        meaning: "nominal maximum size; sets least cover and least gap between bars",
        get: |s| Value::Number(s.maximum_aggregate_mm),
        set: |s, v| s.maximum_aggregate_mm = number(v),
    },
    Setting {
        item: "Bottom cover",
        key: "bottom_cover_mm",
        unit: "mm",
        allowed: Allowed::Number(COVER_MM),
        meaning: "nominal cover to the outermost bottom bar",
        get: |s| Value::Number(s.bottom_cover_mm),
        set: |s, v| s.bottom_cover_mm = number(v),
    },
    Setting {
        item: "Top cover",
        key: "top_cover_mm",
        unit: "mm",
        allowed: Allowed::Number(COVER_MM),
        meaning: "nominal cover to the outermost top bar",
        get: |s| Value::Number(s.top_cover_mm),
        set: |s, v| s.top_cover_mm = number(v),
    },
    Setting {
        item: "Exposure",
        key: "exposure",
        unit: "",
        allowed: Allowed::Words(&EXPOSURE.0),
        meaning: "exposure class for durability (Table 3.3)",
        get: |s| pick(&s.exposure, &EXPOSURE),
        set: |s, v| s.exposure = chosen(v, &EXPOSURE),
    },
    Setting {
        item: "Fire resistance",
        key: "fire_resistance_h",
        unit: "h",
        allowed: Allowed::OneOf(FIRE_H),
        meaning: "period for cover and least thickness (Table 3.4, figure 3.2)",
        get: |s| Value::Number(s.fire_resistance_h),
        set: |s, v| s.fire_resistance_h = number(v),
    },
    Setting {
        item: "Thickness",
        key: "thickness_mm",
        unit: "mm",
        allowed: Allowed::Number(THICKNESS_MM),
        meaning: "slab thickness where a panel gives none",
        get: |s| Value::Number(s.thickness_mm),
        set: |s, v| s.thickness_mm = number(v),
    },
    Setting {
        item: "Finishes",
        key: "finishes_kn_m2",
        unit: "kN/m2",
        allowed: Allowed::Number(DEAD_KN_M2),
        meaning: "characteristic load where a panel gives none",
        get: |s| Value::Number(s.finishes_kn_m2),
        set: |s, v| s.finishes_kn_m2 = number(v),
    },
    Setting {
        item: "Partitions",
        key: "partitions_kn_m2",
        unit: "kN/m2",
        allowed: Allowed::Number(DEAD_KN_M2),
        meaning: "characteristic load where a panel gives none; counted as dead",
        get: |s| Value::Number(s.partitions_kn_m2),
        set: |s, v| s.partitions_kn_m2 = number(v),
    },
    Setting {
        item: "Imposed",
        key: "imposed_kn_m2",
        unit: "kN/m2",
        allowed: Allowed::Number(IMPOSED_KN_M2),
        meaning: "characteristic load where a panel gives none",
        get: |s| Value::Number(s.imposed_kn_m2),
        set: |s, v| s.imposed_kn_m2 = number(v),
    },
    Setting {
        item: "Dead load factor",
        key: "dead_load_factor",
        unit: "",
        allowed: Allowed::Number(Range::new(1.0, 2.0)),
        meaning: "partial factor on dead load (Table 2.1)",
        get: |s| Value::Number(s.dead_load_factor),
        set: |s, v| s.dead_load_factor = number(v),
    },
    Setting {
        item: "Imposed load factor",
        key: "imposed_load_factor",
        unit: "",
        allowed: Allowed::Number(Range::new(1.0, 2.0)),
        meaning: "partial factor on imposed load (Table 2.1)",
        get: |s| Value::Number(s.imposed_load_factor),
        set: |s, v| s.imposed_load_factor = number(v),
    },
    Setting {
        item: "Support width",
        key: "support_width_mm",
        unit: "mm",
        allowed: Allowed::Number(SUPPORT_WIDTH_MM),
        meaning: "beam or wall width where the Supports sheet gives none",
        get: |s| Value::Number(s.support_width_mm),
        set: |s, v| s.support_width_mm = number(v),
    },
    Setting {
        item: "Span basis",
        key: "span_basis",
        unit: "",
        allowed: Allowed::Words(&SPAN_BASIS.0),
        meaning: "how a span discontinuous at both ends is measured (3.4.1.2)",
        get: |s| pick(&s.span_basis, &SPAN_BASIS),
        set: |s, v| s.span_basis = chosen(v, &SPAN_BASIS),
    },
    Setting {
        item: "Corners",
        key: "corners",
        unit: "",
        allowed: Allowed::Words(&CORNERS.0),
        meaning: "free to lift applies only to panels discontinuous on all four edges",
        get: |s| pick(&s.corners, &CORNERS),
        set: |s, v| s.corners = chosen(v, &CORNERS),
    },
    Setting {
        item: "Bar sizes",
        key: "bar_sizes_mm",
        unit: "mm",
        allowed: Allowed::ListOf(BAR_SIZES_MM),
        meaning: "sizes the design may use",
        get: |s| Value::Numbers(s.bar_sizes_mm.clone()),
        set: |s, v| s.bar_sizes_mm = sorted(v),
    },
    Setting {
        item: "Spacing step",
        key: "spacing_step_mm",
        unit: "mm",
        allowed: Allowed::Number(Range::new(5.0, 100.0)),
        meaning: "step between spacings the design may use",
        get: |s| Value::Number(s.spacing_step_mm),
        set: |s, v| s.spacing_step_mm = number(v),
    },
    Setting {
        item: "Least spacing",
        key: "least_spacing_mm",
        unit: "mm",
        allowed: Allowed::Number(SPACING_MM),
        meaning: "closest centre-to-centre spacing the design may use",
        get: |s| Value::Number(s.least_spacing_mm),
        set: |s, v| s.least_spacing_mm = number(v),
    },
    Setting {
        item: "Greatest spacing",
        key: "greatest_spacing_mm",
        unit: "mm",
        allowed: Allowed::Number(SPACING_MM),
        meaning: "widest centre-to-centre spacing the design may use",
        get: |s| Value::Number(s.greatest_spacing_mm),
        set: |s, v| s.greatest_spacing_mm = number(v),
    },
    Setting {
        item: "Layering",
        key: "layering",
        unit: "",
        allowed: Allowed::Words(&LAYERING.0),
        meaning: "which bars lie nearest the face: bottom per panel, top one direction per connected region",
        get: |s| pick(&s.layering, &LAYERING),
        set: |s, v| s.layering = chosen(v, &LAYERING),
    },
    Setting {
        item: "Plan tolerance",
        key: "plan_tolerance_mm",
        unit: "mm",
        allowed: Allowed::Number(Range::new(0.0, 100.0)),
        meaning: "two positions this close are one",
        get: |s| Value::Number(s.plan_tolerance_mm),
        set: |s, v| s.plan_tolerance_mm = number(v),
    },
    Setting {
        item: "Balance threshold",
        key: "balance_threshold_pct",
        unit: "%",
        allowed: Allowed::Number(Range::new(0.0, 100.0)),
        meaning: "support moments that differ by more (of the larger) are balanced; else the larger governs both",
        get: |s| Value::Number(s.balance_threshold_pct),
        set: |s, v| s.balance_threshold_pct = number(v),
    },
    Setting {
        item: "Edge strips",
        key: "edge_strips",
        unit: "",
        allowed: Allowed::Words(&EDGE_STRIPS.0),
        meaning: "steel of the outer eighths of a panel (3.5.3.5)",
        get: |s| pick(&s.edge_strips, &EDGE_STRIPS),
        set: |s, v| s.edge_strips = chosen(v, &EDGE_STRIPS),
    },
    Setting {
        item: "Bottom bars",
        key: "bottom_bars",
        unit: "",
        allowed: Allowed::Words(&BOTTOM_BARS.0),
        meaning: "curtailment of bottom bars (figure 3.25)",
        get: |s| pick(&s.bottom_bars, &BOTTOM_BARS),
        set: |s, v| s.bottom_bars = chosen(v, &BOTTOM_BARS),
    },
    Setting {
        item: "Top bars",
        key: "top_bars",
        unit: "",
        allowed: Allowed::Words(&TOP_BARS.0),
        meaning: "arrangement of top bars over a support (figure 3.25)",
        get: |s| pick(&s.top_bars, &TOP_BARS),
        set: |s, v| s.top_bars = chosen(v, &TOP_BARS),
    },
    Setting {
        item: "Bar kinds limit",
        key: "bar_kinds_limit",
        unit: "",
        allowed: Allowed::Number(Range::new(1.0, 200.0)),
        meaning: "most size-and-spacing pairs allowed over the whole floor; blank: no limit",
        get: |s| s.bar_kinds_limit.map_or(Value::Blank, Value::Number),
        set: |s, v| s.bar_kinds_limit = Some(number(v)),
    },
    Setting {
        item: "Stock length",
        key: "stock_length_m",
        unit: "m",
        allowed: Allowed::Number(Range::new(3.0, 18.0)),
        meaning: "longest bar that can be had",
        get: |s| Value::Number(s.stock_length_m),
        set: |s, v| s.stock_length_m = number(v),
    },
    Setting {
        item: "Bending deduction",
        key: "bending_deduction_mm",
        unit: "mm",
        allowed: Allowed::Number(Range::new(0.0, 50.0)),
        meaning: "total taken off a dimension between two faces, beside the covers",
        get: |s| Value::Number(s.bending_deduction_mm),
        set: |s, v| s.bending_deduction_mm = number(v),
    },
    Setting {
        item: "Thickness options",
        key: "thickness_options_mm",
        unit: "mm",
        allowed: Allowed::List(THICKNESS_MM),
        meaning: "thicknesses to compare over the floor",
        get: |s| list(&s.thickness_options_mm),
        set: |s, v| s.thickness_options_mm = sorted(v),
    },
    Setting {
        item: "Concrete rate",
        key: "concrete_rate_per_m3",
        unit: "/m3",
        allowed: Allowed::Number(Range::new(0.0, 1e9)),
        meaning: "cost of concrete in place; blank: no cost",
        get: |s| s.concrete_rate_per_m3.map_or(Value::Blank, Value::Number),
        set: |s, v| s.concrete_rate_per_m3 = Some(number(v)),
    },
    Setting {
        item: "Steel rate",
        key: "steel_rate_per_t",
        unit: "/t",
        allowed: Allowed::Number(Range::new(0.0, 1e9)),
        meaning: "cost of bars in place; blank: no cost",
        get: |s| s.steel_rate_per_t.map_or(Value::Blank, Value::Number),
        set: |s, v| s.steel_rate_per_t = Some(number(v)),
    },
    Setting {
        item: "Formwork rate",
        key: "formwork_rate_per_m2",
        unit: "/m2",
        allowed: Allowed::Number(Range::new(0.0, 1e9)),
        meaning: "cost of soffit formwork; blank: no cost",
        get: |s| s.formwork_rate_per_m2.map_or(Value::Blank, Value::Number),
        set: |s, v| s.formwork_rate_per_m2 = Some(number(v)),
    },
    Setting {
        item: "Currency",
        key: "currency",
        unit: "",
        allowed: Allowed::Text,
        meaning: "currency of the rates",
        get: |s| text(&s.currency),
        set: |s, v| s.currency = word(v),
    },
    Setting {
        item: "Rate source",
        key: "rate_source",
        unit: "",
        allowed: Allowed::Text,
        meaning: "where the rates come from",
        get: |s| text(&s.rate_source),
        set: |s, v| s.rate_source = word(v),
    },
    Setting {
        item: "Concrete carbon",
        key: "concrete_carbon_kgco2e_m3",
        unit: "kgCO2e/m3",
        allowed: Allowed::Number(Range::new(0.0, 1e9)),
        meaning: "carbon factor of the concrete; blank: no carbon",
        get: |s| s.concrete_carbon_kgco2e_m3.map_or(Value::Blank, Value::Number),
        set: |s, v| s.concrete_carbon_kgco2e_m3 = Some(number(v)),
    },
    Setting {
        item: "Steel carbon",
        key: "steel_carbon_kgco2e_kg",
        unit: "kgCO2e/kg",
        allowed: Allowed::Number(Range::new(0.0, 1e9)),
        meaning: "carbon factor of the bars; blank: no carbon",
        get: |s| s.steel_carbon_kgco2e_kg.map_or(Value::Blank, Value::Number),
        set: |s, v| s.steel_carbon_kgco2e_kg = Some(number(v)),
    },
    Setting {
        item: "Carbon source",
        key: "carbon_source",
        unit: "",
        allowed: Allowed::Text,
        meaning: "where the carbon factors come from",
        get: |s| text(&s.carbon_source),
        set: |s, v| s.carbon_source = word(v),
    },
];
