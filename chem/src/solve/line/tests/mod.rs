mod more;
mod properties;
mod tables;
