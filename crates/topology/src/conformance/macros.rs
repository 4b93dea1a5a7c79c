//! One line, one kernel under test.

/// Makes a module of tests that run the whole conformance suite on a kernel.
///
/// `conformance_suite!(name, Type, capabilities)`: `name` is the module's, `capabilities` a
/// [`Capabilities`](crate::conformance::Capabilities) expression. The environment variable
/// `MERESTONE_CONFORMANCE_CASES` sets how many random complexes are tried; a failure names the
/// complex with its seed.
///
/// ```
/// use merestone_topology::conformance::{Capabilities, Reference};
/// merestone_topology::conformance_suite!(
///     reference,
///     Reference,
///     Capabilities::everything("reference")
/// );
/// ```
#[macro_export]
macro_rules! conformance_suite {
    ($name:ident, $kernel:ty, $capabilities:expr) => {
        #[cfg(test)]
        mod $name {
            #[allow(unused_imports)]
            use super::*;
            use $crate::conformance as suite;

            const CAPABILITIES: suite::Capabilities = $capabilities;

            /// Runs a corpus; what was refused must be what the capabilities leave out.
            fn run(corpus: impl IntoIterator<Item = suite::Complex>) {
                let mut left_out = 0;
                let corpus = corpus.into_iter().inspect(|complex: &suite::Complex| {
                    let faces = 0..complex.faces.len();
                    left_out +=
                        usize::from(faces.into_iter().any(|f| complex.exceeds(f, &CAPABILITIES)));
                });
                let ran = suite::check_corpus::<$kernel>(&CAPABILITIES, corpus, 1)
                    .unwrap_or_else(|failure| panic!("{failure}"));
                assert!(ran.held > 0, "no complex was held: {ran:?}");
                assert_eq!(ran.refused, left_out, "refused, and beyond the capabilities");
            }

            #[test]
            fn holds_the_named_complexes() {
                run(suite::named_complexes());
            }

            #[test]
            fn holds_every_tiny_triangle_list() {
                run(suite::tiny_triangle_lists(3));
            }

            #[test]
            fn holds_every_tiny_list_with_repeated_vertices() {
                run(suite::tiny_degenerate_lists(2));
            }

            #[test]
            fn holds_random_complexes() {
                run(suite::random_complexes(0, suite::case_count(120)));
            }

            #[test]
            fn refuses_malformed_lists() {
                let ran = suite::check_malformed_lists::<$kernel>(&CAPABILITIES)
                    .unwrap_or_else(|failure| panic!("{failure}"));
                assert!(ran.held > 0, "no list was tried: {ran:?}");
            }
        }
    };
}
