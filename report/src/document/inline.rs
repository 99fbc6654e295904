//! Running text: spans in a row.

/// A stretch of text in one dress. The text is plain: each writer escapes it.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Span {
    /// Plain.
    Text(String),
    /// Of weight.
    Strong(String),
    /// Stressed, or a title.
    Emphasis(String),
    /// To be read as typed: a SMILES, a key, a digest.
    Code(String),
    /// A link.
    Link {
        /// What is read.
        text: String,
        /// Where it leads: `https:`, `http:`, `mailto:`, `doi:` or a place in the document.
        url: String,
    },
}

/// Spans in a row.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Inline {
    spans: Vec<Span>,
}

impl Inline {
    /// No text.
    pub fn new() -> Self {
        Self::default()
    }

    /// The spans.
    pub fn spans(&self) -> &[Span] {
        &self.spans
    }

    /// Whether there is no text.
    pub fn is_empty(&self) -> bool {
        self.spans.is_empty()
    }

    /// Adds a span.
    pub fn push(&mut self, span: Span) {
        self.spans.push(span);
    }

    /// With a span at the end.
    #[must_use]
    pub fn with(mut self, span: Span) -> Self {
        self.push(span);
        self
    }

    /// With plain text at the end.
    #[must_use]
    pub fn text(self, text: impl Into<String>) -> Self {
        self.with(Span::Text(text.into()))
    }

    /// With strong text at the end.
    #[must_use]
    pub fn strong(self, text: impl Into<String>) -> Self {
        self.with(Span::Strong(text.into()))
    }

    /// With stressed text at the end.
    #[must_use]
    pub fn emphasis(self, text: impl Into<String>) -> Self {
        self.with(Span::Emphasis(text.into()))
    }

    /// With text as typed at the end.
    #[must_use]
    pub fn code(self, text: impl Into<String>) -> Self {
        self.with(Span::Code(text.into()))
    }

    /// The text alone.
    pub fn plain(&self) -> String {
        self.spans
            .iter()
            .map(|span| match span {
                Span::Text(text)
                | Span::Strong(text)
                | Span::Emphasis(text)
                | Span::Code(text)
                | Span::Link { text, .. } => text.as_str(),
            })
            .collect()
    }
}

impl From<&str> for Inline {
    fn from(text: &str) -> Self {
        Self::new().text(text)
    }
}

impl From<String> for Inline {
    fn from(text: String) -> Self {
        Self::new().text(text)
    }
}

/// A formula with its numbers as subscripts: `C3H6` becomes C₃H₆.
///
/// ```
/// assert_eq!(tautring_report::document::subscripted("C10H16"), "C₁₀H₁₆");
/// ```
pub fn subscripted(formula: &str) -> String {
    const SUBSCRIPTS: [char; 10] = ['₀', '₁', '₂', '₃', '₄', '₅', '₆', '₇', '₈', '₉'];
    formula
        .chars()
        .map(|c| c.to_digit(10).map_or(c, |digit| SUBSCRIPTS[digit as usize]))
        .collect()
}
