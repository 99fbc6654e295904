//! The HTML writer: the Markdown's events, made accessible and filtered, in a page that needs nothing else.

use std::collections::{BTreeMap, HashSet};

use minijinja::{AutoEscape, Environment, context};
use pulldown_cmark::{Alignment, CowStr, Event, Options, Parser, Tag, TagEnd};

use super::error::RenderError;
use super::figures::{self, escaped};
use super::markdown::figure_path;
use crate::document::{Document, NoteKind, is_safe_url};

const PAGE: &str = include_str!("page.html");
const STYLE: &str = include_str!("page.css");

/// The page of a document from its Markdown: one file, no network, no script.
///
/// Raw HTML in the Markdown is shown as text, links lead only to web pages, mail addresses, DOIs and places in the page, and the only
/// pictures are the figures of the document.
///
/// # Errors
/// [`RenderError::Template`].
pub fn html(document: &Document, markdown: &str) -> Result<String, RenderError> {
    let figures = document
        .figures()
        .map(|figure| (figure_path(figure), figures::svg(figure)))
        .collect();
    let mut environment = Environment::new();
    environment.set_auto_escape_callback(|_| AutoEscape::Html);
    environment
        .render_str(
            PAGE,
            context! { title => &document.title, style => STYLE, body => body(markdown, &figures) },
        )
        .map_err(|source| RenderError::Template { source })
}

/// The body: events of the Markdown, rewritten, as HTML.
fn body(markdown: &str, figures: &BTreeMap<String, String>) -> String {
    let events: Vec<_> = Parser::new_ext(markdown, Options::ENABLE_TABLES).collect();
    let mut rewriter = Rewriter {
        figures,
        out: Vec::new(),
        ids: HashSet::new(),
        column: 0,
        alignments: Vec::new(),
        in_head: false,
        unsafe_links: Vec::new(),
    };
    let mut rest = events.as_slice();
    while !rest.is_empty() {
        rest = rewriter.step(rest);
    }
    let mut html = String::new();
    pulldown_cmark::html::push_html(&mut html, rewriter.out.into_iter());
    html
}

struct Rewriter<'a> {
    figures: &'a BTreeMap<String, String>,
    out: Vec<Event<'a>>,
    ids: HashSet<String>,
    column: usize,
    alignments: Vec<Alignment>,
    in_head: bool,
    unsafe_links: Vec<bool>,
}

