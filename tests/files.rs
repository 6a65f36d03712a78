//! Files that cannot be read or written, and text that would take over a terminal.
#![cfg(all(feature = "cli", unix))]

use std::ffi::{OsStr, OsString};
use std::os::unix::ffi::OsStringExt;
use std::path::{Path, PathBuf};
use std::process::{Command, Output, Stdio};

const LOADER: &str = concat!(env!("CARGO_MANIFEST_DIR"), "/examples/skarn-loader.toml");
const FLEET: &str = concat!(env!("CARGO_MANIFEST_DIR"), "/examples/skarn-fleet.csv");

fn folder(name: &str) -> PathBuf {
    let folder = std::env::temp_dir().join(format!("coldsump-files-{name}-{}", std::process::id()));
    let _ = std::fs::remove_dir_all(&folder);
    std::fs::create_dir_all(&folder).unwrap();
    folder
}

fn run<S: AsRef<OsStr>>(folder: &Path, args: impl IntoIterator<Item = S>) -> Output {
    Command::new(env!("CARGO_BIN_EXE_coldsump"))
        .args(args)
        .current_dir(folder)
        .stdin(Stdio::null())
        .output()
        .unwrap()
}

fn said(output: &Output) -> String {
    String::from_utf8_lossy(&output.stderr).into_owned()
}

fn names(folder: &Path) -> Vec<String> {
    let mut names: Vec<String> = std::fs::read_dir(folder)
        .unwrap()
        .map(|entry| entry.unwrap().file_name().to_string_lossy().into_owned())
        .collect();
    names.sort();
    names
}

#[test]
fn a_target_that_cannot_be_written_gets_one_clear_line_and_nothing_is_left() {
    let here = folder("targets");
    std::fs::create_dir(here.join("folder")).unwrap();
    std::fs::write(here.join("there.txt"), "mine").unwrap();
    std::fs::write(here.join("protected.txt"), "mine").unwrap();
    let mut mode = std::fs::metadata(here.join("protected.txt")).unwrap().permissions();
    mode.set_readonly(true);
    std::fs::set_permissions(here.join("protected.txt"), mode).unwrap();
    std::os::unix::fs::symlink("nowhere/x.txt", here.join("dangling.txt")).unwrap();
    let before = names(&here);
    // (target, --force, what is said)
    let rows = [
        ("no/such/folder.txt", false, "cannot write no/such/folder.txt"),
        ("folder", true, "folder is a folder\n\ntry: a file name in it"),
        ("there.txt", false, "there.txt is there already\n\ntry: --force, or another name"),
        ("protected.txt", true, "protected.txt is write-protected\n\ntry: another name"),
        ("dangling.txt", false, "dangling.txt is there already"),
        ("dangling.txt", true, "dangling.txt links to nothing"),
        ("/dev/full", false, "cannot write /dev/full: No space left on device"),
    ];
    for (target, force, wanted) in rows {
        for format in ["text", "html"] {
            let mut args = vec!["advise", LOADER, "--format", format, "-o", target];
            args.extend(force.then_some("--force"));
            let output = run(&here, &args);
            assert_eq!(output.status.code(), Some(1), "{target}: {}", said(&output));
            assert!(said(&output).starts_with(&format!("coldsump: {wanted}")), "{}", said(&output));
            assert!(output.stdout.is_empty(), "{target}");
        }
    }
    assert_eq!(names(&here), before);
    assert_eq!(std::fs::read_to_string(here.join("there.txt")).unwrap(), "mine");
    std::fs::remove_dir_all(&here).unwrap();
}

