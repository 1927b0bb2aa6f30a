//! From tokens to a program: evalexpr parses the sanitised text, and its tree
//! is walked in the order of the tokens, so that every step knows its place and
//! a tree that is not what the tokens say is noticed.

use super::program::{Program, Step, Work};
use super::token::{Binary, Sign, Span, Token, Tokens};
use super::{Diagnostic, function};
use evalexpr::{Node, Operator};

/// Compiles tokens into a program.
///
/// # Errors
///
/// A wrong number of arguments, or a tree that does not match the tokens.
pub(super) fn compile(tokens: &Tokens) -> Result<Program, Diagnostic> {
    if let [
        Token {
            sign: Sign::Literal(_),
            ..
        },
    ] = tokens.list.as_slice()
    {
        // The most frequent entry of all needs no parser.
        let mut walk = Walk::new(tokens);
        walk.operand().map_err(|fault| *fault)?;
        return Ok(Program::new(walk.steps, walk.arguments));
    }
    let tree = evalexpr::build_operator_tree(&sanitised(tokens)).map_err(|error| {
        let mut fault = *mismatch();
        fault.message =
            format!("expected an expression, found a text that does not parse: {error}");
        fault
    })?;
    let mut walk = Walk::new(tokens);
    if tree.operator() != &Operator::RootNode {
        return Err(*mismatch());
    }
    walk.only_child(&tree).map_err(|fault| *fault)?;
    if walk.next != tokens.list.len() {
        return Err(*mismatch());
    }
    Ok(Program::new(walk.steps, walk.arguments))
}

/// The text that the parser sees: placeholders for values and functions, and
/// its own spelling of every operator.
fn sanitised(tokens: &Tokens) -> String {
    let mut text = String::with_capacity(tokens.list.len() * 4);
    for token in &tokens.list {
        match token.sign {
            Sign::Literal(_) | Sign::Name(_) | Sign::Constant(_) => text.push_str("v "),
            Sign::Function(_) => text.push_str("f "),
            Sign::Open => text.push_str("( "),
            Sign::Close => text.push_str(") "),
            Sign::Comma => text.push_str(", "),
            Sign::Minus => text.push_str("- "),
            Sign::Not => text.push_str("! "),
            Sign::Binary(operator) => {
                text.push_str(operator.spelling());
                text.push(' ');
            }
        }
    }
    text
}

type Walked = Result<(), Box<Diagnostic>>;

struct Walk<'a> {
    tokens: &'a Tokens,
    /// The token that the next node must be.
    next: usize,
    steps: Vec<Step>,
    /// Where the arguments of all calls stand.
    arguments: Vec<Span>,
}

/// The parser and the tokens disagree, which the token pass should not allow.
fn mismatch() -> Box<Diagnostic> {
    let message = "expected an expression, found a text that is read in two ways";
    Box::new(Diagnostic::new("syntax", message).with_hint("write brackets round its parts"))
}

impl<'a> Walk<'a> {
    fn new(tokens: &'a Tokens) -> Self {
        Self {
            tokens,
            next: 0,
            steps: Vec::with_capacity(tokens.list.len()),
            arguments: Vec::new(),
        }
    }

    fn take(&mut self) -> Result<Token, Box<Diagnostic>> {
        let token = self.tokens.list.get(self.next).copied();
        self.next += 1;
        token.ok_or_else(mismatch)
    }

    fn expect(&mut self, sign: Sign) -> Result<Span, Box<Diagnostic>> {
        let token = self.take()?;
        if token.sign == sign {
            Ok(token.span)
        } else {
            Err(mismatch())
        }
    }

    fn push(&mut self, work: Work, span: Span) {
        self.steps.push(Step { work, span });
    }

    fn only_child(&mut self, node: &Node) -> Walked {
        match node.children() {
            [child] => self.node(child),
            _ => Err(mismatch()),
        }
    }

