//! The job: what the office, the system and the standard say, resolved. No option with a default is left open here.

mod default;
mod resolved;

pub use resolved::{
    Conventions, Datum, FromFace, HeightReading, Job, Layers, Limits, LongTerm, LongTermMethod,
    Profiling, SlabJob, StrandSize, Stressing, System, Wobble,
};
