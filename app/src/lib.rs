//! The rim of Wedgewright: files, command line, window. It holds no chemistry.

pub mod command;
pub mod export;
pub mod session;
pub mod window;
