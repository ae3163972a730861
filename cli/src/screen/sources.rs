//! The variance by source, and which source is largest.

use stook_sampler::answer::{Scale, Source, Sources};
use stook_sampler::summary::format::column;

use super::grid::{Cell, Grid, Side, Tone};
use super::text::{bar, columns, wrap};
use super::{ERROR_OF_ENDS, Screen, in_unit};

/// The variance of one response by source.
pub(super) fn sources(screen: &Screen, found: &Sources) -> String {
    let scale = match found.scale {
        Scale::Response => in_unit(found.unit.as_deref()),
        Scale::Log => ", on the scale of its logarithm".into(),
        Scale::LogOdds => ", on the scale of the log-odds".into(),
        Scale::Probit => ", on the probit scale".into(),
    };
    let mut out = screen.heading(&format!("Where the variation of {} lies{scale}", found.response), "");
    out.push_str(&table(screen, found));
    out.push_str(&wrap(&largest(found), screen.width, 2));
    out.push_str(&screen.style.faint(&wrap(
        "\"sd\" is the spread that labels like these are drawn from; \"here\" is the spread among the ones in these data.",
        screen.width,
        2,
    )));
    out
}

fn table(screen: &Screen, found: &Sources) -> String {
    let right = Side::Right;
    let mut grid = Grid::new(vec![Side::Left, right, right, right, right, right, right, Side::Left]);
    let faint = |text: &str| Cell::new(text).tone(Tone::Faint);
    let interval = faint("95 % of it").over(2).side(right);
    grid.row(vec![
        faint("source"),
        faint("sd"),
        interval,
        faint("here"),
        faint("share"),
        faint("95 % of it"),
    ]);
    let numbers =
        |number: fn(&Source) -> (f64, f64)| column(&found.sources.iter().map(number).collect::<Vec<_>>());
    let sds = numbers(|source| (source.sd.mean, source.sd.mcse));
    let lows = numbers(|source| (source.sd.low, ERROR_OF_ENDS * source.sd.mcse));
    let highs = numbers(|source| (source.sd.high, ERROR_OF_ENDS * source.sd.mcse));
    let here = numbers(|source| (source.finite_sd, source.sd.mcse));
    let titles: Vec<String> = found.sources.iter().map(titled).collect();
    let taken = titles.iter().map(|title| columns(title)).max().unwrap_or(0)
        + [&sds, &lows, &highs, &here]
            .map(|cells| cells.first().map_or(0, |cell| cell.len()))
            .iter()
            .sum::<usize>();
    // The rest are 2 columns of indent, 7 gaps of 2, and at most 6 and 12 for the share and its interval.
    let bar_width = screen.width.saturating_sub(taken + 34).min(40);
    for (at, source) in found.sources.iter().enumerate() {
        grid.row(vec![
            Cell::new(&titles[at]),
            Cell::new(&sds[at]).tone(Tone::Strong),
            Cell::new(&lows[at]),
            Cell::new(&highs[at]),
            Cell::new(&here[at]),
            Cell::new(percent(source.share.mean)).tone(Tone::Strong),
            Cell::new(format!("{}..{} %", hundredths(source.share.low), hundredths(source.share.high))),
            Cell::new(bar(source.share.mean, bar_width)).tone(Tone::Drawn),
        ]);
    }
    grid.render(screen.width, screen.style)
}

/// The source's name, with the group that it varies over where the name does not say it.
fn titled(source: &Source) -> String {
    match &source.over {
        Some(over) if !source.name.contains(over.as_str()) => format!("{} (per {over})", source.name),
        _ => source.name.clone(),
    }
}

/// The words for a source in a sentence: its group, where no other source varies over that one; else its name.
pub(super) fn spoken<'a>(source: &'a Source, among: &'a [Source]) -> &'a str {
    match &source.over {
        Some(over) if among.iter().filter(|other| other.over.as_ref() == Some(over)).count() == 1 => over,
        _ => &source.name,
    }
}

