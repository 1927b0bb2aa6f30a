//! How the pieces of the window look: roles as colours, the bundled font, and
//! the sizes of text.
//!
//! Sizes are those at 100 %: the window's own scale factor multiplies all of
//! them by the zoom, so nothing here does so again.

use std::borrow::Cow;

use iced::widget::{
    Container, Scrollable, button, container, overlay, pick_list, scrollable, text, text_editor,
    text_input,
};
use iced::{Background, Border, Color, Element, Font, Length, Theme, font};

use super::shared::Look;
use crate::drawing::font::{FAMILY, Weight};
use crate::drawing::role::{self, Colour, Role};

/// The size of body text.
pub const BODY: f32 = 14.0;
/// The size of secondary text, and the least there is.
pub const SMALL: f32 = 13.0;
/// The size of a cell's result.
pub const RESULT: f32 = 17.0;

/// The step that distances between things are counted in.
pub const STEP: f32 = 8.0;
/// The radius of a card's corners.
pub const CORNER: f32 = 9.0;

/// The bundled font.
pub const REGULAR: Font = Font::with_name(FAMILY);

/// The bundled font, semibold.
pub const BOLD: Font = Font {
    weight: font::Weight::Semibold,
    ..REGULAR
};

/// Returns the files of the bundled font, for whoever opens a window.
#[must_use]
pub fn fonts() -> Vec<Cow<'static, [u8]>> {
    Weight::ALL
        .iter()
        .map(|weight| Cow::Borrowed(weight.bytes()))
        .collect()
}

/// Returns the colour of a role.
#[must_use]
pub const fn colour(role: Role, look: Look) -> Color {
    rgb(role.colour(look.theme))
}

/// Returns a drawing's colour as the window's.
#[must_use]
pub const fn rgb(colour: Colour) -> Color {
    Color::from_rgb8(colour.red, colour.green, colour.blue)
}

/// Returns the theme of the widgets that have no style of their own.
#[must_use]
pub fn theme(look: Look) -> Theme {
    let name = match look.theme {
        role::Theme::Light => "farglow light",
        role::Theme::Dark => "farglow dark",
        role::Theme::Contrast => "farglow contrast",
    };
    Theme::custom(
        name,
        iced::theme::Palette {
            background: colour(Role::Ground, look),
            text: colour(Role::Ink, look),
            primary: colour(Role::Action, look),
            success: colour(Role::Within, look),
            warning: colour(Role::CautionGround, look),
            danger: colour(Role::Over, look),
        },
    )
}

/// Returns a text in a role's colour.
pub fn words<'a>(
    content: impl text::IntoFragment<'a>,
    size: f32,
    role: Role,
    look: Look,
) -> text::Text<'a> {
    text(content)
        .size(size)
        .font(REGULAR)
        .color(colour(role, look))
}

/// Returns a semibold text in a role's colour.
pub fn bold<'a>(
    content: impl text::IntoFragment<'a>,
    size: f32,
    role: Role,
    look: Look,
) -> text::Text<'a> {
    words(content, size, role, look).font(BOLD)
}

/// Returns the style of an area of one ground.
pub fn ground(role: Role, look: Look) -> impl Fn(&Theme) -> container::Style {
    move |_| container::Style {
        background: Some(Background::Color(colour(role, look))),
        text_color: Some(colour(Role::Ink, look)),
        ..container::Style::default()
    }
}

/// Returns a band across the desk, on one ground.
pub fn band<'a, Message: 'a>(
    content: impl Into<Element<'a, Message>>,
    role: Role,
    look: Look,
) -> Container<'a, Message> {
    container(content)
        .padding([STEP, 20.0])
        .width(Length::Fill)
        .style(ground(role, look))
}

/// Returns the style of a panel that holds a drawing: a hair line around it.
pub fn panel(look: Look) -> impl Fn(&Theme) -> container::Style {
    move |_| container::Style {
        background: Some(Background::Color(colour(Role::Card, look))),
        text_color: Some(colour(Role::Ink, look)),
        border: Border {
            color: colour(Role::Line, look),
            width: 1.0,
            radius: CORNER.into(),
        },
        ..container::Style::default()
    }
}

/// Returns the style of the band of cautions.
pub fn cautions(look: Look) -> impl Fn(&Theme) -> container::Style {
    let framed = look.theme == role::Theme::Contrast;
    move |_| container::Style {
        background: Some(Background::Color(colour(Role::CautionGround, look))),
        text_color: Some(colour(Role::CautionInk, look)),
        border: Border {
            color: colour(Role::CautionInk, look),
            // Without a tint only a frame sets the band apart.
            width: if framed { 2.0 } else { 0.0 },
            radius: 0.0.into(),
        },
        ..container::Style::default()
    }
}

