//! The pages of names (N...).

use crate::problem::{Code, Page};

/// The pages of this family.
pub(in crate::problem) const PAGES: &[Page] = &[
    Page {
        code: Code("N001"),
        title: "a name that nothing has",
        text: "Every name is declared somewhere in the file, above or below its use. The message shows \
               the nearest name that would fit the place.",
        wrong: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: gramd, sd: noise)
",
        right: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("N002"),
        title: "a name declared twice",
        text: "Groups, tables, givens, unknowns, terms, lets, derived quantities and value columns \
               share one set of names. A role is a name of its table only.",
        wrong: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
let grand = 3
response honey follows normal(mean: grand, sd: noise)
",
        right: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
let start = 3
response honey follows normal(mean: grand + start, sd: noise)
",
    },
    Page {
        code: Code("N003"),
        title: "a column of the same name in two tables",
        text: "A value column is named without its table, so its name is its own. The heading in the \
               file stays as it is with `from`.",
        wrong: "group season
table harvest { season, honey : real }
table weather per season { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
        right: r#"group season
table harvest { season, honey : real }
table weather per season { flow : real from "honey" }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
unknown slope : real follows normal(mean: 0, sd: 1)
response honey follows normal(mean: grand + slope * flow, sd: noise)
"#,
    },
    Page {
        code: Code("N004"),
        title: "something without a value used as a quantity",
        text: "A group holds labels and a table holds rows; neither is a number. A function wants its \
               argument, a distribution stands behind `follows`.",
        wrong: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand + season, sd: noise)
",
        right: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand + effect, sd: noise)
",
    },
    Page {
        code: Code("N005"),
        title: "a label without quotes",
        text: "A label is text and stands between quotes, also where it looks like a number or a name.",
        wrong: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: if season == 2019 then 0 else grand, sd: noise)
",
        right: r#"group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: if season == "2019" then 0 else grand, sd: noise)
"#,
    },
    Page {
        code: Code("N006"),
        title: "a name of the wrong kind",
        text: "The place wants one kind of thing and the name is another: `per` wants a group or a \
               table, a response wants a value column, a call wants a function.",
        wrong: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
unknown extra : real per grand follows normal(mean: 0, sd: 1)
response honey follows normal(mean: grand, sd: noise)
",
        right: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
unknown spread : positive follows half_normal(sd: 5)
unknown extra : real per season follows normal(mean: 0, sd: spread)
response honey follows normal(mean: grand + extra, sd: noise)
",
    },
    Page {
        code: Code("N007"),
        title: "a text used as a quantity",
        text: "A quoted text is a label. It stands in a comparison with a group or a role, or between \
               brackets behind a quantity.",
        wrong: r#"group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand + "2019", sd: noise)
"#,
        right: r#"group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand + effect["2019"], sd: noise)
"#,
    },
    Page {
        code: Code("N008"),
        title: "a default that uses a later given",
        text: "The default of a given is made of numbers and of givens above it, so that it can be \
               worked out from the top.",
        wrong: "table harvest { honey : real }
given twice : positive = 2 * typical
given typical : positive = 10
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: twice)
response honey follows normal(mean: grand, sd: noise)
",
        right: "table harvest { honey : real }
given typical : positive = 10
given twice : positive = 2 * typical
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: twice)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("N009"),
        title: "a derived quantity used by the fit",
        text: "A derived quantity is worked out from each draw after it was made; nothing that is \
               fitted can depend on it. A `let` can be used anywhere, in derived quantities too.",
        wrong: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
derive double = 2 * grand
response honey follows normal(mean: double, sd: noise)
",
        right: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
let double = 2 * grand
response honey follows normal(mean: double, sd: noise)
",
    },
    Page {
        code: Code("N010"),
        title: "names that go round in a circle",
        text: "A let, a prior or a response may use what is declared anywhere, but not, by any way \
               round, itself. The labels show each step of the way.",
        wrong: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
let a = grand + b
let b = 2 * a
response honey follows normal(mean: b, sd: noise)
",
        right: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
let a = grand + 1
let b = 2 * a
response honey follows normal(mean: b, sd: noise)
",
    },
    Page {
        code: Code("N011"),
        title: "a second ladder",
        text: "A model has one ladder. Branches are rungs that start from the same earlier rung.",
        wrong: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread)
unknown noise : positive follows half_normal(sd: 5)
term season_dev = effect
response honey follows normal(mean: grand + season_dev, sd: noise)
ladder { rung plain }
ladder { rung seasons adds season_dev }
",
        right: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread)
unknown noise : positive follows half_normal(sd: 5)
term season_dev = effect
response honey follows normal(mean: grand + season_dev, sd: noise)
ladder { rung plain rung seasons adds season_dev }
",
    },
    Page {
        code: Code("N012"),
        title: "a rung that adds something that is no term",
        text: "A ladder can leave out a `term` and nothing else, because a term is an additive piece \
               that is zero where it is left out.",
        wrong: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread)
unknown noise : positive follows half_normal(sd: 5)
let season_dev = effect
response honey follows normal(mean: grand + season_dev, sd: noise)
ladder { rung plain rung seasons adds season_dev }
",
        right: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread)
unknown noise : positive follows half_normal(sd: 5)
term season_dev = effect
response honey follows normal(mean: grand + season_dev, sd: noise)
ladder { rung plain rung seasons adds season_dev }
",
    },
    Page {
        code: Code("N013"),
        title: "a rung that starts from a later one",
        text: "The ladder is climbed from the top of the list downwards, so a rung starts from one that \
               stands above it.",
        wrong: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread)
unknown noise : positive follows half_normal(sd: 5)
term season_dev = effect
response honey follows normal(mean: grand + season_dev, sd: noise)
ladder { rung seasons from plain adds season_dev rung plain }
",
        right: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread)
unknown noise : positive follows half_normal(sd: 5)
term season_dev = effect
response honey follows normal(mean: grand + season_dev, sd: noise)
ladder { rung plain rung seasons from plain adds season_dev }
",
    },
];
