//! What can be typed.

use clap::{Args, Parser, Subcommand, ValueEnum};

/// Cold-start advice for hydraulic machines.
///
/// Which oil, which heater and which steps a hydraulic machine needs on the coldest morning.
#[derive(Debug, Parser)]
#[command(
    version,
    after_help = "Examples:
  coldsump advise examples/skarn-loader.toml
  coldsump advise examples/skarn-loader.toml --set \"site.minimum_temperature=-30 °C\"
  coldsump advise loader.toml --format markdown -o loader.md
  coldsump oil HM-46 --at \"-40..100 °C by 10\"

Exit codes: 0 advice given and a plan starts the machine (with its cautions), 1 internal or I/O
failure, 2 wrong input or call, 3 advice given but no plan starts it, 130 interrupted."
)]
pub(crate) struct Cli {
    #[command(subcommand)]
    pub(crate) command: Option<Command>,
    #[command(flatten)]
    pub(crate) look: LookArgs,
}

#[derive(Debug, Args)]
pub(crate) struct LookArgs {
    /// When to use colour
    #[arg(long, global = true, value_enum, default_value = "auto", value_name = "WHEN")]
    pub(crate) color: ColorWhen,
    /// Use only ASCII characters
    #[arg(long, global = true)]
    pub(crate) ascii: bool,
    /// Never ask anything
    #[arg(long, global = true)]
    pub(crate) no_input: bool,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum ColorWhen {
    Auto,
    Always,
    Never,
}

#[derive(Debug, Subcommand)]
pub(crate) enum Command {
    /// Advice for a case: which oil, which heater, which steps, what can hurt
    #[command(after_help = "Examples:
  coldsump advise loader.toml
  coldsump advise loader.toml --format markdown -o loader.md
  coldsump advise loader.toml --format html -o loader.html    the card for the cab, and the file
  coldsump advise loader.toml --charts
  coldsump advise loader.toml --set \"suction.bore=63.5 mm\"
  coldsump advise *.toml --format json        one line a case
  cat loader.toml | coldsump advise -")]
    Advise(AdviseArgs),
    /// Questions that make a case, then the advice
    #[command(after_help = "Examples:
  coldsump interview --quick
  coldsump interview loader.toml          its answers stand as defaults; a new file is written
  coldsump interview --plain              numbered lines, no redraw
  coldsump interview --quick --answers answers.toml -o loader.toml

In it: Esc goes back, `?` is I don't know, Ctrl-C leaves with everything saved.")]
    Interview(InterviewArgs),
    /// What changed between two cases, and why
    #[command(after_help = "Example:
  coldsump compare loader.toml loader-new-hose.toml")]
    Compare(CompareArgs),
    /// Many machines: what to buy, fit and stock, and what the yard must carry
    #[command(after_help = "Examples:
  coldsump fleet fleet.csv
  coldsump fleet fleet.csv --yard-power \"30 kW\"
  coldsump fleet fleet.csv --format csv -o decided.csv
  coldsump fleet fleet.csv --sweep \"site.minimum_temperature=-20..-50 °C by 5\"
  coldsump fleet fleet.csv --format csv --card cards
  cat rows.jsonl | coldsump fleet - --format jsonl")]
    Fleet(FleetArgs),
    /// Every oil of a case: viscosity at the soak, limits, floors, heating
    #[command(after_help = "Examples:
  coldsump assess loader.toml
  coldsump assess loader.toml --format json
  coldsump assess loader.toml --set \"suction.bore=63.5 mm\" --oil \"oil in service\"
  coldsump assess *.toml --format json        one line a case
  cat loader.toml | coldsump assess -")]
    Assess(AssessArgs),
    /// Sites and their cold
    #[command(subcommand)]
    Climate(ClimateCommand),
    /// The JSON Schema of a case file or of the advice
    #[command(after_help = "Examples:
  coldsump schema case > case.schema.json      for editors: `#:schema case.schema.json`
  coldsump schema advice")]
    Schema(SchemaArgs),
    /// Completions for a shell
    #[command(after_help = "Example:
  coldsump completions bash > ~/.local/share/bash-completion/completions/coldsump")]
    Completions(CompletionsArgs),
    /// The manual page of the program, or of one command
    #[command(after_help = "Examples:
  coldsump man > coldsump.1
  coldsump man fleet | man -l -")]
    Man(ManArgs),
    /// One oil over temperature
    #[command(after_help = "Examples:
  coldsump oil HM-46 --at \"-40..100 °C by 10\"
  coldsump oil --viscosity \"40 °C=32 mm²/s\" --viscosity \"100 °C=6.3 mm²/s\" \\
      --base polymer-thickened --pour-point \"-39 °C\" --at \"-30 °C\"
  coldsump oil --file loader.toml --at \"-40..0 °C by 5\" --format csv")]
    Oil(OilArgs),
}

