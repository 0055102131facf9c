//! Text with the few styles that a results section needs.

/// Styled text: a list of runs.
///
/// Built from a small notation (the superscript and subscript marks of the wider Markdown family):
/// `*F*` is italic, `**x**` strong, `η^2^` superscript, `s~p~` subscript; a backslash takes the
/// next character as it is.
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
