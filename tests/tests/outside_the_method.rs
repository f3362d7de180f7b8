//! No panel is silently designed outside its method: each such panel is named in a query with what to do.

#![allow(clippy::unwrap_used, reason = "what is not as it should be must fail its test")]

use baymat_tests::book_of;
use design_engine::design_floor;
use design_engine::query::{Query, Severity};
use floor_grid::lay_out;
use schedule_io::read::read_book;

const GRIDLINES: &str = "Gridline,Axis,Position (m)\n1,X,0\n2,X,5\n3,X,10\nA,Y,0\nB,Y,6\nC,Y,12\n";
const HEADINGS: &str =
    "Panel,X from,X to,Y from,Y to,Thickness (mm),Imposed (kN/m2),Spanning,North edge,South edge\n";
const FOUR: &str =
    "P1,1,2,A,B,200,2.5,,,\nP2,2,3,A,B,200,2.5,,,\nP3,1,2,B,C,200,2.5,,,\nP4,2,3,B,C,200,2.5,,,\n";

/// Every query of laying out and designing a book of four panels, changed by `panels` and further files.
fn queries(panels: &str, more: &[(&str, &str)]) -> Vec<Query> {
    let dir = tempfile::tempdir().unwrap();
    let panels = format!("{HEADINGS}{panels}");
    let mut files = vec![("gridlines.csv", GRIDLINES), ("panels.csv", panels.as_str())];
    files.extend_from_slice(more);
    let reading = read_book(&book_of(dir.path(), "floor", &files)).unwrap();
    let book = reading.book.unwrap_or_else(|| panic!("{:?}", reading.queries));
    let (floor, mut queries) = lay_out(&book.layout);
    assert!(queries.iter().all(|query| query.severity != Severity::Error), "{queries:?}");
    queries.extend(design_floor(&floor, &book.criteria).queries);
    queries
}

/// A query of this severity says these words, names the panel, and has a remedy.
fn check(queries: &[Query], severity: Severity, panel: &str, words: &str) {
    let found = queries.iter().find(|query| {
        let names = query.panel_mark() == Some(panel) || query.text.contains(panel);
        query.severity == severity && names && query.text.contains(words)
    });
    let found = found.unwrap_or_else(|| panic!("no {severity:?} of {panel} with {words:?} in {queries:#?}"));
    assert!(!found.remedy.is_empty(), "{found:?} has no remedy");
}

#[test]
fn four_like_panels_have_nothing_to_say() {
    let heavy = queries(FOUR, &[]).into_iter().filter(|query| query.severity <= Severity::Warning).count();
    assert_eq!(heavy, 0);
}

#[test]
fn a_free_edge_of_a_two_way_panel_is_not_designed() {
    let panels = FOUR.replace("P3,1,2,B,C,200,2.5,,,", "P3,1,2,B,C,200,2.5,,free,");
    check(&queries(&panels, &[]), Severity::NotDesigned, "P3", "free");
}

#[test]
fn an_edge_without_support_is_not_designed() {
    let supports = "Gridline,From,To,Kind\nC,2,3,none\n";
    check(&queries(FOUR, &[("supports.csv", supports)]), Severity::NotDesigned, "P4", "free");
}

#[test]
fn an_opening_over_a_quarter_of_a_span_is_a_warning_and_over_half_of_it_not_designed() {
    let opening = |width: f64| {
        format!("Panel,From west (m),From south (m),Width x (m),Width y (m)\nP2,1,1.5,{width},1\n")
    };
    let wide = queries(FOUR, &[("openings.csv", &opening(1.4))]);
    check(&wide, Severity::Warning, "P2", "wider than a quarter of a span");
    let wider = queries(FOUR, &[("openings.csv", &opening(2.6))]);
    check(&wider, Severity::NotDesigned, "P2", "more than half of a span");
}

#[test]
fn an_opening_within_d_of_a_support_is_a_warning() {
    let opening = "Panel,From west (m),From south (m),Width x (m),Width y (m)\nP2,0.2,1.5,0.5,0.5\n";
    check(&queries(FOUR, &[("openings.csv", opening)]), Severity::Warning, "P2", "within d of a support");
}

#[test]
fn a_wall_over_a_tenth_of_the_dead_load_is_a_warning() {
    let wall =
        |load: f64| format!("Panel,Along,Offset (m),From (m),To (m),Load (kN/m)\nP1,y,2.5,0,6,{load}\n");
    check(&queries(FOUR, &[("wall_loads.csv", &wall(8.0))]), Severity::Warning, "P1", "over 10 %");
    let light = queries(FOUR, &[("wall_loads.csv", &wall(2.0))]);
    assert!(light.iter().all(|query| query.severity > Severity::Warning), "{light:#?}");
}

#[test]
fn neighbours_whose_loads_are_unlike_are_a_warning() {
    let panels = FOUR.replace("P2,2,3,A,B,200,2.5", "P2,2,3,A,B,200,20");
    let said = queries(&panels, &[]);
    let unlike = |query: &&Query| query.severity == Severity::Warning && query.text.contains("under 0.5");
    assert!(said.iter().any(|query| unlike(&query)), "{said:#?}");
}

#[test]
fn a_panel_stated_two_way_beyond_the_tables_is_not_designed() {
    let gridlines = format!("{GRIDLINES}D,Y,16\n");
    let panels = "P5,1,3,C,D,200,2.5,two-way,,\n";
    let said = queries(panels, &[("gridlines.csv", &gridlines)]);
    check(&said, Severity::NotDesigned, "P5", "the two-way tables end at 2");
}

#[test]
fn a_cantilever_that_lifts_its_back_span_fails_its_check() {
    let panels = "P1,1,2,A,B,200,2.5,,,\nK1,2,3,A,B,300,5,cantilever,,\n";
    check(&queries(panels, &[]), Severity::Warning, "P1", "uplift at far support");
}
