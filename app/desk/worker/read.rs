//! The thread that reads paths: the reading at the line first, then the bands. In closed form while there are no paths,
//! then again whenever enough have arrived that the figures may have moved, and at the end from all of them.

use super::board::{Board, End, Shown, State};
use super::post::Post;
use super::request::{Figures, LineRequest};
use crate::desk::session::AtLine;
use ebbmark_engine::factors::Model;
use ebbmark_engine::measures::{Bands, bands, density, first_bands, first_densities, first_reading, reading};
use ebbmark_engine::simulate::Run;
use std::sync::Arc;

/// The reading is done again when there are this many times as many paths as behind the last.
const READING_GROWTH: f64 = 1.3;
/// The bands likewise; they cost more.
const BANDS_GROWTH: f64 = 2.0;
/// Days on which bands are read at first; all kept days follow when everything else is done.
const COARSE_DAYS: usize = 40;
/// Days read at a time, between which a moved line is served first.
const DAYS_AT_A_TIME: usize = 8;

/// Reads until the program closes.
pub(super) fn serve(board: &Board, post: &Post) {
    let mut reader = Reader { board, post, line: None, bands: None, told: None, was_line: false };
    while let Some((shown, task)) = board.wait_for(|state| reader.next(state)) {
        let is_line = matches!(task, Task::Line(_));
        match task {
            Task::Line(line) => reader.read_line(&shown, line),
            Task::Bands(detail) => reader.read_bands(&shown, detail),
            Task::End(end) => reader.tell_end(&shown, end),
        }
        reader.was_line = is_line;
        drop(shown);
        board.change(|state| state.is_being_read = false);
    }
}

enum Task {
    Line(LineRequest),
    Bands(Detail),
    End(End),
}

#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Detail {
    SomeDays,
    AllDays,
}

/// What figures were made from.
#[derive(Debug, Clone, PartialEq)]
struct Source {
    generation: u64,
    paths: usize,
    is_final: bool,
}

struct Reader<'a> {
    board: &'a Board,
    post: &'a Post,
    line: Option<(Source, LineRequest)>,
    bands: Option<(Source, Detail)>,
    /// Generation of the run whose end was told.
    told: Option<u64>,
    /// Whether the last thing done was the line.
    was_line: bool,
}

impl Source {
    fn of(shown: &Shown) -> Self {
        Self {
            generation: shown.job.generation,
            paths: shown.run.as_ref().map_or(0, Run::paths),
            is_final: shown.end.is_some(),
        }
    }

    /// Whether figures from this source are good enough while there is `now`.
    fn serves(&self, now: &Self, growth: f64) -> bool {
        let has_grown = now.paths as f64 >= self.paths as f64 * growth && now.paths > self.paths;
        let is_ended = now.is_final && !self.is_final;
        self.generation == now.generation && !has_grown && !is_ended
    }
}

impl Reader<'_> {
    /// The most urgent thing to do, if there is any; what is to be read is then marked as being read.
    fn next(&self, state: &mut State) -> Option<(Shown, Task)> {
        let shown = state.shown.as_ref()?;
        let now = Source::of(shown);
        let wanted = state.line.as_ref()?;
        let line = self.line.as_ref().filter(|(source, _)| source.serves(&now, READING_GROWTH));
        let is_at_line = line.is_some_and(|(_, line)| line == wanted);
        let task = match self.beside_line(shown.end, &now) {
            Some(other) if is_at_line || (line.is_some() && self.was_line) => other,
            _ if !is_at_line => Task::Line(wanted.clone()),
            _ => return None,
        };
        state.is_being_read = true;
        Some((shown.clone(), task))
    }

    /// What there is to do beside the line. The two take turns, so that a line that never rests keeps nothing waiting.
    fn beside_line(&self, end: Option<End>, now: &Source) -> Option<Task> {
        let bands = self.bands.as_ref().filter(|(source, _)| source.serves(now, BANDS_GROWTH));
        match (end, bands) {
            (_, None) => Some(Task::Bands(Detail::SomeDays)),
            (Some(end), _) if self.told != Some(now.generation) => Some(Task::End(end)),
            (Some(_), Some((_, Detail::SomeDays))) => Some(Task::Bands(Detail::AllDays)),
            _ => None,
        }
    }

    fn read_line(&mut self, shown: &Shown, line: LineRequest) {
        let at_line = at_line(&shown.job.model, shown.run.as_ref(), &line);
        self.post.figures(shown.job.generation, Figures::AtLine(Arc::new(at_line)));
        self.line = Some((Source::of(shown), line));
    }

    fn read_bands(&mut self, shown: &Shown, detail: Detail) {
        let source = Source::of(shown);
        let days = &shown.job.plan.kept_days;
        let days = if detail == Detail::AllDays { days.clone() } else { spread(days, COARSE_DAYS) };
        let whole = match &shown.run {
            Some(run) => self.read_in_parts(shown, run, &days),
            None => Some(first_bands(&shown.job.model, &days)),
        };
        if let Some(whole) = whole {
            self.post.figures(source.generation, Figures::Bands(Arc::new(whole)));
            self.bands = Some((source, detail));
        }
    }

    /// A few days at a time, so that a moved line need not wait; none when another run is shown meanwhile.
    fn read_in_parts(&mut self, shown: &Shown, run: &Run, days: &[u32]) -> Option<Bands> {
        let mut whole = bands(run, &[]);
        for part in days.chunks(DAYS_AT_A_TIME) {
            let part = bands(run, part);
            whole.days.extend(part.days);
            whole.values.extend(part.values);
            whole.falls.extend(part.falls);
            match self.what_came() {
                Some(Came::OtherRun) => return None,
                Some(Came::OtherLine(line)) => self.read_line(shown, line),
                None => {}
            }
        }
        Some(whole)
    }

    fn what_came(&self) -> Option<Came> {
        self.board.look(|state| {
            let generation = state.shown.as_ref().map(|shown| shown.job.generation);
            let (read, read_line) = self.line.as_ref()?;
            if generation != Some(read.generation) {
                return Some(Came::OtherRun);
            }
            state.line.clone().filter(|line| line != read_line).map(Came::OtherLine)
        })
    }

    fn tell_end(&mut self, shown: &Shown, end: End) {
        let figures = match end {
            End::Finished { seconds } => Figures::Finished { seconds },
            End::Stopped => Figures::Stopped,
        };
        self.post.figures(shown.job.generation, figures);
        self.told = Some(shown.job.generation);
    }
}

/// What came while bands were read.
enum Came {
    OtherRun,
    OtherLine(LineRequest),
}

/// Everything at the line: from the paths where there are any, else in closed form.
fn at_line(model: &Model, run: Option<&Run>, line: &LineRequest) -> AtLine {
    let LineRequest { day, conventions } = line.clone();
    match run.and_then(|run| run.sample(day)) {
        Some(sample) => AtLine {
            day,
            reading: reading(model, &sample, &conventions),
            conventions,
            values: density(&sample.values),
            falls: density(&sample.falls),
            paths: Some(sample.values.len()),
        },
        None => {
            let (values, falls) = first_densities(model, day);
            let reading = first_reading(model, day, &conventions);
            AtLine { day, reading, conventions, values, falls, paths: None }
        }
    }
}

/// At most `count` of the days, evenly spread, the first and the last among them.
fn spread(days: &[u32], count: usize) -> Vec<u32> {
    if days.len() <= count {
        return days.to_vec();
    }
    (0..count).map(|part| days[part * (days.len() - 1) / (count - 1)]).collect()
}
