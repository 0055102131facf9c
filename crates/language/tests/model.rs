//! What a model holds, whatever the order of the text.

use tussock_language::diagnostic::Diagnostic;
use tussock_language::document::{Document, Source};
use tussock_language::model::{Content, Model, QuestionKind, Redefinition, TableBase};
use tussock_language::span::{Location, SourceId, Span};

fn script(text: &str) -> Model {
    Model::new(&Document::script(text), Redefinition::Error)
}

fn notebook(cells: &[&str], redefinition: Redefinition) -> Model {
    let cells = cells.iter().map(|cell| Source::code(*cell)).collect();
    Model::new(&Document::notebook_cells(cells), redefinition)
}

#[track_caller]
fn rules(model: &Model) -> Vec<&'static str> {
    model.diagnostics.iter().map(|diagnostic| diagnostic.rule).collect()
}

const PROGRAM: &str = "show groups of main\n\
    compare mood, gain across roster in served as main\n\
    label crew.mood \"Mood\"\n\
    derive crew.gain = post - pre\n\
    admit crew where watches >= 8 as served because \"at least eight\"\n\
    levels crew.roster fixed, forward\n\
    read sample ferry as crew\n\
    policy alpha .01\n\
    pin main.omnibus.pillai.value at .3\n";

#[test]
fn the_order_of_definitions_does_not_matter() {
    let model = script(PROGRAM);
    assert_eq!(rules(&model), Vec::<&str>::new());
    let crew = model.tables.get("crew").expect("it is defined");
    assert!(matches!(crew.base.value, TableBase::Read(_)));
    assert_eq!((crew.derived.len(), crew.levels.len(), crew.labels.len()), (1, 1, 1));
    let served = model.tables.get("served").expect("it is defined");
    assert!(matches!(&served.base.value, TableBase::Admit(admit) if admit.parent.value == "crew"));
    assert_eq!(model.comparisons["main"].value.table.value, "served");
    assert_eq!(model.settings().alpha.expect("it is stated").value, 0.01);

    let reversed: Vec<&str> = PROGRAM.lines().rev().collect();
    let other = script(&reversed.join("\n"));
    assert_eq!(other.tables.keys().collect::<Vec<_>>(), model.tables.keys().collect::<Vec<_>>());
    assert_eq!(other.questions.len(), model.questions.len());
}

#[test]
fn questions_come_in_reading_order_with_live_values_of_the_prose() {
    let text = "Before {{main.omnibus.pillai}}.\n\n```tussock\nshow groups of main\n```\n\nAfter \
                {{main.omnibus.wilks}} and {{broken.}}.\n";
    let model = Model::new(&Document::markdown(text), Redefinition::Error);
    let kinds: Vec<_> = model
        .questions
        .iter()
        .map(|question| match &question.kind {
            QuestionKind::ProseValue(value) => value.path.span.of(text),
            QuestionKind::Show(show) => show.view.value.as_str(),
            QuestionKind::Write(_) | QuestionKind::Pin(_) => "other",
        })
        .collect();
    assert_eq!(kinds, ["main.omnibus.pillai", "groups", "main.omnibus.wilks"]);
    assert_eq!(rules(&model), ["syntax"]);
    assert_eq!(model.diagnostics[0].location.span.of(text), "{{broken.}}");
    assert_eq!(model.regions.len(), 3);
    let Content::Code(parse) = &model.regions[1].content else { panic!("the fence is code") };
    assert_eq!(parse.region.of(text), "show groups of main\n");
}

#[test]
fn a_second_definition_names_both_places() {
    let text = "read \"a.csv\" as crew\ncompare a across f in crew as crew\n";
    let model = script(text);
    let [Diagnostic { rule: "duplicate-definition", location, related, .. }] =
        model.diagnostics.as_slice()
    else {
        panic!("{:?}", model.diagnostics)
    };
    assert_eq!(location.span, Span::new(51, 55));
    assert_eq!(related[0].location.span, Span::new(16, 20));
    assert!(model.tables.contains_key("crew") && model.comparisons.is_empty());
}

