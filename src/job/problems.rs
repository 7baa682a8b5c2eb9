//! What is wrong with a job file: every mistake, each shown at its line.

use std::fmt;
use std::ops::Range;

use annotate_snippets::{AnnotationKind, Level, Renderer, Snippet};

/// Most mistakes that are shown in full; a file that is no job file at all may hold thousands.
const SHOWN: usize = 30;

/// One mistake.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Problem {
    /// Where, in bytes of the file.
    pub span: Range<usize>,
    /// What was found.
    pub found: String,
    /// What was expected.
    pub expected: String,
    /// What to type.
    pub remedy: String,
}

/// All mistakes of one job file.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Problems {
    file_name: String,
    text: String,
    list: Vec<Problem>,
}

impl Problems {
    /// Orders the mistakes by their place.
    pub(super) fn new(file_name: &str, text: &str, mut list: Vec<Problem>) -> Self {
        for problem in &mut list {
            problem.span = within(text, &problem.span);
        }
        list.sort_by_key(|problem| (problem.span.start, problem.span.end));
        Self {
            file_name: file_name.to_owned(),
            text: text.to_owned(),
            list,
        }
    }

    /// The mistakes, in the order of the file.
    pub fn list(&self) -> &[Problem] {
        &self.list
    }

    /// Line of a mistake, from 1.
    pub fn line(&self, problem: &Problem) -> usize {
        let before = self.text.get(..problem.span.start).unwrap_or_default();
        before.matches('\n').count() + 1
    }

    /// All mistakes as text, each with its line of the file, in colour or plain.
    pub fn render(&self, colour: bool) -> String {
        let renderer = if colour {
            Renderer::styled()
        } else {
            Renderer::plain()
        };
        let mut pages: Vec<String> = self
            .list
            .iter()
            .take(SHOWN)
            .map(|problem| {
                let snippet = Snippet::source(&self.text)
                    .path(&self.file_name)
                    .annotation(
                        AnnotationKind::Primary
                            .span(problem.span.clone())
                            .label(&problem.expected),
                    );
                renderer.render(&[Level::ERROR
                    .primary_title(&problem.found)
                    .element(snippet)
                    .element(Level::HELP.message(&problem.remedy))])
            })
            .collect();
        if self.list.len() > SHOWN {
            pages.push(format!("and {} more", self.list.len() - SHOWN));
        }
        pages.push(match self.list.len() {
            1 => format!("1 mistake in {}", self.file_name),
            count => format!("{count} mistakes in {}", self.file_name),
        });
        pages.join("\n\n")
    }
}

impl fmt::Display for Problems {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        out.write_str(&self.render(false))
    }
}

impl std::error::Error for Problems {}

/// The span moved onto character boundaries inside the text.
fn within(text: &str, span: &Range<usize>) -> Range<usize> {
    let floor = |mut at: usize| {
        at = at.min(text.len());
        while !text.is_char_boundary(at) {
            at -= 1;
        }
        at
    };
    let start = floor(span.start);
    start..floor(span.end).max(start)
}
