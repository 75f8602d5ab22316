//! Where a fit searches: its parameters, each within its bounds, as points of the unit cube.

use super::parameter::{PARAMETERS, Parameter, Parameters};
use serde::Serialize;

/// A parameter and the bounds within which it is searched for.
#[derive(Debug, Clone, Copy)]
pub struct Bounded {
    /// The parameter.
    pub parameter: &'static Parameter,
    /// Its lowest and highest value.
    pub bounds: [f64; 2],
}

/// The scenario's parameters, and those of them that are searched for.
#[derive(Debug, Clone)]
pub struct Space {
    stated: Parameters,
    searched: Vec<Bounded>,
}

/// A parameter by its key, and its value.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Value {
    /// The scenario's key.
    pub key: &'static str,
    /// The value.
    pub value: f64,
}

impl Space {
    /// Of the scenario's parameters and those searched for, which are taken in the order of [`PARAMETERS`]: where one limits
    /// another, the one that limits is set first. Those that the rules and options in use do not have are left out.
    pub fn new(stated: &Parameters, searched: &[Bounded]) -> Self {
        let in_order = PARAMETERS
            .iter()
            .filter_map(|parameter| searched.iter().find(|bounded| bounded.parameter.key == parameter.key))
            .filter(|bounded| bounded.parameter.get(stated).is_some());
        Self { searched: in_order.copied().collect(), stated: stated.clone() }
    }

    /// The scenario's parameters.
    pub fn stated(&self) -> &Parameters {
        &self.stated
    }

    /// The parameters searched for.
    pub fn searched(&self) -> &[Bounded] {
        &self.searched
    }

    /// The same without the parameter in this place: it stays at the scenario's value.
    pub fn without(mut self, place: usize) -> Self {
        self.searched.remove(place);
        self
    }

    /// The parameters at a point.
    pub fn at(&self, point: &[f64]) -> Parameters {
        let mut parameters = self.stated.clone();
        for (bounded, share) in self.searched.iter().zip(point) {
            bounded.parameter.set(&mut parameters, bounded.value(*share));
        }
        parameters
    }

    /// The point nearest to the scenario's own values.
    pub fn start(&self) -> Vec<f64> {
        let share = |bounded: &Bounded| {
            let value = bounded.parameter.get(&self.stated).unwrap_or(bounded.bounds[0]);
            let [low, high] = bounded.bounds;
            ((value - low) / (high - low)).clamp(0.0, 1.0)
        };
        self.searched.iter().map(share).collect()
    }

    /// The values searched for, as they stand in some parameters.
    pub fn values(&self, of: &Parameters) -> Vec<Value> {
        let value =
            |bounded: &Bounded| Some(Value { key: bounded.parameter.key, value: bounded.parameter.get(of)? });
        self.searched.iter().filter_map(value).collect()
    }
}

impl Bounded {
    /// A parameter within its usual bounds.
    pub fn usual(parameter: &'static Parameter) -> Self {
        Self { parameter, bounds: parameter.bounds }
    }

    /// The value at a share of the way from the lowest to the highest.
    pub fn value(&self, share: f64) -> f64 {
        let [low, high] = self.bounds;
        low + share * (high - low)
    }
}
