//! The case as a whole.

use super::date::Date;
use super::substance::Substance;

/// A case file that was read and found without mistakes.
#[derive(Clone, Debug)]
#[non_exhaustive]
pub struct Case {
    /// Title of the report.
    pub title: String,
    /// The reference under which the report is filed.
    pub reference: String,
    /// The date that the report carries.
    pub date: Date,
    /// Who wrote the case.
    pub author: String,
    /// Revision of the case.
    pub revision: String,
    /// Free remarks, Markdown.
    pub notes: Option<String>,
    /// The substances, in the order of the file; at least one.
    pub substances: Vec<Substance>,
    /// The whole text of the case file, so that its digest is that of what was read.
    pub text: String,
}
