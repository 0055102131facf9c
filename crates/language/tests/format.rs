//! The layout that the formatter gives, and what it leaves alone.

use tussock_language::document::Document;
use tussock_language::format::{edits, format, format_markdown};

#[track_caller]
fn becomes(before: &str, after: &str) {
    assert_eq!(format(before), after);
    assert_eq!(format(after), after, "a formatted text stays as it is");
}

#[track_caller]
fn stays(text: &str) {
    becomes(text, text);
}

#[test]
fn one_space_between_words() {
    becomes("show   groups\tof\u{a0}main  \n", "show groups of main\n");
    becomes("compare a,b ,c across f in t as m", "compare a, b, c across f in t as m");
    becomes("compare q1 .. q9 across f in t as m", "compare q1..q9 across f in t as m");
    becomes(
        "derive t.x=if a>= - 1 then-b else log( c )^2*( a-b )",
        "derive t.x = if a >= -1 then -b else log(c) ^ 2 * (a - b)",
    );
    becomes(
        "admit t where not(a in[x,\"y\" , - 3]) as u because \"r\"",
        "admit t where not (a in [x, \"y\", -3]) as u because \"r\"",
    );
    becomes("pin main . functions . 1 . share at - .5", "pin main.functions.1.share at -.5");
    becomes("label  t . `a b`   \"A\"", "label t.`a b` \"A\"");
}

#[test]
fn clauses_that_do_not_fit_continue_on_indented_lines() {
    becomes(
        "compare alertness,\n    mood\n  across roster\n  in crew as main\n",
        "compare alertness, mood across roster in crew as main\n",
    );
    becomes(
        "read \"data/raw crew.csv\" as raw missing \"NA\", -9 separator \";\" decimal \",\" encoding \"latin1\"\n",
        "read \"data/raw crew.csv\" as raw missing \"NA\", -9 separator \";\" decimal \",\"\n  encoding \"latin1\"\n",
    );
    becomes(
        "admit crew where watches >= 8 and roster in [fixed, forward, backward] and alertness > 0 and mood > 0 as served because \"eight\"",
        "admit crew\n  where watches >= 8 and roster in [fixed, forward, backward] and alertness > 0\n    and mood > 0 as served because \"eight\"",
    );
    let outcomes: Vec<String> = (0..20).map(|number| format!("outcome_{number}")).collect();
    becomes(
        &format!("compare {} across f in t as m", outcomes.join(",")),
        "compare outcome_0, outcome_1, outcome_2, outcome_3, outcome_4, outcome_5, outcome_6,\n    \
         outcome_7, outcome_8, outcome_9, outcome_10, outcome_11, outcome_12, outcome_13,\n    \
         outcome_14, outcome_15, outcome_16, outcome_17, outcome_18, outcome_19 across f in t\n  \
         as m",
    );
}

#[test]
fn comments_and_blank_lines_stay() {
    stays(
        "# first\n\n\n# second\nshow groups of main # why\n\nshow flow of main\n  # below it\n# after\n",
    );
    becomes(
        "\n\n  show groups of main#why\n   # deeper  \n\n\n",
        "show groups of main #why\n  # deeper\n",
    );
    becomes(
        "compare a, # the first\n b\n# then\n  across f in t\n  # last\n  as m # end\n",
        "compare a, # the first\n    b\n  # then\n  across f in t\n  # last\n  as m # end\n",
    );
    stays("# allow lax-setting: a supplement\nshow pairs of main pairs unadjusted\n");
    stays("");
    becomes("\n \n\t\n", "");
    becomes("# only a comment", "# only a comment");
}

#[test]
fn texts_stay_letter_by_letter() {
    stays("write \"A  sentence,  {{ main.omnibus.pillai }}.\"\n");
    stays("write \"\"\"\n  Two lines,\n    as they are.\n  \"\"\"\nshow groups of main\n");
    let long = "word ".repeat(40);
    stays(&format!("write \"{long}\"\n"));
}

#[test]
fn a_statement_with_an_error_stays_as_it_is() {
    becomes(
        "show   groups   off main\n  and   more\nshow   groups of   main\n",
        "show   groups   off main\n  and   more\nshow groups of main\n",
    );
    stays("read \"half\n\n\nshow groups of main\n");
}

#[test]
fn line_ends_and_the_mark_at_the_start_stay() {
    becomes("\u{feff}show  a of b\r\n  alpha .01\r\n", "\u{feff}show a of b alpha .01\r\n");
    becomes("show  a of b", "show a of b");
    becomes("show a of b\r\nshow a off\n  b\nread", "show a of b\r\nshow a off\r\n  b\r\nread");
}

#[test]
fn only_fences_of_a_markdown_text_are_formatted() {
    let before = "A  b\n\n```tussock\nshow  a of b\n```\n\n- c\n\n  ```tussock\n    show  a of b\n      \
                  alpha .01\n    show  c of d\n  ```\n\n```python\nx  =  1\n```\n";
    let after = "A  b\n\n```tussock\nshow a of b\n```\n\n- c\n\n  ```tussock\n    show a of b alpha .01\n    \
                 show c of d\n  ```\n\n```python\nx  =  1\n```\n";
    assert_eq!(format_markdown(before), after);
    assert_eq!(format_markdown(after), after);
}

#[test]
fn edits_are_short_and_in_order() {
    let text =
        "```tussock\nshow a of b\nshow  c of d\nshow e of f\n```\n```tussock\nshow g  of h\n```\n";
    let edits = edits(&Document::markdown(text));
    let spans: Vec<_> = edits.iter().map(|edit| edit.location.span.of(text)).collect();
    assert_eq!(spans, [" ", " "]);
    assert!(edits.iter().all(|edit| edit.text.is_empty()));
    assert!(edits[0].location.span.start < edits[1].location.span.start);
}
