//! What a unit asks for, as far as its last call says: the order of a long list.

use super::{closing, put_back};
use crate::observations::RUNS_ON;
use crate::record::{Answer, Visit};

/// What a unit asks for, the most pressing first.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Attention {
    /// Open call on a machine that keeps going with its lever in neutral.
    StopWork,
    /// Closed, and something that was opened is not answered for.
    NotPutBack,
    /// Open call with something entered.
    Open,
    /// Open call with nothing entered.
    Begun,
    /// Closed without a cause, or with one that was not proved.
    NotProved,
    /// Closed with a proved cause.
    Settled,
    /// No call yet.
    NoCall,
}

impl Attention {
    /// What the last call says; none: there was no call.
    #[must_use]
    pub fn of(last: Option<&Visit>) -> Attention {
        let Some(visit) = last else {
            return Attention::NoCall;
        };
        if let Some(closing) = &visit.closed {
            return if put_back::open(visit) > 0 {
                Attention::NotPutBack
            } else if closing::is_proved(closing) {
                Attention::Settled
            } else {
                Attention::NotProved
            };
        }
        let runs_on = matches!(
            visit.observations.get(RUNS_ON),
            Some(Answer::Seen | Answer::OperatorSays)
        );
        let is_empty = visit.observations.is_empty()
            && visit.readings.iter().all(|reading| reading.seen.is_none());
        if runs_on {
            Attention::StopWork
        } else if is_empty {
            Attention::Begun
        } else {
            Attention::Open
        }
    }

    /// What presses, in words; none where nothing does beyond what the list says anyway.
    #[must_use]
    pub fn words(self) -> Option<&'static str> {
        match self {
            Attention::StopWork => Some("Stop work: keeps going in neutral"),
            Attention::NotPutBack => Some("Not all is put back"),
            _ => None,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::record::{Closing, Export, PutBack};

    #[test]
    fn the_last_call_says_what_presses() {
        let yard = Export::read(crate::demo::TAMARISK.as_bytes()).expect("the demo");
        let mut visit = yard.visits[1].clone();
        assert_eq!(Attention::of(None), Attention::NoCall);
        assert_eq!(Attention::of(Some(&visit)), Attention::Open);
        visit
            .observations
            .insert(RUNS_ON.into(), Answer::OperatorSays);
        assert_eq!(Attention::of(Some(&visit)), Attention::StopWork);
        visit.observations.insert(RUNS_ON.into(), Answer::NotSeen);
        assert_eq!(Attention::of(Some(&visit)), Attention::Open);
        visit.closed = Some(Closing::default());
        assert_eq!(Attention::of(Some(&visit)), Attention::NotPutBack);
        for (line, _) in put_back::lines(&visit) {
            visit.put_back.insert(line.into(), PutBack::Done);
        }
        assert_eq!(Attention::of(Some(&visit)), Attention::NotProved);
        visit.closed = Some(Closing {
            cause: "charge-pump-worn".into(),
            is_proved: true,
            ..Closing::default()
        });
        assert_eq!(Attention::of(Some(&visit)), Attention::Settled);
        let begun = Visit::default();
        assert_eq!(Attention::of(Some(&begun)), Attention::Begun);
        assert!(
            Attention::StopWork < Attention::NotPutBack && Attention::Open < Attention::Settled
        );
    }
}
