//! Opens the window.
fn main() { let p = std::env::args_os().nth(1).map(Into::into); if let Err(e) = wedgewright::window::run(p) { eprintln!("{e}"); std::process::exit(2) } }
