//! The columns of the working, as data: heading, unit, and a formula in terms of other columns or a value of the row.
//!
//! In a formula `{gk}` is the cell of the column `gk` in this row, `{other.mtab}` the same of the other panel's row at the
//! support, `{fcu_n_mm2}` the cell of that setting on the cover.

use std::borrow::Cow;
use std::collections::BTreeMap;

use design_engine::bs8110::deflection::{modification_factor, service_stress};
use design_engine::bs8110::flexure::minimum_share;
use design_engine::bs8110::shear::{greatest_stress, vc};
use design_engine::bs8110::spacing::greatest_clear;
use design_engine::check::RATIO_TOLERANCE;
use design_engine::result::Action;

use super::rows::{Coefficient, WorkingRow};
use crate::write::column::{Cell, ColumnDescription, Head, Kind};
use crate::write::{Submission, words};

/// A column.
pub(super) struct WorkingColumn {
    key: &'static str,
    group: &'static str,
    heading: &'static str,
    unit: &'static str,
    kind: Kind,
    width: f64,
    meaning: &'static str,
}

const fn text(
    key: &'static str,
    group: &'static str,
    heading: &'static str,
    width: f64,
    meaning: &'static str,
) -> WorkingColumn {
    WorkingColumn { key, group, heading, unit: "", kind: Kind::Words, width, meaning }
}

const fn number(
    key: &'static str,
    group: &'static str,
    heading: &'static str,
    unit: &'static str,
    decimals: u8,
    meaning: &'static str,
) -> WorkingColumn {
    WorkingColumn { key, group, heading, unit, kind: Kind::Number(decimals), width: 8.5, meaning }
}

const LOADS: &str = "Loads (Table 2.1)";
const COEFFICIENT: &str = "Coefficient (3.5.3, 3.5.2)";
const BALANCE: &str = "Moment and balance (3.5.3.6)";
const BENDING: &str = "Bending (3.4.4.4)";
const STEEL: &str = "Steel (3.12.5.3, 3.12.11)";
const DEFLECTION: &str = "Deflection (3.4.6)";
const SHEAR: &str = "Shear (3.5.5)";

