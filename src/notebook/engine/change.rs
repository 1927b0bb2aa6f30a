//! The changes that reach cells: what must be linked again after each.

use super::Engine;
use crate::notebook::cell::{Cell, Content, Field, Form, Kind};
use crate::notebook::datum::CellId;
use crate::notebook::edit::{Edit, Error};
use crate::notebook::name;

impl Engine {
    pub(in crate::notebook) fn add(&mut self, at: usize, cell: Cell) -> Result<Edit, Error> {
        if self.notebook.cells.len() >= super::MOST_CELLS {
            return Err(Error::TooManyCells);
        }
        self.free(&cell.name)?;
        if cell.kind == Kind::Surroundings
            && let Some(room) = self
                .notebook
                .cells
                .iter()
                .find(|cell| cell.kind == Kind::Surroundings)
        {
            return Err(Error::SecondSurroundings(room.name.clone()));
        }
        let at = at.min(self.notebook.cells.len());
        let name = cell.name.clone();
        let id = self.number();
        self.notebook.cells.insert(at, cell);
        self.ids.insert(at, id);
        let _ = self.index.insert(name.clone(), id);
        self.count_places();
        let _ = self.link(id);
        self.relink_mentions(&name);
        Ok(Edit::Remove { name })
    }

    pub(in crate::notebook) fn remove(&mut self, name: &str) -> Result<Edit, Error> {
        let (id, at) = self.locate(name)?;
        let cell = self.notebook.cells.remove(at);
        let _ = self.ids.remove(at);
        let _ = self.index.remove(name);
        for (_, node) in self.slots.remove(&id).unwrap_or_default() {
            self.graph.remove(node);
            self.tasks[node.index()] = None;
        }
        self.mention(id, &std::collections::BTreeSet::new());
        let _ = self.mentions.remove(&id);
        self.count_places();
        self.scene_changed |= cell.kind.is_in_scene();
        self.relink_mentions(name);
        Ok(Edit::Add { at, cell })
    }

    pub(in crate::notebook) fn shift(&mut self, name: String, to: usize) -> Result<Edit, Error> {
        let (_, at) = self.locate(&name)?;
        let cell = self.notebook.cells.remove(at);
        let id = self.ids.remove(at);
        let to = to.min(self.notebook.cells.len());
        // Ties between sources go to file order.
        self.scene_changed |= cell.kind.is_in_scene();
        self.notebook.cells.insert(to, cell);
        self.ids.insert(to, id);
        self.count_places();
        Ok(Edit::Move { name, to: at })
    }

    pub(in crate::notebook) fn rename(&mut self, name: String, to: String) -> Result<Edit, Error> {
        let (id, at) = self.locate(&name)?;
        if name == to {
            return Ok(Edit::Rename {
                name: to.clone(),
                to,
            });
        }
        self.free(&to)?;
        let mut followers: Vec<CellId> = self
            .mentioned
            .get(&name)
            .map(|cells| cells.iter().copied().collect())
            .unwrap_or_default();
        let mut former = Vec::with_capacity(followers.len());
        for follower in &followers {
            let place = self.places[follower];
            let fields = self.notebook.cells[place].fields.clone();
            self.follow(place, &name, &to);
            if self.notebook.cells[place].fields != fields {
                former.push((*follower, fields));
            }
        }
        self.call(id, at, &name, &to);
        followers.push(id);
        for follower in followers {
            let _ = self.link(follower);
        }
        self.relink_mentions(&to);
        // Cells that mentioned the new name before, in error so far, must not
        // be caught by the way back: it puts the very texts back.
        let fields = former
            .into_iter()
            .map(|(follower, fields)| {
                let place = self.places[&follower];
                (self.notebook.cells[place].name.clone(), fields)
            })
            .collect();
        Ok(Edit::Unrename {
            name: to,
            to: name,
            fields,
        })
    }

    pub(in crate::notebook) fn unrename(
        &mut self,
        name: String,
        to: String,
        fields: Vec<(String, Vec<Field>)>,
    ) -> Result<Edit, Error> {
        let (id, at) = self.locate(&name)?;
        self.free(&to)?;
        for (follower, fields) in &fields {
            self.check_fields(follower, fields)?;
        }
        let mut changed = vec![id];
        for (follower, fields) in fields {
            let (follower, place) = self.locate(&follower)?;
            self.notebook.cells[place].fields = fields;
            changed.push(follower);
        }
        self.call(id, at, &name, &to);
        for cell in changed {
            self.relink(cell);
        }
        self.relink_mentions(&name);
        self.relink_mentions(&to);
        Ok(Edit::Rename { name: to, to: name })
    }

