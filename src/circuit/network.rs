//! The elements put together: balance of flow at every node, its exact derivatives, and its change with each parameter.
//!
//! `N` is the number of places that are solved for: one path, or a tandem (`node.rs`). Paths that are wholly apart are two
//! circuits of one path each, side by side in one state.

use super::element::{Element, Law, elements, flow};
use super::layout::{Arrangement, Layout};
use super::lu::{Matrix, Vector};
use super::node::{Node, State, UNKNOWNS};
use super::param::{Belongs, Param, Params, VALUES};
use super::real::{Dual, Real};
use crate::readings::Path;

/// Most parameters that one element uses.
const PARAM_LANES: usize = 20;

/// An element with the places of its nodes in a state.
#[derive(Clone, Debug)]
struct Row {
    element: Element,
    from: usize,
    to: usize,
    inputs: [usize; 4],
}

/// A circuit of one build, ready to be solved for any parameters.
#[derive(Clone, Debug)]
pub struct Network {
    layout: Layout,
    rows: Vec<Row>,
    /// The right path, where it is a circuit of its own.
    pub(super) apart: Option<Box<Network>>,
}

#[inline(always)]
fn gather<S: Real>(row: &Row, x: &State, lane: impl Fn(f64, usize) -> S) -> [S; 4] {
    let mut v = [S::constant(0.0); 4];
    for (i, slot) in v.iter_mut().enumerate().take(row.element.arity) {
        *slot = lane(x[row.inputs[i]], i);
    }
    v
}

/// Place of the value that a path's elements use: what is common is taken from the left path.
#[inline(always)]
pub(super) fn used(path: Path, p: Param) -> usize {
    match (path, p.belongs()) {
        (Path::Right, Belongs::Path) => p.on(Path::Right),
        _ => p.on(Path::Left),
    }
}

impl Network {
    /// The circuit of a layout.
    pub fn new(layout: Layout) -> Network {
        let rows = elements(&layout)
            .into_iter()
            .map(|element| {
                let at = |n: Node| n.in_tandem(element.path);
                Row {
                    from: at(element.from),
                    to: at(element.to),
                    inputs: element.inputs.map(at),
                    element,
                }
            })
            .collect();
        let apart = (layout.arrangement == Arrangement::Apart).then(|| {
            Box::new(Network::new(Layout {
                arrangement: Arrangement::Single,
                held: [layout.held[1]; 2],
                bridged: [layout.bridged[1]; 2],
                ..layout
            }))
        });
        Network {
            layout,
            rows,
            apart,
        }
    }

    /// Its layout.
    pub fn layout(&self) -> &Layout {
        &self.layout
    }

    /// Place of a path's node in a state.
    pub fn at(&self, path: Path, node: Node) -> usize {
        match (path, self.layout.arrangement) {
            (Path::Left, _) | (_, Arrangement::Single) => node.at(),
            (Path::Right, Arrangement::Tandem) => node.in_tandem(path),
            (Path::Right, Arrangement::Apart) => match node {
                Node::Tank => node.at(),
                own => UNKNOWNS + 1 + own.at(),
            },
        }
    }

    /// The same parameters, those of the right path in the first place.
    pub(super) fn right_view(theta: &Params) -> Params {
        let mut view = *theta;
        for p in Param::ALL {
            if p.belongs() != Belongs::Machine {
                view[p.on(Path::Left)] = theta[p.on(Path::Right)];
            }
        }
        view
    }

    /// A change with the parameters in the places of [`Network::right_view`], put back where they belong.
    pub(super) fn from_right_view(view: &Params) -> Params {
        let mut out = [0.0; VALUES];
        for p in Param::ALL {
            let home = if p.belongs() == Belongs::Machine {
                Path::Left
            } else {
                Path::Right
            };
            out[p.on(home)] = view[p.on(Path::Left)];
        }
        out
    }

    /// Flow through one element at a state.
    fn flow_of(&self, row: &Row, x: &State, theta: &Params) -> f64 {
        let v = gather(row, x, |value, _| value);
        let path = row.element.path;
        flow(row.element.law, &self.layout, path, &v, &|p: Param| {
            theta[used(path, p)]
        })
    }

