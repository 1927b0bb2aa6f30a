//! A window under the hand: what is clicked, typed and pressed is followed as
//! the real program does, but for what a display is needed for.

use std::pin::Pin;
use std::sync::{Arc, Mutex};
use std::task::{Context, Poll, Wake, Waker};
use std::thread::{self, Thread};

use farglow::app::{self, Message, Window};
use farglow::notebook::Notebook;
use iced::futures::Stream;
use iced::keyboard::key::{Code, Named, NativeCode, Physical};
use iced::keyboard::{Event as Keys, Key, Location, Modifiers};
use iced::{Event, Point, Size, mouse};
use iced_test::runtime::{Action, task};
use iced_test::{Simulator, selector};

/// The size of the window, in logical points.
pub const SIZE: Size = Size::new(1440.0, 900.0);

/// A window under the hand.
pub struct Desk {
    pub window: Window,
    size: Size,
}

impl Desk {
    pub fn new(window: Window) -> Self {
        Desk { window, size: SIZE }
    }

    /// A window high enough to show every card of a template.
    pub fn tall(window: Window) -> Self {
        let mut desk = Desk {
            window,
            size: Size::new(1440.0, 4000.0),
        };
        desk.sees(4000.0);
        desk
    }

    /// Tells the column of cells how much of it is seen, as scrolling does.
    fn sees(&mut self, height: f32) {
        let _ = self.window.update(Message::seen(0.0, height));
    }

    fn ui(&self) -> Simulator<'_, Message> {
        Simulator::with_size(app::settings(), self.size, self.window.view())
    }

    fn take(&mut self, messages: Vec<Message>) {
        for message in messages {
            let _ = self.window.update(message);
        }
    }

    /// Clicks on the first text that reads so.
    pub fn click(&mut self, text: &str) {
        let mut ui = self.ui();
        if let Err(error) = ui.click(text) {
            panic!(
                "`{text}` cannot be clicked: {error}; shown: {:#?}",
                self.shown()
            );
        }
        let messages: Vec<Message> = ui.into_messages().collect();
        self.take(messages);
    }

    /// Clicks on the last text that reads so.
    pub fn click_last(&mut self, text: &str) {
        let count = self.shown().iter().filter(|shown| *shown == text).count();
        let mut left = count;
        let mut ui = self.ui();
        let found = ui.click(move |candidate: selector::Candidate<'_>| match &candidate {
            selector::Candidate::Text { content, .. } if *content == text => {
                left -= 1;
                (left == 0).then(|| selector::Target::from(candidate))
            }
            _ => None,
        });
        if let Err(error) = found {
            panic!("`{text}` cannot be clicked: {error}");
        }
        let messages: Vec<Message> = ui.into_messages().collect();
        self.take(messages);
    }

    /// Clicks on the first text that reads so, and follows what comes of it on
    /// other threads until nothing is left.
    pub fn click_and_wait(&mut self, text: &str) {
        let mut ui = self.ui();
        if let Err(error) = ui.click(text) {
            panic!(
                "`{text}` cannot be clicked: {error}; shown: {:#?}",
                self.shown()
            );
        }
        let mut left: Vec<Message> = ui.into_messages().collect();
        while !left.is_empty() {
            let message = left.remove(0);
            let task = self.window.update(message);
            left.extend(outputs(task));
        }
    }

    /// Presses the left button at one place of the window, moves the pointer to
    /// another and lets go.
    pub fn drag(&mut self, from: Point, to: Point) {
        let mut ui = self.ui();
        let at = |position: Point| Event::Mouse(mouse::Event::CursorMoved { position });
        ui.point_at(from);
        let _ = ui.simulate([
            at(from),
            Event::Mouse(mouse::Event::ButtonPressed(mouse::Button::Left)),
        ]);
        ui.point_at(to);
        let _ = ui.simulate([
            at(to),
            Event::Mouse(mouse::Event::ButtonReleased(mouse::Button::Left)),
        ]);
        let messages: Vec<Message> = ui.into_messages().collect();
        self.take(messages);
    }

    /// Puts the cursor at the end of the prose of this id, and types: a line
    /// break is the Enter key.
    pub fn write_prose(&mut self, id: &'static str, text: &str) {
        let mut ui = self.ui();
        if let Err(error) = ui.click(selector::id(id)) {
            panic!(
                "the prose {id} is not open: {error}; shown: {:#?}",
                self.shown()
            );
        }
        let end = pressed(Key::Named(Named::End), Modifiers::CTRL, None);
        let keys = text.chars().map(|letter| match letter {
            '\n' => named(Named::Enter),
            letter => lettered(letter),
        });
        let _ = ui.simulate(std::iter::once(end).chain(keys));
        let messages: Vec<Message> = ui.into_messages().collect();
        self.take(messages);
    }

    /// Brings the window to the front again, as after working elsewhere.
    pub fn comes_back(&mut self) {
        let _ = self.window.update(Message::Focused);
    }

    /// Clicks into the field of this id and types letters, one by one, each
    /// followed before the next.
    pub fn type_into(&mut self, id: &'static str, old: &str, text: &str) {
        // The typing replaces what was there, as the real window selects it.
        for _ in 0..old.chars().count() {
            self.keys_into(id, &[named(Named::Backspace)]);
        }
        for letter in text.chars() {
            self.keys_into(id, &[lettered(letter)]);
        }
    }

    /// Clicks at the end of a field, and presses keys in it.
    pub fn keys_into(&mut self, id: &'static str, events: &[Event]) {
        let mut ui = self.ui();
        if let Err(error) = ui.click(selector::id(id)) {
            panic!(
                "the field {id} is not open: {error}; shown: {:#?}",
                self.shown()
            );
        }
        let end = named(Named::End);
        let _ = ui.simulate(std::iter::once(end).chain(events.iter().cloned()));
        let messages: Vec<Message> = ui.into_messages().collect();
        self.take(messages);
    }

    /// Puts a text into the open field as one piece, in place of what is there.
    pub fn paste(&mut self, text: &str) {
        let _ = self.window.update(Message::typed(text));
    }

    /// Presses a key that no field waits for.
    pub fn press(&mut self, key: Key, modifiers: Modifiers) {
        let mut ui = self.ui();
        let _ = ui.simulate([pressed(key, modifiers, None)]);
        let messages: Vec<Message> = ui.into_messages().collect();
        self.take(messages);
    }

    pub fn command(&mut self, letter: char) {
        self.press(
            Key::Character(letter.to_string().into()),
            Modifiers::COMMAND,
        );
    }

    /// Opens the field that reads so, and types another text into it.
    pub fn change(&mut self, from: &str, to: &str) {
        self.click(from);
        self.type_into(app::TYPING, from, to);
        self.keys_into(app::TYPING, &[named(Named::Enter)]);
        self.window.settle();
    }

    /// Every text that is shown, from top to bottom.
    pub fn shown(&self) -> Vec<String> {
        texts(self.window.view(), self.size)
    }

    /// Returns whether a text that holds these words is shown.
    pub fn shows(&self, words: &str) -> bool {
        self.shown().iter().any(|text| text.contains(words))
    }

    pub fn expect(&self, words: &str) {
        assert!(
            self.shows(words),
            "`{words}` is not shown: {:#?}",
            self.shown()
        );
    }

    pub fn expect_not(&self, words: &str) {
        assert!(
            !self.shows(words),
            "`{words}` is shown: {:#?}",
            self.shown()
        );
    }

    pub fn notebook(&self) -> &Notebook {
        self.window.notebook()
    }

    pub fn text(&self, cell: &str, field: &str) -> Option<&str> {
        let place = self.notebook().find(cell)?;
        self.notebook().cells[place].text(field)
    }

    pub fn snapshot(&self) -> iced_test::simulator::Snapshot {
        self.ui()
            .snapshot(&self.window.theme())
            .expect("the window can be drawn without a display")
    }
}

