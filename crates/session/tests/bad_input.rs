//! Bad input: each message says where and what to do, and what can be answered still is.

mod support;

use support::{Folder, PLAIN};

/// A script that reads `t.csv`, compares `outcomes` across `g` and asks for the omnibus tests.
fn omnibus(outcomes: &str) -> String {
    format!("read \"t.csv\" as t\ncompare {outcomes} across g in t as m\nshow omnibus of m\n")
}

/// `PLAIN` with a third outcome.
fn with_third(third: impl Fn(f64, f64) -> String) -> String {
    let mut text = String::from("g,x,y,z\n");
    for line in PLAIN.lines().skip(1) {
        let cells: Vec<&str> = line.split(',').collect();
        let [x, y] = [1, 2].map(|at: usize| cells[at].parse::<f64>().unwrap());
        text.push_str(&format!("{line},{}\n", third(x, y)));
    }
    text
}

#[test]
fn a_missing_file_is_told_with_the_nearest_one() {
    let folder = Folder::with(&[("crew.csv", PLAIN)]);
    let told = folder.problems("read \"crw.csv\" as t\n");
    assert!(told.starts_with("error [unreadable-file]: there is no file `"), "{told}");
    assert!(told.contains("  1 | read \"crw.csv\" as t\n    |      ^^^^^^^^^\n"), "{told}");
    assert!(told.contains("help: did you mean `crew.csv`?"), "{told}");
}

#[test]
fn a_wrong_separator_is_told_with_the_right_one() {
    let folder = Folder::with(&[("t.csv", &PLAIN.replace(',', ";"))]);
    let told = folder.problems(&omnibus("x, y"));
    assert!(told.contains("seem to be by semicolons"), "{told}");
    assert!(told.contains("help: write `separator \";\"` after `read`"), "{told}");
    let mended = omnibus("x, y").replace("as t\n", "as t separator \";\"\n");
    assert_eq!(folder.problems(&mended), "");
    assert_eq!(folder.tables(&mended), 1);
}

#[test]
fn text_in_a_numeric_column_is_told_with_its_row_and_a_mend() {
    let folder = Folder::with(&[("t.csv", &PLAIN.replace("b,12.5", "b,NA"))]);
    let told = folder.problems(&omnibus("x, y"));
    assert_eq!(
        told,
        "error [text-in-numeric-column]: `x` has a cell that is not a number: \"NA\" in row 8 \
         (line 9 of the file)\n  here\n  2 | compare x, y across g in t as m\n    |         ^\n  \
         help: if it stands for a missing value, write `missing \"NA\"` after `read`\n"
    );
    let mended = omnibus("x, y").replace("as t\n", "as t missing \"NA\"\n");
    assert_eq!(folder.problems(&mended), "");
}

#[test]
fn a_group_without_complete_rows_is_named() {
    let text: String = PLAIN
        .lines()
        .map(|line| match line.strip_prefix("c,") {
            Some(rest) => format!("c,{},\n", rest.split(',').next().unwrap()),
            None => format!("{line}\n"),
        })
        .collect();
    let folder = Folder::with(&[("t.csv", &text)]);
    assert_eq!(
        folder.problems(&omnibus("x, y")),
        "error [empty-group]: no row of `c` has a value on every outcome\n  here\n  \
         2 | compare x, y across g in t as m\n    |                     ^\n  \
         help: leave the group out with `where g != c`, or compare on other outcomes\n"
    );
    let mended = omnibus("x, y").replace(" as m\n", " where g != c as m\n");
    assert_eq!(folder.problems(&mended), "");
}

#[test]
fn a_group_of_one_is_described_as_far_as_it_goes() {
    let text = format!("{PLAIN}d,9.0,20.0\n");
    let folder = Folder::with(&[("t.csv", &text)]);
    let views = "show groups of m\nshow covariances of m\nshow scores of m\nshow pairs of m\n";
    let code = format!("{}{views}", omnibus("x, y"));
    assert_eq!(folder.problems(&code), "");
    assert_eq!(folder.tables(&code), 7);
    let shown = format!("{:?}", folder.answer(&code));
    assert!(shown.contains("A group of one has no standard deviation"), "{shown}");
    assert!(shown.contains("the group d has 1 row, and 3 are needed here"), "{shown}");
}

#[test]
fn a_constant_outcome_is_named_and_the_others_are_still_answered() {
    let folder = Folder::with(&[("t.csv", &with_third(|_, _| "5".to_owned()))]);
    let told = folder.problems(&omnibus("x, y, z"));
    assert_eq!(
        told,
        "error [constant-outcome]: `z` has the same value in every row\n  here\n  \
         2 | compare x, y, z across g in t as m\n    |               ^\n  \
         help: leave it out of the outcomes: it can show no difference\n"
    );
    let views = ["flow", "groups", "correlations", "covariances", "outcomes", "pairs"]
        .map(|view| format!("show {view} of m\n"));
    let code = omnibus("x, y, z").replace("show omnibus of m\n", &views.concat());
    assert_eq!(folder.problems(&code), "");
    assert_eq!(folder.tables(&code), 7);
}

#[test]
fn an_outcome_twice_over_is_named_with_its_twin() {
    let folder = Folder::with(&[("t.csv", &with_third(|x, _| x.to_string()))]);
    assert_eq!(
        folder.problems(&omnibus("x, y, z")),
        "error [dependent-outcomes]: `z` holds the same information as `x`\n  here\n  \
         2 | compare x, y, z across g in t as m\n    |               ^\n  `x` is here\n  here\n  \
         2 | compare x, y, z across g in t as m\n    |         ^\n  help: leave out one of the two\n"
    );
}

