//! The advice as one self-contained page for screen and paper: the operator's card first, then the
//! engineer's pages with charts and a block to sign. No script, nothing fetched.

use super::card::{Card, card};
use super::chart::{self, esc};
use super::document::{Block, Document, Line, Tone};
use crate::advice::{Advice, Signal};
use crate::case::{Case, Units};
use crate::oil::Oil;

/// The page.
#[must_use]
pub fn html(case: &Case, advice: &Advice, units: Units) -> String {
    let mut out = String::with_capacity(64 * 1024);
    out.push_str("<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n");
    out.push_str("<meta name=\"viewport\" content=\"width=device-width, initial-scale=1\">\n");
    out.push_str(&format!(
        "<title>{}</title>\n<style>\n{STYLE}</style>\n</head>\n<body>\n",
        esc(&case.title)
    ));
    the_card(&mut out, &card(case, advice, units));
    out.push_str("<main class=\"pages\">\n");
    for block in &super::advice(case, advice, units).blocks {
        put(&mut out, block);
    }
    charts(&mut out, case, advice, units);
    out.push_str(SIGNED);
    out.push_str("</main>\n</body>\n</html>\n");
    out
}

/// Any document as a page of its own.
#[must_use]
pub fn page(title: &str, document: &Document) -> String {
    let mut out = format!(
        "<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n<title>{}</title>\n<style>\n{STYLE}</style>\n</head>\n<body>\n",
        esc(title)
    );
    for block in &document.blocks {
        put(&mut out, block);
    }
    out.push_str("</body>\n</html>\n");
    out
}

const STYLE: &str = include_str!("page.css");

/// What is filled in by hand.
const SIGNED: &str = "<section class=\"signed\">
<h2>Revision and signatures</h2>
<table>
<tr><th scope=\"col\">revision</th><th scope=\"col\">date</th><th scope=\"col\">what changed</th><th scope=\"col\">written by</th><th scope=\"col\">released by</th></tr>
<tr><td></td><td></td><td></td><td></td><td></td></tr>
<tr><td></td><td></td><td></td><td></td><td></td></tr>
<tr><td></td><td></td><td></td><td></td><td></td></tr>
</table>
</section>
";

fn the_card(out: &mut String, card: &Card) {
    out.push_str("<section class=\"card\">\n<header>\n");
    out.push_str(&format!(
        "<h1>{}</h1>\n<p class=\"what\">{}</p>\n</header>\n",
        esc(&card.title),
        esc(&card.headline)
    ));
    out.push_str("<div class=\"gates\">\n");
    for (name, line) in &card.gates {
        out.push_str(&format!("<div class=\"gate\"><span class=\"name\">{}</span><span class=\"figure\">{}</span></div>\n", esc(name), spans(line)));
    }
    out.push_str("</div>\n<dl class=\"facts\">\n");
    for (name, line) in &card.facts {
        out.push_str(&format!("<div><dt>{}</dt><dd>{}</dd></div>\n", esc(name), spans(line)));
    }
    out.push_str("</dl>\n<ol class=\"ticks\">\n");
    for (line, reading) in &card.steps {
        let blank = if *reading { "<span class=\"blank\"></span>" } else { "" };
        out.push_str(&format!(
            "<li><span class=\"box\"></span><span class=\"do\">{}</span>{blank}</li>\n",
            spans(line)
        ));
    }
    out.push_str(
        "</ol>\n<div class=\"stops\">\n<h2>STOP, engine off, for any of these</h2>\n<ul>\n",
    );
    for line in &card.stops {
        out.push_str(&format!("<li>{}</li>\n", spans(line)));
    }
    out.push_str("</ul>\n</div>\n<ul class=\"signals\">\n");
    for (signal, _, short) in &card.cautions {
        let (class, mark) = look(*signal);
        out.push_str(&format!(
            "<li class=\"{class}\"><b><span aria-hidden=\"true\">{mark}</span> {}</b> {}</li>\n",
            signal.id(),
            esc(short)
        ));
    }
    out.push_str(&format!("</ul>\n<p class=\"holds\">{}</p>\n<p class=\"holds\">Date ____________ Operator ____________________ Remarks ______________________________</p>\n</section>\n", spans(&card.holds)));
}

/// Class and shape of a signal word: the word and the shape say it, colour only helps.
const fn look(signal: Signal) -> (&'static str, &'static str) {
    match signal {
        Signal::Danger => ("danger", "⚠"),
        Signal::Warning => ("warning", "⚠"),
        Signal::Caution => ("caution", "△"),
        Signal::Notice => ("notice", "▢"),
    }
}

