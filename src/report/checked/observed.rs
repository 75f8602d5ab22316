//! Sites with observed snow: what their files hold.

use super::{Checked, Page};
use crate::fit::Site;
use crate::observed::{Counts, Kind};
use crate::weather::Suspicion;
use serde::Serialize;

/// A site in the document.
#[derive(Serialize)]
pub(super) struct SiteDocument<'a> {
    name: &'a str,
    elevation_m: f64,
    kind: Kind,
    file: Counts,
    suspicious: &'a [Suspicion],
}

impl<'a> SiteDocument<'a> {
    pub fn of(site: &Site<'a>) -> Self {
        Self {
            name: site.name,
            elevation_m: site.elevation_m,
            kind: site.observations.kind,
            file: site.observations.counts,
            suspicious: &site.observations.suspicions,
        }
    }
}

impl Checked<'_> {
    pub(super) fn write_observed(&self, page: &mut Page) {
        if self.sites.is_empty() {
            return;
        }
        page.head("Observed snow");
        for site in &self.sites {
            let elevation = self.reader.elevation(site.elevation_m);
            page.paragraph(&format!("{}: {}", site.name, site.observations.words(&elevation)));
        }
    }
}
