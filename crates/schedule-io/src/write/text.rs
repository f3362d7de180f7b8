//! Text as a cell, a footer and a line of the cover can bear it.

use std::borrow::Cow;

/// UTF-16 units that a cell holds.
const LONGEST_CELL: usize = 32_767;

/// Text fit for a cell: control characters become spaces, what exceeds a cell's 32,767 units ends in `…`.
///
/// Text that reads `<r>…</r>` gets a trailing space: the workbook writer would take it for markup and write a
/// file that no program opens.
pub(super) fn for_cell(text: &str) -> Cow<'_, str> {
    let mut text = without_controls(text);
    if text.starts_with("<r>") && text.ends_with("</r>") {
        text = Cow::Owned(format!("{text} "));
    }
    if text.len() > LONGEST_CELL && text.encode_utf16().count() > LONGEST_CELL {
        text = Cow::Owned(cut(&text, LONGEST_CELL));
    }
    text
}

/// Text fit for a page footer: `&` is doubled, and at most `most` UTF-16 units are left.
pub(super) fn for_footer(text: &str, most: usize) -> String {
    let text = without_controls(text).replace('&', "&&");
    if text.encode_utf16().count() <= most {
        return text;
    }
    let cut = cut(&text, most);
    let ampersands = cut.trim_end_matches('…').chars().rev().take_while(|c| *c == '&').count();
    if ampersands % 2 == 0 { cut } else { cut.replace("&…", "…") }
}

/// Text broken into lines of at most `width` characters, at spaces where there are any.
pub(super) fn lines(text: &str, width: usize) -> Vec<String> {
    let mut lines = vec![String::new()];
    for word in text.split_whitespace() {
        let line = lines.last_mut().map_or(0, |line| line.chars().count());
        match lines.last_mut() {
            Some(last) if line == 0 => last.push_str(word),
            Some(last) if line + 1 + word.chars().count() <= width => {
                last.push(' ');
                last.push_str(word);
            }
            _ => lines.push(word.to_owned()),
        }
    }
    lines
}

/// How many lines a text takes in a cell `width` digits wide, on the safe side.
pub(super) fn line_count(text: &str, width: f64) -> u32 {
    // A margin for the cell's own, for bold letters and for other typefaces.
    let available = (width - 0.7) / 1.05;
    let mut lines = 1;
    let mut used = 0.0;
    for word in text.split_whitespace() {
        let word: f64 = word.chars().map(digits).sum();
        let with_space = if used > 0.0 { used + digits(' ') + word } else { word };
        if with_space <= available {
            used = with_space;
            continue;
        }
        lines += u32::from(used > 0.0);
        used = word;
        while used > available && available > 1.0 {
            lines += 1;
            used -= available;
        }
    }
    lines
}

/// Width of a character in widths of a digit, in the proportions of a usual sans-serif typeface.
fn digits(character: char) -> f64 {
    match character {
        ' ' | 'i' | 'j' | 'l' | '.' | ',' | ':' | ';' | '\'' => 0.5,
        'f' | 't' | 'r' | 's' | '(' | ')' | '/' | '-' => 0.75,
        'm' | 'w' | 'M' | 'W' => 1.65,
        'E' | 'F' | 'I' | 'J' | 'L' | 'P' | 'S' | 'T' => 0.95,
        'A'..='Z' => 1.25,
        c if c.is_ascii() => 1.0,
        _ => 2.0,
    }
}

fn without_controls(text: &str) -> Cow<'_, str> {
    if text.chars().any(char::is_control) {
        Cow::Owned(text.replace("\r\n", " ").replace(char::is_control, " "))
    } else {
        Cow::Borrowed(text)
    }
}

fn cut(text: &str, most: usize) -> String {
    let mut left = most - 1;
    let mut cut: String = text
        .chars()
        .take_while(|c| {
            let fits = c.len_utf16() <= left;
            left = if fits { left - c.len_utf16() } else { 0 };
            fits
        })
        .collect();
    cut.push('…');
    cut
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn text_that_begins_like_a_formula_is_left_alone() {
        for text in ["=1+1", "+44", "-3", "@name", "S1"] {
            assert_eq!(for_cell(text), text);
        }
    }

    #[test]
    fn control_characters_become_spaces() {
        assert_eq!(for_cell("a\r\nb\tc\u{0}d\u{1b}[0m"), "a b c d [0m");
    }

    #[test]
    fn markup_is_never_handed_on_as_such() {
        assert_eq!(for_cell("<r>a & b</r>"), "<r>a & b</r> ");
    }

    #[test]
    fn a_cell_is_cut_at_its_limit_and_says_so() {
        assert_eq!(for_cell(&"x".repeat(32_767)).len(), 32_767);
        let cut = for_cell(&"🏢".repeat(20_000)).into_owned();
        assert!(cut.encode_utf16().count() <= 32_767 && cut.ends_with('…'));
    }

    #[test]
    fn a_footer_keeps_its_ampersands_and_its_length() {
        assert_eq!(for_footer("Hill & Vale", 20), "Hill && Vale");
        for most in 4..12 {
            let cut = for_footer("ab&&&&cdefgh", most);
            assert!(cut.chars().count() <= most, "{cut}");
            assert_eq!(cut.matches('&').count() % 2, 0, "{cut}");
        }
    }

    #[test]
    fn lines_break_at_spaces_and_lose_no_word() {
        let text = "one two three four fiveandahalf";
        let broken = lines(text, 9);
        assert_eq!(broken, ["one two", "three", "four", "fiveandahalf"]);
    }

    #[test]
    fn lines_are_counted_on_the_safe_side() {
        for (text, width, expected) in [
            ("passes", 20.0, 1),
            ("all full length", 13.0, 1),
            ("alternate reversed", 13.0, 2),
            ("two adjacent edges discontinuous", 18.5, 2),
            ("", 5.0, 1),
            ("0123456789", 6.0, 2),
        ] {
            assert_eq!(line_count(text, width), expected, "{text}");
        }
    }
}
