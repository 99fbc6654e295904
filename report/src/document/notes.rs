//! Free notes of a case file: Markdown in, blocks of the document out.
//!
//! This is the one filter for text that someone else wrote: raw HTML comes out as words, pictures as their alternative text, links only
//! where they lead to a web page, a mail address or a DOI, headings as strong lines so that they cannot break the order of headings.

use pulldown_cmark::{Event, Options, Parser, Tag, TagEnd};

use super::block::Block;
use super::inline::{Inline, Span};

/// Reads Markdown of the case's author.
///
/// Paragraphs, flat lists, code, strong and stressed text and links are kept; nested lists come out flat.
///
/// ```
/// use tautring_report::document::{Block, Inline, blocks_from_markdown};
/// let blocks = blocks_from_markdown("Keep <b>below</b> [zero](javascript:alert(1)).");
/// assert!(matches!(&blocks[..], [Block::Paragraph(p)] if p == &Inline::from("Keep <b>below</b> zero.")));
/// ```
pub fn blocks_from_markdown(markdown: &str) -> Vec<Block> {
    let mut reader = Reader::default();
    for event in Parser::new_ext(markdown, Options::empty()) {
        reader.take(event);
    }
    reader.close();
    reader.blocks
}

/// Whether a link may stand in a report: to a web page, a mail address, a DOI, or inside the document.
pub(crate) fn is_safe_url(url: &str) -> bool {
    let lower = url.trim().to_ascii_lowercase();
    ["https://", "http://", "mailto:", "doi:", "#"]
        .iter()
        .any(|scheme| lower.starts_with(scheme))
}

#[derive(Default)]
struct Reader {
    blocks: Vec<Block>,
    inline: Inline,
    lists: Vec<bool>,
    items: Vec<Inline>,
    strong: usize,
    emphasis: usize,
    link: Option<String>,
    code: Option<String>,
}

impl Reader {
    fn take(&mut self, event: Event<'_>) {
        match event {
            Event::Start(tag) => self.start(tag),
            Event::End(tag) => self.end(tag),
            Event::Text(text) => self.words(&text),
            Event::Code(text) => self.inline.push(Span::Code(text.into_string())),
            // Raw HTML is shown, not obeyed.
            Event::Html(text) | Event::InlineHtml(text) => self.words(text.trim_end()),
            Event::SoftBreak | Event::HardBreak => self.words(" "),
            Event::Rule => self.close(),
            _ => {}
        }
    }

    fn start(&mut self, tag: Tag<'_>) {
        match tag {
            Tag::Heading { .. } => {
                self.close();
                self.strong += 1;
            }
            Tag::Paragraph | Tag::BlockQuote(_) | Tag::HtmlBlock | Tag::Item => {
                self.close_paragraph();
            }
            Tag::CodeBlock(_) => {
                self.close();
                self.code = Some(String::new());
            }
            Tag::List(first) => {
                self.close_paragraph();
                self.lists.push(first.is_some());
            }
            Tag::Strong => self.strong += 1,
            Tag::Emphasis => self.emphasis += 1,
            Tag::Link { dest_url, .. } if is_safe_url(&dest_url) => {
                self.link = Some(dest_url.into_string());
            }
            _ => {}
        }
    }

    fn end(&mut self, tag: TagEnd) {
        match tag {
            TagEnd::Heading(_) => {
                self.strong = self.strong.saturating_sub(1);
                self.close();
            }
            TagEnd::Paragraph | TagEnd::BlockQuote(_) | TagEnd::HtmlBlock | TagEnd::Item => {
                self.close_paragraph();
            }
            TagEnd::CodeBlock => {
                if let Some(code) = self.code.take() {
                    self.blocks.push(Block::Code(code));
                }
            }
            TagEnd::List(_) => {
                self.close_paragraph();
                if let Some(ordered) = self.lists.pop()
                    && self.lists.is_empty()
                {
                    let items = std::mem::take(&mut self.items);
                    self.blocks.push(Block::List { ordered, items });
                }
            }
            TagEnd::Strong => self.strong = self.strong.saturating_sub(1),
            TagEnd::Emphasis => self.emphasis = self.emphasis.saturating_sub(1),
            TagEnd::Link => self.link = None,
            _ => {}
        }
    }

    fn words(&mut self, text: &str) {
        if let Some(code) = &mut self.code {
            code.push_str(text);
            return;
        }
        let text = text.to_owned();
        let span = match (&self.link, self.strong, self.emphasis) {
            (Some(url), _, _) => Span::Link {
                text,
                url: url.clone(),
            },
            (None, 0, 0) => Span::Text(text),
            (None, 0, _) => Span::Emphasis(text),
            (None, _, _) => Span::Strong(text),
        };
        self.inline.push(span);
    }

    fn close_paragraph(&mut self) {
        let inline = std::mem::take(&mut self.inline);
        if inline.is_empty() {
            return;
        }
        if self.lists.is_empty() {
            self.blocks.push(Block::Paragraph(merged(&inline)));
        } else {
            self.items.push(merged(&inline));
        }
    }

    /// Ends what is open, lists included: only at the outermost level may a heading, code or a rule follow.
    fn close(&mut self) {
        self.close_paragraph();
        if let Some(&ordered) = self.lists.first() {
            let items = std::mem::take(&mut self.items);
            if !items.is_empty() {
                self.blocks.push(Block::List { ordered, items });
            }
        }
    }
}

/// The parser cuts text at every special character; neighbours in plain dress are joined again.
fn merged(inline: &Inline) -> Inline {
    let mut spans: Vec<Span> = Vec::new();
    for span in inline.spans() {
        match (spans.last_mut(), span) {
            (Some(Span::Text(before)), Span::Text(text))
            | (Some(Span::Strong(before)), Span::Strong(text))
            | (Some(Span::Emphasis(before)), Span::Emphasis(text)) => before.push_str(text),
            (
                Some(Span::Link {
                    text: before,
                    url: same,
                }),
                Span::Link { text, url },
            ) if same == url => before.push_str(text),
            _ => spans.push(span.clone()),
        }
    }
    spans.into_iter().fold(Inline::new(), Inline::with)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn nothing_dangerous_survives() {
        let markdown = "# Big\n\n<script>alert(1)</script>\n\n![x](data:image/png;base64,AA) [a](JAVASCRIPT:x) [b](https://example.org)\n\n- one\n  - two\n\n```\n<i>\n```\n";
        let blocks = blocks_from_markdown(markdown);
        assert!(
            matches!(&blocks[0], Block::Paragraph(p) if p.spans() == [Span::Strong("Big".into())])
        );
        let links: Vec<_> = blocks
            .iter()
            .filter_map(|block| match block {
                Block::Paragraph(p) => Some(p),
                _ => None,
            })
            .flat_map(Inline::spans)
            .filter_map(|span| match span {
                Span::Link { url, .. } => Some(url.as_str()),
                _ => None,
            })
            .collect();
        assert_eq!(links, ["https://example.org"]);
        assert!(
            blocks
                .iter()
                .any(|b| matches!(b, Block::List { items, .. } if items.len() == 2))
        );
        assert!(
            blocks
                .iter()
                .any(|b| matches!(b, Block::Code(code) if code == "<i>\n"))
        );
        assert!(
            !blocks
                .iter()
                .any(|b| matches!(b, Block::Heading { .. } | Block::Figure(_)))
        );
    }
}
