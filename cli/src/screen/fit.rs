//! The screen after a fit.

use stook_sampler::answer::Answer;
use stook_sampler::run::Options;

use super::text::{counted, thousands, wrap};
use super::{Screen, groups, sources, unknowns, verdict};

/// What is said above the results.
#[derive(Clone, Debug)]
pub(crate) struct Heading {
    /// The model file.
    pub(crate) model: String,
    /// The rung, if one was asked for.
    pub(crate) rung: Option<String>,
}

/// The screen after a fit.
pub(crate) fn fit(screen: &Screen, heading: &Heading, answer: &Answer, options: &Options) -> String {
    let mut out = verdict::verdict(screen, answer, options.warmup);
    if !out.is_empty() {
        out.push('\n');
    }
    out.push_str(&title(screen, heading, answer));
    out.push_str(&unknowns::unknowns(screen, answer));
    for found in &answer.sources {
        out.push_str(&sources::sources(screen, found));
    }
    for found in &answer.groups {
        out.push_str(&groups::group(screen, found));
    }
    out.push_str(&criteria(screen, answer));
    out.push_str(&caution(screen, answer));
    out
}

fn title(screen: &Screen, heading: &Heading, answer: &Answer) -> String {
    let rung = heading.rung.as_ref().map(|rung| format!(", rung {rung}")).unwrap_or_default();
    let size = format!(
        "{}, {} of {}",
        counted(answer.criteria.waic.pointwise.len(), "reading", "readings"),
        counted(answer.draws.chains, "chain", "chains"),
        counted(answer.draws.draws, "draw", "draws")
    );
    format!("{}{}\n", screen.style.strong(&format!("{}{rung}: ", heading.model)), screen.style.faint(&size))
}

fn criteria(screen: &Screen, answer: &Answer) -> String {
    let (dic, waic) = (&answer.criteria.dic, &answer.criteria.waic);
    let se = waic.se.map(|se| format!(", standard error {se:.1}")).unwrap_or_default();
    let text = format!(
        "DIC {} ({:.1} parameters in effect). WAIC {} ({:.1} in effect{se}).{}",
        tenths(dic.dic),
        dic.p_dic,
        tenths(waic.waic),
        waic.p_waic,
        doubt(waic.doubtful)
    );
    format!(
        "{}{}",
        screen.heading("For comparison with other models of the same readings", ""),
        wrap(&text, screen.width, 2)
    )
}

/// With thousands apart and one decimal.
pub(super) fn tenths(number: f64) -> String {
    let text = format!("{:.1}", number.abs());
    let (whole, decimal) = text.split_once('.').unwrap_or((&text, "0"));
    let whole = thousands(whole.parse().unwrap_or(f64::NAN));
    let sign = if number < 0.0 && text != "0.0" { "-" } else { "" };
    format!("{sign}{whole}.{decimal}")
}

fn doubt(readings: usize) -> String {
    match readings {
        0 => String::new(),
        1 => " WAIC is doubtful at 1 reading that the model hardly expects.".into(),
        _ => format!(" WAIC is doubtful at {readings} readings that the model hardly expects."),
    }
}

/// What was checked and what was not.
fn caution(screen: &Screen, answer: &Answer) -> String {
    let checked =
        if answer.verdict.converged() { "that the chains agree" } else { "the chains, which do not agree" };
    let text = format!(
        "Checked: {checked}. Not checked: whether the model fits the data, and how much the priors weigh. {CONDITIONAL} \
         {DECISIONS}"
    );
    format!("\n{}", screen.style.faint(&wrap(&text, screen.width, 0)))
}

/// What the criteria are about.
pub(super) const CONDITIONAL: &str = "DIC and WAIC are conditional on the group effects: they judge new readings of the labels at hand, not of new labels.";

/// Who decides.
pub(super) const DECISIONS: &str = "Where a decision about people, animals, food or money hangs on this, local rules and a qualified practitioner decide.";

#[cfg(test)]
mod tests {
    use super::super::samples::{answer, unconverged};
    use super::super::text::{Style, columns};
    use super::*;

    fn heading() -> Heading {
        Heading { model: "honey.stook".into(), rung: Some("both".into()) }
    }

    fn at(width: usize, answer: &Answer) -> String {
        let screen = Screen { width, style: Style { colour: false } };
        let text = fit(&screen, &heading(), answer, &Options::default());
        for line in text.lines() {
            assert!(columns(line) <= width, "{} columns: {line}", columns(line));
        }
        text
    }

    #[test]
    fn a_fit_at_80_columns() {
        insta::assert_snapshot!(at(80, &answer(0)));
    }

    #[test]
    fn a_fit_at_140_columns() {
        insta::assert_snapshot!(at(140, &answer(0)));
    }

    #[test]
    fn a_fit_that_has_not_converged_says_so_first() {
        let text = at(80, &unconverged());
        assert!(text.starts_with("NOT CONVERGED"));
        insta::assert_snapshot!(text);
    }

    #[test]
    fn colours_add_nothing_but_colours() {
        let plain = at(80, &unconverged());
        let screen = Screen { width: 80, style: Style { colour: true } };
        let coloured = fit(&screen, &heading(), &unconverged(), &Options::default());
        assert_ne!(plain, coloured);
        let mut stripped = String::new();
        let mut inside = false;
        for character in coloured.chars() {
            match (inside, character) {
                (false, '\u{1b}') => inside = true,
                (true, 'm') => inside = false,
                (true, _) => {}
                (false, other) => stripped.push(other),
            }
        }
        assert_eq!(plain, stripped);
    }

    #[test]
    fn tenths_keep_their_sign() {
        assert_eq!([1480.25, -12345.67, -0.01].map(tenths), ["1,480.2", "-12,345.7", "0.0"]);
    }
}
