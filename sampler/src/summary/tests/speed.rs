use std::time::Instant;

use super::{autoregressions, generator, judged};

#[test]
#[ignore = "a measurement, for release builds"]
fn measure_a_scalar() {
    for (draws, phi) in [(2500, 0.0), (2500, 0.5), (2500, 0.9), (2500, 0.97), (2500, 0.999), (25_000, 0.999)]
    {
        let chains = autoregressions(&mut generator(41), 4, draws, phi);
        let repeats = 50;
        let start = Instant::now();
        let mut sum = 0.0;
        for _ in 0..repeats {
            sum += judged(std::hint::black_box(&chains)).bulk_ess.unwrap();
        }
        let each = start.elapsed().as_secs_f64() / f64::from(repeats);
        println!("4 x {draws}, phi {phi}: {:.0} us ({:.0})", each * 1e6, sum / f64::from(repeats));
    }
}
