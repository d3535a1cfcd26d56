//! A figure together with the step it is written in.

/// A figure as written: 247.5 is written in steps of half a degree, 247 in whole degrees.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Reading<T> {
    /// The figure.
    pub value: T,
    /// The step of the figure, degrees.
    pub step_deg: f64,
}

impl<T> Reading<T> {
    /// A figure written in steps of `step_deg` degrees.
    pub fn new(value: T, step_deg: f64) -> Self {
        Self { value, step_deg }
    }

    /// The same step with another value.
    pub fn map<U>(self, f: impl FnOnce(T) -> U) -> Reading<U> {
        Reading { value: f(self.value), step_deg: self.step_deg }
    }
}
