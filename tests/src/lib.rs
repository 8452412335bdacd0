//! Helpers that the runners share.
