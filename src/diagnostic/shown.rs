//! A fault drawn beneath the line it stands in.

use std::ops::Range;

use annotate_snippets::{
    AnnotationKind, Group, Level, Origin, Renderer, Snippet, renderer::DecorStyle,
};

use crate::diagnostic::Fault;

/// Whether escape codes for colour are written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Colour {
    /// Plain text: files, pipes, `NO_COLOR`.
    Plain,
    /// ANSI escape codes: a terminal.
    Ansi,
}

/// A fault against the text it is in: what is wrong, `path:line:column`, the line with the place
/// marked, and the fix. Ends without a line break.
///
/// Columns count characters from 1. The span may be anything: it is brought inside the text and onto
/// whole characters, only its first line is marked, and a long line is cut around the mark.
pub fn shown(fault: &Fault, path: &str, text: &str, colour: Colour) -> String {
    let place = Place::of(&fault.span, text);
    let title = Level::ERROR
        .primary_title(fault.message.as_str())
        .id(fault.code);
    let mut group = Group::with_title(title);
    if text.trim().is_empty() {
        group = group.element(Origin::path(path));
    } else {
        group = group.element(
            Snippet::source(place.source.as_str())
                .path(path)
                .line_start(place.line)
                .annotation(
                    AnnotationKind::Primary
                        .span(place.mark.clone())
                        .label(fault.expected.as_str()),
                ),
        );
    }
    if let Some(help) = &fault.help {
        group = group.element(Level::HELP.message(help.as_str()));
    }
    let renderer = match colour {
        Colour::Plain => Renderer::plain(),
        Colour::Ansi => Renderer::styled().hyperlink(false),
    };
    renderer.decor_style(DecorStyle::Ascii).render(&[group])
}

/// One line of the text, with the part of it that is marked.
#[derive(Debug, PartialEq)]
struct Place {
    /// Line, from 1.
    line: usize,
    /// The line, with a space for each tab or control sign, so that the mark stands below its
    /// place on every terminal.
    source: String,
    /// Bytes of the line to mark.
    mark: Range<usize>,
}

impl Place {
    fn of(span: &Range<usize>, text: &str) -> Self {
        let start = whole_character(text, span.start);
        let before = &text[..start];
        let line_start = before.rfind('\n').map_or(0, |at| at + 1);
        let line_end = text[start..].find('\n').map_or(text.len(), |at| start + at);
        let end = whole_character(text, span.end).clamp(start, line_end);
        let mut source = visible(&text[line_start..start]);
        let mark_start = source.len();
        source.push_str(&visible(&text[start..end]));
        let mark = mark_start..source.len();
        source.push_str(&visible(&text[end..line_end]));
        source.truncate(source.trim_end().len().max(mark.end));
        Self {
            line: before.matches('\n').count() + 1,
            source,
            mark,
        }
    }
}

/// The start of the character that holds byte `at`, or the end of the text.
fn whole_character(text: &str, at: usize) -> usize {
    (0..=at.min(text.len()))
        .rev()
        .find(|&at| text.is_char_boundary(at))
        .unwrap_or(0)
}

fn visible(text: &str) -> String {
    text.chars()
        .map(|sign| if sign.is_control() { ' ' } else { sign })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    fn fault(span: Range<usize>) -> Fault {
        Fault {
            code: "unit/not-a-quantity",
            message: "`6 N` is a force, and a length is expected".into(),
            span,
            expected: "expected a length".into(),
            help: Some("write a length such as `4 mm`".into()),
        }
    }

    #[test]
    fn a_fault_stands_beneath_its_line() {
        let text = "[[plate]]\nthickness = \"6 N\"\n";
        let start = text.find("\"6").unwrap();
        assert_eq!(
            shown(
                &fault(start..start + 5),
                "joints/lid.toml",
                text,
                Colour::Plain
            ),
            "\
error[unit/not-a-quantity]: `6 N` is a force, and a length is expected
 --> joints/lid.toml:2:13
  |
2 | thickness = \"6 N\"
  |             ^^^^^ expected a length
  |
  = help: write a length such as `4 mm`"
        );
    }

    #[test]
    fn an_empty_file_shows_its_path_alone() {
        let shown = shown(&fault(0..9), "joints/lid.toml", "", Colour::Plain);
        assert!(shown.contains("--> joints/lid.toml\n"), "{shown}");
        assert!(!shown.contains('^'), "{shown}");
    }

    #[test]
    fn columns_count_characters() {
        let text = "roughness = \"Ra 0.8 µm\"; x";
        let start = text.rfind('x').unwrap();
        let shown = shown(&fault(start..start + 1), "a", text, Colour::Plain);
        assert!(shown.contains("a:1:26"), "{shown}");
    }

    #[test]
    fn long_lines_are_cut_about_their_mark() {
        let text = format!("{}here{}", "x".repeat(5000), "y".repeat(5000));
        let shown = shown(&fault(5000..5004), "a", &text, Colour::Plain);
        assert!(shown.contains("a:1:5001"), "{shown}");
        assert!(shown.contains("here"), "{shown}");
        // The renderer's width is 140 columns; the line number and cut marks add a few.
        assert!(
            shown.lines().all(|line| line.chars().count() < 200),
            "{shown}"
        );
    }

    #[test]
    fn only_the_first_line_of_a_long_span_is_marked() {
        let shown = shown(
            &fault(4..30),
            "a",
            "one two\nthree\nfour five six\n",
            Colour::Plain,
        );
        assert!(shown.contains("^^^ expected"), "{shown}");
        assert!(!shown.contains("three"), "{shown}");
    }

    #[test]
    fn colour_is_written_on_request_alone() {
        let plain = shown(&fault(0..1), "a", "b = 1", Colour::Plain);
        let ansi = shown(&fault(0..1), "a", "b = 1", Colour::Ansi);
        assert!(!plain.contains('\u{1b}') && ansi.contains('\u{1b}'));
    }

    proptest! {
        #![proptest_config(crate::fixed_cases(256))]

        #[test]
        fn any_span_on_any_text_is_shown(text in "(?s).{0,60}", start in 0_usize..90, length in 0_usize..90) {
            let shown = shown(&fault(start..start + length), "a", &text, Colour::Plain);
            prop_assert!(shown.contains("expected"));
        }

        #[test]
        fn a_reversed_span_is_shown(start in 0_usize..20, end in 0_usize..20) {
            shown(&fault(start..end), "a", "µm = \"4\"\r\nb", Colour::Plain);
        }
    }
}
