//! What a mark is for, and the colour that each theme gives to it.
//!
//! Findings are never told by colour alone: each role of a finding has a shape
//! in [`crate::drawing::mark::Shape`] and a word beside it.

/// A colour in sRGB, eight bits a channel.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct Colour {
    /// Red, `0..=255`.
    pub red: u8,
    /// Green, `0..=255`.
    pub green: u8,
    /// Blue, `0..=255`.
    pub blue: u8,
}

impl Colour {
    /// Returns the colour of three channels, each `0..=255`.
    pub const fn new(red: u8, green: u8, blue: u8) -> Self {
        Self { red, green, blue }
    }

    /// Returns the relative luminance, `0..=1`.
    ///
    /// # Source
    ///
    /// W3C, *Web Content Accessibility Guidelines 2.2*, definition of relative
    /// luminance (from memory). Checked against the luminances of black and
    /// white and the contrast of mid grey in this file.
    pub fn luminance(self) -> f64 {
        0.2126 * linear(self.red) + 0.7152 * linear(self.green) + 0.0722 * linear(self.blue)
    }

    /// Returns the contrast ratio between two colours, `1..=21`, in either order.
    ///
    /// # Source
    ///
    /// W3C, *Web Content Accessibility Guidelines 2.2*, definition of contrast
    /// ratio (from memory); 4.5 is its level AA for text.
    pub fn contrast(self, other: Self) -> f64 {
        let (a, b) = (self.luminance(), other.luminance());
        (a.max(b) + 0.05) / (a.min(b) + 0.05)
    }

    /// Returns the CIELAB lightness `L*` under D65, `0..=100`.
    ///
    /// # Source
    ///
    /// CIE 15, CIELAB lightness from relative luminance (from memory).
    pub fn lightness(self) -> f64 {
        let y = self.luminance();
        if y > 216.0 / 24389.0 {
            116.0 * y.cbrt() - 16.0
        } else {
            y * 24389.0 / 27.0
        }
    }
}

fn linear(channel: u8) -> f64 {
    let c = f64::from(channel) / 255.0;
    if c <= 0.04045 {
        c / 12.92
    } else {
        ((c + 0.055) / 1.055).powf(2.4)
    }
}

/// The set of colours in use.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Hash)]
#[non_exhaustive]
pub enum Theme {
    /// Dark ink on light ground; also what is printed.
    #[default]
    Light,
    /// Light ink on dark ground.
    Dark,
    /// Black on white, with hatching in place of tints.
    Contrast,
}

impl Theme {
    /// Every theme.
    pub const ALL: [Theme; 3] = [Theme::Light, Theme::Dark, Theme::Contrast];
}

/// What a mark is for.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Role {
    /// The desk under everything.
    Ground,
    /// A panel on the desk.
    Panel,
    /// A card, and the paper of a page.
    Card,
    /// Hair lines and frames.
    Line,
    /// Text and drawn edges.
    Ink,
    /// Secondary text.
    Muted,
    /// What can be acted on, and what is selected.
    Action,
    /// A finding that is over its limit.
    Over,
    /// A finding within its limit.
    Within,
    /// The ground under a caution.
    CautionGround,
    /// Text and frame of a caution.
    CautionInk,
    /// Furnace walls.
    Masonry,
    /// Plates and screens.
    Steel,
    /// The large word behind the content of a page that is not final.
    Draft,
}

impl Role {
    /// Every role.
    pub const ALL: [Role; 14] = [
        Role::Ground,
        Role::Panel,
        Role::Card,
        Role::Line,
        Role::Ink,
        Role::Muted,
        Role::Action,
        Role::Over,
        Role::Within,
        Role::CautionGround,
        Role::CautionInk,
        Role::Masonry,
        Role::Steel,
        Role::Draft,
    ];

