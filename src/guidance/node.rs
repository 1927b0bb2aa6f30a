//! A JSON value with its place.

/// One value with its place, when that is known.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Node {
    pub(super) value: Value,
    pub(super) place: Option<Place>,
}

#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Place {
    pub(super) line: usize,
    pub(super) column: usize,
}

#[derive(Clone, Debug, PartialEq)]
pub(super) enum Value {
    Text(String),
    List(Vec<Node>),
    Object(Vec<Member>),
    Other,
}

#[derive(Clone, Debug, PartialEq)]
pub(super) struct Member {
    pub(super) key: String,
    pub(super) key_place: Option<Place>,
    pub(super) value: Node,
}

pub(super) fn parse(bytes: &[u8]) -> Result<Node, (Option<Place>, String)> {
    fn node(value: serde_json::Value) -> Node {
        let value = match value {
            serde_json::Value::String(text) => Value::Text(text),
            serde_json::Value::Array(list) => Value::List(list.into_iter().map(node).collect()),
            serde_json::Value::Object(map) => Value::Object(
                map.into_iter()
                    .map(|(key, value)| Member {
                        key,
                        key_place: None,
                        value: node(value),
                    })
                    .collect(),
            ),
            _ => Value::Other,
        };
        Node { value, place: None }
    }
    serde_json::from_slice(bytes).map(node).map_err(|error| {
        let place = Place {
            line: error.line(),
            column: error.column(),
        };
        (Some(place), error.to_string())
    })
}
