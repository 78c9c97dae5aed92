//! The rules of the house, read from the sources: one direction of imports, doors, file heads,
//! lengths, and documents that tell the truth.

use std::collections::{BTreeMap, BTreeSet};
use std::path::{Path, PathBuf};

fn root() -> &'static Path {
    Path::new(env!("CARGO_MANIFEST_DIR"))
}

/// Every source file below `src`, as path below it and text.
fn sources() -> Vec<(String, String)> {
    let mut files = vec![];
    let mut folders = vec![root().join("src")];
    while let Some(folder) = folders.pop() {
        for entry in std::fs::read_dir(folder).unwrap() {
            let path = entry.unwrap().path();
            if path.is_dir() {
                folders.push(path);
            } else if path.extension().is_some_and(|e| e == "rs") {
                let name = path.strip_prefix(root().join("src")).unwrap();
                files.push((
                    name.to_str().unwrap().to_owned(),
                    std::fs::read_to_string(&path).unwrap(),
                ));
            }
        }
    }
    files.sort();
    files
}

/// The rooms in their order, from the ground up.
fn rooms(lib: &str) -> Vec<String> {
    lib.lines()
        .filter_map(|line| line.strip_prefix("pub mod "))
        .map(|rest| rest.trim_end_matches(';').to_owned())
        .collect()
}

/// The room a file belongs to.
fn room_of(file: &str) -> &str {
    file.split('/').next().unwrap().trim_end_matches(".rs")
}

/// A text without its comments.
fn code(text: &str) -> String {
    text.lines()
        .map(|line| line.split("//").next().unwrap())
        .collect::<Vec<_>>()
        .join("\n")
}

/// The rooms that a text names by `crate::room` or `crate::{room, ...}`.
fn rooms_used(text: &str) -> BTreeSet<String> {
    let code = code(text);
    let mut used = BTreeSet::new();
    for rest in code.split("crate::").skip(1) {
        let word = |text: &str| -> String {
            text.trim_start()
                .chars()
                .take_while(|c| c.is_alphanumeric() || *c == '_')
                .collect()
        };
        if let Some(group) = rest.strip_prefix('{') {
            let mut depth = 1;
            let inside = group.find(|c| {
                depth += i32::from(c == '{') - i32::from(c == '}');
                depth == 0
            });
            used.extend(group[..inside.unwrap_or(group.len())].split(',').map(word));
        } else {
            used.insert(word(rest));
        }
    }
    used.retain(|w| !w.is_empty());
    used
}

/// Every upward import, and every circle among the rooms.
fn violations(order: &[String], files: &[(String, String)]) -> Vec<String> {
    let height = |room: &str| order.iter().position(|r| r == room);
    let mut found = vec![];
    let mut uses: BTreeMap<String, BTreeSet<String>> = BTreeMap::new();
    for (file, text) in files {
        let own = room_of(file);
        let Some(own_height) = height(own) else {
            if !matches!(own, "lib" | "main") {
                found.push(format!("{file}: the room `{own}` is not in lib.rs"));
            }
            continue;
        };
        for used in rooms_used(text) {
            match height(&used) {
                Some(h) if h > own_height => {
                    found.push(format!("{file}: looks up from `{own}` to `{used}`"))
                }
                Some(h) if h < own_height => {
                    uses.entry(own.to_owned()).or_default().insert(used);
                }
                _ => {}
            }
        }
    }
    for start in uses.keys() {
        let mut seen = BTreeSet::new();
        let mut next: Vec<&String> = uses[start].iter().collect();
        while let Some(room) = next.pop() {
            if room == start {
                found.push(format!("a circle through `{start}`"));
                break;
            }
            if seen.insert(room.clone()) {
                next.extend(uses.get(room).into_iter().flatten());
            }
        }
    }
    found
}

#[test]
fn imports_go_one_way() {
    let files = sources();
    let lib = &files.iter().find(|(name, _)| name == "lib.rs").unwrap().1;
    let order = rooms(lib);
    assert!(order.len() > 15, "the rooms are read: {order:?}");
    assert_eq!(violations(&order, &files), Vec::<String>::new());
}

#[test]
fn the_import_test_fails_on_a_bad_tree() {
    let order: Vec<String> = ["ground", "middle", "roof"].map(str::to_owned).to_vec();
    let file = |name: &str, text: &str| (name.to_owned(), text.to_owned());
    let upward = [
        file("ground/mod.rs", "use crate::roof::Slate;"),
        file("roof.rs", "use crate::ground::Clay;"),
    ];
    assert_eq!(
        violations(&order, &upward),
        ["ground/mod.rs: looks up from `ground` to `roof`"]
    );
    let grouped = [file("middle.rs", "use crate::{ground::{a, b}, roof::c};")];
    assert_eq!(
        violations(&order, &grouped),
        ["middle.rs: looks up from `middle` to `roof`"]
    );
    let in_code = [file(
        "middle.rs",
        "fn f() { crate::roof::g() } // crate::ground",
    )];
    assert_eq!(violations(&order, &in_code).len(), 1);
    let stray = [file("cellar.rs", "use crate::ground::Clay;")];
    assert_eq!(
        violations(&order, &stray),
        ["cellar.rs: the room `cellar` is not in lib.rs"]
    );
    let good = [
        file(
            "roof.rs",
            "use crate::ground::Clay; use crate::middle::Beam;",
        ),
        file("ground.rs", ""),
    ];
    assert_eq!(violations(&order, &good), Vec::<String>::new());
}

