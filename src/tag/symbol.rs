//! The QR code (ISO/IEC 18004) of a link: error correction M, no larger than a phone reads at 40 mm.

use qrcodegen::{QrCode, QrCodeEcc, QrSegment, Version};
use thiserror::Error;

/// Largest version: 97 modules a side, which at 40 mm with their margin are 0.38 mm each. Common practice for a phone's camera
/// at arm's length; larger ones want a larger print.
const LARGEST: u8 = 20;
/// Light modules round the code (ISO/IEC 18004, 6.3.8).
pub const QUIET: usize = 4;

/// The profile is too long for a tag.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Error)]
#[error(
    "the profile is too long for a tag that a phone can read; hand it over as text or as a file"
)]
pub struct Unfit;

/// A QR code.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Symbol {
    /// Modules a side, without the margin.
    pub side: usize,
    /// Version, 1 to 20.
    pub version: u8,
    /// Rows of modules, dark ones true.
    rows: Vec<Vec<bool>>,
}

impl Symbol {
    /// The code of `head` (any text) and `digits` behind it, in as few modules as hold them.
    ///
    /// # Errors
    /// [`Unfit`].
    pub fn of(head: &str, digits: &str) -> Result<Symbol, Unfit> {
        if !digits.bytes().all(|digit| digit.is_ascii_digit()) || digits.is_empty() {
            return Err(Unfit);
        }
        let segments = [
            QrSegment::make_bytes(head.as_bytes()),
            QrSegment::make_numeric(digits),
        ];
        let code = QrCode::encode_segments_advanced(
            &segments,
            QrCodeEcc::Medium,
            Version::MIN,
            Version::new(LARGEST),
            None,
            false,
        )
        .map_err(|_| Unfit)?;
        let side = code.size();
        let rows = (0..side)
            .map(|y| (0..side).map(|x| code.get_module(x, y)).collect())
            .collect();
        Ok(Symbol {
            side: usize::try_from(side).unwrap_or(0),
            version: code.version().value(),
            rows,
        })
    }

    /// True for a dark module; what lies outside is light.
    #[must_use]
    pub fn is_dark(&self, x: usize, y: usize) -> bool {
        self.rows
            .get(y)
            .and_then(|row| row.get(x))
            .copied()
            .unwrap_or(false)
    }

    /// Modules a side with the margin: the size of the drawing of [`Symbol::path`].
    #[must_use]
    pub fn whole(&self) -> usize {
        self.side + 2 * QUIET
    }

    /// The dark modules as the data of an SVG path, one unit a module, margin included.
    #[must_use]
    pub fn path(&self) -> String {
        let mut path = String::new();
        for (y, row) in self.rows.iter().enumerate() {
            let mut x = 0;
            while x < row.len() {
                let run = row.iter().skip(x).take_while(|dark| **dark).count();
                if run > 0 {
                    path.push_str(&format!("M{} {}h{run}v1h-{run}z", x + QUIET, y + QUIET));
                }
                x += run.max(1);
            }
        }
        path
    }
}
