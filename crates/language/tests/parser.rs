//! The parser on whole programs, on half-typed ones, and on what is hardly text at all.

#![allow(clippy::panic, reason = "a helper of a test fails as the test does")]

use tussock_language::ast::{
    Adjustment, Better, ColumnSelection, Expression, ExpressionKind, Operator, ProsePart,
    ReadSource, Statement, StatementKind,
};
use tussock_language::span::Span;
use tussock_language::syntax::{Parse, parse};

fn whole(text: &str) -> Parse {
    let parse = parse(text, Span::new(0, text.len()));
    assert_eq!(parse.root().text().to_string(), text, "the tree holds every byte");
    parse
}

#[track_caller]
fn one(text: &str) -> StatementKind {
    let parse = whole(text);
    assert_eq!(parse.errors, [], "{text}");
    let [statement] = parse.statements.as_slice() else { panic!("not one statement: {text}") };
    assert_eq!(statement.span.of(text), text.trim());
    statement.kind.clone()
}

/// The rule, the place and the message of the first error.
#[track_caller]
fn error(text: &str) -> (&'static str, String, String) {
    let parse = whole(text);
    let error = parse.errors.first().unwrap_or_else(|| panic!("no error: {text}"));
    let broken = parse.statements.iter().any(|s| matches!(s.kind, StatementKind::Broken { .. }));
    assert!(broken, "an error breaks its statement: {text}");
    (error.rule, error.span.of(text).to_owned(), error.message.clone())
}

const PROGRAM: &str = r#"policy alpha .05 interval 95% pairs holm scores alpha .001 effect g missing listwise

read sample ferry as crew
read "data/raw crew.csv" as raw missing "NA", -9 separator ";" decimal ","
  encoding "latin1"
levels crew.roster fixed, forward, backward merging "fxd", "Fixed " into fixed
  merging "fwd" into forward
label crew.lapses "Attention lapses" unit "per 10 min" better low
derive crew.gain = if missing(post) then 0 else (post - pre) / 2 ^ -1
admit crew where watches >= 8 and not (site not in [north, "east 2", -3]) as served
  because "at least eight watches"
compare alertness, q1..q9, `Reaction time (ms)` across roster in served
  where age > 20
  as main

show groups of main
show pairs of main for roster pairs bonferroni alpha .01
show coefficients of main coefficients structure
write "The rosters differed, {{main.omnibus.pillai}}; V was {{main.omnibus.pillai.value 3}}."
pin main.functions.1.share at .912 within .001
"#;

#[test]
fn a_whole_program_has_no_errors() {
    let parse = whole(PROGRAM);
    assert_eq!(parse.errors, []);
    assert_eq!(parse.statements.len(), 13);
    assert!(!parse.statements.iter().any(|s| matches!(s.kind, StatementKind::Broken { .. })));
}

#[test]
fn a_read_statement_keeps_every_clause() {
    let kind = one("read \"a.csv\" as crew missing \"NA\", -9 separator \"\\t\" decimal \",\"");
    let StatementKind::Read(read) = kind else { panic!("{kind:?}") };
    assert!(matches!(&read.source, ReadSource::File(file) if file.value == "a.csv"));
    assert_eq!(read.name.value, "crew");
    let missing: Vec<_> = read.missing.iter().map(|text| text.value.as_str()).collect();
    assert_eq!(missing, ["NA", "-9"]);
    assert_eq!(read.separator.expect("it is stated").value, '\t');
    assert_eq!(read.decimal.expect("it is stated").value, ',');
}

#[test]
fn levels_are_ordered_and_merged() {
    let text = "levels crew.`on duty` `2`, b merging \"fxd\", \"Fixed \" into b merging 'x' into c";
    let kind = one(&text.replace('\'', "\""));
    let StatementKind::Levels(levels) = kind else { panic!("{kind:?}") };
    assert_eq!(levels.column.column.value, "on duty");
    assert_eq!(levels.order.len(), 2);
    assert_eq!(levels.merging.len(), 2);
    assert_eq!(levels.merging[0].spellings[1].value, "Fixed ");
    assert_eq!(levels.merging[1].level.value, "c");
}

#[test]
fn a_comparison_takes_its_clauses_in_any_order() {
    let kind = one("compare a, q1..q3 in crew as main across roster where not (x = 1)");
    let StatementKind::Compare(compare) = kind else { panic!("{kind:?}") };
    assert!(
        matches!(&compare.outcomes[1], ColumnSelection::Range { last, .. } if last.value == "q3")
    );
    assert_eq!(compare.factors[0].value, "roster");
    assert_eq!(compare.name.value, "main");
    assert!(compare.condition.is_some());
}

