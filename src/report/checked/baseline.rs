//! Does the record stand for one climate?

use super::super::trends::{detrended_in_words, trends_in_words, years_stand_for};
use super::{Checked, Page};

impl Checked<'_> {
    pub(super) fn write_baseline(&self, page: &mut Page) {
        let Some(baseline) = self.baseline else { return };
        page.head("Baseline");
        page.line("years stand for", years_stand_for(baseline));
        for trend in trends_in_words(self.reader, baseline) {
            let mut name = trend.name;
            for sentence in trend.sentences {
                page.line(name, sentence);
                name = "";
            }
        }
        let detrended = self.detrended.map_or_else(
            || "no; a change of sensor looks like a trend, so look before you state detrend_to".to_owned(),
            |detrended| detrended_in_words(self.reader, detrended),
        );
        page.line("detrended", detrended);
    }
}
