//! What in a log needs an explanation, and the slip that most probably gives it.
//!
//! Two passes over the same rows. [`Learn`] is fed every row in the order of the file and keeps 32 bytes of each; `finish` gives the
//! [`Fleet`]: each gyro's run and each magnetic compass's curve from the vessel's own rows, so that one bad row, or one in ten, moves
//! nothing; the order of time, the track, and the vessel's patterns. [`judge`] then takes rows in any order, on any number of threads.
//!
//! How likely a slip is: everything the row and its neighbours say is compared with what the slip would have made of it (the gyro
//! against its run, the magnetic compass against its curve, the headings against each other, each logged figure, the position
//! against the track, the time against its neighbours, the body against the horizon and the daylight). The sum of squares, each
//! against what that figure is good for, ranks the slips. All slips are alike at first; one that has several forms on the row pays
//! 2 ln(forms), since one of many fits by chance more easily.
//!
//! Nothing in a log is ever corrected. A query is a question.

mod bodies;
mod candidates;
mod card_watch;
mod case;
mod checks;
mod curve;
mod desk;
mod evidence;
mod explain;
mod fact;
mod findings;
mod fleet;
mod judge;
mod learn;
mod order;
mod pattern;
mod patterns;
mod portrait;
mod prints;
mod query;
mod robust;
mod row;
mod run;
mod slip;
mod summary;
mod vessel;

pub use card_watch::CardWatch;
pub use desk::{Desk, WorkedEntry, names};
pub use findings::{Figures, Finding, Findings, Glimpse, MOST_OUTLIERS, MOST_POINTS, MOST_PROBLEMS, MOST_ROWS};
pub use fleet::Fleet;
pub use judge::{Verdict, judge};
pub use learn::Learn;
pub use pattern::{NotEvaluated, Pattern, PatternId};
pub use portrait::{CompassDrawn, Coverage, DeviationOnHeading, ErrorInTime, GyroDrawn, Portrait, RepeaterDrawn, StepInRun, WatchRow};
pub use query::{Instrument, OffHorizon, Query, Sum};
pub use row::{CardFigure, Names, Row};
pub use slip::{Explanation, Place, Slip};
pub use summary::{CompassSummary, GyroSummary, NotEvaluatedSummary, PatternSummary, Summary, Tally, VesselSummary};
