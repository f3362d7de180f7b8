//! The title block: at the foot of every page and in the properties of the file.

use design_engine::criteria::Criteria;
use rust_xlsxwriter::{DocProperties, ExcelDateTime, XlsxError};

use super::{Submission, text};

/// The program's name, as every output prints it.
pub(super) const PROGRAM: &str = "baymat";
/// The creation date of a workbook whose book gives none.
const NO_DATE: (u16, u8, u8) = (2000, 1, 1);

/// What every reader must know before using a result.
pub(super) const CAUTION: [&str; 2] = [
    "Results are for review by a qualified engineer before use. Local codes, national rules and licensed practice govern.",
    "No warranty of any kind is given.",
];
const SHORT_CAUTION: &str = "For review by a qualified engineer; no warranty";

/// Footer: project, job and floor; drawing, people and date; page and caution. Fields are cut so that the
/// whole keeps within the 255 units a footer holds.
pub(super) fn footer(criteria: &Criteria) -> String {
    let field = |label: &str, value: &str, most: usize| {
        if value.is_empty() { String::new() } else { format!("{label} {}", text::for_footer(value, most)) }
    };
    let line = |fields: &[String]| {
        let fields: Vec<&str> = fields.iter().map(String::as_str).filter(|field| !field.is_empty()).collect();
        fields.join("  ")
    };
    let left = [
        line(&[text::for_footer(&criteria.project, 36)]),
        line(&[field("Job", &criteria.job_number, 12), text::for_footer(&criteria.floor, 24)]),
    ];
    let centre = [
        line(&[field("Drawing", &criteria.drawing_number, 16), field("Rev", &criteria.revision, 5)]),
        line(&[
            field("Prepared", &criteria.prepared_by, 12),
            field("Checked", &criteria.checked_by, 12),
            criteria.date.clone(),
        ]),
    ];
    // The space keeps a field's first digit from being read as part of the font size.
    format!(
        "&L&8 {}\n {}&C&8 {}\n {}&R&8page &P of &N\n{SHORT_CAUTION}",
        left[0], left[1], centre[0], centre[1]
    )
}

/// Properties of the file; its creation date is the book's date.
pub(super) fn properties(submission: &Submission<'_>) -> Result<DocProperties, XlsxError> {
    let criteria = &submission.book.criteria;
    let (year, month, day) = date(&criteria.date).unwrap_or(NO_DATE);
    let clean = |value: &str| text::for_cell(value).trim().to_owned();
    Ok(DocProperties::new()
        .set_title(clean(&format!("Slab reinforcement schedule {}", criteria.floor)))
        .set_subject(clean(&criteria.project))
        .set_author(clean(&criteria.prepared_by))
        .set_comment(format!("{PROGRAM} {}. {}", submission.version, CAUTION.join(" ")))
        .set_creation_datetime(&ExcelDateTime::from_ymd(year, month, day)?))
}

fn date(text: &str) -> Option<(u16, u8, u8)> {
    let mut parts = text.split('-');
    let date = (parts.next()?.parse().ok()?, parts.next()?.parse().ok()?, parts.next()?.parse().ok()?);
    parts.next().is_none().then_some(date)
}

#[cfg(test)]
mod tests {
    use super::*;
    use design_engine::criteria::Value;

    fn criteria(text: &str) -> Criteria {
        let keys =
            ["project", "job_number", "floor", "drawing_number", "revision", "prepared_by", "checked_by"];
        let mut values: Vec<(&str, Value)> =
            keys.iter().map(|key| (*key, Value::Text(text.to_owned()))).collect();
        values.push(("date", Value::Text("2031-05-06".to_owned())));
        Criteria::new(&values).unwrap()
    }

    #[test]
    fn the_longest_title_block_keeps_within_the_footers_limit() {
        for text in ["W".repeat(400), "&".repeat(400), "🏢".repeat(400)] {
            let footer = footer(&criteria(&text));
            assert!(footer.encode_utf16().count() <= 255, "{}", footer.encode_utf16().count());
            assert!(footer.contains("page &P of &N") && footer.contains("2031-05-06"), "{footer}");
        }
    }

    #[test]
    fn a_footer_without_a_title_block_has_pages_and_caution() {
        let footer = footer(&Criteria::default());
        assert!(footer.contains("page &P of &N\nFor review by a qualified engineer"), "{footer}");
        assert!(!footer.contains("Drawing"), "{footer}");
    }

    #[test]
    fn dates_are_read_as_the_criteria_allow_them() {
        assert_eq!(date("2031-05-06"), Some((2031, 5, 6)));
        assert_eq!(date(""), None);
    }
}
