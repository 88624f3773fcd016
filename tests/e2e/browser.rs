//! The browser of a journey: chromedriver on a port of its own, and what the browser is started with.

use std::fs;
use std::io::{BufRead, BufReader, Read, Write};
use std::net::TcpStream;
use std::path::{Path, PathBuf};
use std::process::{Child, Command, Stdio};
use std::time::{Duration, Instant};

use serde_json::json;
use thirtyfour::LoggingPrefsLogLevel;
use thirtyfour::common::capabilities::chrome::ChromeCapabilities;
use thirtyfour::prelude::*;

/// How long anything on the screen may take, at the most, on a slow and busy machine.
const PATIENCE: Duration = Duration::from_secs(30);

/// The end of all patience with one thing that is waited for.
pub struct Deadline(Instant);

impl Deadline {
    pub fn new() -> Self {
        Self(Instant::now())
    }

    pub fn passed(&self) -> bool {
        self.0.elapsed() > PATIENCE
    }
}

pub fn build_dir() -> PathBuf {
    let named = std::env::var_os("LOWSIDE_DIST").map(PathBuf::from);
    named.unwrap_or_else(|| Path::new(env!("CARGO_MANIFEST_DIR")).join("dist"))
}

pub fn capabilities(downloads: &Path) -> ChromeCapabilities {
    let mut chrome = DesiredCapabilities::chrome();
    for argument in [
        "--headless=new",
        "--no-sandbox",
        "--disable-gpu",
        "--disable-quic",
        "--disable-dev-shm-usage",
        "--no-first-run",
        "--disable-background-networking",
        "--disable-component-update",
        "--disable-sync",
        "--lang=en",
    ] {
        chrome.add_arg(argument).expect("an argument");
    }
    let preferences =
        json!({ "download.default_directory": downloads, "download.prompt_for_download": false });
    chrome
        .add_experimental_option("prefs", preferences)
        .expect("preferences");
    chrome
        .set_browser_log_level(LoggingPrefsLogLevel::All)
        .expect("a log level");
    chrome
}

/// The driver process; it ends with the journey, and the folder for downloads goes with it.
pub struct Chromedriver {
    process: Child,
    port: u16,
    pub downloads: PathBuf,
}

impl Chromedriver {
    pub fn start() -> Self {
        let program = std::env::var_os("CHROMEDRIVER").unwrap_or_else(|| "chromedriver".into());
        let mut process = Command::new(&program)
            .arg("--port=0")
            .stdin(Stdio::null())
            .stdout(Stdio::piped())
            .stderr(Stdio::null())
            .spawn()
            .unwrap_or_else(|error| {
                panic!(
                    "{}: {error}. `bash .ci/setup` brings it.",
                    program.display()
                )
            });
        let mut output = BufReader::new(process.stdout.take().expect("piped")).lines();
        // "ChromeDriver was started successfully on port 41234."
        let port = output
            .by_ref()
            .map_while(Result::ok)
            .find_map(|line| {
                line.split_once("successfully on port ")?
                    .1
                    .trim_end_matches('.')
                    .parse()
                    .ok()
            })
            .expect("chromedriver tells its port");
        // Read to the end, so that the driver never waits for its reader.
        std::thread::spawn(move || output.for_each(drop));
        let downloads = std::env::temp_dir().join(format!("lowside-downloads-{}", process.id()));
        fs::create_dir_all(&downloads).expect("writable");
        Self {
            process,
            port,
            downloads,
        }
    }

    pub fn url(&self) -> String {
        format!("http://127.0.0.1:{}", self.port)
    }

    /// Has the browser closed, and waits for it. Plain and blocking: it is also called while a failed test unwinds.
    pub fn close_session(&self, session: &str) {
        let request = format!(
            "DELETE /session/{session} HTTP/1.1\r\nHost: localhost\r\nConnection: close\r\n\r\n"
        );
        let answered = TcpStream::connect(("127.0.0.1", self.port)).and_then(|mut stream| {
            stream.write_all(request.as_bytes())?;
            stream.read(&mut [0; 16])
        });
        // The driver may be gone already, and the browser with it.
        drop(answered);
    }
}

impl Drop for Chromedriver {
    fn drop(&mut self) {
        let _ = self.process.kill();
        let _ = self.process.wait();
        let _ = fs::remove_dir_all(&self.downloads);
    }
}