/// How a card stands to the selected one.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stand {
    /// It is the selected one.
    Selected,
    /// It feeds it, or is fed by it.
    Linked,
    /// Neither.
    Apart,
}

/// Returns the style of a card.
pub fn card(stand: Stand, look: Look) -> impl Fn(&Theme) -> container::Style {
    move |_| container::Style {
        background: Some(Background::Color(colour(Role::Card, look))),
        text_color: Some(colour(Role::Ink, look)),
        border: Border {
            color: colour(
                match stand {
                    Stand::Apart => Role::Line,
                    Stand::Selected | Stand::Linked => Role::Action,
                },
                look,
            ),
            width: match stand {
                Stand::Selected => 2.0,
                Stand::Linked | Stand::Apart => 1.0,
            },
            radius: CORNER.into(),
        },
        ..container::Style::default()
    }
}

/// Returns the style of a button with a frame.
pub fn framed(look: Look) -> impl Fn(&Theme, button::Status) -> button::Style {
    move |_, status| {
        let role = match status {
            button::Status::Disabled => Role::Muted,
            _ => Role::Ink,
        };
        let ground = match status {
            button::Status::Hovered | button::Status::Pressed => Role::Ground,
            button::Status::Active | button::Status::Disabled => Role::Card,
        };
        button::Style {
            background: Some(Background::Color(colour(ground, look))),
            text_color: colour(role, look),
            border: Border {
                // Where muted ink is black too, only the frame tells what rests.
                color: match (look.theme, status) {
                    (role::Theme::Contrast, button::Status::Disabled) => colour(Role::Line, look),
                    (role::Theme::Contrast, _) => colour(Role::Ink, look),
                    _ => colour(Role::Line, look),
                },
                width: match (look.theme, status) {
                    (role::Theme::Contrast, button::Status::Disabled) => 1.0,
                    (role::Theme::Contrast, _) => 2.0,
                    _ => 1.0,
                },
                radius: 7.0.into(),
            },
            ..button::Style::default()
        }
    }
}

/// Returns the style of the one button that the eye should find.
pub fn chief(look: Look) -> impl Fn(&Theme, button::Status) -> button::Style {
    move |_, status| {
        let (ground, ink) = match status {
            button::Status::Disabled => (Role::Panel, Role::Muted),
            _ => (Role::Action, Role::Card),
        };
        button::Style {
            background: Some(Background::Color(colour(ground, look))),
            text_color: colour(ink, look),
            border: Border {
                color: colour(Role::Action, look),
                width: 1.0,
                radius: 7.0.into(),
            },
            ..button::Style::default()
        }
    }
}

/// Returns the style of a word that can be acted on, without a frame.
pub fn plain(look: Look) -> impl Fn(&Theme, button::Status) -> button::Style {
    link(Role::Action, Role::Ground, look)
}

/// Returns the style of a word in `ink` that can be acted on; the ground under
/// it changes to `hovered` while the pointer rests on it.
pub fn link(
    ink: Role,
    hovered: Role,
    look: Look,
) -> impl Fn(&Theme, button::Status) -> button::Style {
    move |_, status| button::Style {
        background: matches!(status, button::Status::Hovered | button::Status::Pressed)
            .then(|| Background::Color(colour(hovered, look))),
        text_color: colour(
            match status {
                button::Status::Disabled => Role::Muted,
                _ => ink,
            },
            look,
        ),
        border: Border {
            radius: 4.0.into(),
            ..Border::default()
        },
        ..button::Style::default()
    }
}

/// Returns the style of a choice, `chosen` or not.
pub fn choice(chosen: bool, look: Look) -> impl Fn(&Theme, button::Status) -> button::Style {
    move |_, status| button::Style {
        background: Some(Background::Color(colour(
            match (chosen, status) {
                (true, _) => Role::Action,
                (false, button::Status::Hovered) => Role::Ground,
                (false, _) => Role::Card,
            },
            look,
        ))),
        text_color: colour(if chosen { Role::Card } else { Role::Ink }, look),
        border: Border {
            color: colour(if chosen { Role::Action } else { Role::Line }, look),
            width: 1.0,
            radius: 11.0.into(),
        },
        ..button::Style::default()
    }
}

/// Returns the style of a list that opens, shut.
pub fn pick(look: Look) -> impl Fn(&Theme, pick_list::Status) -> pick_list::Style {
    move |_, _| pick_list::Style {
        text_color: colour(Role::Ink, look),
        placeholder_color: colour(Role::Muted, look),
        handle_color: colour(Role::Action, look),
        background: Background::Color(colour(Role::Card, look)),
        border: Border {
            color: colour(Role::Line, look),
            width: 1.0,
            radius: 7.0.into(),
        },
    }
}

