//! The device's clock: moments as they are kept, and as they are told.

use js_sys::Date;
use wasm_bindgen::JsValue;

const MINUTE_MS: f64 = 60_000.0;
const DAY_MS: f64 = 86_400_000.0;
const MONTHS: [&str; 12] = [
    "Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec",
];

/// This moment as it is kept: ISO 8601, UTC, whole seconds.
pub fn now() -> String {
    let text: String = Date::new_0().to_iso_string().into();
    match text.split_once('.') {
        Some((whole, _)) => format!("{whole}Z"),
        None => text,
    }
}

/// Milliseconds since 1970.
pub fn now_ms() -> f64 {
    Date::now()
}

/// Milliseconds on a clock that only runs forward, whatever is done to the device's time. For stopwatches.
pub fn running_ms() -> f64 {
    web_sys::window()
        .and_then(|window| window.performance())
        .map_or_else(Date::now, |performance| performance.now())
}

/// A kept moment in words, on the device's own clock: "just now", "today 14:05", "yesterday 09:30", "3 Dec 2025". Text that
/// is no moment is told as it stands.
pub fn tell(moment: &str) -> String {
    let then = Date::new(&JsValue::from_str(moment));
    if moment.is_empty() || then.get_time().is_nan() {
        return moment.to_owned();
    }
    let now = Date::new_0();
    let age = now.get_time() - then.get_time();
    if (0.0..MINUTE_MS).contains(&age) {
        return "just now".to_owned();
    }
    let clock = format!("{:02}:{:02}", then.get_hours(), then.get_minutes());
    let day = |date: &Date| {
        Date::new_with_year_month_day(
            date.get_full_year(),
            i32::try_from(date.get_month()).unwrap_or(0),
            i32::try_from(date.get_date()).unwrap_or(1),
        )
        .get_time()
    };
    // Days of 23 and 25 hours round to whole ones.
    let days = ((day(&now) - day(&then)) / DAY_MS).round();
    if days == 0.0 {
        return format!("today {clock}");
    }
    if days == 1.0 {
        return format!("yesterday {clock}");
    }
    let month = MONTHS
        .get(usize::try_from(then.get_month()).unwrap_or(0))
        .copied()
        .unwrap_or_default();
    format!("{} {month} {}", then.get_date(), then.get_full_year())
}

/// The day as it stands in the name of a file: 2025-12-03.
pub fn file_day() -> String {
    let date = Date::new_0();
    format!(
        "{}-{:02}-{:02}",
        date.get_full_year(),
        date.get_month() + 1,
        date.get_date()
    )
}