pub(super) const COLUMNS: [WorkingColumn; 58] = [
    text("panel", "Section", "Panel", 9.0, "mark of the panel"),
    text("at", "Section", "Place", 14.0, "where in the panel"),
    text("support", "Section", "Support", 11.0, "the support whose bars serve it"),
    number("h", LOADS, "h", "mm", 0, "thickness"),
    number("fin", LOADS, "Finishes", "kN/m2", 2, "characteristic"),
    number("part", LOADS, "Partitions", "kN/m2", 2, "characteristic, counted as dead"),
    number("qk", LOADS, "qk", "kN/m2", 2, "characteristic imposed load"),
    number("gk", LOADS, "gk", "kN/m2", 3, "h x density + finishes + partitions"),
    number("n", LOADS, "n", "kN/m2", 3, "ultimate load"),
    number(
        "wall",
        LOADS,
        "Walls",
        "kN/m2",
        3,
        "equivalent load of walls in this direction, from analysis; of a cantilever their root moment in kNm/m",
    ),
    number("lx", COEFFICIENT, "lx", "m", 3, "short span"),
    number("ly", COEFFICIENT, "ly", "m", 3, "long span"),
    number("ratio", COEFFICIENT, "ly/lx", "", 4, "span ratio"),
    number("l", COEFFICIENT, "l", "m", 3, "span along the bars"),
    text("source", COEFFICIENT, "From", 13.0, "table or method of the coefficient"),
    number("r0", COEFFICIENT, "Ratio below", "", 2, "printed ratio below"),
    number("r1", COEFFICIENT, "Ratio above", "", 2, "printed ratio above"),
    number("b0", COEFFICIENT, "Cell below", "", 4, "table cell at the ratio below"),
    number("b1", COEFFICIENT, "Cell above", "", 4, "table cell at the ratio above"),
    number("beta", COEFFICIENT, "Coefficient", "", 5, "interpolated, or the value itself"),
    number("mtab", BALANCE, "M table", "kNm/m", 3, "moment from the coefficient"),
    number(
        "farend",
        BALANCE,
        "Far end",
        "",
        2,
        "0.75 where the far end of the span is discontinuous, else 1",
    ),
    number("stiff", BALANCE, "Stiffness", "mm3/m", 0, "h3/l times the factor of the far end"),
    number("mother", BALANCE, "M other", "kNm/m", 3, "table moment of the other panel at the support"),
    number("kother", BALANCE, "Stiffness other", "mm3/m", 0, "stiffness of the other panel's span"),
    number("diff", BALANCE, "Difference", "%", 2, "of the two moments, in percent of the larger"),
    number("mnew", BALANCE, "M balanced", "kNm/m", 3, "support: after release; midspan: what statics leaves"),
    number("m", BALANCE, "M design", "kNm/m", 3, "design moment"),
    number(
        "base",
        BENDING,
        "h for d",
        "mm",
        0,
        "thickness that d is measured in: at a step or unlike thicknesses from the lower top",
    ),
    number("out", BENDING, "Bars outside", "mm", 0, "size of the bars outside these"),
    number("dia", BENDING, "Size", "mm", 0, "bar size"),
    number("s", BENDING, "Spacing", "mm", 0, "centre to centre"),
    number("d", BENDING, "d", "mm", 1, "effective depth"),
    number("k", BENDING, "K", "", 5, "M/(b d2 fcu)"),
    number("kp", BENDING, "K'", "", 3, "its limit"),
    number("z", BENDING, "z", "mm", 2, "lever arm"),
    number("asb", BENDING, "As bending", "mm2/m", 1, "steel for bending"),
    number("hmin", STEEL, "h for minimum", "mm", 0, "thickness for minimum steel and spacing"),
    number("asmin", STEEL, "As minimum", "mm2/m", 1, "Table 3.25"),
    number("asked", STEEL, "As asked", "mm2/m", 1, "of bars without a moment of their own"),
    number("asreq", STEEL, "As required", "mm2/m", 1, "the greatest of the three"),
    number("asp", STEEL, "As provided", "mm2/m", 1, "of the bars"),
    text("steelok", STEEL, "Steel", 9.0, "passes or FAILS"),
    number("betab", STEEL, "beta_b", "", 2, "for spacing"),
    number("clear", STEEL, "Clear", "mm", 0, "clear spacing"),
    number("most", STEEL, "Clear limit", "mm", 1, "3.12.11.2.7"),
    text("spaceok", STEEL, "Spacing", 9.0, "passes or FAILS"),
    number("basic", DEFLECTION, "Basic", "", 0, "basic span/depth, Table 3.9"),
    number("fs", DEFLECTION, "fs", "N/mm2", 1, "service stress"),
    number("mf", DEFLECTION, "MF", "", 3, "modification factor, Table 3.10"),
    number("allowed", DEFLECTION, "Allowed", "", 2, "span/depth"),
    number("actual", DEFLECTION, "Actual", "", 2, "span/depth"),
    text("deflok", DEFLECTION, "Deflection", 9.0, "passes or FAILS"),
    number(
        "vcoef",
        SHEAR,
        "V/(n l)",
        "",
        4,
        "shear over n times lx (two-way) or l, from the table or analysis",
    ),
    number("v", SHEAR, "v", "N/mm2", 4, "shear stress"),
    number("rho", SHEAR, "100As/bd", "", 4, "between 0.15 and 3"),
    number("vc", SHEAR, "vc", "N/mm2", 4, "Table 3.8, not over the greatest stress of 3.5.5.2"),
    text("shearok", SHEAR, "Shear", 9.0, "passes or FAILS"),
];

impl WorkingColumn {
    pub(super) fn head(&self) -> Head {
        Head {
            group: self.group,
            heading: self.heading,
            unit: self.unit,
            width: self.width,
            kind: self.kind,
            key: Cow::Borrowed(""),
            meaning: Cow::Borrowed(self.meaning),
        }
    }
}

/// The columns for the documentation.
pub(in crate::write) fn descriptions() -> Vec<ColumnDescription> {
    COLUMNS.iter().map(|column| (&column.head()).into()).collect()
}

fn column_letters(index: usize) -> String {
    let mut index = index + 1;
    let mut letters = String::new();
    while index > 0 {
        let digit = u8::try_from((index - 1) % 26).unwrap_or(0);
        letters.insert(0, char::from(b'A' + digit));
        index = (index - 1) / 26;
    }
    letters
}

