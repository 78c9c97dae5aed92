//! `why` from its command line, and that every code used in the source is explained once.
#![expect(clippy::disallowed_methods, reason = "the source itself is read here")]

use std::collections::{BTreeMap, BTreeSet};
use std::path::{Path, PathBuf};

use stumpside::assessment::all_explanations;
use stumpside::cli::command::why::{self, WhyArgs};
use stumpside::cli::exit::Exit;
use stumpside::cli::output::{Format, Output};

fn run(code: Option<&str>, format: Format) -> (Exit, String, String) {
    let (mut data, mut talk) = (vec![], vec![]);
    let args = WhyArgs {
        code: code.map(str::to_owned),
        format,
    };
    let mut output = Output::new(&mut data, &mut talk);
    let exit = why::run(&args, &mut output);
    let exit = output.finish(exit);
    let text = |bytes| String::from_utf8(bytes).unwrap();
    (exit, text(data), text(talk))
}

#[test]
fn a_rule_is_explained_with_its_source_mark_and_who_decides() {
    let (exit, data, talk) = run(Some("log-36"), Format::Text);
    assert_eq!((exit, talk.as_str()), (Exit::Good, ""));
    assert_eq!(
        data,
        "LOG-36  back cut above a level face cut\n\
         \n\
         With a face that has a level cut, the back cut lies above that level: the step\n\
         left on the stump keeps the butt from coming back over it. An open face with two\n\
         sloping cuts needs none, nor does a tree that is pulled over.\n\
         \n\
         source:   29 CFR 1910.266(h)(2)(vii)\n\
         mark:     opened\n\
         read in:  OSHA's directive CPL 2-1.22 and the notice of 8 Sep 1995\n\
         rule set: us-logging, United States, logging operations\n\
         edition:  29 CFR 1910.266 as in force when read, with OSHA's published logging\n\
         \x20         guidance where the rule has no figure; read 2026\n\
         scope:    Felling in logging operations. Tree care, line clearance and wildland\n\
         \x20         fire have rules of their own; states with their own plans may ask for\n\
         \x20         more.\n\
         \n\
         Local law and the employer's own rules decide; this set is an aid to reading\n\
         them and takes the place of neither.\n"
    );
}

#[test]
fn a_code_of_the_plan_itself_is_explained_as_json() {
    let (exit, data, _) = run(Some("JOB-23"), Format::Json);
    assert_eq!(exit, Exit::Good);
    assert_eq!(
        data,
        concat!(
            r#"{"format":1,"code":"JOB-23","title":"way out into the lay","#,
            r#""explain":"The way out leads into the half of the ground where the tree comes down.","#,
            r#""source":"the plan against itself","mark":"derived","read_in":null,"set":null,"#,
            r#""edition":null,"local_law":null}"#,
            "\n"
        )
    );
}

#[test]
fn an_unknown_code_is_a_wrong_command_line_and_names_the_nearest() {
    for (code, near) in [
        ("LOG-99", "LOG-01 to LOG-40"),
        ("PLN-04", "the nearest is PLAN-04"),
        ("whatever", "lists every code"),
    ] {
        let (exit, data, talk) = run(Some(code), Format::Text);
        assert_eq!((exit, data.as_str()), (Exit::Usage, ""));
        assert!(talk.contains(near), "{talk}");
    }
}

#[test]
fn without_a_code_every_code_is_listed() {
    let (exit, data, _) = run(None, Format::Text);
    assert_eq!(exit, Exit::Good);
    assert_eq!(data.lines().count(), all_explanations().len());
    assert!(data.contains("LOG-17   way out long enough\n"));
}

/// Every source file of the program.
fn sources(folder: &Path, into: &mut Vec<PathBuf>) {
    for entry in std::fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.is_dir() {
            sources(&path, into);
        } else if path.extension().is_some_and(|e| e == "rs") {
            into.push(path);
        }
    }
}

/// Codes as they stand in a text: `"LOG-17"`.
fn codes_in(text: &str) -> BTreeSet<String> {
    text.split('"')
        .filter(|word| {
            let Some((kind, number)) = word.split_once('-') else {
                return false;
            };
            ["TEXT", "PLAN", "JOB", "LOG", "TREE"].contains(&kind)
                && number.len() == 2
                && number.bytes().all(|b| b.is_ascii_digit())
        })
        .map(str::to_owned)
        .collect()
}

#[test]
fn every_code_is_explained_once_and_every_explained_code_is_used() {
    let mut times: BTreeMap<&str, usize> = BTreeMap::new();
    let explained = all_explanations();
    for one in &explained {
        *times.entry(one.explanation.code).or_default() += 1;
        assert!(!one.explanation.title.is_empty());
        assert!(
            one.explanation.text.ends_with('.'),
            "{}",
            one.explanation.code
        );
        assert!(!one.explanation.source.cite.is_empty());
    }
    assert!(times.values().all(|n| *n == 1), "{times:?}");
    let mut files = vec![];
    sources(
        &Path::new(env!("CARGO_MANIFEST_DIR")).join("src"),
        &mut files,
    );
    let mut used = BTreeSet::new();
    for file in files {
        // The tables that explain are no use of a code; the rules' own constants are both.
        if file.file_name().is_some_and(|name| name != "codes.rs") {
            used.extend(codes_in(&std::fs::read_to_string(&file).unwrap()));
        }
    }
    let known: BTreeSet<String> = times.keys().map(|code| (*code).to_owned()).collect();
    assert_eq!(used, known);
}
