//! Definitions that rest on themselves.

use std::collections::{BTreeMap, BTreeSet};

use super::{Model, TableBase, TableDefinition};
use crate::ast::{Expression, ExpressionKind};
use crate::diagnostic::Diagnostic;
use crate::span::Location;

/// Reports every cycle among tables and among the derived columns of a table, once.
pub(super) fn report(model: &mut Model) {
    let mut found = cycles(&table_graph(model))
        .into_iter()
        .map(|cycle| diagnostic(&cycle, "table"))
        .collect::<Vec<_>>();
    for table in model.tables.values() {
        let cycles = cycles(&column_graph(table));
        found.extend(cycles.iter().map(|cycle| diagnostic(cycle, "column")));
    }
    model.diagnostics.append(&mut found);
}

/// A definition in a graph of definitions.
#[derive(Clone)]
struct Node {
    name: String,
    /// Where its name is defined.
    location: Location,
    /// The names that it rests on.
    rests_on: Vec<String>,
}

fn table_graph(model: &Model) -> Vec<Node> {
    let node = |(name, table): (&String, &TableDefinition)| match &table.base.value {
        TableBase::Read(_) => None,
        TableBase::Admit(admit) => Some(Node {
            name: name.clone(),
            location: Location { span: admit.name.span, ..table.base.location },
            rests_on: vec![admit.parent.value.clone()],
        }),
    };
    model.tables.iter().filter_map(node).collect()
}

fn column_graph(table: &TableDefinition) -> Vec<Node> {
    let nodes = table.derived.iter().map(|derive| {
        let mut rests_on = BTreeSet::new();
        names(&derive.value.expression, &mut rests_on);
        Node {
            name: derive.value.column.column.value.clone(),
            location: Location { span: derive.value.column.column.span, ..derive.location },
            rests_on: rests_on.into_iter().collect(),
        }
    });
    nodes.collect()
}

/// Every name in an expression. A level that has the name of a column counts as that column: which
/// of the two it is, only the data can tell, and a definition that may rest on itself is no good.
fn names(expression: &Expression, found: &mut BTreeSet<String>) {
    match &expression.kind {
        ExpressionKind::Number(_) | ExpressionKind::Text(_) => {}
        ExpressionKind::Name(name) => {
            found.insert(name.clone());
        }
        ExpressionKind::Negate(inner) | ExpressionKind::Not(inner) => names(inner, found),
        ExpressionKind::Binary { left, right, .. } => {
            names(left, found);
            names(right, found);
        }
        ExpressionKind::If { condition, then, otherwise } => {
            names(condition, found);
            names(then, found);
            names(otherwise, found);
        }
        // The list holds levels, never columns.
        ExpressionKind::In { value, .. } => names(value, found),
        ExpressionKind::Call { arguments, .. } => {
            for argument in arguments {
                names(argument, found);
            }
        }
    }
}

/// Each cycle as the nodes on it, from the one that is defined first.
fn cycles(nodes: &[Node]) -> Vec<Vec<Node>> {
    let by_name: BTreeMap<&str, &Node> =
        nodes.iter().map(|node| (node.name.as_str(), node)).collect();
    let mut order: Vec<&Node> = nodes.iter().collect();
    order.sort_by_key(|node| node.location);
    let mut done: BTreeSet<&str> = BTreeSet::new();
    let mut cycles = Vec::new();
    for node in order {
        if done.contains(node.name.as_str()) {
            continue;
        }
        if let Some(cycle) = way_back(node, &by_name) {
            done.extend(cycle.iter().map(|node| node.name.as_str()));
            cycles.push(cycle.into_iter().cloned().collect());
        }
    }
    cycles
}

/// The shortest way from a node back to itself.
fn way_back<'n>(start: &'n Node, by_name: &BTreeMap<&str, &'n Node>) -> Option<Vec<&'n Node>> {
    let mut came_from: BTreeMap<&str, &Node> = BTreeMap::new();
    let mut front = vec![start];
    while !front.is_empty() {
        let mut next = Vec::new();
        for node in front {
            for name in &node.rests_on {
                if *name == start.name {
                    let mut way = vec![node];
                    let mut last = node;
                    while last.name != start.name
                        && let Some(before) = came_from.get(last.name.as_str()).copied()
                    {
                        way.push(before);
                        last = before;
                    }
                    way.reverse();
                    return Some(way);
                }
                if let Some(other) = by_name.get(name.as_str()).copied()
                    && !came_from.contains_key(other.name.as_str())
                {
                    came_from.insert(other.name.as_str(), node);
                    next.push(other);
                }
            }
        }
        front = next;
    }
    None
}

fn diagnostic(cycle: &[Node], what: &str) -> Diagnostic {
    let names: Vec<String> = cycle.iter().map(|node| format!("`{}`", node.name)).collect();
    let (Some(first), Some(first_name)) = (cycle.first(), names.first()) else {
        return Diagnostic::error("cycle", Location::default(), "a definition rests on itself");
    };
    let rest = names.iter().skip(1).chain([first_name]).map(String::as_str);
    let way = rest.collect::<Vec<_>>().join(", which rests on ");
    let message = match cycle.len() {
        1 => format!("the {what} {first_name} is defined by itself"),
        _ => format!("the {what} {first_name} rests on {way}"),
    };
    let help = match what {
        "column" => "give the new column a name of its own",
        _ => "let one of the tables come from a file or from another table",
    };
    cycle.iter().skip(1).fold(
        Diagnostic::error("cycle", first.location, message).help(help),
        |diagnostic, node| {
            diagnostic.related(node.location, format!("`{}` is defined here", node.name))
        },
    )
}
