//! The word that was probably meant.

use crate::error::edits;

/// The one of `words` that is nearest to `text`, where it is near enough to be what was meant.
///
/// Nearness: letters inserted, left out, changed, or two exchanged; at most a third of the longer word.
pub fn nearest<'w>(text: &str, words: impl IntoIterator<Item = &'w str>) -> Option<&'w str> {
    let wanted = text.trim().to_lowercase();
    words
        .into_iter()
        .map(|word| (edits(&wanted, &word.to_lowercase()), word))
        .filter(|(distance, word)| distance * 3 <= wanted.chars().count().max(word.chars().count()))
        .min_by_key(|(distance, _)| *distance)
        .map(|(_, word)| word)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_was_meant() {
        let words = ["deviation", "card_months", "tilt"];
        assert_eq!(nearest("deviaton", words), Some("deviation"));
        assert_eq!(nearest("card_month", words), Some("card_months"));
        assert_eq!(nearest("tlit", words), Some("tilt"));
        assert_eq!(nearest("latitude", words), None);
        assert_eq!(nearest("", words), None);
    }
}
