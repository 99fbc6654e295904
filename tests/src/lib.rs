//! Tables, spellings and programs that the checks share.

pub mod features;
pub mod folder;
pub mod program;
pub mod random;
pub mod renumber;
pub mod scratch;
pub mod table;
