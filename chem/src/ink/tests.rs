//! What the paper must show, whole figures at a time.
