//! The limits file: TOML, every key known, every value in its range.

use super::near::nearest;
use super::settings::{Limits, SETTINGS, Table, Watches};
use crate::angle::wrap_360_deg;
use crate::error::{BadValue, Error, Result};
use toml::Spanned;
use toml::de::{DeTable, DeValue};

/// The limits file being read, for messages that name the line.
struct File<'t> {
    text: &'t str,
    name: &'t str,
}

impl File<'_> {
    fn refuse(&self, at: usize, message: impl Into<String>) -> Error {
        let line = 1 + self.text.bytes().take(at).filter(|b| *b == b'\n').count() as u64;
        Error::Content { file: self.name.to_owned(), line, message: message.into() }
    }

    /// "..., did you mean ...?"
    fn unknown<'w>(&self, at: usize, what: &str, text: &str, known: impl Iterator<Item = &'w str> + Clone) -> Error {
        let tail = nearest(text, known.clone())
            .map_or_else(|| format!("the keys are {}", known.collect::<Vec<_>>().join(", ")), |word| format!("is it {word}?"));
        self.refuse(at, format!("no {what} is called {:?}; {tail}", BadValue::new(text, "").value))
    }
}

impl Limits {
    /// The built-in limits with those of a TOML file over them; `file_name` stands in messages.
    ///
    /// # Errors
    /// [`Error::Content`] with the line, for what is not TOML, an unknown table or key (with the nearest right one), a value of
    /// the wrong kind or out of its range.
    ///
    /// # Example
    /// ```
    /// use shadowpin::limits::Limits;
    /// let limits = Limits::from_toml("[limits]\ndeviation = 7\n", "canal.toml")?;
    /// assert_eq!(limits.thresholds.deviation_deg, 7.0);
    /// assert!(Limits::from_toml("[limits]\ndeviaton = 7\n", "canal.toml").unwrap_err().to_string().ends_with("is it deviation?"));
    /// # Ok::<(), shadowpin::error::Error>(())
    /// ```
    pub fn from_toml(text: &str, file_name: &str) -> Result<Self> {
        let file = File { text, name: file_name };
        let root = DeTable::parse(text).map_err(|e| file.refuse(e.span().map_or(0, |s| s.start), e.message()))?;
        let mut limits = Self::default();
        for (name, content) in root.get_ref() {
            let at = name.span().start;
            let Some(table) = content.get_ref().as_table() else {
                return Err(
                    file.refuse(at, format!("{} stands in no table; put it under [limits], [uncertainty] or [ship]", name.get_ref()))
                );
            };
            match name.get_ref().as_ref() {
                "limits" => limits.read_numbers(&file, Table::Limits, table)?,
                "uncertainty" => limits.read_numbers(&file, Table::Uncertainty, table)?,
                "ship" => limits.read_ship(&file, table)?,
                other => return Err(file.unknown(at, "table", other, ["limits", "uncertainty", "ship"].into_iter())),
            }
        }
        limits.consistent(&file, root.get_ref().get("limits").and_then(|t| t.get_ref().as_table()))?;
        Ok(limits)
    }

    fn read_numbers(&mut self, file: &File, table: Table, content: &DeTable) -> Result<()> {
        for (key, value) in content {
            let (name, at) = (key.get_ref().as_ref(), key.span().start);
            if table == Table::Limits && name == "watches" {
                self.watches = watches(file, value)?;
                continue;
            }
            let Some(setting) = SETTINGS.iter().find(|s| s.table == table && s.key == name) else {
                if let Some(home) = home_of(name) {
                    return Err(file.refuse(at, format!("{name} stands under [{}]; its place is [{home}]", table.name())));
                }
                let known = SETTINGS.iter().filter(move |s| s.table == table).map(|s| s.key);
                let watches = (table == Table::Limits).then_some("watches");
                return Err(file.unknown(at, &format!("setting of [{}]", table.name()), name, known.chain(watches)));
            };
            let expected = || {
                let unit = if setting.unit.is_empty() { String::new() } else { format!(" {}", setting.unit) };
                format!("{name} = {}: expected a number from {} to {}{unit}", shown(file, value), setting.least, setting.most)
            };
            let number = number(value.get_ref()).ok_or_else(|| file.refuse(value.span().start, expected()))?;
            if !(setting.least..=setting.most).contains(&number) {
                return Err(file.refuse(value.span().start, expected()));
            }
            (setting.set)(self, number);
        }
        Ok(())
    }

