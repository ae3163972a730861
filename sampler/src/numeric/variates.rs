//! Draws from standard laws on our own kernels, so that their bits are the same everywhere.

use super::special;
use super::stream::Stream;

impl Stream {
    /// Gamma of a shape and rate 1 (Marsaglia and Tsang 2000; below shape 1 by their boost).
    pub fn gamma(&mut self, shape: f64) -> f64 {
        if shape < 1.0 { libm::exp(self.ln_gamma_variate(shape)) } else { self.gamma_above_one(shape) }
    }

    /// The logarithm of a gamma variate, which does not underflow for small shapes.
    pub fn ln_gamma_variate(&mut self, shape: f64) -> f64 {
        if shape < 1.0 {
            let boosted = self.gamma_above_one(shape + 1.0);
            libm::log(boosted) - self.exponential() / shape
        } else {
            libm::log(self.gamma_above_one(shape))
        }
    }

    fn gamma_above_one(&mut self, shape: f64) -> f64 {
        let d = shape - 1.0 / 3.0;
        let c = 1.0 / (9.0 * d).sqrt();
        loop {
            let x = self.normal();
            let v = 1.0 + c * x;
            if v <= 0.0 {
                continue;
            }
            let v = v * v * v;
            let u = self.uniform();
            if libm::log(u) < 0.5 * x * x + d - d * v + d * libm::log(v) {
                return d * v;
            }
        }
    }

    /// Beta, from two gamma variates on the log scale, so that small shapes give no 0 / 0.
    pub fn beta(&mut self, a: f64, b: f64) -> f64 {
        let (x, y) = (self.ln_gamma_variate(a), self.ln_gamma_variate(b));
        special::logistic(x - y)
    }

    /// Standard normal between two ends, exact also far in the tails (Robert 1995).
    pub fn normal_between(&mut self, low: f64, high: f64) -> f64 {
        if low >= high {
            return low;
        }
        if high <= 0.0 {
            return -self.normal_between_above(-high, -low);
        }
        if low < 0.0 {
            return self.normal_around_zero(low, high);
        }
        self.normal_between_above(low, high)
    }

    /// Ends on both sides of 0: from the normal where the interval holds much of it, else from the uniform.
    fn normal_around_zero(&mut self, low: f64, high: f64) -> f64 {
        if high - low > 2.5 {
            loop {
                let z = self.normal();
                if z >= low && z <= high {
                    return z;
                }
            }
        }
        loop {
            let z = low + (high - low) * self.uniform();
            if self.exponential() > 0.5 * z * z {
                return z;
            }
        }
    }

    /// Ends `0 <= low < high`: from the exponential with the best rate where the interval is long, else from the uniform.
    fn normal_between_above(&mut self, low: f64, high: f64) -> f64 {
        let rate = 0.5 * (low + (low * low + 4.0).sqrt());
        if (high - low) * rate > 1.0 {
            loop {
                let z = low + self.exponential() / rate;
                let gap = z - rate;
                if z <= high && self.exponential() > 0.5 * gap * gap {
                    return z;
                }
            }
        }
        loop {
            let z = low + (high - low) * self.uniform();
            if self.exponential() > 0.5 * (z - low) * (z + low) {
                return z;
            }
        }
    }

    /// Poisson: by multiplication below a mean of 10, above it by transformed rejection (Hoermann 1993, PTRS).
    pub fn poisson(&mut self, mean: f64) -> f64 {
        if mean < 10.0 {
            let floor = libm::exp(-mean);
            let (mut count, mut product) = (0.0, self.uniform());
            while product > floor {
                count += 1.0;
                product *= self.uniform();
            }
            return count;
        }
        let log_mean = libm::log(mean);
        let b = 0.931 + 2.53 * mean.sqrt();
        let a = -0.059 + 0.02483 * b;
        let inverse_alpha = 1.1239 + 1.1328 / (b - 3.4);
        let bound = 0.9277 - 3.6224 / (b - 2.0);
        loop {
            let u = self.uniform() - 0.5;
            let v = self.uniform();
            let us = 0.5 - u.abs();
            let k = ((2.0 * a / us + b) * u + mean + 0.43).floor();
            if us >= 0.07 && v <= bound {
                return k;
            }
            if k < 0.0 || (us < 0.013 && v > us) {
                continue;
            }
            let left = libm::log(v * inverse_alpha / (a / (us * us) + b));
            if left <= k * log_mean - mean - special::ln_gamma(k + 1.0) {
                return k;
            }
        }
    }

