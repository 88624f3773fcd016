//! An electric control's currents: threshold and end, each side.

/// Currents of the two coils, mA.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Currents {
    /// At which it just starts to go forward.
    pub threshold_forward: Option<f64>,
    /// At which it just starts to go back.
    pub threshold_reverse: Option<f64>,
    /// At which it goes no faster forward.
    pub end_forward: Option<f64>,
    /// At which it goes no faster back.
    pub end_reverse: Option<f64>,
}

/// How a figure stands against common practice.
#[derive(Clone, Copy, Debug, PartialEq, Eq, serde::Serialize, serde::Deserialize)]
pub enum Stands {
    /// As is common.
    Usual,
    /// Between what is common and what is not.
    Edge,
    /// Not common.
    Unusual,
}

/// One figure drawn from the currents.
#[derive(Clone, Copy, Debug, PartialEq, serde::Serialize, serde::Deserialize)]
pub struct Figure {
    /// Value.
    pub value: f64,
    /// Its standard uncertainty.
    pub uncertainty: f64,
    /// How it stands.
    pub stands: Stands,
}

/// What the currents come to.
#[derive(Clone, Copy, Debug, Default, PartialEq, serde::Serialize, serde::Deserialize)]
pub struct Judged {
    /// Difference of the thresholds over their mean.
    pub thresholds_differ: Option<Figure>,
    /// Difference of the end currents over their mean.
    pub ends_differ: Option<Figure>,
    /// Threshold over end current, forward.
    pub share_forward: Option<Figure>,
    /// Threshold over end current, reverse.
    pub share_reverse: Option<Figure>,
    /// Half the difference of the thresholds, mA, with its standard uncertainty: how far the null sits off in current, forward
    /// positive where it starts forward later.
    pub null_off: Option<(f64, f64)>,
    /// Dead band from start to start, mA.
    pub dead_band: Option<f64>,
    /// An end current no higher than its threshold: a slip of the pen, or the sides are mixed up.
    pub end_under_threshold: bool,
}

/// Standard uncertainty of a current at which something just starts, as a share of it: meter, ripple (dither) and the moment
/// seen. Common practice.
pub const CURRENT_SHARE: f64 = 0.01;
/// Sides that differ by no more than this are alike. Common practice: 5 to 8 %.
pub const ALIKE: f64 = 0.05;
/// Sides that differ by more than this are not. Common practice: 5 to 8 %.
pub const UNLIKE: f64 = 0.08;
/// Threshold over full current, common practice.
pub const THRESHOLD: (f64, f64) = (0.30, 0.45);

/// Judges the currents. Nothing is said of what was not read, nor of currents that are not above zero.
#[must_use]
pub fn judge(currents: &Currents) -> Judged {
    let positive = |current: Option<f64>| current.filter(|c| c.is_finite() && *c > 0.0);
    let (tf, tr) = (
        positive(currents.threshold_forward),
        positive(currents.threshold_reverse),
    );
    let (ef, er) = (
        positive(currents.end_forward),
        positive(currents.end_reverse),
    );
    let under = |t: Option<f64>, e: Option<f64>| t.zip(e).is_some_and(|(t, e)| e <= t);
    Judged {
        thresholds_differ: tf.zip(tr).map(|(f, r)| differ(f, r)),
        ends_differ: ef.zip(er).map(|(f, r)| differ(f, r)),
        share_forward: tf.zip(ef).map(|(t, e)| share(t, e)),
        share_reverse: tr.zip(er).map(|(t, e)| share(t, e)),
        null_off: tf
            .zip(tr)
            .map(|(f, r)| (0.5 * (f - r), 0.5 * CURRENT_SHARE * (f * f + r * r).sqrt())),
        dead_band: tf.zip(tr).map(|(f, r)| f + r),
        end_under_threshold: under(tf, ef) || under(tr, er),
    }
}

fn differ(forward: f64, reverse: f64) -> Figure {
    let mean = 0.5 * (forward + reverse);
    let value = (forward - reverse) / mean;
    Figure {
        value,
        // Of a difference over a mean of two figures of the same relative uncertainty.
        uncertainty: CURRENT_SHARE * core::f64::consts::SQRT_2,
        stands: match value.abs() {
            v if v <= ALIKE => Stands::Usual,
            v if v <= UNLIKE => Stands::Edge,
            _ => Stands::Unusual,
        },
    }
}

fn share(threshold: f64, end: f64) -> Figure {
    let value = threshold / end;
    let uncertainty = value * CURRENT_SHARE * core::f64::consts::SQRT_2;
    let (low, high) = THRESHOLD;
    let stands = if (low..=high).contains(&value) {
        Stands::Usual
    } else if (low - 2.0 * uncertainty..=high + 2.0 * uncertainty).contains(&value) {
        Stands::Edge
    } else {
        Stands::Unusual
    };
    Figure {
        value,
        uncertainty,
        stands,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// 420 and 380 mA: mean 400, apart by 40 = 10 %. Of 1000 mA each: 0.42 and 0.38.
    #[test]
    fn sides_a_tenth_apart_are_not_alike() {
        let judged = judge(&Currents {
            threshold_forward: Some(420.0),
            threshold_reverse: Some(380.0),
            end_forward: Some(1000.0),
            end_reverse: Some(1000.0),
        });
        let apart = judged.thresholds_differ.expect("both read");
        assert!((apart.value - 0.10).abs() < 1e-12);
        assert_eq!(apart.stands, Stands::Unusual);
        assert_eq!(judged.ends_differ.map(|f| f.stands), Some(Stands::Usual));
        assert_eq!(judged.share_forward.map(|f| f.stands), Some(Stands::Usual));
        // (420 − 380)/2 = 20 mA; ½·1 %·√(420² + 380²) = 2.83 mA.
        let (off, wide) = judged.null_off.expect("both read");
        assert!((off - 20.0).abs() < 1e-12 && (wide - 2.832).abs() < 1e-3);
        assert_eq!(judged.dead_band, Some(800.0));
    }

    #[test]
    fn nothing_is_said_of_what_was_not_read() {
        let judged = judge(&Currents {
            threshold_forward: Some(420.0),
            end_reverse: Some(-5.0),
            ..Currents::default()
        });
        assert_eq!(judged, Judged::default());
    }

    #[test]
    fn an_end_under_its_threshold_is_told() {
        let judged = judge(&Currents {
            threshold_forward: Some(900.0),
            end_forward: Some(400.0),
            ..Currents::default()
        });
        assert!(judged.end_under_threshold);
    }
}
