//! Numbers as CSV at full precision: each reads back to the same double; what is unavailable is an empty cell.

use ::csv::Writer;
use ebbmark_engine::measures::bands::{FALL_PERCENTS, VALUE_PERCENTS};
use ebbmark_engine::measures::reading::MomentRow;
use ebbmark_engine::measures::{Bands, Density, Reading};

/// A table being written.
struct Sheet {
    writer: Writer<Vec<u8>>,
}

impl Sheet {
    fn with_header(header: &[String]) -> Self {
        let mut sheet = Self { writer: Writer::from_writer(Vec::new()) };
        sheet.row(header);
        sheet
    }

    fn row(&mut self, cells: &[String]) {
        // Rows have as many cells as the header, and writing to memory does not fail.
        let _ = self.writer.write_record(cells);
    }

    fn text(self) -> String {
        self.writer.into_inner().ok().and_then(|bytes| String::from_utf8(bytes).ok()).unwrap_or_default()
    }
}

/// Every figure of the reading at a day, one row each: `measure, confidence, value, low, high, standard_error`.
pub fn reading_csv(day: u32, reading: &Reading) -> String {
    let mut rows = ReadingRows::new();
    rows.error("horizon_days", None, Some(f64::from(day)), None);
    for row in &reading.loss {
        rows.range("var", row.confidence, [Some(row.var), row.var_low, row.var_high]);
        rows.range("es", row.confidence, [Some(row.es), row.es_low, row.es_high]);
    }
    let drawdown = &reading.drawdown;
    rows.error("drawdown_mean", None, Some(drawdown.mean), Some(drawdown.mean_error));
    for row in &drawdown.quantiles {
        rows.range("drawdown", row.confidence, [Some(row.value), row.value_low, row.value_high]);
        rows.error(
            "drawdown_mean_beyond",
            Some(row.confidence),
            Some(row.mean_beyond),
            row.mean_beyond_error,
        );
    }
    if let Some(limit) = &reading.limit {
        rows.error("loss_limit", None, Some(limit.loss), None);
        rows.error("limit_at_horizon", None, Some(limit.at_horizon), Some(limit.at_horizon_error));
        rows.error("limit_by_horizon", None, Some(limit.by_horizon), Some(limit.by_horizon_error));
    }
    let moments = &reading.moments;
    rows.moment("mean", &moments.mean);
    rows.moment("sd", &moments.sd);
    rows.moment("skewness", &moments.skewness);
    rows.error("expected_change", None, Some(moments.expected_change), None);
    rows.sheet.text()
}

struct ReadingRows {
    sheet: Sheet,
}

impl ReadingRows {
    fn new() -> Self {
        let header = ["measure", "confidence", "value", "low", "high", "standard_error"];
        Self { sheet: Sheet::with_header(&header.map(str::to_owned)) }
    }

    fn range(&mut self, measure: &str, confidence: f64, [value, low, high]: [Option<f64>; 3]) {
        let figures = [Some(confidence), value, low, high, None].map(cell);
        self.sheet.row(&[[measure.to_owned()].as_slice(), &figures].concat());
    }

    fn error(&mut self, measure: &str, confidence: Option<f64>, value: Option<f64>, error: Option<f64>) {
        let figures = [confidence, value, None, None, error].map(cell);
        self.sheet.row(&[[measure.to_owned()].as_slice(), &figures].concat());
    }

    fn moment(&mut self, name: &str, row: &MomentRow) {
        self.error(&format!("{name}_exact"), None, row.exact, None);
        self.error(&format!("{name}_sampled"), None, row.sampled, row.standard_error);
    }
}

/// The numbers behind the Horizon figure: quantiles of value and of the largest fall, a row per day.
pub fn bands_csv(bands: &Bands) -> String {
    let names = |what: &str, percents: &[u32]| -> Vec<String> {
        percents.iter().map(|percent| format!("{what}_{percent}_percent")).collect()
    };
    let day = vec!["day".to_owned()];
    let header = [day, names("value", &VALUE_PERCENTS), names("largest_fall", &FALL_PERCENTS)].concat();
    let mut sheet = Sheet::with_header(&header);
    for (at, day) in bands.days.iter().enumerate() {
        let values = bands.values.get(at).map_or([None; 7], |row| row.map(Some));
        let falls = bands.falls.get(at).map_or([None; 5], |row| row.map(Some));
        let cells = values.into_iter().chain(falls).map(cell);
        sheet.row(&[day.to_string()].into_iter().chain(cells).collect::<Vec<_>>());
    }
    sheet.text()
}

/// The numbers behind the loss distribution: `loss, density`, ascending, the density per unit of money.
pub fn distribution_csv(values: &Density, loss_base: f64) -> String {
    let mut sheet = Sheet::with_header(&["loss", "density"].map(str::to_owned));
    for (value, density) in values.at.iter().zip(&values.density).rev() {
        sheet.row(&[cell(Some(loss_base - value)), cell(Some(*density))]);
    }
    sheet.text()
}

/// The shortest digits that read back to the same double.
fn cell(figure: Option<f64>) -> String {
    figure.filter(|figure| figure.is_finite()).map_or_else(String::new, |figure| figure.to_string())
}
