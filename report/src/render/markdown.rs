//! The Markdown writer; the HTML page is made from what it writes.

use crate::document::{Align, Block, Document, Figure, Inline, Note, Span, Table};

/// Folder of the figures, beside the Markdown file.
pub(super) const FIGURES: &str = "figures";

/// The document as Markdown with tables.
pub fn markdown(document: &Document) -> String {
    let mut writer = Writer::default();
    writer.paragraph(&format!("# {}", escaped(&document.title)));
    for block in &document.blocks {
        writer.block(block);
    }
    writer.text
}

/// Where a figure stands, as the Markdown links to it.
pub(super) fn figure_path(figure: &Figure) -> String {
    format!("{FIGURES}/{}.svg", figure.id)
}

#[derive(Default)]
struct Writer {
    text: String,
    tables: usize,
    figures: usize,
}

impl Writer {
    fn block(&mut self, block: &Block) {
        match block {
            Block::Heading { level, text } => {
                let marks = "#".repeat(usize::from(*level).clamp(2, 6));
                self.paragraph(&format!("{marks} {}", inline(text)));
            }
            Block::Paragraph(text) => self.paragraph(&inline(text)),
            Block::List { ordered, items } => self.list(*ordered, items),
            Block::Code(code) => {
                let fence = fence(code, 3);
                self.paragraph(&format!(
                    "{fence}\n{}\n{fence}",
                    code.trim_end_matches('\n')
                ));
            }
            Block::Table(table) => self.table(table),
            Block::Figure(figure) => self.figure(figure),
            Block::Note(note) => self.note(note),
        }
    }

    fn paragraph(&mut self, text: &str) {
        if !self.text.is_empty() {
            self.text.push('\n');
        }
        self.text.push_str(text);
        self.text.push('\n');
    }

    fn list(&mut self, ordered: bool, items: &[Inline]) {
        let lines: Vec<_> = items
            .iter()
            .enumerate()
            .map(|(index, item)| {
                if ordered {
                    format!("{}. {}", index + 1, inline(item))
                } else {
                    format!("- {}", inline(item))
                }
            })
            .collect();
        self.paragraph(&lines.join("\n"));
    }

    fn table(&mut self, table: &Table) {
        self.tables += 1;
        self.paragraph(&format!(
            "**Table {}.** {}",
            self.tables,
            inline(&table.caption)
        ));
        let heads = table.columns.iter().map(|column| escaped(&column.head));
        let rule = table.columns.iter().map(|column| match column.align {
            Align::Left => "---".to_owned(),
            Align::Right => "---:".to_owned(),
        });
        let mut lines = vec![row(heads), row(rule)];
        lines.extend(table.rows.iter().map(|cells| row(cells.iter().map(cell))));
        self.paragraph(&lines.join("\n"));
    }

    fn figure(&mut self, figure: &Figure) {
        self.figures += 1;
        self.paragraph(&format!(
            "![{}]({})",
            escaped(&figure.alternative),
            figure_path(figure)
        ));
        self.paragraph(&format!(
            "**Figure {}.** {}",
            self.figures,
            inline(&figure.caption)
        ));
    }

    fn note(&mut self, note: &Note) {
        let paragraphs: Vec<_> = note
            .paragraphs
            .iter()
            .map(|text| format!("> {}", inline(text)))
            .collect();
        self.paragraph(&format!(
            "> **{}.**\n>\n{}",
            note.kind.word(),
            paragraphs.join("\n>\n")
        ));
    }
}

fn row(cells: impl Iterator<Item = String>) -> String {
    let cells: Vec<_> = cells.collect();
    format!("| {} |", cells.join(" | "))
}

/// A pipe ends a cell even inside code; elsewhere [`escaped`] sees to it.
fn cell(text: &Inline) -> String {
    let spans = text.spans().iter();
    spans
        .map(|s| match s {
            Span::Code(_) => span(s).replace('|', "\\|"),
            _ => span(s),
        })
        .collect()
}

fn inline(text: &Inline) -> String {
    let line: String = text.spans().iter().map(span).collect();
    at_line_start(&line)
}

