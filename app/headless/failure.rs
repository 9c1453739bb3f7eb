//! Why a command gave no answer, and the exit code that says so.

use ebbmark_engine::measures::parameter_range::RangeError;
use ebbmark_engine::simulate::SimulateError;
use ebbmark_engine::tables::Faults;

/// A command that gave no answer.
#[derive(Debug, thiserror::Error)]
pub enum Failure {
    /// The input is wrong; every fault is listed.
    #[error("{}", list(.0))]
    Input(#[from] Faults),
    /// The call does not hang together; a sentence without a full stop.
    #[error("{0}")]
    Call(String),
    /// The call asks for what this version does not do.
    #[error("{what}: not yet in this version. {instead}")]
    NotYet {
        /// The command or option, as it is typed.
        what: String,
        /// What to do instead, a sentence.
        instead: &'static str,
    },
    /// The paths could not be drawn.
    #[error("the run failed: {0}")]
    Run(#[from] SimulateError),
    /// The answer could not be written.
    #[error("the answer could not be written: {0}")]
    Output(#[from] std::io::Error),
    /// Something that should not happen.
    #[error("the program failed: {0}. This is a fault of the program, not of your files")]
    Program(String),
}

impl Failure {
    /// 2 where the call or the input is wrong, 1 where the program failed.
    pub fn exit_code(&self) -> u8 {
        match self {
            Self::Input(_)
            | Self::Call(_)
            | Self::NotYet { .. }
            | Self::Run(SimulateError::NotSemiDefinite { .. }) => 2,
            Self::Run(_) | Self::Output(_) | Self::Program(_) => 1,
        }
    }
}

impl From<RangeError> for Failure {
    fn from(error: RangeError) -> Self {
        match error {
            RangeError::Faults(faults) => Self::Input(faults),
            RangeError::Simulate(error) => Self::Run(error),
        }
    }
}

fn list(faults: &Faults) -> String {
    let count = faults.0.len();
    let head = if count == 1 {
        "the input is refused:".into()
    } else {
        format!("the input is refused, {count} faults:")
    };
    format!("{head}\n{faults}")
}
