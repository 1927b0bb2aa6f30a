//! What follows from what is typed and chosen in the place that is open.

use iced::widget::text_editor;

use super::{Action, Area, Part, change, prose, sentence};
use crate::notebook::cell::{Basis, Content, Form};
use crate::notebook::datum::CellId;
use crate::notebook::edit::Edit;
use crate::notebook::engine::Engine;
use crate::notebook::name;

impl Area {
    /// Follows what happens in the open prose.
    pub(super) fn edit(&mut self, action: text_editor::Action, engine: &Engine) -> Action {
        let Some(text) = self
            .prose
            .as_mut()
            .and_then(|it| prose::perform(it, action))
        else {
            return Action::None;
        };
        let Some((cell, field)) = self.open_field(engine) else {
            return Action::None;
        };
        let joins = std::mem::replace(&mut self.typed, true);
        change::set(cell, field, Content::Text(text), joins)
    }

    /// Follows what happens in the remark on the open input.
    pub(super) fn remark(&mut self, action: text_editor::Action, engine: &Engine) -> Action {
        let Some(text) = self
            .remark
            .as_mut()
            .and_then(|it| prose::perform(it, action))
        else {
            return Action::None;
        };
        let Some((cell, field)) = self.open_field(engine) else {
            return Action::None;
        };
        self.typed = false;
        let joins = std::mem::replace(&mut self.remarked, true);
        match change::remark(cell, field, text, joins) {
            Some(action) => action,
            None => self.needs_an_input(),
        }
    }

    fn needs_an_input(&mut self) -> Action {
        self.remarked = false;
        self.refused = Some("type the input first, then say where it came from".to_owned());
        Action::None
    }

    pub(super) fn type_in(&mut self, text: String, engine: &Engine) -> Action {
        let Some(place) = self.open else {
            return Action::None;
        };
        let Some(cell) = engine.cell(place.cell) else {
            return Action::None;
        };
        self.refused = None;
        let field = match place.part {
            Part::Name => {
                // A name is given when it is whole: half of one may be taken.
                self.refused = (text != cell.name)
                    .then(|| name::check(&text).err().map(|error| error.to_string()))
                    .flatten();
                self.draft = Some(text);
                return Action::None;
            }
            Part::Field(field) => field,
        };
        if sentence::is_chosen(cell, field) {
            // Only its words fit it, and those are clicked on.
            return Action::None;
        }
        let content = match cell.kind.field(field).map(|spec| spec.form) {
            // Without a number it is left out.
            Some(Form::Count(..)) if text.trim().is_empty() => {
                self.draft = Some(text);
                return change::leave_out(cell, field);
            }
            Some(Form::Count(least, most)) => match text.trim().parse::<u32>() {
                Ok(number) => {
                    self.draft = None;
                    Content::Count(f64::from(number))
                }
                Err(_) => {
                    // The file has a number here, or nothing.
                    self.refused = Some(format!(
                        "expected a whole number from {least} to {most}, found `{text}`"
                    ));
                    self.draft = Some(text);
                    return Action::None;
                }
            },
            Some(form @ Form::Pairs(_)) => {
                // What is typed is kept as it is while it is being typed.
                self.draft = Some(text.clone());
                Content::typed(form, text)
            }
            Some(Form::Text) => {
                prose::follow(&mut self.prose, Some(text.clone()));
                Content::Text(text)
            }
            _ => Content::Text(text),
        };
        let joins = std::mem::replace(&mut self.typed, true);
        change::set(cell, field, content, joins)
    }

    pub(super) fn keep(&mut self, engine: &Engine) -> Action {
        if let Some(renaming) = self.renaming(engine, None) {
            return renaming;
        }
        let _ = self.close();
        Action::None
    }

    /// Returns the renaming that is typed and not made yet; the cell `next` is
    /// selected afterwards.
    pub(super) fn renaming(&self, engine: &Engine, next: Option<CellId>) -> Option<Action> {
        let place = self.open.filter(|place| place.part == Part::Name)?;
        let cell = engine.cell(place.cell)?;
        let to = self.draft.clone().filter(|to| *to != cell.name)?;
        let select = match next {
            Some(id) if id == place.cell => Some(to.clone()),
            Some(id) => engine.cell(id).map(|cell| cell.name.clone()),
            None => None,
        };
        Some(Action::Change {
            title: format!("rename {} to {to}", cell.name),
            edit: Edit::Rename {
                name: cell.name.clone(),
                to,
            },
            joins: false,
            select,
        })
    }

    pub(super) fn choose(&mut self, word: &str, engine: &Engine) -> Action {
        let Some((cell, field)) = self.open_field(engine) else {
            return Action::None;
        };
        let content = match cell.kind.field(field).map(|spec| spec.form) {
            // What is typed is never a choice, but for a facing, which is both.
            Some(Form::Entry(_) | Form::Pairs(_) | Form::Count(..) | Form::Unit | Form::Text)
            | None => {
                return Action::None;
            }
            Some(Form::GuidanceList) => {
                let mut list: Vec<String> =
                    cell.texts(field).into_iter().map(str::to_owned).collect();
                if list.iter().any(|other| other == word) {
                    list.retain(|other| other != word);
                } else {
                    list.push(word.to_owned());
                }
                Content::List(list)
            }
            _ => Content::Text(word.to_owned()),
        };
        self.typed = false;
        change::set(cell, field, content, false)
    }

    /// Sets or takes back the basis of the open input.
    pub(super) fn base(&mut self, basis: Basis, engine: &Engine) -> Action {
        let Some((cell, field)) = self.open_field(engine) else {
            return Action::None;
        };
        self.typed = false;
        match change::base(cell, field, basis) {
            Some(action) => action,
            None => self.needs_an_input(),
        }
    }
}