/// A cell that follows from others: formula in terms of columns, and its value.
enum Made {
    Blank,
    Value(f64),
    Words(String),
    Formula(String, f64),
    Verdict(String, &'static str),
}

/// The cells of a row. `first` is the row of the first section on the sheet, from 0.
pub(super) fn cells<'a>(
    submission: &Submission<'_>,
    rows: &[WorkingRow<'_>],
    index: usize,
    first: u32,
    cover: &BTreeMap<&'static str, String>,
) -> Vec<Cell<'a>> {
    let row = &rows[index];
    let at = |row: usize| u32::try_from(row).unwrap_or(0) + first + 1;
    COLUMNS
        .iter()
        .map(|column| match made(column.key, submission, rows, index) {
            Made::Blank => Cell::Blank,
            Made::Value(value) => Cell::Number(value),
            Made::Words(words) => Cell::from(words),
            Made::Formula(formula, value) => {
                Cell::Formula(resolved(&formula, row, index, &at, cover), Box::new(Cell::Number(value)))
            }
            Made::Verdict(formula, value) => {
                Cell::Formula(resolved(&formula, row, index, &at, cover), Box::new(Cell::from(value)))
            }
        })
        .collect()
}

/// A formula with its names replaced by cells.
fn resolved(
    formula: &str,
    row: &WorkingRow<'_>,
    index: usize,
    at: &dyn Fn(usize) -> u32,
    cover: &BTreeMap<&'static str, String>,
) -> String {
    let mut text = String::from("=");
    let mut rest = formula;
    while let Some((before, after)) = rest.split_once('{') {
        let (name, behind) = after.split_once('}').unwrap_or((after, ""));
        text.push_str(before);
        let (name, in_row) = match name.split_once('.') {
            Some(("other", name)) => (name, row.other.unwrap_or(index)),
            Some((number, name)) => (name, number.parse().unwrap_or(index)),
            None => (name, index),
        };
        match COLUMNS.iter().position(|column| column.key == name) {
            Some(column) => text.push_str(&format!("${}{}", column_letters(column), at(in_row))),
            None => text.push_str(cover.get(name).map_or("0", String::as_str)),
        }
        rest = behind;
    }
    text.push_str(rest);
    text
}

