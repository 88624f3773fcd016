//! Viscosity index: ASTM D2270, procedures A and B, and its inversion.

use super::FluidError;
use super::viscosity::{KV40_RANGE, KV100_RANGE};
use super::viscosity_index_table::TABLE_1;
use crate::math::{exp10, log10};

/// Lowest kinematic viscosity at 100 °C, mm²/s, for which the index is defined.
pub const LOWEST_KV100: f64 = 2.0;
/// Where the table ends and the formulas of 5.1.2 begin, mm²/s at 100 °C.
const TABLE_END: f64 = 70.0;

/// L and H of the reference oils, mm²/s at 40 °C, for a kinematic viscosity at 100 °C in mm²/s: Table 1 by linear
/// interpolation, above 70 mm²/s the formulas of ASTM D2270 5.1.2.
///
/// # Errors
/// [`FluidError::IndexNotDefined`] under 2 mm²/s.
pub fn reference_oils(kv100: f64) -> Result<(f64, f64), FluidError> {
    if !kv100.is_finite() || kv100 < LOWEST_KV100 {
        return Err(FluidError::IndexNotDefined { kv100 });
    }
    if kv100 <= TABLE_END
        && let Some(row) = in_table(kv100)
    {
        return Ok(row);
    }
    let y = kv100;
    Ok((
        0.8353 * y * y + 14.67 * y - 216.0,
        0.1684 * y * y + 11.85 * y - 97.0,
    ))
}

fn in_table(kv100: f64) -> Option<(f64, f64)> {
    let stretch = TABLE_1.iter().rev().find(|stretch| kv100 >= stretch.from)?;
    let place = (kv100 - stretch.from) / stretch.step;
    let last = stretch.rows.len() - 1;
    // Never negative: the stretch was found by its first row.
    let row = (place.floor() as usize).min(last.saturating_sub(1));
    let (low, high) = (stretch.rows.get(row)?, stretch.rows.get(row + 1)?);
    let share = (place - row as f64).clamp(0.0, 1.0);
    let between = |a: f64, b: f64| a + share * (b - a);
    Some((between(low.0, high.0), between(low.1, high.1)))
}

/// Viscosity index of an oil, not rounded (the standard rounds to whole numbers).
///
/// # Errors
/// [`FluidError::IndexNotDefined`] under 2 mm²/s at 100 °C; [`FluidError::NotFalling`].
pub fn viscosity_index(kv40: f64, kv100: f64) -> Result<f64, FluidError> {
    let (l, h) = reference_oils(kv100)?;
    if !kv40.is_finite() || kv40 <= kv100 {
        return Err(FluidError::NotFalling { kv40, kv100 });
    }
    Ok(if kv40 >= h {
        // Procedure A: up to and including 100.
        100.0 * (l - kv40) / (l - h)
    } else {
        // Procedure B: from 100 up.
        let n = (log10(h) - log10(kv40)) / log10(kv100);
        100.0 + (exp10(n) - 1.0) / 0.00715
    })
}

/// Kinematic viscosity at 100 °C, mm²/s, of an oil of this viscosity at 40 °C and this index: the inverse of
/// [`viscosity_index`], to 1e-9 of the value.
///
/// # Errors
/// [`FluidError::Viscosity`] for a viscosity at 40 °C outside [`KV40_RANGE`]; [`FluidError::Index`] with the span that is
/// possible.
pub fn kv100_from_index(kv40: f64, index: f64) -> Result<f64, FluidError> {
    let (low, high) = KV40_RANGE;
    if !(low..=high).contains(&kv40) || kv40 <= LOWEST_KV100 {
        return Err(FluidError::Viscosity {
            celsius: 40.0,
            value: kv40,
            low: low.max(LOWEST_KV100),
            high,
        });
    }
    // The index rises with the viscosity at 100 °C.
    let mut thin = LOWEST_KV100;
    let mut thick = (kv40 * (1.0 - 1e-9)).min(KV100_RANGE.1);
    let (lowest, highest) = (viscosity_index(kv40, thin)?, viscosity_index(kv40, thick)?);
    if !(lowest..=highest).contains(&index) {
        return Err(FluidError::Index {
            index,
            kv40,
            low: lowest,
            high: highest,
        });
    }
    // Illinois: false position that halves the weight of an end that stays. About ten steps.
    let (mut at_thin, mut at_thick) = (lowest - index, highest - index);
    let mut stayed = 0_i8;
    for _ in 0..100 {
        let middle = (thin * at_thick - thick * at_thin) / (at_thick - at_thin);
        let at_middle = viscosity_index(kv40, middle)? - index;
        if at_middle.abs() < 1e-11 * (1.0 + index.abs()) || thick - thin < 1e-13 * thick {
            return Ok(middle);
        }
        if at_middle < 0.0 {
            (thin, at_thin) = (middle, at_middle);
            at_thick *= if stayed < 0 { 0.5 } else { 1.0 };
            stayed = -1;
        } else {
            (thick, at_thick) = (middle, at_middle);
            at_thin *= if stayed > 0 { 0.5 } else { 1.0 };
            stayed = 1;
        }
    }
    Ok(0.5 * (thin + thick))
}

