//! Autocovariances at all lags at once, by a fast Fourier transform.

/// A complex number.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
struct Complex {
    re: f64,
    im: f64,
}

/// For each lag from 0 to `draws - 1` the sum over the parts of the products of values that far apart.
///
/// Of each part the first `draws` values count. By the theorem of Wiener and Khinchin the sums are the
/// transform of the power spectra; two parts share a transform, one as its real and one as its imaginary
/// half, since only the sum of their spectra is needed: the cross terms are odd in the frequency and leave
/// the real half of the result alone.
pub(super) fn summed_autocovariances<'a>(parts: impl Iterator<Item = &'a [f64]>, draws: usize) -> Vec<f64> {
    let size = (2 * draws).next_power_of_two();
    let transform = Transform::new(size);
    let mut power = vec![Complex::default(); size];
    let mut pair = vec![Complex::default(); size];
    let mut parts = parts.peekable();
    while parts.peek().is_some() {
        pair.fill(Complex::default());
        for (z, x) in pair.iter_mut().zip(parts.next().into_iter().flat_map(|part| &part[..draws])) {
            z.re = *x;
        }
        for (z, x) in pair.iter_mut().zip(parts.next().into_iter().flat_map(|part| &part[..draws])) {
            z.im = *x;
        }
        transform.apply(&mut pair);
        for (sum, z) in power.iter_mut().zip(&pair) {
            sum.re += z.re * z.re + z.im * z.im;
        }
    }
    transform.apply(&mut power);
    power[..draws].iter().map(|z| z.re / size as f64).collect()
}

/// The transform of one size, a power of two (Cooley and Tukey 1965).
struct Transform {
    /// exp(-2 pi i k / size) for k below half the size.
    roots: Vec<Complex>,
}

impl Transform {
    fn new(size: usize) -> Transform {
        let roots = (0..size / 2).map(|k| {
            let (sin, cos) = libm::sincos(-2.0 * std::f64::consts::PI * k as f64 / size as f64);
            Complex { re: cos, im: sin }
        });
        Transform { roots: roots.collect() }
    }

    fn apply(&self, values: &mut [Complex]) {
        reverse_bits(values);
        let mut span = 1;
        while span < values.len() {
            let stride = self.roots.len() / span;
            for block in values.chunks_exact_mut(2 * span) {
                let (low, high) = block.split_at_mut(span);
                for ((a, b), root) in low.iter_mut().zip(high).zip(self.roots.iter().step_by(stride)) {
                    let turned =
                        Complex { re: b.re * root.re - b.im * root.im, im: b.re * root.im + b.im * root.re };
                    *b = Complex { re: a.re - turned.re, im: a.im - turned.im };
                    *a = Complex { re: a.re + turned.re, im: a.im + turned.im };
                }
            }
            span *= 2;
        }
    }
}

/// Moves the value at each place to the place whose binary digits are reversed.
fn reverse_bits(values: &mut [Complex]) {
    let unused = usize::BITS - values.len().trailing_zeros();
    for place in 0..values.len() {
        let mirror = place.reverse_bits().checked_shr(unused).unwrap_or(0);
        if place < mirror {
            values.swap(place, mirror);
        }
    }
}