/// Wakes the thread that waits.
struct Waking(Thread);

impl Wake for Waking {
    fn wake(self: Arc<Self>) {
        self.0.unpark();
    }
}

/// Waits for everything that a task brings about.
fn outputs(task: iced::Task<Message>) -> Vec<Message> {
    let Some(mut stream) = task::into_stream(task) else {
        return Vec::new();
    };
    let waker = Waker::from(Arc::new(Waking(thread::current())));
    let mut context = Context::from_waker(&waker);
    let mut messages = Vec::new();
    loop {
        match Pin::new(&mut stream).poll_next(&mut context) {
            Poll::Ready(Some(Action::Output(message))) => messages.push(message),
            // What only a display can do.
            Poll::Ready(Some(_)) => {}
            Poll::Ready(None) => return messages,
            Poll::Pending => thread::park(),
        }
    }
}

/// The texts of an element, in the order in which it holds them.
fn texts(element: iced::Element<'_, Message>, size: Size) -> Vec<String> {
    let mut ui: Simulator<'_, Message> = Simulator::with_size(app::settings(), size, element);
    let found = Arc::new(Mutex::new(Vec::new()));
    let seen = Arc::clone(&found);
    // A selector that takes nothing, and so sees everything.
    let _ = ui.find(move |candidate: selector::Candidate<'_>| {
        let text = match candidate {
            selector::Candidate::Text { content, .. } => Some(content.to_owned()),
            selector::Candidate::TextInput { state, .. } => Some(state.text().to_owned()),
            _ => None,
        };
        if let (Some(text), Ok(mut seen)) = (text, seen.lock()) {
            seen.push(text);
        }
        None::<selector::Target>
    });
    drop(ui);
    let found = found.lock().expect("nobody else holds it");
    found.clone()
}

pub fn named(key: Named) -> Event {
    pressed(Key::Named(key), Modifiers::empty(), None)
}

fn lettered(letter: char) -> Event {
    let text = letter.to_string();
    pressed(
        Key::Character(text.as_str().into()),
        Modifiers::empty(),
        Some(text),
    )
}

fn pressed(key: Key, modifiers: Modifiers, text: Option<String>) -> Event {
    let physical_key = match &key {
        Key::Named(Named::Enter) => Physical::Code(Code::Enter),
        _ => Physical::Unidentified(NativeCode::Unidentified),
    };
    Event::Keyboard(Keys::KeyPressed {
        key: key.clone(),
        modified_key: key,
        physical_key,
        location: Location::Standard,
        modifiers,
        repeat: false,
        text: text.map(Into::into),
    })
}
