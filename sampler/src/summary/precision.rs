//! Monte Carlo standard errors of the mean, the sd and the quantiles.

use super::rank::Sorted;
use super::series::{Layout, Series};
use super::special::beta_quantile;

/// The normal probability below one standard deviation under the mean.
const ONE_SD_BELOW: f64 = 0.158_655_253_931_457_05;

/// The standard error of the mean: sd / sqrt(effective size).
pub(super) fn mean_error(values: &[f64], sd: f64, layout: Layout) -> f64 {
    Series::new(values, layout).effective_size().map_or(0.0, |size| sd / size.sqrt())
}

/// The standard error of the sd by the delta method: that of the mean of the squared deviations, divided by 2
/// sd.
pub(super) fn sd_error(values: &[f64], mean: f64, sd: f64, layout: Layout) -> f64 {
    let squares: Vec<f64> = values.iter().map(|x| (x - mean) * (x - mean)).collect();
    let Some(size) = Series::new(&squares, layout).effective_size() else {
        return 0.0;
    };
    let count = squares.len() as f64;
    let middle = squares.iter().sum::<f64>() / count;
    let variance = squares.iter().map(|s| (s - middle) * (s - middle)).sum::<f64>() / (count - 1.0);
    (variance / size).sqrt() / (2.0 * sd)
}

/// The standard error of a quantile, from the effective size of being at most the quantile (Vehtari et al.
/// 2021): half the distance of the order statistics at the beta quantiles that lie one normal sd
/// to either side.
pub(super) fn quantile_error(sorted: &Sorted, p: f64, effective: f64) -> f64 {
    let (a, b) = (effective * p + 1.0, effective * (1.0 - p) + 1.0);
    let count = sorted.len() as f64;
    let low = (beta_quantile(ONE_SD_BELOW, a, b) * count).floor().max(1.0);
    let high = (beta_quantile(1.0 - ONE_SD_BELOW, a, b) * count).ceil().min(count);
    0.5 * sorted.at(high as usize - 1) - 0.5 * sorted.at(low as usize - 1)
}
