//! Mistakes in a case file, and how they are shown: place, offending text, and the way to mend it.

use core::fmt;
use core::ops::Range;

use annotate_snippets::{AnnotationKind, Group, Level, Origin, Renderer, Snippet};

/// Shown in full before the rest is only counted: nobody mends more than this from one listing.
const SHOWN: usize = 40;

/// The kind of a mistake.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
#[non_exhaustive]
pub enum MistakeKind {
    /// The file, or a structure file it names, cannot be read.
    Unreadable,
    /// The text is not TOML.
    Syntax,
    /// A key that a case file does not have.
    UnknownKey,
    /// A key that has to be there is not.
    Missing,
    /// A text where a number belongs, and the like.
    WrongType,
    /// A word or unit that is not in the list.
    UnknownWord,
    /// A value that cannot be meant.
    Value,
    /// Two statements that exclude each other.
    Conflict,
    /// A structure that cannot be read.
    Structure,
}

/// One mistake: what is wrong, where, and how to mend it.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Mistake {
    kind: MistakeKind,
    message: String,
    span: Option<Range<usize>>,
    label: String,
    elsewhere: Option<(Range<usize>, String)>,
    mend: String,
}

/// All mistakes of one case file, in the order of the text.
#[derive(Clone, Debug)]
pub struct CaseErrors {
    name: String,
    text: String,
    mistakes: Vec<Mistake>,
}

impl Mistake {
    /// A mistake without a place in the text, such as a file that is missing.
    pub(super) fn new(
        kind: MistakeKind,
        message: impl Into<String>,
        mend: impl Into<String>,
    ) -> Self {
        Self {
            kind,
            message: message.into(),
            span: None,
            label: String::new(),
            elsewhere: None,
            mend: mend.into(),
        }
    }

    /// Underlines the bytes of the text that are meant, with a short remark under them.
    pub(super) fn at(mut self, span: Range<usize>, label: impl Into<String>) -> Self {
        self.span = Some(span);
        self.label = label.into();
        self
    }

    /// Underlines a second place that the mistake has to do with.
    pub(super) fn with(mut self, span: Range<usize>, label: impl Into<String>) -> Self {
        self.elsewhere = Some((span, label.into()));
        self
    }

    /// The kind of the mistake.
    pub fn kind(&self) -> MistakeKind {
        self.kind
    }

    /// What is wrong, in one sentence.
    pub fn message(&self) -> &str {
        &self.message
    }

    /// The offending bytes of the case file.
    pub fn span(&self) -> Option<Range<usize>> {
        self.span.clone()
    }

    /// How to mend it.
    pub fn mend(&self) -> &str {
        &self.mend
    }
}

impl CaseErrors {
    pub(super) fn new(name: &str, text: &str, mut mistakes: Vec<Mistake>) -> Self {
        mistakes.sort_by_key(|mistake| {
            mistake
                .span
                .as_ref()
                .map_or((0, 0), |span| (span.start, span.end))
        });
        Self {
            name: name.to_owned(),
            text: text.to_owned(),
            mistakes,
        }
    }

    /// The mistakes, in the order of the text; never empty.
    pub fn mistakes(&self) -> &[Mistake] {
        &self.mistakes
    }

    /// Every mistake with file, line and column, the offending text underlined, and how to mend it.
    ///
    /// `colour` adds terminal escapes; without it the text is plain. The first forty are shown, the others counted.
    pub fn render(&self, colour: bool) -> String {
        let renderer = if colour {
            Renderer::styled()
        } else {
            Renderer::plain()
        };
        let mut parts: Vec<String> = self
            .mistakes
            .iter()
            .take(SHOWN)
            .map(|mistake| renderer.render(&[self.group(mistake)]))
            .collect();
        let count = self.mistakes.len();
        let noun = if count == 1 { "mistake" } else { "mistakes" };
        let rest = match count.saturating_sub(SHOWN) {
            0 => String::new(),
            rest => format!(", {rest} of them not shown"),
        };
        parts.push(format!("{}: {count} {noun}{rest}\n", self.name));
        parts.join("\n\n")
    }

    fn group<'a>(&'a self, mistake: &'a Mistake) -> Group<'a> {
        let group = Level::ERROR.primary_title(mistake.message.as_str());
        let group = match &mistake.span {
            None => group.element(Origin::path(self.name.as_str())),
            Some(span) => {
                let mut snippet = Snippet::source(self.text.as_str())
                    .path(self.name.as_str())
                    .annotation(
                        AnnotationKind::Primary
                            .span(self.on_characters(span))
                            .label(mistake.label.as_str()),
                    );
                if let Some((span, label)) = &mistake.elsewhere {
                    snippet = snippet.annotation(
                        AnnotationKind::Context
                            .span(self.on_characters(span))
                            .label(label.as_str()),
                    );
                }
                group.element(snippet)
            }
        };
        if mistake.mend.is_empty() {
            group
        } else {
            group.element(Level::HELP.message(mistake.mend.as_str()))
        }
    }

    /// The span widened to whole characters inside the text: the renderer panics on any other.
    fn on_characters(&self, span: &Range<usize>) -> Range<usize> {
        let start = self.text.floor_char_boundary(span.start);
        let end = self.text.ceil_char_boundary(span.end).max(start);
        start..end
    }
}

impl fmt::Display for CaseErrors {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        formatter.write_str(&self.render(false))
    }
}

impl core::error::Error for CaseErrors {}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn survives_spans_beside_characters_and_beyond_the_end() {
        let errors = CaseErrors::new(
            "case.toml",
            "t = \"°\"",
            vec![
                Mistake::new(MistakeKind::Value, "inside a character", "").at(6..6, ""),
                Mistake::new(MistakeKind::Value, "beyond the end", "").at(90..95, "here"),
            ],
        );
        let shown = errors.render(false);
        assert!(shown.contains("inside a character") && shown.contains("case.toml:1:"));
        assert!(shown.ends_with("case.toml: 2 mistakes\n"), "{shown}");
    }

    #[test]
    fn colours_only_when_asked() {
        let errors = CaseErrors::new(
            "c",
            "x",
            vec![Mistake::new(MistakeKind::Value, "m", "h").at(0..1, "l")],
        );
        assert!(!errors.render(false).contains('\u{1b}'));
        assert!(errors.render(true).contains('\u{1b}'));
    }
}