#[test]
fn words_of_the_grammar_may_name_columns_and_tables() {
    let kind = one("compare across, over, as, of across across in in as as");
    let StatementKind::Compare(compare) = kind else { panic!("{kind:?}") };
    assert_eq!(compare.outcomes.len(), 4);
    assert_eq!(compare.factors[0].value, "across");
    assert_eq!(compare.table.value, "in");
    assert_eq!(compare.name.value, "as");
    one("admit where where where > 5 as as because \"it may be\"");
    one("show pairs of of for for pairs holm");
    one("derive read.as = where + over");
    one("label crew.better \"Better\" better high");
    one("compare in, read across f in crew where in in [in] as main");
}

#[test]
fn the_settings_of_a_policy_are_typed() {
    let kind = one("policy alpha 5% scores alpha .001 pairs unadjusted");
    let StatementKind::Policy(policy) = kind else { panic!("{kind:?}") };
    assert_eq!(policy.settings.alpha.expect("it is stated").value, 0.05);
    assert_eq!(policy.settings.scores_alpha.expect("it is stated").value, 0.001);
    assert_eq!(policy.settings.pairs.expect("it is stated").value, Adjustment::Unadjusted);
}

#[test]
fn a_label_says_which_end_is_good() {
    let kind = one("label crew.lapses \"Lapses\" better low unit \"per 10 min\"");
    let StatementKind::Label(label) = kind else { panic!("{kind:?}") };
    assert_eq!(label.better.expect("it is stated").value, Better::Low);
}

#[test]
fn prose_is_divided_into_text_and_values() {
    let text = "write \"\\\"So\\\" {{main.groups.`on duty`.n}}: \\{{x}}\"";
    let kind = one(text);
    let StatementKind::Write(write) = kind else { panic!("{kind:?}") };
    let [ProsePart::Text(before), ProsePart::Value(value), ProsePart::Text(after)] =
        write.parts.as_slice()
    else {
        panic!("{:?}", write.parts)
    };
    assert_eq!((before.as_str(), after.as_str()), ("\"So\" ", ": {{x}}"));
    assert_eq!(value.span.of(text), "{{main.groups.`on duty`.n}}");
    assert_eq!(value.path.segments[2].value, "on duty");
    assert_eq!(value.path.segments[2].span.of(text), "`on duty`");
}

#[test]
fn a_pin_knows_how_precisely_it_was_written() {
    let kind = one("pin main.omnibus.roster.pillai.value at -.381");
    let StatementKind::Pin(pin) = kind else { panic!("{kind:?}") };
    assert_eq!((pin.value.value, pin.rounding), (-0.381, 0.0005));
    assert_eq!(pin.path.segments.len(), 5);
}

/// An expression with every operation in parentheses.
fn shown(expression: &Expression) -> String {
    match &expression.kind {
        ExpressionKind::Number(value) => value.to_string(),
        ExpressionKind::Text(text) => format!("{text:?}"),
        ExpressionKind::Name(name) => name.clone(),
        ExpressionKind::Negate(a) => format!("(-{})", shown(a)),
        ExpressionKind::Not(a) => format!("(not {})", shown(a)),
        ExpressionKind::Binary { left, operator, right } => {
            let sign = match operator {
                Operator::Add => "+",
                Operator::Subtract => "-",
                Operator::Multiply => "*",
                Operator::Divide => "/",
                Operator::Power => "^",
                Operator::Equal => "=",
                Operator::Unequal => "!=",
                Operator::Less => "<",
                Operator::LessOrEqual => "<=",
                Operator::Greater => ">",
                Operator::GreaterOrEqual => ">=",
                Operator::And => "and",
                Operator::Or => "or",
            };
            format!("({} {sign} {})", shown(left), shown(right))
        }
        ExpressionKind::If { condition, then, otherwise } => {
            format!("(if {} then {} else {})", shown(condition), shown(then), shown(otherwise))
        }
        ExpressionKind::In { value, list, negated } => {
            let list: Vec<_> = list.iter().map(shown).collect();
            let not = if *negated { "not " } else { "" };
            format!("({} {not}in [{}])", shown(value), list.join(", "))
        }
        ExpressionKind::Call { function, arguments } => {
            let arguments: Vec<_> = arguments.iter().map(shown).collect();
            format!("{}({})", function.value, arguments.join(", "))
        }
    }
}