/// A share as per cent.
pub(super) fn percent(share: f64) -> String {
    format!("{} %", hundredths(share))
}

/// A share in whole hundredths, and tenths of them where it is small.
fn hundredths(share: f64) -> String {
    let hundred = 100.0 * share;
    match hundred {
        0.0 => "0".into(),
        _ if hundred < 0.1 => "<0.1".into(),
        _ if hundred < 1.0 => format!("{hundred:.1}"),
        _ => format!("{hundred:.0}"),
    }
}

/// Which source is largest and how sure that is.
pub(super) fn largest(found: &Sources) -> String {
    let mut order: Vec<&Source> = found.sources.iter().collect();
    order.sort_by(|a, b| b.p_largest.total_cmp(&a.p_largest));
    let name = |source: &Source| match spoken(source, &found.sources) {
        "residual" => "the residual".to_string(),
        other => other.to_string(),
    };
    match order[..] {
        [] => String::new(),
        [only] => format!("All of the variation is {}: the model has no other source.", only.name),
        [first, ..] if first.p_largest > 0.995 => {
            format!(
                "The largest source is {}, beyond reasonable doubt (probability above 0.99).",
                name(first)
            )
        }
        [first, ..] if first.p_largest >= 0.9 => {
            format!("The largest source is {} (probability {}).", name(first), probability(first.p_largest))
        }
        [first, second, ..] if first.p_largest >= 0.6 => format!(
            "The largest source is probably {} (probability {}), else {} ({}).",
            name(first),
            probability(first.p_largest),
            name(second),
            probability(second.p_largest)
        ),
        [..] => {
            let likely: Vec<String> = order
                .iter()
                .take_while(|source| source.p_largest >= 0.05)
                .map(|source| format!("{} ({})", name(source), probability(source.p_largest)))
                .collect();
            format!("Which source is largest is not settled; the probabilities: {}.", likely.join(", "))
        }
    }
}

/// A probability with two digits, never rounded to certainty.
fn probability(p: f64) -> String {
    match p {
        p if p > 0.995 => "above 0.99".into(),
        p if p < 0.005 => "below 0.01".into(),
        p => format!("{p:.2}"),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use stook_sampler::answer::Interval;

    fn with(probabilities: &[(&str, f64)]) -> Sources {
        let none = Interval { mean: 1.0, mcse: 0.1, low: 0.5, high: 2.0 };
        let source = |(name, p): &(&str, f64)| Source {
            name: format!("{name}_dev"),
            over: Some(name.to_string()),
            sd: none,
            share: none,
            finite_sd: 1.0,
            p_largest: *p,
        };
        Sources {
            response: "honey".into(),
            unit: None,
            scale: Scale::Response,
            sources: probabilities.iter().map(source).collect(),
        }
    }

    #[test]
    fn the_sentence_is_as_sure_as_the_probability() {
        let sentences = [
            with(&[("season", 0.999), ("hive", 0.001)]),
            with(&[("season", 0.93), ("hive", 0.07)]),
            with(&[("season", 0.72), ("hive", 0.28)]),
            with(&[("season", 0.45), ("apiary", 0.4), ("hive", 0.12), ("queen", 0.03)]),
            with(&[("season", 1.0)]),
        ]
        .map(|found| largest(&found));
        insta::assert_snapshot!(sentences.join("\n"), @r"
        The largest source is season, beyond reasonable doubt (probability above 0.99).
        The largest source is season (probability 0.93).
        The largest source is probably season (probability 0.72), else hive (0.28).
        Which source is largest is not settled; the probabilities: season (0.45), apiary (0.40), hive (0.12).
        All of the variation is season_dev: the model has no other source.
        ");
    }

    #[test]
    fn small_shares_do_not_round_to_nothing() {
        assert_eq!([0.0, 0.0004, 0.004, 0.58].map(percent), ["0 %", "<0.1 %", "0.4 %", "58 %"]);
    }
}
