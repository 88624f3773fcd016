//! What is fetched after the first screen stands: the house with what reads, writes and draws units and calls, the rooms beside them,
//! and the engine for the worker. The build cuts the app at these functions (feature `split`) and puts what only they reach into modules of their own;
//! without the feature everything is one module and they answer at once.

use super::deed::{Deed, Snapshot};
use web_sys::Element;
use yew::{Callback, Html};

/// Moves the whole app into an element of the page, with what was asked of it before it was there.
pub type MoveIn = fn(Element, Vec<Deed>);

/// Draws the screen of the address.
pub type Draw = fn(&Snapshot, &Callback<Deed>) -> Html;

/// Answers calculations from now on, in a worker.
pub type Answering = fn();

#[cfg(feature = "split")]
pub use wasm_split_helpers::SplitLoaderError as Unreachable;

/// Why a module is not there: cannot happen where all is one.
#[cfg(not(feature = "split"))]
#[derive(Debug)]
pub enum Unreachable {}

/// A function that is known by its address once its module is there.
macro_rules! fetched {
    ($(#[$doc:meta])* $module:ident, $of:ty, $what:expr) => {
        $(#[$doc])*
        #[cfg(feature = "split")]
        #[wasm_split_helpers::wasm_split($module, fallible)]
        pub fn $module() -> Result<$of, Unreachable> {
            Ok($what)
        }

        $(#[$doc])*
        #[cfg(not(feature = "split"))]
        pub async fn $module() -> Result<$of, Unreachable> {
            Ok($what)
        }
    };
}

// What the cut leaves in the source are imports and exports, and declaring those counts as unsafe.
#[allow(unsafe_code)]
mod cut {
    use super::{Answering, Draw, MoveIn, Unreachable};

    fetched! {
        /// The app.
        ///
        /// # Errors
        /// The module could not be fetched. It is tried again at the next call.
        house, MoveIn, crate::app::app_screen::move_in
    }

    fetched! {
        /// The screens beside units, profile and call.
        ///
        /// # Errors
        /// As [`house`].
        rooms, Draw, crate::app::rooms::draw
    }

    fetched! {
        /// The engine's side in a worker.
        ///
        /// # Errors
        /// As [`house`].
        engine, Answering, crate::app::engine::worker::install
    }
}

pub use cut::{engine, house, rooms};
