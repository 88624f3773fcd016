//! The elements put together: balance of flow at every node, its exact derivatives, and its change with each parameter.

use super::element::{Element, Law, elements, flow};
use super::layout::Layout;
use super::lu::{Matrix, Vector};
use super::node::{Node, State, UNKNOWNS};
use super::param::{Param, Params};
use super::real::{Dual, Real};

/// Most parameters that one element uses.
const PARAM_LANES: usize = 20;

/// A circuit of one build, ready to be solved for any parameters.
#[derive(Clone, Debug)]
pub struct Network {
    layout: Layout,
    elements: Vec<Element>,
}

#[inline(always)]
fn gather<S: Real>(element: &Element, x: &State, lane: impl Fn(f64, usize) -> S) -> [S; 4] {
    let mut v = [S::constant(0.0); 4];
    for (i, slot) in v.iter_mut().enumerate().take(element.arity) {
        *slot = lane(x[element.inputs[i].at()], i);
    }
    v
}

impl Network {
    /// The circuit of a layout.
    pub fn new(layout: Layout) -> Network {
        Network {
            layout,
            elements: elements(&layout),
        }
    }

    /// Its layout.
    pub fn layout(&self) -> &Layout {
        &self.layout
    }

    /// Its rows.
    pub fn elements(&self) -> &[Element] {
        &self.elements
    }

    /// Flow through one element at a state.
    pub fn flow(&self, element: &Element, x: &State, theta: &Params) -> f64 {
        let v = gather(element, x, |value, _| value);
        flow(element.law, &self.layout, &v, &|p: Param| theta[p as usize])
    }

    /// Net inflow at every node (L/min; bar of torque in the shaft row).
    pub fn balance(&self, x: &State, theta: &Params) -> Vector {
        let mut f = [0.0; UNKNOWNS + 1];
        for e in &self.elements {
            let q = self.flow(e, x, theta);
            f[e.from.at()] -= q;
            f[e.to.at()] += q;
        }
        self.close(f, x)
    }

    /// Net inflow and its exact derivatives with respect to the unknowns.
    pub fn balance_and_slope(&self, x: &State, theta: &Params) -> (Vector, Matrix) {
        let mut f = [0.0; UNKNOWNS + 1];
        let mut j = [[0.0; UNKNOWNS]; UNKNOWNS];
        for e in &self.elements {
            if e.arity == 2 {
                self.stamp::<2>(e, x, theta, &mut f, &mut j);
            } else {
                self.stamp::<4>(e, x, theta, &mut f, &mut j);
            }
        }
        if self.layout.held {
            j[Node::Shaft.at()] = [0.0; UNKNOWNS];
            j[Node::Shaft.at()][Node::Shaft.at()] = -1.0;
        }
        (self.close(f, x), j)
    }

    #[inline(always)]
    fn stamp<const N: usize>(
        &self,
        e: &Element,
        x: &State,
        theta: &Params,
        f: &mut [f64; UNKNOWNS + 1],
        j: &mut Matrix,
    ) {
        let v = gather(e, x, |value, lane| {
            if lane < N {
                Dual::<N>::input(value, lane)
            } else {
                Dual::constant(value)
            }
        });
        let q = flow(e.law, &self.layout, &v, &|p: Param| {
            Dual::<N>::constant(theta[p as usize])
        });
        let (from, to) = (e.from.at(), e.to.at());
        f[from] -= q.v;
        f[to] += q.v;
        for (lane, d) in q.d.iter().enumerate().take(e.arity) {
            let column = e.inputs[lane].at();
            if column < UNKNOWNS {
                if from < UNKNOWNS {
                    j[from][column] -= d;
                }
                if to < UNKNOWNS {
                    j[to][column] += d;
                }
            }
        }
    }

    fn close(&self, f: [f64; UNKNOWNS + 1], x: &State) -> Vector {
        let mut out = [0.0; UNKNOWNS];
        out.copy_from_slice(&f[..UNKNOWNS]);
        if self.layout.held {
            out[Node::Shaft.at()] = -x[Node::Shaft.at()];
        }
        out
    }

    /// For an output with adjoint `lambda` (from Jᵀ λ = ∂y/∂x), adds −λᵀ ∂F/∂θ to `out`: the output's total derivative
    /// with respect to every parameter, by the implicit function theorem.
    pub fn add_adjoint(&self, x: &State, theta: &Params, lambda: &Vector, out: &mut Params) {
        for e in &self.elements {
            let weight = self.end(lambda, e.from) - self.end(lambda, e.to);
            if weight == 0.0 || (self.layout.held && matches!(e.law, Law::Torque)) {
                continue;
            }
            let partials = self.param_partials(e, x, theta);
            for (p, d) in e.params.iter().zip(partials) {
                out[*p as usize] += weight * d;
            }
        }
    }

    #[inline(always)]
    fn end(&self, lambda: &Vector, node: Node) -> f64 {
        if node.at() < UNKNOWNS {
            lambda[node.at()]
        } else {
            0.0
        }
    }

    /// Partial derivatives of one element's flow with respect to its own parameters.
    fn param_partials(&self, e: &Element, x: &State, theta: &Params) -> [f64; PARAM_LANES] {
        match e.params.len() {
            0..=4 => self.partials_in::<4>(e, x, theta),
            5..=8 => self.partials_in::<8>(e, x, theta),
            _ => self.partials_in::<PARAM_LANES>(e, x, theta),
        }
    }

    #[inline(always)]
    fn partials_in<const N: usize>(
        &self,
        e: &Element,
        x: &State,
        theta: &Params,
    ) -> [f64; PARAM_LANES] {
        let v = gather(e, x, |value, _| Dual::<N>::constant(value));
        let q = flow(e.law, &self.layout, &v, &|p: Param| {
            seeded::<N>(e.params, theta, p)
        });
        let mut out = [0.0; PARAM_LANES];
        out[..N].copy_from_slice(&q.d);
        out
    }
}

/// A parameter as a dual number: an input where it stands in `lanes`, a constant elsewhere.
#[inline(always)]
pub fn seeded<const N: usize>(lanes: &[Param], theta: &Params, p: Param) -> Dual<N> {
    let value = theta[p as usize];
    match lanes.iter().position(|l| *l == p) {
        Some(lane) if lane < N => Dual::input(value, lane),
        _ => Dual::constant(value),
    }
}
