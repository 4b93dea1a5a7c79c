//! Shared pieces of the tests, and the README's programs as doc tests.
#![forbid(unsafe_code)]
#![doc = include_str!("../README.md")]
