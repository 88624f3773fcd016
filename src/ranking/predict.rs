//! What a node predicts for every datum, and how that scatters: one solve a condition, one adjoint a port.

use super::datum::{Data, Datum, Says, slope, transform};
use super::memo::{self, Kept, Memo};
use super::node::{Node, bend, severity};
use super::split::Split;
use super::swing::Swings;
use crate::circuit::{Arrangement, Network, Param, Params, Scale, Shown, Solution, State, VALUES};
use crate::faults::Fault;
use crate::machine::{Build, Latents, apply, base, layout_for, scattered};
use crate::readings::{Path, Port};

/// Everything that predictions need, made once for an assessment.
pub struct Bench {
    /// Builds.
    pub builds: Vec<Build>,
    /// One network a build and condition.
    networks: Vec<Vec<Network>>,
    /// Its key in what is kept.
    keys: Vec<Vec<u64>>,
    /// What was solved before.
    memo: Memo,
    /// Parameters a build and condition, before scatter.
    bases: Vec<Vec<Params>>,
    /// Scatter.
    pub latents: Latents,
    /// Factor on the scatter.
    wider: f64,
    /// Which of it is sampled at the nodes.
    split: Split,
    /// For each condition: latent, parameter, path, size.
    acts: Vec<Vec<(usize, Param, Path, f64)>>,
    /// Conditions with their consumers capped.
    capped: Vec<bool>,
    /// Ports wanted in each condition.
    wanted: Vec<Vec<(Path, Port)>>,
    /// Values of a parameter table that the arrangement uses.
    values: usize,
    /// Circuit solves so far.
    pub solves: core::cell::Cell<u64>,
    /// Last state a build and condition: where the next solve starts.
    warm: core::cell::RefCell<Vec<Vec<Option<State>>>>,
}

/// What one condition shows.
#[derive(Clone)]
struct Shows {
    ports: Vec<(Path, Port, Shown)>,
    filled: [f64; 2],
    air: f64,
}

impl Shows {
    /// Place of the port that a datum was read on.
    fn place(&self, d: &Datum) -> Option<usize> {
        self.ports
            .iter()
            .position(|(path, port, _)| (*path, *port) == (d.path, d.port))
    }
}

/// Prediction of a node.
#[derive(Clone, Debug)]
pub struct Prediction {
    /// Mean of every datum on its transformed scale.
    pub mean: Vec<f64>,
    /// Datum × latent (the last columns are the severities of one or two causes): change a standard deviation, row-major.
    pub rows: Vec<f64>,
    /// Columns of `rows`.
    pub columns: usize,
    /// Added variance of every datum: where there is no steady state.
    pub loose: Vec<f64>,
    /// Where the low side starves, for every datum: needles swing there.
    pub starved: Vec<bool>,
    /// Log factor from needles that swing or stand still.
    pub swing: f64,
}

/// What is known of a datum at a node from an earlier prediction there.
#[derive(Clone, Copy, Debug)]
pub struct Known<'a> {
    /// Mean on its transformed scale.
    pub mean: f64,
    /// Its row, over the columns of that prediction.
    pub row: &'a [f64],
    /// Where each of those columns stands now.
    pub columns: &'a [usize],
    /// Added variance.
    pub loose: f64,
    /// The low side starves there.
    pub starved: bool,
}

impl Known<'_> {
    fn fill(&self, row: &mut [f64]) {
        for (r, at) in self.row.iter().zip(self.columns) {
            row[*at] = *r;
        }
    }
}

/// Severity cells of a node: of its cause and of a second one.
pub const CELLS: usize = 2;
/// Share of a consumer's leak that passes a cap.
const CAPPED: f64 = 1e-3;
/// Variance (on the transformed scale) of a reading where the circuit has no steady state.
const LOOSE: f64 = 1.0;

impl Prediction {
    /// Largest change of any datum (transformed scale) from the middle of the severity cell to its wall.
    pub fn steepness(&self) -> f64 {
        self.across_cell()
            .iter()
            .fold(0.0, |most: f64, r| most.max(r.abs()))
            * 3f64.sqrt()
    }

