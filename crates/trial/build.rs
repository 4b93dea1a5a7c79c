//! Hands the compiler's version to the crate, so that a trial can say what it was built with.

use std::process::Command;

fn main() {
    println!("cargo::rerun-if-changed=build.rs");
    println!("cargo::rerun-if-env-changed=RUSTC");
    let version = std::env::var_os("RUSTC")
        .and_then(|rustc| Command::new(rustc).arg("--version").output().ok())
        .filter(|output| output.status.success())
        .and_then(|output| String::from_utf8(output.stdout).ok());
    println!("cargo::rustc-env=MERESTONE_COMPILER={}", version.as_deref().unwrap_or("").trim());
}
