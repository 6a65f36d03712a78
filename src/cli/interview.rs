//! `coldsump interview`: the terminal, plain lines and answer files behind the one seam, and the files.

use super::args::{InterviewArgs, LookArgs};
use super::climate::Folders;
use super::{DONE, INTERRUPTED, NO_PLAN, WRONG, output};
use anyhow::{Context, Result};
use coldsump::case::CaseFile;
use coldsump::interview::{self, Ask, Draft, Length, Prompt, Reply, Script, Stop};
use coldsump::{advice, report};
use std::io::{BufRead, IsTerminal, Write};
use std::path::{Path, PathBuf};

pub(crate) fn run(args: &InterviewArgs, look: &LookArgs) -> Result<u8> {
    let seen = std::io::stdin().is_terminal() && std::io::stderr().is_terminal();
    if args.answers.is_none() && !args.plain && (!seen || look.no_input) {
        tell!(
            "the interview needs a terminal\n\ntry: coldsump interview --plain, or --answers FILE, or write a case file and coldsump advise it"
        );
        return Ok(WRONG);
    }
    let target = target(args);
    if let Some(there) = taken(&target).filter(|_| !args.force) {
        tell!("{} is there already\n\ntry: --force, or another name", there.display());
        return Ok(WRONG);
    }
    let base = match &args.case {
        Some(path) => {
            let (name, text) = output::read(path)?;
            CaseFile::read(&name, &text)
        }
        None => {
            let stem = target.file_stem().map_or_else(String::new, |s| s.to_string_lossy().into());
            CaseFile::read(&stem, "format = 1\n")
        }
    };
    let drafted = beside(&target, "draft.toml");
    let length = if args.quick { Length::Quick } else { Length::Full };
    let sites = Folders::of(args.case.as_deref().unwrap_or_else(|| Path::new("./x")));
    if let Some(path) = &args.answers {
        let (name, text) = output::read(path)?;
        let mut script = match Script::read(&name, &text) {
            Ok(script) => script,
            Err(message) => {
                tell!("{message}");
                return Ok(WRONG);
            }
        };
        let mut draft = Draft::new();
        let done =
            interview::interview(&mut script, &base, &mut draft, length, &sites, &mut |_| Ok(()));
        let unused: Vec<String> = script.unused().map(str::to_owned).collect();
        if !unused.is_empty() && done.is_ok() {
            tell!("{name}: no question asked for {}", unused.join(", "));
            return Ok(WRONG);
        }
        return close(done, args, &target, None, &sites, look);
    }
    let mut terminal = Terminal::new(look);
    let mut plain = Plain { input: std::io::stdin().lock(), count: 0 };
    let ask: &mut dyn Ask = if args.plain { &mut plain } else { &mut terminal };
    let mut draft = resume(ask, &drafted, args)?;
    let shown = drafted.display().to_string();
    if args.case.is_some() {
        ask.say(&format!(
            "Your case is not changed: a new one is written to {}.",
            target.display()
        ));
    }
    ask.say("Esc goes back one question (in plain lines: <), `?` is I don't know, Ctrl-C leaves with everything saved.");
    let mut save = |draft: &Draft| {
        output::write(&drafted, &draft.write(), true).map_err(|error| format!("{error:#}"))
    };
    let done = interview::interview(ask, &base, &mut draft, length, &sites, &mut save);
    if matches!(done, Err(Stop::Interrupted)) {
        let kept = if draft.is_empty() {
            "nothing was answered yet".to_owned()
        } else {
            format!("your answers are in {shown}; start again and go on")
        };
        tell!("\nstopped: {kept}");
        return Ok(INTERRUPTED);
    }
    close(done, args, &target, Some(&drafted), &sites, look)
}

/// Goes on with a draft that was left, where that is wanted.
fn resume(ask: &mut dyn Ask, drafted: &Path, args: &InterviewArgs) -> Result<Draft> {
    let text = match std::fs::read(drafted) {
        Ok(bytes) => String::from_utf8_lossy(&bytes).into_owned(),
        Err(error) if error.kind() == std::io::ErrorKind::NotFound => return Ok(Draft::new()),
        Err(error) => {
            return Err(error).with_context(|| format!("cannot read {}", drafted.display()));
        }
    };
    let draft = match Draft::read(&drafted.display().to_string(), &text) {
        Ok(draft) => draft,
        Err(error) => {
            ask.say(&format!("{error}; this is a new start"));
            return set_aside(ask, drafted);
        }
    };
    let count = draft.answers().count();
    if count == 0 {
        return Ok(draft);
    }
    if args.fresh {
        return set_aside(ask, drafted);
    }
    let choices = [
        ("go-on".to_owned(), format!("go on with the {count} answers saved")),
        ("anew".to_owned(), "start anew".to_owned()),
    ];
    let check = |text: &str| {
        if choices.iter().any(|(word, _)| word == text) {
            Ok(())
        } else {
            Err(format!("`{text}` is neither go-on nor anew"))
        }
    };
    let reply = ask.ask(&Prompt {
        id: "resume",
        text: "An interview was left unfinished. Go on?",
        help: "nothing that was answered is lost",
        default: Some("go-on"),
        choices: &choices,
        check: &check,
    });
    match reply {
        Ok(Reply::Text(text)) if text == "anew" => set_aside(ask, drafted),
        _ => Ok(draft),
    }
}

