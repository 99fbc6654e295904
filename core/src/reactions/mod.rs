//! Reactions that define a strain energy, built from the graph: bond separation, homodesmotic and hyperhomodesmotic reactions, and the
//! homologous CH2 increment.
//!
//! A ring system is taken apart into units (an atom; an aromatic system; atoms that a formal charge ties together) joined by links (ring
//! bonds). Copies of units, with hydrogens on every bond that was cut, are the small molecules of the reactions. With L the links and d
//! the number of links of a unit:
//!
//! | class | molecule → |
//! | --- | --- |
//! | isodesmic | Σ over L of pairs − Σ over units of (d hydrides − unit with its substituents) |
//! | homodesmotic | Σ over units of shells − Σ over L of closed pairs |
//! | hyperhomodesmotic | Σ over L of pairs of shells − Σ over units of (d − 1) shells |
//!
//! A shell is a unit with its substituents and its neighbours in the ring; in all but bond separation a unit brings along what multiple
//! bonds tie to it, so that no hybridisation changes. Substituents outside the ring system stay whole and stay where they are: only one
//! ring system is opened. Configurations of double bonds are kept where the copy holds both ends and references, those of tetrahedral
//! centres are not: the reference is an open chain that can turn.
//!
//! # Source
//! `hehre-1970` (bond separation), `george-1975` (homodesmotic), `wheeler-2009` (the hierarchy, hyperhomodesmotic).

mod balance;
mod carbon_free;
mod class;
mod difference;
mod error;
mod fragment;
mod methylene;
mod opened_system;
mod site;
mod species;

pub use balance::{Balance, Entry, Kind};
pub use carbon_free::{PublishedEnthalpy, carbon_free_enthalpies, carbon_free_enthalpy};
pub use class::ReactionClass;
pub use difference::Difference;
pub use error::ReactionError;
pub use methylene::{methylene_increment, methylene_ring_size};
pub use species::{MAX_SPECIES, species};
