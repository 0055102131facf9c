//! Expressions, from the tree to their typed form.

use super::{Lowering, text, tokens};
use crate::ast::{Expression, ExpressionKind, Operator};
use crate::syntax::{SyntaxKind, SyntaxNode};

/// Whether a node of this kind is an expression.
pub(super) fn is_expression(kind: SyntaxKind) -> bool {
    matches!(
        kind,
        SyntaxKind::NumberLiteral
            | SyntaxKind::TextLiteral
            | SyntaxKind::NameReference
            | SyntaxKind::Negation
            | SyntaxKind::Denial
            | SyntaxKind::Binary
            | SyntaxKind::Membership
            | SyntaxKind::Conditional
            | SyntaxKind::Call
            | SyntaxKind::Parenthesized
    )
}

/// The typed form of an expression without syntax errors; none, and an error, where a number or an
/// escape means nothing.
#[expect(clippy::wildcard_enum_match_arm, reason = "nodes of other kinds are no expressions")]
pub(super) fn lower(statement: &mut Lowering<'_>, node: &SyntaxNode) -> Option<Expression> {
    let span = statement.span_of(node);
    if node.kind() == SyntaxKind::Parenthesized {
        return Some(Expression { span, ..lower(statement, &operands(node).next()?)? });
    }
    let mut operand = {
        let mut operands = operands(node);
        move |statement: &mut Lowering<'_>| {
            operands.next().and_then(|operand| lower(statement, &operand))
        }
    };
    let kind = match node.kind() {
        SyntaxKind::NumberLiteral => {
            ExpressionKind::Number(statement.number_from(tokens(node).next()?.text(), span)?)
        }
        SyntaxKind::TextLiteral => {
            let token = tokens(node).next()?;
            ExpressionKind::Text(
                text::Cooked::new(token.text(), span.start, statement.errors)?.text,
            )
        }
        SyntaxKind::NameReference => {
            ExpressionKind::Name(text::bare_name(tokens(node).next()?.text()).to_owned())
        }
        SyntaxKind::Negation => ExpressionKind::Negate(Box::new(operand(statement)?)),
        SyntaxKind::Denial => ExpressionKind::Not(Box::new(operand(statement)?)),
        SyntaxKind::Binary => {
            let left = Box::new(operand(statement)?);
            let right = Box::new(operand(statement)?);
            ExpressionKind::Binary { left, operator: operator(node)?, right }
        }
        SyntaxKind::Membership => {
            let value = Box::new(operand(statement)?);
            let list = node.children().find(|node| node.kind() == SyntaxKind::List)?;
            let list =
                operands(&list).map(|item| lower(statement, &item)).collect::<Option<Vec<_>>>()?;
            let negated = super::words(node).first().is_some_and(|word| word == "not");
            ExpressionKind::In { value, list, negated }
        }
        SyntaxKind::Conditional => {
            let condition = Box::new(operand(statement)?);
            let then = Box::new(operand(statement)?);
            let otherwise = Box::new(operand(statement)?);
            ExpressionKind::If { condition, then, otherwise }
        }
        SyntaxKind::Call => {
            let function = statement.name(node, SyntaxKind::FunctionName)?;
            let arguments =
                operands(node).map(|item| lower(statement, &item)).collect::<Option<Vec<_>>>()?;
            ExpressionKind::Call { function, arguments }
        }
        _ => return None,
    };
    Some(Expression { span, kind })
}

fn operands(node: &SyntaxNode) -> impl Iterator<Item = SyntaxNode> + use<> {
    node.children().filter(|node| is_expression(node.kind()))
}

fn operator(node: &SyntaxNode) -> Option<Operator> {
    let token = node
        .children_with_tokens()
        .filter_map(rowan::NodeOrToken::into_token)
        .find(|token| !token.kind().is_trivia())?;
    Some(match token.text() {
        "+" => Operator::Add,
        "-" => Operator::Subtract,
        "*" => Operator::Multiply,
        "/" => Operator::Divide,
        "^" => Operator::Power,
        "=" => Operator::Equal,
        "!=" => Operator::Unequal,
        "<" => Operator::Less,
        "<=" => Operator::LessOrEqual,
        ">" => Operator::Greater,
        ">=" => Operator::GreaterOrEqual,
        "and" => Operator::And,
        "or" => Operator::Or,
        _ => return None,
    })
}