impl<'a> Rewriter<'a> {
    /// Takes one event, or a group that belongs together, off the front.
    fn step<'e>(&mut self, events: &'e [Event<'a>]) -> &'e [Event<'a>] {
        if let Some(rest) = self
            .figure(events)
            .or_else(|| self.table(events))
            .or_else(|| self.note(events))
        {
            return rest;
        }
        let Some((event, rest)) = events.split_first() else {
            return events;
        };
        match event {
            Event::Html(html) | Event::InlineHtml(html) => self.out.push(Event::Text(html.clone())),
            Event::Start(Tag::Heading { level, .. }) => {
                let id = self.heading_id(rest);
                self.markup(format!("<{level} id=\"{}\">", escaped(&id)));
            }
            Event::End(TagEnd::Heading(level)) => self.markup(format!("</{level}>\n")),
            Event::Start(Tag::Link { dest_url, .. }) => {
                let bad = !is_safe_url(dest_url);
                self.unsafe_links.push(bad);
                if !bad {
                    self.out.push(event.clone());
                }
            }
            Event::End(TagEnd::Link) => {
                if self.unsafe_links.pop() == Some(false) {
                    self.out.push(event.clone());
                }
            }
            // A picture that is no figure of the document leaves its alternative text.
            Event::Start(Tag::Image { .. } | Tag::HtmlBlock)
            | Event::End(TagEnd::Image | TagEnd::HtmlBlock) => {}
            Event::Start(Tag::TableHead) => {
                self.in_head = true;
                self.column = 0;
                self.markup("<thead><tr>");
            }
            Event::End(TagEnd::TableHead) => {
                self.in_head = false;
                self.markup("</tr></thead>\n<tbody>\n");
            }
            Event::Start(Tag::TableRow) => {
                self.column = 0;
                self.markup("<tr>");
            }
            Event::End(TagEnd::TableRow) => self.markup("</tr>\n"),
            Event::Start(Tag::TableCell) => self.cell(true),
            Event::End(TagEnd::TableCell) => self.cell(false),
            Event::End(TagEnd::Table) => self.markup("</tbody></table></div>\n"),
            Event::End(TagEnd::BlockQuote(_)) => self.markup("</aside>\n"),
            _ => self.out.push(event.clone()),
        }
        rest
    }

    fn markup(&mut self, html: impl Into<CowStr<'a>>) {
        self.out.push(Event::Html(html.into()));
    }

    /// An identifier from the words of a heading, as Markdown hosts make it, unique in the page.
    fn heading_id(&mut self, rest: &[Event<'a>]) -> String {
        let words: String = rest
            .iter()
            .take_while(|event| !matches!(event, Event::End(TagEnd::Heading(_))))
            .filter_map(|event| match event {
                Event::Text(text) | Event::Code(text) => Some(text.as_ref()),
                _ => None,
            })
            .collect();
        let slug: String = words
            .to_lowercase()
            .chars()
            .filter_map(|c| match c {
                ' ' | '-' => Some('-'),
                _ if c.is_alphanumeric() => Some(c),
                _ => None,
            })
            .collect();
        let mut id = slug.clone();
        let mut count = 0;
        while self.ids.contains(&id) {
            count += 1;
            id = format!("{slug}-{count}");
        }
        self.ids.insert(id.clone());
        id
    }

    /// A paragraph that is a figure of the document, with the caption that follows it.
    fn figure<'e>(&mut self, events: &'e [Event<'a>]) -> Option<&'e [Event<'a>]> {
        let [
            Event::Start(Tag::Paragraph),
            Event::Start(Tag::Image { dest_url, .. }),
            ..,
        ] = events
        else {
            return None;
        };
        let figures = self.figures;
        let svg = figures.get(dest_url.as_ref())?;
        let rest = after(events, TagEnd::Paragraph);
        self.markup("<figure>");
        self.markup(svg.as_str());
        let rest = self.caption(rest, "Figure ", "figcaption").unwrap_or(rest);
        self.markup("</figure>\n");
        Some(rest)
    }

    /// A table with the caption in front of it.
    fn table<'e>(&mut self, events: &'e [Event<'a>]) -> Option<&'e [Event<'a>]> {
        let captioned = is_caption(events, "Table ");
        let table = if captioned {
            after(events, TagEnd::Paragraph)
        } else {
            events
        };
        let [Event::Start(Tag::Table(alignments)), rest @ ..] = table else {
            return None;
        };
        self.alignments.clone_from(alignments);
        // Wide tables scroll inside their own box, which the keyboard reaches.
        self.markup("<div class=\"table\" tabindex=\"0\"><table>");
        self.caption(events, "Table ", "caption");
        Some(rest)
    }

    fn caption<'e>(
        &mut self,
        events: &'e [Event<'a>],
        word: &str,
        element: &str,
    ) -> Option<&'e [Event<'a>]> {
        if !is_caption(events, word) {
            return None;
        }
        self.markup(format!("<{element}>"));
        let mut rest = events.get(1..)?;
        while !matches!(rest.first(), None | Some(Event::End(TagEnd::Paragraph))) {
            rest = self.step(rest);
        }
        self.markup(format!("</{element}>"));
        Some(after(rest, TagEnd::Paragraph))
    }

    /// A block quote that begins with the word of a note.
    fn note<'e>(&mut self, events: &'e [Event<'a>]) -> Option<&'e [Event<'a>]> {
        let [Event::Start(Tag::BlockQuote(_)), rest @ ..] = events else {
            return None;
        };
        let kind = match rest {
            [
                Event::Start(Tag::Paragraph),
                Event::Start(Tag::Strong),
                Event::Text(word),
                ..,
            ] => NoteKind::from_word(word.trim_end_matches('.')),
            _ => None,
        };
        let class = match kind {
            Some(NoteKind::Warning) => "note warning",
            Some(NoteKind::Caution) => "note caution",
            Some(NoteKind::Information) | None => "note information",
        };
        self.markup(format!("<aside class=\"{class}\">\n"));
        Some(rest)
    }

    fn cell(&mut self, start: bool) {
        let right = self.alignments.get(self.column) == Some(&Alignment::Right);
        let class = if right { " class=\"number\"" } else { "" };
        let (element, scope) = match (self.in_head, self.column) {
            (true, _) => ("th", " scope=\"col\""),
            (false, 0) => ("th", " scope=\"row\""),
            (false, _) => ("td", ""),
        };
        if start {
            self.markup(format!("<{element}{scope}{class}>"));
        } else {
            self.markup(format!("</{element}>"));
            self.column += 1;
        }
    }
}

/// Whether a paragraph comes that begins with a strong `Table 1.` or `Figure 1.`.
fn is_caption(events: &[Event<'_>], word: &str) -> bool {
    matches!(
        events,
        [Event::Start(Tag::Paragraph), Event::Start(Tag::Strong), Event::Text(text), ..] if text.starts_with(word)
    )
}

/// What follows the first end of that kind.
fn after<'e, 'a>(events: &'e [Event<'a>], end: TagEnd) -> &'e [Event<'a>] {
    let position = events
        .iter()
        .position(|event| matches!(event, Event::End(tag) if *tag == end));
    position.and_then(|at| events.get(at + 1..)).unwrap_or(&[])
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn raw_html_and_bad_links_do_not_pass() {
        let html = body(
            "<script>alert(1)</script>\n\na <img src=x onerror=y> [c](javascript:x) [d](data:text/html,x) ![e](http://f/g.png) [h](https://example.org)",
            &BTreeMap::new(),
        );
        for bad in ["<script", "<img", "javascript:", "data:", "http://f"] {
            assert!(!html.contains(bad), "{bad} in {html}");
        }
        assert!(html.contains("&lt;script&gt;") && html.contains("href=\"https://example.org\""));
    }

    #[test]
    fn tables_tell_what_their_heads_head() {
        let html = body(
            "**Table 1.** A *caption*.\n\n| a | b |\n| --- | ---: |\n| c | 1 |\n",
            &BTreeMap::new(),
        );
        assert!(html.contains("<caption><strong>Table 1.</strong> A <em>caption</em>.</caption>"));
        assert!(html.contains("<th scope=\"col\" class=\"number\">b</th>"));
        assert!(html.contains("<th scope=\"row\">c</th><td class=\"number\">1</td>"));
    }
}