    /// Change of every datum (transformed scale) across the severity cell of the first cause, a standard deviation.
    pub fn across_cell(&self) -> Vec<f64> {
        self.rows
            .chunks(self.columns)
            .filter_map(|row| row.get(self.columns - CELLS).copied())
            .collect()
    }
}

impl Bench {
    /// Sets the bench up for a unit's builds and the conditions of its readings.
    pub fn new(builds: Vec<Build>, latents: Latents, data: &Data) -> Bench {
        Bench::with(builds, latents, data, Memo::default())
    }

    /// As [`Bench::new`], with what was solved before.
    pub fn with(builds: Vec<Build>, latents: Latents, data: &Data, memo: Memo) -> Bench {
        let conditions = &data.conditions;
        let mut networks = Vec::new();
        let mut bases = Vec::new();
        let mut keys = Vec::new();
        for b in &builds {
            let base = base(b);
            keys.push(
                conditions
                    .iter()
                    .map(|c| memo::text_key(&format!("{:?}", layout_for(b, c))))
                    .collect::<Vec<_>>(),
            );
            networks.push(
                conditions
                    .iter()
                    .map(|c| Network::new(layout_for(b, c)))
                    .collect::<Vec<_>>(),
            );
            bases.push(
                conditions
                    .iter()
                    .map(|c| apply(b, &base, c))
                    .collect::<Vec<_>>(),
            );
        }
        let wider = data.belief.wider;
        let acts = (0..conditions.len())
            .map(|c| {
                let mut list = Vec::new();
                for (i, latent) in latents.0.iter().enumerate() {
                    for a in &latent.acts {
                        if a.condition.is_none_or(|x| x == c) {
                            list.push((i, a.param, a.path, a.size * wider));
                        }
                    }
                }
                list
            })
            .collect();
        let mut wanted: Vec<Vec<(Path, Port)>> = vec![Vec::new(); conditions.len()];
        let mut want = |c: usize, path: Path, p: Port| {
            if !wanted[c].contains(&(path, p)) {
                wanted[c].push((path, p));
            }
        };
        for d in &data.data {
            want(d.condition, d.path, d.port);
            // Swapped sides are always a possibility.
            match d.port {
                Port::LoopA => want(d.condition, d.path, Port::LoopB),
                Port::LoopB => want(d.condition, d.path, Port::LoopA),
                _ => {}
            }
            if let Says::Share(other) = d.says {
                want(other, d.path, d.port);
            }
        }
        let single = |b: &Build| b.layout.arrangement == Arrangement::Single;
        let values = if builds.iter().all(single) {
            Param::COUNT
        } else {
            VALUES
        };
        let warm = vec![vec![None; conditions.len()]; builds.len()];
        Bench {
            builds,
            networks,
            keys,
            memo,
            bases,
            split: Split::new(&latents),
            latents,
            wider,
            acts,
            capped: conditions.iter().map(|c| c.consumers_capped).collect(),
            wanted,
            values,
            solves: core::cell::Cell::new(0),
            warm: core::cell::RefCell::new(warm),
        }
    }

    /// A number of its own for each latent, that stays when others are added.
    pub fn latent_seeds(&self) -> &[u64] {
        self.split.seeds()
    }

    /// Adds a port to what a condition must show.
    pub fn want(&mut self, condition: usize, path: Path, port: Port) {
        if let Some(list) = self.wanted.get_mut(condition)
            && !list.contains(&(path, port))
        {
            list.push((path, port));
        }
    }

    /// Moves the parameters of every build and condition: for a judge that knows of effects that the circuit does not.
    pub fn adjust(&mut self, change: impl Fn(&mut Params)) {
        for theta in self.bases.iter_mut().flatten() {
            change(theta);
        }
    }