#[test]
fn a_link_stays_a_link_and_a_device_is_written_to() {
    let here = folder("links");
    std::fs::write(here.join("real.txt"), "old").unwrap();
    std::os::unix::fs::symlink("real.txt", here.join("link.txt")).unwrap();
    let output = run(&here, ["advise", LOADER, "-o", "link.txt", "--force"]);
    assert_eq!(output.status.code(), Some(0), "{}", said(&output));
    assert!(here.join("link.txt").symlink_metadata().unwrap().is_symlink());
    assert!(std::fs::read_to_string(here.join("real.txt")).unwrap().contains("Loader 12"));
    let output = run(&here, ["advise", LOADER, "-o", "/dev/null"]);
    assert_eq!(output.status.code(), Some(0), "{}", said(&output));
    assert!(!std::fs::symlink_metadata("/dev/null").unwrap().is_file());
    std::fs::remove_dir_all(&here).unwrap();
}

#[test]
fn a_full_disk_is_a_failure_and_not_an_answer() {
    let here = folder("full");
    for args in [
        vec!["advise", LOADER],
        vec!["advise", LOADER, "--format", "json"],
        vec!["oil", "HM-46", "--at", "-40..100 °C by 1"],
        vec!["fleet", FLEET, "--format", "csv"],
        vec!["fleet", FLEET, "--format", "jsonl"],
        vec!["climate", "list"],
    ] {
        let full = std::fs::OpenOptions::new().write(true).open("/dev/full").unwrap();
        let output = Command::new(env!("CARGO_BIN_EXE_coldsump"))
            .args(&args)
            .current_dir(&here)
            .stdout(full)
            .stderr(Stdio::piped())
            .output()
            .unwrap();
        assert_eq!(output.status.code(), Some(1), "{args:?}: {}", said(&output));
        assert!(said(&output).contains("No space left on device"), "{args:?}: {}", said(&output));
    }
    std::fs::remove_dir_all(&here).unwrap();
}

#[test]
fn a_name_that_is_no_utf8_is_read_and_written() {
    let here = folder("names");
    let name = OsString::from_vec(b"loader\xff.toml".to_vec());
    std::fs::copy(LOADER, here.join(&name)).unwrap();
    let target = OsString::from_vec(b"advice\xfe.txt".to_vec());
    let output = run(&here, [OsStr::new("advise"), &name, OsStr::new("-o"), &target]);
    assert_eq!(output.status.code(), Some(0), "{}", said(&output));
    assert!(std::fs::read_to_string(here.join(&target)).unwrap().contains("Loader 12"));
    std::fs::remove_dir_all(&here).unwrap();
}

#[test]
fn a_file_that_cannot_be_read_is_named() {
    let here = folder("sources");
    std::fs::create_dir(here.join("folder.toml")).unwrap();
    for (args, wanted) in [
        (vec!["advise", "none.toml"], "cannot read none.toml: No such file or directory"),
        (vec!["advise", "folder.toml"], "cannot read folder.toml: Is a directory"),
        (vec!["assess", "none.toml"], "cannot read none.toml"),
        (vec!["compare", LOADER, "none.toml"], "cannot read none.toml"),
        (vec!["fleet", "none.csv"], "cannot read none.csv"),
        (vec!["climate", "from", "none.dly", "-o", "x.toml"], "cannot read none.dly"),
        (vec!["interview", "none.toml", "--plain"], "cannot read none.toml"),
        (vec!["interview", "--answers", "none.toml"], "cannot read none.toml"),
    ] {
        let output = run(&here, &args);
        assert_eq!(output.status.code(), Some(1), "{args:?}: {}", said(&output));
        assert!(said(&output).starts_with(&format!("coldsump: {wanted}")), "{}", said(&output));
    }
    assert_eq!(names(&here), ["folder.toml"]);
    std::fs::remove_dir_all(&here).unwrap();
}

/// A sequence that would clear a screen, colour it, or name a window; and one in the C1 set.
const ESCAPES: [&str; 4] = ["\u{1b}[2J", "\u{1b}[31m", "\u{1b}]0;x\u{7}", "\u{9b}31m"];

