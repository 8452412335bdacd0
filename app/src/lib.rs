//! The rim: files, command line, window.

pub mod command;
pub mod session;
pub mod window;