    /// Parameters of a node in a condition at scatter `u`; `shift`: places in the severity cells of its causes, −1 to 1.
    fn theta(
        &self,
        fault: &Fault,
        node: &Node,
        condition: usize,
        u: &[f64],
        shift: [f64; CELLS],
    ) -> (Params, Vec<(usize, f64)>) {
        let base = &self.bases[node.build][condition];
        let mut theta = if u.is_empty() && node.place.is_none() {
            *base
        } else {
            let mut wide = self.split.scatter(node.place, u);
            for w in &mut wide {
                *w *= self.wider;
            }
            scattered(base, &self.latents, condition, &wide)
        };
        let mut factors = Vec::new();
        if let Some(effect) = node.effect.and_then(|e| fault.effects.get(e)) {
            let place = node.quantile + node.half * shift[0];
            factors = bend(
                &mut theta,
                node.path,
                effect.bends,
                severity(fault.severity, place),
                node.sign,
            );
        }
        if let Some(second) = &node.second
            && let Some(effect) = second.effect.and_then(|e| second.fault.effects.get(e))
        {
            let place = second.quantile + second.half * shift[1];
            factors.extend(bend(
                &mut theta,
                second.path,
                effect.bends,
                severity(second.fault.severity, place),
                second.sign,
            ));
        }
        if self.capped[condition] {
            // A capped consumer neither drinks nor leaks.
            for path in Path::BOTH {
                theta[Param::ConsumerLeak.on(path)] *= CAPPED;
            }
        }
        keep_order(&mut theta, Path::Left);
        if self.values > Param::COUNT {
            keep_order(&mut theta, Path::Right);
        }
        (theta, factors)
    }

    /// Solves a node in a condition; none where there is no steady state.
    fn shows(&self, node: &Node, condition: usize, theta: &Params) -> Option<Shows> {
        let net = &self.networks[node.build][condition];
        let wants = &self.wanted[condition];
        let key = memo::key(self.keys[node.build][condition], &theta[..self.values]);
        let shows = |k: &Kept| Shows {
            ports: k.ports.clone(),
            filled: Path::BOTH.map(|path| net.filled(path, &k.state, theta)),
            air: theta[Param::Air as usize],
        };
        let has = |k: &Kept, want: &(Path, Port)| k.ports.iter().any(|(a, p, _)| (*a, *p) == *want);
        let known = self.memo.get(key, |k| {
            let k = k.as_ref()?;
            // A port that was not read before needs the derivatives at its state: it is settled there again.
            Some((wants.iter().all(|w| has(k, w)).then(|| shows(k)), k.state))
        });
        let start = match known {
            Some(None) => return None,
            Some(Some((Some(shows), _))) => return Some(shows),
            Some(Some((None, state))) => Some(state),
            None => {
                if let Some(found) = self.mirrored(node, condition, theta) {
                    let shows = found.as_ref().map(shows);
                    self.memo.put(key, found);
                    return shows;
                }
                self.warm.borrow()[node.build][condition]
            }
        };
        self.solves.set(self.solves.get() + 1);
        let solved = net.solve(theta, start.as_ref()).ok();
        if start.is_none()
            && let Some(solution) = &solved
        {
            self.warm.borrow_mut()[node.build][condition] = Some(solution.state);
        }
        let new = solved.and_then(|solution| {
            let ports = wants
                .iter()
                .map(|(path, port)| {
                    let shown = self.shown(node, condition, theta, &solution, *path, *port)?;
                    Some((*path, *port, shown))
                })
                .collect::<Option<Vec<_>>>()?;
            Some(Kept {
                state: solution.state,
                ports,
            })
        });
        let shows = new.as_ref().map(shows);
        self.memo.put(key, new);
        shows
    }

    /// What is kept of the mirror image of a node's parameters, changed over; none where nothing is, or too little.
    fn mirrored(&self, node: &Node, condition: usize, theta: &Params) -> Option<Option<Kept>> {
        let net = &self.networks[node.build][condition];
        if !net.is_symmetric() {
            return None;
        }
        let image = net.mirrored(theta);
        let key = memo::key(self.keys[node.build][condition], &image[..self.values]);
        self.memo.get(key, |kept| {
            let Some(kept) = kept else { return Some(None) };
            let ports = self.wanted[condition]
                .iter()
                .map(|(path, port)| {
                    // A port that both share is read on the left whichever way round.
                    let from = if net.at_common(*port) {
                        *path
                    } else {
                        path.other()
                    };
                    let there = |(a, p, _): &&(Path, Port, Shown)| (*a, *p) == (from, *port);
                    let (_, _, shown) = kept.ports.iter().find(there)?;
                    Some((*path, *port, net.mirrored_shown(shown)))
                })
                .collect::<Option<Vec<_>>>()?;
            Some(Some(Kept {
                state: net.mirrored_state(&kept.state),
                ports,
            }))
        })?
    }

