//! What an area that only shows the notebook answers with.

use crate::notebook::datum::CellId;

/// What the window has to do.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Action {
    /// Nothing.
    None,
    /// Select this cell and bring it into view.
    SelectCell(CellId),
}
