//! The case keys as Markdown tables: what the README holds, made from the one table.

use crate::case::POLICY;
use crate::case::keys::{KEYS, Key, Need};

/// All keys, section by section, then the policy figures with their sources.
#[must_use]
pub fn key_list() -> String {
    let mut out = String::new();
    let mut section = "";
    for key in KEYS {
        let (own, name) = split(key);
        if own != section || out.is_empty() {
            section = own;
            let head =
                if own.is_empty() { "top of the file".to_owned() } else { format!("[{own}]") };
            let head = if own == "oil" { "[[oil]], one table an oil".to_owned() } else { head };
            out.push_str(&format!(
                "\n**{head}**\n\n| key | example | what it is | where to find it |\n| --- | --- | --- | --- |\n"
            ));
        }
        let need = match key.need {
            Need::Required => " (required)",
            Need::Typical => " (typical value)",
            Need::Optional => "",
        };
        out.push_str(&format!(
            "| `{name}`{need} | `{}` | {} | {} |\n",
            key.example, key.question, key.find
        ));
    }
    out.push_str(
        "\n**[policy]**, the figures that are judgement or trade practice\n\n| key | default | what it is | source |\n| --- | --- | --- | --- |\n",
    );
    for row in POLICY {
        let name = row.path.trim_start_matches("policy.");
        out.push_str(&format!(
            "| `{name}` | `{}` | {} | {} |\n",
            row.example, row.about, row.source
        ));
    }
    out
}

/// Section and name of a key: `suction.strainer.loss` is `strainer.loss` in `suction`.
fn split(key: &Key) -> (&'static str, &'static str) {
    key.path.split_once('.').unwrap_or(("", key.path))
}
