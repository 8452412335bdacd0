//! The rim: files, command line, window.
