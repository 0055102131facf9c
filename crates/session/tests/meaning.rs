//! What documents mean: names stand for their newest definition, answers rest on nothing stale, rows
//! that are left out leave a trace.

mod support;

use std::time::{Duration, SystemTime};

use support::{Folder, PLAIN};
use tussock_language::document::{Document, RegionKind};
use tussock_session::answer::Output;
use tussock_session::cancel::Cancel;
use tussock_session::notebook::Notebook;

const SCRIPT: &str = "read \"t.csv\" as t
compare x, y across g in t as m
show omnibus of m
";

#[test]
fn the_order_of_statements_does_not_change_what_they_mean() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let reversed: String = SCRIPT.lines().rev().map(|line| format!("{line}\n")).collect();
    let path = "m.omnibus.g.wilks.value";
    assert_eq!(folder.value(SCRIPT, path), folder.value(&reversed, path));
    assert_eq!(folder.problems(&reversed), "");
}

#[test]
fn a_changed_file_changes_the_answer() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let path = "m.groups.a.x.mean";
    let before = folder.value(SCRIPT, path);
    folder.write("t.csv", &PLAIN.replace("a,9.8,", "a,4.8,"));
    // Clocks of file systems may be coarse, so the new time is set by hand.
    let file = std::fs::File::options().write(true).open(folder.path.join("t.csv")).unwrap();
    file.set_modified(SystemTime::now() + Duration::from_secs(5)).unwrap();
    let after = folder.value(SCRIPT, path);
    assert!((before - after - 1.0).abs() < 1e-12, "{before} {after}");
}

#[test]
fn a_cell_that_is_run_again_replaces_what_it_defined() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let mut notebook = Notebook::new(&folder.path);
    let quiet = Cancel::new();
    let mean = |notebook: &mut Notebook| {
        let reply =
            notebook.run(Some("ask"), "write \"{{m.groups.a.x.n}} {{m.groups.a.n}}\"", &quiet);
        reply.answers.list.iter().find_map(|answer| match &answer.output {
            Output::Paragraph(text) => Some(text.text()),
            _ => None,
        })
    };
    notebook.run(Some("data"), "read \"t.csv\" as t", &quiet);
    notebook.run(Some("compare"), "compare x, y across g in t as m", &quiet);
    let told = notebook.run(Some("ask"), "write \"{{m.groups.a.n}}\"", &quiet);
    assert!(!told.answers.failed());
    notebook.run(Some("compare"), "compare x, y across g in t where x > 8 as m", &quiet);
    let reply = notebook.run(Some("ask"), "write \"{{m.groups.a.n}}\"", &quiet);
    let text = reply.answers.list.iter().find_map(|answer| match &answer.output {
        Output::Paragraph(text) => Some(text.text()),
        _ => None,
    });
    assert_eq!(text.as_deref(), Some("4"));
    assert_eq!(mean(&mut notebook), None, "an unknown path gives no paragraph");
    // A cell that no longer defines a name takes the name with it.
    notebook.run(Some("compare"), "# nothing any more", &quiet);
    let reply = notebook.run(Some("ask"), "show groups of m", &quiet);
    assert!(reply.answers.failed());
}

#[test]
fn the_newest_definition_wins_among_cells_without_names() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let mut notebook = Notebook::new(&folder.path);
    let quiet = Cancel::new();
    notebook.run(None, "read \"t.csv\" as t", &quiet);
    notebook.run(None, "compare x, y across g in t as m", &quiet);
    notebook.run(None, "compare x across g in t as m", &quiet);
    let reply = notebook.run(None, "show outcomes of m", &quiet);
    let rows = reply.answers.list.iter().find_map(|answer| match &answer.output {
        Output::Table(table) => Some(table.rows.len()),
        _ => None,
    });
    assert_eq!(rows, Some(1));
}

#[test]
fn a_name_defined_twice_in_one_document_is_an_error_at_both_places() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let told = folder.problems(&format!("{SCRIPT}compare x across g in t as m\n"));
    assert!(told.contains("error [duplicate-definition]"), "{told}");
    assert!(told.contains("  2 | compare") && told.contains("  4 | compare"), "{told}");
}

