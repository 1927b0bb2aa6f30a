//! Expressions bind as in a textbook: an expression written from a random tree
//! with the fewest brackets comes to what the tree comes to, worked out here
//! by itself.

use farglow::entry::{Entry, Outcome};
use farglow::units::{Dimension, Quantity};
use proptest::prelude::*;

#[derive(Clone, Debug)]
enum Tree {
    Number(u32),
    Name(usize),
    Minus(Box<Tree>),
    Root(Box<Tree>),
    Greatest(Vec<Tree>),
    Pair(char, Box<Tree>, Box<Tree>),
}

const NAMES: [(&str, f64); 3] = [("x", 3.0), ("door.width", 0.75), ("a.b.c", -2.0)];

impl Tree {
    fn value(&self) -> f64 {
        match self {
            Self::Number(number) => f64::from(*number) / 4.0,
            Self::Name(index) => NAMES[*index].1,
            Self::Minus(inner) => -inner.value(),
            Self::Root(inner) => inner.value().abs().sqrt(),
            Self::Greatest(list) => list.iter().map(Self::value).fold(f64::MIN, f64::max),
            Self::Pair(sign, left, right) => {
                let (left, right) = (left.value(), right.value());
                match sign {
                    '+' => left + right,
                    '-' => left - right,
                    '*' => left * right,
                    '/' => left / right,
                    _ if right == 2.0 => left * left,
                    _ => left.powf(right),
                }
            }
        }
    }

    /// How tightly the outermost sign binds.
    fn strength(&self) -> u8 {
        match self {
            Self::Pair('+' | '-', ..) => 1,
            Self::Pair('*' | '/', ..) => 2,
            Self::Minus(_) => 3,
            Self::Pair(..) => 4,
            _ => 5,
        }
    }

    fn within(&self, least: u8) -> String {
        if self.strength() < least {
            format!("({})", self.text())
        } else {
            self.text()
        }
    }

    fn text(&self) -> String {
        match self {
            Self::Number(number) => format!("{}", f64::from(*number) / 4.0),
            Self::Name(index) => NAMES[*index].0.to_owned(),
            Self::Minus(inner) => format!("-{}", inner.within(4)),
            Self::Root(inner) => format!("sqrt(abs({}))", inner.text()),
            Self::Greatest(list) => {
                let list: Vec<String> = list.iter().map(Self::text).collect();
                format!("max({})", list.join(", "))
            }
            Self::Pair(sign @ ('+' | '-'), left, right) => {
                format!("{} {sign} {}", left.within(1), right.within(2))
            }
            Self::Pair(sign @ ('*' | '/'), left, right) => {
                format!("{}{sign}{}", left.within(2), right.within(3))
            }
            // A chain of powers is refused on either side.
            Self::Pair(sign, left, right) => {
                let right = match right.as_ref() {
                    Self::Minus(inner) => format!("-{}", inner.within(5)),
                    other => other.within(5),
                };
                format!("{}{sign}{right}", left.within(5))
            }
        }
    }
}

fn tree() -> impl Strategy<Value = Tree> {
    let leaf = prop_oneof![
        (0_u32..40).prop_map(Tree::Number),
        (0_usize..3).prop_map(Tree::Name)
    ];
    leaf.prop_recursive(6, 40, 3, |inner| {
        let pair = (prop::sample::select(vec!['+', '-', '*', '/', '^']), inner.clone(), inner.clone());
        prop_oneof![
            4 => pair.prop_map(|(sign, left, right)| Tree::Pair(sign, Box::new(left), Box::new(right))),
            1 => inner.clone().prop_map(|tree| Tree::Minus(Box::new(tree))),
            1 => inner.clone().prop_map(|tree| Tree::Root(Box::new(tree))),
            1 => prop::collection::vec(inner, 2..4).prop_map(Tree::Greatest),
        ]
    })
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 3_000, ..ProptestConfig::default() })]

    #[test]
    fn signs_bind_as_in_a_textbook(tree in tree()) {
        let text = tree.text();
        prop_assume!(text.len() <= 1_000);
        let entry = match Entry::parse(&text) {
            Ok(entry) => entry,
            Err(faults) => return Err(TestCaseError::fail(format!("{text}: {faults:?}"))),
        };
        let value = |text: String| NAMES.iter().find(|(name, _)| *name == text).map_or(0.0, |n| n.1);
        let names: Vec<Quantity> = entry
            .names()
            .iter()
            .map(|used| [std::slice::from_ref(&used.cell), &used.member].concat().join("."))
            .map(|name| Quantity::number(value(name)))
            .collect();
        let expected = tree.value();
        match entry.evaluate(&names, entry.nominal_literals()) {
            Ok(Outcome::Quantity(found)) => {
                prop_assert_eq!(found.dimension, Dimension::NONE);
                let close = (found.si - expected).abs() <= 1e-12 * expected.abs();
                prop_assert!(close, "{}: {} against {}", text, found.si, expected);
            }
            Ok(Outcome::Truth(_)) => return Err(TestCaseError::fail(text)),
            // An inner infinity may vanish again in the tree, as in 1 / (1 / 0).
            Err(fault) => {
                let codes = ["not-finite", "division-by-zero", "negative-root"];
                prop_assert!(codes.contains(&fault.code), "{}: {}", text, fault);
            }
        }
    }
}
