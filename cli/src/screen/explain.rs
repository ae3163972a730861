//! The pages of `explain`, and the list of all codes.

use stook_lang::problem::Page;

use super::Screen;
use super::text::{hang, wrap};

/// The families of codes by their letter.
const FAMILIES: [(char, &str); 12] = [
    ('Y', "The grammar"),
    ('N', "Names"),
    ('G', "Groups, tables and columns"),
    ('H', "Which value of which label"),
    ('D', "Distributions and their arguments"),
    ('S', "Types and priors"),
    ('L', "The ladder"),
    ('I', "What the data cannot tell apart"),
    ('U', "What is not supported yet"),
    ('T', "The files of tables"),
    ('B', "Data against the model"),
    ('P', "Demands on the sampler"),
];

/// One page.
pub(crate) fn page(screen: &Screen, page: &Page) -> String {
    let style = screen.style;
    let mut out = format!("{}\n\n", style.strong(&format!("{}: {}", page.code.0, page.title)));
    for paragraph in page.text.split("\n\n") {
        out.push_str(&wrap(paragraph, screen.width, 0));
        out.push('\n');
    }
    for (title, example) in [("Wrong", page.wrong), ("Right", page.right)] {
        out.push_str(&format!("{}\n\n", style.strong(title)));
        for line in example.lines() {
            out.push_str(format!("    {line}").trim_end());
            out.push('\n');
        }
        out.push('\n');
    }
    out.pop();
    out
}

/// All codes by family.
pub(crate) fn list(screen: &Screen, pages: &[&Page]) -> String {
    let mut out = String::new();
    let mut family = None;
    for page in pages {
        let letter = page.code.0.chars().next();
        if letter != family {
            if family.is_some() {
                out.push('\n');
            }
            family = letter;
            let title =
                FAMILIES.iter().find(|(own, _)| Some(*own) == letter).map_or("Other", |(_, title)| *title);
            out.push_str(&format!("{}\n", screen.style.strong(title)));
        }
        out.push_str(&hang(&format!("{}  {}", page.code.0, page.title), screen.width, 2, 8));
    }
    out.push_str(&format!("\n{}\n", screen.style.faint("`stook explain CODE` prints the page of a code.")));
    out
}
