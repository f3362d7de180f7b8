//! Compares every formula cell of a workbook with the same cell of a recalculated copy: `recalculated STORED.xlsx COPY.xlsx`.
#![allow(clippy::print_stdout, clippy::unwrap_used, reason = "an example for the terminal")]

use std::process::ExitCode;

use calamine::{Data, Reader as _, Xlsx, open_workbook};

fn main() -> ExitCode {
    let paths: Vec<String> = std::env::args().skip(1).collect();
    let [stored, copy] = &paths[..] else { panic!("two workbooks") };
    let mut stored: Xlsx<_> = open_workbook(stored).unwrap();
    let mut copy: Xlsx<_> = open_workbook(copy).unwrap();
    let (mut compared, mut differing) = (0, 0);
    for name in stored.sheet_names() {
        let formulas = stored.worksheet_formula(&name).unwrap();
        let (values, recalculated) =
            (stored.worksheet_range(&name).unwrap(), copy.worksheet_range(&name).unwrap());
        let Some((r0, c0)) = formulas.start() else { continue };
        for (r, c, formula) in formulas.used_cells().filter(|(_, _, formula)| !formula.is_empty()) {
            let at = (r0 + u32::try_from(r).unwrap(), c0 + u32::try_from(c).unwrap());
            let same = match (values.get_value(at), recalculated.get_value(at)) {
                // Fifteen digits are written.
                (Some(Data::Float(a)), Some(Data::Float(b))) => {
                    (a - b).abs() <= 1e-12 * a.abs().max(b.abs()).max(1.0)
                }
                (Some(a), Some(b)) => a.to_string() == b.to_string(),
                _ => false,
            };
            compared += 1;
            if !same {
                differing += 1;
                println!(
                    "{name} {at:?} {formula}: {:?} against {:?}",
                    values.get_value(at),
                    recalculated.get_value(at)
                );
            }
        }
    }
    println!("{compared} formulas compared, {differing} differ");
    if differing == 0 && compared > 0 { ExitCode::SUCCESS } else { ExitCode::FAILURE }
}
