//! Text in, drawings out, and back.
