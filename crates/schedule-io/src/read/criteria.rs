//! The `Criteria` sheet.

use std::collections::BTreeMap;

use design_engine::criteria::{Allowed, Criteria, SETTINGS, Setting, Value};
use design_engine::query::{Severity, Subject};

use super::cells::Content;
use super::headings::{apart, folded};
use super::numbers;
use super::rows::{Reported, Row, find_word, free_text, odd};
use super::units::{self, Scale};
use crate::book::DefaultUsed;
use crate::place::Places;
use crate::sheets::title;
use crate::starter::value_text;

/// An item of the sheet: its row and its setting.
struct Item<'a> {
    row: Row<'a>,
    setting: &'static Setting,
    printed: String,
}

/// Reads the rows of `Criteria`. Where a value is wrong its default stands in, so that the rest of the book
/// can be read.
pub(crate) fn read<'a>(
    rows: impl Iterator<Item = Row<'a>>,
    places: &mut Places,
) -> (Criteria, Vec<DefaultUsed>) {
    let names: BTreeMap<String, &'static Setting> = SETTINGS.iter().map(|s| (folded(s.item), s)).collect();
    let mut items: BTreeMap<&'static str, Item<'a>> = BTreeMap::new();
    let mut values: Vec<(&'static str, Value)> = Vec::new();
    for row in rows {
        let Ok(Some(item)) = item(row, &names) else { continue };
        if let Some(first) = items.get(item.setting.key) {
            let text = format!("the item is already in row {}", first.row.raw.number);
            item.error(text, "keep one of the two rows");
            continue;
        }
        places.settings.insert(item.setting.item, (item.row.raw.number, item.printed.clone()));
        if let Ok(value) = item.value() {
            values.push((item.setting.key, value));
        }
        items.insert(item.setting.key, item);
    }
    let criteria = Criteria::new(&values).unwrap_or_else(|faults| {
        for fault in faults {
            contradiction(&fault.allowed, fault.setting, &items);
        }
        Criteria::default()
    });
    let given = |key: &str| values.iter().any(|(given, value)| *given == key && *value != Value::Blank);
    let defaults_used = SETTINGS
        .iter()
        .filter(|setting| setting.default_value() != Value::Blank && !given(setting.key))
        .map(|setting| DefaultUsed { key: setting.key })
        .collect();
    (criteria, defaults_used)
}

/// Values that are each allowed but not together.
fn contradiction(allowed: &str, setting: &'static Setting, items: &BTreeMap<&'static str, Item<'_>>) {
    if let Some(item) = items.get(setting.key) {
        item.refuse(allowed, "correct the two values");
    } else if let Some(any) = items.values().next() {
        // The value at fault is a default: the item that contradicts it is on the sheet.
        let name = title(setting.item, setting.unit);
        let default = value_text(&setting.default_value());
        let text = format!("{name} takes its default, {default}; allowed {allowed}");
        let whole = any.row.table.raw.place(None, None, None);
        any.row.report().say(
            Severity::Error,
            Subject::Setting(setting.item),
            whole,
            text,
            "state both values",
        );
    }
}

/// The item that a row names; none for a row that holds only a remark.
fn item<'a>(row: Row<'a>, names: &BTreeMap<String, &'static Setting>) -> Result<Option<Item<'a>>, Reported> {
    let Some(printed) = row.name("Item")? else {
        return if row.content("Value").is_filled() { row.filled("Item", Ok(None)) } else { Ok(None) };
    };
    if let Some(setting) = names.get(&folded(apart(&printed).0)) {
        return Ok(Some(Item { row, setting, printed }));
    }
    let near = row.nearest(apart(&printed).0, SETTINGS.iter().map(|setting| setting.item));
    let text = format!("read {}; no item has this name", row.content("Item").shown());
    Err(row.error("Item", text, format!("correct the name or delete the row{near}")))
}

impl Item<'_> {
    fn error(&self, text: impl Into<String>, remedy: impl Into<String>) -> Reported {
        self.say(Severity::Error, text, remedy);
        Reported
    }

    fn say(&self, severity: Severity, text: impl Into<String>, remedy: impl Into<String>) {
        let mut place = self.row.place("Value");
        place.heading = Some(self.printed.clone());
        self.row.report().say(severity, Subject::Setting(self.setting.item), place, text, remedy);
    }

    fn refuse(&self, allowed: &str, remedy: impl Into<String>) -> Reported {
        self.error(format!("read {}; allowed {allowed}", self.row.content("Value").shown()), remedy)
    }

    fn odd(&self, retype: &str) -> Reported {
        let (text, remedy) = odd(self.row.content("Value"), &self.setting.allowed.describe(), retype);
        self.error(text, remedy)
    }

    fn value(&self) -> Result<Value, Reported> {
        if !self.row.fits {
            return Err(Reported);
        }
        let content = self.row.content("Value");
        let measured = !matches!(self.setting.allowed, Allowed::Text | Allowed::Date | Allowed::Words(_));
        let scale = if measured { self.scale() } else { Ok(Scale::SAME) };
        if content.is_blank() {
            return scale.map(|_| Value::Blank);
        }
        match self.setting.allowed {
            Allowed::Text => self.text(content),
            Allowed::Date => self.date(content),
            Allowed::Words(words) => self.word(content, words),
            Allowed::Number(_) | Allowed::OneOf(_) => self.number(content, scale?),
            Allowed::List(_) | Allowed::ListOf(_) => self.list(content, scale?),
        }
    }

    /// From the unit that the item or the `Unit` column gives to the stated one.
    fn scale(&self) -> Result<Scale, Reported> {
        let in_brackets = apart(&self.printed).1.map(str::to_owned);
        let in_column = Some(self.row.text("Unit")?).filter(|unit| !unit.is_empty());
        let mut scales = Vec::new();
        for (heading, unit) in [("Item", in_brackets), ("Unit", in_column)] {
            let Some(unit) = unit else { continue };
            let Some(scale) = units::scale(&unit, self.setting.unit) else {
                let allowed = units::allowed(self.setting.unit);
                let text = format!("the unit is \"{unit}\"; allowed {allowed}");
                return Err(self.row.error(heading, text, "correct the unit, and the value with it"));
            };
            scales.push(scale);
        }
        match scales[..] {
            [first, second] if first != second => Err(self.row.error(
                "Unit",
                format!("read {}; the item gives another unit", self.row.content("Unit").shown()),
                "give the unit once",
            )),
            [first, ..] => Ok(first),
            [] => Ok(Scale::SAME),
        }
    }

    fn text(&self, content: &Content) -> Result<Value, Reported> {
        let text = free_text(content).map_err(|why| match why {
            Some((allowed, remedy)) => self.refuse(allowed, remedy),
            None => self.odd("write text"),
        })?;
        if matches!(content, Content::Merged { .. }) {
            return Err(self.odd("write text"));
        }
        Ok(Value::Text(text))
    }

    fn date(&self, content: &Content) -> Result<Value, Reported> {
        let value = match content {
            Content::Date { day: Some(day), .. } => Value::Text(day.clone()),
            Content::Text(text) => Value::Text(text.trim().to_owned()),
            Content::Number(_) => {
                return Err(self.odd("give the cell a date format or write the date as text"));
            }
            _ => return Err(self.odd("write a date")),
        };
        self.accepted(value, "write year, month and day as in 2026-03-31")
    }

    fn word(&self, content: &Content, words: &'static [&'static str]) -> Result<Value, Reported> {
        let Content::Text(text) = content else { return Err(self.odd("write one of these words")) };
        match find_word(text, words) {
            Some(index) => Ok(Value::Text(words[index].to_owned())),
            None => {
                let near = self.row.nearest(text, words.iter().copied());
                Err(self.refuse(&self.setting.allowed.describe(), format!("write one of these words{near}")))
            }
        }
    }

    fn number(&self, content: &Content, scale: Scale) -> Result<Value, Reported> {
        let number = match content {
            Content::Number(number) => *number,
            Content::Text(text) => self.row.plain_number("Value", text).map_err(|unfit| {
                let allowed = unfit.allowed.map_or_else(|| self.setting.allowed.describe(), str::to_owned);
                self.refuse(&allowed, unfit.remedy)
            })?,
            Content::Date { .. } => {
                return Err(self.odd("give the cell a plain number format and type the number again"));
            }
            _ => return Err(self.odd("write a number")),
        };
        let value = scale.apply(number);
        if self.setting.unit == "%" && value > 0.0 && value < 1.0 {
            self.say(
                Severity::Warning,
                format!("read {}, taken as {value} %", content.shown()),
                "a cell formatted as a percentage holds a hundredth of what it shows: write the number alone",
            );
        }
        self.accepted(Value::Number(value), "correct the number")
    }

    fn list(&self, content: &Content, scale: Scale) -> Result<Value, Reported> {
        // A spreadsheet takes 150,175 for one number and 10.12 for a date.
        let as_a_list = match self.setting.allowed {
            Allowed::ListOf(_) => "a list typed as 10,12 may have arrived as 1012: write 10; 12",
            _ => "a list typed as 150,175 may have arrived as 150175: write 150; 175",
        };
        let parts = match content {
            Content::Number(number) => vec![*number],
            Content::Text(text) => numbers::list(text).map_err(|why| {
                let describe = self.setting.allowed.describe();
                self.refuse(&describe, why.remedy)
            })?,
            Content::Date { .. } => return Err(self.odd(as_a_list)),
            _ => return Err(self.odd("write a list of numbers")),
        };
        let remedy = if parts.len() == 1 { as_a_list } else { "correct the list" };
        let parts: Vec<f64> = parts.into_iter().map(|part| scale.apply(part)).collect();
        self.accepted(Value::Numbers(parts), remedy)
    }

    fn accepted(&self, value: Value, remedy: &str) -> Result<Value, Reported> {
        if self.setting.allowed.accepts(&value) {
            return Ok(value);
        }
        let allowed = self.setting.allowed.describe();
        let printed = apart(&self.printed).1.and_then(|unit| units::scale(unit, self.setting.unit));
        let unit = match printed {
            Some(scale) if !scale.changes() => String::new(),
            _ if self.setting.unit.is_empty() => String::new(),
            _ => format!(" {}", self.setting.unit),
        };
        Err(self.refuse(&format!("{allowed}{unit}"), remedy))
    }
}