/// Returns the style of a list that opens, open.
pub fn menu(look: Look) -> impl Fn(&Theme) -> overlay::menu::Style {
    move |_| overlay::menu::Style {
        background: Background::Color(colour(Role::Card, look)),
        border: Border {
            color: colour(Role::Line, look),
            width: 1.0,
            radius: 7.0.into(),
        },
        text_color: colour(Role::Ink, look),
        selected_text_color: colour(Role::Card, look),
        selected_background: Background::Color(colour(Role::Action, look)),
        shadow: iced::Shadow::default(),
    }
}

/// Returns the style of a field that is open for typing.
pub fn typing(look: Look) -> impl Fn(&Theme, text_input::Status) -> text_input::Style {
    move |_, _| text_input::Style {
        background: Background::Color(colour(Role::Panel, look)),
        border: Border {
            color: colour(Role::Action, look),
            width: 1.0,
            radius: 4.0.into(),
        },
        icon: colour(Role::Muted, look),
        placeholder: colour(Role::Muted, look),
        value: colour(Role::Ink, look),
        selection: Color {
            a: 0.3,
            ..colour(Role::Action, look)
        },
    }
}

/// Returns the style of prose that is open for typing.
pub fn prose(look: Look) -> impl Fn(&Theme, text_editor::Status) -> text_editor::Style {
    let line = typing(look);
    move |theme, _| {
        let line = line(theme, text_input::Status::Active);
        text_editor::Style {
            background: line.background,
            border: line.border,
            placeholder: line.placeholder,
            value: line.value,
            selection: line.selection,
        }
    }
}

/// How wide the bar of what scrolls is, and the space around it.
const BAR: f32 = 5.0;
const BESIDE: f32 = 3.0;

/// Returns what scrolls when it is too long, with a narrow bar at its edge.
pub fn scrolling<'a, Message: 'a>(
    content: impl Into<Element<'a, Message>>,
    look: Look,
) -> Scrollable<'a, Message> {
    let bar = scrollable::Scrollbar::new()
        .width(BAR)
        .scroller_width(BAR)
        .margin(BESIDE);
    scrollable(content)
        .direction(scrollable::Direction::Vertical(bar))
        .style(move |theme, status| scroll(look, theme, status))
}

/// Returns the style of what scrolls: a bar that darkens under the pointer.
pub fn scroll(look: Look, theme: &Theme, status: scrollable::Status) -> scrollable::Style {
    let usual = scrollable::default(theme, status);
    let role = match status {
        scrollable::Status::Hovered {
            is_vertical_scrollbar_hovered: true,
            ..
        }
        | scrollable::Status::Dragged { .. } => Role::Action,
        _ => Role::Line,
    };
    let rail = scrollable::Rail {
        background: None,
        border: Border::default(),
        scroller: scrollable::Scroller {
            background: Background::Color(colour(role, look)),
            border: Border {
                radius: (BAR / 2.0).into(),
                ..Border::default()
            },
        },
    };
    scrollable::Style {
        container: container::Style::default(),
        vertical_rail: rail,
        horizontal_rail: rail,
        gap: None,
        ..usual
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::app::shared::Measure;

    fn look(theme: role::Theme) -> Look {
        Look {
            theme,
            zoom: 1.0,
            measure: Measure::Metric,
        }
    }

    #[test]
    fn no_text_is_smaller_than_13() {
        for size in [BODY, SMALL, RESULT] {
            assert!(size >= 13.0, "{size}, wanted at least 13");
        }
        let smallest = (7.5 * crate::app::canvas::SCALE) as f32;
        assert!((smallest - 13.0).abs() < 1e-5, "{smallest}, wanted 13");
    }

    #[test]
    fn widgets_without_a_style_take_the_roles_of_the_theme() {
        for own in role::Theme::ALL {
            let look = look(own);
            let palette = theme(look).palette();
            for (found, role) in [
                (palette.background, Role::Ground),
                (palette.text, Role::Ink),
                (palette.primary, Role::Action),
                (palette.danger, Role::Over),
            ] {
                assert_eq!(found, colour(role, look), "{role:?} in {own:?}");
            }
        }
    }

    #[test]
    fn what_rests_is_told_from_what_can_be_pressed_in_every_theme() {
        for own in role::Theme::ALL {
            let look = look(own);
            let (at, style) = (theme(look), framed(look));
            let active = style(&at, button::Status::Active);
            let rests = style(&at, button::Status::Disabled);
            let same = active.text_color == rests.text_color && active.border == rests.border;
            assert!(!same, "{own:?}: {active:?}");
        }
    }
}
