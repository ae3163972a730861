//! The pages of groups, tables and settings (G0..).

use crate::problem::{Code, Page};

/// The pages of this family.
pub(in crate::problem) const PAGES: &[Page] = &[
    Page {
        code: Code("G001"),
        title: "groups that lie within each other",
        text: "`within` says that the labels of a group are read inside another's. Followed outwards it \
               must end at a group that lies within nothing.",
        wrong: "group hive within apiary
group apiary within hive
table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
        right: "group apiary
group hive within apiary
table harvest { apiary, hive, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("G002"),
        title: "a range that runs backwards",
        text: "A range names its first and its last label, both included, the smaller first.",
        wrong: "group season ordered 2024..2010
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
        right: "group season ordered 2010..2024
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("G003"),
        title: "a range and a list of labels",
        text: "A group has either a range of whole numbers or a list of labels. A listed group that is \
               `ordered` has the order of its list.",
        wrong: "group season ordered 2010..2012 {early, late}
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
        right: "group season ordered {early, late}
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("G004"),
        title: "a label listed twice",
        text: "A closed group lists each of its labels once.",
        wrong: "group feed {control, fed, control}
table harvest { feed, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
        right: "group feed {control, fed}
table harvest { feed, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("G005"),
        title: "a column that is neither a group nor typed",
        text: "A bare name in a table is a column of labels and names its group. A column of values has \
               a type behind a colon.",
        wrong: "table harvest { seasn, honey : real }
group season
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
        right: "table harvest { season, honey : real }
group season
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("G006"),
        title: "a nested group without its parent's column",
        text: "The labels of a nested group are read inside the parent's: hive \"3\" of one apiary is not \
               hive \"3\" of another. So at least one table needs both columns. A table \
               with the nested group's alone is read where each label lies under one parent.",
        wrong: "group apiary
group hive within apiary
table harvest { hive, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
        right: "group apiary
group hive within apiary
table harvest { apiary, hive, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("G007"),
        title: "a nested group beside several columns of its parent",
        text: "Each label of a nested group is read inside one label of the parent. With two columns of \
               the parent in the table it is not said which.",
        wrong: "group apiary
group hive within apiary
table swarm { old : apiary, new : apiary, hive, weight : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response weight follows normal(mean: grand, sd: noise)
",
        right: "group apiary
group hive within apiary
table swarm { apiary, new : apiary, hive, weight : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response weight follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("G008"),
        title: "a label column with what belongs to values",
        text: "A unit, gaps and a range are for numbers. A label cannot be missing: without it the row \
               belongs to nothing.",
        wrong: "group season
table harvest { season with gaps, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
        right: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("G009"),
        title: "a covariate with gaps that nothing explains",
        text: "Where a cell of a covariate is missing, the fit must know what it could have been. A \
               response for the column says how it arises, and its missing cells are estimated.",
        wrong: "table harvest { honey : real, rain : real with gaps }
unknown slope : real follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: slope * rain, sd: noise)
",
        right: "table harvest { honey : real, rain : real with gaps }
unknown slope : real follows normal(mean: 0, sd: 1)
unknown usual : real follows normal(mean: 50, sd: 50)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: slope * rain, sd: noise)
response rain follows normal(mean: usual, sd: 20)
",
    },
    Page {
        code: Code("G010"),
        title: "a bound or default that is not constant",
        text: "The bounds of a type, the range of a column and the default of a given are known before \
               the fit: they are made of numbers and givens.",
        wrong: "table harvest { honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown upper : real above grand follows normal(mean: 30, sd: 5) above grand
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: upper, sd: noise)
",
        right: "table harvest { honey : real }
unknown upper : real above 0 follows normal(mean: 30, sd: 5) above 0
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: upper, sd: noise)
",
    },
    Page {
        code: Code("G011"),
        title: "bounds with nothing between them",
        text: "The lower bound is below the upper one.",
        wrong: "table harvest { honey : real }
unknown grand : real between 10 and 2 follows uniform(low: 2, high: 10)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
        right: "table harvest { honey : real }
unknown grand : real between 2 and 10 follows uniform(low: 2, high: 10)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand, sd: noise)
",
    },
    Page {
        code: Code("G012"),
        title: "the same group twice behind `per`",
        text: "One value for each label of a group is said once.",
        wrong: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per season, season follows normal(mean: 0, sd: spread)
unknown noise : positive follows half_normal(sd: 5)
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
        code: Code("G013"),
        title: "a table and a group that its rows tell",
        text: "A row of a table tells its group, so one value for each row says all; crossed with the \
               group most values would never be used.",
        wrong: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per harvest, season follows normal(mean: 0, sd: 5)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: grand + effect, sd: noise)
",
        right: "group season
table harvest { season, honey : real }
unknown grand : real follows normal(mean: 25, sd: 20)
unknown spread : positive follows half_normal(sd: 5)
unknown effect : real per harvest follows normal(mean: 0, sd: spread)
response honey follows normal(mean: grand + effect, sd: 0.5)
",
    },
    Page {
        code: Code("G014"),
        title: "a column with `per`",
        text: "A column has one value for each row of its table. What has one value for each label is a \
               column of a table `per` the group.",
        wrong: "group season
table harvest { season, honey : real, rain : real per season }
unknown slope : real follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: slope * rain, sd: noise)
",
        right: "group season
table harvest { season, honey : real }
table weather per season { rain : real }
unknown slope : real follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 5)
response honey follows normal(mean: slope * rain, sd: noise)
",
    },
    Page {
        code: Code("G015"),
        title: "a default outside its type",
        text: "The default of a given lies where its type says.",
        wrong: "table harvest { honey : real }
given typical : positive = -10
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: typical)
response honey follows normal(mean: grand, sd: noise)
",
        right: "table harvest { honey : real }
given typical : positive = 10
unknown grand : real follows normal(mean: 25, sd: 20)
unknown noise : positive follows half_normal(sd: typical)
response honey follows normal(mean: grand, sd: noise)
",
    },
];