    fn read_ship(&mut self, file: &File, content: &DeTable) -> Result<()> {
        for (key, value) in content {
            if key.get_ref() != "blind_arcs" {
                if let Some(home) = home_of(key.get_ref()) {
                    return Err(file.refuse(key.span().start, format!("{} stands under [ship]; its place is [{home}]", key.get_ref())));
                }
                return Err(file.unknown(key.span().start, "setting of [ship]", key.get_ref(), ["blind_arcs"].into_iter()));
            }
            let refuse = |value: &Spanned<DeValue>| {
                file.refuse(
                    value.span().start,
                    format!(
                        "blind_arcs, {}: expected pairs of relative bearings from 0 to 360, clockwise, such as [[150, 175], [185, 210]]",
                        shown(file, value)
                    ),
                )
            };
            for pair in value.get_ref().as_array().ok_or_else(|| refuse(value))? {
                let ends: Option<Vec<f64>> = pair.get_ref().as_array().and_then(|ends| ends.iter().map(|e| number(e.get_ref())).collect());
                match ends.as_deref() {
                    // 360 is 000; an arc that ends where it begins, 0 to 360 too, leaves nothing or everything to be seen.
                    Some([from, to])
                        if [from, to].into_iter().all(|end| (0.0..=360.0).contains(end)) && wrap_360_deg(*from) != wrap_360_deg(*to) =>
                    {
                        self.ship.blind_arcs.push((wrap_360_deg(*from), wrap_360_deg(*to)));
                    }
                    _ => return Err(refuse(pair)),
                }
            }
        }
        Ok(())
    }

    /// Settings that must stand in order.
    fn consistent(&self, file: &File, table: Option<&DeTable>) -> Result<()> {
        let t = &self.thresholds;
        for (low, low_key, high, high_key) in [
            (t.altitude_fair_deg, "altitude_fair", t.altitude_weak_deg, "altitude_weak"),
            (t.off_card_deg, "off_card", t.off_card_once_deg, "off_card_once"),
        ] {
            if low > high {
                // The one of the two that was set; it stands there, or the built-in values would be out of order.
                let at = table
                    .into_iter()
                    .flat_map(|t| t.iter())
                    .find(|(key, _)| [low_key, high_key].contains(&key.get_ref().as_ref()))
                    .map_or(0, |(key, _)| key.span().start);
                return Err(file.refuse(at, format!("{low_key} ({low}) is over {high_key} ({high})")));
            }
        }
        Ok(())
    }
}

/// The table that a key belongs to, whichever it was found in.
fn home_of(key: &str) -> Option<&'static str> {
    match key {
        "watches" => Some("limits"),
        "blind_arcs" => Some("ship"),
        _ => SETTINGS.iter().find(|s| s.key == key).map(|s| s.table.name()),
    }
}

fn watches(file: &File, value: &Spanned<DeValue>) -> Result<Watches> {
    [Watches::FourOnEightOff, Watches::SixOnSixOff]
        .into_iter()
        .find(|w| value.get_ref().as_str() == Some(w.word()))
        .ok_or_else(|| file.refuse(value.span().start, format!("watches = {}: expected \"4on8off\" or \"6on6off\"", shown(file, value))))
}

/// The value as it stands in the file, cut to a printable length.
fn shown(file: &File, value: &Spanned<DeValue>) -> String {
    BadValue::new(file.text.get(value.span()).unwrap_or_default(), "").value
}

/// A finite number, whole or not.
fn number(value: &DeValue) -> Option<f64> {
    let text = match value {
        DeValue::Integer(whole) if whole.radix() == 10 => whole.as_str(),
        DeValue::Float(decimal) => decimal.as_str(),
        _ => return None,
    };
    text.parse().ok().filter(|n: &f64| n.is_finite())
}

#[cfg(test)]
mod tests {
    use super::*;

