//! Frame and state: the skeleton once, each compound as a small decoration of it.
//!
//! Read [`skeleton`] (what a frame is), then [`decoration`] (what a compound adds to it).

pub mod decoration;
pub mod skeleton;

pub use decoration::Decoration;
pub use skeleton::Frame;
