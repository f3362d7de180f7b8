//! Prints the bars of a floor book: callouts by set, then quantities.
#![allow(clippy::print_stdout, clippy::unwrap_used, reason = "an example for the terminal")]

use std::path::Path;

fn main() {
    let path = std::env::args().nth(1).expect("a floor book");
    let read = schedule_io::read::read_book(Path::new(&path)).unwrap();
    let book = read.book.unwrap();
    let (floor, _) = floor_grid::lay_out(&book.layout);
    let design = design_engine::design_floor(&floor, &book.criteria);
    let bars = detailing::detail(&floor, &design, &book.criteria);
    for set in &bars.sets {
        let mark = &floor.panel(set.panel).mark;
        let supports: Vec<_> = set.supports.iter().map(|id| floor.support(*id).name.clone()).collect();
        let lines = detailing::callouts::callouts(&bars, set, &book.criteria);
        let text: Vec<String> = lines.into_iter().map(|line| line.text).collect();
        println!(
            "{mark} {:?} {} {:?} {}: {}",
            set.side,
            set.for_what.word(),
            supports,
            set.words,
            text.join(" + ")
        );
    }
    for bar in &bars.bars {
        println!(
            "{} {} {} {:?} {} {} {:.1}",
            bar.mark,
            bar.bar.size_mm,
            bar.count,
            bar.bar.shape,
            bar.bar.shape.code(),
            bar.length_mm,
            bar.mass_kg
        );
    }
    println!("{:#?}", bars.quantities);
    println!("{:?}", detailing::reconcile::reconcile(&bars, &book.criteria));
}
