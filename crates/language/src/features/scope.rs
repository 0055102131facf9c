//! The names of a document: which statement defines which.

use crate::ast::{Compare, Derive, Statement, StatementKind};
use crate::document::{Document, Form};
use crate::model::{Located, Model, Redefinition};
use crate::span::{Name, SourceId};

/// A document and its model.
pub(super) struct Scope<'d> {
    document: &'d Document,
    model: Model,
}

/// What a statement defines.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Defines {
    Table,
    Comparison,
}

impl<'d> Scope<'d> {
    pub(super) fn of(document: &'d Document) -> Self {
        Self { document, model: Model::new(document, redefinition(document)) }
    }

    /// The model.
    pub(super) fn model(&self) -> &Model {
        &self.model
    }

    /// Whether a later definition of a name replaces an earlier one.
    pub(super) fn newest_wins(&self) -> bool {
        redefinition(self.document) == Redefinition::NewestWins
    }

    /// Every statement of a source, in the order of the text.
    pub(super) fn statements(&self, source: SourceId) -> impl Iterator<Item = &Located<Statement>> {
        self.model.statements.iter().filter(move |statement| statement.location.source == source)
    }

    /// The text of a statement.
    pub(super) fn text<T>(&self, statement: &Located<T>) -> &'d str {
        let location = statement.location;
        location.span.of(self.document.text(location.source))
    }

    /// The names that are defined, in the order of the document, each once.
    pub(super) fn names(&self, wanted: Defines) -> Vec<String> {
        let mut names: Vec<String> = Vec::new();
        for statement in &self.model.statements {
            if let Some((defines, name)) = self.definition_by(statement)
                && defines == wanted
                && !names.contains(&name.value)
            {
                names.push(name.value.clone());
            }
        }
        names
    }

    /// The text of the definition of a name that counts, or of a half-typed one.
    pub(super) fn definition(&self, wanted: Defines, name: &str) -> Option<&'d str> {
        let whole = match wanted {
            Defines::Table => self.model.tables.get(name).map(|table| self.text(&table.base)),
            Defines::Comparison => self.model.comparisons.get(name).map(|one| self.text(one)),
        };
        let broken = || {
            let defining = self.model.statements.iter().find(|statement| {
                self.definition_by(statement)
                    .is_some_and(|(defines, defined)| defines == wanted && defined.value == name)
            });
            defining.map(|statement| self.text(statement))
        };
        whole.or_else(broken)
    }

    /// The comparison of a name.
    pub(super) fn comparison(&self, name: &str) -> Option<&Compare> {
        self.model.comparisons.get(name).map(|comparison| &comparison.value)
    }

    /// The columns that the document derives in a table.
    pub(super) fn derived(&self, table: &str) -> &[Located<Derive>] {
        self.model.tables.get(table).map_or(&[], |table| table.derived.as_slice())
    }

    /// What a statement defines, and under which name.
    pub(super) fn definition_by<'s>(
        &self,
        statement: &'s Located<Statement>,
    ) -> Option<(Defines, &'s Name)> {
        match &statement.value.kind {
            StatementKind::Read(read) => Some((Defines::Table, &read.name)),
            StatementKind::Admit(admit) => Some((Defines::Table, &admit.name)),
            StatementKind::Compare(compare) => Some((Defines::Comparison, &compare.name)),
            StatementKind::Broken { defines } => {
                let verb = self.text(statement).split_whitespace().next();
                let what =
                    if verb == Some("compare") { Defines::Comparison } else { Defines::Table };
                defines.as_ref().map(|name| (what, name))
            }
            StatementKind::Derive(_)
            | StatementKind::Levels(_)
            | StatementKind::Label(_)
            | StatementKind::Policy(_)
            | StatementKind::Show(_)
            | StatementKind::Write(_)
            | StatementKind::Pin(_) => None,
        }
    }
}

fn redefinition(document: &Document) -> Redefinition {
    match document.form {
        Form::Notebook => Redefinition::NewestWins,
        Form::Script | Form::Markdown => Redefinition::Error,
    }
}
