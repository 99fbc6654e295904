//! The blocks of a document.

use super::drawing::Drawing;
use super::inline::Inline;

/// A whole document.
#[derive(Clone, Debug)]
pub struct Document {
    /// Its title.
    pub title: String,
    /// What follows the title.
    pub blocks: Vec<Block>,
}

/// A piece of a document that stands on lines of its own.
#[derive(Clone, Debug)]
pub enum Block {
    /// A heading below the title; the title itself has level 1.
    Heading {
        /// 2 to 6.
        level: u8,
        /// Its words.
        text: Inline,
    },
    /// A paragraph.
    Paragraph(Inline),
    /// A list.
    List {
        /// Whether the items are numbered from 1.
        ordered: bool,
        /// The items.
        items: Vec<Inline>,
    },
    /// Text to be shown as typed.
    Code(String),
    /// A table.
    Table(Table),
    /// A figure.
    Figure(Figure),
    /// Something to be heeded.
    Note(Note),
}

/// A table with a header row; the first column names the row.
#[derive(Clone, Debug)]
pub struct Table {
    /// What it shows, one or two sentences.
    pub caption: Inline,
    /// Its columns.
    pub columns: Vec<Column>,
    /// Its cells, a row for each inner list.
    pub rows: Vec<Vec<Inline>>,
}

/// The head of a column.
#[derive(Clone, Debug)]
pub struct Column {
    /// The head, with the unit.
    pub head: String,
    /// Where its cells stand.
    pub align: Align,
}

impl Column {
    /// A column of words.
    pub fn words(head: &str) -> Self {
        Self {
            head: head.to_owned(),
            align: Align::Left,
        }
    }

    /// A column of numbers.
    pub fn numbers(head: &str) -> Self {
        Self {
            head: head.to_owned(),
            align: Align::Right,
        }
    }
}

/// Where the cells of a column stand.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Align {
    /// Words.
    Left,
    /// Numbers.
    Right,
}

/// A figure.
#[derive(Clone, Debug)]
pub struct Figure {
    /// Unique in the document; lower-case ASCII letters, digits and hyphens, since it names a file.
    pub id: String,
    /// What it shows.
    pub caption: Inline,
    /// What a reader who cannot see it needs to know.
    pub alternative: String,
    /// What is drawn.
    pub drawing: Drawing,
}

/// Something to be heeded.
#[derive(Clone, Debug)]
pub struct Note {
    /// How much.
    pub kind: NoteKind,
    /// Its paragraphs.
    pub paragraphs: Vec<Inline>,
}

/// How much a note is to be heeded.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum NoteKind {
    /// People can be hurt.
    Warning,
    /// A number is doubtful.
    Caution,
    /// Good to know.
    Information,
}

impl NoteKind {
    /// The word it begins with.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Warning => "Warning",
            Self::Caution => "Caution",
            Self::Information => "Information",
        }
    }

    /// The kind that begins with this word.
    pub fn from_word(word: &str) -> Option<Self> {
        [Self::Warning, Self::Caution, Self::Information]
            .into_iter()
            .find(|kind| kind.word() == word)
    }
}

impl Document {
    /// The figures in their order.
    pub fn figures(&self) -> impl Iterator<Item = &Figure> {
        self.blocks.iter().filter_map(|block| match block {
            Block::Figure(figure) => Some(figure),
            _ => None,
        })
    }
}