    fn shown(
        &self,
        node: &Node,
        condition: usize,
        theta: &Params,
        solution: &Solution,
        path: Path,
        port: Port,
    ) -> Option<Shown> {
        let net = &self.networks[node.build][condition];
        if port == Port::Knee {
            self.solves.set(self.solves.get() + 8);
            let speed = self.bases[node.build][condition][Param::Speed as usize];
            return net.knee(theta, speed.max(1500.0)).ok();
        }
        Some(net.reading_and_gradient_on(path, port, solution, theta))
    }

    /// Values only, of every wanted port in a condition at scatter `u`: for ensembles.
    pub fn values(
        &self,
        fault: &Fault,
        node: &Node,
        condition: usize,
        u: &[f64],
    ) -> Option<Vec<(Path, Port, f64)>> {
        let (theta, _) = self.theta(fault, node, condition, u, [0.0; CELLS]);
        let net = &self.networks[node.build][condition];
        let start = self.warm.borrow()[node.build][condition];
        self.solves.set(self.solves.get() + 1);
        let solution = net.solve(&theta, start.as_ref()).ok()?;
        let mut out = Vec::with_capacity(self.wanted[condition].len());
        for (path, p) in &self.wanted[condition] {
            let v = if *p == Port::Knee {
                net.knee(
                    &theta,
                    self.bases[node.build][condition][Param::Speed as usize].max(1500.0),
                )
                .ok()?
                .value
            } else {
                net.reading_on(*path, *p, &solution, &theta)
            };
            out.push((*path, *p, v));
        }
        Some(out)
    }

    /// Engine speed (rpm) that a condition is taken at.
    pub fn speed(&self, build: usize, condition: usize) -> f64 {
        self.bases
            .get(build)
            .and_then(|b| b.get(condition))
            .map_or(0.0, |t| t[Param::Speed as usize])
    }

    /// For each latent its words and its share of the variance of what a port shows on a healthy machine (the first build).
    pub fn shares_of_spread(
        &self,
        healthy: &Fault,
        path: Path,
        port: Port,
        condition: usize,
    ) -> Vec<(String, f64)> {
        let node = Node {
            build: 0,
            path: Path::Left,
            effect: None,
            sign: 1.0,
            quantile: 0.5,
            half: 0.0,
            second: None,
            place: None,
            log_weight: 0.0,
        };
        let (theta, factors) = self.theta(healthy, &node, condition, &[], [0.0; CELLS]);
        let Some(s) = self.shows(&node, condition, &theta) else {
            return Vec::new();
        };
        let Some(at) = s
            .ports
            .iter()
            .position(|(a, p, _)| (*a, *p) == (path, port))
        else {
            return Vec::new();
        };
        let columns = self.latents.0.len() + CELLS;
        let rows = self.latent_rows(
            &s,
            condition,
            &theta,
            &factors,
            healthy,
            &node,
            &[],
            [0.0; CELLS],
        );
        let row = &rows[at * columns..(at + 1) * columns - CELLS];
        self.latents
            .0
            .iter()
            .zip(row)
            .map(|(l, r)| (l.words.clone(), r * r))
            .collect()
    }

    /// Predicts every datum at a node, linearised round scatter `u` (empty: the middle).
    pub fn predict(&self, fault: &Fault, node: &Node, data: &Data, u: &[f64]) -> Prediction {
        self.predict_with(fault, node, data, u, |_| None)
    }

