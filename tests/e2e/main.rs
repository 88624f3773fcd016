//! Journeys through the finished build in a real browser. `bash .ci/run` builds and runs them.
