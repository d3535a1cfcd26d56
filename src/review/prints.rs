//! Copies among the last rows of a vessel, told by a number for each row's time and readings.

/// Rows of a vessel that are looked at for a copy.
const RECENT: usize = 64;

/// The last rows of a vessel, and its first ones: where these are a part of a log, what they copy may stand in the part before.
#[derive(Debug, Clone, Default)]
pub struct Prints {
    first: Vec<(u64, u64)>,
    /// The last ones, round and round; the oldest at `oldest`.
    last: Vec<(u64, u64)>,
    oldest: usize,
}

impl Prints {
    /// Takes the next row's print and number; answers the row, and the oldest of the last ones, which it copies.
    pub fn push(&mut self, print: u64, number: u64) -> Option<(u64, u64)> {
        if self.first.len() < RECENT {
            self.first.push((print, number));
        }
        self.follow(print, number)
    }

    fn follow(&mut self, print: u64, number: u64) -> Option<(u64, u64)> {
        let (young, old) = self.last.split_at_checked(self.oldest).unwrap_or_default();
        let earlier = old.iter().chain(young).find(|(p, _)| *p == print).map(|(_, earlier)| (number, *earlier));
        if self.last.len() < RECENT {
            self.last.push((print, number));
        } else if let Some(slot) = self.last.get_mut(self.oldest) {
            *slot = (print, number);
            self.oldest = (self.oldest + 1) % RECENT;
        }
        earlier
    }

    /// Adds the rows of the part that follows, and to `repeats` what they copy of this one. `repeats` is in the order of rows.
    pub fn join(&mut self, later: Self, repeats: &mut Vec<(u64, u64)>) {
        let free = RECENT.saturating_sub(self.first.len());
        self.first.extend(later.first.iter().take(free));
        for (print, number) in &later.first {
            let Some((row, earlier)) = self.follow(*print, *number) else { continue };
            match repeats.binary_search_by_key(&row, |r| r.0) {
                Ok(at) => repeats.splice(at..=at, [(row, earlier)]).for_each(drop),
                Err(at) => repeats.insert(at, (row, earlier)),
            }
        }
        if later.first.len() == RECENT {
            (self.last, self.oldest) = (later.last, later.oldest);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    fn repeats(parts: &[&[u64]]) -> Vec<(u64, u64)> {
        let (mut all, mut found, mut number) = (Prints::default(), Vec::new(), 0);
        for part in parts {
            let mut prints = Prints::default();
            for print in *part {
                number += 1;
                found.extend(prints.push(*print, number));
            }
            all.join(prints, &mut found);
        }
        found
    }

    proptest! {
        #[test]
        fn parts_say_what_the_whole_says(rows in prop::collection::vec(0_u64..60, 0..300), a in 0_usize..300, b in 0_usize..300) {
            let (a, b) = (a.min(b).min(rows.len()), a.max(b).min(rows.len()));
            let mut whole = Prints::default();
            let said: Vec<_> = rows.iter().zip(1..).filter_map(|(p, n)| whole.push(*p, n)).collect();
            prop_assert_eq!(repeats(&[&rows[..a], &rows[a..b], &rows[b..]]), said);
        }
    }
}
