use super::{autoregressions, generator, judged, normal};
use crate::summary::{DrawsError, diagnose};

#[test]
fn a_constant_has_no_rhat_and_no_error() {
    let result = judged(&vec![vec![0.1; 50]; 4]);
    assert!(result.is_constant());
    assert_eq!((result.mean, result.sd, result.q97_5), (0.1, Some(0.0), 0.1));
    assert_eq!(
        (result.mean_mcse, result.sd_mcse, result.quantile_mcse),
        (Some(0.0), Some(0.0), Some([0.0; 5]))
    );
    assert_eq!((result.split_rhat, result.bulk_ess, result.tail_ess), (None, None, None));
}

#[test]
fn chains_at_different_constants_have_infinite_rhat() {
    let result = judged(&[vec![0.1; 50], vec![0.3; 50]]);
    assert!(!result.is_constant());
    assert_eq!(result.split_rhat, Some(f64::INFINITY));
    assert!(result.bulk_ess.unwrap() < 4.0 && result.tail_ess.unwrap() < 4.0);
    assert!(result.mean_mcse.unwrap() > 0.05);
}

#[test]
fn fewer_than_four_draws_have_a_mean_but_no_rhat() {
    let result = judged(&[vec![1.0, 2.0, 6.0], vec![1.0, 2.0, 3.0]]);
    assert_eq!(result.mean, 2.5);
    assert!((result.sd.unwrap() - 3.5_f64.sqrt()).abs() < 1e-15);
    assert_eq!((result.split_rhat, result.bulk_ess, result.mean_mcse), (None, None, None));
    let single = judged(&[vec![7.0]]);
    assert_eq!((single.mean, single.sd, single.q2_5, single.q97_5), (7.0, None, 7.0, 7.0));
}

#[test]
fn four_draws_are_enough_to_judge() {
    let result = judged(&[vec![1.0, 2.0, 6.0, 3.0]]);
    assert!(result.split_rhat.unwrap().is_finite());
    assert!(result.bulk_ess.unwrap() > 0.0);
}

#[test]
fn bad_input_is_named() {
    assert_eq!(diagnose(&[]), Err(DrawsError::NoDraws));
    assert_eq!(diagnose(&[&[], &[]]), Err(DrawsError::NoDraws));
    let unequal = DrawsError::UnequalChains { chain: 1, draws: 1, first: 2 };
    assert_eq!(diagnose(&[&[1.0, 2.0], &[1.0]]), Err(unequal));
    let infinite = DrawsError::NonFinite { chain: 1, draw: 0, value: f64::INFINITY };
    assert_eq!(diagnose(&[&[1.0, 2.0], &[f64::INFINITY, 1.0]]), Err(infinite));
    assert!(diagnose(&[&[f64::NAN]]).is_err());
}

#[test]
fn quantiles_are_of_type_seven() {
    // Places 0.025 x 8 = 0.2, 2, 4, 6, 7.8 between the nine order statistics.
    let result = judged(&[vec![9.0, 1.0, 8.0, 2.0, 7.0, 3.0, 6.0, 4.0, 5.0]]);
    let expected = [1.2, 3.0, 5.0, 7.0, 8.8];
    for (quantile, expected) in result.quantiles().into_iter().zip(expected) {
        assert!((quantile - expected).abs() < 1e-14);
    }
}

#[test]
fn a_shifted_chain_is_flagged() {
    let mut chains = autoregressions(&mut generator(1), 4, 1000, 0.0);
    assert!(judged(&chains).split_rhat.unwrap() < 1.01);
    chains[2].iter_mut().for_each(|x| *x += 0.5);
    assert!(judged(&chains).split_rhat.unwrap() > 1.02);
}

#[test]
fn a_drift_within_every_chain_is_flagged() {
    let mut chains = autoregressions(&mut generator(2), 4, 1000, 0.0);
    for chain in &mut chains {
        chain.iter_mut().enumerate().for_each(|(i, x)| *x += i as f64 / 1000.0);
    }
    assert!(judged(&chains).split_rhat.unwrap() > 1.02);
}

