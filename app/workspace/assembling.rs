//! From a document to its model: the history fitted where there is one, and its figures put where nobody typed any.

use super::Document;
use ebbmark_engine::factors::{Fitted, Model, Repair, TypedFactor, typed_factors};
use ebbmark_engine::fit::{Fit, FitSettings};
use ebbmark_engine::history::History;
use ebbmark_engine::tables::{Faults, Notice, NoticeLevel};
use std::sync::Arc;

/// A model, and what a history gave it.
#[derive(Debug, Clone)]
pub struct Assembled {
    /// The model.
    pub model: Model,
    /// The fit of the history; none without one, or where its levels are lost.
    pub fit: Option<Arc<Fit>>,
    /// What the book took of it.
    pub fitted: Option<Arc<Fitted>>,
}

/// Makes models of documents, and keeps the last fit for the next document that asks for the same.
#[derive(Debug, Default)]
pub struct Assembler {
    last: Option<(Asked, Arc<Fit>)>,
}

/// What a fit depends on.
#[derive(Debug, Clone)]
struct Asked {
    history: Arc<History>,
    settings: FitSettings,
    days_per_year: f64,
    typed: Vec<TypedFactor>,
}

impl PartialEq for Asked {
    fn eq(&self, other: &Self) -> bool {
        Arc::ptr_eq(&self.history, &other.history)
            && (&self.settings, self.days_per_year, &self.typed)
                == (&other.settings, other.days_per_year, &other.typed)
    }
}

/// The fit of a history, and what the book takes of it.
type FitAndTaken = (Option<Arc<Fit>>, Option<Arc<Fitted>>);

impl Document {
    /// Its model.
    ///
    /// # Errors
    /// Everything wrong with its inputs or its history.
    pub fn assemble(&self) -> Result<Assembled, Faults> {
        Assembler::default().assemble(self)
    }
}

impl Assembler {
    /// The model of a document.
    ///
    /// # Errors
    /// Everything wrong with its inputs or its history.
    pub fn assemble(&mut self, document: &Document) -> Result<Assembled, Faults> {
        let settings = document.settings.model_settings();
        let (fit, fitted) = self.fitted(document)?;
        let mut model = Model::assemble_fitted(&document.inputs, fitted.as_deref(), &settings)?;
        model.notices.extend(document.notice_of_lost_history());
        Ok(Assembled { model, fit, fitted })
    }

    /// The repair that would make a model of a document whose correlation is all that is wrong.
    pub fn repair_offered(&mut self, document: &Document) -> Option<Repair> {
        let mut repaired = document.clone();
        repaired.settings.repairs_correlation = true;
        self.assemble(&repaired).ok()?.model.repair
    }

    fn fitted(&mut self, document: &Document) -> Result<FitAndTaken, Faults> {
        let Some(book_history) = &document.history else { return Ok((None, None)) };
        let Some(history) = book_history.history() else { return Ok((None, book_history.fitted.clone())) };
        let settings = document.settings.model_settings();
        let columns: Vec<String> = history.series.iter().map(|series| series.name.clone()).collect();
        let asked = Asked {
            history: Arc::clone(history),
            settings: book_history.settings.clone(),
            days_per_year: settings.days_per_year,
            typed: typed_factors(&document.inputs, &columns, &settings)?,
        };
        let fit = self.fit(asked.clone())?;
        let fitted = fit.taken(&asked.typed, columns, &asked.settings, asked.days_per_year);
        Ok((Some(fit), Some(Arc::new(fitted))))
    }

    fn fit(&mut self, asked: Asked) -> Result<Arc<Fit>, Faults> {
        if let Some((_, fit)) = self.last.as_ref().filter(|(last, _)| *last == asked) {
            return Ok(Arc::clone(fit));
        }
        let fit = Arc::new(Fit::of(&asked.history, &asked.settings, asked.days_per_year, &asked.typed)?);
        self.last = Some((asked, Arc::clone(&fit)));
        Ok(fit)
    }
}

impl Document {
    fn notice_of_lost_history(&self) -> Option<Notice> {
        let history = self.history.as_ref()?;
        let why = history.levels.as_ref().err()?;
        let then = if history.fitted.is_some() {
            "the figures it gave are kept; open it again to fit it anew."
        } else {
            "open it again."
        };
        Some(Notice {
            level: NoticeLevel::Warning,
            text: format!("The history is not at hand: {why}; {then}"),
        })
    }
}
