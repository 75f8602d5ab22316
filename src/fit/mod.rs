//! The model against observed snow (method, section 12): how well the parameters in use reproduce what was measured.
//!
//! `scores` holds the published measures of agreement, `site` runs the model where the snow was measured, `year` takes
//! one water year of both, `comparison` puts a site's years together. `place` takes any place day by day. `inflow` holds
//! routed water input against observed inflow.

mod comparison;
mod day_of_year_mean;
mod dispersed;
mod failing_sensor;
mod held_against;
mod hill;
mod inflow;
#[cfg(test)]
mod invented;
mod judged;
mod left_out;
mod not_seen;
mod objective;
mod parameter;
mod place;
mod principal_axes;
mod profile;
mod refine;
mod resampled_winters;
mod run;
mod scores;
mod search;
mod site;
mod skill_in_short;
mod slope;
mod space;
mod splits;
mod student;
mod sums;
mod trials;
mod uncertainty;
mod year;

pub use comparison::{Bias, Comparison, DateError, SurveyBias};
pub use inflow::{
    InflowFit, InflowHalf, InflowRecord, InflowScores, InflowSkill, InflowYear, VolumeScores, inflow_skill,
};
pub use judged::{Held, Judged};
pub use left_out::{LeftOut, Rule, left_out, without};
pub use not_seen::not_seen;
pub use objective::Objective;
pub use parameter::{PARAMETERS, Parameter, Parameters};
pub use place::{ObservedAt, Place, PlaceDays, PlaceYear, place_years};
pub use profile::{FLAT_PROFILE, Profile};
pub use refine::refine;
pub use run::{FitEnd, FitResult, Fitted, Follow, LEAST_WINTERS, Plan, Stage, Unfollowed, fit};
pub use scores::{KlingGupta, Pair, kling_gupta, nash_sutcliffe};
pub use search::{Asked, Found, Search, search};
pub use site::{Model, Site, compare, site_lanes};
pub use skill_in_short::{SkillInShort, skill_in_short};
pub use slope::Slope;
pub use space::{Bounded, Space, Value};
pub use splits::{Split, Winter, winters_of};
pub use trials::{Trial, Trials};
pub use uncertainty::{ParameterRange, ParameterSet, Uncertainty};
pub use year::{ComparedYear, DayPair, SurveyPair};
