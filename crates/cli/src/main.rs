//! The merestone program.
#![forbid(unsafe_code)]

mod check;
mod table;
mod trial;

use clap::{Parser, Subcommand};
use std::process::ExitCode;

/// Boundary representations: whether a mesh bounds a solid, and which kernel suits it.
#[derive(Debug, Parser)]
#[command(name = "merestone", version, arg_required_else_help = true)]
struct Cli {
    #[command(subcommand)]
    command: Command,
}

#[derive(Debug, Subcommand)]
enum Command {
    Check(check::Check),
    Trial(trial::Arguments),
}

fn main() -> ExitCode {
    match Cli::parse().command {
        Command::Check(arguments) => check::run(&arguments),
        Command::Trial(arguments) => trial::run(&arguments),
    }
}