/// The viscosity index by its definition, for figures in any one unit: 100 (L − U) / (L − H).
#[must_use]
pub fn index_by_definition(l: f64, h: f64, u: f64) -> f64 {
    100.0 * (l - u) / (l - h)
}

/// The viscosity U at the lower temperature that gives this index between two reference oils.
#[must_use]
pub fn viscosity_by_definition(l: f64, h: f64, index: f64) -> f64 {
    l - index / 100.0 * (l - h)
}

#[cfg(all(test, not(target_arch = "wasm32")))]
mod tests {
    use super::*;
    use crate::math::pow;
    use proptest::prelude::*;

    /// H from an index by procedure B.
    fn h_of_procedure_b(kv40: f64, kv100: f64, index: f64) -> f64 {
        kv40 * pow(kv100, log10((index - 100.0) * 0.00715 + 1.0))
    }

    #[test]
    fn table_joins_itself_and_its_formulas() {
        for (from, tolerance) in [(20.0, 1e-9), (30.0, 1e-9), (70.0, 0.002)] {
            let (before, after) = (reference_oils(from - 1e-9), reference_oils(from + 1e-9));
            let (before, after) = (before.expect("in the table"), after.expect("in the table"));
            assert!(
                (before.0 - after.0).abs() <= tolerance * after.0 + 1e-6,
                "{from}"
            );
            assert!(
                (before.1 - after.1).abs() <= tolerance * after.1 + 1e-6,
                "{from}"
            );
        }
    }

    #[test]
    fn table_rises() {
        for stretch in &TABLE_1 {
            assert!(
                stretch
                    .rows
                    .windows(2)
                    .all(|pair| pair[0].0 < pair[1].0 && pair[0].1 < pair[1].1)
            );
        }
    }

    #[test]
    fn procedures_meet_at_100() {
        let kv100 = 6.8;
        let (_, h) = reference_oils(kv100).expect("in the table");
        let just_a = viscosity_index(h, kv100).expect("an oil");
        let just_b = viscosity_index(h - 1e-9, kv100).expect("an oil");
        assert!((just_a - 100.0).abs() < 1e-9 && (just_b - 100.0).abs() < 1e-6);
        let index = viscosity_index(40.0, kv100).expect("an oil");
        assert!((h_of_procedure_b(40.0, kv100, index) - h).abs() < 1e-9);
    }

    #[test]
    fn impossible_oils_are_refused_with_the_span() {
        assert!(matches!(
            viscosity_index(5.0, 1.9),
            Err(FluidError::IndexNotDefined { .. })
        ));
        assert!(matches!(
            viscosity_index(f64::NAN, 5.0),
            Err(FluidError::NotFalling { .. })
        ));
        assert!(matches!(
            viscosity_index(4.0, 5.0),
            Err(FluidError::NotFalling { .. })
        ));
        let text = kv100_from_index(46.0, 4000.0).map_err(|error| error.to_string());
        assert!(text.is_err_and(|text| text.contains("is possible")));
        assert!(kv100_from_index(f64::NAN, 100.0).is_err());
        assert!(kv100_from_index(46.0, f64::NAN).is_err());
    }

    proptest! {
        #[test]
        fn inversion_returns(kv40 in 8.0_f64..1000.0, index in 0.0_f64..250.0) {
            // Thin oils reach no low index above 2 mm²/s at 100 °C.
            if let Ok(kv100) = kv100_from_index(kv40, index) {
                let back = viscosity_index(kv40, kv100).expect("an oil");
                prop_assert!((back - index).abs() < 1e-6, "{} {}", kv100, back);
            } else {
                prop_assert!(kv40 < 12.0);
            }
        }
    }
}
