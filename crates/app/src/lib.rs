//! The program `wirewright`: views, the document, the background worker, and the headless commands.

pub mod command;
pub mod explain;
pub mod snapshot;
pub mod theme;
pub mod views;
