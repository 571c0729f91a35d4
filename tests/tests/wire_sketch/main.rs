//! The sketch of a straight wire against published values and facts of the trade. Figures and their sources stand in
//! `data/wire/*.toml`.

mod common;
mod induced_emf;
mod metal;
mod resonance;
mod trade;
