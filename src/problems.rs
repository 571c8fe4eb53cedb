//! What is wrong with a file of the user, where it stands, and what would be right.

use std::fmt;
use std::ops::Range;

use annotate_snippets::renderer::DecorStyle;
use annotate_snippets::{AnnotationKind, Level, Origin, Renderer, Snippet};
use toml::Spanned;
use toml::de::DeTable;

use crate::units::harmless;

/// The most problems that are kept of one file; nobody reads more, and a hostile file could ask
/// for hundreds of thousands.
const KEPT: usize = 100;
/// The longest piece of a line that is shown, in characters.
const SHOWN: usize = 200;

/// One thing that is wrong with a file.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Problem {
    /// Bytes of the file that it concerns.
    pub span: Range<usize>,
    /// Line where they begin, counted from 1.
    pub line: usize,
    /// Character of that line where they begin, counted from 1.
    pub column: usize,
    /// What is wrong.
    pub message: String,
    /// What would be right, where that can be said.
    pub help: Option<String>,
}

/// Everything that is wrong with a file, in the order in which it stands there.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct FileErrors {
    file: String,
    problems: Vec<Problem>,
    /// The line of each problem, as it may be shown.
    lines: Vec<Shown>,
    more: usize,
}

/// A line of the file with what it points at, cut to a length that can be shown.
#[derive(Debug, Clone, PartialEq, Eq)]
struct Shown {
    text: String,
    mark: Range<usize>,
    /// Whether the line begins before what is shown.
    cut: bool,
}

impl FileErrors {
    /// The problems: at least one, at most a hundred.
    #[must_use]
    pub fn problems(&self) -> &[Problem] {
        &self.problems
    }

    /// Name of the file as it was given.
    #[must_use]
    pub fn file_name(&self) -> &str {
        &self.file
    }

    /// How many further problems the file has beyond those kept.
    #[must_use]
    pub fn more(&self) -> usize {
        self.more
    }

    /// Every problem with its place (`file:line:column`), its line and what would be right, for
    /// reading on a terminal; `colour` adds the terminal's colour codes.
    #[must_use]
    pub fn render(&self, colour: bool) -> String {
        let renderer = if colour { Renderer::styled() } else { Renderer::plain() };
        let renderer = renderer.decor_style(DecorStyle::Ascii);
        let mut blocks: Vec<String> = self
            .problems
            .iter()
            .zip(&self.lines)
            .map(|(problem, shown)| {
                let title = Level::ERROR.primary_title(problem.message.as_str());
                let snippet = Snippet::source(shown.text.as_str())
                    .line_start(problem.line)
                    .annotation(AnnotationKind::Primary.span(shown.mark.clone()));
                let group = if shown.cut {
                    // The column on what is shown is not the column in the file.
                    let place = Origin::path(self.file.as_str()).line(problem.line);
                    title.element(place.char_column(problem.column)).element(snippet)
                } else {
                    title.element(snippet.path(self.file.as_str()))
                };
                let group = match &problem.help {
                    Some(help) => group.element(Level::HELP.message(help.as_str())),
                    None => group,
                };
                renderer.render(&[group])
            })
            .collect();
        if self.more > 0 {
            blocks.push(format!("and {} more problems in {}", self.more, self.file));
        }
        blocks.join("\n\n")
    }
}

/// The text that `bytes` are, of which no more were read than one past `most`.
///
/// # Errors
/// The byte at which they stop being UTF-8 text. That the end of what was read goes through a
/// character is none: such a text is too long, which its reader will say.
pub fn text_of(bytes: Vec<u8>, most: usize) -> Result<String, usize> {
    let cut = bytes.len() > most;
    String::from_utf8(bytes).or_else(|error| {
        let wrong = error.utf8_error();
        if cut && wrong.error_len().is_none() {
            return Ok(String::from_utf8_lossy(error.as_bytes()).into_owned());
        }
        Err(wrong.valid_up_to())
    })
}

impl fmt::Display for FileErrors {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        formatter.write_str(&self.render(false))
    }
}

impl std::error::Error for FileErrors {}

/// Gathers the problems of a file while it is read.
#[derive(Default)]
pub(crate) struct Problems {
    found: Vec<(Range<usize>, Wrong)>,
    dropped: usize,
}

/// What is wrong and what would be right, before its place is known.
pub(crate) struct Wrong {
    message: String,
    help: Option<String>,
}

impl Wrong {
    /// Something wrong of which the message says all. What it repeats of the file is made harmless.
    pub(crate) fn new(message: impl AsRef<str>) -> Self {
        Self { message: message.as_ref().chars().map(harmless).collect(), help: None }
    }

