use std::fmt;

/// A place in a text: line and column in characters, both from 1, and the
/// offset in bytes, from 0.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Debug)]
pub struct Place {
    /// The offset in bytes, from 0.
    pub offset: usize,
    /// The line, from 1.
    pub line: usize,
    /// The column in characters, from 1.
    pub column: usize,
}

impl Place {
    /// The first character of a text.
    pub const START: Place = Place {
        offset: 0,
        line: 1,
        column: 1,
    };

    /// Returns the place of an offset; `self` is any place before it.
    ///
    /// An offset past the end or inside a character counts as the next one that
    /// is neither.
    pub(super) fn advanced(self, text: &[u8], offset: usize) -> Place {
        let mut place = self;
        while place.offset < offset {
            let Some(&byte) = text.get(place.offset) else {
                break;
            };
            place.offset += 1;
            if byte == b'\n' {
                place.line += 1;
                place.column = 1;
            } else if !is_continuation(text.get(place.offset)) {
                place.column += 1;
            }
        }
        while is_continuation(text.get(place.offset)) {
            place.offset += 1;
        }
        place
    }
}

/// Whether the byte is inside a UTF-8 character, not at its start.
fn is_continuation(byte: Option<&u8>) -> bool {
    byte.is_some_and(|byte| byte & 0xC0 == 0x80)
}

impl fmt::Display for Place {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "line {}, column {}", self.line, self.column)
    }
}
