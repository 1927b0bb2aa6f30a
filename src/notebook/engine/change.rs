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
        self.scene_changed |= matches!(cell.kind, Kind::Source | Kind::Surroundings);
        self.relink_mentions(name);
        Ok(Edit::Add { at, cell })
    }

    pub(in crate::notebook) fn shift(&mut self, name: String, to: usize) -> Result<Edit, Error> {
        let (_, at) = self.locate(&name)?;
        let cell = self.notebook.cells.remove(at);
        let id = self.ids.remove(at);
        let to = to.min(self.notebook.cells.len());
        // Ties between sources go to file order.
        self.scene_changed |= cell.kind == Kind::Source;
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
        // Cells that already mention the new name, in error so far, must not
        // be caught by the way back: their own text is not touched.
        let mut followers: Vec<CellId> = self
            .mentioned
            .get(&name)
            .map(|cells| cells.iter().copied().collect())
            .unwrap_or_default();
        for follower in &followers {
            let place = self.places[follower];
            self.follow(place, &name, &to);
        }
        self.notebook.cells[at].name.clone_from(&to);
        let _ = self.index.remove(&name);
        let _ = self.index.insert(to.clone(), id);
        self.scene_changed |= self.notebook.cells[at].kind == Kind::Source;
        followers.push(id);
        for follower in followers {
            let _ = self.link(follower);
        }
        self.relink_mentions(&to);
        Ok(Edit::Rename { name: to, to: name })
    }

    /// Replaces a cell's name in every field of the cell at `place`.
    fn follow(&mut self, place: usize, from: &str, to: &str) {
        let kind = self.notebook.cells[place].kind;
        for field in &mut self.notebook.cells[place].fields {
            let Content::Text(text) = &mut field.content else {
                continue;
            };
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
        let inverse = old.map(|place| cell.fields[place].clone());
        match (old, content) {
            (Some(place), Some(mut content)) => {
                content.name = spec.name;
                cell.fields[place] = content;
            }
            (Some(place), None) => {
                let _ = cell.fields.remove(place);
            }
            (None, Some(mut content)) => {
                content.name = spec.name;
                // Where the kind lists it, so that files stay in one order and
                // taking a change back restores the very same one.
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
        Ok(Edit::SetField {
            name,
            field,
            content: inverse,
        })
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
