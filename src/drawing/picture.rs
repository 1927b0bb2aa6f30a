//! A picture: marks on a sheet of a given size, in points, `y` downwards from
//! the top left corner.

use glam::DVec2;

use crate::drawing::mark::{Mark, Text};

/// Marks on a sheet, painted in order.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Picture {
    /// Width of the sheet, in points.
    pub width: f64,
    /// Height of the sheet, in points.
    pub height: f64,
    /// What is on it, the first at the bottom.
    pub marks: Vec<Mark>,
}

impl Picture {
    /// Returns an empty sheet of `width` by `height` points.
    pub const fn new(width: f64, height: f64) -> Self {
        Self {
            width,
            height,
            marks: Vec::new(),
        }
    }

    /// Puts a mark on top.
    pub fn push(&mut self, mark: Mark) {
        self.marks.push(mark);
    }

    /// Returns the whole picture scaled by `factor`, its text with it.
    pub fn scaled(self, factor: f64) -> Self {
        Self {
            width: self.width * factor,
            height: self.height * factor,
            marks: self
                .marks
                .into_iter()
                .map(|mark| mark.placed(factor, DVec2::ZERO))
                .collect(),
        }
    }

    /// Returns every line of text, clipped ones too, in order of painting.
    pub fn texts(&self) -> Vec<&Text> {
        let mut found = Vec::new();
        collect(&self.marks, &mut found);
        found
    }
}

fn collect<'a>(marks: &'a [Mark], found: &mut Vec<&'a Text>) {
    for mark in marks {
        match mark {
            Mark::Text(text) => found.push(text),
            Mark::Clip { marks, .. } => collect(marks, found),
            Mark::Line { .. } | Mark::Area { .. } | Mark::Shape { .. } => {}
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::drawing::mark::Rectangle;

    #[test]
    fn texts_are_found_inside_clips_and_scale_with_the_picture() {
        let mut picture = Picture::new(100.0, 50.0);
        picture.push(Mark::Clip {
            window: Rectangle::new(0.0, 0.0, 10.0, 10.0),
            marks: vec![Mark::Text(Text::new(DVec2::new(1.0, 2.0), 8.0, "door"))],
        });
        let half = picture.scaled(0.5);
        let texts = half.texts();
        assert_eq!(texts.len(), 1);
        assert_eq!((texts[0].size, texts[0].at), (4.0, DVec2::new(0.5, 1.0)));
        assert_eq!((half.width, half.height), (50.0, 25.0));
    }
}
