//! All limits that are loaded, by id.

#[cfg(test)]
pub(super) mod tests;

use std::sync::LazyLock;

use super::link::{self, Family, Linked};
use super::read;
use super::{Allowed, Course, Error, Fault, Judgement, Limit, Origin};
use crate::spelling::nearest;

/// Names a file of the resources, built into the program.
macro_rules! shipped {
    ($id:literal) => {
        (
            concat!($id, ".json"),
            include_bytes!(concat!(
                env!("CARGO_MANIFEST_DIR"),
                "/resources/guidance/",
                $id,
                ".json"
            )),
        )
    };
}

/// The files that come with the program, by name.
const SHIPPED: [(&str, &[u8]); 6] = [
    shipped!("eu-2006-25-m"),
    shipped!("eu-2006-25-n"),
    shipped!("eu-2006-25-o"),
    shipped!("icnirp-2013-ir-eye"),
    shipped!("icnirp-2013-skin"),
    shipped!("pain-time"),
];

/// All limits that are loaded, in the order of their ids.
#[derive(Clone, Debug, PartialEq, Default)]
pub struct Library {
    limits: Vec<Limit>,
    families: Vec<Family>,
    /// For each limit the index of its family.
    family_of: Vec<usize>,
}

impl Library {
    /// Returns the limits that come with the program.
    ///
    /// They pass the same gate as a user's own, which a test proves.
    #[must_use]
    pub fn shipped() -> &'static Self {
        static LIBRARY: LazyLock<Library> = LazyLock::new(|| {
            Library::read_all(&SHIPPED, &Origin::Shipped)
                .expect("the shipped files pass the gate, as a test proves")
        });
        &LIBRARY
    }

    /// Reads a user's file of limits by itself: one limit, or a list of them.
    ///
    /// `name` is what faults and [`Origin::Own`] call the file.
    ///
    /// # Errors
    ///
    /// Every [`Fault`] of the file, each with its place.
    pub fn read(name: &str, bytes: &[u8]) -> Result<Self, Vec<Fault>> {
        Self::default().with_own(name, bytes)
    }

    /// Returns these limits together with those of a user's own file, which may continue them.
    ///
    /// # Errors
    ///
    /// Every [`Fault`] of the file, each with its place; an id that is taken is one.
    pub fn with_own(&self, name: &str, bytes: &[u8]) -> Result<Self, Vec<Fault>> {
        let origin = Origin::Own {
            file: name.to_owned(),
        };
        self.with(&[(name, bytes)], &origin)
    }

    fn read_all(files: &[(&str, &[u8])], origin: &Origin) -> Result<Self, Vec<Fault>> {
        Self::default().with(files, origin)
    }

    /// Reads files that may name one another's rows, and links them to what is here.
    fn with(&self, files: &[(&str, &[u8])], origin: &Origin) -> Result<Self, Vec<Fault>> {
        let (mut limits, mut faults) = (Vec::new(), Vec::new());
        for (name, bytes) in files {
            match read::file(name, bytes, origin) {
                Ok(read) => limits.extend(read),
                Err(found) => faults.extend(found),
            }
        }
        if !faults.is_empty() {
            return Err(faults);
        }
        let Linked {
            limits,
            families,
            family_of,
        } = link::link(&self.limits, &limits)?;
        Ok(Self {
            limits,
            families,
            family_of,
        })
    }

    /// Returns the limit of that id.
    #[must_use]
    pub fn get(&self, id: &str) -> Option<&Limit> {
        self.index(id).map(|at| &self.limits[at])
    }

    /// Returns every id, in order.
    pub fn ids(&self) -> impl Iterator<Item = &str> {
        self.limits.iter().map(|limit| limit.id.as_str())
    }

    /// Returns every limit, in the order of their ids.
    #[must_use]
    pub fn limits(&self) -> &[Limit] {
        &self.limits
    }

    /// Returns the loaded id nearest to `id`, if one is near.
    #[must_use]
    pub fn suggest(&self, id: &str) -> Option<&str> {
        nearest(id, self.ids())
    }

    /// Returns the rows that are judged together with `id`, itself among them, in order of time.
    #[must_use]
    pub fn family(&self, id: &str) -> Vec<&Limit> {
        self.index(id).map_or_else(Vec::new, |at| {
            let family = &self.families[self.family_of[at]];
            family.rows.iter().map(|&row| &self.limits[row]).collect()
        })
    }

    /// Returns the limit over time of the family of `id`: for judging many exposures.
    #[must_use]
    pub fn course(&self, id: &str) -> Option<&Course> {
        self.index(id)
            .map(|at| &self.families[self.family_of[at]].course)
    }

    /// Judges an irradiance in W/m² over a stay in seconds by the family of `id`.
    ///
    /// # Errors
    ///
    /// [`Error::UnknownId`], or [`Error::Exposure`] if the exposure is
    /// negative or not finite.
    pub fn judge(&self, id: &str, exposure: f64, stay: Option<f64>) -> Result<Judgement, Error> {
        self.course(id)
            .ok_or_else(|| self.unknown(id))?
            .judge(exposure, stay)
    }

    /// Returns the longest stay in an irradiance of `exposure` W/m² by the family of `id`.
    ///
    /// # Errors
    ///
    /// As [`Self::judge`].
    pub fn allowed(&self, id: &str, exposure: f64) -> Result<Allowed, Error> {
        self.course(id)
            .ok_or_else(|| self.unknown(id))?
            .allowed(exposure)
    }

    /// Returns the limit at an exposure time of `t` seconds as an irradiance in W/m², by the
    /// family of `id`; none where the guidance does not speak.
    #[must_use]
    pub fn limit_at(&self, id: &str, t: f64) -> Option<f64> {
        self.course(id)?.limit_at(t)
    }

    /// Returns the error for an id that is not loaded.
    #[must_use]
    pub fn unknown(&self, id: &str) -> Error {
        Error::UnknownId {
            id: id.to_owned(),
            suggestion: self.suggest(id).map(str::to_owned),
        }
    }

    fn index(&self, id: &str) -> Option<usize> {
        link::find(&self.limits, id)
    }
}