#[test]
fn a_wider_chain_of_the_same_mean_is_flagged() {
    let mut chains = autoregressions(&mut generator(3), 4, 1000, 0.0);
    chains[1].iter_mut().for_each(|x| *x *= 3.0);
    assert!(judged(&chains).split_rhat.unwrap() > 1.05);
}

#[test]
fn only_the_order_of_values_matters_to_rhat_and_bulk() {
    let chains = autoregressions(&mut generator(4), 4, 500, 0.5);
    let cubes: Vec<Vec<f64>> = chains.iter().map(|c| c.iter().map(|x| x * x * x).collect()).collect();
    let (plain, cubed) = (judged(&chains), judged(&cubes));
    assert_eq!((plain.bulk_ess, plain.tail_ess), (cubed.bulk_ess, cubed.tail_ess));
}

#[test]
fn chains_without_a_mean_are_judged_by_their_ranks() {
    let mut random = generator(5);
    let cauchy = |_| normal(&mut random) / normal(&mut random);
    let draws: Vec<f64> = (0..8000).map(cauchy).collect();
    let chains: Vec<Vec<f64>> = draws.chunks(2000).map(<[f64]>::to_vec).collect();
    let result = judged(&chains);
    assert!(result.split_rhat.unwrap() < 1.01 && result.bulk_ess.unwrap() > 6000.0);
}

#[test]
fn two_valued_draws_are_judged() {
    let mut random = generator(6);
    for share in [0.5, 0.9, 0.999] {
        let threshold = crate::summary::special::normal_quantile(share);
        let mut chain = || -> Vec<f64> {
            (0..2500).map(|_| f64::from(u8::from(normal(&mut random) > threshold))).collect()
        };
        let chains = [chain(), chain(), chain(), chain()];
        let result = judged(&chains);
        assert!(result.split_rhat.unwrap() < 1.01, "{result:?}");
        assert!(result.bulk_ess.unwrap() > 7000.0 && result.tail_ess.unwrap() > 7000.0, "{result:?}");
    }
    // As many ones as zeros: all distances from the median are equal and say nothing.
    let balanced: Vec<f64> = (0..100).map(|i| f64::from(i * 7 % 10 / 5)).collect();
    assert!(judged(&[balanced]).split_rhat.unwrap().is_finite());
}

#[test]
fn size_does_not_matter() {
    let chains = autoregressions(&mut generator(7), 4, 200, 0.3);
    let plain = judged(&chains);
    for scale in [2.0_f64.powi(-1000), 2.0_f64.powi(1000)] {
        let scaled: Vec<Vec<f64>> = chains.iter().map(|c| c.iter().map(|x| x * scale).collect()).collect();
        let result = judged(&scaled);
        assert_eq!(result.sd.map(|sd| sd / scale), plain.sd);
        assert_eq!(result.mean_mcse.map(|error| error / scale), plain.mean_mcse);
        assert_eq!((result.split_rhat, result.tail_ess), (plain.split_rhat, plain.tail_ess));
    }
    assert_eq!(judged(&[vec![-f64::MAX, f64::MAX]]).q50, 0.0);
    let extreme = judged(&[vec![f64::MAX, -f64::MAX, 1.0, f64::MAX, -f64::MAX, 0.0, 1.0, -1.0]]);
    assert!(extreme.mean.is_finite() && extreme.q25.is_finite() && extreme.split_rhat.unwrap().is_finite());
}

#[test]
fn zero_and_minus_zero_are_one_value() {
    assert!(judged(&[vec![0.0, -0.0, 0.0, 0.0], vec![-0.0, -0.0, 0.0, -0.0]]).is_constant());
    let signed: Vec<f64> = (0..100).map(|i| [0.0, -0.0, 1.0, 2.0, -0.0][i * i % 5]).collect();
    let plain: Vec<f64> = signed.iter().map(|x| x + 0.0).collect();
    assert_eq!(judged(&[signed]), judged(&[plain]));
}
