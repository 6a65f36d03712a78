//! `cargo bench`: the assessment of twelve oils that all need heat, against the Python reference on
//! the same file in the same run, one process each, warm. The needed powers of the two must agree to
//! 0.1 %.
//!
//! `PYTHON` names the interpreter that has the packages of `tests/reference/requirements.txt`.

use coldsump::advice;
use coldsump::case::CaseFile;
use std::hint::black_box;
use std::process::Command;
use std::time::Instant;

const CASE: &str = "tests/bench/twelve-oils.toml";

fn median(mut values: Vec<f64>) -> f64 {
    values.sort_by(f64::total_cmp);
    values[values.len() / 2]
}

fn main() {
    let text = std::fs::read_to_string(CASE).expect("the benchmark's case");
    let case = CaseFile::read(CASE, &text).check().expect("a good case");
    let run = || -> Vec<Option<f64>> {
        case.oils
            .iter()
            .map(|oil| advice::assess(black_box(&case), black_box(oil)).heating.needed_w)
            .collect()
    };
    let needed = run();
    assert!(needed.iter().all(Option::is_some), "all oils need heat");
    for _ in 0..200 {
        black_box(run());
    }
    let times: Vec<f64> = (0..2000)
        .map(|_| {
            let start = Instant::now();
            black_box(run());
            start.elapsed().as_secs_f64()
        })
        .collect();
    let here = median(times);
    let per_oil = here / needed.len() as f64 * 1e6;
    println!("assess: {:.3} ms for {} oils, {per_oil:.1} µs an oil", here * 1e3, needed.len());
    let timed = |what: &dyn Fn()| {
        let one = || {
            let start = Instant::now();
            what();
            start.elapsed().as_secs_f64()
        };
        median((0..100).map(|_| one()).collect())
    };
    let decide = timed(&|| {
        black_box(advice::decide(black_box(&case)));
    });
    let advise = timed(&|| {
        black_box(advice::advise(black_box(&case)));
    });
    println!(
        "decide: {:.3} ms, {:.2} times that; advise: {:.2} ms, {:.0} times that",
        decide * 1e3,
        decide / here,
        advise * 1e3,
        advise / here
    );

    let python = std::env::var("PYTHON").unwrap_or_else(|_| "python3".to_owned());
    let output = Command::new(&python)
        .args(["-W", "ignore", "tests/reference/reference.py", "--bench", CASE, "--repeat", "7"])
        .output();
    let answer = match output {
        Ok(output) if output.status.success() => output.stdout,
        _ => {
            println!("no ratio: {python} cannot run the reference (set PYTHON)");
            return;
        }
    };
    let answer: serde_json::Value = serde_json::from_slice(&answer).expect("JSON of the reference");
    let list = |key: &str| -> Vec<f64> {
        answer[key]
            .as_array()
            .expect("a list")
            .iter()
            .map(|v| v.as_f64().expect("a number"))
            .collect()
    };
    let worst = needed
        .iter()
        .flatten()
        .zip(list("needed_w"))
        .map(|(a, b)| (a / b - 1.0).abs())
        .fold(0.0, f64::max);
    assert!(worst <= 1e-3, "needed powers differ by {worst:.1e}");
    let there = median(list("seconds"));
    println!("reference: {:.0} ms; needed powers agree within {worst:.1e}", there * 1e3);
    println!("ratio of medians: {:.0}", there / here);
}
