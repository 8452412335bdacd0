//! Tests of the typed line: the tables of the grammar, further lines, properties.

mod more;
mod properties;
mod tables;
