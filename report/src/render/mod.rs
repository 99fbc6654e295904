//! The writers: one document in; Markdown, HTML and figures out, and JSON beside it.

mod error;
pub mod figures;
mod folder;
mod html;
mod json;
mod markdown;

pub use error::RenderError;
pub use folder::write_all;
pub use html::html;
pub use json::{contract, json};
pub use markdown::markdown;

#[cfg(test)]
mod tests;
