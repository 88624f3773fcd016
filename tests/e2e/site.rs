//! A web server for one copy of the build, on a port of its own, that a journey may stop, start, change and break off.
//!
//! It serves from a folder below the root, as a static host may: nothing in the app may count on `/`.

use std::collections::HashSet;
use std::fs;
use std::io::{self, BufRead, BufReader, Write};
use std::net::{Shutdown, SocketAddr, TcpListener, TcpStream};
use std::path::{Path, PathBuf};
use std::process::Command;
use std::sync::atomic::{AtomicBool, AtomicU32, Ordering};
use std::sync::{Arc, Mutex};
use std::thread::{self, JoinHandle};

const FOLDER: &str = "/yard/lowside/";

/// The build in a folder of its own, and the server in front of it.
pub struct Site {
    dir: PathBuf,
    address: SocketAddr,
    broken: Arc<Mutex<HashSet<String>>>,
    running: Option<Running>,
}

struct Running {
    stop: Arc<AtomicBool>,
    thread: JoinHandle<()>,
}

impl Site {
    /// Copies `build` and serves the copy.
    pub fn open(build: &Path) -> Self {
        static COUNT: AtomicU32 = AtomicU32::new(0);
        let name = format!(
            "lowside-site-{}-{}",
            std::process::id(),
            COUNT.fetch_add(1, Ordering::Relaxed)
        );
        let dir = std::env::temp_dir().join(name);
        copy_dir(build, &dir)
            .unwrap_or_else(|error| panic!("no build in {}: {error}", build.display()));
        let mut site = Self {
            dir,
            address: SocketAddr::from(([127, 0, 0, 1], 0)),
            broken: Arc::default(),
            running: None,
        };
        site.start();
        site
    }

    /// Address of the app.
    pub fn url(&self) -> String {
        format!("http://{}{FOLDER}", self.address)
    }

    /// The folder that is served.
    pub fn dir(&self) -> &Path {
        &self.dir
    }

    /// Answers again, on the same port as before.
    pub fn start(&mut self) {
        let listener = TcpListener::bind(self.address).expect("the port is free");
        self.address = listener.local_addr().expect("bound");
        let stop = Arc::new(AtomicBool::new(false));
        let thread = thread::spawn({
            let (dir, stop, broken) = (self.dir.clone(), stop.clone(), self.broken.clone());
            move || serve(&listener, &dir, &stop, &broken)
        });
        self.running = Some(Running { stop, thread });
    }

    /// From here on every connection is refused, as with no server at all.
    pub fn stop(&mut self) {
        let Some(running) = self.running.take() else {
            return;
        };
        running.stop.store(true, Ordering::SeqCst);
        // The listener sits in accept(): one more connection wakes it.
        drop(TcpStream::connect(self.address));
        running.thread.join().expect("the server ended cleanly");
    }

    /// The connection for this file breaks after half of it, from now on.
    pub fn break_off(&self, file: &str) {
        self.broken
            .lock()
            .expect("not poisoned")
            .insert(file.to_owned());
    }

    /// Every file arrives whole again.
    pub fn mend(&self) {
        self.broken.lock().expect("not poisoned").clear();
    }

    /// Names of the files whose name ends like this.
    pub fn files_ending(&self, end: &str) -> Vec<String> {
        let entries = fs::read_dir(&self.dir).expect("readable");
        let names = entries.map(|entry| {
            entry
                .expect("readable")
                .file_name()
                .to_string_lossy()
                .into_owned()
        });
        names.filter(|name| name.ends_with(end)).collect()
    }

    /// Address of the one file of this name somewhere below a folder of the build.
    pub fn file_below(&self, folder: &str, name: &str) -> String {
        let folders = fs::read_dir(self.dir.join(folder)).expect("readable");
        let found = folders
            .map(|entry| entry.expect("readable").path().join(name))
            .find(|file| file.is_file())
            .unwrap_or_else(|| panic!("no {name} below {folder}"));
        let address = found.strip_prefix(&self.dir).expect("is below");
        address.to_string_lossy().into_owned()
    }