    fn node(&mut self, node: &Node) -> Walked {
        let operator = match node.operator() {
            Operator::RootNode => {
                let _ = self.expect(Sign::Open)?;
                self.only_child(node)?;
                return self.expect(Sign::Close).map(drop);
            }
            Operator::VariableIdentifierRead { .. } if node.children().is_empty() => {
                return self.operand();
            }
            Operator::FunctionIdentifier { .. } => return self.call(node),
            Operator::Neg => return self.prefix(node, Sign::Minus, Work::Negate),
            Operator::Not => return self.prefix(node, Sign::Not, Work::Not),
            Operator::Add => Binary::Add,
            Operator::Sub => Binary::Subtract,
            Operator::Mul => Binary::Multiply,
            Operator::Div => Binary::Divide,
            Operator::Exp => Binary::Power,
            Operator::Eq => Binary::Equal,
            Operator::Neq => Binary::Unequal,
            Operator::Gt => Binary::Greater,
            Operator::Lt => Binary::Less,
            Operator::Geq => Binary::GreaterOrEqual,
            Operator::Leq => Binary::LessOrEqual,
            Operator::And => Binary::And,
            Operator::Or => Binary::Or,
            _ => return Err(mismatch()),
        };
        let [left, right] = node.children() else {
            return Err(mismatch());
        };
        self.node(left)?;
        let span = self.expect(Sign::Binary(operator))?;
        let before = self.steps.len();
        self.node(right)?;
        // A single literal in K behind a minus is a step, not a temperature.
        let is_step = self.steps.len() == before + 1 && self.steps[before].is_kelvin_literal();
        let work = match operator {
            Binary::Subtract if is_step => Work::Lower,
            _ => Work::Binary(operator),
        };
        self.push(work, span);
        Ok(())
    }

    fn operand(&mut self) -> Walked {
        let token = self.take()?;
        let work = match token.sign {
            Sign::Literal(index) => {
                let quantity = self.tokens.literals[usize::from(index)].literal.quantity();
                Work::Literal {
                    index,
                    dimension: quantity.dimension,
                    sense: quantity.sense,
                }
            }
            Sign::Name(index) => Work::Name(index),
            Sign::Constant(index) => Work::Constant(index),
            _ => return Err(mismatch()),
        };
        self.push(work, token.span);
        Ok(())
    }

    fn prefix(&mut self, node: &Node, sign: Sign, work: Work) -> Walked {
        let span = self.expect(sign)?;
        self.only_child(node)?;
        self.push(work, span);
        Ok(())
    }

    fn call(&mut self, node: &Node) -> Walked {
        let token = self.take()?;
        let Sign::Function(index) = token.sign else {
            return Err(mismatch());
        };
        let [brackets] = node.children() else {
            return Err(mismatch());
        };
        let [inside] = brackets.children() else {
            return Err(mismatch());
        };
        let _ = self.expect(Sign::Open)?;
        let mut arguments = Vec::new();
        if inside.operator() == &Operator::Tuple {
            for (position, element) in inside.children().iter().enumerate() {
                if position > 0 {
                    let _ = self.expect(Sign::Comma)?;
                }
                // Each element stands under a root of its own, without brackets.
                let first = self.next;
                self.only_child(element)?;
                arguments.push(self.passed(first));
            }
        } else {
            let first = self.next;
            self.node(inside)?;
            arguments.push(self.passed(first));
        }
        let count = arguments.len();
        let close = self.expect(Sign::Close)?;
        let function = function::FUNCTIONS[usize::from(index)];
        if !(function.least..=function.most).contains(&count) {
            let needed = match (function.least, function.most) {
                (1, 1) => "1 argument".to_owned(),
                (least, function::MANY) => format!("at least {least} arguments"),
                (least, most) if least == most => format!("{least} arguments"),
                (least, most) => format!("{least} or {most} arguments"),
            };
            let name = function.name;
            let message = format!("expected {needed} for `{name}`, found {count}");
            let start = usize::from(token.span.start);
            return Err(Box::new(
                Diagnostic::new("argument-count", message)
                    .with_hint(format!("write `{}`", function.usage()))
                    .at(start..usize::from(close.end)),
            ));
        }
        // At most as many arguments as an entry has characters.
        let count = count as u16;
        let first = self.arguments.len() as u16;
        self.arguments.append(&mut arguments);
        self.push(
            Work::Call {
                index,
                count,
                first,
            },
            token.span,
        );
        Ok(())
    }

    /// Where the tokens from `first` on stand, of which there is at least one.
    fn passed(&self, first: usize) -> Span {
        let passed = self.tokens.list.get(first..self.next).unwrap_or_default();
        Span {
            start: passed.first().map_or(0, |token| token.span.start),
            end: passed.last().map_or(0, |token| token.span.end),
        }
    }
}