fn span(span: &Span) -> String {
    match span {
        Span::Text(text) => escaped(text),
        Span::Strong(text) => dressed(text, "**"),
        Span::Emphasis(text) => dressed(text, "*"),
        Span::Code(text) => code(text),
        Span::Link { text, url } => {
            let url: String = url
                .chars()
                .filter(|c| !c.is_whitespace() && !matches!(c, '<' | '>' | '\\'))
                .collect();
            format!("[{}](<{url}>)", escaped(text))
        }
    }
}

/// Marks must touch the words that they dress: white space at the ends goes outside.
fn dressed(text: &str, mark: &str) -> String {
    let core = text.trim();
    if core.is_empty() {
        return escaped(text);
    }
    let before = &text[..text.len() - text.trim_start().len()];
    let after = &text[text.trim_end().len()..];
    format!("{before}{mark}{}{mark}{after}", escaped(core))
}

fn code(text: &str) -> String {
    let text = one_line(text);
    if text.trim().is_empty() {
        return String::new();
    }
    let fence = fence(&text, 1);
    let pad = if text.starts_with('`') || text.ends_with('`') {
        " "
    } else {
        ""
    };
    format!("{fence}{pad}{text}{pad}{fence}")
}

/// Back ticks enough that `code` cannot end the fence.
fn fence(code: &str, least: usize) -> String {
    let longest = code.split(|c| c != '`').map(str::len).max().unwrap_or(0);
    "`".repeat(least.max(longest + 1))
}

/// The one place where text becomes Markdown: nothing in it is read as a mark, a link or HTML.
fn escaped(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in one_line(text).chars() {
        if matches!(
            c,
            '\\' | '`' | '*' | '_' | '[' | ']' | '<' | '>' | '|' | '&' | '~'
        ) {
            out.push('\\');
        }
        out.push(c);
    }
    out
}

fn one_line(text: &str) -> String {
    text.replace(['\n', '\r', '\t'], " ")
}

/// Marks that mean something at the start of a line only: headings, lists, rules.
fn at_line_start(line: &str) -> String {
    let digits = line.chars().take_while(char::is_ascii_digit).count();
    let numbered = digits > 0 && line[digits..].starts_with(['.', ')']);
    if numbered {
        format!("{}\\{}", &line[..digits], &line[digits..])
    } else if line.starts_with(['#', '+', '-', '=', ' ']) {
        let line = line.trim_start();
        if line.starts_with(['#', '+', '-', '=']) {
            format!("\\{line}")
        } else {
            line.to_owned()
        }
    } else {
        line.to_owned()
    }
}

#[cfg(test)]
mod tests {
    use pulldown_cmark::{Event, Options, Parser};

    use super::*;
    use crate::document::Column;

    /// What a reader of the Markdown sees, line by line.
    fn read_back(markdown: &str) -> String {
        Parser::new_ext(markdown, Options::ENABLE_TABLES)
            .filter_map(|event| match event {
                Event::Text(text) | Event::Code(text) => Some(text.into_string()),
                Event::Html(html) | Event::InlineHtml(html) => Some(format!("HTML:{html}")),
                _ => None,
            })
            .collect()
    }

    #[test]
    fn text_comes_back_as_it_was() {
        for text in [
            "a*b_c`d[e](f)<script>&amp;|~~x~~\\",
            "# not a heading",
            "- not a list",
            "12. not a list",
            "+ no",
            "=== no rule",
            "http://example.org/_a_",
        ] {
            for dressed in [
                Inline::from(text),
                Inline::new().strong(text),
                Inline::new().code(text),
            ] {
                assert_eq!(read_back(&inline(&dressed)), text);
            }
        }
    }

    #[test]
    fn cells_hold_pipes_and_back_ticks() {
        let table = Table {
            caption: "Pipes.".into(),
            columns: vec![Column::words("a|b")],
            rows: vec![vec![Inline::new().code("c|`d")], vec![Inline::from("e|f")]],
        };
        let document = Document {
            title: "T".into(),
            blocks: vec![Block::Table(table)],
        };
        assert_eq!(
            read_back(&markdown(&document)),
            "TTable 1. Pipes.a|bc|`de|f"
        );
    }
}
