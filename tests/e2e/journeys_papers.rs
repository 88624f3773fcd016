//! Papers: the hand-over report on paper, as text and as a file that gives it again; the tag through a reader from outside, on
//! another device without a network.

use std::io::Write;
use std::process::{Command, Stdio};

use serde_json::json;

use crate::rig::{NARROW, PHONE, Rig};

const REPORT: &str = "/call/demo-v-27/report";

async fn open_report(rig: &Rig) {
    rig.click("load-demo").await;
    rig.wait_for_text("T-27").await;
    rig.go(REPORT).await;
    rig.by_id("report").await;
}

/// The value of a field, shown or folded away.
async fn value(rig: &Rig, testid: &str) -> String {
    let script = format!("return document.querySelector('[data-testid={testid}]').value;");
    rig.js(&script, vec![])
        .await
        .as_str()
        .unwrap_or_default()
        .to_owned()
}

/// The office command on a file.
fn office(option: &str, input: &str) -> String {
    let mut child = Command::new(env!("CARGO_BIN_EXE_assess"))
        .arg(option)
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .spawn()
        .expect("it starts");
    let mut stdin = child.stdin.take().expect("a pipe");
    stdin.write_all(input.as_bytes()).expect("it reads");
    drop(stdin);
    let output = child.wait_with_output().expect("it ends");
    String::from_utf8(output.stdout).expect("text")
}

#[tokio::test]
async fn the_office_command_makes_the_same_report_from_the_file() {
    let rig = Rig::open(PHONE).await;
    open_report(&rig).await;
    rig.fill("report-bring", "Charge pump 15 cm³").await;
    rig.wait_until(
        "what is to be brought stands in the report",
        "document.querySelector('[data-testid=report]').innerText.includes('Charge pump 15 cm³')",
    )
    .await;
    let text = value(&rig, "report-as-text").await;
    assert!(text.contains("Hand-over: unit T-27"), "{text}");
    assert!(text.contains("LOW, expected"), "{text}");
    rig.click("report-file").await;
    let file = rig.downloaded("lowside-T-27").await;
    assert_eq!(office("--report", &file), text);
    rig.close().await;
}

#[tokio::test]
async fn readings_come_as_a_table() {
    let rig = Rig::open(PHONE).await;
    open_report(&rig).await;
    rig.click("report-csv").await;
    let table = rig.downloaded("lowside-T-27").await;
    let table = table
        .strip_prefix('\u{feff}')
        .expect("the mark of its encoding");
    let mut reader = csv::Reader::from_reader(table.as_bytes());
    let header = reader.headers().expect("a header").clone();
    let at = header
        .iter()
        .position(|name| name == "Read (bar)")
        .expect("the unit in the header");
    let read: Vec<String> = reader
        .records()
        .map(|row| row.expect("a row").get(at).unwrap_or_default().to_owned())
        .collect();
    assert_eq!(read, ["23.5", "17.5", "17.5", "", "", "0.08"]);
    rig.close().await;
}

#[tokio::test]
async fn a_usual_call_prints_on_one_page() {
    let rig = Rig::open(PHONE).await;
    open_report(&rig).await;
    // The printer asks for a light page whatever the screen shows.
    for (name, width, height) in [("A4", 8.27, 11.69), ("letter", 8.5, 11.0)] {
        let paper = json!({ "paperWidth": width, "paperHeight": height, "printBackground": false, "preferCSSPageSize": false });
        let answer = rig.cdp("Page.printToPDF", paper).await;
        let data = answer["data"].as_str().expect("a document");
        let pdf = unbase64(data);
        if let Some(folder) = std::env::var_os("LOWSIDE_SHOTS") {
            let path = std::path::Path::new(&folder).join(format!("report-{name}.pdf"));
            std::fs::write(path, &pdf).expect("writable");
        }
        assert!(pdf.starts_with(b"%PDF"));
        assert_eq!(pages(&pdf), 1, "{name}");
    }
    rig.close().await;
}

