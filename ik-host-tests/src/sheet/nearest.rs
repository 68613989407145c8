//! The known word that a misspelt one is likely to mean.

/// The nearest of `known` to `written`, if any is near enough to be worth naming.
pub(super) fn nearest<'k>(written: &str, known: impl IntoIterator<Item = &'k str>) -> Option<&'k str> {
    // Nobody misspells a key by hundreds of letters, and the distance takes quadratic time.
    if written.len() > 100 {
        return None;
    }
    let plain = |word: &str| word.to_lowercase().replace(['-', ' '], "_");
    let written = plain(written);
    known
        .into_iter()
        .map(|word| {
            let likeness = strsim::normalized_damerau_levenshtein(&written, &plain(word));
            (likeness, word)
        })
        .filter(|(likeness, _)| *likeness >= 0.6)
        .max_by(|(a, _), (b, _)| a.total_cmp(b))
        .map(|(_, word)| word)
}

#[cfg(test)]
mod tests {
    use super::nearest;

    const KEYS: [&str; 4] = ["femur_mm", "tibia_mm", "coxa_mm", "knee_bends"];

    #[test]
    fn slips_of_the_pen_find_their_word() {
        assert_eq!(nearest("femr_mm", KEYS), Some("femur_mm"));
        assert_eq!(nearest("Knee-Bend", KEYS), Some("knee_bends"));
        assert_eq!(nearest("tibai_mm", KEYS), Some("tibia_mm"));
    }

    #[test]
    fn a_word_like_none_finds_none() {
        assert_eq!(nearest("colour", KEYS), None);
        assert_eq!(nearest("", KEYS), None);
        assert_eq!(nearest(&"femur_mm".repeat(50), KEYS), None);
    }
}
