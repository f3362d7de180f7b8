//! A workbook and a folder of CSV files with the same tables give the same floor.

use std::path::{Path, PathBuf};

use rust_xlsxwriter::Workbook;
use schedule_io::book::Book;
use schedule_io::sheets::SHEETS;

use crate::support::{folder, read, said};

const ALL_SHEETS: &[(&str, &[u8])] = &[
    (
        "criteria.csv",
        b"Item,Value,Unit,Remark\nProject,Ferry Point Store (invented),,\nDate,2026-03-31,,\n\
          Cube strength fcu (N/mm2),35,,\nYield strength fy,460000,kN/m2,\nBar sizes (mm),10; 12 16,,\n\
          Thickness (m),0.175,,\nExposure, Moderate ,,\nCode of practice,bs8110-1:1997,,\n\
          Fire resistance,90,min,\nThickness options,\"150, 175, 200\",mm,\n",
    ),
    (
        "gridlines.csv",
        b"Gridline,Axis,Position (mm)\nA,X,0\nB,x,5100\nC,X,9600.5\n1,Y,0\n2,Y,6200\n3,Y,11300\n",
    ),
    (
        "panels.csv",
        b"Upper floor\n\nPanel,X from,X to,Y from,Y to,Thickness,Finishes (N/m2),Imposed (kPa),Spanning,Corners,\
          Top level (mm),North edge,West edge,Remarks,Zone\n\
          101,A,B,1,2,200,1250,3,two way,free to lift,-50,Continuous,free,\"stair, east side\",Z1\n\n\
          102,B,C,1,2,,,,one-way x,,,,,,\nS3,A,C,2,3,,0,,Cantilever,,,,,,\n",
    ),
    ("joints.csv", b"Gridline,From,To,Remark\n2,A,B,movement joint\n1,,,\n"),
    ("supports.csv", b"Gridline,From,To,Kind,Width (mm),Remark\nB,1,2,Wall,200,\nC,,,none,,\n3,,,beam,,\n"),
    ("openings.csv", b"Panel,From west (m),From south (m),Width x (m),Width y (m),Remark\n101,1.2,2,0.6,0.9,riser\n"),
    ("wall_loads.csv", b"Panel,Along,Offset (m),From (m),To (m),Load (kN/m),Remark\nS3,Y,1.5,0,3.2,6.4,\n"),
    (
        "loose_panels.csv",
        b"Panel,Short span (m),Long span (m),Long edge 1,Short edge 2,Spanning,Remark\n\
          R1,3.1,4.2,continuous,free,one-way short,lift roof\nR2,2.4,2.4,,,,\n",
    ),
    (
        "chosen_bars.csv",
        b"Panel,Position,Size (mm),Spacing (mm),Remark\n101,short bottom,12,150,\n101,North top,10,125,as built\n\
          R1,long edge 1 top,10,200,\n",
    ),
];

/// The same tables as a workbook beside the folder; numbers as numbers, all else as text.
fn as_workbook(folder: &Path, beside: &Path) -> PathBuf {
    let mut book = Workbook::new();
    for spec in SHEETS {
        let path = folder.join(spec.csv);
        if !path.exists() {
            continue;
        }
        let sheet = book.add_worksheet();
        sheet.set_name(spec.name).unwrap();
        let mut reader = csv::ReaderBuilder::new().has_headers(false).flexible(true).from_path(path).unwrap();
        for (row, record) in (0..).zip(reader.records()) {
            for (column, cell) in (0..).zip(&record.unwrap()) {
                match cell.parse::<f64>() {
                    Ok(number) => sheet.write_number(row, column, number).unwrap(),
                    Err(_) => sheet.write_string(row, column, cell).unwrap(),
                };
            }
        }
    }
    let path = beside.join("book.xlsx");
    book.save(&path).unwrap();
    path
}

fn whole(path: &Path) -> Book {
    let reading = read(path);
    assert!(reading.queries.is_empty(), "{:#?}", said(&reading));
    reading.book.unwrap()
}

fn compare(folder: &Path, beside: &Path) -> Book {
    let csv = whole(folder);
    let xlsx = whole(&as_workbook(folder, beside));
    assert_eq!(csv.layout, xlsx.layout);
    assert_eq!(csv.criteria, xlsx.criteria);
    assert_eq!(csv.defaults_used, xlsx.defaults_used);
    csv
}

#[test]
fn every_sheet_is_the_same_in_both_forms() {
    let (dir, path) = folder(ALL_SHEETS);
    let book = compare(&path, dir.path());
    holds_what_the_tables_say(&book);
}

