//! The routing of a study, held against observed inflow and, where that is asked for, fitted to it.

use super::failure::Failure;
use super::ready::Ready;
use crate::fault::Unlikely;
use crate::fit::{InflowRecord, InflowSkill, inflow_skill};
use crate::perturb::MonthlyChange;

/// Runs the record's own years without any warming and holds what is routed against observed inflow; where the scenario asks for a
/// fit, the study goes on with the fitted routing. A study without observed inflow stays as it is.
pub(super) fn held_to_inflow(mut ready: Ready) -> Result<Ready, Failure> {
    let typed = ready.scenario.inflow.as_ref().and_then(|inflow| inflow.observed.as_ref());
    let fits = typed.is_some_and(|typed| typed.fits);
    let (Some(operation), Some(observed)) = (&ready.operation, &ready.observed_inflow) else {
        return Ok(ready);
    };
    let window = operation.settings.volume_windows.first().copied();
    let lanes = ready.lanes(&[MonthlyChange::NONE]);
    let record = InflowRecord::run(&lanes, &ready.weather, observed, operation.area_km2, window)
        .map_err(|open| Failure::Ours(open.to_string()))?;
    let skill = inflow_skill(&record, &operation.routing, fits, ready.scenario.seed);
    ready.unlikely.extend(skill.iter().flat_map(|skill| unlikely(skill, fits)));
    if let (Some(operation), Some(skill)) = (&mut ready.operation, &skill) {
        operation.routing = skill.routing;
    }
    ready.inflow_skill = skill;
    Ok(ready)
}

/// What about modelled inflow is worth a second look.
fn unlikely(skill: &InflowSkill, fits: bool) -> Vec<Unlikely> {
    let mut unlikely = Vec::new();
    if fits && skill.fit.is_none() {
        unlikely.push(Unlikely::new(
            "inflow.observed.fit",
            "observed inflow never changes: there is nothing to fit to, and the routing stays as stated",
        ));
    }
    if skill.lowest_above_mean().is_some_and(|above| above <= 0.0) {
        unlikely.push(Unlikely::new(
            "inflow.observed",
            "modelled inflow of the record's own years is no nearer to observed inflow than the mean of other years on the same day: \
             check the file, its unit and the basin before you rely on inflow or storage",
        ));
    }
    unlikely
}