    /// Gives a cell another name, and nothing else.
    fn call(&mut self, id: CellId, at: usize, name: &str, to: &str) {
        to.clone_into(&mut self.notebook.cells[at].name);
        let _ = self.index.remove(name);
        let _ = self.index.insert(to.to_owned(), id);
        self.scene_changed |= self.notebook.cells[at].kind.is_in_scene();
    }

    /// Replaces a cell's name in every field of the cell at `place`.
    fn follow(&mut self, place: usize, from: &str, to: &str) {
        let kind = self.notebook.cells[place].kind;
        for field in &mut self.notebook.cells[place].fields {
            if let Content::Pairs(pairs) = &mut field.content {
                for text in pairs.iter_mut().flatten() {
                    if let Ok(entry) = crate::entry::Entry::parse(text) {
                        *text = entry.renamed(from, to);
                    }
                }
                continue;
            }
            let form = kind.field(field.name).map(|spec| spec.form);
            let Content::Text(text) = &mut field.content else {
                continue;
            };
            if matches!(form, Some(Form::Pairs(_))) {
                // Pairs as one text: entry by entry, and one text again.
                if let Some(mut pairs) = crate::notebook::cell::field::pairs(text) {
                    for text in pairs.iter_mut().flatten() {
                        if let Ok(entry) = crate::entry::Entry::parse(text) {
                            *text = entry.renamed(from, to);
                        }
                    }
                    *text = Content::Pairs(pairs).to_text();
                }
                continue;
            }
            match kind.field(field.name).map(|spec| spec.form) {
                Some(Form::Cell(_)) if text == from => to.clone_into(text),
                Some(Form::Facing) if text.trim() == from => to.clone_into(text),
                Some(Form::Entry(_) | Form::Facing) => {
                    if let Ok(entry) = crate::entry::Entry::parse(text) {
                        *text = entry.renamed(from, to);
                    }
                }
                _ => {}
            }
        }
    }

    pub(in crate::notebook) fn set_field(
        &mut self,
        name: String,
        field: &'static str,
        content: Option<Field>,
    ) -> Result<Edit, Error> {
        let (id, at) = self.locate(&name)?;
        let cell = &mut self.notebook.cells[at];
        let Some(spec) = cell.kind.field(field) else {
            return Err(Error::NoField {
                kind: cell.kind,
                field,
            });
        };
        let old = cell.fields.iter().position(|old| old.name == field);
        let content_before = old.map(|place| cell.fields[place].clone());
        let mut inverse = Edit::SetField {
            name: name.clone(),
            field,
            content: content_before,
        };
        match (old, content) {
            (Some(place), Some(mut content)) => {
                content.name = spec.name;
                cell.fields[place] = content;
            }
            (Some(place), None) => {
                // A file may hold its fields in another order than the kind.
                inverse = Edit::SetFields {
                    name,
                    fields: cell.fields.clone(),
                };
                let _ = cell.fields.remove(place);
            }
            (None, Some(mut content)) => {
                content.name = spec.name;
                // Where the kind lists it, so that files stay in one order.
                let rank =
                    |name: &str| cell.kind.fields().iter().position(|spec| spec.name == name);
                let place = cell
                    .fields
                    .iter()
                    .position(|other| rank(other.name) > rank(field))
                    .unwrap_or(cell.fields.len());
                cell.fields.insert(place, content);
            }
            (None, None) => {}
        }
        self.relink(id);
        Ok(inverse)
    }

    pub(in crate::notebook) fn set_fields(
        &mut self,
        name: String,
        fields: Vec<Field>,
    ) -> Result<Edit, Error> {
        let (id, at) = self.locate(&name)?;
        self.check_fields(&name, &fields)?;
        let fields = std::mem::replace(&mut self.notebook.cells[at].fields, fields);
        self.relink(id);
        Ok(Edit::SetFields { name, fields })
    }

    fn check_fields(&self, name: &str, fields: &[Field]) -> Result<(), Error> {
        let (_, at) = self.locate(name)?;
        let kind = self.notebook.cells[at].kind;
        match fields.iter().find(|field| kind.field(field.name).is_none()) {
            Some(field) => Err(Error::NoField {
                kind,
                field: field.name,
            }),
            None => Ok(()),
        }
    }

    fn locate(&self, name: &str) -> Result<(CellId, usize), Error> {
        self.find(name)
            .map(|id| (id, self.places[&id]))
            .ok_or_else(|| Error::NoCell(name.to_owned()))
    }

    fn free(&self, name: &str) -> Result<(), Error> {
        name::check(name)?;
        if self.index.contains_key(name) {
            return Err(Error::Name(name::Error::Taken(name.to_owned())));
        }
        Ok(())
    }
}
