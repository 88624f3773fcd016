//! Writes the service worker of a finished build: `precache DIR`, or the directory that Trunk names to its hooks.
//!
//! Every emitted file is listed with its SHA-256, because the service worker compares what it downloads with this list:
//! a log-in page of a guest network, or a half-updated server, must not pass for a file of the app. One hash over all
//! of them names the version. That needs a hash against which WebCrypto in the browser can check: SHA-2.

use std::error::Error;

#[cfg(not(target_arch = "wasm32"))]
fn main() -> Result<(), Box<dyn Error>> {
    let dir = std::env::args_os()
        .nth(1)
        .or_else(|| std::env::var_os("TRUNK_STAGING_DIR"))
        .ok_or("no directory: give one, or set TRUNK_STAGING_DIR")?;
    let report = precache::run(std::path::Path::new(&dir))?;
    println!("{report}");
    Ok(())
}

#[cfg(target_arch = "wasm32")]
fn main() -> Result<(), Box<dyn Error>> {
    Err("this tool works on the build machine".into())
}

#[cfg(not(target_arch = "wasm32"))]
mod precache {
    use std::collections::BTreeMap;
    use std::error::Error;
    use std::fs;
    use std::path::Path;

    use sha2::{Digest, Sha256};

    const TEMPLATE: &str = include_str!("../../static/sw.template.js");
    const SERVICE_WORKER: &str = "sw.js";
    const PAGE: &str = "index.html";
    /// Stands in the page where the version belongs.
    const PAGE_VERSION: &str = "@LOWSIDE_VERSION@";

    /// File contents by address relative to the app's folder, sorted, so that equal builds give equal service workers.
    type Files = BTreeMap<String, Vec<u8>>;

    /// How the script that fetches the app's modules names the app's own, before Trunk gave that its name.
    const GLUE_UNNAMED: &str = "\"./lowside.js\"";
    /// Where that script lies: in a folder of its own below this.
    const PARTS: &str = "snippets/later-";
    const LINK: &str = "/link.js";

    /// Joins the modules, puts the version into the page, writes the service worker, and says in one line what was done.
    pub fn run(dir: &Path) -> Result<String, Box<dyn Error>> {
        let mut files = Files::new();
        collect(dir, "", &mut files)?;
        files.remove(SERVICE_WORKER);
        join(dir, &mut files)?;

        let version = version_of(&files);
        let page = files
            .get_mut(PAGE)
            .ok_or_else(|| format!("{PAGE} is missing in {}", dir.display()))?;
        *page = String::from_utf8(std::mem::take(page))?
            .replace(PAGE_VERSION, &version)
            .into_bytes();
        fs::write(dir.join(PAGE), page)?;

        fs::write(dir.join(SERVICE_WORKER), service_worker(&version, &files)?)?;
        Ok(format!(
            "{SERVICE_WORKER}: version {version}, {} files",
            files.len()
        ))
    }

    /// Lets the script that fetches the modules find the app's own under the name that Trunk gave it: both must mean the same
    /// running module. A build in one module has no such script.
    fn join(dir: &Path, files: &mut Files) -> Result<(), Box<dyn Error>> {
        let is_glue = |name: &&String| name.starts_with("lowside-") && name.ends_with(".js");
        let glue: Vec<String> = files.keys().filter(is_glue).cloned().collect();
        for (address, content) in files.iter_mut() {
            if !address.starts_with(PARTS) || !address.ends_with(LINK) {
                continue;
            }
            let [glue] = glue.as_slice() else {
                return Err(format!(
                    "{address} needs one lowside-….js beside it, not {}",
                    glue.len()
                )
                .into());
            };
            let named = format!("\"../../{glue}\"");
            let text = String::from_utf8(std::mem::take(content))?.replace(GLUE_UNNAMED, &named);
            if !text.contains(&named) {
                return Err(format!("{address} imports neither {GLUE_UNNAMED} nor {named}").into());
            }
            *content = text.into_bytes();
            fs::write(dir.join(address.as_str()), content)?;
        }
        Ok(())
    }

    fn collect(dir: &Path, prefix: &str, files: &mut Files) -> Result<(), Box<dyn Error>> {
        for entry in fs::read_dir(dir)? {
            let entry = entry?;
            let name = entry.file_name();
            let address = format!("{prefix}{}", plain(&name.to_string_lossy())?);
            if entry.file_type()?.is_dir() {
                collect(&entry.path(), &format!("{address}/"), files)?;
            } else {
                files.insert(address, fs::read(entry.path())?);
            }
        }
        Ok(())
    }

    /// File names double as addresses: only characters that need no escaping there.
    fn plain(name: &str) -> Result<&str, String> {
        let fits = |c: char| c.is_ascii_alphanumeric() || "._-".contains(c);
        if name.chars().all(fits) {
            Ok(name)
        } else {
            Err(format!(
                "{name:?}: use letters, digits, '.', '_' and '-' in file names"
            ))
        }
    }

    /// The package's version with a short hash over names and contents.
    fn version_of(files: &Files) -> String {
        let mut all = Sha256::new();
        all.update(TEMPLATE);
        for (address, content) in files {
            all.update(address);
            all.update(Sha256::digest(content));
        }
        let hash = hex(&all.finalize());
        format!(
            "{} ({})",
            env!("CARGO_PKG_VERSION"),
            hash.get(..12).unwrap_or(&hash)
        )
    }

