//! All limits that are loaded, by id.

use super::{Allowed, Course, Error, Fault, Judgement, Limit};

/// All limits that are loaded, in the order of their ids.
#[derive(Clone, Debug, PartialEq, Default)]
pub struct Library {
    limits: Vec<Limit>,
    /// For each limit the index of its family's course.
    courses: Vec<Course>,
}

impl Library {
    /// Returns the limits that come with the program.
    #[must_use]
    pub fn shipped() -> &'static Self {
        static SHIPPED: std::sync::LazyLock<Library> = std::sync::LazyLock::new(Library::default);
        &SHIPPED
    }

    /// Reads a file of limits by itself.
    ///
    /// # Errors
    ///
    /// Every [`Fault`] of the file, each with its place.
    pub fn read(_name: &str, _bytes: &[u8]) -> Result<Self, Vec<Fault>> {
        Ok(Self::default())
    }

    /// Returns these limits together with those of the user's own file.
    ///
    /// # Errors
    ///
    /// Every [`Fault`] of the file, each with its place.
    pub fn with_own(&self, _name: &str, _bytes: &[u8]) -> Result<Self, Vec<Fault>> {
        Ok(self.clone())
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
    pub fn suggest(&self, _id: &str) -> Option<&str> {
        None
    }

    /// Returns the rows that are judged together with `id`, itself among them, in order of time.
    #[must_use]
    pub fn family(&self, id: &str) -> Vec<&Limit> {
        self.get(id).into_iter().collect()
    }

    /// Returns the limit over time of the family of `id`: for judging many exposures.
    #[must_use]
    pub fn course(&self, id: &str) -> Option<&Course> {
        self.index(id).map(|at| &self.courses[at])
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
        self.limits
            .binary_search_by(|limit| limit.id.as_str().cmp(id))
            .ok()
    }
}
