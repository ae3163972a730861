//! The pages of calls, types, priors and responses (H...).

use crate::problem::{Code, Page};

/// The pages of this family.
pub(in crate::problem) const PAGES: &[Page] = &[
    Page {
        code: Code("H001"),
        title: "an unknown without a prior",
        text: "Every unknown has a proper prior: what was plausible before the data. The message shows \
               three that fit its type; the numbers in them are yours to set.",
        wrong: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive
response honey follows normal(mean: grand, sd: noise)
",
        right: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("H002"),
        title: "a response without a distribution",
        text: "A response says behind `follows` how the column arises.",
        wrong: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey
",
        right: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("H003"),
        title: "too few or too many arguments",
        text: "A function takes as many numbers as it says. More than two values are compared by \
               nesting `min` and `max`.",
        wrong: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: exp(grand, 2), sd: noise)
",
        right: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: exp(grand / 10), sd: noise)
",
    },
    Page {
        code: Code("H004"),
        title: "a named argument of a function",
        text: "The arguments of distributions have names; those of functions have none.",
        wrong: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: exp(x: grand), sd: noise)
",
        right: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: exp(grand), sd: noise)
",
    },
    Page {
        code: Code("H005"),
        title: "a reduction that does not say over what",
        text: "Sums, means and the like run over the labels of a group or the rows of a table, and say \
               over which.",
        wrong: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand + effect - mean(effect), sd: noise)
",
        right: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand + effect - mean(effect over season), sd: noise)
",
    },
    Page {
        code: Code("H006"),
        title: "no distribution behind `follows`",
        text: "Behind `follows` stands a distribution with named arguments. A quantity that is worked \
               out from others is a `let`.",
        wrong: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows 2 * 3
response honey follows normal(mean: grand, sd: noise)
",
        right: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
let noise = 2 * 3
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("H007"),
        title: "a truncation set twice",
        text: "A distribution has at most one lower and one upper end.",
        wrong: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5) below 8 below 9
response honey follows normal(mean: grand, sd: noise)
",
        right: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5) below 8
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("H008"),
        title: "bounds behind a type that takes none",
        text: "Only `real` takes bounds. For the other types the prior is cut, which says the same.",
        wrong: "table harvest { frames : count }
unknown mean_frames : positive below 12 follows half_normal(sd: 5)
response frames follows poisson(mean: mean_frames)
",
        right: "table harvest { frames : count }
unknown mean_frames : positive follows half_normal(sd: 5) below 12
response frames follows poisson(mean: mean_frames)
",
    },
    Page {
        code: Code("H009"),
        title: "a column that is a response twice",
        text: "A reading arises in one way. Several sources of it are added up in one mean.",
        wrong: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
response honey follows student_t(df: 4, centre: grand, scale: noise)
",
        right: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("H010"),
        title: "a given with several values",
        text: "A given is a single number that a fit can change from outside. Known values of each \
               label are a column of a table `per` the group.",
        wrong: "group season
table harvest { season, honey : real }
given typical : positive per season = 10
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: typical)
response honey follows normal(mean: grand, sd: noise)
",
        right: "group season
table harvest { season, honey : real }
given typical : positive = 10
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: typical)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("H011"),
        title: "`per` among a distribution's arguments",
        text: "`per` belongs to the type of an unknown: one value for each label, each of which follows \
               the distribution.",
        wrong: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
unknown effect : real follows normal(mean: 0, sd: 5, per season)
response honey follows normal(mean: grand + effect, sd: noise)
",
        right: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread)
response honey follows normal(mean: grand + effect, sd: noise)
",
    },
];
