//! Figures and their numbers into files, from what the window shows. What a figure looks like is decided in the engine
//! and on paper; here they are only put together and written whole.

use super::request::ExportRequest;
use crate::desk::commands::{ExportFigure, ExportKind};
use crate::desk::readout::subject;
use crate::export::{self, Look, csv};
use crate::workspace::write_whole;
use ebbmark_engine::figures::{Figure, Subject, distribution_figure, horizon_figure};
use std::io;

/// Twice the deck's size.
const LARGE: Look = Look { width: 2 * Look::DECK.width, height: 2 * Look::DECK.height, ..Look::DECK };

/// Writes what was asked for.
///
/// # Errors
/// What the operating system or the renderer said.
pub(super) fn write(request: &ExportRequest) -> io::Result<()> {
    let subject = subject(&request.document, &request.model, &request.bands, &request.at_line);
    let bytes = match request.kind {
        ExportKind::Svg(which) => export::svg(&figure(which, &subject), Look::DECK).into_bytes(),
        ExportKind::Png(which) => export::png(&figure(which, &subject), Look::DECK)?,
        ExportKind::LargePng(which) => export::png(&figure(which, &subject), LARGE)?,
        ExportKind::Numbers(ExportFigure::Horizon) => csv::bands_csv(subject.bands).into_bytes(),
        ExportKind::Numbers(ExportFigure::LossDistribution) => {
            csv::distribution_csv(subject.values, subject.loss_base()).into_bytes()
        }
        ExportKind::Reading => csv::reading_csv(request.at_line.day, subject.reading).into_bytes(),
    };
    write_whole(&request.path, &bytes)
}

fn figure(which: ExportFigure, subject: &Subject<'_>) -> Figure {
    match which {
        ExportFigure::Horizon => horizon_figure(subject),
        ExportFigure::LossDistribution => distribution_figure(subject),
    }
}
