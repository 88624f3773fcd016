//! Random records from a seed: every variant of everything that a record can hold, inside what is accepted.
#![allow(dead_code)] // each test takes what it needs

use lowside::bench::stand::acceptance::{Acceptance, Limited, Part, Scope};
use lowside::bench::stand::items;
use lowside::bench::stand::sheet::{Head, ItemEntry, Of, TextId};
use lowside::bench::stand::{
    BenchSheet, Channel, Charge, Flushing, Layout, Meter, ReliefDrain as BenchDrain, Row, Subject,
    TorqueCovers,
};
use lowside::quantity::Typed;
use lowside::quantity::{Kind, Measure};
use lowside::readings::instrument::{Instrument, usual_instruments};
use lowside::readings::{
    Condition, Direction, Doing, EngineSpeed, JugCatch, Lever, OilTemperature, Path, Place, Port,
    Reading, Rigging, Seen, SideNaming, Stroked,
};
use lowside::record::neutral::{AdjusterRow, Field};
use lowside::record::{
    Answer, Book, Closing, Earlier, NeutralSheet, PutBack, Settings, Visit, limits,
};
use lowside::unit::*;

/// Seeded chance (SplitMix64; Steele, Lea, Flood 2014).
pub struct Dice(pub u64);

impl Dice {
    pub fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        z ^ (z >> 31)
    }

    /// 0 to `n` - 1.
    pub fn below(&mut self, n: usize) -> usize {
        (self.next() % n as u64) as usize
    }

    /// One time in `n`.
    pub fn one_in(&mut self, n: usize) -> bool {
        self.below(n) == 0
    }

    pub fn share(&mut self) -> f64 {
        (self.next() >> 11) as f64 / (1u64 << 53) as f64
    }

    pub fn between(&mut self, low: f64, high: f64) -> f64 {
        // Now and then the very ends, which are accepted.
        match self.below(20) {
            0 => low,
            1 => high,
            _ => (low + (high - low) * self.share()).clamp(low, high),
        }
    }

    pub fn pick<T: Clone>(&mut self, list: &[T]) -> T {
        list[self.below(list.len())].clone()
    }

    pub fn text(&mut self, most: usize) -> String {
        const LETTERS: &[char] = &[
            'a', 'Z', '7', ' ', '.', ',', '"', '\\', '/', '{', 'é', '³', '–', '漢', '🔧', '\u{301}',
        ];
        (0..self.below(most + 1))
            .map(|_| self.pick(LETTERS))
            .collect()
    }

    pub fn lines(&mut self, most: usize) -> String {
        let text = self.text(most);
        if self.one_in(3) {
            format!("{text}\n{text}\tx")
        } else {
            text
        }
    }

    pub fn measure(&mut self, kind: Kind, span: (f64, f64)) -> Measure {
        let value = self.between(span.0, span.1);
        Measure::from_base(value, kind).expect("a finite figure")
    }

    pub fn id(&mut self, letter: char) -> String {
        format!("{letter}{:016x}", self.next())
    }

    fn condition(&mut self) -> Condition {
        let lever = match self.below(4) {
            0 => Lever::Full,
            1 => Lever::Half,
            2 => Lever::Feathered,
            _ => Lever::Share(self.between(0.0, 1.0)),
        };
        let engine = match self.below(3) {
            0 => EngineSpeed::LowIdle,
            1 => EngineSpeed::HighIdle,
            _ => EngineSpeed::Measured(self.measure(
                Kind::RotationalSpeed,
                limits::kind_span(Kind::RotationalSpeed),
            )),
        };
        let value = self.measure(Kind::Temperature, limits::kind_span(Kind::Temperature));
        let place = self.pick(&Place::ALL);
        Condition {
            doing: self.pick(&Doing::ALL),
            direction: self.pick(&[Direction::Forward, Direction::Reverse]),
            lever,
            engine,
            oil: (!self.one_in(3)).then_some(OilTemperature { value, place }),
            flushing_blocked: self.one_in(4),
            consumers_capped: self.one_in(4),
            stroked: self.pick(&Stroked::ALL),
        }
    }

    fn seen(&mut self, port: Port) -> Option<Seen> {
        let span = limits::reading_span(port);
        let value = self.measure(port.kind(), span);
        let other = self.measure(port.kind(), span);
        Some(match self.below(8) {
            0 => return None,
            1 => {
                let (low, high) = if value <= other {
                    (value, other)
                } else {
                    (other, value)
                };
                Seen::Swing { low, high }
            }
            2 => Seen::OffScale { top: value },
            3 => Seen::Nothing,
            4 => Seen::ShareOf {
                share: self.between(0.0, 4.0),
                other: Box::new(self.condition()),
            },
            5 => Seen::NotPossible {
                why: self.lines(30),
            },
            _ => Seen::Value { value },
        })
    }

    pub fn reading(&mut self) -> Reading {
        let port = self.pick(&Port::ALL);
        Reading {
            id: self.id('r'),
            port,
            path: self.pick(&Path::BOTH),
            condition: self.condition(),
            rigging: String::new(),
            seen: self.seen(port),
            typed: self.text(20),
            note: self.lines(20),
        }
    }

    fn ticks(&mut self) -> Ticks {
        const TICKS: [Tick; 3] = [Tick::Yes, Tick::No, Tick::Unknown];
        Ticks {
            paths: self.pick(&Paths::ALL),
            flushing: self.pick(&TICKS),
            shuttle: self.pick(&[
                Shuttle::ClosedCentre,
                Shuttle::TwoPosition,
                Shuttle::Unknown,
            ]),
            limiter: self.pick(&TICKS),
            control: self.pick(&Control::ALL),
            filter: self.pick(&[
                Filter::Suction,
                Filter::PressureGaugeBefore,
                Filter::PressureGaugeAfter,
                Filter::Unknown,
            ]),
            charge_source: self.pick(&[
                ChargeSource::OwnPump,
                ChargeSource::Steering,
                ChargeSource::Implement,
                ChargeSource::Unknown,
            ]),
            brake_from_charge: self.pick(&TICKS),
            shift_from_charge: self.pick(&TICKS),
            two_speed: self.pick(&TICKS),
            bypass: self.pick(&TICKS),
            relief_drain: self.pick(&[
                ReliefDrain::PumpCase,
                ReliefDrain::Tank,
                ReliefDrain::Unknown,
            ]),
            loop_relief_to: self.pick(&[
                LoopReliefTo::Gallery,
                LoopReliefTo::Across,
                LoopReliefTo::Case,
                LoopReliefTo::Unknown,
            ]),
            case_lines: self.pick(&[
                CaseLines::ThroughPump,
                CaseLines::Separate,
                CaseLines::Unknown,
            ]),
            slipping_drive: self.pick(&TICKS),
            motors: 1 + self.below(4) as u8,
        }
    }

    pub fn unit(&mut self) -> Unit {
        let mut unit = Unit {
            id: self.id('u'),
            name: self.text(12),
            class: self.pick(&MachineClass::ALL),
            ticks: self.ticks(),
            sides: self.pick(&[SideNaming::Known, SideNaming::AsMarked]),
            note: self.lines(40),
            ..Unit::default()
        };
        for ask in FIGURES {
            if self.one_in(2) {
                let value = self.measure(ask.kind, (ask.low, ask.high));
                let figure = Figure {
                    value: (!self.one_in(6)).then_some(value),
                    typed: self.text(8),
                    source: self.pick(&Source::ALL),
                };
                unit.figures.insert(ask.id, figure);
            }
        }
        for _ in 0..self.below(4) {
            let port = self.pick(&Port::ALL);
            let minutes = self.between(0.0, limits::ACCESS_MINUTES);
            let access_minutes = self.one_in(2).then_some(minutes);
            unit.ports.insert(
                port,
                PortNote {
                    place: self.lines(20),
                    adapter: self.text(10),
                    access_minutes,
                    access_typed: self.text(9),
                },
            );
        }
        for _ in 0..self.below(3) {
            let port = self.pick(&Port::ALL);
            let span = limits::reading_span(port);
            let (a, b) = (
                self.measure(port.kind(), span),
                self.measure(port.kind(), span),
            );
            let (low, high) = if a <= b { (a, b) } else { (b, a) };
            unit.manual.push(ManualWindow {
                port,
                condition: self.condition(),
                low,
                high,
                reference: self.text(12),
            });
        }
        if self.one_in(3) {
            let id = self.pick(&[FigureId::MotorCaseLeakage, FigureId::PumpSlip]);
            let found = OnBench {
                on: "2025-03-04T07:40:00Z".into(),
                value: self.measure(Kind::Flow, (0.01, 200.0)),
                share: self.between(0.0, 1.0),
                path: self.pick(&[None, Some(Path::Left), Some(Path::Right)]),
            };
            unit.bench.insert(id, found);
        }
        if self.one_in(3) {
            unit.extra.insert(
                "from_later".into(),
                serde_json::json!({ "a": [1, 2.5, null, "x"] }),
            );
        }
        unit
    }

    fn neutral(&mut self) -> NeutralSheet {
        let mut sheet = NeutralSheet::default();
        // Read, and typed so that nobody can read it.
        let value = self.measure(Kind::Time, (1.0, 600.0));
        let typed = |typed: String, value| Typed { typed, value };
        sheet.set(Field::CreepTime, typed(self.text(8), Some(value)));
        sheet.set(Field::Difference, typed("2x4".into(), None));
        sheet.done.push("before".into());
        sheet.series.push(AdjusterRow {
            id: "p1".into(),
            turns: typed(self.text(8), None),
            ..AdjusterRow::default()
        });
        sheet
    }

    /// A figure of a bench sheet, or a text that is none.
    fn typed(&mut self, (unit, low, high): (lowside::quantity::Unit, f64, f64)) -> Typed {
        let value = self.between(low, high);
        Typed {
            typed: self.text(8),
            value: (!self.one_in(8)).then(|| Measure::literal(value, unit)),
        }
    }

    fn bench(&mut self) -> BenchSheet {
        let subject = self.pick(&Subject::ALL);
        let mut sheet = BenchSheet {
            subject,
            path: self.pick(&[None, Some(Path::Left), Some(Path::Right)]),
            layout: Layout {
                charge: self.pick(&[
                    None,
                    Some(Charge::Own),
                    Some(Charge::Outside),
                    Some(Charge::None),
                ]),
                relief: self.pick(&[None, Some(BenchDrain::Case), Some(BenchDrain::Elsewhere)]),
                meter: self.pick(&[None, Some(Meter::High), Some(Meter::Low)]),
                flushing: self.pick(&[None, Some(Flushing::Plugged), Some(Flushing::Open)]),
                torque: self.pick(&[
                    None,
                    Some(TorqueCovers::MachineOnly),
                    Some(TorqueCovers::WithCharge),
                ]),
            },
            ..BenchSheet::default()
        };
        for head in Head::ALL {
            if self.one_in(2) {
                let typed = self.typed(head.asks());
                sheet.head.insert(head, typed);
            }
        }
        for id in TextId::ALL {
            if self.one_in(4) {
                let text = self.text(20);
                sheet.texts.insert(id, text);
            }
        }
        let names = ["", "1", "2", "rated"];
        for _ in 0..self.below(14) {
            let mut row = Row {
                id: self.id('r'),
                name: self.pick(&names).to_owned(),
                is_left_out: self.one_in(8),
                ..Row::default()
            };
            for channel in Channel::ALL {
                if channel.belongs(subject) && !self.one_in(5) {
                    let typed = self.typed(channel.asks());
                    row.cells.insert(channel, typed);
                }
            }
            sheet.rows.push(row);
        }
        for channel in Channel::ALL {
            if self.one_in(6) {
                let (unit, _, high) = channel.asks();
                let meter = lowside::bench::stand::sheet::Meter {
                    of: self.pick(&[Of::Class, Of::Reading, Of::Span]),
                    limit: self.typed((lowside::quantity::Unit::Percent, 0.0, 20.0)),
                    span: self.typed((unit, 0.0, high)),
                    mark: self.text(8),
                    calibrated: self.text(8),
                };
                sheet.meters.insert(channel, meter);
            }
        }
        for item in items::of(subject) {
            if self.one_in(3) {
                let mut entry = ItemEntry {
                    is_good: self.pick(&[None, Some(true), Some(false)]),
                    skipped: self.pick(&[None, Some("no time".to_owned())]),
                    note: self.text(12),
                    ..ItemEntry::default()
                };
                if let items::Entry::Figure(unit) = item.entry {
                    for typed in [&mut entry.found, &mut entry.low, &mut entry.high] {
                        *typed = self.typed((unit, 0.0, 1e4));
                    }
                }
                sheet.items.insert(item.id, entry);
            }
        }
        for _ in 0..self.below(4) {
            let of = self.pick(&Limited::ALL);
            let mut limit = Acceptance {
                id: self.id('l'),
                of,
                scope: self.pick(&[Scope::Point, Scope::Curve]),
                point: self.pick(&names).to_owned(),
                source: self.text(12),
                ..Acceptance::default()
            };
            for part in Part::ALL {
                if !self.one_in(5) {
                    *limit.typed_mut(part) = self.typed(part.asks(of));
                }
            }
            sheet.acceptance.push(limit);
        }
        sheet
    }

    pub fn visit(&mut self, unit: &str, instruments: &[Instrument]) -> Visit {
        let mut visit = Visit {
            id: self.id('v'),
            unit: unit.to_owned(),
            opened: format!("2025-0{}-1{}T08:00:00Z", 1 + self.below(9), self.below(10)),
            complaint: self.lines(60),
            alone: self.pick(&[None, Some(true), Some(false)]),
            after_repair: self.pick(&[None, Some(true), Some(false)]),
            note: self.lines(60),
            ..Visit::default()
        };
        for id in [
            "foam",
            "creeps",
            "one-direction",
            "weak-hot",
            "not-known-here",
        ] {
            if self.one_in(3) {
                let answer = self.pick(&[
                    Answer::Seen,
                    Answer::NotSeen,
                    Answer::OperatorSays,
                    Answer::OperatorSaysNot,
                ]);
                visit.observations.insert(id.into(), answer);
            }
        }
        for _ in 0..self.below(9) {
            let mut reading = self.reading();
            if !instruments.is_empty() && self.one_in(2) {
                let rigging = Rigging {
                    id: self.id('g'),
                    instrument: self.pick(instruments).id,
                    port: reading.port,
                };
                reading.rigging.clone_from(&rigging.id);
                visit.riggings.push(rigging);
            }
            visit.readings.push(reading);
        }
        if self.one_in(3) {
            let fact = self.text(20);
            visit
                .precautions
                .insert("pressure-build-up".into(), vec![fact]);
        }
        if let Some(reading) = visit.readings.first()
            && self.one_in(3)
        {
            let id = reading.id.clone();
            let earlier = Earlier {
                seen: reading.seen.clone(),
                typed: self.text(12),
                when: String::from("2025-12-01T09:00:00Z"),
            };
            visit.earlier.insert(id.clone(), vec![earlier]);
            let texts = [("oil".to_owned(), self.text(12))];
            visit.headings.insert(id, texts.into());
        }
        if let Some(reading) = visit.readings.last()
            && self.one_in(3)
        {
            let jug = JugCatch {
                volume: Typed::shown(2.0, lowside::quantity::Unit::Litre, 1),
                time: Typed {
                    typed: self.text(12),
                    value: None,
                },
            };
            visit.caught.insert(reading.id.clone(), jug);
        }
        if self.one_in(3) {
            visit.neutral = Some(self.neutral());
        }
        if self.one_in(3) {
            visit.made.push("pull-the-shuttle".into());
            visit
                .put_back
                .insert("Charge port plugged".into(), PutBack::Done);
            let why = self.lines(12);
            visit
                .put_back
                .insert("Loop ports plugged".into(), PutBack::Struck(why));
            visit.closing = Some(Closing {
                cause: "charge-pump-worn".into(),
                also: "oil-low".into(),
                is_proved: self.one_in(2),
                done: self.lines(30),
                parts: self.lines(30),
                ..Closing::default()
            });
        }
        if self.one_in(3) {
            let when = String::from("2025-12-01T10:00:00Z");
            visit.closed = Some(Closing {
                cause: "charge-pump-worn".into(),
                proof: self.lines(30),
                when,
                ..Closing::default()
            });
        }
        if self.one_in(4) {
            visit.bench = Some(self.bench());
        }
        if self.one_in(4) {
            visit
                .extra
                .insert("weather".into(), serde_json::json!("rain"));
        }
        visit
    }

    pub fn book(&mut self) -> Book {
        let mut book = Book {
            settings: Settings::start(),
            ..Book::default()
        };
        for _ in 0..self.below(4) {
            book.put_unit(self.unit());
        }
        let mut ids: Vec<String> = book.units.keys().cloned().collect();
        ids.push("nowhere".into());
        for _ in 0..self.below(5) {
            let unit = self.pick(&ids);
            let visit = self.visit(&unit, &usual_instruments());
            book.put_visit(visit);
        }
        book
    }
}
