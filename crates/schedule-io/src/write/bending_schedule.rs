//! Sheet `Bending schedule`: the form of BS 8666:2005, a row per mark, in order of fixing, with totals by page and by size.

use detailing::model::{ScheduledBar, Use};
use detailing::notes::{BarPlace, place_words, places};
use rust_xlsxwriter::Worksheet;

use super::column::{Cell, Column, Head};
use super::look::Tone;
use super::sink::RowSink;
use super::{Submission, WriteError};

pub(super) const NAME: &str = "Bending schedule";
const FROZEN_COLUMNS: u16 = 2;
/// Marks on a printed page, between its headings and its total.
const BARS_ON_A_PAGE: usize = 34;
/// Letters of `Where` in one line.
const PLACES_IN_A_LINE: usize = 60;
/// At which the columns fill the width of an A3 page.
const PRINT_SCALE_PCT: u16 = 96;
/// Places named in a row before `and so many more`.
const MOST_PLACES: usize = 8;

/// A row: a mark, or words and a mass.
pub(crate) struct ScheduleRow<'a> {
    pub(crate) bar: Option<&'a ScheduledBar>,
    member: String,
    letter: &'a str,
    place: String,
    mass_kg: Option<f64>,
}

impl<'a> ScheduleRow<'a> {
    fn total(text: String, mass_kg: f64) -> ScheduleRow<'a> {
        ScheduleRow { bar: None, member: text, letter: "", place: String::new(), mass_kg: Some(mass_kg) }
    }

    fn words(text: String) -> ScheduleRow<'a> {
        ScheduleRow { bar: None, member: text, letter: "", place: String::new(), mass_kg: None }
    }
}

/// One row per mark.
pub(super) fn rows<'a>(submission: &'a Submission<'a>) -> Vec<ScheduleRow<'a>> {
    let criteria = &submission.book.criteria;
    let member = format!("Slab {}", criteria.floor).trim().to_owned();
    let places = places(submission.bars);
    let row = |(bar, places): (&'a ScheduledBar, &Vec<BarPlace>)| ScheduleRow {
        bar: Some(bar),
        member: member.clone(),
        letter: criteria.bar_type_letter(),
        place: place_words(submission.floor, places, MOST_PLACES),
        mass_kg: Some(bar.mass_kg),
    };
    submission.bars.bars.iter().zip(&places).map(row).collect()
}

pub(super) fn write(submission: &Submission<'_>, worksheet: &mut Worksheet) -> Result<(), WriteError> {
    let columns = columns();
    let heads: Vec<Head> = columns.iter().map(|column| column.head.clone()).collect();
    let mut sink = RowSink::with_headings(worksheet, NAME, &heads, FROZEN_COLUMNS)?;
    let mut breaks = Vec::new();
    let (mut on_page, mut page, mut page_mass) = (0, 1, 0.0);
    let mut group: Option<(Use, &str)> = None;
    for row in &rows(submission) {
        let Some(bar) = row.bar else { continue };
        let own = (bar.for_what, bar.layer.word());
        if group != Some(own) {
            group = Some(own);
            put(&mut sink, &columns, Tone::Section, &ScheduleRow::words(group_words(bar)))?;
            on_page += 1;
        }
        put(&mut sink, &columns, Tone::Plain, row)?;
        on_page += 1 + row.place.chars().count() / PLACES_IN_A_LINE;
        page_mass += bar.mass_kg;
        if on_page >= BARS_ON_A_PAGE {
            let next = put(
                &mut sink,
                &columns,
                Tone::Section,
                &ScheduleRow::total(format!("Mass of page {page}"), page_mass),
            )?;
            breaks.push(next);
            (on_page, page, page_mass) = (0, page + 1, 0.0);
        }
    }
    if on_page > 0 {
        put(
            &mut sink,
            &columns,
            Tone::Section,
            &ScheduleRow::total(format!("Mass of page {page}"), page_mass),
        )?;
    }
    put(&mut sink, &columns, Tone::Plain, &ScheduleRow::words(String::new()))?;
    put(&mut sink, &columns, Tone::Section, &ScheduleRow::words("Mass by size".to_owned()))?;
    let quantities = &submission.bars.quantities;
    let letter = submission.book.criteria.bar_type_letter();
    for (size, kg) in &quantities.steel_kg_by_size {
        put(&mut sink, &columns, Tone::Plain, &ScheduleRow::total(format!("{letter}{size}"), *kg))?;
    }
    put(&mut sink, &columns, Tone::Section, &ScheduleRow::total("All".to_owned(), quantities.steel_kg))?;
    let worksheet = sink.close()?;
    // Spreadsheet programs that fit a sheet to the page's width pass over its page breaks.
    worksheet.set_print_scale(PRINT_SCALE_PCT).set_page_breaks(&breaks)?;
    Ok(())
}

