//! A requirement line as typed: its grammar, notes and errors.
