//! Files to and from the person: handing one over as a download, reading one that was picked.

use js_sys::{Array, ArrayBuffer, Uint8Array};
use wasm_bindgen::closure::Closure;
use wasm_bindgen::{JsCast, JsValue};
use web_sys::{Blob, BlobPropertyBag, File, FileReader, HtmlAnchorElement, ProgressEvent, Url};

use super::timer::Timer;

/// The browser reads a blob after the click that starts the download returns.
const KEEP_URL_MS: i32 = 60_000;

/// A unit's name as part of the name of a file: letters and digits of any script, dashes for the rest, forty at most.
pub fn name_part(name: &str) -> String {
    let plain: String = name
        .trim()
        .chars()
        .map(|c| if c.is_alphanumeric() { c } else { '-' })
        .take(40)
        .collect();
    plain.trim_matches('-').to_owned()
}

/// Hands `text` to the browser as a download of this name.
///
/// # Errors
/// The browser's own words.
pub fn hand_over(name: &str, kind: &str, text: &str) -> Result<(), String> {
    let words = |error: JsValue| format!("{error:?}");
    let document = web_sys::window()
        .and_then(|window| window.document())
        .ok_or("there is no page")?;
    let options = BlobPropertyBag::new();
    options.set_type(kind);
    let blob = Blob::new_with_str_sequence_and_options(&Array::of1(&text.into()), &options)
        .map_err(words)?;
    let url = Url::create_object_url_with_blob(&blob).map_err(words)?;
    let link: HtmlAnchorElement = document
        .create_element("a")
        .map_err(words)?
        .dyn_into()
        .map_err(|_| "no link could be made")?;
    link.set_href(&url);
    link.set_download(name);
    let body = document.body().ok_or("the page is empty")?;
    body.append_child(&link).map_err(words)?;
    link.click();
    link.remove();
    let timer = Timer::once(KEEP_URL_MS, move || {
        // Freeing memory; there is nothing to do where it fails.
        let _ = Url::revoke_object_url(&url);
    });
    // It outlives this call on purpose, and frees the text when it has run.
    std::mem::forget(timer);
    Ok(())
}

/// Reads a picked file and hands its bytes on, with the reason where it could not be read.
pub fn read(
    file: &File,
    largest_bytes: usize,
    done: impl FnOnce(Result<Vec<u8>, String>) + 'static,
) {
    // Sizes of files are whole numbers far below 2^53.
    if file.size() > largest_bytes as f64 {
        done(Err(format!(
            "{} has {:.1} MB. A file of this app has {:.0} MB at most.",
            file.name(),
            file.size() / 1e6,
            largest_bytes as f64 / 1e6
        )));
        return;
    }
    let reader = match FileReader::new() {
        Ok(reader) => reader,
        Err(error) => return done(Err(format!("{error:?}"))),
    };
    let name = file.name();
    let outcome = reader.clone();
    let on_end = Closure::once_into_js(move |_: ProgressEvent| {
        let buffer = outcome
            .result()
            .ok()
            .filter(|value| value.is_instance_of::<ArrayBuffer>());
        done(match buffer {
            Some(buffer) => Ok(Uint8Array::new(&buffer).to_vec()),
            None => Err(format!("{name} could not be read by the browser.")),
        });
    });
    reader.set_onloadend(Some(on_end.unchecked_ref()));
    // A failure to start is an end without a result, but no event tells of it.
    if let Err(error) = reader.read_as_array_buffer(file) {
        reader.set_onloadend(None);
        web_sys::console::warn_1(&error);
    }
}