#[test]
fn a_restarted_notebook_says_which_cell_to_run() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let mut notebook = Notebook::new(&folder.path);
    let reply = notebook.run(Some("ask"), "show omnibus of m", &Cancel::new());
    let told: Vec<_> = reply.answers.problems().collect();
    assert_eq!(told.len(), 1);
    assert_eq!(told[0].rule, "unknown-comparison");
    let help = told[0].help.as_deref().unwrap_or_default();
    assert!(help.contains("run the cell"), "{help}");
}

#[test]
fn a_cell_that_states_an_order_is_told_where_the_order_does_not_fit() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let mut notebook = Notebook::new(&folder.path);
    notebook.run(None, "read \"t.csv\" as t", &Cancel::new());
    let reply = notebook.run(None, "levels t.g a, b", &Cancel::new());
    let rules: Vec<&str> = reply.answers.problems().map(|problem| problem.rule).collect();
    assert_eq!(rules, ["unlisted-level"]);
    let reply = notebook.run(None, "derive t.z = zscore(g)", &Cancel::new());
    assert!(reply.answers.failed());
}

#[test]
fn rows_left_out_are_counted_with_their_reason() {
    let text = PLAIN.replace("a,7.8,22.9", "a,,22.9").replace("b,8.0,17.1", "b,8.0,");
    let folder = Folder::with(&[("t.csv", &text)]);
    let code = "read \"t.csv\" as t
admit t where x >= 8 as kept because \"protocol 3.2\"
compare x, y across g in kept as m
show flow of m
";
    let value = |path: &str| folder.value(code, path);
    assert_eq!(value("m.flow.read.rows"), 15.0);
    assert_eq!(value("m.flow.admitted.kept.rows"), 13.0);
    assert_eq!(value("m.flow.admitted.kept.left_out"), 2.0);
    assert_eq!(value("m.flow.analysed.rows"), 12.0);
    assert_eq!(value("m.flow.analysed.left_out"), 1.0);
    assert_eq!(value("m.flow.missing.y.rows"), 1.0);
    let groups = ["a", "b", "c"].map(|group| value(&format!("m.flow.analysed.groups.{group}")));
    assert_eq!(groups, [4.0, 4.0, 4.0]);
    let shown = format!("{:?}", folder.answer(code));
    assert!(shown.contains("protocol 3.2 (x >= 8; 1 row left open by a missing value)"), "{shown}");
}

#[test]
fn spellings_are_merged_before_anything_is_compared() {
    let folder = Folder::with(&[("t.csv", &PLAIN.replace("c,12.6", "\"C \",12.6"))]);
    let code = "read \"t.csv\" as t
levels t.g c, a, b merging \"C \" into c
admit t where g != b as some because \"two groups\"
compare x, y across g in some as m
";
    assert_eq!(folder.problems(code), "");
    assert_eq!(folder.value(code, "m.groups.c.n"), 5.0);
    // The reference comes first, so differences are c minus a.
    let means = ["c", "a"].map(|group| folder.value(code, &format!("m.groups.{group}.x.mean")));
    let difference = folder.value(code, "m.pairs.g.c.a.x.difference");
    assert!((difference - (means[0] - means[1])).abs() < 1e-12);
}

#[test]
fn derived_columns_follow_the_table_that_they_are_derived_for() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let code = "read \"t.csv\" as t
derive t.sum = x + y
derive t.z = zscore(sum)
derive t.size = if x > 10 then \"large\" else \"small\"
compare sum, x across size in t as m
compare z, x across g in t as n
";
    assert_eq!(folder.problems(code), "");
    let mean = |group: &str| folder.value(code, &format!("n.groups.{group}.z.mean"));
    assert!((mean("a") + mean("b") + mean("c")).abs() < 1e-12);
    assert_eq!(folder.value(code, "m.groups.large.n"), 9.0);
}

