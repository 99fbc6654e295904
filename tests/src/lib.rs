//! Tables and readers shared by the checks of tautring against the outside.
