//! What a key of an on-screen keypad does to the text of a field, at the caret. Pure, so that nothing of a half-typed figure is lost
//! by it.

use super::DecimalMark;

/// A key.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stroke {
    /// A digit, 0 to 9; another number is taken by its last digit.
    Digit(u8),
    /// The decimal mark of the settings.
    Mark(DecimalMark),
    /// Takes away what is picked out, else the character before the caret.
    Delete,
    /// Turns the sign of the figure.
    Sign,
}

/// Minus signs that a field takes.
const MINUS: [char; 3] = ['-', '\u{2212}', '\u{2013}'];

/// The text and the caret after a key. `from` and `to` are where the picked-out part begins and ends, in characters; equal where only
/// a caret stands. Places beyond the text are its end.
#[must_use]
pub fn press(text: &str, from: usize, to: usize, stroke: Stroke) -> (String, usize) {
    let letters: Vec<char> = text.chars().collect();
    let to = to.min(letters.len());
    let from = from.min(to);
    let put = |piece: &str, from: usize| {
        let head: String = letters.iter().take(from).collect();
        let tail: String = letters.iter().skip(to).collect();
        (format!("{head}{piece}{tail}"), from + piece.chars().count())
    };
    match stroke {
        Stroke::Digit(digit) => put(&(digit % 10).to_string(), from),
        Stroke::Mark(mark) => put(
            match mark {
                DecimalMark::Point => ".",
                DecimalMark::Comma => ",",
            },
            from,
        ),
        Stroke::Delete if from == to => put("", from.saturating_sub(1)),
        Stroke::Delete => put("", from),
        Stroke::Sign => {
            let blanks = letters
                .iter()
                .take_while(|letter| letter.is_whitespace())
                .count();
            let is_minus = letters
                .get(blanks)
                .is_some_and(|letter| MINUS.contains(letter));
            let head: String = letters.iter().take(blanks).collect();
            if is_minus {
                let tail: String = letters.iter().skip(blanks + 1).collect();
                let caret = if to > blanks { to - 1 } else { to };
                (format!("{head}{tail}"), caret)
            } else {
                let tail: String = letters.iter().skip(blanks).collect();
                (format!("{head}-{tail}"), to.max(blanks) + 1)
            }
        }
    }
}

#[cfg(all(test, not(target_arch = "wasm32")))]
mod tests {
    use super::*;
    use crate::quantity::{Kind, Unit, parse};
    use proptest::prelude::*;

    fn typed(strokes: &[Stroke]) -> String {
        let mut text = String::new();
        let mut caret = 0;
        for stroke in strokes {
            (text, caret) = press(&text, caret, caret, *stroke);
        }
        text
    }

    #[test]
    fn a_figure_is_typed_key_by_key() {
        use Stroke::{Delete, Digit, Mark, Sign};
        let comma = Mark(DecimalMark::Comma);
        assert_eq!(typed(&[Digit(2), Digit(4), comma, Digit(5)]), "24,5");
        assert_eq!(typed(&[Digit(2), Digit(4), Delete, Digit(3)]), "23");
        assert_eq!(typed(&[Digit(7), Sign, Digit(5)]), "-75");
        assert_eq!(typed(&[Sign, Digit(7), Sign]), "7");
        assert_eq!(typed(&[Delete, Mark(DecimalMark::Point), Digit(5)]), ".5");
    }

    #[test]
    fn the_caret_and_what_is_picked_out_count() {
        assert_eq!(
            press("24.5 psi", 2, 4, Stroke::Delete),
            ("24 psi".to_owned(), 2)
        );
        assert_eq!(press("24.5", 0, 4, Stroke::Digit(9)), ("9".to_owned(), 1));
        assert_eq!(
            press("245", 2, 2, Stroke::Mark(DecimalMark::Comma)),
            ("24,5".to_owned(), 3)
        );
        // The sign of a figure whose caret stands in its middle; any minus is one.
        assert_eq!(
            press("\u{2212}12 bar", 3, 3, Stroke::Sign),
            ("12 bar".to_owned(), 2)
        );
        assert_eq!(press("", 9, 12, Stroke::Delete), (String::new(), 0));
    }

    proptest! {
        #[test]
        fn the_sign_turns_twice_and_is_read_as_one(value in 0.01_f64..600.0) {
            let text = format!("{value:.2}");
            let (turned, caret) = press(&text, text.len(), text.len(), Stroke::Sign);
            let read = |text: &str| parse(text, Kind::Pressure, Unit::Bar, None).expect("a figure").measure.base();
            prop_assert_eq!(read(&turned), -read(&text));
            prop_assert_eq!(press(&turned, caret, caret, Stroke::Sign), (text.clone(), text.len()));
        }

        #[test]
        fn no_key_loses_more_than_one_letter(text in "\\PC{0,12}", from in 0_usize..14, more in 0_usize..4, digit in 0_u8..10) {
            let count = text.chars().count();
            for stroke in [Stroke::Digit(digit), Stroke::Mark(DecimalMark::Comma), Stroke::Delete, Stroke::Sign] {
                let (after, caret) = press(&text, from, from + more, stroke);
                prop_assert!(after.chars().count() + more.max(1) >= count);
                prop_assert!(caret <= after.chars().count());
            }
        }
    }
}
