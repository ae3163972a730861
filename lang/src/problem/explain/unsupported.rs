//! The pages of what this version cannot do yet (U...).

use crate::problem::{Code, Page};

/// The pages of this family.
pub(in crate::problem) const PAGES: &[Page] = &[
    Page {
        code: Code("U001"),
        title: "parts",
        text: "A `part` is a reusable piece of model. Until this version can read parts, write the \
               piece out.",
        wrong: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
term season_dev = varying(per season, typical: 10)
response honey follows normal(mean: grand + season_dev, sd: noise)
",
        right: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
unknown season_sd : positive follows half_normal(sd: 10)
unknown season_effect : real per season follows normal(mean: 0, sd: season_sd)
term season_dev = season_effect
response honey follows normal(mean: grand + season_dev, sd: noise)
",
    },
    Page {
        code: Code("U002"),
        title: "using another file",
        text: "`use` will take the parts, groups and givens of another model file.",
        wrong: r#"use "groups.stook"
table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
"#,
        right: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("U003"),
        title: "unknown shares and matrices",
        text: "`shares over`, `covariance over` and `correlation over` are unknowns that are vectors or \
               matrices. This version estimates single numbers, each for itself.",
        wrong: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
unknown p : shares over season follows dirichlet(weights: 1)
response honey follows normal(mean: grand, sd: noise)
",
        right: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
unknown p : fraction per season follows beta(a: 1, b: 1)
response honey follows normal(mean: grand * p, sd: noise)
",
    },
    Page {
        code: Code("U004"),
        title: "unknown labels",
        text: "`one of` is a latent class. With two classes a `yesno` unknown does the same.",
        wrong: "group class {weak, strong}
table harvest { honey : real }
unknown kind : one of class per harvest follows categorical(shares: 1)
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
        right: "table harvest { honey : real }
unknown strong : yesno per harvest follows bernoulli(p: 0.5)
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: if strong then grand + 10 else grand, sd: noise)
",
    },
    Page {
        code: Code("U005"),
        title: "labels that are drawn together",
        text: "`over` says that the labels of a group are drawn together, from one distribution of many \
               numbers. This version draws each label for itself.",
        wrong: r#"group piece {intercept, slope}
table harvest { honey : real }
unknown line : real over piece follows normal(mean: 0, sd: 5)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: line["intercept"], sd: noise)
"#,
        right: r#"group piece {intercept, slope}
table harvest { honey : real }
unknown line : real per piece follows normal(mean: 0, sd: 5)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: line["intercept"], sd: noise)
"#,
    },
    Page {
        code: Code("U006"),
        title: "recursions along a group",
        text: "`x[previous season]`, `x[next season]` and `starting` are for quantities that follow \
               their own neighbour along an ordered group.",
        wrong: "group season ordered
table harvest { season, honey : real }
unknown level : real per season follows normal(mean: level[previous season], sd: 2) starting normal(mean: 0, sd: 10)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: level, sd: noise)
",
        right: "group season ordered
table harvest { season, honey : real }
unknown level : real per season follows normal(mean: 0, sd: 10)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: level, sd: noise)
",
    },
    Page {
        code: Code("U007"),
        title: "holding a label",
        text: "`holding` keeps one label at a known value. A prior with mean 0 does much the same: it \
               holds the middle of the labels.",
        wrong: r#"group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread) holding "2019" at 0
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand + effect, sd: noise)
"#,
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
        code: Code("U008"),
        title: "readings that a limit cut",
        text: "`censored` and `known between` are for readings of which only a bound is known. With \
               gaps they are estimated without that bound, which can shift the result: say so where you \
               report it.",
        wrong: "table harvest { honey : real, low : yesno }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise) censored below 2 when low
",
        right: "table harvest { honey : real with gaps }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("U009"),
        title: "mixtures",
        text: "`mixture`, `zero_inflated` and `hurdle` build a distribution from others. One with wider \
               tails often serves.",
        wrong: "table boards { mites : count }
unknown rate : positive follows half_normal(sd: 10)
response mites follows zero_inflated(p: 0.2, of: rate)
",
        right: "table boards { mites : count }
unknown rate : positive follows half_normal(sd: 10)
unknown size : positive follows half_normal(sd: 10)
response mites follows negative_binomial(mean: rate, size: size)
",
    },
    Page {
        code: Code("U010"),
        title: "tables per several groups",
        text: "A table `per` several groups has one row for each combination of their labels. A plain \
               table with a column for each group holds the same rows.",
        wrong: "group season
group apiary
table weather per season, apiary { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
        right: "group season
group apiary
table weather { season, apiary, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("U011"),
        title: "reaching into a part",
        text: "`e.name` is an unknown inside an instance of a part.",
        wrong: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand + effect.sd, sd: noise)
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
        code: Code("U012"),
        title: "distributions of vectors, matrices and classes",
        text: "This version has the distributions of single numbers.",
        wrong: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
unknown effect : real per season follows multivariate_normal(mean: 0, covariance: 1)
response honey follows normal(mean: grand + effect, sd: noise)
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
        code: Code("U013"),
        title: "comparing two groups",
        text: "A label test compares a group or a role with one label. Whether two columns hold the \
               same label is made a column of its own.",
        wrong: "group animal
table litter { dam : animal, sire : animal, weight : real }
unknown merit : real per animal follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 1)
response weight follows normal(mean: if dam == sire then 0 else merit[dam], sd: noise)
",
        right: "group animal
table litter { dam : animal, sire : animal, selfed : yesno, weight : real }
unknown merit : real per animal follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 1)
response weight follows normal(mean: if selfed then 0 else merit[dam], sd: noise)
",
    },
];