    /// As [`Bench::predict`]; what `known` has of a datum (mean, row, added variance, starved) is taken as it is, and only what
    /// the others need is solved.
    pub fn predict_with<'a>(
        &self,
        fault: &Fault,
        node: &Node,
        data: &Data,
        u: &[f64],
        known: impl Fn(usize) -> Option<Known<'a>>,
    ) -> Prediction {
        let needed = |c: usize| {
            data.data
                .iter()
                .enumerate()
                .any(|(k, d)| (d.condition == c || d.says == Says::Share(c)) && known(k).is_none())
        };
        let columns = self.latents.0.len() + CELLS;
        let (scatter, cells) = u.split_at(u.len().saturating_sub(CELLS));
        let mut shift = [0.0; CELLS];
        for (s, c) in shift.iter_mut().zip(cells) {
            *s = (c / 3f64.sqrt()).clamp(-1.0, 1.0);
        }
        let mut shows: Vec<Option<(Shows, Vec<f64>)>> = Vec::with_capacity(data.conditions.len());
        for c in 0..data.conditions.len() {
            if !needed(c) {
                shows.push(None);
                continue;
            }
            let (theta, factors) = self.theta(fault, node, c, scatter, shift);
            shows.push(self.shows(node, c, &theta).map(|s| {
                let rows = self.latent_rows(&s, c, &theta, &factors, fault, node, scatter, shift);
                (s, rows)
            }));
        }
        let n = data.data.len();
        let mut out = Prediction {
            mean: vec![0.0; n],
            rows: vec![0.0; n * columns],
            columns,
            loose: vec![0.0; n],
            starved: vec![true; n],
            swing: 0.0,
        };
        let mut swings = Swings::default();
        for (k, d) in data.data.iter().enumerate() {
            let row = &mut out.rows[k * columns..(k + 1) * columns];
            if let Some(known) = known(k) {
                out.mean[k] = known.mean;
                out.loose[k] = known.loose;
                out.starved[k] = known.starved;
                known.fill(row);
            } else if let Some((mean, starved)) = self.one(d, &shows, row, columns) {
                out.mean[k] = mean;
                out.starved[k] = starved;
                keep_believable(&mut row[..columns - CELLS]);
            } else {
                // No steady state: the needle could stand anywhere, and would hardly stand still.
                out.mean[k] = d.t;
                out.loose[k] = LOOSE;
            }
            swings.add(d, out.starved[k]);
        }
        out.swing = swings.log();
        out
    }

    /// Predicts every datum at drawn scatter, without derivatives: one member of an ensemble.
    #[cfg(test)]
    pub fn drawn(&self, fault: &Fault, node: &Node, data: &Data, u: &[f64]) -> Prediction {
        let n = data.data.len();
        let mut out = Prediction {
            mean: vec![0.0; n],
            rows: vec![0.0; n],
            columns: 1,
            loose: vec![0.0; n],
            starved: vec![true; n],
            swing: 0.0,
        };
        let mut shown = Vec::with_capacity(data.conditions.len());
        for c in 0..data.conditions.len() {
            let (theta, _) = self.theta(fault, node, c, u, [0.0; CELLS]);
            let start = self.warm.borrow()[node.build][c];
            let net = &self.networks[node.build][c];
            shown.push(net.solve(&theta, start.as_ref()).ok().map(|s| (theta, s)));
        }
        let mut swings = Swings::default();
        for (k, d) in data.data.iter().enumerate() {
            let value = |c: usize| {
                shown[c].as_ref().map(|(theta, s)| {
                    self.networks[node.build][c].reading_on(d.path, d.port, s, theta)
                })
            };
            match (value(d.condition), &d.says) {
                (Some(v), Says::Share(other)) => {
                    out.mean[k] =
                        transform(d.port, v) - value(*other).map_or(0.0, |o| transform(d.port, o));
                }
                (Some(v), _) => out.mean[k] = transform(d.port, v),
                (None, _) => {
                    out.mean[k] = d.t;
                    out.loose[k] = LOOSE;
                }
            }
            let starved = shown[d.condition].as_ref().is_none_or(|(theta, s)| {
                self.networks[node.build][d.condition].filled(d.path, &s.state, theta) < 0.97
                    || theta[Param::Air as usize] > 0.08
            });
            swings.add(d, starved);
        }
        out.swing = swings.log();
        out
    }

    fn one(
        &self,
        d: &Datum,
        shows: &[Option<(Shows, Vec<f64>)>],
        row: &mut [f64],
        columns: usize,
    ) -> Option<(f64, bool)> {
        let (s, rows) = shows[d.condition].as_ref()?;
        let at = s.place(d)?;
        let value = s.ports[at].2.value;
        let starved = s.filled[d.path as usize] < 0.97 || s.air > 0.08;
        match d.says {
            Says::Share(other) => {
                let (o, o_rows) = shows[other].as_ref()?;
                let o_at = o.place(d)?;
                let o_value = o.ports[o_at].2.value;
                let (k, ko) = (slope(d.port, value), slope(d.port, o_value));
                for (i, r) in row.iter_mut().enumerate() {
                    *r = rows[at * columns + i] * k - o_rows[o_at * columns + i] * ko;
                }
                Some((
                    transform(d.port, value) - transform(d.port, o_value),
                    starved,
                ))
            }
            _ => {
                let k = slope(d.port, value);
                for (i, r) in row.iter_mut().enumerate() {
                    *r = rows[at * columns + i] * k;
                }
                Some((transform(d.port, value), starved))
            }
        }
    }

    /// Change of every shown port a standard deviation of every latent, and across the severity cell.
    #[allow(clippy::too_many_arguments)] // private; the parts of one linearisation
    fn latent_rows(
        &self,
        s: &Shows,
        condition: usize,
        theta: &Params,
        factors: &[(usize, f64)],
        fault: &Fault,
        node: &Node,
        scatter: &[f64],
        shift: [f64; CELLS],
    ) -> Vec<f64> {
        let columns = self.latents.0.len() + CELLS;
        let mut rows = vec![0.0; s.ports.len() * columns];
        for (latent, p, path, size) in &self.acts[condition] {
            let size = size * self.split.left(*latent, node.place);
            let place = p.on(*path);
            let factor = factors
                .iter()
                .filter(|(q, _)| *q == place)
                .map(|(_, f)| *f)
                .product::<f64>();
            let change = match p.scale() {
                Scale::Log => theta[place] * size,
                Scale::Linear => size * factor,
            };
            for (i, (_, _, shown)) in s.ports.iter().enumerate() {
                rows[i * columns + latent] += shown.gradient[place] * change;
            }
        }
        // Across a cell: a rectangle of its width has a standard deviation of half of it over √3.
        let wide = [node.half > 0.0, node.second.is_some_and(|s| s.half > 0.0)];
        for cell in (0..CELLS).filter(|c| wide[*c]) {
            let moved = |by: f64| {
                let mut at = shift;
                at[cell] += by;
                self.theta(fault, node, condition, scatter, at).0
            };
            let (high, low) = (moved(0.5), moved(-0.5));
            for place in 0..self.values {
                let change = (high[place] - low[place]) / 3f64.sqrt();
                if change != 0.0 {
                    for (i, (_, _, shown)) in s.ports.iter().enumerate() {
                        rows[i * columns + columns - CELLS + cell] +=
                            shown.gradient[place] * change;
                    }
                }
            }
        }
        rows
    }
}