fn put<'a>(
    sink: &mut RowSink<'_>,
    columns: &[Column<'a, ScheduleRow<'a>>],
    tone: Tone,
    row: &ScheduleRow<'a>,
) -> Result<u32, WriteError> {
    sink.append(tone, columns.iter().map(|column| (column.value)(row)))?;
    Ok(sink.next_row())
}

/// `Bottom bars B1`.
fn group_words(bar: &ScheduledBar) -> String {
    let mut text = format!("{} {}", bar.for_what.word(), bar.layer.word());
    if let Some(first) = text.get_mut(..1) {
        first.make_ascii_uppercase();
    }
    text
}

#[expect(clippy::cast_precision_loss, reason = "bars of a floor are far below 2^53")]
fn count(number: usize) -> f64 {
    number as f64
}

pub(super) fn columns<'a>() -> Vec<Column<'a, ScheduleRow<'a>>> {
    let dimension = |heading, index: usize, meaning| {
        Column::number(heading, "mm", 0, move |r: &ScheduleRow<'_>| {
            r.bar.and_then(|bar| bar.bar.shape.dimensions()[index])
        })
        .means(meaning)
    };
    let of_bar = |heading, decimals, value: fn(&ScheduledBar) -> f64| {
        Column::number(heading, "", decimals, move |r: &ScheduleRow<'_>| r.bar.map(value))
    };
    vec![
        Column::words("Member", 24.0, |r: &ScheduleRow<'_>| r.member.clone())
            .means("the slab; also the heads of groups and totals"),
        Column::mark("Bar mark", |r: &ScheduleRow<'a>| r.bar.map(|bar| bar.mark.as_str()))
            .wide(7.0)
            .key("mark")
            .means("one bar, one mark over the floor, numbered in order of fixing"),
        Column::short("Type and size", 8.0, |r: &ScheduleRow<'_>| {
            r.bar.map(|bar| format!("{}{}", r.letter, bar.bar.size_mm))
        })
        .means("type letter and nominal size in mm"),
        of_bar("No. of mbrs", 0, |_| 1.0).key("members").means("number of members: the floor is one"),
        of_bar("No. of bars in each", 0, |bar| count(bar.count)).key("each").means("number in each member"),
        of_bar("Total no.", 0, |bar| count(bar.count)).key("total").means("members times number in each"),
        Column::number("Length of each bar", "mm", 0, |r: &ScheduleRow<'_>| r.bar.map(|bar| bar.length_mm))
            .wide(9.0)
            .key("length_mm")
            .means("length by BS 8666:2005, up to whole 25 mm"),
        Column::short("Shape code", 7.0, |r: &ScheduleRow<'a>| r.bar.map(|bar| bar.bar.shape.code()))
            .key("shape")
            .means("BS 8666:2005: 00 straight, 11 one bend, 13 half round, 21 two bends"),
        dimension("A", 0, "first dimension, whole 5 mm").key("a_mm"),
        dimension("B", 1, "second dimension").key("b_mm"),
        dimension("C", 2, "third dimension").key("c_mm"),
        dimension("D", 3, "fourth dimension").key("d_mm"),
        dimension("E/R", 4, "fifth dimension, or radius").key("e_r_mm"),
        Column::short("Rev letter", 6.0, |r: &ScheduleRow<'a>| r.bar.map(|bar| bar.revision.as_str()))
            .means("letter of the revision that brought the row; blank on a first issue"),
        Column::number("Mass", "kg", 1, |r: &ScheduleRow<'_>| r.mass_kg)
            .wide(9.0)
            .key("mass_kg")
            .means("mass of all bars of the mark"),
        Column::words("Where", 62.0, |r: &ScheduleRow<'_>| Cell::from(r.place.clone()))
            .means("panels and supports, each with its number of bars"),
    ]
}
