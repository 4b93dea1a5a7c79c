//! Shared pieces.
