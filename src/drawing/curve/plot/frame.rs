//! The grid of the plot with its numbers, and what the axes are of.

use glam::DVec2;

use super::{LINE, Plot, SMALL};
use crate::drawing::font::{self, Weight, fit};
use crate::drawing::mark::{Anchor, Mark, Stroke, Text};
use crate::drawing::role::Role;

impl Plot<'_> {
    pub(super) fn grid(&mut self) {
        let hair = Stroke::hair(Role::Line);
        let area = self.axes.area;
        let width = self.picture.width;
        let label = fit(&self.curve.y_label, width, SMALL, Weight::Regular);
        let at = DVec2::new(0.0, area.from.y - 6.0);
        self.text(Text::new(at, SMALL, label));
        let number = self.curve.number;
        let baseline = area.to.y + 3.0 + LINE - 2.0;
        let mut free = f64::NEG_INFINITY;
        for tick in self.axes.x.ticks(area.width() / 22.0) {
            let x = self.axes.across(tick);
            let ends = [DVec2::new(x, area.from.y), DVec2::new(x, area.to.y)];
            self.picture.push(Mark::line(ends[0], ends[1], hair));
            let text =
                Text::new(DVec2::new(x, baseline), SMALL, number(tick)).anchored(Anchor::Middle);
            let extent = text.extent();
            if extent.from.x > free.max(0.0) && extent.to.x <= self.picture.width {
                free = extent.to.x + 4.0;
                self.text(text);
            }
        }
        for tick in self.axes.y.ticks(area.height() / 11.0) {
            let y = self.axes.up(tick);
            let ends = [DVec2::new(area.from.x, y), DVec2::new(area.to.x, y)];
            self.picture.push(Mark::line(ends[0], ends[1], hair));
            let at = DVec2::new(area.from.x - 4.0, y + font::CAP_HEIGHT * SMALL / 2.0);
            let text = fit(&number(tick), at.x, SMALL, Weight::Regular);
            self.text(Text::new(at, SMALL, text).anchored(Anchor::End));
        }
        let ink = Stroke::hair(Role::Ink);
        for value in self.axes.x.between(area.width()) {
            let foot = DVec2::new(self.axes.across(value), area.to.y);
            let head = foot - DVec2::new(0.0, 3.0);
            self.picture.push(Mark::line(foot, head, ink));
        }
        for value in self.axes.y.between(area.height()) {
            let foot = DVec2::new(area.from.x, self.axes.up(value));
            let head = foot + DVec2::new(3.0, 0.0);
            self.picture.push(Mark::line(foot, head, ink));
        }
        let room = self.picture.width;
        let label = fit(&self.curve.x_label, room, SMALL, Weight::Regular);
        let at = DVec2::new((area.from.x + area.to.x) / 2.0, baseline + LINE);
        let text = Text::new(at, SMALL, label).anchored(Anchor::Middle);
        let over = (text.extent().to.x - room).max(0.0) - (-text.extent().from.x).max(0.0);
        let at = text.at - DVec2::new(over, 0.0);
        self.text(Text { at, ..text });
    }
}
