//! The screen after a check without errors.

use stook_lang::model::{Model, NamedRole};

use super::Screen;
use super::text::{counted, wrap};

/// What the model holds.
pub(crate) fn check(screen: &Screen, file: &str, model: &Model, warnings: usize) -> String {
    let named = |role: NamedRole| model.named.iter().filter(|(_, named)| named.role == role).count();
    let parts = [
        (model.groups.len(), "group", "groups"),
        (model.tables.len(), "table", "tables"),
        (model.givens.len(), "given", "givens"),
        (model.unknowns.len(), "unknown", "unknowns"),
        (named(NamedRole::Term), "term", "terms"),
        (named(NamedRole::Derive), "derived quantity", "derived quantities"),
        (model.responses.len(), "response", "responses"),
        (model.ladder.len(), "rung", "rungs"),
    ];
    let parts: Vec<String> = parts
        .into_iter()
        .filter(|part| part.0 > 0)
        .map(|(count, one, several)| counted(count, one, several))
        .collect();
    let verdict = match warnings {
        0 => "no mistakes found".to_string(),
        _ => format!("no mistakes found, {}", counted(warnings, "warning", "warnings")),
    };
    format!(
        "{}\n{}",
        screen.style.strong(&format!("{file}: {verdict}")),
        wrap(&parts.join(", "), screen.width, 2)
    )
}
