//! What the window costs, without a display: from a message to the pixels that
//! it changes, as the software renderer paints them. Aimed at 150 ms for the
//! first frame of the demo, 16 ms for a typed character at 1440 × 900 with 200
//! cells, and 33 ms with 2,000 or at 2560 × 1440.

use divan::Bencher;
use farglow::app::{self, Message, Window, preset};
use iced::theme::Base;
use iced::{Rectangle, Size, mouse, window};
use iced_test::core::renderer::Style;
use iced_test::core::{Event, clipboard, time};
use iced_test::renderer::Renderer;
use iced_test::renderer::graphics::{Viewport, damage, text};
use iced_test::runtime::UserInterface;
use iced_test::runtime::user_interface::Cache;
use iced_test::simulator::Simulator;
use iced_tiny_skia::Layer;
use tiny_skia::{Mask, PixmapMut};

/// A common desk, and a large one.
const COMMON: Size = Size::new(1440.0, 900.0);
const LARGE: Size = Size::new(2560.0, 1440.0);

/// What is typed into: the temperature on which everything else hangs.
const TYPED: &str = "1250 ± 25 °C";

fn main() {
    let mut fonts = text::font_system().write().expect("nobody else reads yet");
    for font in app::settings().fonts {
        fonts.load_font(font);
    }
    drop(fonts);
    divan::main();
}

/// A window in front of pixels that nobody sees.
struct Glass {
    window: Window,
    renderer: Renderer,
    cache: Option<Cache>,
    viewport: Viewport,
    pixels: Vec<u8>,
    mask: Mask,
    layers: Vec<Layer>,
    typed: bool,
}

impl Glass {
    fn new(window: Window, size: Size) -> Self {
        let settings = app::settings();
        let pixels = Size::new(size.width as u32, size.height as u32);
        Glass {
            window,
            renderer: Renderer::new(settings.default_font, settings.default_text_size),
            cache: Some(Cache::default()),
            viewport: Viewport::with_physical_size(pixels, 1.0),
            pixels: vec![0; (pixels.width * pixels.height * 4) as usize],
            mask: Mask::new(pixels.width, pixels.height).expect("the size is no zero"),
            layers: Vec::new(),
            typed: false,
        }
    }

    /// The same with a field open and everything drawn once.
    fn typing(window: Window, size: Size) -> Self {
        let mut glass = Glass::new(window, size);
        let mut ui: Simulator<'_, Message> =
            Simulator::with_size(app::settings(), size, glass.window.view());
        let _ = ui.click(TYPED).expect("the temperature is seen");
        let messages: Vec<Message> = ui.into_messages().collect();
        for message in messages {
            let _ = glass.window.update(message);
        }
        glass.key();
        let _ = glass.frame();
        glass
    }

    /// Takes a typed character in: another text than before each time.
    fn key(&mut self) {
        self.typed = !self.typed;
        let text = if self.typed { "1251 ± 25 °C" } else { TYPED };
        let _ = self.window.update(Message::typed(text));
    }

    /// Builds and lays out what is seen.
    fn layout(&mut self) {
        let ui = UserInterface::build(
            self.window.view(),
            self.viewport.logical_size(),
            self.cache.take().unwrap_or_default(),
            &mut self.renderer,
        );
        self.cache = Some(ui.into_cache());
    }

    /// Builds, lays out and paints what changed; returns how many pixels.
    fn frame(&mut self) -> f32 {
        let theme = self.window.theme();
        let base = theme.base();
        let mut ui = UserInterface::build(
            self.window.view(),
            self.viewport.logical_size(),
            self.cache.take().unwrap_or_default(),
            &mut self.renderer,
        );
        let redraw = Event::Window(window::Event::RedrawRequested(time::Instant::now()));
        let cursor = mouse::Cursor::Unavailable;
        let _ = ui.update(
            &[redraw],
            cursor,
            &mut self.renderer,
            &mut clipboard::Null,
            &mut Vec::new(),
        );
        let style = Style {
            text_color: base.text_color,
        };
        ui.draw(&mut self.renderer, &theme, &style, cursor);
        self.cache = Some(ui.into_cache());
        self.paint(base.background_color)
    }

    /// Paints as the window's own surface does: only what differs.
    fn paint(&mut self, ground: iced::Color) -> f32 {
        let whole = Rectangle::with_size(self.viewport.logical_size());
        let layers = self.renderer.layers();
        let damage = if self.layers.is_empty() {
            vec![whole]
        } else {
            let changed = damage::diff(
                &self.layers,
                layers,
                |layer| vec![layer.bounds],
                Layer::damage,
            );
            damage::group(changed, whole)
        };
        self.layers = layers.to_vec();
        let size = self.viewport.physical_size();
        let mut pixels = PixmapMut::from_bytes(&mut self.pixels, size.width, size.height)
            .expect("the buffer has the size of the window");
        self.renderer
            .draw(&mut pixels, &mut self.mask, &self.viewport, &damage, ground);
        damage.iter().map(Rectangle::area).sum()
    }
}

/// The notebooks that are typed into.
fn works(cells: usize) -> Window {
    match cells {
        0 => preset::demo(),
        _ => preset::works(cells),
    }
}

/// From a notebook's text to its first pixels, bounds not yet drawn.
#[divan::bench]
fn first_frame_of_the_demo() -> f32 {
    let mut glass = Glass::new(preset::unsettled_demo(), COMMON);
    glass.frame()
}

mod a_typed_character {
    use super::{Bencher, COMMON, Glass, LARGE, works};

    /// From the key to the pixels, at 1440 × 900; 0 cells is the demo.
    #[divan::bench(args = [0, 200, 2000])]
    fn at_1440_by_900(bencher: Bencher<'_, '_>, cells: usize) {
        let mut glass = Glass::typing(works(cells), COMMON);
        bencher.bench_local(|| {
            glass.key();
            glass.frame()
        });
    }

    /// From the key to the pixels, at 2560 × 1440; 0 cells is the demo.
    #[divan::bench(args = [0, 200, 2000])]
    fn at_2560_by_1440(bencher: Bencher<'_, '_>, cells: usize) {
        let mut glass = Glass::typing(works(cells), LARGE);
        bencher.bench_local(|| {
            glass.key();
            glass.frame()
        });
    }

    /// Working the notebook out alone.
    #[divan::bench(args = [0, 200, 2000])]
    fn worked_out(bencher: Bencher<'_, '_>, cells: usize) {
        let mut glass = Glass::typing(works(cells), COMMON);
        bencher.bench_local(|| glass.key());
    }

    /// Building and laying out what is seen alone.
    #[divan::bench(args = [0, 200, 2000])]
    fn laid_out(bencher: Bencher<'_, '_>, cells: usize) {
        let mut glass = Glass::typing(works(cells), COMMON);
        bencher.bench_local(|| glass.layout());
    }

    /// A frame in which nothing changed.
    #[divan::bench(args = [0, 200, 2000])]
    fn drawn_again_unchanged(bencher: Bencher<'_, '_>, cells: usize) {
        let mut glass = Glass::typing(works(cells), COMMON);
        bencher.bench_local(|| glass.frame());
    }
}
