//! The program `wirewright`: views, the document, the background worker, and the headless commands.

pub mod answers;
pub mod app;
pub mod cli;
pub mod command;
pub mod desk;
pub mod document;
pub mod edit;
pub mod explain;
pub mod headless;
pub mod keys;
pub mod looks;
pub mod paper;
pub mod snapshot;
pub mod start;
pub mod theme;
pub mod views;
pub mod worker;
