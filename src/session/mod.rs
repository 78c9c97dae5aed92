//! The day's work as a pure machine: event in, next state and effects out. It has no clock, no
//! file, no terminal and no physics; time, nonces and cards come in as data. State changes only
//! by facts that are on disk: [`apply`] folds them, live and in replay alike.

mod apply;
mod decide;
mod fact;
mod stage;
mod state;
mod step;

pub use apply::{apply, replay};
pub use decide::{Act, HeldAnswer, Refusal, Typed, commitment, decide};
pub use fact::{Answer, Change, Fact, Heard, Look, Recorded, Said, Stamp, StretchEnd, Value};
pub use stage::Stage;
pub use state::{Done, Held, Session, Stopped, Stretch, Talk, TreeEnd};
pub use step::{Effect, Event, Step, outstanding, step};
