//! Effective size and the variances it rests on (Vehtari et al. 2021).

/// The variances of half chains.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Spread {
    /// W: the mean of the variances within the half chains.
    pub(super) within: f64,
    /// var+: the estimate of the variance from within and between, (n - 1) / n W + B / n.
    pub(super) pooled: f64,
    /// How many half chains.
    pub(super) parts: usize,
    /// Draws of each, n.
    pub(super) draws: usize,
}

impl Spread {
    /// From the variance within and the means of the half chains of `draws` draws.
    pub(super) fn new(within: f64, means: &[f64], draws: usize) -> Spread {
        let parts = means.len() as f64;
        let middle = means[0] + means.iter().map(|m| m - means[0]).sum::<f64>() / parts;
        let between = means.iter().map(|m| (m - middle) * (m - middle)).sum::<f64>() / (parts - 1.0);
        let pooled = (draws as f64 - 1.0) / draws as f64 * within + between;
        Spread { within, pooled, parts: means.len(), draws }
    }

    /// R-hat: sqrt(var+ / W); infinite if the half chains differ without varying, `None` if nothing varies.
    pub(super) fn rhat(&self) -> Option<f64> {
        (self.pooled > 0.0).then(|| (self.pooled / self.within).sqrt())
    }
}

/// The effective size of half chains, from their mean autocovariances (divisor n) at lags 1, 2 and on.
///
/// The autocorrelation at lag t is 1 - (W - n / (n - 1) c_t) / var+. Its sums over pairs
/// of lags (0, 1), (2, 3) and on are cut before the first that is not positive and made to fall: Geyer's
/// initial monotone sequence (Geyer 1992). The size is at most S log10(S), S being all draws of
/// the half chains, since the estimate for chains that swing from side to side is otherwise unstable.
///
/// `None` if nothing varies.
pub(super) fn effective_size(spread: &Spread, mut covariances: impl Iterator<Item = f64>) -> Option<f64> {
    if spread.pooled <= 0.0 {
        return None;
    }
    let n = spread.draws as f64;
    let total = spread.parts as f64 * n;
    let correlation = |c: f64| 1.0 - (spread.within - n / (n - 1.0) * c) / spread.pooled;
    let mut sum = 0.0;
    let mut smallest = f64::INFINITY;
    let mut even = Some(1.0);
    while let (Some(at_even), Some(odd)) = (even, covariances.next()) {
        let pair = at_even + correlation(odd);
        if pair <= 0.0 {
            break;
        }
        smallest = pair.min(smallest);
        sum += smallest;
        even = covariances.next().map(correlation);
    }
    let time = 2.0 * sum - 1.0;
    Some(total / time.max(1.0 / libm::log10(total)))
}