    fn service_worker(version: &str, files: &Files) -> Result<String, serde_json::Error> {
        let list: Vec<(&str, String)> = files
            .iter()
            .map(|(address, content)| (address.as_str(), hex(&Sha256::digest(content))))
            .collect();
        Ok(TEMPLATE
            .replace("@VERSION@", version)
            .replace("/*@FILES@*/[]", &serde_json::to_string_pretty(&list)?))
    }

    fn hex(bytes: &[u8]) -> String {
        bytes.iter().map(|byte| format!("{byte:02x}")).collect()
    }

    #[cfg(test)]
    mod tests {
        use super::*;

        /// A folder that goes when the test ends.
        struct Folder(std::path::PathBuf);

        impl Drop for Folder {
            fn drop(&mut self) {
                let _ = fs::remove_dir_all(&self.0);
            }
        }

        fn build(name: &str, files: &[(&str, &str)]) -> Folder {
            let dir = std::env::temp_dir()
                .join(format!("lowside-precache-{}-{name}", std::process::id()));
            for (path, content) in files {
                let path = dir.join(path);
                fs::create_dir_all(path.parent().expect("has a parent")).expect("writable");
                fs::write(path, content).expect("writable");
            }
            Folder(dir)
        }

        fn written(folder: &Folder) -> String {
            run(&folder.0).expect("builds");
            fs::read_to_string(folder.0.join(SERVICE_WORKER)).expect("was written")
        }

        const PAGE_TEXT: &str = "<html data-version=\"@LOWSIDE_VERSION@\">";

        #[test]
        fn lists_every_file_with_its_hash_but_not_itself() {
            let dir = build(
                "list",
                &[
                    (PAGE, PAGE_TEXT),
                    ("icons/a.svg", "abc"),
                    (SERVICE_WORKER, "old"),
                ],
            );
            let worker = written(&dir);
            // FIPS 180-2 appendix B.1: the SHA-256 of "abc".
            assert!(
                worker.contains("ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad")
            );
            assert!(worker.contains("\"icons/a.svg\""));
            assert!(!worker.contains("\"sw.js\""));
            assert!(!worker.contains('@'), "a placeholder is left");
        }

        #[test]
        fn page_carries_the_version_and_is_listed_as_served() {
            let dir = build("page", &[(PAGE, PAGE_TEXT)]);
            let worker = written(&dir);
            let page = fs::read(dir.0.join(PAGE)).expect("is there");
            assert!(String::from_utf8_lossy(&page).contains(env!("CARGO_PKG_VERSION")));
            assert!(worker.contains(&hex(&Sha256::digest(&page))));
        }

        #[test]
        fn version_follows_contents_and_names_only() {
            let one = written(&build("v1", &[(PAGE, PAGE_TEXT), ("a.js", "1")]));
            let same = written(&build("v2", &[("a.js", "1"), (PAGE, PAGE_TEXT)]));
            let content = written(&build("v3", &[(PAGE, PAGE_TEXT), ("a.js", "2")]));
            let name = written(&build("v4", &[(PAGE, PAGE_TEXT), ("b.js", "1")]));
            assert_eq!(one, same);
            assert_ne!(one, content);
            assert_ne!(one, name);
        }

        const LINK_FILE: &str = "snippets/later-1/link.js";

        #[test]
        fn the_modules_find_the_glue_under_its_new_name_also_the_second_time() {
            let unnamed = "import { initSync } from \"./lowside.js\";";
            let dir = build(
                "join",
                &[
                    (PAGE, PAGE_TEXT),
                    ("lowside-2f.js", "x"),
                    (LINK_FILE, unnamed),
                ],
            );
            let first = written(&dir);
            let link = fs::read_to_string(dir.0.join(LINK_FILE)).expect("is there");
            assert_eq!(link, "import { initSync } from \"../../lowside-2f.js\";");
            assert!(
                first.contains(&hex(&Sha256::digest(&link))),
                "listed as it is served"
            );
            fs::write(dir.0.join(PAGE), PAGE_TEXT).expect("writable");
            assert_eq!(written(&dir), first);
        }

        #[test]
        fn modules_without_their_glue_are_refused() {
            let foreign = "import { initSync } from \"./other.js\";";
            let none = run(&build("lost", &[(PAGE, PAGE_TEXT), (LINK_FILE, foreign)]).0);
            assert!(none.expect_err("no glue").to_string().contains(LINK_FILE));
            let files = [
                (PAGE, PAGE_TEXT),
                ("lowside-2f.js", "x"),
                (LINK_FILE, foreign),
            ];
            let other = run(&build("foreign", &files).0).expect_err("imports something else");
            assert!(other.to_string().contains("lowside-2f.js"));
        }

        #[test]
        fn refuses_a_folder_without_page_and_names_that_need_escaping() {
            let none = run(&build("none", &[("a.js", "1")]).0).expect_err("no page");
            assert!(none.to_string().contains(PAGE));
            let odd =
                run(&build("odd", &[(PAGE, PAGE_TEXT), ("a b.js", "1")]).0).expect_err("a space");
            assert!(odd.to_string().contains("a b.js"));
        }
    }
}
