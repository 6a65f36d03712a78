//! A document as Markdown, to edit, sign and file.

use super::document::{Block, Document, Line, Tone};

/// The document as Markdown (tables as in GitHub Flavored Markdown).
#[must_use]
pub fn markdown(document: &Document) -> String {
    let mut out = String::new();
    for block in &document.blocks {
        if !out.is_empty() {
            out.push('\n');
        }
        match block {
            Block::Title(one) => out.push_str(&format!("# {}\n", plain(one))),
            Block::Heading(one) => out.push_str(&format!("## {}\n", plain(one))),
            Block::Subheading(one) => out.push_str(&format!("### {}\n", plain(one))),
            Block::Text(one) => out.push_str(&format!("{}\n", line(one))),
            Block::Pairs(pairs) => {
                for (name, value) in pairs {
                    out.push_str(&format!("- **{}**: {}\n", escaped(name), line(value)));
                }
            }
            Block::Table { head, rows } => table(&mut out, head, rows),
            Block::Drawing(lines) => {
                out.push_str(&format!("```text\n{}\n```\n", lines.join("\n")));
            }
            Block::List(lines) => {
                for one in lines {
                    out.push_str(&format!("- {}\n", line(one)));
                }
            }
            Block::Steps(steps) => {
                for (number, lines) in steps {
                    for (row, one) in lines.iter().enumerate() {
                        if row == 0 {
                            out.push_str(&format!("{number}. {}\n", line(one)));
                        } else {
                            out.push_str(&format!("    - {}\n", line(one)));
                        }
                    }
                }
            }
        }
    }
    out
}

fn table(out: &mut String, head: &[String], rows: &[Vec<Line>]) {
    let head: Vec<String> = head.iter().map(|name| escaped(name)).collect();
    out.push_str(&format!("| {} |\n", head.join(" | ")));
    let rule: Vec<&str> =
        (0..head.len()).map(|column| if column == 0 { "---" } else { "--:" }).collect();
    out.push_str(&format!("| {} |\n", rule.join(" | ")));
    for row in rows {
        let cells: Vec<String> = row.iter().map(line).collect();
        out.push_str(&format!("| {} |\n", cells.join(" | ")));
    }
}

fn plain(one: &Line) -> String {
    escaped(&one.text())
}

/// A line with what matters set strong.
fn line(one: &Line) -> String {
    let mut out = String::new();
    for span in &one.0 {
        let text = escaped(&span.text);
        if span.tone == Tone::Strong {
            let inner = text.trim();
            let lead = text.len() - text.trim_start().len();
            let tail = text.len() - text.trim_end().len();
            out.push_str(text.get(..lead).unwrap_or_default());
            if !inner.is_empty() {
                out.push_str(&format!("**{inner}**"));
            }
            out.push_str(text.get(text.len() - tail..).unwrap_or_default());
        } else {
            out.push_str(&text);
        }
    }
    out
}

/// Words that Markdown would read as marks, made plain.
fn escaped(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        if matches!(c, '\\' | '`' | '*' | '_' | '[' | ']' | '<' | '>' | '|' | '#' | '~') {
            out.push('\\');
        }
        out.push(c);
    }
    out
}
