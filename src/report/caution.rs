//! What every report says about its own reach.

/// Closes every report, whatever its format.
pub const CAUTION: &str = "The bracket bounds the numerical error for the model as drawn; it says nothing about the \
    inputs, the workmanship or the weather. Whether a detail is acceptable is settled by the local code and by a \
    qualified person who has checked the drawing against the building.";