    /// Puts the next version on the server: another description of the page, everything else as it was.
    pub fn publish_new_version(&self) {
        let page = self.dir.join("index.html");
        let text = fs::read_to_string(&page).expect("a page");
        let (before, rest) = text
            .split_once("data-version=\"")
            .expect("the page carries its version");
        let (_, after) = rest.split_once('"').expect("closed");
        let next = format!("{before}data-version=\"@LOWSIDE_VERSION@\"{after}").replace(
            "name=\"description\" content=\"",
            "name=\"description\" content=\"Next version. ",
        );
        fs::write(&page, next).expect("writable");
        self.list_files();
    }

    /// Writes the service worker anew after files were changed.
    pub fn list_files(&self) {
        let done = Command::new(env!("CARGO_BIN_EXE_precache"))
            .arg(&self.dir)
            .output()
            .expect("precache starts");
        assert!(
            done.status.success(),
            "precache failed: {}",
            String::from_utf8_lossy(&done.stderr)
        );
    }
}

impl Drop for Site {
    fn drop(&mut self) {
        self.stop();
        let _ = fs::remove_dir_all(&self.dir);
    }
}

fn copy_dir(from: &Path, to: &Path) -> io::Result<()> {
    fs::create_dir_all(to)?;
    for entry in fs::read_dir(from)? {
        let entry = entry?;
        let target = to.join(entry.file_name());
        if entry.file_type()?.is_dir() {
            copy_dir(&entry.path(), &target)?;
        } else {
            fs::copy(entry.path(), target)?;
        }
    }
    Ok(())
}

fn serve(
    listener: &TcpListener,
    dir: &Path,
    stop: &AtomicBool,
    broken: &Arc<Mutex<HashSet<String>>>,
) {
    for stream in listener.incoming() {
        if stop.load(Ordering::SeqCst) {
            return;
        }
        let Ok(stream) = stream else { continue };
        let (dir, broken) = (dir.to_owned(), broken.clone());
        // A browser that hangs up early is its own affair.
        thread::spawn(move || answer(&stream, &dir, &broken).ok());
    }
}

/// One request, one connection: after a stop nothing can come over a connection that was kept.
fn answer(mut stream: &TcpStream, dir: &Path, broken: &Mutex<HashSet<String>>) -> io::Result<()> {
    let mut lines = BufReader::new(stream).lines();
    let request = lines.next().transpose()?.unwrap_or_default();
    for line in lines {
        if line?.is_empty() {
            break;
        }
    }
    let file = requested_file(&request);
    let content = file
        .as_deref()
        .and_then(|file| fs::read(dir.join(file)).ok());
    let (Some(file), Some(content)) = (file, content) else {
        return stream.write_all(
            b"HTTP/1.1 404 Not Found\r\nContent-Length: 0\r\nConnection: close\r\n\r\n",
        );
    };
    let head = format!(
        "HTTP/1.1 200 OK\r\nContent-Type: {}\r\nContent-Length: {}\r\nCache-Control: no-cache\r\nConnection: close\r\n\r\n",
        content_type(&file),
        content.len()
    );
    stream.write_all(head.as_bytes())?;
    let breaks = broken.lock().expect("not poisoned").contains(&file);
    let sent = if breaks {
        content.len() / 2
    } else {
        content.len()
    };
    stream.write_all(&content[..sent])?;
    stream.shutdown(Shutdown::Write)
}

/// `GET /yard/lowside/boot.js?x HTTP/1.1` asks for `boot.js`.
fn requested_file(request: &str) -> Option<String> {
    let target = request.strip_prefix("GET ")?.split(' ').next()?;
    let path = target.split('?').next()?.strip_prefix(FOLDER)?;
    match path {
        "" => Some("index.html".to_owned()),
        _ if path.contains("..") => None,
        _ => Some(path.to_owned()),
    }
}

fn content_type(file: &str) -> &'static str {
    match file.rsplit('.').next() {
        Some("html") => "text/html; charset=utf-8",
        Some("js") => "text/javascript",
        Some("css") => "text/css",
        Some("wasm") => "application/wasm",
        Some("svg") => "image/svg+xml",
        Some("png") => "image/png",
        Some("webmanifest") => "application/manifest+json",
        _ => "application/octet-stream",
    }
}
