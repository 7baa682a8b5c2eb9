//! Colour decided once, messages, escaping of text that came from a drawing.

use std::io::{self, IsTerminal, Write};

use anstyle::{AnsiColor, Style};

use crate::report::plain;

/// Where results and messages go: results to standard output, all else to standard error.
pub struct Terminal {
    out: Box<dyn Write>,
    err: Box<dyn Write>,
    colour: bool,
}

impl Terminal {
    /// The program's own streams; colour only on a terminal, and never with `NO_COLOR`.
    pub fn standard() -> Self {
        let colour = io::stderr().is_terminal()
            && anstream::AutoStream::choice(&io::stderr()) != anstream::ColorChoice::Never;
        Self {
            out: Box::new(io::stdout()),
            err: Box::new(io::stderr()),
            colour,
        }
    }

    /// Other streams, without colour.
    pub fn to(out: Box<dyn Write>, err: Box<dyn Write>) -> Self {
        Self {
            out,
            err,
            colour: false,
        }
    }

    /// Whether messages are in colour.
    pub fn colour(&self) -> bool {
        self.colour
    }

    /// Writes a result. Who reads only its head has seen enough: a broken pipe is not an error.
    ///
    /// # Errors
    /// Standard output cannot be written, for another reason.
    pub fn result(&mut self, text: &str) -> io::Result<()> {
        match self
            .out
            .write_all(text.as_bytes())
            .and_then(|()| self.out.flush())
        {
            Err(error) if error.kind() == io::ErrorKind::BrokenPipe => Ok(()),
            other => other,
        }
    }

    /// Says how the work goes.
    pub fn progress(&mut self, text: &str) {
        self.message("", Style::new(), text);
    }

    /// Says what the reader should know although the work goes on.
    pub fn warning(&mut self, text: &str) {
        self.message("warning: ", AnsiColor::Yellow.on_default().bold(), text);
    }

    /// Says why something was not done.
    pub fn error(&mut self, text: &str) {
        self.message("error: ", AnsiColor::Red.on_default().bold(), text);
    }

    /// A message that is rendered already, in colour if [`Terminal::colour`] says so.
    pub fn rendered(&mut self, text: &str) {
        // Nowhere is left to say that standard error is closed.
        let _ = writeln!(self.err, "{text}");
    }

    fn message(&mut self, word: &str, style: Style, text: &str) {
        let text = escaped(text);
        if self.colour {
            self.rendered(&format!("{style}{word}{style:#}{text}"));
        } else {
            self.rendered(&format!("{word}{text}"));
        }
    }
}

/// A text of several lines as a terminal may show it: line ends stay, other control characters are written out.
pub fn escaped(text: &str) -> String {
    let lines: Vec<String> = text.split('\n').map(plain).collect();
    lines.join("\n")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_text_from_a_drawing_cannot_move_the_cursor() {
        let shown = escaped("layer \u{1b}[2J\nnext\r\u{7}");
        assert!(!shown.contains(['\u{1b}', '\r', '\u{7}']), "{shown:?}");
        assert_eq!(shown.lines().count(), 2);
    }
}