fn put(out: &mut String, block: &Block) {
    match block {
        Block::Title(line) => out.push_str(&format!("<h1>{}</h1>\n", spans(line))),
        Block::Heading(line) => out.push_str(&format!("<h2>{}</h2>\n", spans(line))),
        Block::Subheading(line) => out.push_str(&format!("<h3>{}</h3>\n", spans(line))),
        Block::Text(line) => out.push_str(&format!("<p>{}</p>\n", spans(line))),
        Block::Pairs(pairs) => {
            out.push_str("<dl>\n");
            for (name, line) in pairs {
                out.push_str(&format!(
                    "<div><dt>{}</dt><dd>{}</dd></div>\n",
                    esc(name),
                    spans(line)
                ));
            }
            out.push_str("</dl>\n");
        }
        Block::Table { head, rows } => {
            out.push_str("<table>\n<tr>");
            for name in head {
                out.push_str(&format!("<th scope=\"col\">{}</th>", esc(name)));
            }
            out.push_str("</tr>\n");
            for row in rows {
                out.push_str("<tr>");
                for line in row {
                    out.push_str(&format!("<td>{}</td>", spans(line)));
                }
                out.push_str("</tr>\n");
            }
            out.push_str("</table>\n");
        }
        Block::Drawing(lines) => {
            out.push_str(&format!("<pre>{}</pre>\n", esc(&lines.join("\n"))));
        }
        Block::List(lines) => {
            out.push_str("<ul>\n");
            for line in lines {
                out.push_str(&format!("<li>{}</li>\n", spans(line)));
            }
            out.push_str("</ul>\n");
        }
        Block::Steps(steps) => {
            let first = steps.first().map_or(1, |(number, _)| *number);
            out.push_str(&format!("<ol start=\"{first}\">\n"));
            for (_, lines) in steps {
                out.push_str("<li>");
                for (row, line) in lines.iter().enumerate() {
                    if row == 0 {
                        out.push_str(&spans(line));
                    } else {
                        out.push_str(&format!("<div class=\"under\">{}</div>", spans(line)));
                    }
                }
                out.push_str("</li>\n");
            }
            out.push_str("</ol>\n");
        }
    }
}

fn charts(out: &mut String, case: &Case, advice: &Advice, units: Units) {
    let decision = &advice.decision;
    let Some(at) = decision.focus() else { return };
    let (Some(oil), Some(found)) = (case.oils.get(at), decision.oils.get(at)) else { return };
    out.push_str("<h2>Charts</h2>\n");
    // With many oils the charts show the one advised on and the one in the machine.
    let few = case.oils.len() <= 4;
    let shown: Vec<(&Oil, &crate::advice::Assessment)> = case
        .oils
        .iter()
        .zip(&decision.oils)
        .enumerate()
        .filter(|(row, _)| few || *row == at || Some(*row) == decision.in_service)
        .map(|(_, pair)| pair)
        .collect();
    let mut figures = vec![chart::viscosity(case, &shown, units)];
    figures.extend(chart::inlet(case, oil, found, units).ok());
    figures.extend(chart::speed(case, oil, found, units).ok());
    let night = crate::advice::night(case, oil, found);
    figures.extend(chart::overnight(case, found, &night, units));
    for figure in &figures {
        out.push_str(&format!("<figure>{}</figure>\n", chart::svg(figure)));
    }
}

/// A line with what matters set strong; a figure carries the pointer of its value.
fn spans(line: &Line) -> String {
    let mut out = String::new();
    for span in &line.0 {
        let text = esc(&span.text);
        match (&span.pointer, span.tone) {
            (Some(pointer), _) => {
                out.push_str(&format!("<span data-value=\"{}\">{text}</span>", esc(pointer)));
            }
            (None, Tone::Strong) => out.push_str(&format!("<strong>{text}</strong>")),
            (None, Tone::Faint) => out.push_str(&format!("<small>{text}</small>")),
            (None, Tone::Plain) => out.push_str(&text),
        }
    }
    out
}

/// The figures of the card with the pointers of their values, for those who check them.
#[must_use]
pub fn card_lines(card: &Card) -> Vec<&Line> {
    let mut lines: Vec<&Line> = card.gates.iter().map(|(_, line)| line).collect();
    lines.extend(card.facts.iter().map(|(_, line)| line));
    lines.extend(card.steps.iter().map(|(line, _)| line));
    lines.extend(&card.stops);
    lines.push(&card.holds);
    lines
}
