//! Inflow: how water that reaches the ground becomes water that reaches the reservoir, day by day.
//!
//! A stated share of the day's water input runs off, month by month; the rest is lost to soil, plants and air. What runs off
//! passes linear reservoirs, one or two side by side: `linear` has the equation, `routing` the parameters, `route` the days.

mod linear;
mod observed;
mod route;
mod routing;

pub use linear::Store;
pub use observed::{FlowColumn, FlowColumns, ObservedInflow, read};
pub use route::{Router, WaterYear};
pub use routing::{LONGEST_RECESSION_DAYS, Routing, SlowStore};
