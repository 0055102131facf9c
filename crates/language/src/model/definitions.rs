//! Which definition of each name counts.

use std::collections::BTreeMap;

use super::{Located, Model, Redefinition, TableBase, TableDefinition};
use crate::ast::{ColumnPath, Statement, StatementKind};
use crate::diagnostic::Diagnostic;
use crate::span::Location;

/// What a definition gives a meaning to. Tables and comparisons share one space of names.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord)]
enum Key {
    Name(String),
    Derived { table: String, column: String },
    Levels { table: String, column: String },
    Label { table: String, column: String },
    Policy,
}

/// A definition: the statement, and where the name stands in it.
#[derive(Clone, Copy)]
struct Definition {
    statement: usize,
    name: Location,
}

/// Fills the model's tables, comparisons and policy, and reports what is defined twice.
pub(super) fn resolve(model: &mut Model, redefinition: Redefinition) {
    let mut counting: BTreeMap<Key, Definition> = BTreeMap::new();
    for (index, statement) in model.statements.iter().enumerate() {
        let Some(key) = key(&statement.value) else { continue };
        let definition = Definition { statement: index, name: name(statement) };
        match counting.get(&key) {
            Some(earlier) if !replaces(definition, *earlier, redefinition) => {
                model.diagnostics.push(duplicate(&key, definition.name, earlier.name));
            }
            _ => {
                counting.insert(key, definition);
            }
        }
    }
    let mut counting: Vec<usize> = counting.values().map(|one| one.statement).collect();
    counting.sort_unstable();
    let statements: Vec<Located<Statement>> =
        counting.into_iter().filter_map(|index| model.statements.get(index).cloned()).collect();
    for statement in &statements {
        define(model, statement);
    }
    for statement in statements {
        describe(model, statement);
    }
}

fn replaces(later: Definition, earlier: Definition, redefinition: Redefinition) -> bool {
    redefinition == Redefinition::NewestWins && later.name.source != earlier.name.source
}

fn key(statement: &Statement) -> Option<Key> {
    let column = |path: &ColumnPath| (path.table.value.clone(), path.column.value.clone());
    Some(match &statement.kind {
        StatementKind::Read(read) => Key::Name(read.name.value.clone()),
        StatementKind::Admit(admit) => Key::Name(admit.name.value.clone()),
        StatementKind::Compare(compare) => Key::Name(compare.name.value.clone()),
        StatementKind::Derive(derive) => {
            let (table, column) = column(&derive.column);
            Key::Derived { table, column }
        }
        StatementKind::Levels(levels) => {
            let (table, column) = column(&levels.column);
            Key::Levels { table, column }
        }
        StatementKind::Label(label) => {
            let (table, column) = column(&label.column);
            Key::Label { table, column }
        }
        StatementKind::Policy(_) => Key::Policy,
        StatementKind::Show(_)
        | StatementKind::Write(_)
        | StatementKind::Pin(_)
        | StatementKind::Broken { .. } => return None,
    })
}

/// The place of the name that a statement defines, or of the whole statement where it has none.
fn name(statement: &Located<Statement>) -> Location {
    let span = match &statement.value.kind {
        StatementKind::Read(read) => read.name.span,
        StatementKind::Admit(admit) => admit.name.span,
        StatementKind::Compare(compare) => compare.name.span,
        StatementKind::Derive(derive) => derive.column.column.span,
        StatementKind::Levels(levels) => levels.column.column.span,
        StatementKind::Label(label) => label.column.column.span,
        StatementKind::Policy(_)
        | StatementKind::Show(_)
        | StatementKind::Write(_)
        | StatementKind::Pin(_)
        | StatementKind::Broken { .. } => statement.location.span,
    };
    Location { span, ..statement.location }
}

fn duplicate(key: &Key, later: Location, earlier: Location) -> Diagnostic {
    let (message, help) = match key {
        Key::Name(name) => (
            format!("`{name}` is defined a second time"),
            "a name has one meaning in a document: give one of the two another name",
        ),
        Key::Derived { table, column } => (
            format!("`{table}.{column}` is derived a second time"),
            "give one of the two columns another name",
        ),
        Key::Levels { table, column } => (
            format!("the levels of `{table}.{column}` are stated a second time"),
            "put orders and mergings of one column into one statement",
        ),
        Key::Label { table, column } => {
            (format!("`{table}.{column}` is labelled a second time"), "keep one of the two labels")
        }
        Key::Policy => (
            "the policy is stated a second time".to_owned(),
            "state every setting in one `policy` statement",
        ),
    };
    Diagnostic::error("duplicate-definition", later, message)
        .help(help)
        .related(earlier, "it is defined here first")
}

/// Enters tables, comparisons and the policy.
fn define(model: &mut Model, statement: &Located<Statement>) {
    let location = statement.location;
    match &statement.value.kind {
        StatementKind::Read(read) => {
            let base = Located { value: TableBase::Read(read.clone()), location };
            model.tables.insert(read.name.value.clone(), table(base));
        }
        StatementKind::Admit(admit) => {
            let base = Located { value: TableBase::Admit(admit.clone()), location };
            model.tables.insert(admit.name.value.clone(), table(base));
        }
        StatementKind::Compare(compare) => {
            let comparison = Located { value: compare.clone(), location };
            model.comparisons.insert(compare.name.value.clone(), comparison);
        }
        StatementKind::Policy(policy) => {
            model.policy = Some(Located { value: policy.clone(), location });
        }
        StatementKind::Derive(_)
        | StatementKind::Levels(_)
        | StatementKind::Label(_)
        | StatementKind::Show(_)
        | StatementKind::Write(_)
        | StatementKind::Pin(_)
        | StatementKind::Broken { .. } => {}
    }
}

fn table(base: Located<TableBase>) -> TableDefinition {
    TableDefinition { base, derived: Vec::new(), levels: Vec::new(), labels: Vec::new() }
}

/// Enters what is said about the columns of tables that are defined.
fn describe(model: &mut Model, statement: Located<Statement>) {
    let location = statement.location;
    match statement.value.kind {
        StatementKind::Derive(value) => {
            if let Some(table) = model.tables.get_mut(&value.column.table.value) {
                table.derived.push(Located { value, location });
            }
        }
        StatementKind::Levels(value) => {
            if let Some(table) = model.tables.get_mut(&value.column.table.value) {
                table.levels.push(Located { value, location });
            }
        }
        StatementKind::Label(value) => {
            if let Some(table) = model.tables.get_mut(&value.column.table.value) {
                table.labels.push(Located { value, location });
            }
        }
        StatementKind::Read(_)
        | StatementKind::Admit(_)
        | StatementKind::Compare(_)
        | StatementKind::Policy(_)
        | StatementKind::Show(_)
        | StatementKind::Write(_)
        | StatementKind::Pin(_)
        | StatementKind::Broken { .. } => {}
    }
}