#[test]
fn odd_names_are_quoted_in_paths() {
    let text = PLAIN.replace("g,x,y", "g,Reaction time (ms),y").replace("\na,", "\nday shift,");
    let folder = Folder::with(&[("t.csv", &text)]);
    let code = "read \"t.csv\" as t
compare `Reaction time (ms)`, y across g in t as m
write \"{{m.groups.`day shift`.`Reaction time (ms)`.mean 3}} {{m.omnibus.wilks}}\"
";
    let words = folder.words(code);
    assert!(words.last().unwrap().starts_with("9.780 Λ = "), "{words:?}");
    let path = "m.groups.`day shift`.`Reaction time (ms)`.mean";
    assert!((folder.value(code, path) - 9.78).abs() < 1e-12);
}

#[test]
fn the_term_may_be_left_out_of_a_path() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let code = format!("{SCRIPT}write \"{{{{m.omnibus.g.wilks}}}} {{{{m.omnibus.wilks}}}}\"\n");
    let words = folder.words(&code);
    let (first, second) = words.last().unwrap().split_once(" Λ").unwrap();
    assert_eq!(first.trim_start_matches('Λ'), second);
}

#[test]
fn a_term_with_the_name_of_a_level_is_told_from_it() {
    let folder = Folder::with(&[("t.csv", &PLAIN.replace("\na,", "\ng,"))]);
    let code =
        format!("{SCRIPT}write \"{{{{m.centroids.g.1.mean}}}} {{{{m.centroids.g.g.1.mean}}}}\"\n");
    let words = folder.words(&code);
    let (first, second) = words.last().unwrap().split_once(' ').unwrap();
    assert_eq!(first, second);
}

#[test]
fn a_wrong_path_says_how_far_it_is_right() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let told = folder.problems(&format!("{SCRIPT}write \"{{{{m.omnibus.pilai.value}}}}\"\n"));
    assert!(told.contains("unknown-path") && told.contains("`pillai`"), "{told}");
}

#[test]
fn prose_values_are_answered_in_a_markdown_document() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let text =
        format!("# Title\n\n```tussock\n{SCRIPT}```\n\nThey differed, {{{{m.omnibus.pillai}}}}.\n");
    let document = Document::markdown(&text);
    assert!(document.sources[0].regions.iter().any(|region| region.kind == RegionKind::Prose));
    let answers = folder.session.answer(&document, &Cancel::new());
    let value = answers.list.iter().find_map(|answer| match &answer.output {
        Output::Value(value) => Some(value.text()),
        _ => None,
    });
    assert!(value.as_deref().is_some_and(|v| v.starts_with("V = .")), "{value:?}");
}

#[test]
fn a_pin_holds_within_its_rounding_and_fails_beyond_it() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let exact = folder.value(SCRIPT, "m.groups.a.x.mean");
    assert!((exact - 9.78).abs() < 1e-12);
    let pin = |rest: &str| folder.problems(&format!("{SCRIPT}pin m.groups.a.x.mean at {rest}\n"));
    assert_eq!(pin("9.8"), "");
    assert_eq!(pin("9.78"), "");
    assert_eq!(pin("9.5 within .3"), "");
    let told = pin("9.7");
    assert!(told.contains("error [moved-pin]") && told.contains("9.78"), "{told}");
}

#[test]
fn an_interrupted_document_says_so() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let cancel = Cancel::new();
    cancel.cancel();
    let answers = folder.session.answer(&Document::script(SCRIPT), &cancel);
    assert!(answers.interrupted);
    assert!(!answers.list.iter().any(|answer| matches!(answer.output, Output::Table(_))));
}

#[test]
fn the_sample_shows_coefficients_that_differ_in_sign() {
    let folder = Folder::with(&[]);
    let code = "read sample ferry as crew
levels crew.roster fixed, forward, backward merging \"Forward \" into forward
admit crew where watches >= 8 as served because \"at least eight watches\"
compare alertness, mood, lapses, sleep across roster in served as main
";
    assert_eq!(folder.problems(code), "");
    let mood = |kind: &str| folder.value(code, &format!("main.coefficients.roster.{kind}.mood.1"));
    assert!(mood("standardized") < -0.3 && mood("structure") > 0.1);
    assert!(mood("share") < 0.0);
}