    fn refused(text: &str) -> String {
        Limits::from_toml(text, "ship.toml").unwrap_err().to_string()
    }

    #[test]
    fn every_setting_can_be_set_and_its_default_is_in_range() {
        for setting in SETTINGS {
            assert!((setting.least..=setting.most).contains(&setting.default), "{}", setting.key);
            assert_eq!((setting.get)(&Limits::default()), setting.default, "{}", setting.key);
            let twin = SETTINGS.iter().filter(|s| s.table == setting.table && s.key == setting.key).count();
            assert_eq!(twin, 1, "{} stands twice", setting.key);
        }
        let all = |table: Table| {
            SETTINGS.iter().filter(move |s| s.table == table).map(|s| format!("{} = {:?}\n", s.key, s.most)).collect::<String>()
        };
        let text = format!("[limits]\n{}watches = \"6on6off\"\n[uncertainty]\n{}", all(Table::Limits), all(Table::Uncertainty));
        let limits = Limits::from_toml(&text, "all.toml").unwrap();
        for setting in SETTINGS {
            assert_eq!((setting.get)(&limits), setting.most, "{}", setting.key);
        }
        assert_eq!(limits.watches.hours(), 6);
    }

    #[test]
    fn mistakes_are_named_with_their_line() {
        assert_eq!(
            refused("[limits]\ndeviaton = 7\n"),
            "ship.toml, line 2: no setting of [limits] is called \"deviaton\"; is it deviation?"
        );
        assert_eq!(refused("\n[limit]\n"), "ship.toml, line 2: no table is called \"limit\"; is it limits?");
        assert_eq!(refused("[limits]\ndeviation = -7\n"), "ship.toml, line 2: deviation = -7: expected a number from 0 to 45 degrees");
        assert_eq!(refused("[limits]\ndeviation = nan\n"), "ship.toml, line 2: deviation = nan: expected a number from 0 to 45 degrees");
        assert_eq!(
            refused("[limits]\ndeviation = \"5\"\n"),
            "ship.toml, line 2: deviation = \"5\": expected a number from 0 to 45 degrees"
        );
        assert_eq!(
            refused("[limits]\nwatches = \"3on9off\"\n"),
            "ship.toml, line 2: watches = \"3on9off\": expected \"4on8off\" or \"6on6off\""
        );
        assert!(refused("deviation = 7\n").contains("stands in no table"));
        for arc in ["[10]", "[10, \"x\", 20]", "[350, 400]", "[90, 90]", "[0, 360]", "10", "[1, 2, 3]"] {
            assert!(refused(&format!("[ship]\nblind_arcs = [{arc}]\n")).contains(&format!("blind_arcs, {arc}: expected pairs")), "{arc}");
        }
        assert!(refused("[limits]\naltitude_fair = 50\naltitude_weak = 40\n").contains("altitude_fair (50) is over altitude_weak (40)"));
        assert_eq!(refused("# off_card\n[limits]\noff_card_once = 2\n"), "ship.toml, line 3: off_card (3) is over off_card_once (2)");
        assert_eq!(refused("[limits]\ntilt = 0.3\n"), "ship.toml, line 2: tilt stands under [limits]; its place is [uncertainty]");
        assert_eq!(refused("[ship]\nwatches = \"4on8off\"\n"), "ship.toml, line 2: watches stands under [ship]; its place is [limits]");
        assert!(refused("[limits]\nblind_arcs = []\n").ends_with("its place is [ship]"));
        assert!(refused("[limits\n").starts_with("ship.toml, line 1: "));
    }

    #[test]
    fn blind_arcs() {
        let limits = Limits::from_toml("[ship]\nblind_arcs = [[150, 175.5], [185, 210]]\n", "ship.toml").unwrap();
        assert_eq!(limits.ship.blind_arcs, [(150.0, 175.5), (185.0, 210.0)]);
        let across_the_bow = Limits::from_toml("[ship]\nblind_arcs = [[350, 360]]\n", "ship.toml").unwrap();
        assert_eq!(across_the_bow.ship.blind_arcs, [(350.0, 0.0)]);
    }
}
