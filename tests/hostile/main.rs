//! Drawings that are broken, huge or meant to do harm: read as far as they can be, refused in words where not, in
//! little time and room, and never with a byte lost.

mod caps;
mod corrupted;
mod cut;
mod damaged;
mod drawings;
mod huge;
mod nested;
mod numbers;
mod program;
mod room;
mod twisted;
mod unread;
