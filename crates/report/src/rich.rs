//! Text with the few styles that a results section needs.
//!
//! Wording that the program writes goes through [`Rich::parse`], a small notation. Text that comes
//! from a user (labels, names of columns and levels) goes through [`Rich::plain`], which knows no
//! notation, so that a level called `*x*` prints as `*x*`. There is no conversion from an owned
//! `String` on purpose: text made at run time has to say which of the two it is.

mod html;
mod markdown;
mod notation;
mod text;

pub(crate) use text::{printable, unicode_superscript};

/// Styled text: a list of runs.
///
/// Built from a small notation (the superscript and subscript marks of the wider Markdown family):
/// `*F*` is italic, `**x**` strong, `η^2^` superscript, `s~p~` subscript; a backslash takes the
/// next character as it is. A mark without its partner stands for itself, as does one that touches
/// a space on its inner side.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Rich {
    /// The runs, in order.
    pub runs: Vec<Run>,
}

/// A stretch of text in one style.
#[derive(Clone, Debug, PartialEq)]
pub struct Run {
    /// The text.
    pub text: String,
    /// Its style.
    pub style: Style,
}

/// The styles of a run.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Style {
    /// Upright.
    #[default]
    Plain,
    /// Italic, as for statistical symbols in Latin letters.
    Italic,
    /// Strong.
    Strong,
    /// Superscript.
    Superscript,
    /// Subscript.
    Subscript,
}

impl Rich {
    /// Text without any notation: every character stands for itself.
    pub fn plain(text: impl Into<String>) -> Self {
        let mut rich = Self::default();
        rich.push(text, Style::Plain);
        rich
    }

    /// Text in the notation above. Never fails: what is no notation is text.
    #[must_use]
    pub fn parse(notation: &str) -> Self {
        notation::parse(notation)
    }

    /// A sentence in the notation above with named slots: `{k}` takes the text given for `k`, with
    /// the styles that it has. A slot that nothing is given for stays as it is written.
    ///
    /// ```
    /// use tussock_report::rich::Rich;
    /// let sentence = Rich::fill(
    ///     "*M* difference, {a} minus {b}",
    ///     &[("a", Rich::plain("*starred*")), ("b", Rich::plain("fixed"))],
    /// );
    /// assert_eq!(sentence.text(), "M difference, *starred* minus fixed");
    /// ```
    #[must_use]
    pub fn fill(notation: &str, slots: &[(&str, Self)]) -> Self {
        notation::fill(&Self::parse(notation), slots)
    }

    /// The parts one after another with `separator`, in the notation above, between them.
    pub fn join(parts: impl IntoIterator<Item = Self>, separator: &str) -> Self {
        let separator = Self::parse(separator);
        let mut joined = Self::default();
        for (index, part) in parts.into_iter().enumerate() {
            if index > 0 {
                joined.append(separator.clone());
            }
            joined.append(part);
        }
        joined
    }

    /// This text and another after it.
    #[must_use]
    pub fn then(mut self, other: impl Into<Self>) -> Self {
        self.append(other.into());
        self
    }

    /// Adds another text at the end.
    pub fn append(&mut self, other: Self) {
        for run in other.runs {
            self.push(run.text, run.style);
        }
    }

    /// Adds a stretch of text at the end, joining it to the last run where the style is the same.
    pub fn push(&mut self, text: impl Into<String>, style: Style) {
        let text = text.into();
        if text.is_empty() {
            return;
        }
        match self.runs.last_mut() {
            Some(last) if last.style == style => last.text.push_str(&text),
            Some(_) | None => self.runs.push(Run { text, style }),
        }
    }

    /// Whether there is no text at all.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.runs.iter().all(|run| run.text.is_empty())
    }

    /// As HTML that is safe to put anywhere between two tags.
    #[must_use]
    pub fn html(&self) -> String {
        maud::Render::render(self).into_string()
    }

    /// As plain text on one line: superscripts and subscripts in Unicode where all their characters
    /// exist there, else after `^` or `_`; italics and strong text without marks.
    #[must_use]
    pub fn text(&self) -> String {
        text::text(self)
    }

    /// As Markdown (CommonMark with tables) on one line, with everything escaped that would
    /// otherwise be read as a mark, a link, a tag, a table's cell border or a formula.
    #[must_use]
    pub fn markdown(&self) -> String {
        markdown::markdown(self)
    }
}

/// Reads the notation of [`Rich::parse`].
impl From<&str> for Rich {
    fn from(notation: &str) -> Self {
        Self::parse(notation)
    }
}

impl FromIterator<Self> for Rich {
    fn from_iter<I: IntoIterator<Item = Self>>(parts: I) -> Self {
        let mut all = Self::default();
        for part in parts {
            all.append(part);
        }
        all
    }
}
