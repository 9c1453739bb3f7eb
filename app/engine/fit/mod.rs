//! From dated levels to diffusions and correlations, each with its error, and the evidence for one diffusion or the
//! other. Nothing here knows a holding; what a book takes of a fit is `taking`'s business, what it then reads of it is not.

/// How a history is fitted.
pub mod settings;
/// One factor where it was quoted, and the time between.
pub mod path;
/// Why a fit was refused.
pub mod refusal;
/// Geometric diffusion.
pub mod geometric;
/// Reverting diffusion.
pub mod reverting;
mod autoregression;
mod profile;
mod information;
/// What speaks for a random walk or against it.
pub mod evidence;
mod dickey_fuller;
mod variance_ratio;
/// One factor under all three diffusions.
pub mod factor;
/// Which of them is taken, and why.
pub mod choice;
mod innovations;
/// Correlations of the Brownian motions.
pub mod correlation;
/// A whole history.
pub mod whole;
/// What a book takes of it.
pub mod taking;

pub use choice::choose;
pub use correlation::FittedCorrelation;
pub use evidence::{DickeyFuller, Evidence, VarianceRatio};
pub use factor::FactorFit;
pub use geometric::GeometricFit;
pub use path::{ObservedPath, Steps};
pub use refusal::Refusal;
pub use reverting::RevertingFit;
pub use settings::{DriftChoice, Estimator, FitSettings, Missing, ModelChoice};
pub use taking::taken_diffusion;
pub use whole::{Fit, history_for};
