//! Drawings and pages of the station plan sheet: a scene in millimetres, its page layout, and what writes it.

pub mod tokens;
