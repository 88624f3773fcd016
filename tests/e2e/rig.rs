//! One browser and one server per journey, and the moves a journey is made of.
// A later journey uses what today's do not.
#![allow(dead_code)]

use std::fs;
use std::path::{Path, PathBuf};
use std::time::Duration;

use serde_json::{Value, json};
use thirtyfour::WebElement;
use thirtyfour::prelude::*;

use crate::browser::{Chromedriver, Deadline, build_dir, capabilities};
use crate::site::Site;

const LOOK_AGAIN_AFTER: Duration = Duration::from_millis(25);

/// A viewport in CSS pixels.
#[derive(Clone, Copy, Debug)]
pub struct Size {
    pub name: &'static str,
    pub width: u32,
    pub height: u32,
}

pub const PHONE: Size = Size {
    name: "phone",
    width: 360,
    height: 740,
};
pub const TABLET: Size = Size {
    name: "tablet",
    width: 820,
    height: 1180,
};
pub const LAPTOP: Size = Size {
    name: "laptop",
    width: 1366,
    height: 768,
};
/// The narrowest screen on which everything must still be reachable without scrolling sideways (WCAG 2.2, 1.4.10).
pub const NARROW: Size = Size {
    name: "narrow",
    width: 320,
    height: 640,
};

#[derive(Clone, Copy, Debug)]
pub enum Scheme {
    Light,
    Dark,
}

impl Scheme {
    pub fn name(self) -> &'static str {
        match self {
            Self::Light => "light",
            Self::Dark => "dark",
        }
    }
}

/// A browser with an empty profile in front of its own copy of the build.
pub struct Rig {
    pub driver: WebDriver,
    pub site: Site,
    chromedriver: Chromedriver,
}

/// A failed journey must leave no browser behind.
impl Drop for Rig {
    fn drop(&mut self) {
        self.chromedriver
            .close_session(&self.driver.session_id().to_string());
        // Closed above, without the runtime that is going down. An error says that it had been closed before.
        let _ = self.driver.clone().leak();
    }
}

impl Rig {
    /// Starts browser and server. The app is not opened yet.
    pub async fn new(size: Size) -> Self {
        let site = Site::open(&build_dir());
        let chromedriver = Chromedriver::start();
        let driver = WebDriver::new(chromedriver.url(), capabilities(&chromedriver.downloads))
            .await
            .expect("the browser starts");
        let rig = Self {
            driver,
            site,
            chromedriver,
        };
        rig.set_size(size).await;
        rig.cdp(
            "Page.addScriptToEvaluateOnNewDocument",
            json!({ "source": LISTENER }),
        )
        .await;
        rig
    }

    /// Starts browser and server, opens the app and waits for its first screen.
    pub async fn open(size: Size) -> Self {
        let rig = Self::new(size).await;
        rig.load().await;
        rig.wait_for_app().await;
        rig
    }

    /// Ends the journey, having made sure that nothing went wrong unseen. Where complaints belong to the journey, a server
    /// that is gone or a file that is broken, the rig is simply dropped.
    pub async fn close(self) {
        let problems = self.problems().await;
        assert!(
            problems.is_empty(),
            "the browser complains:\n{}",
            problems.join("\n")
        );
    }

    // ---- pages ----

    /// Loads the app's start page.
    pub async fn load(&self) {
        self.driver
            .goto(self.site.url())
            .await
            .expect("the page loads");
    }

    /// Goes to a place in the app by its address after `#`, without loading anew.
    pub async fn go(&self, route: &str) {
        self.js("location.hash = arguments[0];", vec![json!(route)])
            .await;
    }

    pub async fn reload(&self) {
        self.driver.refresh().await.expect("the page loads again");
    }

    /// Waits until the app has taken the place of the start-up shell.
    pub async fn wait_for_app(&self) {
        self.wait_until(
            "the app is there",
            "window.lowsideStarted === true && !document.getElementById('shell') && document.documentElement.dataset.whole === 'yes'",
        )
        .await;
    }

    /// Waits until the app works without its server.
    pub async fn wait_for_offline_copy(&self) {
        self.wait_until(
            "the offline copy is complete",
            "document.documentElement.dataset.offline === 'ready'",
        )
        .await;
    }

    pub async fn set_size(&self, size: Size) {
        let metrics = json!({
            "width": size.width, "height": size.height, "deviceScaleFactor": 1, "mobile": size.width < 600,
        });
        self.cdp("Emulation.setDeviceMetricsOverride", metrics)
            .await;
    }

