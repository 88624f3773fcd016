//! Parts of a screen that may be drawn a moment later than the rest. An edit or an answer changes nearly all of a long call, and drawn
//! in one piece that would hold the next key up. What is at hand is drawn at once; every other part follows in a turn of its own, in
//! between the browser takes keys and shows what is there. A part with fields to type into must be drawn at once while somebody types.

use crate::app::platform::timer::Timer;
use yew::{
    BaseComponent, Html, Properties, component, html, use_effect_with, use_force_update,
    use_mut_ref,
};

/// Properties of [`Late`].
#[derive(Properties)]
pub struct LateProps<C: BaseComponent>
where
    C::Properties: Clone + PartialEq,
{
    /// Properties of the part.
    pub of: C::Properties,
    /// Draw it at once: somebody is working in it.
    #[prop_or_default]
    pub now: bool,
}

// Derived, these would ask the same of the component itself.
impl<C: BaseComponent> Clone for LateProps<C>
where
    C::Properties: Clone + PartialEq,
{
    fn clone(&self) -> Self {
        LateProps {
            of: self.of.clone(),
            now: self.now,
        }
    }
}

impl<C: BaseComponent> PartialEq for LateProps<C>
where
    C::Properties: Clone + PartialEq,
{
    fn eq(&self, other: &Self) -> bool {
        self.now == other.now && self.of == other.of
    }
}

/// A part drawn in its own turn. When it is first there, it is drawn at once.
#[component]
pub fn Late<C>(props: &LateProps<C>) -> Html
where
    C: BaseComponent + 'static,
    C::Properties: Clone + PartialEq,
{
    let shown = use_mut_ref(|| props.of.clone());
    let redraw = use_force_update();
    if props.now {
        shown.replace(props.of.clone());
    }
    {
        let (shown, wanted) = (shown.clone(), props.of.clone());
        use_effect_with(wanted, move |wanted| {
            let is_shown = *shown.borrow() == *wanted;
            let wanted = wanted.clone();
            let turn = (!is_shown).then(|| {
                Timer::once(0, move || {
                    shown.replace(wanted);
                    redraw.force_update();
                })
            });
            // A newer wish takes the place of one whose turn has not come.
            move || drop(turn)
        });
    }
    let now = shown.borrow().clone();
    html! { <C ..now /> }
}
