//! The bibliography: a reader for the project's `references.bib`, and the citations of one document.

use super::inline::{Inline, Span};

const REFERENCES: &str = include_str!("../../../data/references.bib");

/// One entry.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Reference {
    /// The key that the tables and the documentation use.
    pub key: String,
    fields: Vec<(String, String)>,
}

impl Reference {
    /// A field as plain text.
    pub fn field(&self, name: &str) -> Option<&str> {
        self.fields
            .iter()
            .find(|(field, _)| field == name)
            .map(|(_, value)| value.as_str())
    }

    /// The entry as it stands in a list of references.
    pub fn formatted(&self) -> Inline {
        let mut inline = Inline::new();
        if let Some(people) = self.field("author").or_else(|| self.field("editor")) {
            inline = inline.text(format!("{}: ", names(people)));
        }
        if let Some(title) = self.field("title") {
            inline = inline.emphasis(title);
        }
        let mut rest = Vec::new();
        if let Some(edition) = self.field("edition") {
            rest.push(format!("edition {edition}"));
        }
        for field in ["journal", "publisher", "institution"] {
            rest.extend(self.field(field).map(str::to_owned));
        }
        let issue = ["volume", "year", "pages"].map(|field| self.field(field));
        match issue {
            [Some(volume), Some(year), Some(pages)] => {
                rest.push(format!("{volume} ({year}) {pages}"));
            }
            [volume, year, pages] => {
                rest.extend(volume.map(|volume| format!("vol. {volume}")));
                rest.extend(pages.map(|pages| format!("pp. {pages}")));
                rest.extend(year.map(str::to_owned));
            }
        }
        rest.extend(self.field("doi").map(|doi| format!("doi:{doi}")));
        rest.extend(self.field("note").map(str::to_owned));
        if self.field("title").is_some() && !rest.is_empty() {
            inline = inline.text(", ");
        }
        inline.text(format!("{}.", rest.join(", ").trim_end_matches('.')))
    }
}

/// `A and B and others` as `A, B et al.`.
fn names(people: &str) -> String {
    people
        .replace(" and others", " et al.")
        .replace(" and ", "; ")
}

/// The entries of a bibliography.
#[derive(Clone, Debug)]
pub struct Bibliography {
    entries: Vec<Reference>,
}

impl Bibliography {
    /// The bibliography of the project.
    pub fn of_project() -> Self {
        Self::read(REFERENCES)
    }

    /// Reads the subset of BibTeX that the project writes: `@kind{key, field = {value}, ...}`, braces balanced.
    ///
    /// ```
    /// use tautring_report::document::Bibliography;
    /// let text = "@misc{a-key, title = {A {Title}}, note = {95 \\% limits}}";
    /// let bibliography = Bibliography::read(text);
    /// let entry = bibliography.find("a-key").unwrap();
    /// assert_eq!(entry.field("title"), Some("A Title"));
    /// assert_eq!(entry.field("note"), Some("95 % limits"));
    /// ```
    pub fn read(text: &str) -> Self {
        let entries = text
            .lines()
            .filter(|line| !line.trim_start().starts_with('%'))
            .collect::<Vec<_>>()
            .join("\n")
            .split("\n@")
            .filter_map(|entry| {
                let (_, body) = entry.split_once('{')?;
                let (key, fields) = body.split_once(',')?;
                Some(Reference {
                    key: key.trim().to_owned(),
                    fields: read_fields(fields),
                })
            })
            .collect();
        Self { entries }
    }

    /// The entry with this key.
    pub fn find(&self, key: &str) -> Option<&Reference> {
        self.entries.iter().find(|entry| entry.key == key)
    }
}

fn read_fields(mut text: &str) -> Vec<(String, String)> {
    let mut fields = Vec::new();
    while let Some((name, rest)) = text.split_once('=') {
        let name = name.trim_matches(|c: char| c == ',' || c.is_whitespace());
        let Some(length) = braced(rest.trim_start()) else {
            break;
        };
        let rest = rest.trim_start();
        fields.push((name.to_lowercase(), plain(&rest[..length])));
        text = &rest[length..];
    }
    fields
}

/// Bytes of the braced group that `text` begins with.
fn braced(text: &str) -> Option<usize> {
    let mut depth = 0_usize;
    for (at, c) in text.char_indices() {
        match c {
            '{' => depth += 1,
            '}' => depth = depth.checked_sub(1)?,
            _ => {}
        }
        if depth == 0 {
            return (at > 0).then_some(at + 1);
        }
    }
    None
}

fn plain(value: &str) -> String {
    value
        .replace(['{', '}'], "")
        .replace("\\%", "%")
        .replace("\\&", "&")
        .replace("--", "–")
        .split_whitespace()
        .collect::<Vec<_>>()
        .join(" ")
}

/// The sources that one document cites, numbered in the order of their first citation.
#[derive(Debug)]
pub struct Citations {
    bibliography: Bibliography,
    cited: Vec<String>,
}

impl Citations {
    /// No citation yet.
    pub fn new(bibliography: Bibliography) -> Self {
        Self {
            bibliography,
            cited: Vec::new(),
        }
    }

    /// Cites a bibliography key as a numbered link; a source that is no key (words of a case file, common practice) stands as it is.
    pub fn cite(&mut self, source: &str) -> Span {
        if self.bibliography.find(source).is_none() {
            return Span::Text(source.to_owned());
        }
        let number = self.cited.iter().position(|key| key == source);
        let number = number.unwrap_or_else(|| {
            self.cited.push(source.to_owned());
            self.cited.len() - 1
        });
        Span::Link {
            text: format!("[{}]", number + 1),
            url: "#bibliography".to_owned(),
        }
    }

    /// The entries cited so far, in the order of their numbers.
    pub fn references(&self) -> impl Iterator<Item = &Reference> {
        self.cited
            .iter()
            .filter_map(|key| self.bibliography.find(key))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_bibliography_of_the_project_is_read_whole() {
        let entries = REFERENCES.matches("\n@").count();
        let bibliography = Bibliography::of_project();
        assert_eq!(bibliography.entries.len(), entries);
        for entry in &bibliography.entries {
            assert!(
                entry.field("title").is_some() || entry.field("journal").is_some(),
                "{}",
                entry.key
            );
        }
    }

    #[test]
    fn an_article_reads_as_one_cites_it() {
        let entry = Bibliography::of_project();
        let entry = entry.find("wiberg-fenoglio-1968").unwrap().formatted();
        assert!(entry.plain().starts_with(
            "Wiberg, K. B.; Fenoglio, R. A.: J. Am. Chem. Soc., 90 (1968) 3395, combustion"
        ));
    }

    #[test]
    fn numbers_follow_the_order_of_citation() {
        let mut citations = Citations::new(Bibliography::of_project());
        let texts = ["gum-2008", "common practice", "crc2014", "gum-2008"]
            .map(|source| Inline::new().with(citations.cite(source)).plain());
        assert_eq!(texts, ["[1]", "common practice", "[2]", "[1]"]);
        assert_eq!(citations.references().count(), 2);
    }
}
