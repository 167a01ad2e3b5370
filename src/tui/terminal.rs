//! Taking the terminal over and giving it back, also after a panic.
use crossterm::cursor::Show;
use crossterm::event::{DisableBracketedPaste, DisableMouseCapture, EnableBracketedPaste, EnableMouseCapture};
use crossterm::execute;
use crossterm::terminal::{EnterAlternateScreen, LeaveAlternateScreen, disable_raw_mode, enable_raw_mode};
use ratatui::Terminal;
use ratatui::backend::CrosstermBackend;
use std::io::{self, BufWriter, Stdout, stdout};
use std::mem::ManuallyDrop;
use std::sync::atomic::{AtomicBool, Ordering};
use std::thread::{self, ThreadId};

/// The terminal this program draws on.
pub type Screen = Terminal<CrosstermBackend<BufWriter<Stdout>>>;

static TAKEN: AtomicBool = AtomicBool::new(false);

/// Holds the terminal; gives it back when dropped.
///
/// The drawing library would show the cursor on its own when dropped, and panic where the terminal and with it standard
/// error have gone away; [`restore`] does that step, so its drop is left out.
#[derive(Debug)]
pub struct Guard {
    screen: ManuallyDrop<Screen>,
}

impl Guard {
    /// Enters raw mode, the alternate screen, mouse capture and bracketed paste.
    ///
    /// # Errors
    /// When the terminal refuses; whatever was entered is left again.
    pub fn take() -> io::Result<Self> {
        set_panic_hook(thread::current().id());
        TAKEN.store(true, Ordering::SeqCst);
        let entered = enable_raw_mode().and_then(|()| {
            execute!(stdout(), EnterAlternateScreen, EnableMouseCapture, EnableBracketedPaste)?;
            Terminal::new(CrosstermBackend::new(BufWriter::with_capacity(1 << 16, stdout())))
        });
        match entered {
            Ok(screen) => Ok(Self { screen: ManuallyDrop::new(screen) }),
            Err(error) => {
                restore();
                Err(error)
            }
        }
    }

    /// The terminal.
    pub fn screen(&mut self) -> &mut Screen {
        &mut self.screen
    }
}

impl Drop for Guard {
    fn drop(&mut self) {
        restore();
    }
}

/// Gives the terminal back, once; each step is tried even when one before it failed.
pub fn restore() {
    if TAKEN.swap(false, Ordering::SeqCst) {
        let _ = execute!(stdout(), DisableBracketedPaste);
        let _ = execute!(stdout(), DisableMouseCapture);
        let _ = execute!(stdout(), LeaveAlternateScreen, Show);
        let _ = disable_raw_mode();
    }
}

/// Gives line editing and echo back, which needs no output; the first step where output may be held up.
pub fn restore_input() {
    if TAKEN.load(Ordering::SeqCst) {
        let _ = disable_raw_mode();
    }
}

/// Restores before the hook that was installed earlier prints; a panic of another thread prints nothing over the screen,
/// whoever waits for that thread tells the user.
fn set_panic_hook(screen_thread: ThreadId) {
    let earlier = std::panic::take_hook();
    std::panic::set_hook(Box::new(move |info| {
        if thread::current().id() == screen_thread {
            restore();
        } else if TAKEN.load(Ordering::SeqCst) {
            return;
        }
        earlier(info);
    }));
}