    /// Every element with the flow through it (L/min; bar of torque for the shaft's).
    pub fn flows<'a>(
        &'a self,
        x: &'a State,
        theta: &'a Params,
    ) -> impl Iterator<Item = (&'a Element, f64)> {
        self.rows
            .iter()
            .map(move |r| (&r.element, self.flow_of(r, x, theta)))
    }

    /// Net inflow at every node and its exact derivatives with respect to the unknowns.
    pub(super) fn balance_and_slope<const N: usize>(
        &self,
        x: &State,
        theta: &Params,
    ) -> (Vector<N>, Matrix<N>) {
        let mut f = [0.0; N];
        let mut j = [[0.0; N]; N];
        for row in &self.rows {
            if row.element.arity == 2 {
                self.stamp::<2, N>(row, x, theta, &mut f, &mut j);
            } else {
                self.stamp::<4, N>(row, x, theta, &mut f, &mut j);
            }
        }
        for (place, value) in self.fixed::<N>(x) {
            f[place] = -value;
            j[place] = [0.0; N];
            j[place][place] = -1.0;
        }
        (f, j)
    }

    #[inline(always)]
    fn stamp<const L: usize, const N: usize>(
        &self,
        row: &Row,
        x: &State,
        theta: &Params,
        f: &mut Vector<N>,
        j: &mut Matrix<N>,
    ) {
        let e = &row.element;
        let v = gather(row, x, |value, lane| {
            if lane < L {
                Dual::<L>::input(value, lane)
            } else {
                Dual::constant(value)
            }
        });
        let q = flow(e.law, &self.layout, e.path, &v, &|p: Param| {
            Dual::<L>::constant(theta[used(e.path, p)])
        });
        let (from, to) = (row.from, row.to);
        if from < N {
            f[from] -= q.v;
        }
        if to < N {
            f[to] += q.v;
        }
        for (lane, d) in q.d.iter().enumerate().take(e.arity) {
            let column = row.inputs[lane];
            if column < N {
                if from < N {
                    j[from][column] -= d;
                }
                if to < N {
                    j[to][column] += d;
                }
            }
        }
    }

    /// Places whose value is given, with what they are off by: shafts that cannot turn, and the tank where it is among them.
    fn fixed<const N: usize>(&self, x: &State) -> impl Iterator<Item = (usize, f64)> {
        let tank = (N > Node::Tank.at()).then_some(Node::Tank.at());
        let left = self.layout.held[0].then_some(Node::Shaft.at());
        let right =
            (N > UNKNOWNS && self.layout.held[1]).then_some(Node::Shaft.in_tandem(Path::Right));
        let values = [tank, left, right].map(|p| p.map(|p| (p, x[p])));
        values.into_iter().flatten()
    }

    /// For an output with adjoint `lambda` (from Jᵀ λ = ∂y/∂x), adds −λᵀ ∂F/∂θ to `out`: the output's total derivative
    /// with respect to every parameter, by the implicit function theorem.
    pub(super) fn add_adjoint<const N: usize>(
        &self,
        x: &State,
        theta: &Params,
        lambda: &Vector<N>,
        out: &mut Params,
    ) {
        let end = |place: usize| lambda.get(place).copied().unwrap_or(0.0);
        for row in &self.rows {
            let e = &row.element;
            let held = self.layout.held[e.path as usize];
            let tank = Node::Tank.at();
            let at = |place: usize| if place == tank { 0.0 } else { end(place) };
            let weight = at(row.from) - at(row.to);
            if weight == 0.0 || (held && matches!(e.law, Law::Torque)) {
                continue;
            }
            let partials = self.param_partials(row, x, theta);
            for (p, d) in e.params.iter().zip(partials) {
                out[used(e.path, *p)] += weight * d;
            }
        }
    }

    /// Partial derivatives of one element's flow with respect to its own parameters.
    fn param_partials(&self, row: &Row, x: &State, theta: &Params) -> [f64; PARAM_LANES] {
        match row.element.params.len() {
            0..=4 => self.partials_in::<4>(row, x, theta),
            5..=8 => self.partials_in::<8>(row, x, theta),
            _ => self.partials_in::<PARAM_LANES>(row, x, theta),
        }
    }

    #[inline(always)]
    fn partials_in<const L: usize>(
        &self,
        row: &Row,
        x: &State,
        theta: &Params,
    ) -> [f64; PARAM_LANES] {
        let e = &row.element;
        let v = gather(row, x, |value, _| Dual::<L>::constant(value));
        let q = flow(e.law, &self.layout, e.path, &v, &|p: Param| {
            seeded::<L>(e.params, e.path, theta, p)
        });
        let mut out = [0.0; PARAM_LANES];
        out[..L].copy_from_slice(&q.d);
        out
    }
}

/// A path's parameter as a dual number: an input where it stands in `lanes`, a constant elsewhere.
#[inline(always)]
pub fn seeded<const L: usize>(lanes: &[Param], path: Path, theta: &Params, p: Param) -> Dual<L> {
    let value = theta[used(path, p)];
    match lanes.iter().position(|l| *l == p) {
        Some(lane) if lane < L => Dual::input(value, lane),
        _ => Dual::constant(value),
    }
}
