//! Arguments, commands, exit codes: thin.

/// A line on standard error, safe to show whatever a file or a file name holds.
macro_rules! tell {
    ($($words:tt)*) => {
        eprintln!("{}", coldsump::report::printable(&format!($($words)*)))
    };
}

mod advise;
mod args;
mod assess;
mod climate;
mod compare;
mod fleet;
mod interview;
mod oil;
mod output;

use args::{Cli, Command};
use clap::{CommandFactory, Parser};
use std::process::ExitCode;

/// Advice given, and a plan starts the machine.
pub(crate) const DONE: u8 = 0;
/// Advice given, no plan starts the machine.
pub(crate) const NO_PLAN: u8 = 3;
/// Interrupted by whoever was asked.
pub(crate) const INTERRUPTED: u8 = 130;
/// Internal or I/O failure.
pub(crate) const FAILED: u8 = 1;
/// Wrong input or call; good cases are still answered.
pub(crate) const WRONG: u8 = 2;

pub(crate) fn main() -> ExitCode {
    let cli = Cli::parse();
    let done = match cli.command {
        None => match interview::offered(&cli.look) {
            Ok(None) => {
                tell!("coldsump: which oil, which heater, which steps on the coldest morning\n");
                tell!("try: coldsump interview --quick");
                tell!("try: coldsump advise CASE.toml");
                tell!("try: coldsump oil HM-46 --at \"-40..100 °C by 10\"");
                tell!("try: coldsump --help");
                Ok(WRONG)
            }
            Ok(Some(code)) => Ok(code),
            Err(error) => Err(error),
        },
        Some(Command::Advise(args)) => advise::run(&args, &cli.look),
        Some(Command::Assess(args)) => assess::run(&args, &cli.look),
        Some(Command::Interview(args)) => interview::run(&args, &cli.look),
        Some(Command::Schema(args)) => schema(args.of),
        Some(Command::Completions(args)) => {
            let mut out = Vec::new();
            clap_complete::generate(args.shell, &mut Cli::command(), "coldsump", &mut out);
            output::put(&String::from_utf8_lossy(&out)).map(|()| DONE)
        }
        Some(Command::Man(args)) => man(args.command.as_deref()),
        Some(Command::Compare(args)) => compare::run(&args, &cli.look),
        Some(Command::Fleet(args)) => fleet::run(&args, &cli.look),
        Some(Command::Climate(command)) => climate::run(&command, &cli.look),
        Some(Command::Oil(args)) => oil::run(&args, &cli.look),
    };
    match done {
        Ok(code) => ExitCode::from(code),
        // A reader that has read enough, such as `head`, is no failure.
        Err(error) if closed_pipe(&error) => ExitCode::from(DONE),
        Err(error) => {
            tell!("coldsump: {error:#}");
            ExitCode::from(FAILED)
        }
    }
}

/// The manual page, in roff.
fn man(command: Option<&str>) -> anyhow::Result<u8> {
    let mut program = Cli::command();
    program.build();
    let page = match command {
        None => program,
        Some(name) => match program.find_subcommand(name) {
            Some(found) => found.clone(),
            None => {
                let names: Vec<&str> =
                    program.get_subcommands().map(clap::Command::get_name).collect();
                tell!("no command `{name}`\n\ntry: {}", names.join(", "));
                return Ok(WRONG);
            }
        },
    };
    let mut roff = Vec::new();
    clap_mangen::Man::new(page).render(&mut roff)?;
    output::put(&String::from_utf8_lossy(&roff))?;
    Ok(DONE)
}

fn schema(of: args::SchemaOf) -> anyhow::Result<u8> {
    match of {
        args::SchemaOf::Advice => output::put(coldsump::report::ADVICE_SCHEMA)?,
        args::SchemaOf::Case => {
            output::put(&output::json(&coldsump::report::case_schema(), true)?)?;
        }
    }
    Ok(DONE)
}

fn closed_pipe(error: &anyhow::Error) -> bool {
    error
        .downcast_ref::<std::io::Error>()
        .is_some_and(|error| error.kind() == std::io::ErrorKind::BrokenPipe)
}