    pub async fn set_scheme(&self, scheme: Scheme) {
        let features = json!([{ "name": "prefers-color-scheme", "value": scheme.name() }]);
        self.cdp(
            "Emulation.setEmulatedMedia",
            json!({ "features": features }),
        )
        .await;
    }

    // ---- finding and doing ----

    /// The element with this `data-testid`, once it is there and visible.
    pub async fn by_id(&self, testid: &str) -> WebElement {
        self.wait_for_element(by_testid(testid)).await
    }

    /// Whether an element with this `data-testid` is there now.
    pub async fn has(&self, testid: &str) -> bool {
        let found = self.driver.find_all(by_testid(testid)).await;
        !found.expect("the page answers").is_empty()
    }

    /// The field whose visible label begins with this text, once it is there.
    pub async fn by_label(&self, label: &str) -> WebElement {
        const FIND: &str = "const label = [...document.querySelectorAll('label')]
            .find((label) => label.textContent.trim().startsWith(arguments[0]));
            return label?.control ?? null;";
        let deadline = Deadline::new();
        loop {
            let found = self
                .driver
                .execute(FIND, vec![json!(label)])
                .await
                .expect("the page answers");
            if let Ok(element) = found.element() {
                return element;
            }
            if deadline.passed() {
                self.give_up(&format!("a field labelled {label:?}")).await;
            }
            tokio::time::sleep(LOOK_AGAIN_AFTER).await;
        }
    }

    pub async fn click(&self, testid: &str) {
        self.click_on(by_testid(testid)).await;
    }

    /// Clicks the button, link or label with this text.
    pub async fn click_text(&self, text: &str) {
        let path = format!(
            "//*[self::button or self::a or self::summary or self::label][normalize-space(.)=\"{text}\"]"
        );
        self.click_on(By::XPath(path)).await;
    }

    /// Brings the element to the middle first: a sticky bar may lie over it at the edge. Where the screen is being redrawn
    /// and the element moves away or is replaced, looks for it again, as a finger would.
    async fn click_on(&self, by: By) {
        let deadline = Deadline::new();
        loop {
            let element = self.wait_for_element(by.clone()).await;
            let Err(error) = self.try_click(&element).await else {
                return;
            };
            assert!(!deadline.passed(), "not clickable: {error}");
            tokio::time::sleep(LOOK_AGAIN_AFTER).await;
        }
    }

    async fn try_click(&self, element: &WebElement) -> WebDriverResult<()> {
        self.driver
            .execute(TO_THE_MIDDLE, vec![element.to_json()?])
            .await?;
        element.click().await
    }

    /// Types into the field with this `data-testid`, in place of what was there.
    pub async fn fill(&self, testid: &str, text: &str) {
        self.type_into(&self.by_id(testid).await, text).await;
    }

    /// Types into the field with this label, in place of what was there.
    pub async fn fill_label(&self, label: &str, text: &str) {
        self.type_into(&self.by_label(label).await, text).await;
    }

    /// As a person does: mark all that is there, type over it, leave the field.
    async fn type_into(&self, field: &WebElement, text: &str) {
        self.js(TO_THE_MIDDLE, vec![field.to_json().expect("an element")])
            .await;
        field.click().await.expect("the field takes the focus");
        field
            .send_keys(Key::Control + "a")
            .await
            .expect("the field takes keys");
        field
            .send_keys(Key::Delete + "")
            .await
            .expect("the field takes keys");
        field.send_keys(text).await.expect("the field takes keys");
        field
            .send_keys(Key::Tab + "")
            .await
            .expect("the field takes keys");
    }

    /// Chooses the option with this text in the list with this `data-testid`.
    pub async fn choose(&self, testid: &str, option: &str) {
        let list = self.by_id(testid).await;
        let select = thirtyfour::components::SelectElement::new(&list)
            .await
            .expect("a list to choose from");
        select
            .select_by_visible_text(option)
            .await
            .unwrap_or_else(|error| panic!("no option {option:?}: {error}"));
    }

    pub async fn text(&self, testid: &str) -> String {
        self.by_id(testid)
            .await
            .text()
            .await
            .expect("the element is still there")
    }

    /// All visible text of the page.
    pub async fn page_text(&self) -> String {
        let text = self.js("return document.body.innerText;", vec![]).await;
        text.as_str().unwrap_or_default().to_owned()
    }

    // ---- asking and waiting ----

    /// Runs a script in the page; `return` gives its result.
    pub async fn js(&self, script: &str, arguments: Vec<Value>) -> Value {
        let result = self.driver.execute(script, arguments).await;
        result
            .unwrap_or_else(|error| panic!("{script}: {error}"))
            .json()
            .clone()
    }

