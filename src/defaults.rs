//! What holds because nothing was typed.

use serde::Serialize;
use std::fmt;

/// A default that is in force because nothing was typed.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct DefaultInForce {
    /// The scenario key.
    pub key: String,
    /// Its value, as one would type it.
    pub value: String,
    /// What else of the scenario brings this default in place of the usual one, as one would type it; none where it is the
    /// usual one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub with: Option<&'static str>,
}

impl fmt::Display for DefaultInForce {
    /// `snow.melt_base_c = 2, with [snow.radiation]`.
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{} = {}", self.key, self.value)?;
        self.with.map_or(Ok(()), |with| write!(f, ", with {with}"))
    }
}