/// The case is made: written, advised on, and the command that does it again named.
fn close(
    done: Result<CaseFile, Stop>,
    args: &InterviewArgs,
    target: &Path,
    drafted: Option<&Path>,
    sites: &Folders,
    look: &LookArgs,
) -> Result<u8> {
    let file = match done {
        Ok(file) => file,
        Err(Stop::Interrupted) => return Ok(INTERRUPTED),
        Err(Stop::Io(message)) => anyhow::bail!("{message}"),
        Err(stop) => {
            tell!("{stop}");
            return Ok(WRONG);
        }
    };
    let case = match file.check_in(sites) {
        Ok(case) => case,
        Err(faults) => {
            tell!("{faults}");
            return Ok(WRONG);
        }
    };
    let advice = advice::advise(&case);
    let units = output::units(args.units).unwrap_or(case.units);
    let document = report::advice(&case, &advice, units);
    output::write(target, &file.write(), args.force)?;
    let sheet = beside(target, "md");
    output::write(&sheet, &report::markdown(&document), args.force)?;
    if let Some(drafted) = drafted {
        // The case holds all that the draft held.
        let _ = std::fs::remove_file(drafted);
    }
    output::put(&format!("\n{}", report::text(&document, output::look(look))))?;
    tell!(
        "\nthe case is in {}, the procedure to edit and sign in {}\n\ntry: coldsump advise {}",
        target.display(),
        sheet.display(),
        target.display()
    );
    Ok(if advice.decision.starts() { DONE } else { NO_PLAN })
}

/// The file to write: the one asked for, else a new name beside the case.
fn target(args: &InterviewArgs) -> PathBuf {
    if let Some(path) = &args.output {
        return path.clone();
    }
    let (folder, stem) = match &args.case {
        Some(path) => (
            path.parent().map(Path::to_path_buf).unwrap_or_default(),
            path.file_stem().map_or_else(|| "case".into(), |s| s.to_string_lossy().into_owned()),
        ),
        None => (PathBuf::new(), "case".to_owned()),
    };
    let first = folder.join(format!("{stem}.toml"));
    if args.case.is_none() && taken(&first).is_none() {
        return first;
    }
    (2..)
        .map(|n| folder.join(format!("{stem}-{n}.toml")))
        .find(|path| taken(path).is_none())
        .unwrap_or(first)
}

/// The case or the procedure that would be written over.
fn taken(target: &Path) -> Option<PathBuf> {
    [target.to_path_buf(), beside(target, "md")]
        .into_iter()
        .find(|path| path.symlink_metadata().is_ok())
}

/// Answers that are not gone on with are kept under another name.
fn set_aside(ask: &mut dyn Ask, drafted: &Path) -> Result<Draft> {
    let free = (1..)
        .map(|n| beside(drafted, &format!("old-{n}.toml")))
        .find(|path| path.symlink_metadata().is_err());
    if let Some(free) = free {
        std::fs::rename(drafted, &free)
            .with_context(|| format!("cannot keep {} as {}", drafted.display(), free.display()))?;
        ask.say(&format!("The earlier answers are kept in {}.", free.display()));
    }
    Ok(Draft::new())
}

/// `loader.toml` with another end.
fn beside(path: &Path, end: &str) -> PathBuf {
    path.with_extension(end)
}

/// Questions with keys and lists, on standard error.
struct Terminal;

impl Terminal {
    fn new(look: &LookArgs) -> Self {
        let mut config = if output::look(look).color {
            inquire::ui::RenderConfig::default()
        } else {
            inquire::ui::RenderConfig::empty()
        };
        config = config
            .with_prompt_prefix(inquire::ui::Styled::new(">"))
            .with_answered_prompt_prefix(inquire::ui::Styled::new("-"))
            .with_canceled_prompt_indicator(inquire::ui::Styled::new("< back"));
        inquire::set_global_render_config(config);
        Self
    }
}

impl Ask for Terminal {
    fn ask(&mut self, prompt: &Prompt<'_>) -> Result<Reply, Stop> {
        self.say(&format!("  {}", prompt.help));
        let reply = if prompt.choices.is_empty() { typed(prompt) } else { chosen(prompt) };
        match reply {
            Ok(text) => Ok(Reply::Text(text)),
            Err(inquire::InquireError::OperationCanceled) => Ok(Reply::Back),
            Err(inquire::InquireError::OperationInterrupted) => Err(Stop::Interrupted),
            Err(error) => Err(Stop::Io(error.to_string())),
        }
    }

    fn say(&mut self, text: &str) {
        for line in text.lines() {
            tell!("{}", wrapped(line, width()));
        }
    }
}

