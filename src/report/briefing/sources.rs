//! The published methods that the numbers come from.

use maud::{Markup, html};

/// What was used, and who published it.
const SOURCES: [(&str, &str); 31] = [
    ("Degree-days of a day's sine between minimum and maximum", "Baskerville & Emin 1969"),
    ("Rain and snow by a smooth curve, where chosen", "Dai 2008, Geophysical Research Letters 35 L12802"),
    ("Years resampled in runs (stationary bootstrap)", "Politis & Romano 1994"),
    (
        "Chains of wet and dry days, and their order",
        "Richardson 1981, Water Resources Research 17:182; Katz 1981; Schwarz 1978",
    ),
    ("Amounts of mixed exponentials", "Wilks 1999, Agricultural and Forest Meteorology 93:153"),
    ("Temperatures that remember the day before", "Matalas 1967; Richardson 1981"),
    ("Variance from year to year given back (nesting)", "Srikanthan & Pegram 2009"),
    ("Quantiles, type 8", "Hyndman & Fan 1996, The American Statistician 50:361"),
    ("Monte Carlo error by resampling, and by the infinitesimal jackknife", "Efron & Tibshirani 1993"),
    (
        "Break-even precipitation (roots by ITP)",
        "Oliveira & Takahashi 2021, ACM Transactions on Mathematical Software 47:5",
    ),
    ("Dry and warm snow drought", "Harpold, Dettinger & Rajagopal 2017, Eos 98"),
    ("Snow at risk", "Nolin & Daly 2006, Journal of Hydrometeorology 7:1164"),
    ("Independence of two halves, exact test", "Fisher 1935"),
    ("Interval of a ratio of two chances", "Katz, Baptista, Azen & Pike 1978, Biometrics 34:469"),
    ("Temperatures of half snow", "Jennings, Winchell, Livneh & Molotch 2018, Nature Communications 9:1148"),
    ("Outflow centroid", "Stewart, Cayan & Dettinger 2005"),
    ("SWE area, the storage-time integral", "Aragon & Hill 2024, Hydrology and Earth System Sciences 28:781"),
    ("Seasonal snow cover of 60 days", "Hatchett 2021, Hydrology 8:32"),
    ("Recession of a linear store", "Maillet 1905"),
    ("Linear stores in the routing of water", "Nash 1957"),
    (
        "Reliability, resilience, vulnerability",
        "Hashimoto, Stedinger & Loucks 1982, Water Resources Research 18:14",
    ),
    (
        "Water that runs off, as a share, falls with warming",
        "McCabe, Wolock, Pederson, Woodhouse & McAfee 2017, Earth Interactions 21:10",
    ),
    ("Classes of years with limits that stay or move", "Null & Viers 2013"),
    ("Correlation, of values", "Pearson 1895"),
    ("Correlation, of ranks", "Spearman 1904"),
    ("Mann-Kendall test with lag-1 correction", "Hamed & Rao 1998"),
    ("Slope of a trend", "Theil 1950; Sen 1968"),
    ("Step in a series", "Pettitt 1979"),
    ("Interval of a proportion", "Wilson 1927"),
    ("Nash-Sutcliffe efficiency", "Nash & Sutcliffe 1970"),
    ("Kling-Gupta efficiency", "Gupta, Kling, Yilmaz & Martinez 2009"),
];

/// The section.
pub(super) fn section() -> Markup {
    html! {
        dl { @for (what, who) in SOURCES { dt { (what) } dd { (who) } } }
    }
}