    /// Binomial: by counting below 10 expected successes, above by transformed rejection (Hoermann 1993, BTRS).
    pub fn binomial(&mut self, trials: f64, p: f64) -> f64 {
        if p > 0.5 {
            return trials - self.binomial(trials, 1.0 - p);
        }
        if p <= 0.0 || trials <= 0.0 {
            return 0.0;
        }
        if trials * p < 10.0 {
            return self.binomial_by_waiting(trials, p);
        }
        let q = 1.0 - p;
        let spread = (trials * p * q).sqrt();
        let b = 1.15 + 2.53 * spread;
        let a = -0.0873 + 0.0248 * b + 0.01 * p;
        let centre = trials * p + 0.5;
        let bound = 0.92 - 4.2 / b;
        let alpha = (2.83 + 5.1 / b) * spread;
        let odds = libm::log(p / q);
        let mode = ((trials + 1.0) * p).floor();
        let h = special::ln_gamma(mode + 1.0) + special::ln_gamma(trials - mode + 1.0);
        loop {
            let u = self.uniform() - 0.5;
            let v = self.uniform();
            let us = 0.5 - u.abs();
            let k = ((2.0 * a / us + b) * u + centre).floor();
            if k < 0.0 || k > trials {
                continue;
            }
            if us >= 0.07 && v <= bound {
                return k;
            }
            let left = libm::log(v * alpha / (a / (us * us) + b));
            let right =
                h - special::ln_gamma(k + 1.0) - special::ln_gamma(trials - k + 1.0) + (k - mode) * odds;
            if left <= right {
                return k;
            }
        }
    }

    /// Successes counted by the waiting times between them (Devroye 1986, section X.4.3).
    fn binomial_by_waiting(&mut self, trials: f64, p: f64) -> f64 {
        let scale = -libm::log1p(-p);
        let (mut count, mut passed) = (0.0, 0.0);
        loop {
            passed += (self.exponential() / scale).floor() + 1.0;
            if passed > trials {
                return count;
            }
            count += 1.0;
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Moments of 40,000 draws within 5 standard errors (false-alarm rate 6e-7 each).
    fn moments(name: &str, mean: f64, variance: f64, mut draw: impl FnMut() -> f64) {
        let n = 40_000;
        let draws: Vec<f64> = (0..n).map(|_| draw()).collect();
        let found = draws.iter().sum::<f64>() / n as f64;
        let squares: Vec<f64> = draws.iter().map(|x| (x - mean) * (x - mean)).collect();
        let spread = squares.iter().sum::<f64>() / n as f64;
        let fourth = squares.iter().map(|s| (s - variance) * (s - variance)).sum::<f64>() / n as f64;
        let (error, spread_error) = ((variance / n as f64).sqrt(), (fourth / n as f64).sqrt());
        assert!((found - mean).abs() <= 5.0 * error, "{name}: mean {found} for {mean}");
        assert!((spread - variance).abs() <= 5.0 * spread_error, "{name}: variance {spread} for {variance}");
    }

    #[test]
    fn means_and_variances_are_those_of_the_laws() {
        let mut stream = Stream::new(5, 0);
        for shape in [0.05, 0.7, 1.0, 3.5, 400.0] {
            moments("gamma", shape, shape, || stream.gamma(shape));
        }
        for (a, b) in [(0.1, 0.2), (2.0, 3.0), (50.0, 0.5)] {
            let total: f64 = a + b;
            moments("beta", a / total, a * b / (total * total * (total + 1.0)), || stream.beta(a, b));
        }
        for mean in [0.3, 9.0, 10.5, 200.0, 1e6] {
            moments("poisson", mean, mean, || stream.poisson(mean));
        }
        for (trials, p) in [(7.0, 0.3), (40.0, 0.9), (100.0, 0.5), (1e6, 0.01), (1e9, 0.4)] {
            moments("binomial", trials * p, trials * p * (1.0 - p), || stream.binomial(trials, p));
        }
    }

    #[test]
    fn truncated_normals_have_the_mean_of_their_interval() {
        let mut stream = Stream::new(6, 0);
        for (low, high) in [
            (-1.0, 2.0),
            (0.0, 0.5),
            (3.0, f64::INFINITY),
            (8.0, 8.1),
            (f64::NEG_INFINITY, -5.0),
            (-0.1, 4.0),
        ] {
            let density = |z: f64| libm::exp(-0.5 * z * z - special::HALF_LN_2PI);
            let mass = if low > 0.0 {
                special::normal_cdf(-low) - special::normal_cdf(-high)
            } else {
                special::normal_cdf(high) - special::normal_cdf(low)
            };
            let edge = |z: f64| if z.is_finite() { z * density(z) } else { 0.0 };
            let ends = |z: f64| if z.is_finite() { density(z) } else { 0.0 };
            let mean = (ends(low) - ends(high)) / mass;
            let variance = 1.0 + (edge(low) - edge(high)) / mass - mean * mean;
            moments("truncated normal", mean, variance, || stream.normal_between(low, high));
        }
    }
}