/// Pages of a PDF: its page objects stand uncompressed.
fn pages(pdf: &[u8]) -> usize {
    let text = String::from_utf8_lossy(pdf);
    let objects = text.split("/Type").skip(1).map(str::trim_start);
    objects
        .filter(|rest| rest.starts_with("/Page") && !rest.starts_with("/Pages"))
        .count()
}

fn unbase64(text: &str) -> Vec<u8> {
    let value = |byte: u8| -> Option<u32> {
        let letters = b"ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";
        let at = letters.iter().position(|letter| *letter == byte)?;
        u32::try_from(at).ok()
    };
    let mut out = Vec::with_capacity(text.len() / 4 * 3);
    let (mut held, mut bits) = (0_u32, 0);
    for six in text.bytes().filter_map(value) {
        held = held << 6 | six;
        bits += 6;
        if bits >= 8 {
            bits -= 8;
            out.push((held >> bits & 0xff) as u8);
            held &= (1 << bits) - 1;
        }
    }
    out
}

#[tokio::test]
async fn the_report_fits_the_narrowest_screen() {
    let rig = Rig::open(NARROW).await;
    open_report(&rig).await;
    assert!(!rig.scrolls_sideways().await, "one has to scroll sideways");
    rig.close().await;
}

/// What a reader from outside sees in a picture of the screen.
fn scanned(picture: &[u8]) -> String {
    let mut reader = png::Decoder::new(std::io::Cursor::new(picture))
        .read_info()
        .expect("a picture");
    let mut pixels = vec![0; reader.output_buffer_size().expect("a size")];
    let info = reader.next_frame(&mut pixels).expect("pixels");
    let (width, height) = (info.width as usize, info.height as usize);
    let bytes = info.line_size / width;
    let mut image = rqrr::PreparedImage::prepare_from_greyscale(width, height, |x, y| {
        pixels[y * info.line_size + x * bytes]
    });
    let grids = image.detect_grids();
    assert_eq!(grids.len(), 1, "one code is seen");
    grids[0].decode().expect("the code is read").1
}

#[tokio::test]
async fn a_tag_carries_the_profile_to_another_device_without_a_network() {
    let rig = Rig::open(PHONE).await;
    rig.click("load-demo").await;
    rig.wait_for_text("T-14").await;
    rig.go("/unit/demo-t-14/tag").await;
    // Pixels as dense as a phone's.
    let metrics = json!({ "width": 360, "height": 740, "deviceScaleFactor": 3, "mobile": true });
    rig.cdp("Emulation.setDeviceMetricsOverride", metrics).await;
    let card = rig.by_id("tag-card").await;
    let link = scanned(&card.screenshot_as_png().await.expect("a picture"));
    assert!(link.starts_with(&rig.site.url()), "{link}");
    let (_, digits) = link.split_once("#/tag/").expect("the mark of a tag");
    assert!(!rig.scrolls_sideways().await, "one has to scroll sideways");

    // The other phone: nothing on it but the app, and no server any more.
    let mut other = Rig::open(PHONE).await;
    other.wait_for_offline_copy().await;
    other.site.stop();
    other.go(&format!("/tag/{digits}")).await;
    other.wait_for_text("Compact machine, tracks").await;
    assert!(other.text("tag-preview").await.contains("6 figures"));
    other.click("import-take").await;
    other.by_id("unit-screen").await;
    other.wait_for_text("Saved").await;
    let note = other
        .js(
            "return document.querySelector('[data-testid=unit-note]').value;",
            vec![],
        )
        .await;
    assert!(
        note.as_str()
            .unwrap_or_default()
            .starts_with("Figures and readings are of the right-hand drive.")
    );

    // The same again brings nothing; a damaged one is refused, and both leave what is there alone.
    other.go(&format!("/tag/{digits}")).await;
    other.by_id("tag-here").await;
    let last = if digits.ends_with('7') { "8" } else { "7" };
    other
        .go(&format!("/tag/{}{last}", &digits[..digits.len() - 1]))
        .await;
    other
        .wait_for_text("the tag is damaged or incomplete")
        .await;
    assert!(!other.has("import-take").await);
    other.go("/tag").await;
    other.fill("tag-paste", "twelve").await;
    other.wait_for_text("there is no tag in this text").await;
    drop(other);
    rig.close().await;
}
