//! Edits as plain functions from document to document. Whether the result makes a valid model is for the engine to say.

/// Correlations.
pub mod correlation;
/// Diffusions and their parameters.
pub mod factors;
/// How the history is fitted.
pub mod history;
/// Holdings and their sensitivities.
pub mod holdings;
/// Settings.
pub mod settings;

use crate::desk::commands::Command;
use crate::workspace::{Document, check_rows};
use ebbmark_engine::factors::{Inputs, Model};
use std::sync::Arc;

/// The document after an edit; none where the command edits nothing or its value can't be taken. The last valid
/// `model` tells today's levels and which currency rates are read inverted.
pub fn edited(document: &Document, model: Option<&Model>, command: &Command) -> Option<Document> {
    let mut new = document.clone();
    match command {
        Command::RenameBook(name) => new.name.clone_from(name),
        Command::ChangeFit(change) => history::change(&mut new.history.as_mut()?.settings, *change)?,
        Command::LeaveHistory => drop(new.history.take()?),
        Command::ChangeSetting(change) => settings::change(&mut new.settings, change)?,
        other => {
            edit_inputs(Arc::make_mut(&mut new.inputs), model, other)?;
            // What could not be kept and read again is not taken: nothing typed may be lost.
            check_rows(&new.inputs).ok()?;
        }
    }
    (new != *document).then_some(new)
}

fn edit_inputs(inputs: &mut Inputs, model: Option<&Model>, command: &Command) -> Option<()> {
    match command {
        Command::AddHolding(holding) => holdings::add(inputs, holding),
        Command::RemoveHolding { row } => holdings::remove(inputs, *row)?,
        Command::ChangeHolding { row, change } => holdings::change(inputs, *row, change)?,
        Command::SetExposure { row, money } => {
            inputs.exposures.get_mut(*row)?.money = finite(*money)?;
        }
        Command::TakeDiffusion { factors, kind } => {
            factors.iter().for_each(|factor| factors::take_fitted(inputs, model, factor, *kind));
        }
        Command::SetDiffusion { factor, kind } => factors::set_diffusion(inputs, model, factor, *kind),
        Command::SetParameter { factor, parameter } => {
            factors::set_parameter(inputs, model, factor, *parameter)?;
        }
        Command::SetCorrelation { row, column, value } => {
            correlation::set(inputs, model, [row, column], *value)?;
        }
        _ => return None,
    }
    Some(())
}

fn finite(number: f64) -> Option<f64> {
    number.is_finite().then_some(number)
}
