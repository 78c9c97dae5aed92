//! `why`: what a finding's code means, what it rests on, and that local law decides. It never says
//! whether a plan has the finding.

use clap::Args;
use serde_json::{Value as Json, json};

use crate::assessment::{Explained, all_explanations};
use crate::cli::exit::Exit;
use crate::cli::output::{Format, Output};
use crate::parts::{Parts, RuleSet};
use crate::plan::nearest;

/// What `why` takes.
#[derive(Debug, Clone, Args)]
pub struct WhyArgs {
    /// The code of a finding, such as LOG-17; every code with its title where none is given.
    pub code: Option<String>,
    /// In which form it is printed.
    #[arg(long, value_enum, default_value_t)]
    pub format: Format,
}

/// Runs it. A code that is none is a wrong command line.
pub fn run(args: &WhyArgs, output: &mut Output<'_>) -> Exit {
    let all = all_explanations();
    let Some(code) = &args.code else {
        list(&all, args.format, output);
        return Exit::Good;
    };
    let wanted = code.trim().to_uppercase();
    let Some(explained) = all.iter().find(|e| e.explanation.code == wanted) else {
        output.talk(&format!(
            "stumpside: no finding has the code `{code}`; {}",
            near(&wanted, &all)
        ));
        return Exit::Usage;
    };
    let parts = Parts::built_in();
    let set = explained.set.and_then(|set| parts.rule_sets.get(set));
    match args.format {
        Format::Text => output.data_raw(text(explained, set).as_bytes()),
        Format::Json => output.data(&json_of(explained, set).to_string()),
    }
    Exit::Good
}

fn list(all: &[Explained], format: Format, output: &mut Output<'_>) {
    match format {
        Format::Text => {
            for explained in all {
                let explanation = &explained.explanation;
                output.data(&format!("{:<8} {}", explanation.code, explanation.title));
            }
        }
        Format::Json => {
            let codes: Vec<Json> = all
                .iter()
                .map(|e| json!({"code": e.explanation.code, "title": e.explanation.title}))
                .collect();
            output.data(&json!({"format": 1, "codes": codes}).to_string());
        }
    }
}

/// The nearest codes in words: the one most like it, and the rest of its kind.
fn near(wanted: &str, all: &[Explained]) -> String {
    let codes = || all.iter().map(|e| e.explanation.code);
    let kind = wanted.split('-').next().unwrap_or(wanted);
    let of_kind: Vec<&str> = codes()
        .filter(|code| code.split('-').next() == Some(kind))
        .collect();
    match (of_kind.first(), of_kind.last(), nearest(wanted, codes())) {
        (Some(first), Some(last), _) => format!("codes of its kind: {first} to {last}"),
        (_, _, Some(nearest)) => format!("the nearest is {nearest}"),
        (_, _, None) => "`stumpside why` alone lists every code".to_owned(),
    }
}

fn text(explained: &Explained, set: Option<&RuleSet>) -> String {
    let explanation = &explained.explanation;
    let mut lines = vec![
        format!("{}  {}", explanation.code, explanation.title),
        String::new(),
    ];
    lines.extend(wrapped(explanation.text, ""));
    lines.push(String::new());
    lines.extend(wrapped(
        &format!("source:   {}", explanation.source.cite),
        "          ",
    ));
    lines.push(format!("mark:     {}", explanation.source.mark.word()));
    if let Some(set) = set {
        let line = set.line(explanation.code);
        if let Some(line) = line {
            lines.extend(wrapped(
                &format!("read in:  {}", line.read_in),
                "          ",
            ));
        }
        lines.extend(wrapped(
            &format!("rule set: {}, {}", set.set, set.title),
            "          ",
        ));
        lines.extend(wrapped(
            &format!("edition:  {}; read {}", set.edition, set.read),
            "          ",
        ));
        lines.extend(wrapped(&format!("scope:    {}", set.scope), "          "));
        lines.push(String::new());
        lines.extend(wrapped(&set.local_law, ""));
    }
    lines.push(String::new());
    lines.join("\n")
}

/// Lines of at most 80 characters; those after the first are moved in.
fn wrapped(text: &str, indent: &str) -> Vec<String> {
    let mut lines: Vec<String> = vec![];
    let mut line = String::new();
    for word in text.split(' ') {
        if line.chars().count() + 1 + word.chars().count() > 80 && !line.trim().is_empty() {
            lines.push(line);
            line = format!("{indent}{word}");
        } else if line.is_empty() && lines.is_empty() {
            line.push_str(word);
        } else {
            line.push(' ');
            line.push_str(word);
        }
    }
    lines.push(line);
    lines
}

fn json_of(explained: &Explained, set: Option<&RuleSet>) -> Json {
    let explanation = &explained.explanation;
    let line = set.and_then(|set| set.line(explanation.code));
    json!({
        "format": 1,
        "code": explanation.code,
        "title": explanation.title,
        "explain": explanation.text,
        "source": explanation.source.cite,
        "mark": explanation.source.mark.word(),
        "read_in": line.map(|l| &l.read_in),
        "set": set.map(|s| &s.set),
        "edition": set.map(|s| &s.edition),
        "local_law": set.map(|s| &s.local_law),
    })
}