fn typed(prompt: &Prompt<'_>) -> Result<String, inquire::InquireError> {
    let mut initial = String::new();
    loop {
        let shown;
        let mut question = inquire::Text::new(prompt.text);
        if !initial.is_empty() {
            question = question.with_initial_value(&initial);
        } else if let Some(default) = prompt.default {
            shown = coldsump::report::printable(default);
            question = question.with_default(&shown);
        }
        let text = question.prompt()?;
        let text = if text.trim().is_empty() { "?".to_owned() } else { text.trim().to_owned() };
        match (prompt.check)(&text) {
            Ok(()) => return Ok(text),
            Err(message) => {
                tell!("{}", wrapped(&format!("  ! {message}"), width()));
                initial = if text == "?" { String::new() } else { text };
            }
        }
    }
}

fn chosen(prompt: &Prompt<'_>) -> Result<String, inquire::InquireError> {
    let words: Vec<&str> = prompt.choices.iter().map(|(_, words)| words.as_str()).collect();
    let at = prompt
        .default
        .and_then(|default| prompt.choices.iter().position(|(word, _)| word == default))
        .unwrap_or(0);
    let question = inquire::Select::new(prompt.text, words)
        .with_help_message("arrows and Enter, Esc goes back")
        .with_starting_cursor(at)
        .with_page_size(9);
    let picked = if prompt.choices.len() > 12 {
        question.raw_prompt()?
    } else {
        question.without_filtering().raw_prompt()?
    };
    Ok(prompt.choices.get(picked.index).map_or_else(String::new, |(word, _)| word.clone()))
}

/// One question a line, without redraw: for screen readers and dumb terminals.
struct Plain<R> {
    input: R,
    count: usize,
}

impl<R: BufRead> Ask for Plain<R> {
    fn ask(&mut self, prompt: &Prompt<'_>) -> Result<Reply, Stop> {
        self.count += 1;
        tell!("{}. {} [{}]", self.count, prompt.text, prompt.id);
        tell!("   {}", prompt.help);
        for (at, (_, words)) in prompt.choices.iter().enumerate() {
            tell!("   {} {words}", at + 1);
        }
        loop {
            match prompt.default {
                Some(default) => {
                    eprint!("   (Enter: {}) > ", coldsump::report::printable(default));
                }
                None => eprint!("   > "),
            }
            let _ = std::io::stderr().flush();
            let mut line = String::new();
            let read = self.input.read_line(&mut line).map_err(|e| Stop::Io(e.to_string()))?;
            if read == 0 {
                return Err(Stop::Interrupted);
            }
            let line = line.trim();
            if line == "<" {
                return Ok(Reply::Back);
            }
            let text = if line.is_empty() { prompt.default.unwrap_or("?") } else { line };
            let by_number = text
                .parse::<usize>()
                .ok()
                .and_then(|n| prompt.choices.get(n.checked_sub(1)?))
                .map(|(word, _)| word.clone());
            let text = by_number.unwrap_or_else(|| text.to_owned());
            match (prompt.check)(&text) {
                Ok(()) => return Ok(Reply::Text(text)),
                Err(message) => tell!("   ! {message}"),
            }
        }
    }

    fn say(&mut self, text: &str) {
        tell!("{text}");
    }
}

/// Columns of the terminal, less one: a full line would break by itself.
fn width() -> usize {
    crossterm::terminal::size().map_or(79, |(columns, _)| usize::from(columns.max(20)) - 1)
}

/// A line in lines of a width; its indent goes on.
fn wrapped(text: &str, width: usize) -> String {
    let indent = text.len() - text.trim_start().len();
    let mut out = " ".repeat(indent);
    let mut column = indent;
    for word in text.trim_start().split(' ') {
        let length = word.chars().count();
        if column > indent && column + 1 + length > width {
            out.push('\n');
            out.push_str(&" ".repeat(indent));
            column = indent;
        } else if column > indent {
            out.push(' ');
            column += 1;
        }
        out.push_str(word);
        column += length;
    }
    out
}

/// In a terminal without a command: offers the interview.
pub(crate) fn offered(look: &LookArgs) -> Result<Option<u8>> {
    if !std::io::stdin().is_terminal() || !std::io::stderr().is_terminal() || look.no_input {
        return Ok(None);
    }
    let mut terminal = Terminal::new(look);
    terminal.say("coldsump: which oil, which heater, which steps on the coldest morning\n");
    let choices = [
        ("quick", "the short interview, about fifteen questions"),
        ("full", "the full interview"),
        ("help", "what else there is"),
    ]
    .map(|(word, words)| (word.to_owned(), words.to_owned()));
    let reply = terminal.ask(&Prompt {
        id: "start",
        text: "What now?",
        help: "arrow keys and Enter; Esc leaves",
        default: Some("quick"),
        choices: &choices,
        check: &|_| Ok(()),
    });
    let quick = match reply {
        Ok(Reply::Text(text)) if text == "help" => return Ok(None),
        Ok(Reply::Text(text)) => text == "quick",
        Ok(Reply::Back) => return Ok(Some(DONE)),
        Err(Stop::Interrupted) => return Ok(Some(INTERRUPTED)),
        Err(error) => return Err(error).context("the terminal failed"),
    };
    run(&InterviewArgs { quick, ..InterviewArgs::default() }, look).map(Some)
}