/// The values that the tables above hold, by hand.
fn holds_what_the_tables_say(book: &Book) {
    use design_engine::criteria::Exposure;
    use design_engine::floor::{Axis, Corners, Side, Spanning, TenthMm};
    use floor_grid::layout::{ChosenPosition, GridlineId, LineSupportKind, StatedEdge};

    let near = |a: f64, b: f64| assert!((a - b).abs() < 1e-12, "{a} is not {b}");
    let criteria = &book.criteria;
    near(criteria.fcu_n_mm2, 35.0);
    near(criteria.fy_n_mm2, 460.0);
    near(criteria.thickness_mm, 175.0);
    near(criteria.fire_resistance_h, 1.5);
    assert_eq!(criteria.date, "2026-03-31");
    assert_eq!(criteria.exposure, Exposure::Moderate);
    assert_eq!(criteria.bar_sizes_mm, [10.0, 12.0, 16.0]);
    assert_eq!(criteria.thickness_options_mm, [150.0, 175.0, 200.0]);
    let defaults: Vec<&str> = book.defaults_used.iter().map(|d| d.key).collect();
    assert!(defaults.contains(&"imposed_kn_m2") && !defaults.contains(&"thickness_mm"));

    let layout = &book.layout;
    assert_eq!(layout.gridlines[2].position, TenthMm(96_005));
    assert_eq!(layout.tolerance, TenthMm(10));
    let [first, second, third] = &layout.panels[..] else { panic!("three panels") };
    assert_eq!((first.x_from, first.y_to), (GridlineId(0), GridlineId(4)));
    assert_eq!(first.data.mark, "101");
    near(first.data.thickness_mm, 200.0);
    near(first.data.loads.finishes_kn_m2, 1.25);
    near(first.data.loads.partitions_kn_m2, criteria.partitions_kn_m2);
    near(first.data.loads.imposed_kn_m2, 3.0);
    near(first.top_level_mm, -50.0);
    assert_eq!(first.data.spanning, Spanning::TwoWay);
    assert_eq!((first.data.corners, first.data.corners_stated), (Corners::FreeToLift, true));
    assert_eq!(first.stated_edges, [Some(StatedEdge::Continuous), None, None, Some(StatedEdge::Free)]);
    assert_eq!((first.data.remarks.as_str(), first.zone.as_str()), ("stair, east side", "Z1"));
    near(second.data.thickness_mm, 175.0);
    assert_eq!(second.data.spanning, Spanning::OneWay(Axis::X));
    assert_eq!((second.data.corners, second.data.corners_stated), (Corners::HeldDown, false));
    near(third.data.loads.finishes_kn_m2, 0.0);
    assert_eq!(third.data.spanning, Spanning::Cantilever);

    assert_eq!(layout.joints[0].stretch.to, Some(GridlineId(1)));
    assert_eq!(layout.joints[1].stretch.from, None);
    assert_eq!(layout.supports[0].kind, LineSupportKind::Wall);
    near(layout.supports[2].width_mm, criteria.support_width_mm);
    near(layout.openings[0].width_y_m, 0.9);
    assert_eq!(layout.wall_loads[0].along, Axis::Y);
    let loose = &layout.loose_panels[0];
    assert_eq!(loose.data.spanning, Spanning::OneWay(Axis::X));
    let expected =
        [StatedEdge::Continuous, StatedEdge::Discontinuous, StatedEdge::Discontinuous, StatedEdge::Free];
    assert_eq!(loose.edges, expected);
    assert_eq!(loose.data.remarks, "lift roof");
    let positions: Vec<ChosenPosition> = layout.chosen_bars.iter().map(|bars| bars.position).collect();
    // The first long edge of a loose panel is its west side.
    let expected =
        [ChosenPosition::ShortBottom, ChosenPosition::Top(Side::North), ChosenPosition::Top(Side::West)];
    assert_eq!(positions, expected);
}

#[test]
fn the_example_floors_are_the_same_in_both_forms() {
    let floors = Path::new(env!("CARGO_MANIFEST_DIR")).join("../../fixtures/floors");
    let mut count = 0;
    for floor in std::fs::read_dir(floors).unwrap() {
        let folder = floor.unwrap().path().join("book");
        let beside = tempfile::tempdir().unwrap();
        compare(&folder, beside.path());
        count += 1;
    }
    assert!(count >= 2, "the example floors are there");
}
