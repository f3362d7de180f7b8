//! The one strict reading of numbers and lists of numbers from text.

/// Why a text is no number, with what to do about it.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(crate) struct NotANumber {
    pub(crate) remedy: String,
}

fn refuse<T>(remedy: impl Into<String>) -> Result<T, NotANumber> {
    Err(NotANumber { remedy: remedy.into() })
}

/// Decimal mark of a number as it was written.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Mark {
    None,
    Point,
    Comma,
}

/// A number from text: digits with one decimal point, perhaps a sign and an exponent, nothing else.
/// A decimal comma is accepted where `decimal_comma` says so.
pub(crate) fn number(text: &str, decimal_comma: bool) -> Result<(f64, Mark), NotANumber> {
    let trimmed = text.trim_matches([' ', '\t']);
    let plain = if decimal_comma && !trimmed.contains('.') && trimmed.matches(',').count() == 1 {
        trimmed.replace(',', ".")
    } else {
        trimmed.to_owned()
    };
    if !is_plain(&plain) {
        return refuse(remedy_for(trimmed));
    }
    let Ok(number) = plain.parse::<f64>() else { return refuse("write a number") };
    let mantissa = plain.split(['e', 'E']).next().unwrap_or_default();
    let vanished = number == 0.0 && mantissa.contains(|c: char| ('1'..='9').contains(&c));
    if !number.is_finite() || vanished {
        return refuse("write a number of ordinary size");
    }
    let mark = match (plain.contains('.'), trimmed.contains(',')) {
        (_, true) => Mark::Comma,
        (true, false) => Mark::Point,
        (false, false) => Mark::None,
    };
    Ok((number, mark))
}

/// Sign, digits with at most one point, exponent: what a number may look like.
fn is_plain(text: &str) -> bool {
    let unsigned = text.strip_prefix(['+', '-']).unwrap_or(text);
    let (mantissa, exponent) = match unsigned.split_once(['e', 'E']) {
        Some((mantissa, exponent)) => (mantissa, Some(exponent)),
        None => (unsigned, None),
    };
    let digits = |part: &str| part.bytes().all(|b| b.is_ascii_digit());
    let (whole, fraction) = mantissa.split_once('.').unwrap_or((mantissa, ""));
    let exponent_is_plain = exponent.is_none_or(|exponent| {
        let exponent = exponent.strip_prefix(['+', '-']).unwrap_or(exponent);
        !exponent.is_empty() && digits(exponent)
    });
    !(whole.is_empty() && fraction.is_empty()) && digits(whole) && digits(fraction) && exponent_is_plain
}

/// What to do about a text that is no plain number.
fn remedy_for(text: &str) -> String {
    if text.contains('\u{a0}') || text.contains('\u{202f}') || text.contains('\u{2009}') {
        return "remove the non-breaking space and write a plain number".to_owned();
    }
    if text.contains('\u{2212}') {
        return "write the minus sign as -".to_owned();
    }
    let without = text.replace(',', "");
    if text.contains(',') && is_plain(&without) {
        let commas = text.matches(',').count();
        return if text.contains('.') || commas > 1 {
            format!("write {without} without a thousands separator")
        } else {
            let point = text.replace(',', ".");
            let (before, after) = text.trim_start_matches(['-', '+']).split_once(',').unwrap_or_default();
            if after.len() == 3 && (1..=3).contains(&before.len()) && before != "0" {
                format!("it may mean {without} or {point}: write it without a comma")
            } else {
                format!("write {point} with a decimal point")
            }
        };
    }
    let folded = text.to_ascii_lowercase();
    if folded.starts_with("0x") {
        return "write a plain decimal number".to_owned();
    }
    let start = text.split(|c: char| !(c.is_ascii_digit() || matches!(c, '.' | ',' | '+' | '-'))).next();
    let start = start.unwrap_or_default();
    let rest = text[start.len()..].trim();
    let like_a_unit = rest == "%"
        || rest.contains('/')
        || ["mm", "cm", "m", "kn", "kpa", "mpa"].contains(&rest.to_lowercase().as_str());
    if is_plain(start) && like_a_unit {
        return format!("write {start} alone: the unit belongs in the heading");
    }
    "write a number".to_owned()
}

/// A list of numbers from text: parts set apart by commas, semicolons or spaces.
pub(crate) fn list(text: &str) -> Result<Vec<f64>, NotANumber> {
    text.split([',', ';', ' ', '\t', '\n', '\r'])
        .filter(|part| !part.is_empty())
        .map(|part| number(part, false).map(|(number, _)| number))
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn plain_numbers_are_read() {
        for (text, expected) in [
            ("2.5", 2.5),
            (" 2.5 ", 2.5),
            ("-3", -3.0),
            ("+0.25", 0.25),
            (".5", 0.5),
            ("5.", 5.0),
            ("1e3", 1000.0),
            ("1.5E-2", 0.015),
            ("0", 0.0),
            ("0e99", 0.0),
        ] {
            assert_eq!(number(text, false).map(|(n, _)| n), Ok(expected), "{text}");
        }
    }

    #[test]
    fn everything_else_is_refused_with_a_remedy() {
        for (text, remedy) in [
            ("nan", "write a number"),
            ("NaN", "write a number"),
            ("inf", "write a number"),
            ("-infinity", "write a number"),
            ("1e999", "write a number of ordinary size"),
            ("1e-999", "write a number of ordinary size"),
            ("0x1F", "write a plain decimal number"),
            ("2,5", "write 2.5 with a decimal point"),
            ("1,200", "it may mean 1200 or 1.200: write it without a comma"),
            ("0,200", "write 0.200 with a decimal point"),
            ("1,234.5", "write 1234.5 without a thousands separator"),
            ("1,234,567", "write 1234567 without a thousands separator"),
            ("5 kN/m2", "write 5 alone: the unit belongs in the heading"),
            ("150mm", "write 150 alone: the unit belongs in the heading"),
            ("10%", "write 10 alone: the unit belongs in the heading"),
            ("1\u{a0}234", "remove the non-breaking space and write a plain number"),
            ("\u{a0}2.5", "remove the non-breaking space and write a plain number"),
            ("\u{2212}2.5", "write the minus sign as -"),
            ("2,5x", "write a number"),
            ("1 2", "write a number"),
            ("1.2.3", "write a number"),
            ("1_000", "write a number"),
            ("--1", "write a number"),
            ("e5", "write a number"),
            (".", "write a number"),
            ("١٢", "write a number"),
            ("=1+1", "write a number"),
            ("½", "write a number"),
        ] {
            assert_eq!(number(text, false), Err(NotANumber { remedy: remedy.to_owned() }), "{text}");
        }
    }

    #[test]
    fn a_decimal_comma_is_read_only_where_the_file_allows_it() {
        assert_eq!(number("2,5", true), Ok((2.5, Mark::Comma)));
        assert_eq!(number("2.5", true), Ok((2.5, Mark::Point)));
        assert_eq!(number("-0,25", true), Ok((-0.25, Mark::Comma)));
        assert!(number("1.234,5", true).is_err());
        assert!(number("1,234,5", true).is_err());
        assert!(number("2,5", false).is_err());
    }

    #[test]
    fn lists_take_commas_semicolons_and_spaces() {
        for text in ["10, 12, 16", "10;12;16", "10 12 16", "10,12,16", " 10 ;  12,16 "] {
            assert_eq!(list(text), Ok(vec![10.0, 12.0, 16.0]), "{text}");
        }
        assert!(list("10 twelve").is_err());
        assert_eq!(list(""), Ok(vec![]));
    }
}