fn made(key: &str, submission: &Submission<'_>, rows: &[WorkingRow<'_>], index: usize) -> Made {
    let row = &rows[index];
    let panel = submission.floor.panel(row.design.panel);
    let (criteria, section, loads) = (&submission.book.criteria, row.section, &row.design.loads);
    let basis = row.design.basis;
    let formula = |text: &str, value: f64| Made::Formula(text.to_owned(), value);
    let value = |value: Option<f64>| value.map_or(Made::Blank, Made::Value);
    let moment = section.moment_knm_m;
    match key {
        "panel" => Made::Words(panel.mark.clone()),
        "at" => Made::Words(section.at.word(panel.is_loose()).to_owned()),
        "support" => Made::Words(section.support.map_or_else(String::new, |id| {
            words::support_name(submission.floor, submission.floor.support(id))
        })),
        "h" => Made::Value(panel.thickness_mm),
        "fin" => Made::Value(panel.loads.finishes_kn_m2),
        "part" => Made::Value(panel.loads.partitions_kn_m2),
        "qk" => Made::Value(panel.loads.imposed_kn_m2),
        "gk" => formula("{h}/1000*{concrete_density_kn_m3}+{fin}+{part}", loads.dead_kn_m2),
        "n" => formula("{dead_load_factor}*{gk}+{imposed_load_factor}*{qk}", loads.ultimate_kn_m2),
        "wall" => Made::Value(row.wall),
        "lx" => value(basis.map(|b| b.lx_m)),
        "ly" => value(basis.map(|b| b.ly_m)),
        "ratio" => basis.map_or(Made::Blank, |b| formula("{ly}/{lx}", b.span_ratio())),
        "l" => Made::Value(row.span_m()),
        "source" => Made::Words(row.source.to_owned()),
        "r0" | "r1" | "b0" | "b1" => match row.coefficient {
            Coefficient::Between { ratios, values } => Made::Value(match key {
                "r0" => ratios[0],
                "r1" => ratios[1],
                "b0" => values[0],
                _ => values[1],
            }),
            _ => Made::Blank,
        },
        "beta" => match row.coefficient {
            Coefficient::Between { .. } => formula(
                "{b0}+({b1}-{b0})*(MIN(2,MAX(1,{ratio}))-{r0})/({r1}-{r0})",
                section.coefficient.unwrap_or(0.0),
            ),
            Coefficient::Value(value) => Made::Value(value),
            Coefficient::None => Made::Blank,
        },
        "mtab" => match (row.action(), section.moment_from_coefficient_knm_m) {
            (_, None) => Made::Blank,
            (Some(Action::Cantilever), Some(m)) => formula("{beta}*{n}*{l}^2+{wall}", m),
            (Some(Action::OneWay), Some(m)) => formula("{beta}*({n}+{dead_load_factor}*{wall})*{l}^2", m),
            (_, Some(m)) => formula("{beta}*({n}+{dead_load_factor}*{wall})*{lx}^2", m),
        },
        "farend" | "stiff" | "mother" | "kother" | "diff" | "mnew" | "m" => {
            balance(key, submission, rows, index)
        }
        "base" => Made::Value(row.base_mm),
        "out" => Made::Value(row.outside_mm),
        "dia" => Made::Value(section.bars.bar_mm),
        "s" => Made::Value(section.bars.spacing_mm),
        "d" => {
            let cover =
                if matches!(section.layer, design_engine::floor::Layer::B1 | design_engine::floor::Layer::B2)
                {
                    "{base}-{bottom_cover_mm}-{out}-{dia}/2"
                } else {
                    "{base}-{top_cover_mm}-{out}-{dia}/2"
                };
            formula(cover, section.d_mm)
        }
        "k" => section.k.map_or(Made::Blank, |k| formula("MAX(0,{m})*1000000/(1000*{d}*{d}*{fcu_n_mm2})", k)),
        "kp" => {
            if moment.is_some() {
                Made::Value(row.k_limit)
            } else {
                Made::Blank
            }
        }
        "z" => {
            section.z_mm.map_or(Made::Blank, |z| formula("{d}*MIN(0.95,0.5+SQRT(MAX(0,0.25-{k}/0.9)))", z))
        }
        "asb" => section.as_bending_mm2_m.map_or(Made::Blank, |steel| {
            formula("MAX(0,{m})*1000000/({fy_n_mm2}/{steel_partial_factor}*{z})", steel)
        }),
        "hmin" => Made::Value(row.greatest_h_mm),
        "asmin" => formula(
            "IF({fy_n_mm2}<300,0.0024,0.0013)*1000*{hmin}",
            minimum_share(criteria.fy_n_mm2) * 1000.0 * row.greatest_h_mm,
        ),
        "asked" => {
            if moment.is_none() {
                Made::Value(row.asked_mm2_m)
            } else {
                Made::Blank
            }
        }
        "asreq" => match section.as_required_mm2_m {
            None => Made::Words("too thin".to_owned()),
            Some(steel) if moment.is_some() => formula("MAX({asb},{asmin})", steel),
            Some(steel) => formula("MAX({asked},{asmin})", steel),
        },
        "asp" => formula("PI()*{dia}^2/4*1000/{s}", section.as_provided_mm2_m),
        "steelok" => section.as_required_mm2_m.map_or_else(
            || Made::Words("FAILS".to_owned()),
            |steel| {
                verdict(
                    "IF(AND(ROUND({asreq}/{asp},9)<=1,{k}<={kp}),\"passes\",\"FAILS\")",
                    "IF(ROUND({asreq}/{asp},9)<=1,\"passes\",\"FAILS\")",
                    moment.is_some(),
                    steel <= section.as_provided_mm2_m * (1.0 + RATIO_TOLERANCE),
                )
            },
        ),
        "betab" => Made::Value(row.beta_b),
        "clear" => formula("{s}-{dia}", section.bars.spacing_mm - section.bars.bar_mm),
        "most" => formula(
            "IF(OR({hmin}<=IF({fy_n_mm2}<300,250,200),100*{asp}/(1000*{d})<0.3),MIN(3*{d},750),MIN(MIN(3*{d},750),MIN(70000*{betab}/{fy_n_mm2},300)/MIN(1,100*{asp}/(1000*{d}))))",
            greatest_clear(
                row.greatest_h_mm,
                section.d_mm,
                section.as_provided_mm2_m,
                criteria.fy_n_mm2,
                row.beta_b,
            ),
        ),
        "spaceok" => {
            let most = greatest_clear(
                row.greatest_h_mm,
                section.d_mm,
                section.as_provided_mm2_m,
                criteria.fy_n_mm2,
                row.beta_b,
            );
            let text = "IF(ROUND({clear}/{most},9)<=1,\"passes\",\"FAILS\")";
            verdict(
                text,
                text,
                true,
                section.bars.spacing_mm - section.bars.bar_mm <= most * (1.0 + RATIO_TOLERANCE),
            )
        }
        "basic" | "fs" | "mf" | "allowed" | "actual" | "deflok" => deflection(key, submission, row),
        _ => shear(key, submission, row),
    }
}

