//! What a reader finds in the workbook.

use calamine::Data;

use super::read_back::ReadBack;
use super::sample::Sample;
use super::{read_back, text};

fn cover(workbook: &ReadBack, item: &str) -> Vec<Data> {
    let row = workbook.sheet("Cover").rows().find(|row| text(&row[0]) == item);
    row.unwrap_or_else(|| panic!("no {item} on the cover")).to_vec()
}

#[test]
fn results_stand_in_words() {
    let workbook = read_back(&Sample::new());
    let result = |row| text(&workbook.cell("Panels", row, "", "Result")).to_owned();
    assert_eq!(result(0), "passes");
    assert_eq!(result(2), "FAILS: shear, deflection, cover for durability");
    assert_eq!(result(3), "NOT DESIGNED: its north edge is free");
    assert_eq!(
        text(&cover(&workbook, "Result of all checks")[1]),
        "FAILS: S3; NOT DESIGNED: S4; 1 warning to be read on the Queries sheet"
    );
    let support = |row| text(&workbook.cell("Supports", row, "", "Result")).to_owned();
    assert_eq!(support(1), "passes");
    assert_eq!(support(2), "FAILS: shear (S3); NOT DESIGNED: S4");
    let checks = workbook.rows("Checks");
    let failing: Vec<&str> =
        checks.iter().filter(|row| text(&row[8]) == "FAILS").map(|row| text(&row[1])).collect();
    assert_eq!(failing, ["shear", "deflection", "cover for durability"]);
    assert_eq!(checks.iter().filter(|row| text(&row[8]) == "passes").count(), checks.len() - 3);
}

#[test]
fn bars_and_edges_stand_in_the_words_of_the_trade() {
    let workbook = read_back(&Sample::new());
    assert_eq!(text(&workbook.cell("Panels", 0, "Short span, bottom", "Bars")), "H10-225 B1");
    assert_eq!(text(&workbook.cell("Supports", 0, "Top bars", "Bars")), "H12-275 T1 stated");
    let edges =
        |row| ["N", "E", "S", "W"].map(|side| text(&workbook.cell("Panels", row, "Edges", side)).to_owned());
    assert_eq!(edges(0), ["cont", "cont", "disc", "disc"]);
    assert_eq!(edges(3), ["free", "disc", "cont", "cont"]);
    assert_eq!(edges(4), ["disc", "disc", "disc", "cont"]);
}

#[test]
fn what_has_no_number_says_why() {
    let workbook = read_back(&Sample::new());
    assert_eq!(text(&workbook.cell("Panels", 2, "Long span, bottom", "Steel required (mm²/m)")), "too thin");
    let not_allowed: Vec<String> = workbook
        .rows("Checks")
        .iter()
        .filter(|row| row[7] == Data::String("not allowed".to_owned()))
        .map(|row| text(&row[1]).to_owned())
        .collect();
    assert_eq!(not_allowed, ["cover for durability"]);

    let mut sample = Sample::new();
    sample.design.panels[2].least_thickness_mm = None;
    let least = read_back(&sample).cell("Panels", 2, "Governing", "Least thickness (mm)");
    assert_eq!(text(&least), "over 1000");
}

#[test]
fn a_support_of_one_panel_is_named_after_its_edge() {
    let workbook = read_back(&Sample::new());
    let own = workbook.rows("Supports").pop().unwrap();
    assert_eq!(text(&own[0]), "12 long edge 1");
    assert_eq!(workbook.cell("Supports", 4, "Place", "Panel 2"), Data::Empty);
}

#[test]
fn a_users_text_arrives_as_text() {
    let workbook = read_back(&Sample::new());
    let queries = workbook.rows("Queries");
    assert_eq!(queries[1][4], Data::String("=loads differ".to_owned()));
    assert_eq!(text(&queries[2][4]).trim_end(), "<r>a & b</r>");
    assert_eq!(workbook.cell("Panels", 4, "", "Panel"), Data::String("12".to_owned()));
    assert_eq!(cover(&workbook, "Job number")[1], Data::String("007".to_owned()));
    let reasons: Vec<Data> = workbook.rows("Edges").into_iter().map(|row| row[10].clone()).collect();
    assert!(reasons.contains(&Data::String("+ open side over the stair".to_owned())));
}

#[test]
fn the_cover_marks_every_default_and_counts_the_floor() {
    let sample = Sample::new();
    let workbook = read_back(&sample);
    for (item, source) in [
        ("Cube strength fcu", "DEFAULT"),
        ("Layering", "DEFAULT"),
        ("Yield strength fy", "stated"),
        ("Bar sizes", "stated"),
    ] {
        assert_eq!(text(&cover(&workbook, item)[3]), source, "{item}");
    }
    assert_eq!(cover(&workbook, "Cube strength fcu")[1], Data::Float(30.0));
    assert_eq!(text(&cover(&workbook, "Cube strength fcu")[2]), "N/mm²");
    let total = |item: &str| {
        let row = workbook.sheet("Cover").rows().find(|row| text(&row[3]) == item);
        row.unwrap_or_else(|| panic!("no {item} on the cover"))[4].clone()
    };
    for (item, count) in [
        ("Panels", 5.0),
        ("Panels that pass", 3.0),
        ("Panels that fail", 1.0),
        ("Panels not designed", 1.0),
        ("Queries: not designed", 1.0),
        ("Queries: warning", 1.0),
        ("Queries: note", 1.0),
    ] {
        assert_eq!(total(item), Data::Float(count), "{item}");
    }
    // 5.8 x 6.7 + 6.1 x 6.7 + 5.8 x 5.4 + 6.1 x 5.4 + 3.9 x 8.3 m2
    let Data::Float(area) = total("Plan area (m²)") else { panic!() };
    assert!((area - 176.36).abs() < 1e-9, "{area}");
    // 38.86 x 0.16 + 40.87 x 0.165 + 31.32 x 0.17 + 32.94 x 0.175 + 32.37 x 0.15 m3
    let Data::Float(concrete) = total("Concrete (m³)") else { panic!() };
    assert!((concrete - 28.90555).abs() < 1e-9, "{concrete}");
}

#[test]
fn the_cover_prints_caution_assumptions_and_the_books_name_without_its_path() {
    let workbook = read_back(&Sample::new());
    let column: Vec<String> = workbook.sheet("Cover").rows().map(|row| text(&row[0]).to_owned()).collect();
    let all = column.join(" ");
    for words in
        ["qualified engineer", "Local codes", "No warranty", "Edge strips carry the bars", "vibration"]
    {
        assert!(all.contains(words), "{words}");
    }
    assert_eq!(text(&cover(&workbook, "Floor book")[1]), "invented.xlsx");
    assert_eq!(text(&cover(&workbook, "Program")[1]), "baymat 0.0.0");
    assert!(all.contains("B1 bottom outer") && all.contains("T2 top inner"));
}

#[test]
fn a_floor_without_rows_is_still_a_workbook() {
    let mut sample = Sample::new();
    sample.floor = Default::default();
    sample.bars = Default::default();
    sample.design.panels.clear();
    sample.design.supports.clear();
    sample.queries.clear();
    let workbook = read_back(&sample);
    assert_eq!(cover(&workbook, "Job number")[4], Data::Float(0.0), "panels beside the job number");
    assert!(workbook.rows("Panels").is_empty());
}