#[test]
fn operators_bind_as_in_school() {
    for (written, meant) in [
        ("a + b * c", "(a + (b * c))"),
        ("a - b - c", "((a - b) - c)"),
        ("-a ^ 2", "(-(a ^ 2))"),
        ("2 ^ -a ^ b", "(2 ^ (-(a ^ b)))"),
        ("-a * b", "((-a) * b)"),
        ("a * -b + c", "((a * (-b)) + c)"),
        ("not a = 1 and b", "((not (a = 1)) and b)"),
        ("a or b and c", "(a or (b and c))"),
        ("not not a", "(not (not a))"),
        ("a + 1 in [1, -2, x]", "((a + 1) in [1, (-2), x])"),
        ("a not in [\"x y\"] and b", "((a not in [\"x y\"]) and b)"),
        ("a + not_b", "(a + not_b)"),
        ("if a then b else if c then d else e", "(if a then b else (if c then d else e))"),
        ("if a then b else c + 1", "(if a then b else (c + 1))"),
        ("round(log(a), 2) / max(a, b)", "(round(log(a), 2) / max(a, b))"),
        ("(a + b) * c", "((a + b) * c)"),
        ("`in` >= 95%", "(in >= 0.95)"),
        ("a\n  + b", "(a + b)"),
    ] {
        let kind = one(&format!("derive t.x = {written}"));
        let StatementKind::Derive(derive) = kind else { panic!("{kind:?}") };
        assert_eq!(shown(&derive.expression), meant, "{written}");
    }
}

#[test]
fn errors_say_where_and_what() {
    for (text, rule, place, part) in [
        ("compair a across f in t as m", "unknown-word", "compair", "statement starts with"),
        ("report main by functions", "unknown-word", "report", "statement starts with"),
        ("42", "syntax", "42", "starts with a word"),
        ("compare a acros f in t as m", "unknown-word", "acros", "no clause `acros`"),
        ("compare a over w across f in t as m", "unknown-word", "over", "no clause"),
        ("compare a across f, g in t as m", "several-factors", "g", "more than one factor"),
        ("compare a b across f in t as m", "syntax", "b", "a comma is missing"),
        ("compare a, across f in t as m", "syntax", "across", "an outcome is missing before"),
        ("compare across f in t as m", "syntax", "across", "an outcome is missing before"),
        ("compare a across f in t", "syntax", "compare", "needs `as NAME`"),
        ("compare a across f in t as m as n", "duplicate-clause", "as", "twice"),
        ("compare a across f across g in t as m", "duplicate-clause", "across", "twice"),
        ("compare \"a\" across f in t as m", "syntax", "\"a\"", "without quotes"),
        ("compare q1.. across f in t as m", "syntax", "across", "last column of the range"),
        ("read crew.csv as crew", "syntax", "crew", "missing before `crew`"),
        ("read \"a.csv\" as t separator \"ab\"", "syntax", "\"ab\"", "exactly one character"),
        ("read \"a\\d.csv\" as t", "syntax", "\\d", "means nothing"),
        ("read \"a.csv", "syntax", "\"a.csv", "closing `\"` is missing"),
        ("read \"a.csv\" as `t", "syntax", "`t", "closing back-quote"),
        ("label crew.a Lapses", "syntax", "Lapses", "written in quotes"),
        ("label crew \"Lapses\"", "syntax", "", "with its table"),
        ("label crew.a \"A\" better hgih", "unknown-word", "hgih", "is not a direction"),
        ("levels crew.a 1, 2", "syntax", "1", "in back-quotes"),
        ("levels crew.a x, 2", "syntax", "2", "in back-quotes"),
        ("levels crew.a", "syntax", "levels crew.a", "neither an order nor a merging"),
        ("levels crew.a merging \"x\" in y", "syntax", "in", "`into` is missing"),
        ("policy", "syntax", "policy", "states no setting"),
        ("policy pairs hlm", "unknown-word", "hlm", "is not an adjustment"),
        ("policy alpha", "syntax", "", "a rate is missing at the end"),
        ("policy alpha five", "syntax", "five", "a rate is missing"),
        ("derive t.x == 1", "syntax", "==", "is written `=`"),
        ("derive t.x = a ≥ 1", "syntax", "≥", "is written `>=`"),
        ("derive t.x = a && b", "syntax", "&&", "is written `and`"),
        ("derive t.x = (a + b", "syntax", "", "`)` is missing at the end"),
        ("derive t.x = a < b < c", "syntax", "<", "cannot be chained"),
        ("derive t.x = a +", "syntax", "", "a value is missing at the end"),
        ("derive t.x = a and or b", "syntax", "or", "a value is missing"),
        ("derive t.x = 1e999", "syntax", "1e999", "too large"),
        ("admit t where as u because \"x\"", "syntax", "as", "a condition is missing"),
        ("admit t where a in [] as u because \"x\"", "syntax", "]", "a value is missing"),
        ("show groups main", "unknown-word", "main", "no clause"),
        ("show groups of main resamples 99", "unknown-word", "resamples", "no clause"),
        ("write \"{{main.}}\"", "syntax", "{{main.}}", "a key is missing"),
        ("write \"{{main\"", "syntax", "{{", "closing `}}`"),
        ("pin main.omnibus at", "syntax", "", "a value is missing at the end"),
        ("show groups of main 🦭", "syntax", "🦭", "does not belong"),
    ] {
        let (found_rule, found_place, message) = error(text);
        assert_eq!((found_rule, found_place.as_str()), (rule, place), "{text}: {message}");
        assert!(message.contains(part), "{text}: {message}");
    }
}

