//! Figures and numbers for paper, opened again: what stands in them is what was read, whatever a book is called.

use ebbmark::export::{Look, Tone, csv, png, svg};
use ebbmark::opening::built_in_example;
use ebbmark::workspace::{Document, Settings};
use ebbmark_engine::book::{Holding, Kind, TypedFigure};
use ebbmark_engine::factors::Model;
use ebbmark_engine::figures::{CAUTION, Figure, Subject, distribution_figure, horizon_figure};
use ebbmark_engine::measures::{Bands, Conventions, Density, LossFrom, Reading, bands, density, reading};
use ebbmark_engine::simulate::{Plan, Unwatched, run};
use jiff::civil::date;
use resvg::tiny_skia::Pixmap;
use resvg::usvg::{Options, Tree};

/// The example read at a month, from few paths.
struct Shown {
    name: String,
    model: Model,
    bands: Bands,
    reading: Reading,
    values: Density,
    falls: Density,
}

impl Shown {
    fn example(name: &str) -> Self {
        Self::altered(name, |_| ())
    }

    fn altered(name: &str, alter: impl Fn(&mut Holding)) -> Self {
        let mut opened = built_in_example().unwrap();
        opened.inputs.holdings.iter_mut().for_each(alter);
        let (document, _) = Document::of_book(opened, &Settings::usual());
        let model = document.assemble().unwrap().model;
        let loss_limit = Some(6.5e6);
        let kept_days: Vec<u32> = (1..=126).collect();
        let plan = Plan { paths: 20_000, seed: 1, kept_days: kept_days.clone(), loss_limit, threads: None };
        let run = run(&model, &plan, &Unwatched).unwrap();
        let sample = run.sample(21).unwrap();
        let confidences = ["0.95", "0.99"].map(|text| text.parse().unwrap()).to_vec();
        let conventions = Conventions { confidences, loss_from: LossFrom::Today, loss_limit };
        Self {
            name: name.to_owned(),
            bands: bands(&run, &kept_days),
            reading: reading(&model, &sample, &conventions),
            values: density(&sample.values),
            falls: density(&sample.falls),
            model,
        }
    }

    fn subject(&self) -> Subject<'_> {
        Subject {
            book: &self.name,
            model: &self.model,
            base: Some(self.model.value),
            as_of: Some(date(2026, 11, 30)),
            date: Some(date(2026, 12, 30)),
            has_holidays: true,
            bands: &self.bands,
            last_day: 126,
            day: 21,
            reading: &self.reading,
            values: &self.values,
            falls: &self.falls,
            confidence: 0.99,
            loss_from: LossFrom::Today,
            loss_limit: Some(6.5e6),
            paths: Some(20_000),
            seed: 1,
        }
    }

    fn figures(&self) -> [(&'static str, Figure); 2] {
        [("horizon", horizon_figure(&self.subject())), ("loss", distribution_figure(&self.subject()))]
    }
}

/// Share of pixels of a part of a page that differ from its ground.
fn inked(pixels: &Pixmap, from: (u32, u32), to: (u32, u32)) -> f64 {
    let ground = pixels.pixel(2, 2).unwrap();
    let columns = from.0..to.0;
    let marked = (from.1..to.1).flat_map(|y| columns.clone().map(move |x| (x, y)));
    let count = marked.filter(|(x, y)| pixels.pixel(*x, *y) != Some(ground)).count();
    count as f64 / f64::from((to.0 - from.0) * (to.1 - from.1))
}

#[test]
fn always_figures_say_what_was_read_and_what_was_assumed() {
    let shown = Shown::example("Ellerwick");
    let row = &shown.reading.loss[1];
    // So many paths leave one decimal.
    let var = format!("{:.1}", row.var / 1e6);
    for (name, figure) in shown.figures() {
        let text = svg(&figure, Look::DECK);
        Tree::from_str(&text, &Options::default()).unwrap();
        for words in [
            "Ellerwick",
            "over 21 trading days",
            "to 30 Dec 2026",
            &format!("99 % VaR EUR {var}"),
            "20,000 paths, seed 1",
            "prices of 30 Nov 2026",
            "normal shocks, constant volatility, holdings unchanged, no flows",
            CAUTION,
        ] {
            assert!(text.to_lowercase().contains(&words.to_lowercase()), "{name} does not say {words}");
        }
        assert!(!text.contains("NaN"), "{name}");
    }
}