fn verdict(with_k: &str, without: &str, bending: bool, passes: bool) -> Made {
    let text = if bending { with_k } else { without };
    Made::Verdict(text.to_owned(), if passes { "passes" } else { "FAILS" })
}

fn balance(key: &str, submission: &Submission<'_>, rows: &[WorkingRow<'_>], index: usize) -> Made {
    let row = &rows[index];
    let section = row.section;
    let formula = |text: &str, value: f64| Made::Formula(text.to_owned(), value);
    let stiffness = |row: &WorkingRow<'_>| {
        let h = submission.floor.panel(row.design.panel).thickness_mm;
        design_engine::supports::stiffness(h, row.span_m(), far_discontinuous(row))
    };
    let other = row.other.map(|other| &rows[other]);
    let moment = section.moment_knm_m;
    match (key, other) {
        ("farend", _) if row.balances => Made::Value(if far_discontinuous(row) { 0.75 } else { 1.0 }),
        ("stiff", _) if row.balances => formula("{h}^3/{l}*{farend}", stiffness(row)),
        ("mother", Some(other)) => match other.section.moment_from_coefficient_knm_m {
            Some(m) if moment.is_some() => formula("{other.mtab}", m),
            _ => Made::Blank,
        },
        ("kother", Some(other)) if row.balances => formula("{other.stiff}", stiffness(other)),
        ("diff", Some(other)) => {
            match (section.moment_from_coefficient_knm_m, other.section.moment_from_coefficient_knm_m) {
                (Some(a), Some(b)) if moment.is_some() && a.max(b) > 0.0 => formula(
                    "100*ABS({mtab}-{mother})/MAX({mtab},{mother})",
                    100.0 * design_engine::supports::difference(a, b),
                ),
                _ => Made::Blank,
            }
        }
        ("mnew", _) => new_moment(row, moment),
        ("m", _) => design_moment(row, moment),
        _ => Made::Blank,
    }
}

fn new_moment(row: &WorkingRow<'_>, moment: Option<f64>) -> Made {
    let section = row.section;
    let Some(moment) = moment else { return Made::Blank };
    if row.is_support() {
        let text = match row.other {
            Some(_) if row.balances => {
                "IF(ROUND({diff},9)>{balance_threshold_pct},({mtab}*{kother}+{mother}*{stiff})/({stiff}+{kother}),MAX({mtab},{mother}))"
            }
            Some(_) => "MAX({mtab},{mother})",
            None => "{mtab}",
        };
        return Made::Formula(text.to_owned(), moment);
    }
    let Some(balanced) = section.moment_balanced_knm_m else { return Made::Blank };
    if row.action() != Some(Action::TwoWayRestrained) || section.moment_from_coefficient_knm_m.is_none() {
        return Made::Value(balanced);
    }
    // Midspan: table - half of what the two ends rose; of several stretches the smallest counts.
    let mut rise = String::new();
    for (supports, counted) in &row.ends {
        if let (Some(first), true) = (supports.first(), counted) {
            let new: Vec<String> = supports.iter().map(|row| format!("{{{row}.mnew}}")).collect();
            rise.push_str(&format!("+MIN({})-{{{first}.mtab}}", new.join(",")));
        }
    }
    let text = if rise.is_empty() {
        "{mtab}".to_owned()
    } else {
        format!("{{mtab}}-({})/2", rise.trim_start_matches('+'))
    };
    Made::Formula(text, balanced)
}