#[test]
fn every_kind_of_definition_may_stand_once() {
    for (text, count) in [
        ("policy alpha .01\npolicy pairs holm", 1),
        ("derive t.x = 1\nderive t.x = 2\nderive u.x = 3", 1),
        ("levels t.f a, b\nlevels t.f merging \"x\" into a", 1),
        ("label t.x \"X\"\nlabel t.x \"Y\"\nlabel t.y \"X\"", 1),
        ("admit t where a as u because \"x\"\nread \"u.csv\" as u\nread \"v.csv\" as u", 2),
        ("show groups of m\nshow groups of m", 0),
    ] {
        assert_eq!(rules(&script(text)), vec!["duplicate-definition"; count], "{text}");
    }
}

#[test]
fn in_a_kernel_the_newest_cell_wins() {
    let cells = [
        "read \"a.csv\" as crew\nderive crew.x = 1",
        "read \"b.csv\" as crew\nderive crew.x = 2\npolicy alpha .01",
        "policy alpha .02\nread \"c.csv\" as other\nread \"d.csv\" as other",
    ];
    let model = notebook(&cells, Redefinition::NewestWins);
    assert_eq!(rules(&model), ["duplicate-definition"]);
    assert_eq!(model.diagnostics[0].location.source, SourceId(2));
    let crew = &model.tables["crew"];
    assert_eq!(crew.base.location.source, SourceId(1));
    assert_eq!(crew.derived.len(), 1);
    assert_eq!(crew.derived[0].location.source, SourceId(1));
    assert_eq!(model.settings().alpha.expect("it is stated").value, 0.02);

    let model = notebook(&cells, Redefinition::Error);
    assert_eq!(rules(&model), ["duplicate-definition"; 4]);
    assert_eq!(model.tables["crew"].base.location.source, SourceId(0));
}

#[test]
fn a_name_may_turn_from_table_to_comparison() {
    let cells = ["read \"a.csv\" as it", "compare a across f in t as it"];
    let model = notebook(&cells, Redefinition::NewestWins);
    assert!(model.tables.is_empty() && model.comparisons.contains_key("it"));
}

#[test]
fn cycles_are_reported_once_with_every_place() {
    for (text, message) in [
        ("derive t.a = a + 1\nread \"t.csv\" as t", "the column `a` is defined by itself"),
        (
            "read \"t.csv\" as t\nderive t.a = b\nderive t.b = log(c)\nderive t.c = 1 - a\n\
             derive t.d = a",
            "the column `a` rests on `b`, which rests on `c`, which rests on `a`",
        ),
        (
            "admit b where x as a because \"r\"\nadmit a where x as b because \"r\"\n\
             admit a where x as c because \"r\"",
            "the table `a` rests on `b`, which rests on `a`",
        ),
        ("admit a where x as a because \"r\"", "the table `a` is defined by itself"),
    ] {
        let model = script(text);
        let messages: Vec<_> = model.diagnostics.iter().map(|one| one.message.as_str()).collect();
        assert_eq!(messages, [message], "{text}");
    }
    let fine = "read \"t.csv\" as t\nderive t.a = if f in [b] then 1 else 0\nderive t.b = a";
    assert_eq!(rules(&script(fine)), Vec::<&str>::new());
}

#[test]
fn a_broken_definition_is_no_unknown_name() {
    let model = script("compare a, across f in t as main\nshow groups of main");
    assert!(model.broken.contains("main"));
    assert_eq!(rules(&model), ["syntax"]);
}

#[test]
fn an_allowance_holds_for_its_statement_only() {
    let text = "# allow few-rows: a pilot\nshow groups of main\nshow flow of main";
    let model = script(text);
    let at = |start, end| Location { source: SourceId(0), span: Span::new(start, end) };
    let allowance = model.allowance("few-rows", at(26, 30)).expect("it is allowed");
    assert_eq!(allowance.reason, "a pilot");
    assert!(model.allowance("few-rows", at(46, 50)).is_none());
    assert!(model.allowance("big-gap", at(26, 30)).is_none());
    let warning = |place| Diagnostic::warning("few-rows", place, "few rows");
    let error = Diagnostic::error("few-rows", at(26, 30), "no rows");
    let kept = model.without_allowed(vec![warning(at(26, 45)), warning(at(46, 50)), error.clone()]);
    assert_eq!(kept, [warning(at(46, 50)), error]);
}