#[test]
fn no_escape_sequence_of_a_case_reaches_the_screen() {
    let here = folder("escapes");
    let good = std::fs::read_to_string(LOADER).unwrap();
    let mut tried = 0;
    for escape in ESCAPES {
        let typed: String = escape.chars().map(|c| format!("\\u{:04x}", u32::from(c))).collect();
        let named = good
            .replace("Loader 12", &format!("Loader {typed} 12"))
            .replace("\"synthetic\"", &format!("\"syn{typed}thetic\""));
        assert_ne!(named, good);
        std::fs::write(here.join("named.toml"), &named).unwrap();
        let wrong = format!(
            "format = 1\n\"{typed}\" = 1\n[site]\n\"a{typed}\" = 2\nwind = \"{typed}\"\n[pump]\nkind = \"{typed}\"\n[[oil]]\nclass = \"{typed}\"\n"
        );
        std::fs::write(here.join("wrong.toml"), &wrong).unwrap();
        std::fs::write(here.join("raw.toml"), good.replace("Loader 12", &format!("L{escape}")))
            .unwrap();
        std::fs::write(here.join("fleet.csv"), format!("machine,base,pump.kind\n\"m{escape}\",named.toml,\n\"x{escape}\",no{escape}.toml,\"k{escape}\"\n")).unwrap();
        std::fs::write(
            here.join("records.csv"),
            format!("date,tmin{escape}\n2001-01-01,-3{escape}\n"),
        )
        .unwrap();
        std::fs::write(here.join("answers.toml"), format!("\"{typed}\" = \"{typed}\"\n")).unwrap();
        let set = format!("site.wind={escape}");
        let calls: Vec<Vec<&str>> = vec![
            vec!["advise", "named.toml", "--color", "never"],
            vec!["advise", "named.toml", "--format", "markdown"],
            vec!["advise", "named.toml", "--format", "html"],
            vec!["advise", "named.toml", "--format", "json"],
            vec!["advise", "named.toml", "--charts", "--color", "never"],
            vec!["assess", "named.toml", "--color", "never"],
            vec!["compare", "named.toml", LOADER, "--color", "never"],
            vec!["advise", "wrong.toml"],
            vec!["advise", "raw.toml"],
            vec!["assess", "wrong.toml"],
            vec!["advise", "named.toml", "--set", &set],
            vec!["advise", "named.toml", "--oil", escape],
            vec!["advise", escape],
            vec!["oil", escape, "--at", "0 °C"],
            vec!["oil", "HM-46", "--at", escape],
            vec!["climate", "show", escape],
            vec!["climate", "from", "records.csv", "-o", "x.toml"],
            vec!["climate", "from", escape, "-o", "x.toml"],
            vec!["fleet", "fleet.csv", "--color", "never"],
            vec!["fleet", "fleet.csv", "--format", "jsonl"],
            vec!["fleet", escape],
            vec!["interview", "--answers", "answers.toml"],
            vec!["interview", "named.toml", "--plain"],
        ];
        for args in calls {
            let output = run(&here, &args);
            for text in [&output.stdout, &output.stderr] {
                let text = String::from_utf8_lossy(text);
                let bad = text.chars().find(|c| c.is_control() && !matches!(c, '\n' | '\t'));
                assert!(bad.is_none(), "{args:?}: {bad:?} in {text}");
            }
            assert!(!output.stdout.is_empty() || !output.stderr.is_empty(), "{args:?}");
            tried += 1;
        }
    }
    assert_eq!(tried, 92);
    std::fs::remove_dir_all(&here).unwrap();
}

#[test]
fn answers_that_are_not_gone_on_with_are_kept() {
    let here = folder("drafts");
    let draft = here.join("case.draft.toml");
    for (text, extra) in [("not a draft [", None), ("\"pump.kind\" = \"vane\"\n", Some("--fresh"))]
    {
        std::fs::write(&draft, text).unwrap();
        let mut args = vec!["interview", "--quick", "--plain"];
        args.extend(extra);
        let output = run(&here, &args);
        assert!(said(&output).contains("The earlier answers are kept in "), "{}", said(&output));
    }
    let kept: Vec<String> = names(&here).into_iter().filter(|name| name.contains("old")).collect();
    assert_eq!(kept.len(), 2, "{kept:?}");
    std::fs::remove_dir_all(&here).unwrap();
}
