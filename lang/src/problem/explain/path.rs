//! The pages of ways to a group, and labels (G1..).

use crate::problem::{Code, Page};

/// The pages of this family.
pub(in crate::problem) const PAGES: &[Page] = &[
    Page {
        code: Code("G101"),
        title: "no way from a place to a group",
        text: "A quantity `per` a group is used where one label of that group is meant: in a row that \
               has a column of it, or where a label leads to it. In a prior `per season` no hive is \
               meant.",
        wrong: "group season
group apiary
group hive within apiary
table harvest { season, apiary, hive, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown hive_effect : real per hive follows normal(mean: 0, sd: spread)
unknown season_effect : real per season follows normal(mean: hive_effect, sd: 5)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand + season_effect + hive_effect, sd: noise)
",
        right: "group season
group apiary
group hive within apiary
table harvest { season, apiary, hive, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown hive_effect : real per hive follows normal(mean: 0, sd: spread)
unknown season_effect : real per season follows normal(mean: mean(hive_effect over hive), sd: 5)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand + season_effect + hive_effect, sd: noise)
",
    },
    Page {
        code: Code("G102"),
        title: "two ways from a place to a group",
        text: "The label that is meant must be reached by one way. Where two columns lead to the same \
               group by different ways, the two may disagree.",
        wrong: "group keeper
group hive
group apiary
table harvest { hive, apiary, honey : real }
table hives per hive { keeper }
table apiaries per apiary { keeper }
unknown skill : real per keeper follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: skill, sd: noise)
",
        right: "group keeper
group hive
group apiary
table harvest { hive, apiary, keeper, honey : real }
table hives per hive { owner : keeper }
table apiaries per apiary { leader : keeper }
unknown skill : real per keeper follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: skill, sd: noise)
",
    },
    Page {
        code: Code("G103"),
        title: "a role is needed",
        text: "A table can have several columns over one group, each a role. Which of them is meant is \
               said between brackets.",
        wrong: "group animal
table litter { dam : animal, sire : animal, weight : real }
unknown merit : real per animal follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 1)
response weight follows normal(mean: merit, sd: noise)
",
        right: "group animal
table litter { dam : animal, sire : animal, weight : real }
unknown merit : real per animal follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 1)
response weight follows normal(mean: merit[dam] + merit[sire], sd: noise)
",
    },
    Page {
        code: Code("G104"),
        title: "a role that several tables have",
        text: "A let varies over the rows of the one table that has the role. In a response its own \
               table is meant.",
        wrong: "group animal
table litter { dam : animal, weight : real }
table show { dam : animal, points : real }
unknown merit : real per animal follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 1)
let half = merit[dam] / 2
response weight follows normal(mean: half, sd: noise)
response points follows normal(mean: half, sd: noise)
",
        right: "group animal
table litter { dam : animal, weight : real }
table show { dam : animal, points : real }
unknown merit : real per animal follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 1)
response weight follows normal(mean: merit[dam] / 2, sd: noise)
response points follows normal(mean: merit[dam] / 2, sd: noise)
",
    },
    Page {
        code: Code("G105"),
        title: "a role of a table that the place does not reach",
        text: "A role names a label in a row of its table, so it is used where such a row is meant.",
        wrong: "group animal
table litter { dam : animal, sire : animal, weight : real }
table show { animal, points : real }
unknown merit : real per animal follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 1)
response points follows normal(mean: merit[dam], sd: noise)
",
        right: "group animal
table litter { dam : animal, sire : animal, weight : real }
table show { animal, points : real }
unknown merit : real per animal follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 1)
response points follows normal(mean: merit, sd: noise)
",
    },
    Page {
        code: Code("G106"),
        title: "a role that does not fit the quantity",
        text: "A role names a label of its own group; the quantity must vary over that group, or over \
               one that it leads to.",
        wrong: "group season
group animal
table litter { season, dam : animal, sire : animal, weight : real }
unknown effect : real per season follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 1)
response weight follows normal(mean: effect[dam], sd: noise)
",
        right: "group season
group animal
table litter { season, dam : animal, sire : animal, weight : real }
unknown effect : real per season follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 1)
response weight follows normal(mean: effect, sd: noise)
",
    },
    Page {
        code: Code("G107"),
        title: "a label that the group cannot have",
        text: "A group with a list or a range has those labels and no others, so a misspelt one is \
               found before the data are read.",
        wrong: r#"group feed {control, fed}
table harvest { feed, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: if feed == "contrl" then 0 else grand, sd: noise)
"#,
        right: r#"group feed {control, fed}
table harvest { feed, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: if feed == "control" then 0 else grand, sd: noise)
"#,
    },
    Page {
        code: Code("G108"),
        title: "a nested label without its parent's",
        text: "The labels of a nested group are read inside the parent's, so one of them is named from \
               the outside in, with a slash between.",
        wrong: r#"group season
group apiary
group hive within apiary
table harvest { season, apiary, hive, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per hive follows normal(mean: 0, sd: spread)
response honey follows normal(mean: grand + effect - effect["3"], sd: noise)
"#,
        right: r#"group season
group apiary
group hive within apiary
table harvest { season, apiary, hive, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per hive follows normal(mean: 0, sd: spread)
response honey follows normal(mean: grand + effect - effect["Heath/3"], sd: noise)
"#,
    },
    Page {
        code: Code("G109"),
        title: "too few or too many selectors",
        text: "Between brackets stands one selector for each group that the quantity varies over, in \
               the order of its declaration, or one role.",
        wrong: r#"group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread)
response honey follows normal(mean: grand["2019"] + effect, sd: noise)
"#,
        right: r#"group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season follows normal(mean: 0, sd: spread)
response honey follows normal(mean: grand + effect["2019"], sd: noise)
"#,
    },
    Page {
        code: Code("G110"),
        title: "a label for a row",
        text: "The rows of a plain table have no labels. A table `per` a group has one row for each \
               label, and that label names it.",
        wrong: r#"table harvest { honey : real, rain : real }
unknown slope : real follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: slope * (rain - rain["2019"]), sd: noise)
"#,
        right: r#"group season
table harvest { season, honey : real }
table weather per season { rain : real }
unknown slope : real follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: slope * (rain - rain["2019"]), sd: noise)
"#,
    },
    Page {
        code: Code("G111"),
        title: "a label compared with no group",
        text: "A quoted text is compared with a group or with a role: is the label of this place that \
               one? Numbers are compared without quotes.",
        wrong: r#"group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: if grand == "2019" then 0 else grand, sd: noise)
"#,
        right: r#"group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: if season == "2019" then 0 else grand, sd: noise)
"#,
    },
];
