//! How a line is written down: in the caller's units, and in those the likelihood is worked in.

/// A line with a normal scatter, in the caller's units.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Parameters {
    /// Value of the line at time 0.
    pub intercept: f64,
    /// Its change per unit of time.
    pub slope: f64,
    /// Standard deviation of values about it.
    pub scale: f64,
}

/// How times and values are brought to order one: the values as residuals about a guessed line.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Scaling {
    /// Time that becomes 0.
    pub t_centre: f64,
    /// Length of time that becomes 1.
    pub t_unit: f64,
    /// Value of the guessed line at the centre.
    pub base: f64,
    /// Slope of the guessed line.
    pub base_slope: f64,
    /// Difference in value that becomes 1.
    pub y_unit: f64,
}

impl Scaling {
    /// The scaled time.
    pub fn u(&self, t: f64) -> f64 {
        (t - self.t_centre) / self.t_unit
    }

    /// The guessed line at time `t`.
    pub fn guessed(&self, t: f64) -> f64 {
        self.base + self.base_slope * (t - self.t_centre)
    }

    /// The scaled residual.
    pub fn w(&self, t: f64, y: f64) -> f64 {
        (y - self.guessed(t)) / self.y_unit
    }

    /// The guessed line that values are scaled about.
    pub fn guessed_line(&self) -> Parameters {
        Parameters {
            intercept: self.base - self.base_slope * self.t_centre,
            slope: self.base_slope,
            scale: self.y_unit,
        }
    }

    /// Olsen's parameters of a line given in the caller's units.
    ///
    /// # Formula
    /// ```text
    /// a = U/σ     b = −a·(slope − guessed slope)·T/U     c = −a·(level − guessed level)/U
    /// ```
    /// where σ is the scale, T and U the units of times and values, and the level is that at the
    /// centre.
    pub fn olsen(&self, line: Parameters) -> Olsen {
        let a = self.y_unit / line.scale;
        let level = (line.intercept + line.slope * self.t_centre - self.base) / self.y_unit;
        let tilt = (line.slope - self.base_slope) * self.t_unit / self.y_unit;
        Olsen { a, b: -a * tilt, c: -a * level }
    }

    /// The line in the caller's units that has these Olsen's parameters: the inverse of
    /// [`Scaling::olsen`].
    pub fn line(&self, at: Olsen) -> Parameters {
        let slope = self.base_slope - at.b / at.a * self.y_unit / self.t_unit;
        let level = self.base - at.c / at.a * self.y_unit;
        Parameters { intercept: level - slope * self.t_centre, slope, scale: self.y_unit / at.a }
    }

    /// Slope of the guessed line in scaled values per scaled time.
    pub fn scaled_base_slope(&self) -> f64 {
        self.base_slope * self.t_unit / self.y_unit
    }
}

/// Olsen's parameters in scaled units: a point at (u, w) lies `z = a·w + b·u + c` standard
/// deviations over the line. `a` is one over the scale.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Olsen {
    /// Factor of the scaled value; over zero.
    pub a: f64,
    /// Factor of the scaled time.
    pub b: f64,
    /// The constant.
    pub c: f64,
}