    /// The same with what would be right.
    pub(crate) fn help(self, help: impl AsRef<str>) -> Self {
        Self { help: Some(help.as_ref().chars().map(harmless).collect()), ..self }
    }
}

impl Problems {
    /// Notes a problem of the bytes in `span`.
    pub(crate) fn add(&mut self, span: Range<usize>, wrong: Wrong) {
        // Room to sort in, since the file is not read in the order in which it is written.
        if self.found.len() < 100 * KEPT { self.found.push((span, wrong)) } else { self.dropped += 1 }
    }

    /// The tables of a TOML text; `None` when its form is wrong, every place of which is noted.
    /// `what` is what the text should be, as "a design file".
    pub(crate) fn toml<'a>(&mut self, text: &'a str, what: &str) -> Option<Spanned<DeTable<'a>>> {
        let (table, mut errors) = DeTable::parse_recoverable(text);
        let form_is_right = errors.is_empty();
        errors.sort_by_key(|error| error.span().map(|span| span.start));
        let mut last: Option<usize> = None;
        for error in errors {
            let span = error.span().unwrap_or(0..0);
            // What follows on the same line is mostly the parser's confusion after the first.
            let same_line = |last| text.get(last..span.start).is_some_and(|between| !between.contains('\n'));
            if last.is_some_and(same_line) {
                continue;
            }
            last = Some(span.start);
            let says = error.message();
            let wrong = Wrong::new(format!("this is not TOML, the form of {what}: {says}"));
            let wrong = if says.contains("must be quoted") {
                wrong.help("what is no plain number stands in quotes: \"140 mm\"")
            } else if says.contains("duplicate key") {
                wrong.help("it stands further up already: keep one of the two")
            } else {
                wrong
            };
            self.add(span, wrong);
        }
        form_is_right.then_some(table)
    }

    /// Whether nothing was wrong.
    pub(crate) fn is_empty(&self) -> bool {
        self.found.is_empty()
    }

    /// The report on `source`, a file called `file`.
    pub(crate) fn report(mut self, source: &str, file: &str) -> FileErrors {
        self.found.sort_by_key(|(span, _)| (span.start, span.end));
        let more = self.dropped + self.found.len().saturating_sub(KEPT);
        self.found.truncate(KEPT);
        let mut place = Place::start(source);
        let (mut problems, mut lines) = (Vec::new(), Vec::new());
        for (span, Wrong { message, help }) in self.found {
            place.advance(span.start);
            lines.push(place.shown(span.end));
            problems.push(Problem { span, line: place.line, column: place.column(), message, help });
        }
        FileErrors { file: file.chars().map(harmless).collect(), problems, lines, more }
    }
}

/// A place in a file that moves forward only, so that a long file is walked once.
struct Place<'a> {
    source: &'a str,
    at: usize,
    line: usize,
    line_start: usize,
}

impl<'a> Place<'a> {
    fn start(source: &'a str) -> Self {
        Self { source, at: 0, line: 1, line_start: 0 }
    }

    fn advance(&mut self, to: usize) {
        let to = self.source.floor_char_boundary(to);
        let passed = self.source.get(self.at..to).unwrap_or("");
        self.line += passed.bytes().filter(|&byte| byte == b'\n').count();
        if let Some(end) = passed.rfind('\n') {
            self.line_start = self.at + end + 1;
        }
        self.at = self.at.max(to);
    }

    fn before(&self) -> &'a str {
        self.source.get(self.line_start..self.at).unwrap_or("")
    }

    fn column(&self) -> usize {
        self.before().chars().count() + 1
    }

    /// The line, or of a very long one what lies about the mark.
    fn shown(&self, end: usize) -> Shown {
        let rest = self.source.get(self.at..).unwrap_or("");
        let line_rest = rest.split('\n').next().unwrap_or("").trim_end_matches('\r');
        let marked_bytes = line_rest.floor_char_boundary(end.saturating_sub(self.at));
        let (marked, after) = line_rest.split_at_checked(marked_bytes).unwrap_or((line_rest, ""));
        let before = self.before();
        let dropped = before.chars().count().saturating_sub(SHOWN);
        let mut text: String = before.chars().skip(dropped).map(printable).collect();
        let start = text.len();
        text.extend(marked.chars().take(SHOWN).map(printable));
        let mark = start..text.len();
        text.extend(after.chars().take(SHOWN).map(printable));
        Shown { text, mark, cut: dropped > 0 }
    }
}

/// Nothing of the file may reach the terminal as a command; a tab is drawn as blanks anyway.
fn printable(character: char) -> char {
    if character == '\t' { character } else { harmless(character) }
}