    /// Returns the colour of this role in `theme`.
    pub const fn colour(self, theme: Theme) -> Colour {
        match theme {
            Theme::Light => match self {
                Role::Ground => Colour::new(0xf6, 0xf4, 0xef),
                Role::Panel => Colour::new(0xfc, 0xfb, 0xf8),
                Role::Card => Colour::new(0xff, 0xff, 0xff),
                Role::Line => Colour::new(0xd8, 0xd3, 0xc8),
                Role::Ink => Colour::new(0x20, 0x25, 0x2a),
                Role::Muted => Colour::new(0x5a, 0x62, 0x6b),
                Role::Action => Colour::new(0x1b, 0x5e, 0x7b),
                Role::Over => Colour::new(0xa3, 0x26, 0x1c),
                Role::Within => Colour::new(0x25, 0x70, 0x4f),
                Role::CautionGround => Colour::new(0xf4, 0xe3, 0xa1),
                Role::CautionInk => Colour::new(0x4a, 0x3a, 0x00),
                Role::Masonry => Colour::new(0xb9, 0xa8, 0x97),
                Role::Steel => Colour::new(0x3a, 0x40, 0x46),
                Role::Draft => Colour::new(0xc9, 0xc4, 0xb9),
            },
            Theme::Dark => match self {
                Role::Ground => Colour::new(0x15, 0x18, 0x1b),
                Role::Panel => Colour::new(0x1b, 0x1f, 0x23),
                Role::Card => Colour::new(0x22, 0x27, 0x2c),
                Role::Line => Colour::new(0x36, 0x3d, 0x44),
                Role::Ink => Colour::new(0xe9, 0xe6, 0xdf),
                Role::Muted => Colour::new(0xa2, 0xa9, 0xb0),
                Role::Action => Colour::new(0x7c, 0xc0, 0xdc),
                Role::Over => Colour::new(0xff, 0x8f, 0x80),
                Role::Within => Colour::new(0x7f, 0xd1, 0xa8),
                Role::CautionGround => Colour::new(0x4a, 0x3f, 0x14),
                Role::CautionInk => Colour::new(0xf6, 0xe7, 0xb0),
                Role::Masonry => Colour::new(0x5b, 0x51, 0x48),
                Role::Steel => Colour::new(0xaa, 0xb2, 0xba),
                Role::Draft => Colour::new(0x46, 0x4d, 0x54),
            },
            Theme::Contrast => match self {
                Role::Ground | Role::Panel | Role::Card | Role::CautionGround | Role::Masonry => {
                    Colour::new(0xff, 0xff, 0xff)
                }
                // Grey, or the lines of a grid would hide those that mean something.
                Role::Line => Colour::new(0x76, 0x76, 0x76),
                Role::Ink
                | Role::Muted
                | Role::Action
                | Role::Over
                | Role::Within
                | Role::CautionInk
                | Role::Steel => Colour::new(0x00, 0x00, 0x00),
                Role::Draft => Colour::new(0xc0, 0xc0, 0xc0),
            },
        }
    }

    /// Returns the grounds on which text of this role stands; empty for roles
    /// that never carry text.
    pub const fn grounds(self) -> &'static [Role] {
        match self {
            Role::Ink | Role::Muted | Role::Action | Role::Over | Role::Within => {
                &[Role::Ground, Role::Panel, Role::Card]
            }
            Role::CautionInk => &[Role::CautionGround, Role::Card],
            // The word on the button that the eye should find.
            Role::Card => &[Role::Action],
            Role::Ground
            | Role::Panel
            | Role::Line
            | Role::CautionGround
            | Role::Masonry
            | Role::Steel
            | Role::Draft => &[],
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_text_role_reads_on_each_of_its_grounds() {
        let mut pairs = 0;
        for theme in Theme::ALL {
            for role in Role::ALL {
                for ground in role.grounds() {
                    // A caution's ink stands on a plain card in print alone.
                    if theme == Theme::Dark && role == Role::CautionInk && *ground == Role::Card {
                        continue;
                    }
                    let contrast = role.colour(theme).contrast(ground.colour(theme));
                    assert!(
                        contrast >= 4.5,
                        "{role:?} on {ground:?} in {theme:?}: {contrast:.2}, wanted 4.5"
                    );
                    pairs += 1;
                }
            }
        }
        assert_eq!(pairs, 53, "pairs looked at: {pairs}, wanted 53");
    }

    #[test]
    fn the_contrast_theme_is_black_on_white() {
        for role in Role::ALL {
            for ground in role.grounds() {
                let found = role
                    .colour(Theme::Contrast)
                    .contrast(ground.colour(Theme::Contrast));
                assert!(
                    found > 20.9,
                    "{role:?} on {ground:?}: {found:.2}, wanted 21"
                );
            }
        }
    }

    #[test]
    fn black_on_white_has_the_greatest_contrast() {
        let black = Colour::new(0, 0, 0);
        let white = Colour::new(255, 255, 255);
        let contrast = black.contrast(white);
        assert!((contrast - 21.0).abs() < 1e-9, "{contrast}, wanted 21");
        assert_eq!(white.contrast(black), contrast);
    }

    #[test]
    fn lightness_of_known_greys_is_that_of_cielab() {
        // sRGB (119, 119, 119) has L* 50.03: widely tabulated, from memory.
        for (grey, expected) in [(0, 0.0), (119, 50.03), (255, 100.0)] {
            let lightness = Colour::new(grey, grey, grey).lightness();
            assert!(
                (lightness - expected).abs() < 0.01,
                "grey {grey}: {lightness}, wanted {expected}"
            );
        }
    }
}
