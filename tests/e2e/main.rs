//! Journeys through the finished build in a real browser: `bash .ci/run` builds it and runs them.
//!
//! By hand, after `trunk build --release`: `cargo test --features e2e --test e2e -- --test-threads=1`. They need Chromium
//! and chromedriver; `CHROMEDRIVER` names the latter, `LOWSIDE_DIST` a build other than `dist/`.
//!
//! A journey takes a [`rig::Rig`]: its own browser with an empty profile, and its own server for its own copy of the
//! build, which it may change, break off or stop.

mod browser;
mod hands;
mod journeys_bench;
mod journeys_call;
mod journeys_close;
mod journeys_everyone;
mod journeys_many;
mod journeys_neutral;
mod journeys_offline;
mod journeys_papers;
mod journeys_sides;
mod journeys_start;
mod journeys_tracking;
mod journeys_watch;
mod journeys_yard;
mod pace;
mod rig;
mod shots;
mod site;