#[test]
fn a_total_beside_its_parts_is_named_with_the_relation() {
    let folder = Folder::with(&[("t.csv", &with_third(|x, y| format!("{:.1}", x + y)))]);
    let told = folder.problems(&omnibus("x, y, z"));
    assert!(told.contains("`z` is a linear function of other outcomes: `x` + `y`"), "{told}");
    let folder = Folder::with(&[("t.csv", &with_third(|x, _| (32.0 + 1.8 * x).to_string()))]);
    let told = folder.problems(&omnibus("x, y, z"));
    assert!(told.contains("`z` is `x` in another unit"), "{told}");
}

#[test]
fn more_outcomes_than_degrees_of_freedom_are_refused_with_the_limit() {
    let text = "g,q1,q2,q3,q4\na,1,2,4,3\na,2,1,5,9\nb,4,3,7,1\nb,3,5,2,2\nb,6,4,4,7\n";
    let folder = Folder::with(&[("t.csv", text)]);
    let told = folder.problems(&omnibus("q1..q4"));
    assert!(
        told.contains("[too-many-outcomes]: 4 outcomes are too many for 3 degrees of freedom"),
        "{told}"
    );
    assert!(told.contains("help: compare at most 3 outcomes at once"), "{told}");
}

#[test]
fn names_that_do_not_exist_are_told_with_the_nearest_ones() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let code = "read \"t.csv\" as tab\ncompare x, yy across g in tab as main\n\
                compare x across g in tub as other\nshow omnibus of mian\nshow omnibuss of main\n";
    let told = folder.problems(code);
    for wanted in [
        "[unknown-column]: `tab` has no column `yy`",
        "[unknown-table]: there is no table `tub`",
        "[unknown-comparison]: there is no comparison `mian`",
        "[unknown-view]: there is no view `omnibuss`",
        "help: did you mean `y`?",
        "help: did you mean `tab`?",
        "help: did you mean `main`?",
        "help: did you mean `omnibus`?",
    ] {
        assert!(told.contains(wanted), "{wanted} is not in {told}");
    }
}

#[test]
fn a_level_that_does_not_exist_is_told_once() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let code = "read \"t.csv\" as t\nlevels t.g a, b, cc\n\
                compare x, y across g in t as m\nshow omnibus of m\nshow groups of m\n";
    let told = folder.problems(code);
    assert_eq!(told.matches("error [").count(), 1, "{told}");
    assert!(told.contains("[unknown-level]: `t.g` has no level `cc`"), "{told}");
}

#[test]
fn an_order_that_leaves_a_level_out_is_told_with_both_mends() {
    let folder = Folder::with(&[("t.csv", &PLAIN.replace("c,12.6", "C ,12.6"))]);
    let code = "read \"t.csv\" as t\nlevels t.g a, b, c\ncompare x, y across g in t as m\n";
    let told = folder.problems(code);
    assert!(told.contains("`g` also has the level `C `"), "{told}");
    assert!(told.contains("add `merging \"C \" into c`"), "{told}");
}

#[test]
fn a_statement_half_typed_stops_only_what_rests_on_it() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let code = "read \"t.csv\" as t\ncompare x, y across g in t as whole\n\
                compare x, y acr\nshow omnibus of whole\n";
    let told = folder.problems(code);
    assert!(told.contains("`compare` has no clause `acr`"), "{told}");
    assert!(told.contains("did you mean `across`?"), "{told}");
    assert_eq!(folder.tables(code), 1);
}

#[test]
fn one_group_left_over_is_told_at_the_factor() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let told = folder.problems(&omnibus("x, y").replace(" as m\n", " where g = a as m\n"));
    assert!(told.contains("[single-group]: `g` has the same value in every row"), "{told}");
}

#[test]
fn an_identifier_taken_for_a_factor_is_told() {
    let text: String = PLAIN
        .lines()
        .enumerate()
        .map(|(at, line)| {
            format!("{},{line}\n", if at == 0 { "id".into() } else { at.to_string() })
        })
        .collect();
    let folder = Folder::with(&[("t.csv", &text)]);
    let told = folder.problems(&omnibus("x, y").replace("across g", "across id"));
    assert!(told.contains("[single-row-groups]"), "{told}");
}

#[test]
fn words_that_are_not_built_are_unknown_words() {
    let folder = Folder::with(&[("t.csv", PLAIN)]);
    let code = "read \"t.csv\" as t\ncompare x, y across g in t adjusting x as m\n\
                report m by functions\npolicy seed 12\nshow power of m\n";
    let told = folder.problems(code);
    for word in ["adjusting", "report", "seed", "power"] {
        assert!(told.contains(&format!("`{word}`")), "{word} is not told in {told}");
    }
}

#[test]
fn pairs_beyond_reading_are_refused_and_the_other_views_answer() {
    let rows = (0..600).map(|row| format!("k{},{},{}\n", row / 2, row % 7, (row * row) % 11));
    let text = format!("id,x,y\n{}", rows.collect::<String>());
    let folder = Folder::with(&[("t.csv", &text)]);
    let code = omnibus("x, y").replace("across g", "across id");
    assert_eq!(folder.problems(&code), "");
    let told = folder.problems(&format!("{code}show pairs of m\n"));
    assert!(told.contains("[too-many-pairs]: 300 groups make 89700 comparisons"), "{told}");
    assert!(folder.value(&code, "m.omnibus.id.pillai.F").is_finite());
}
