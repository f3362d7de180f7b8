//! The results file against the page that promises its keys.

use design_engine::criteria::SETTINGS;
use serde_json::Value;

use super::sample::Sample;
use super::{results, results_text};

/// Keys of the contract, in its order, for the first panel, section, check and support.
const PANEL: &str = "panel x0_m x1_m y0_m y1_m short_span_along lx_m ly_m span_ratio action edges thickness_mm \
    self_weight_kn_m2 dead_kn_m2 imposed_kn_m2 ultimate_kn_m2 sections checks governing_check governing_ratio \
    thickness_governed_by ok";
const EDGE: &str = "state why neighbours";
const SECTION: &str = "at support face layer bars_along coefficient moment_from_coefficient_knm_m \
    moment_balanced_knm_m moment_knm_m d_mm k z_mm as_bending_mm2_m as_minimum_mm2_m as_required_mm2_m bar_mm \
    spacing_mm as_provided_mm2_m";
const CHECK: &str = "check at clause demand limit unit ratio ok";
const SUPPORT: &str = "support gridline axis from_m to_m panels moments_from_coefficient_knm_m balanced \
    moment_knm_m layer bar_mm spacing_mm as_required_mm2_m as_provided_mm2_m extension_m";
const QUERY: &str = "severity panel place text";
const TOP: &str = "format program criteria panels supports queries";

/// Keys of the first object that follows `opening`, in the order of the file.
fn keys_in_file(text: &str, opening: &str) -> Vec<String> {
    let start = text.find(opening).unwrap_or_else(|| panic!("no {opening}"));
    let rest = &text[start + opening.len()..];
    let first = rest.lines().find(|line| line.trim_start().starts_with('"')).unwrap();
    let indent = first.len() - first.trim_start().len();
    let indent_of = |line: &str| line.len() - line.trim_start().len();
    rest.lines()
        .skip_while(|line| *line != first)
        .take_while(|line| indent_of(line) >= indent)
        .filter(|line| indent_of(line) == indent && line.trim_start().starts_with('"'))
        .map(|line| line.trim_start()[1..].split('"').next().unwrap().to_owned())
        .collect()
}

#[test]
fn the_promised_keys_stand_in_the_promised_order() {
    let text = results_text(&Sample::new());
    for (opening, promised) in [
        ("{", TOP),
        ("\"panels\": [", PANEL),
        ("\"north\": {", EDGE),
        ("\"sections\": [", SECTION),
        ("\"checks\": [", CHECK),
        ("\"supports\": [", SUPPORT),
        ("\"queries\": [", QUERY),
    ] {
        let promised: Vec<&str> = promised.split_whitespace().collect();
        let mut written = keys_in_file(&text, opening);
        written.retain(|key| promised.contains(&key.as_str()));
        assert_eq!(written, promised, "{opening}");
    }
}

#[test]
fn criteria_hold_every_setting_as_resolved() {
    let sample = Sample::new();
    let written = keys_in_file(&results_text(&sample), "\"criteria\": {");
    assert_eq!(written, SETTINGS.iter().map(|setting| setting.key).collect::<Vec<_>>());
    let criteria = &results(&sample)["criteria"];
    assert_eq!(criteria["fcu_n_mm2"], 30.0);
    assert_eq!(criteria["steel_partial_factor"], 1.15);
    assert_eq!(criteria["bar_type_letter"], "H");
    assert_eq!(criteria["bar_sizes_mm"], serde_json::json!([10.0, 12.0, 16.0]));
    assert_eq!(criteria["concrete_rate_per_m3"], Value::Null);
    assert_eq!(criteria["date"], "2031-05-06");
}

#[test]
fn numbers_are_those_of_the_design_to_the_last_bit() {
    let sample = Sample::new();
    let results = results(&sample);
    let (panel, design) = (&results["panels"][0], &sample.design.panels[0]);
    let bits = |value: &Value| value.as_f64().unwrap().to_bits();
    assert_eq!(bits(&panel["lx_m"]), design.basis.unwrap().lx_m.to_bits());
    assert_eq!(bits(&panel["sections"][2]["k"]), design.sections[2].k.unwrap().to_bits());
    assert_eq!(bits(&panel["checks"][1]["ratio"]), design.checks[1].ratio.unwrap().to_bits());
    let support = &sample.design.supports[1];
    assert_eq!(bits(&results["supports"][1]["extension_m"][1]), support.sides[1].extension_m.to_bits());
}

#[test]
fn a_panel_that_is_not_designed_has_its_row() {
    let results = results(&Sample::new());
    let panel = &results["panels"][3];
    assert_eq!(panel["panel"], "S4");
    assert_eq!(panel["not_designed"], "its north edge is free");
    assert_eq!(panel["ok"], false);
    assert_eq!((&panel["sections"], &panel["checks"]), (&Value::from(vec![0; 0]), &Value::from(vec![0; 0])));
    for key in ["governing_check", "governing_ratio", "lx_m", "action", "thickness_governed_by"] {
        assert_eq!(panel[key], Value::Null, "{key}");
    }
    assert_eq!(panel["edges"]["north"]["state"], "free");
    assert_eq!(results["panels"][0]["not_designed"], Value::Null);
    assert_eq!(results["ok"], false);
}

#[test]
fn a_loose_panel_has_no_place_on_plan() {
    let panel = &results(&Sample::new())["panels"][4];
    for key in ["x0_m", "x1_m", "y0_m", "y1_m", "short_span_along"] {
        assert_eq!(panel[key], Value::Null, "{key}");
    }
    assert_eq!(panel["edges"]["long edge 1"]["state"], "continuous");
    assert_eq!(panel["sections"][2]["at"], "long edge 1");
    assert_eq!(panel["sections"][2]["support"], Value::Null);
    assert_eq!(panel["sections"][0]["bars_along"], Value::Null);
}

#[test]
fn supports_are_those_that_two_panels_share() {
    let results = results(&Sample::new());
    let supports = results["supports"].as_array().unwrap();
    let names: Vec<&str> = supports.iter().map(|support| support["support"].as_str().unwrap()).collect();
    assert_eq!(names, ["B/1-2", "2/A-B", "B/2-3", "2/B-C"]);
    assert_eq!(supports[0]["panels"], serde_json::json!(["S1", "S2"]));
    assert_eq!(supports[0]["axis"], "X");
    // Where one side is not designed, its place in each pair stays empty.
    assert_eq!(supports[2]["extension_m"][1], Value::Null);
    assert!(supports[2]["extension_m"][0].is_number());
}

#[test]
fn queries_say_where() {
    let queries = &results(&Sample::new())["queries"];
    assert_eq!(queries[0]["severity"], "not designed");
    assert_eq!(queries[0]["panel"], "S4");
    assert!(queries[0]["place"].as_str().unwrap().contains("AC6, North edge"), "{}", queries[0]["place"]);
    assert_eq!(queries[1]["place"], Value::Null);
    assert_eq!(queries[1]["about"], "support B/1-2");
}
