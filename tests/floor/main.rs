//! The floor stage on drawings made in code, with the truth beside them.

#![expect(
    clippy::print_stderr,
    reason = "a failing survey of styles is read line by line"
)]

mod anchors;
mod bridging;
mod contradictions;
mod conventions;
mod copies;
mod ends;
mod ground;
mod groups;
mod heights;
mod joining;
mod joints;
mod kit;
mod labels;
mod laws;
mod lettering;
mod levels;
mod marks;
mod midway;
mod odds;
mod pointing;
mod settling;
mod sketch;
mod steps;
