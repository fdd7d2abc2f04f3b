//! What an archive told a judgement, kept with it so that it can be recomputed when the archive has gone on.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::check::LastCheck;
use crate::sampling::PastLot;

/// What an archive told.
#[derive(Clone, Debug, Default, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
pub struct Told {
    /// The last passed check of the rig, up to the day of the judgement; `null` where there is none, or a failed one came
    /// after it.
    pub last_check: Option<LastCheck>,
    /// The last check of the rig, where it failed.
    pub failed_check: Option<LastCheck>,
    /// The lots of this drawing and supplier before this one, in the order of their decisions.
    pub past_lots: Vec<PastLot>,
}
