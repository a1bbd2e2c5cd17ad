//! How well a model with one open value explains readings, other inputs left uncertain.

use nalgebra::{Cholesky, DMatrix, DVector, Dyn};

use crate::{fit::CONFIDENCE, numerics::test_statistics::student_quantile};

/// Measured conductances against which a model is held.
#[derive(Clone, Debug, PartialEq)]
pub struct Target {
    /// ln of every reading.
    pub values: Vec<f64>,
    /// At which load of the model each was taken, counted from 0.
    pub levels: Vec<usize>,
    /// Standard deviation of each in ln; none where not stated.
    pub deviations: Option<Vec<f64>>,
}

/// What the other uncertain inputs do to the model, load by load.
#[derive(Clone, Debug, PartialEq)]
pub struct Nuisance {
    /// Mean of ln conductance over the drawn joints, less the nominal.
    pub offset: Vec<f64>,
    /// Its covariance between loads.
    pub covariance: DMatrix<f64>,
}

impl Nuisance {
    /// Nothing is uncertain.
    pub fn none(levels: usize) -> Self {
        Self {
            offset: vec![0.0; levels],
            covariance: DMatrix::zeros(levels, levels),
        }
    }

    /// Mean and covariance of drawn joints: ln conductance by draw, then by load.
    pub fn of(drawn: &[Vec<f64>], nominal: &[f64]) -> Self {
        let (draws, levels) = (drawn.len() as f64, nominal.len());
        let mean: Vec<f64> = (0..levels)
            .map(|level| drawn.iter().map(|one| one[level]).sum::<f64>() / draws)
            .collect();
        let covariance = DMatrix::from_fn(levels, levels, |a, b| {
            let products = drawn
                .iter()
                .map(|one| (one[a] - mean[a]) * (one[b] - mean[b]));
            products.sum::<f64>() / (draws - 1.0)
        });
        Self {
            offset: mean
                .iter()
                .zip(nominal)
                .map(|(mean, own)| mean - own)
                .collect(),
            covariance,
        }
    }

    /// The same with an error of the model that moves all loads alike, as a share.
    #[must_use]
    pub fn with_error(mut self, share: f64) -> Self {
        self.covariance.add_scalar_mut(share * share);
        self
    }
}

/// Likelihood of readings under a model whose other inputs are uncertain.
///
/// ```text
/// d ~ N(m(θ) + o, V),   V = diag(σ²) + Z C Zᵀ,   −2 ln L = (d − m − o)ᵀ V⁻¹ (d − m − o) + const
/// ```
///
/// | symbol | quantity |
/// |---|---|
/// | `d`, `σ` | ln of the readings, their standard deviations |
/// | `m(θ)` | ln of the model at the value θ, other inputs nominal |
/// | `o`, `C` | mean and covariance over drawn joints of what other inputs add, load by load |
/// | `Z` | which reading was taken at which load |
///
/// The other inputs are integrated out (marginal likelihood), by their first two moments.
/// Checked: `marginal_interval_is_that_of_the_linear_gaussian_case`.
#[derive(Clone, Debug)]
pub struct Likelihood {
    target: Target,
    offset: Vec<f64>,
    inverse: Cholesky<f64, Dyn>,
    /// Rise of −2 ln L that bounds the 90 % interval.
    pub threshold: f64,
    /// Standard deviation of the readings alone, of their common part, in ln.
    pub measured: f64,
    /// The same with the other inputs.
    pub whole: f64,
}

impl Likelihood {
    /// The likelihood; `scatter` is the standard deviation in ln where none is stated, found with
    /// so many degrees of freedom. None where a covariance is not positive.
    pub fn of(target: &Target, nuisance: &Nuisance, scatter: Option<(f64, f64)>) -> Option<Self> {
        let count = target.values.len();
        let (own, freedom) = match (&target.deviations, scatter) {
            (Some(own), _) => (own.clone(), f64::INFINITY),
            (None, Some((scatter, freedom))) => (vec![scatter; count], freedom),
            (None, None) => return None,
        };
        let covariance = DMatrix::from_fn(count, count, |a, b| {
            let shared = nuisance.covariance[(target.levels[a], target.levels[b])];
            shared + if a == b { own[a] * own[a] } else { 0.0 }
        });
        let inverse = Cholesky::new(covariance)?;
        let ones = DVector::from_element(count, 1.0);
        let reach = student_quantile(f64::midpoint(1.0, CONFIDENCE), freedom);
        Some(Self {
            target: target.clone(),
            offset: nuisance.offset.clone(),
            threshold: reach * reach,
            measured: own.iter().map(|sd| sd.powi(-2)).sum::<f64>().powf(-0.5),
            whole: ones.dot(&inverse.solve(&ones)).powf(-0.5),
            inverse,
        })
    }

    /// −2 ln L but for a constant: ln conductance of the model load by load.
    pub fn deviance(&self, model: &[f64]) -> f64 {
        let readings = self.target.values.iter().zip(&self.target.levels);
        let misses = readings.map(|(value, level)| value - model[*level] - self.offset[*level]);
        let misses = DVector::from_iterator(self.target.values.len(), misses);
        misses.dot(&self.inverse.solve(&misses))
    }
}

impl Target {
    /// Standard deviation of single readings about a model that may be off by a common factor, and
    /// its degrees of freedom; none for fewer than three readings or without any scatter.
    pub fn scatter(&self, model: &[f64]) -> Option<(f64, f64)> {
        let misses: Vec<f64> = self
            .values
            .iter()
            .zip(&self.levels)
            .map(|(value, level)| value - model[*level])
            .collect();
        let count = misses.len() as f64;
        let mean = misses.iter().sum::<f64>() / count;
        let sum: f64 = misses.iter().map(|miss| (miss - mean).powi(2)).sum();
        let freedom = count - 2.0;
        (freedom > 0.0 && sum > 0.0).then(|| ((sum / freedom).sqrt(), freedom))
    }
}