/// Most that a reading may scatter on its transformed scale (a factor of e) before its slopes are no longer believed: at the edge
/// of a stall they grow without end, and the reading would be explained by anything.
const STEEPEST: f64 = 1.0;

fn keep_believable(row: &mut [f64]) {
    let norm = row.iter().map(|r| r * r).sum::<f64>().sqrt();
    if norm > STEEPEST {
        for r in row {
            *r *= STEEPEST / norm;
        }
    }
}

/// Keeps settings that a machine has in order in order, whatever scatter says.
fn keep_order(theta: &mut Params, path: Path) {
    let start = theta[Param::ServoStart.on(path)];
    let full = &mut theta[Param::ServoFull.on(path)];
    *full = full.max(1.2 * start);
    let start = theta[Param::SenseStart.on(path)];
    let full = &mut theta[Param::SenseFull.on(path)];
    *full = full.max(1.1 * start);
    let air = &mut theta[Param::Air.on(path)];
    *air = air.clamp(0.0, 0.98);
    for p in [
        Param::Load,
        Param::SignalForward,
        Param::SignalReverse,
        Param::PilotSupply,
        Param::DriveGrip,
        Param::ChargeDrive,
        Param::ChargeFeed,
    ] {
        let v = &mut theta[p.on(path)];
        *v = v.max(0.0);
    }
}
