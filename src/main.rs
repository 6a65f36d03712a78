//! The program: arguments in, exit code out.

mod cli;

fn main() -> std::process::ExitCode {
    cli::main()
}
