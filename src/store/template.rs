//! Site templates: notebooks with fill-ins, built into the program.

/// One template.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Template {
    /// The name by which it is asked for.
    pub name: &'static str,
    /// What it is for, in one line.
    pub about: &'static str,
    /// The text of its notebook.
    pub text: &'static str,
}

/// The templates, in the order in which they are listed. The first is the
/// demo, which is worked out whole.
pub const ALL: &[Template] = &[
    Template {
        name: "furnace-door",
        about: "the open charging door of a melting furnace, and who works around it (the demo)",
        text: include_str!("../../templates/furnace-door.farglow"),
    },
    Template {
        name: "ladle",
        about: "a ladle of molten iron on its way to the moulds, and the pourer beside it",
        text: include_str!("../../templates/ladle.farglow"),
    },
    Template {
        name: "ladle-screen",
        about: "a ladle behind a half screen, and who watches it from a platform",
        text: include_str!("../../templates/ladle-screen.farglow"),
    },
    Template {
        name: "gathering-opening",
        about: "the gathering opening of a glass furnace, with the gatherer at about 1 m",
        text: include_str!("../../templates/gathering-opening.farglow"),
    },
];

/// The template that runs where no file is given.
pub const DEMO: &Template = &ALL[0];

/// Returns the template of this name.
#[must_use]
pub fn find(name: &str) -> Option<&'static Template> {
    ALL.iter().find(|template| template.name == name)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::store::schema;

    #[test]
    fn every_template_reads_and_is_written_back_the_same() {
        for template in ALL {
            let stored = schema::read(template.text.as_bytes())
                .unwrap_or_else(|error| panic!("{}: {error}", template.name));
            assert_eq!(
                schema::write(&stored.notebook),
                template.text,
                "{}",
                template.name
            );
        }
    }

    #[test]
    fn templates_are_found_by_name() {
        assert_eq!(find("ladle").map(|template| template.name), Some("ladle"));
        assert_eq!(find("Ladle"), None);
    }
}