#[test]
fn shot_figures_fill_the_page_in_both_tones_and_sizes() {
    let shown = Shown::example("Ellerwick");
    let folder = std::path::Path::new(env!("CARGO_TARGET_TMPDIR"));
    for (name, figure) in shown.figures() {
        for (tone, times) in [(Tone::Light, 1), (Tone::Dark, 1), (Tone::Light, 2)] {
            let look = Look { tone, width: 1920 * times, height: 1080 * times };
            let bytes = png(&figure, look).unwrap();
            std::fs::write(folder.join(format!("{name}-{tone:?}-{times}.png")), &bytes).unwrap();
            let pixels = Pixmap::decode_png(&bytes).unwrap();
            assert_eq!((pixels.width(), pixels.height()), (look.width, look.height));
            let at = |x: u32, y: u32| (x * times, y * times);
            assert!(inked(&pixels, at(64, 40), at(900, 90)) > 0.02, "{name}: no title");
            assert!(inked(&pixels, at(200, 300), at(1200, 650)) > 0.2, "{name}: no chart");
            assert!(inked(&pixels, at(64, 985), at(1500, 1060)) > 0.02, "{name}: no foot");
            assert!(inked(&pixels, at(0, 0), at(1920, 30)) < 0.001, "{name}: something at the edge");
        }
    }
}

#[test]
fn always_strange_names_stay_text() {
    let long = "A very long name of a book ".repeat(20);
    for name in ["<&\"'> ]]>", "", "\u{0}\u{7}\u{ffff}", "\u{4e2d}\u{6587} \u{202e}book", long.as_str()] {
        for (_, figure) in Shown::example(name).figures() {
            let text = svg(&figure, Look::DECK);
            Tree::from_str(&text, &Options::default()).unwrap_or_else(|error| panic!("{name}: {error}"));
        }
    }
}

#[test]
fn always_numbers_read_back_to_the_same_double() {
    let shown = Shown::example("Ellerwick");
    let text = csv::reading_csv(21, &shown.reading);
    let mut reader = ::csv::Reader::from_reader(text.as_bytes());
    let rows: Vec<Vec<String>> =
        reader.records().map(|row| row.unwrap().iter().map(str::to_owned).collect()).collect();
    let find = |measure: &str, confidence: &str, column: usize| -> Option<f64> {
        let row = rows.iter().find(|row| row[0] == measure && row[1] == confidence).unwrap();
        (!row[column].is_empty()).then(|| row[column].parse().unwrap())
    };
    let (row, fall) = (&shown.reading.loss[1], &shown.reading.drawdown.quantiles[0]);
    assert_eq!(find("var", "0.99", 2), Some(row.var));
    assert_eq!([find("es", "0.99", 3), find("es", "0.99", 4)], [row.es_low, row.es_high]);
    assert_eq!(find("drawdown", "0.95", 2), Some(fall.value));
    assert_eq!(find("drawdown_mean_beyond", "0.95", 5), fall.mean_beyond_error);
    assert_eq!(find("mean_exact", "", 2), shown.reading.moments.mean.exact);
    assert_eq!(find("limit_by_horizon", "", 2), shown.reading.limit.map(|limit| limit.by_horizon));
    let bands = csv::bands_csv(&shown.bands);
    let last = bands.lines().last().unwrap();
    let expected = shown.bands.values[125].iter().chain(&shown.bands.falls[125]);
    let cells: Vec<f64> = last.split(',').skip(1).map(|cell| cell.parse().unwrap()).collect();
    assert!(last.starts_with("126,") && cells.iter().eq(expected), "{last}");
}

#[test]
fn always_extreme_books_are_drawn_and_written() {
    let spot = |alter: fn(&mut Holding)| {
        move |held: &mut Holding| {
            if held.kind == Kind::Spot {
                alter(held)
            }
        }
    };
    let wild = spot(|held| {
        held.description.volatility = Some(TypedFigure { value: 20.0, has_percent_sign: true });
    });
    for shown in [
        Shown::altered("Wild", wild),
        Shown::altered("Immense", spot(|held| held.quantity *= 1e300)),
        Shown::altered("Minute", spot(|held| held.quantity *= 1e-300)),
        Shown::altered("Nothing", |held| {
            held.quantity *= if held.kind == Kind::Exposure { 1.0 } else { 0.0 }
        }),
    ] {
        for (name, figure) in shown.figures() {
            let text = svg(&figure, Look::DECK);
            assert!(!text.contains("NaN") && !text.contains("inf"), "{name} of {}", shown.name);
            png(&figure, Look::DECK).unwrap();
        }
        assert!(csv::reading_csv(21, &shown.reading).lines().count() > 10);
    }
}