#[test]
fn outside_crates_stay_behind_their_doors() {
    let doors: &[(&str, &[&str])] = &[
        ("crossterm", &["shell/terminal.rs", "shell/passphrase.rs"]),
        ("ratatui", &["tui/", "shell/terminal.rs"]),
        ("tui_textarea", &["tui/"]),
        ("serde_yaml", &["document/"]),
        ("clap", &["cli/"]),
        ("annotate_snippets", &["diagnostic/"]),
        ("signal_hook", &["shell/"]),
        ("rustix", &["shell/"]),
        ("getrandom", &["shell/entropy.rs"]),
        ("ssh_key", &["record/", "shell/"]),
    ];
    for (file, text) in sources() {
        let code = code(&text);
        for (name, allowed) in doors {
            let used = code.contains(&format!("{name}::"));
            let inside = allowed.iter().any(|door| file.starts_with(door));
            assert!(
                !used || inside,
                "{file} uses {name}, whose door is {allowed:?}"
            );
        }
    }
}

#[test]
fn every_file_says_what_it_is_and_keeps_its_length() {
    for (file, text) in sources() {
        assert!(text.starts_with("//!"), "{file} begins with what it is");
        let most = if file == "species/table.rs" {
            2_000
        } else {
            600
        };
        assert!(
            text.lines().count() <= most,
            "{file} has {} lines",
            text.lines().count()
        );
    }
    let main = std::fs::read_to_string(root().join("src/main.rs")).unwrap();
    assert!(main.lines().count() <= 20);
}

/// The words between backticks that look like paths of the project.
fn paths_in(text: &str) -> Vec<String> {
    text.split('`')
        .skip(1)
        .step_by(2)
        .filter(|w| {
            ["src/", "plans/", "tests/", "demo-jobs/", ".ci/"]
                .iter()
                .any(|p| w.starts_with(p))
        })
        .filter(|w| !w.contains(['<', '*', ' ', '{']))
        .map(str::to_owned)
        .collect()
}

#[test]
fn the_contributors_page_names_only_what_is_there() {
    let text = std::fs::read_to_string(root().join("DEVELOPERS.md")).unwrap();
    let paths = paths_in(&text);
    assert!(paths.len() > 20, "the table is read: {paths:?}");
    let missing: Vec<&String> = paths.iter().filter(|p| !root().join(p).exists()).collect();
    assert_eq!(missing, Vec::<&String>::new());
    let lib = std::fs::read_to_string(root().join("src/lib.rs")).unwrap();
    for room in rooms(&lib) {
        assert!(
            text.contains(&format!("`{room}`")),
            "DEVELOPERS.md names the room `{room}`"
        );
    }
}

#[test]
fn the_gate_runs_exactly_the_readmes_test_command() {
    let readme = std::fs::read_to_string(root().join("README.md")).unwrap();
    let gate = std::fs::read_to_string(root().join(".ci/run")).unwrap();
    let last = gate.lines().last().unwrap();
    assert!(
        readme.lines().any(|line| line == last),
        "README has the line `{last}`"
    );
    assert!(
        readme
            .lines()
            .any(|line| line == "cargo run --release -- demo")
    );
    let kept =
        std::fs::read_to_string(root().join("tests/screens/13-cuts-plunge-ascii.snap")).unwrap();
    let picture = kept.splitn(3, "---\n").nth(2).unwrap().trim_end();
    assert!(
        readme.contains(picture),
        "the README's picture is the program's own screen"
    );
    for path in paths_in(&readme) {
        assert!(root().join(&path).exists(), "README names {path}");
    }
}

#[test]
fn the_top_level_is_as_agreed() {
    let agreed = [
        "Cargo.toml",
        "Cargo.lock",
        "README.md",
        "DEVELOPERS.md",
        "LICENSE-MIT",
        "LICENSE-APACHE",
        "src",
        "plans",
        "tests",
        "demo-jobs",
    ];
    // What a build or a first try leaves behind is not part of the project.
    let left_behind = ["target", "stumpside-demo"];
    for entry in std::fs::read_dir(root()).unwrap() {
        let name = entry.unwrap().file_name().into_string().unwrap();
        assert!(
            name.starts_with('.')
                || agreed.contains(&name.as_str())
                || left_behind.contains(&name.as_str()),
            "{name} stands at the top"
        );
    }
    for name in agreed {
        assert!(root().join(name).exists(), "{name} is missing");
    }
}

#[test]
fn no_screen_word_promises_and_no_line_is_green() {
    let mut texts: Vec<(PathBuf, String)> = sources()
        .into_iter()
        .filter(|(name, _)| {
            name.starts_with("tui/") || name.starts_with("briefing/") || name.starts_with("cli/")
        })
        .map(|(name, text)| (PathBuf::from(name), code(&text)))
        .collect();
    let mut folders = vec![root().join("plans")];
    while let Some(folder) = folders.pop() {
        for entry in std::fs::read_dir(folder).unwrap() {
            let path = entry.unwrap().path();
            if path.is_dir() {
                folders.push(path);
            } else {
                let text = std::fs::read_to_string(&path).unwrap();
                texts.push((path, text));
            }
        }
    }
    for (path, text) in texts {
        for word in text.split(|c: char| !c.is_alphabetic()) {
            let word = word.to_lowercase();
            assert!(
                word != "safe" && word != "green",
                "{}: the word `{word}`",
                path.display()
            );
        }
    }
}
