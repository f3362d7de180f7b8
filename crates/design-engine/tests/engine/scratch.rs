use crate::grid::*;
use design_engine::criteria::Criteria;
use design_engine::design_floor;
#[test]
fn scratch() {
    let floor = Grid::new(&[4.0, 5.0, 4.5], &[5.0, 6.0]).build();
    let t = std::time::Instant::now();
    let d = design_floor(&floor, &Criteria::default());
    println!("{:?}", t.elapsed());
    for p in &d.panels {
        println!(
            "{} {:?} gov {:?} thick {:?} ok {}",
            floor.panel(p.panel).mark,
            p.basis,
            p.governing_check().map(|c| (c.kind, c.at, c.ratio)),
            p.thickness_governed_by,
            p.ok()
        );
        for s in &p.sections {
            println!(
                "   {:?} {:?} m {:?} -> {:?} d {} As {:?} {:?} {}",
                s.at,
                s.layer,
                s.moment_from_coefficient_knm_m,
                s.moment_knm_m,
                s.d_mm,
                s.as_required_mm2_m,
                s.bars,
                s.as_provided_mm2_m
            );
        }
    }
    for s in &d.supports {
        println!("{:?}", s);
    }
    for q in &d.queries {
        println!("{:?}", q);
    }
}
