//! What the figures were taken on.

use serde::Serialize;

/// The machine and the build that a trial ran on.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Machine {
    /// The processor's own name for itself, where the system tells.
    pub processor: Option<String>,
    /// Cores that this program may use.
    pub cores: usize,
    /// Threads that the works used.
    pub threads: usize,
    /// The compiler that built this program.
    pub compiler: Option<&'static str>,
    /// Whether the compiler optimised: figures of a debug build say nothing about kernels.
    pub optimized: bool,
}

impl Machine {
    /// This one.
    #[must_use]
    pub fn here(threads: usize) -> Self {
        Self {
            processor: std::fs::read_to_string("/proc/cpuinfo").ok().as_deref().and_then(processor),
            cores: std::thread::available_parallelism().map_or(1, usize::from),
            threads,
            compiler: Some(env!("MERESTONE_COMPILER")).filter(|version| !version.is_empty()),
            optimized: !cfg!(debug_assertions),
        }
    }
}

/// The processor's name in the form Linux gives it.
fn processor(cpuinfo: &str) -> Option<String> {
    cpuinfo
        .lines()
        .filter_map(|line| line.split_once(':'))
        .find(|(key, _)| matches!(key.trim(), "model name" | "Model" | "Hardware" | "cpu model"))
        .map(|(_, name)| name.split_whitespace().collect::<Vec<_>>().join(" "))
        .filter(|name| !name.is_empty())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn processors_are_read_from_what_linux_writes() {
        let x86 =
            "processor\t: 0\nvendor_id\t: Any\nmodel name\t: Any  CPU @ 2 GHz\n\nprocessor\t: 1\n";
        assert_eq!(processor(x86).as_deref(), Some("Any CPU @ 2 GHz"));
        assert_eq!(processor("processor : 0\nBogoMIPS : 48.00\n"), None);
        assert_eq!(processor("model name : \n"), None);
    }

    #[test]
    fn this_machine_has_a_core_and_a_compiler() {
        let here = Machine::here(1);
        assert!(here.cores >= 1);
        assert!(here.compiler.is_some_and(|version| version.starts_with("rustc ")));
    }
}
