//! Styled text as HTML.

use maud::{Markup, Render, html};

use super::{Rich, Run, Style, printable};

/// Without this a raised or lowered figure pushes the lines of a paragraph apart.
const ON_THE_LINE: &str = "line-height:0;font-size:.75em";

impl Render for Rich {
    fn render(&self) -> Markup {
        html! { @for run in &self.runs { (run) } }
    }
}

impl Render for Run {
    fn render(&self) -> Markup {
        let text = printable(&self.text);
        html! {
            @match self.style {
                Style::Plain => { (text) }
                Style::Italic => { i { (text) } }
                Style::Strong => { strong { (text) } }
                Style::Superscript => { sup style=(ON_THE_LINE) { (text) } }
                Style::Subscript => { sub style=(ON_THE_LINE) { (text) } }
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn each_style_has_its_tag() {
        assert_eq!(
            Rich::parse("*F*, η^2^, s~p~, **x**").html(),
            "<i>F</i>, η<sup style=\"line-height:0;font-size:.75em\">2</sup>, \
             s<sub style=\"line-height:0;font-size:.75em\">p</sub>, <strong>x</strong>"
        );
    }

    #[test]
    fn text_cannot_open_a_tag_or_an_entity() {
        assert_eq!(
            Rich::plain("<script>alert(\"1\")</script> & &lt; *x*").html(),
            "&lt;script&gt;alert(&quot;1&quot;)&lt;/script&gt; &amp; &amp;lt; *x*"
        );
    }
}
