use super::Place;

/// A value and where it begins.
#[derive(Clone, Debug, PartialEq)]
pub struct Node {
    /// The value.
    pub value: Value,
    /// Its first character.
    pub place: Place,
}

/// A JSON value whose parts know their places.
#[derive(Clone, Debug, PartialEq)]
pub enum Value {
    /// `null`.
    Null,
    /// `true` or `false`.
    Bool(bool),
    /// A finite number, and as it was written.
    Number(f64, String),
    /// A text, without its quotes and escapes.
    Text(String),
    /// A list.
    List(Vec<Node>),
    /// An object: its members in the order of the file, each key once.
    Object(Vec<Member>),
}

/// A key of an object and its value.
#[derive(Clone, Debug, PartialEq)]
pub struct Member {
    /// The key, without its quotes and escapes.
    pub key: String,
    /// The key's opening quote.
    pub key_place: Place,
    /// What it holds.
    pub value: Node,
}

impl Value {
    /// Returns what kind of value this is, for messages: "a text", "a list".
    #[must_use]
    pub fn kind(&self) -> &'static str {
        match self {
            Value::Null => "null",
            Value::Bool(true) => "true",
            Value::Bool(false) => "false",
            Value::Number(..) => "a number",
            Value::Text(_) => "a text",
            Value::List(_) => "a list",
            Value::Object(_) => "an object",
        }
    }
}

impl Node {
    /// Returns the text, if it is one.
    #[must_use]
    pub fn as_text(&self) -> Option<&str> {
        match &self.value {
            Value::Text(text) => Some(text),
            _ => None,
        }
    }

    /// Returns the number, if it is one.
    #[must_use]
    pub fn as_number(&self) -> Option<f64> {
        match &self.value {
            Value::Number(number, _) => Some(*number),
            _ => None,
        }
    }

    /// Returns the elements, if it is a list.
    #[must_use]
    pub fn as_list(&self) -> Option<&[Node]> {
        match &self.value {
            Value::List(nodes) => Some(nodes),
            _ => None,
        }
    }

    /// Returns the members, if it is an object.
    #[must_use]
    pub fn as_object(&self) -> Option<&[Member]> {
        match &self.value {
            Value::Object(members) => Some(members),
            _ => None,
        }
    }

    /// Returns what the key holds, if this is an object that has it.
    #[must_use]
    pub fn get(&self, key: &str) -> Option<&Node> {
        let mut members = self.as_object()?.iter();
        members
            .find(|member| member.key == key)
            .map(|member| &member.value)
    }

    /// Returns the same value without places, for writing and for the digest.
    ///
    /// Whole numbers stay whole up to 2⁵³, where every one of them is a
    /// floating point number.
    #[must_use]
    pub fn to_value(&self) -> serde_json::Value {
        use serde_json::Value as Plain;
        match &self.value {
            Value::Null => Plain::Null,
            Value::Bool(truth) => Plain::Bool(*truth),
            Value::Number(number, written) => {
                const EXACT: i64 = 1 << 53;
                match written.parse::<i64>() {
                    Ok(whole) if (-EXACT..=EXACT).contains(&whole) && written != "-0" => {
                        Plain::from(whole)
                    }
                    _ => Plain::from(*number),
                }
            }
            Value::Text(text) => Plain::String(text.clone()),
            Value::List(nodes) => nodes.iter().map(Node::to_value).collect(),
            Value::Object(members) => Plain::Object(
                members
                    .iter()
                    .map(|member| (member.key.clone(), member.value.to_value()))
                    .collect(),
            ),
        }
    }
}
