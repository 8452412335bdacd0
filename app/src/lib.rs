//! The rim: files, command line, window.

pub mod export;