#[test]
fn a_line_that_should_be_indented_is_told_so() {
    let parse = whole("compare a\nacross f in t as m");
    let error = &parse.errors[1];
    assert!(error.help.as_deref().is_some_and(|help| help.starts_with("indent the line")));
}

#[test]
fn one_broken_statement_leaves_the_others_whole() {
    let text = "read \"a.csv as crew\nshow groups of main\n  nonsense \"\n\npin a.b at 3\n";
    let parse = whole(text);
    assert_eq!(parse.statements.len(), 3);
    let kinds = |s: &Statement| matches!(s.kind, StatementKind::Broken { .. });
    let broken: Vec<bool> = parse.statements.iter().map(kinds).collect();
    assert_eq!(broken, [true, true, false]);
}

#[test]
fn a_broken_statement_still_says_what_it_defines() {
    for text in ["compare a, across f in t as main", "compair a across f in t as main"] {
        let parse = whole(text);
        let [Statement { kind: StatementKind::Broken { defines: Some(name) }, .. }] =
            parse.statements.as_slice()
        else {
            panic!("{:?}", parse.statements)
        };
        assert_eq!(name.value, "main");
    }
}

#[test]
fn line_ends_marks_and_margins_do_not_matter() {
    for text in [
        "\u{feff}show groups of main\r\nshow omnibus\r\n  of main\r\n",
        "  show groups of main\n  show omnibus\n    of main\n",
        "\tshow groups of main\n\tshow omnibus\n\t\tof main",
        "# first\n\nshow groups of main # why\nshow omnibus\n# inside\n\n  of main\n",
        "show groups of main\rshow omnibus\r of main",
    ] {
        let parse = whole(text);
        assert_eq!(parse.errors, [], "{text:?}");
        assert_eq!(parse.statements.len(), 2, "{text:?}");
    }
}

#[test]
fn spans_count_from_the_start_of_the_full_text() {
    let text = "Prose.\n```tussock\nshow groups off main\n```\n";
    let start = text.find("show").expect("it is there");
    let parse = parse(text, Span::new(start, text.len() - 4));
    assert_eq!(parse.errors[0].span.of(text), "off");
    assert_eq!(parse.statements[0].span.of(text), "show groups off main");
    assert_eq!(parse.errors[0].fix.as_ref().map(|fix| fix.span.of(text)), Some("off"));
}

#[test]
fn deep_and_long_expressions_are_refused_not_overrun() {
    for text in [
        format!("derive t.x = {}", "(".repeat(20_000)),
        format!("derive t.x = {}a", "not ".repeat(20_000)),
        format!("derive t.x = {}a", "-".repeat(20_000)),
        format!("derive t.x = a{}", " + a".repeat(20_000)),
        format!("derive t.x = a{}", " ^ a".repeat(20_000)),
        format!("derive t.x = a{}", " in [a]".repeat(20_000)),
        format!("derive t.x = {}", "if a then b else ".repeat(20_000)),
        format!("derive t.x = {}", "log(".repeat(20_000)),
    ] {
        let (_, _, message) = error(&text);
        assert!(message.contains("nested"), "{message}");
    }
    one(&format!("derive t.x = a{}", " + a".repeat(150)));
}