fn design_moment(row: &WorkingRow<'_>, moment: Option<f64>) -> Made {
    let Some(moment) = moment else { return Made::Blank };
    let section = row.section;
    match (row.is_support(), section.moment_from_coefficient_knm_m) {
        (true, _) => Made::Formula("{mnew}".to_owned(), moment),
        (false, Some(_)) => Made::Formula("MAX({mtab},{mnew})".to_owned(), moment),
        // A span that hogs throughout: its moment upwards.
        (false, None) => Made::Formula("-{mnew}".to_owned(), moment),
    }
}

fn far_discontinuous(row: &WorkingRow<'_>) -> bool {
    use design_engine::check::Place;
    use design_engine::floor::EdgeState;
    match (row.section.at, row.design.basis) {
        (Place::Side(side), Some(basis)) => basis.state(side.opposite()) != EdgeState::Continuous,
        _ => false,
    }
}

fn deflection(key: &str, submission: &Submission<'_>, row: &WorkingRow<'_>) -> Made {
    let section = row.section;
    let (Some(basic), Some(moment), Some(steel)) =
        (row.basic, section.moment_knm_m, section.as_bending_mm2_m)
    else {
        return Made::Blank;
    };
    let criteria = &submission.book.criteria;
    let fs = service_stress(criteria.fy_n_mm2, steel, section.as_provided_mm2_m);
    let mf = modification_factor(fs, moment, section.d_mm).max(0.01);
    let (allowed, actual) = (basic * mf, row.span_m() * 1000.0 / section.d_mm);
    let formula = |text: &str, value: f64| Made::Formula(text.to_owned(), value);
    match key {
        "basic" => Made::Value(basic),
        "fs" => formula("2*{fy_n_mm2}*{asb}/(3*{asp})", fs),
        "mf" => formula("MAX(0.01,MIN(2,0.55+(477-{fs})/(120*(0.9+{m}*1000000/(1000*{d}*{d})))))", mf),
        "allowed" => formula("{basic}*{mf}", allowed),
        "actual" => formula("{l}*1000/{d}", actual),
        _ => {
            let text = "IF(ROUND({actual}/{allowed},9)<=1,\"passes\",\"FAILS\")";
            verdict(text, text, true, actual <= allowed * (1.0 + RATIO_TOLERANCE))
        }
    }
}

fn shear(key: &str, submission: &Submission<'_>, row: &WorkingRow<'_>) -> Made {
    let (Some(coefficient), Some(basis)) = (row.shear_coefficient, row.design.basis) else {
        return Made::Blank;
    };
    let section = row.section;
    let criteria = &submission.book.criteria;
    let l = if row.two_way() { basis.lx_m } else { row.span_m() };
    let v = coefficient * row.design.loads.ultimate_kn_m2 * l / section.d_mm;
    let rho = (100.0 * section.as_provided_mm2_m / (1000.0 * section.d_mm)).clamp(0.15, 3.0);
    let most = vc(section.as_provided_mm2_m, section.d_mm, criteria.fcu_n_mm2)
        .min(greatest_stress(criteria.fcu_n_mm2));
    let formula = |text: &str, value: f64| Made::Formula(text.to_owned(), value);
    match key {
        "vcoef" => Made::Value(coefficient),
        "v" if row.two_way() => formula("{vcoef}*{n}*{lx}/{d}", v),
        "v" => formula("{vcoef}*{n}*{l}/{d}", v),
        "rho" => formula("MIN(3,MAX(0.15,100*{asp}/(1000*{d})))", rho),
        "vc" => formula(
            "MIN(0.79*({rho}*MIN({fcu_n_mm2},40)/25)^(1/3)*MAX(0.67,(400/{d})^(1/4))/1.25,0.8*SQRT({fcu_n_mm2}),5)",
            most,
        ),
        "shearok" => {
            let text = "IF(ROUND({v}/{vc},9)<=1,\"passes\",\"FAILS\")";
            verdict(text, text, true, v <= most * (1.0 + RATIO_TOLERANCE))
        }
        _ => Made::Blank,
    }
}
