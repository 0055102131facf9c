//! The zero of a monotone function, by a method that cannot fail to converge.

/// A point and the value of the function there.
#[derive(Clone, Copy, Debug)]
struct Sample {
    at: f64,
    value: f64,
}

/// An interval at whose ends the function has different signs.
#[derive(Clone, Copy, Debug)]
pub(super) struct Bracket {
    first: Sample,
    second: Sample,
}

impl Bracket {
    /// The bracket from `start` to the first of `start + step`, `start + 3 step`,
    /// `start + 7 step`, … (cut at `bound`) where the sign is another one; `None` where the sign
    /// stays the same up to the bound.
    pub(super) fn reaching(
        start: f64,
        step: f64,
        bound: f64,
        function: impl Fn(f64) -> f64,
    ) -> Option<Self> {
        // The width of a bracket between the bounds must be a finite number.
        let bound = bound.clamp(-0.5 * f64::MAX, 0.5 * f64::MAX);
        let mut first = Sample { at: start, value: function(start) };
        let mut step = step.abs().max(f64::EPSILON * start.abs()).copysign(step);
        loop {
            let next = first.at + step;
            let at = if (next - bound) * step >= 0.0 { bound } else { next };
            let second = Sample { at, value: function(at) };
            if first.value == 0.0 || first.value.signum() != second.value.signum() {
                return Some(Self { first, second });
            }
            if at == bound {
                return None;
            }
            first = second;
            step *= 2.0;
        }
    }

    /// The zero between the ends, to the last digits of a double.
    ///
    /// Inverse quadratic interpolation where the three latest points allow it and bisection
    /// otherwise, with the change of sign kept between the ends (Chandrupatla 1997, Adv. Eng. Softw.
    /// 28:145).
    pub(super) fn zero(self, function: impl Fn(f64) -> f64) -> f64 {
        let Self { first: mut newest, second: mut opposite } = self;
        let mut fraction: f64 = 0.5;
        // Bisection alone needs about 1100 halvings for the widest bracket of doubles.
        for _ in 0..2200 {
            let best = if newest.value.abs() < opposite.value.abs() { newest } else { opposite };
            let width = (opposite.at - newest.at).abs();
            let tolerance = f64::EPSILON * best.at.abs() + f64::MIN_POSITIVE;
            if best.value == 0.0 || width <= 2.0 * tolerance {
                return best.at;
            }
            let least = (tolerance / width).min(0.5);
            let part = fraction.clamp(least, 1.0 - least);
            let at = newest.at + part * (opposite.at - newest.at);
            let trial = Sample { at, value: function(at) };
            let previous = if trial.value.signum() == newest.value.signum() {
                newest
            } else {
                std::mem::replace(&mut opposite, newest)
            };
            newest = trial;
            fraction = next_fraction(newest, opposite, previous);
        }
        if newest.value.abs() < opposite.value.abs() { newest.at } else { opposite.at }
    }
}

/// How far to go from the newest point towards the opposite one.
fn next_fraction(newest: Sample, opposite: Sample, previous: Sample) -> f64 {
    let place = (newest.at - opposite.at) / (previous.at - opposite.at);
    let height = (newest.value - opposite.value) / (previous.value - opposite.value);
    let safe = 1.0 - (1.0 - place).sqrt() < height && height < place.sqrt();
    if !safe {
        return 0.5;
    }
    let quadratic = newest.value / (opposite.value - newest.value)
        * (previous.value / (opposite.value - previous.value));
    let slant = (previous.at - newest.at) / (opposite.at - newest.at)
        * (newest.value / (previous.value - newest.value))
        * (opposite.value / (previous.value - opposite.value));
    quadratic + slant
}
