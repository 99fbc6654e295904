//! Closed lists of words, and the word that was probably meant.

use strsim::osa_distance;

/// A closed list of words that a case file uses for one thing.
pub trait Vocabulary: Copy + 'static {
    /// What the words stand for, as an error names it ("state", "unit of an enthalpy").
    const NOUN: &'static str;
    /// Every word with its meaning, in the order in which they are offered.
    const WORDS: &'static [(&'static str, Self)];

    /// The word as the case file spells it.
    fn word(self) -> &'static str;

    /// The meaning of a word; spelling and case have to be exact.
    fn from_word(word: &str) -> Option<Self> {
        Self::WORDS
            .iter()
            .find(|(known, _)| *known == word)
            .map(|&(_, meaning)| meaning)
    }
}

/// Declares an enumeration together with its words, so that reader, JSON Schema and report spell them alike.
macro_rules! vocabulary {
    (
        $(#[$doc:meta])*
        $name:ident, $noun:literal {
            $($(#[$variant_doc:meta])* $variant:ident = $word:literal,)*
        }
    ) => {
        $(#[$doc])*
        #[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, schemars::JsonSchema)]
        pub enum $name {
            $($(#[$variant_doc])* #[schemars(rename = $word)] $variant,)*
        }

        impl $crate::case::vocabulary::Vocabulary for $name {
            const NOUN: &'static str = $noun;
            const WORDS: &'static [(&'static str, Self)] = &[$(($word, Self::$variant),)*];

            fn word(self) -> &'static str {
                match self {
                    $(Self::$variant => $word,)*
                }
            }
        }

        impl core::fmt::Display for $name {
            fn fmt(&self, formatter: &mut core::fmt::Formatter<'_>) -> core::fmt::Result {
                formatter.write_str($crate::case::vocabulary::Vocabulary::word(*self))
            }
        }
    };
}
pub(super) use vocabulary;

/// The known word nearest to what was written, if it is near enough to have been meant.
///
/// Case, and spaces or hyphens in place of underscores, count as no difference.
pub(super) fn nearest<'a>(
    written: &str,
    known: impl IntoIterator<Item = &'a str>,
) -> Option<&'a str> {
    let fold = |word: &str| word.trim().to_lowercase().replace([' ', '-'], "_");
    let target = fold(written);
    let length = target.chars().count();
    // Long junk is nobody's misspelling, and the distance costs the product of both lengths.
    if length > 64 {
        return None;
    }
    known
        .into_iter()
        .map(|word| (osa_distance(&target, &fold(word)), word))
        .filter(|&(distance, word)| {
            distance <= 1 + length.min(word.len()) / 4 && distance < length.max(1)
        })
        .min_by_key(|&(distance, _)| distance)
        .map(|(_, word)| word)
}

/// "`a`, `b` or `c`", for the sentence that mends a mistake.
pub(super) fn list<'a>(words: impl IntoIterator<Item = &'a str>, conjunction: &str) -> String {
    let quoted: Vec<String> = words.into_iter().map(|word| format!("`{word}`")).collect();
    match quoted.split_last() {
        None => String::new(),
        Some((only, [])) => only.clone(),
        Some((last, rest)) => format!("{} {conjunction} {last}", rest.join(", ")),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn finds_the_word_that_was_meant() {
        let roles = ["starting_material", "reagent", "intermediate"];
        assert_eq!(
            nearest("Starting material", roles),
            Some("starting_material")
        );
        assert_eq!(nearest("reagant", roles), Some("reagent"));
        assert_eq!(nearest("KJ/MOL", ["kJ/mol", "J/mol"]), Some("kJ/mol"));
        assert_eq!(nearest("catalyst", roles), None);
        assert_eq!(nearest("x", ["g", "K"]), None);
    }

    #[test]
    fn lists_words_as_a_sentence_does() {
        assert_eq!(list(["g"], "or"), "`g`");
        assert_eq!(list(["g", "kg", "mol"], "or"), "`g`, `kg` or `mol`");
    }
}