#[derive(Debug, Default, Args)]
pub(crate) struct InterviewArgs {
    /// A case whose answers stand as defaults; it is not changed
    #[arg(value_name = "CASE")]
    pub(crate) case: Option<std::path::PathBuf>,
    /// About fifteen questions; all else typical and listed as assumed
    #[arg(long)]
    pub(crate) quick: bool,
    /// Numbered lines without redraw, for screen readers and dumb terminals
    #[arg(long)]
    pub(crate) plain: bool,
    /// Answers from a file, by question id
    #[arg(long, value_name = "FILE")]
    pub(crate) answers: Option<std::path::PathBuf>,
    /// The case to write; a new name where not given
    #[arg(short, long, value_name = "FILE")]
    pub(crate) output: Option<std::path::PathBuf>,
    /// Overwrite it
    #[arg(long, requires = "output")]
    pub(crate) force: bool,
    /// Do not offer to go on with what was left unfinished
    #[arg(long)]
    pub(crate) fresh: bool,
    /// Units of the advice
    #[arg(long, value_enum)]
    pub(crate) units: Option<UnitsArg>,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum SchemaOf {
    Case,
    Advice,
}

#[derive(Debug, Args)]
pub(crate) struct SchemaArgs {
    /// Of what
    #[arg(value_enum, default_value = "advice")]
    pub(crate) of: SchemaOf,
}

#[derive(Debug, Args)]
pub(crate) struct CompletionsArgs {
    /// The shell
    #[arg(value_enum)]
    pub(crate) shell: clap_complete::Shell,
}

#[derive(Debug, Args)]
pub(crate) struct ManArgs {
    /// The command; the whole program where not given
    #[arg(value_name = "COMMAND")]
    pub(crate) command: Option<String>,
}

#[derive(Debug, Args)]
pub(crate) struct CompareArgs {
    /// The first case
    #[arg(value_name = "CASE")]
    pub(crate) one: std::path::PathBuf,
    /// The second case
    #[arg(value_name = "OTHER")]
    pub(crate) other: std::path::PathBuf,
    /// Units to show
    #[arg(long, value_enum)]
    pub(crate) units: Option<UnitsArg>,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum FleetFormat {
    Text,
    Csv,
    Jsonl,
    Html,
}

#[derive(Debug, Clone, Args)]
pub(crate) struct FleetArgs {
    /// CSV, TOML or JSON Lines of machines; `-` reads standard input
    #[arg(value_name = "FLEET")]
    pub(crate) fleet: std::path::PathBuf,
    /// How to write it
    #[arg(long, value_enum, default_value = "text")]
    pub(crate) format: FleetFormat,
    /// Write to a file
    #[arg(short, long, value_name = "FILE")]
    pub(crate) output: Option<std::path::PathBuf>,
    /// Overwrite what is there
    #[arg(long)]
    pub(crate) force: bool,
    /// Go on with a run of csv or jsonl that was broken off
    #[arg(long, requires = "output", conflicts_with = "force")]
    pub(crate) resume: bool,
    /// A case file for rows that name no base
    #[arg(long, value_name = "CASE")]
    pub(crate) base: Option<String>,
    /// Set a key of every machine; may be repeated
    #[arg(long, value_name = "KEY=VALUE")]
    pub(crate) set: Vec<String>,
    /// One key over a range: how many machines still start
    #[arg(long, value_name = "KEY=FROM..TO by STEP")]
    pub(crate) sweep: Option<String>,
    /// What the yard's supply carries
    #[arg(long, value_name = "POWER")]
    pub(crate) yard_power: Option<coldsump::quantity::Power>,
    /// Write each machine's card and pages into a folder
    #[arg(long, value_name = "FOLDER")]
    pub(crate) card: Option<std::path::PathBuf>,
    /// Units to show
    #[arg(long, value_enum)]
    pub(crate) units: Option<UnitsArg>,
}

#[derive(Debug, Subcommand)]
pub(crate) enum ClimateCommand {
    /// Design classes, and the climates that are at hand
    List,
    /// One climate: its minima, wind, cold day, and where they come from
    #[command(after_help = "Examples:
  coldsump climate show C2
  coldsump climate show skarn-ridge --units us
  coldsump climate show climates/skarn-ridge.toml")]
    Show(ClimateShowArgs),
    /// A climate file from weather records: GHCN-Daily, EPW, TMY3, ISD-Lite, or a CSV of date and tmin
    #[command(after_help = "Examples:
  coldsump climate from USW00026442.dly -o climates/valdez.toml
  coldsump climate from 702910TY.csv -o climates/northway.toml --start-hour 6
  coldsump climate from 702910-26412-*.txt -o x.toml --utc-offset -9
  coldsump climate show climates/valdez.toml")]
    From(ClimateFromArgs),
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum UnitArg {
    /// °C
    C,
    /// °F
    F,
}

#[derive(Debug, Args)]
pub(crate) struct ClimateFromArgs {
    /// Weather records of one place
    #[arg(required = true, value_name = "RECORDS")]
    pub(crate) records: Vec<std::path::PathBuf>,
    /// The climate file to write, whole or not at all
    #[arg(short, long, value_name = "FILE")]
    pub(crate) output: std::path::PathBuf,
    /// Overwrite the file
    #[arg(long)]
    pub(crate) force: bool,
    /// What a case calls it; the name of the file where not given
    #[arg(long, value_name = "NAME")]
    pub(crate) name: Option<String>,
    /// Local standard time less UTC, hours: for records in UTC
    #[arg(long, value_name = "HOURS", allow_hyphen_values = true)]
    pub(crate) utc_offset: Option<f64>,
    /// Unit of values whose file does not say it
    #[arg(long, value_enum, value_name = "UNIT")]
    pub(crate) units: Option<UnitArg>,
    /// Hour of the morning that starts are counted at
    #[arg(long, value_name = "HOUR", default_value = "6", value_parser = clap::value_parser!(u32).range(1..=24))]
    pub(crate) start_hour: u32,
    /// Where the records come from, for the file
    #[arg(long, value_name = "TEXT")]
    pub(crate) source: Option<String>,
}

#[derive(Debug, Args)]
pub(crate) struct ClimateShowArgs {
    /// A design class, a built-in site, or a climate file
    #[arg(value_name = "NAME")]
    pub(crate) name: String,
    /// A case whose minimum and start floors are marked in the chart
    #[arg(long, value_name = "CASE")]
    pub(crate) case: Option<std::path::PathBuf>,
    /// Units to show
    #[arg(long, value_enum)]
    pub(crate) units: Option<UnitsArg>,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum AssessFormat {
    Text,
    Json,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum OilFormat {
    Text,
    Json,
    Csv,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum UnitsArg {
    Metric,
    Us,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum AdviseFormat {
    Text,
    Json,
    Markdown,
    Html,
}

#[derive(Debug, Args)]
pub(crate) struct AdviseArgs {
    /// Case files; `-` reads standard input
    #[arg(required = true, value_name = "CASE")]
    pub(crate) cases: Vec<std::path::PathBuf>,
    /// How to write the advice
    #[arg(long, value_enum, default_value = "text")]
    pub(crate) format: AdviseFormat,
    /// Draw the charts behind the text
    #[arg(long)]
    pub(crate) charts: bool,
    /// Write to a file, whole or not at all
    #[arg(short, long, value_name = "FILE")]
    pub(crate) output: Option<std::path::PathBuf>,
    /// Overwrite the file
    #[arg(long, requires = "output")]
    pub(crate) force: bool,
    /// Units to show
    #[arg(long, value_enum)]
    pub(crate) units: Option<UnitsArg>,
    /// Only oils of this name; may be repeated
    #[arg(long, value_name = "NAME")]
    pub(crate) oil: Vec<String>,
    /// Set a key of the case, `none` takes it out; may be repeated
    #[arg(long, value_name = "KEY=VALUE")]
    pub(crate) set: Vec<String>,
}

#[derive(Debug, Args)]
pub(crate) struct AssessArgs {
    /// Case files; `-` reads standard input
    #[arg(required = true, value_name = "CASE")]
    pub(crate) cases: Vec<std::path::PathBuf>,
    /// How to write the answer
    #[arg(long, value_enum, default_value = "text")]
    pub(crate) format: AssessFormat,
    /// Units to show
    #[arg(long, value_enum)]
    pub(crate) units: Option<UnitsArg>,
    /// Only oils of this name; may be repeated
    #[arg(long, value_name = "NAME")]
    pub(crate) oil: Vec<String>,
    /// Set a key of the case, `none` takes it out; may be repeated
    #[arg(long, value_name = "KEY=VALUE")]
    pub(crate) set: Vec<String>,
}

#[derive(Debug, Args)]
#[command(group = clap::ArgGroup::new("which").required(true).args(["class", "file", "viscosity"]))]
pub(crate) struct OilArgs {
    /// A built-in class, such as HM-46
    #[arg(value_name = "CLASS")]
    pub(crate) class: Option<String>,
    /// All oils of a case file
    #[arg(long, value_name = "CASE")]
    pub(crate) file: Option<std::path::PathBuf>,
    /// A data-sheet viscosity, "40 °C=46 mm²/s"; at least two
    #[arg(long, value_name = "T=VISCOSITY")]
    pub(crate) viscosity: Vec<String>,
    /// What the oil is made from
    #[arg(long, value_name = "BASE", requires = "viscosity")]
    pub(crate) base: Option<String>,
    /// Pour point
    #[arg(long, value_name = "T", requires = "viscosity", allow_hyphen_values = true)]
    pub(crate) pour_point: Option<String>,
    /// Density at 15 °C
    #[arg(long, value_name = "D", requires = "viscosity")]
    pub(crate) density: Option<String>,
    /// Temperatures: "-40..100 °C by 10", or one: "-30 °C"
    #[arg(long, value_name = "RANGE", allow_hyphen_values = true)]
    pub(crate) at: String,
    /// How to write the answer
    #[arg(long, value_enum, default_value = "text")]
    pub(crate) format: OilFormat,
    /// Units to show
    #[arg(long, value_enum)]
    pub(crate) units: Option<UnitsArg>,
}