    /// Runs a script whose promise is waited for: its last argument takes the result.
    pub async fn js_async(&self, script: &str, arguments: Vec<Value>) -> Value {
        let result = self.driver.execute_async(script, arguments).await;
        result
            .unwrap_or_else(|error| panic!("{script}: {error}"))
            .json()
            .clone()
    }

    /// Waits until the script expression is true. `what` says in words what is waited for.
    pub async fn wait_until(&self, what: &str, expression: &str) {
        let script = format!("return !!({expression});");
        let deadline = Deadline::new();
        loop {
            // While a page is being replaced there is nothing to ask.
            let answer = self.driver.execute(script.as_str(), vec![]).await;
            if answer.is_ok_and(|answer| answer.json() == &Value::Bool(true)) {
                return;
            }
            if deadline.passed() {
                self.give_up(what).await;
            }
            tokio::time::sleep(LOOK_AGAIN_AFTER).await;
        }
    }

    /// Waits until this text stands on the page.
    pub async fn wait_for_text(&self, text: &str) {
        let quoted = json!(text).to_string();
        self.wait_until(
            &format!("the text {text:?}"),
            &format!("document.body.innerText.includes({quoted})"),
        )
        .await;
    }

    async fn wait_for_element(&self, by: By) -> WebElement {
        let deadline = Deadline::new();
        loop {
            for element in self.driver.find_all(by.clone()).await.unwrap_or_default() {
                if element.is_displayed().await.unwrap_or(false) {
                    return element;
                }
            }
            if deadline.passed() {
                self.give_up(&format!("{by:?}")).await;
            }
            tokio::time::sleep(LOOK_AGAIN_AFTER).await;
        }
    }

    async fn give_up(&self, what: &str) -> ! {
        let log = self.problems().await.join("\n");
        panic!(
            "waited in vain for {what}\nconsole:\n{log}\npage:\n{}",
            self.page_text().await
        );
    }

    /// What the browser has complained about since the last call: errors, missing files, breaches of the policy.
    pub async fn problems(&self) -> Vec<String> {
        let log = self
            .driver
            .browser_log()
            .await
            .expect("the browser hands out its log");
        let severe = log
            .into_iter()
            .filter(|entry| entry.level == "SEVERE" || entry.message.contains(POLICY));
        severe.map(|entry| entry.message).collect()
    }

    /// Whether the page is wider than the screen, so that one has to scroll sideways.
    pub async fn scrolls_sideways(&self) -> bool {
        let wide =
            "return document.documentElement.scrollWidth > document.documentElement.clientWidth;";
        self.js(wide, vec![]).await == Value::Bool(true)
    }

    /// The one file that was downloaded under a name that begins so, once it is complete.
    pub async fn downloaded(&self, prefix: &str) -> String {
        let deadline = Deadline::new();
        loop {
            let entries = fs::read_dir(&self.chromedriver.downloads).expect("readable");
            let mut paths = entries.map(|entry| entry.expect("readable").path());
            let complete = |path: &PathBuf| {
                let name = path.file_name().unwrap_or_default().to_string_lossy();
                name.starts_with(prefix) && !name.ends_with(".crdownload")
            };
            // The browser first puts an empty file under the final name, and moves the content over it when it is all there.
            let content = |path: PathBuf| fs::read_to_string(path).expect("readable text");
            if let Some(text) = paths
                .find(complete)
                .map(content)
                .filter(|text| !text.is_empty())
            {
                return text;
            }
            if deadline.passed() {
                self.give_up(&format!("a downloaded file {prefix}…")).await;
            }
            tokio::time::sleep(LOOK_AGAIN_AFTER).await;
        }
    }

    /// Writes what the screen shows to a PNG file.
    pub async fn screenshot(&self, path: &Path) {
        self.driver.screenshot(path).await.expect("a picture");
    }

    /// Sends a command of the DevTools protocol.
    pub async fn cdp(&self, method: &str, parameters: Value) -> Value {
        let answer = self.driver.cdp().send_raw(method, parameters).await;
        answer.unwrap_or_else(|error| panic!("{method}: {error}"))
    }
}

fn by_testid(testid: &str) -> By {
    By::Css(format!("[data-testid=\"{testid}\"]"))
}

const TO_THE_MIDDLE: &str =
    "arguments[0].scrollIntoView({ block: 'center', behavior: 'instant' });";
const POLICY: &str = "policy breach:";
/// Puts breaches of the content security policy into the console, where they outlive a reload.
const LISTENER: &str = "addEventListener('securitypolicyviolation', (event) =>
    console.error('policy breach:', event.violatedDirective, event.blockedURI, event.sourceFile, event.lineNumber));";
