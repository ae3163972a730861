//! The pages on data problems that `explain CODE` prints. Their examples are a model and, behind a line `--- FILE`, the
//! tables that it is read with.

use stook_lang::problem::{Code, Page};

pub(super) const PAGES: &[Page] = &[
    Page {
        code: Code("B001"),
        title: "a row without a label",
        text: "A column of labels says for each row which season, apiary or plot it belongs to. A row that does not say it cannot be placed. Gaps are for measurements, not for labels.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive between 0 and 20
}
given typical : positive = 3
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: typical)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,yield
A,5.1
,4.9
B,6.0
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive between 0 and 20
}
given typical : positive = 3
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: typical)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,4.9
B,6.0
"#,
    },
    Page {
        code: Code("B002"),
        title: "a label that the group does not have",
        text: "A group with its labels between braces, or with a range, has those labels and no others: a misspelt label would otherwise become a group of its own.",
        wrong: r#"group plot {A, B}
table trial from "trial.csv" {
    plot
    yield : positive between 0 and 20
}
given typical : positive = 3
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: typical)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,yield
A,5.1
a,4.9
B,6.0
"#,
        right: r#"group plot {A, B}
table trial from "trial.csv" {
    plot
    yield : positive between 0 and 20
}
given typical : positive = 3
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: typical)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,4.9
B,6.0
"#,
    },
    Page {
        code: Code("B003"),
        title: "a nested label under more than one parent",
        text: "A label of a nested group is read inside its parent. A table that has no column for the parent can be read only where each label lies under one parent.",
        wrong: r#"group block
group plot within block
table trial from "trial.csv" {
    block, plot
    yield : positive
}
table weeds from "weeds.csv" {
    plot
    cover : fraction
}
unknown vigour : real per plot follows normal(mean: 0, sd: 1)
response yield follows normal(mean: vigour, sd: 1)
response cover follows beta(mean: logistic(vigour), size: 5)
--- trial.csv
block,plot,yield
north,1,5.1
south,1,6.0
--- weeds.csv
plot,cover
1,0.3
"#,
        right: r#"group block
group plot within block
table trial from "trial.csv" {
    block, plot
    yield : positive
}
table weeds from "weeds.csv" {
    block, plot
    cover : fraction
}
unknown vigour : real per plot follows normal(mean: 0, sd: 1)
response yield follows normal(mean: vigour, sd: 1)
response cover follows beta(mean: logistic(vigour), size: 5)
--- trial.csv
block,plot,yield
north,1,5.1
south,1,6.0
--- weeds.csv
block,plot,cover
north,1,0.3
"#,
    },
    Page {
        code: Code("B004"),
        title: "a missing value",
        text: "A column admits missing cells only where its declaration says `with gaps`. A column with gaps needs a `response`, which says how its values arise: then the missing ones are estimated.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive between 0 and 20
}
given typical : positive = 3
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: typical)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,
B,6.0
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive with gaps between 0 and 20
}
given typical : positive = 3
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: typical)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,
B,6.0
"#,
    },
    Page {
        code: Code("B005"),
        title: "a value outside its type",
        text: "A `positive` is above 0, a `fraction` lies between 0 and 1, a `count` is a whole number from 0, a `yesno` is 0 or 1.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive between 0 and 20
}
given typical : positive = 3
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: typical)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,-4.9
B,6.0
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive between 0 and 20
}
given typical : positive = 3
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: typical)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,4.9
B,6.0
"#,
    },
    Page {
        code: Code("B006"),
        title: "a value outside its range",
        text: "`between a and b` in a column's declaration is a promise about the data, checked when they are read: it finds slips of the pen.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive between 0 and 20
}
given typical : positive = 3
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: typical)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,49
B,6.0
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive between 0 and 20
}
given typical : positive = 3
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: typical)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,4.9
B,6.0
"#,
    },
    Page {
        code: Code("B007"),
        title: "two rows for one label",
        text: "A table `per` a group has one row for each of its labels.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive
}
table soil per plot from "soil.csv" {
    clay : fraction
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown slope : real follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand + slope * clay, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,4.9
B,6.0
--- soil.csv
plot,clay
A,0.2
A,0.3
B,0.4
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive
}
table soil per plot from "soil.csv" {
    clay : fraction
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown slope : real follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand + slope * clay, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,4.9
B,6.0
--- soil.csv
plot,clay
A,0.2
B,0.4
"#,
    },
    Page {
        code: Code("B008"),
        title: "no row for a label",
        text: "A table `per` a group has one row for each of its labels, also for those that only other tables hold.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive
}
table soil per plot from "soil.csv" {
    clay : fraction
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown slope : real follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand + slope * clay, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,4.9
B,6.0
--- soil.csv
plot,clay
A,0.2
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive
}
table soil per plot from "soil.csv" {
    clay : fraction
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown slope : real follows normal(mean: 0, sd: 1)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand + slope * clay, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,4.9
B,6.0
--- soil.csv
plot,clay
A,0.2
B,0.4
"#,
    },
    Page {
        code: Code("B009"),
        title: "a label in the model that the data do not have",
        text: "Labels in the text of a model are compared with those of the data when these are read.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive between 0 and 20
}
given typical : positive = 3
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: typical)
unknown effect : real per plot follows normal(mean: 0, sd: 1)
response yield follows normal(mean: grand + effect["A"] * (plot == "A"), sd: noise)
--- trial.csv
plot,yield
a,5.1
a,4.9
B,6.0
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive between 0 and 20
}
given typical : positive = 3
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: typical)
unknown effect : real per plot follows normal(mean: 0, sd: 1)
response yield follows normal(mean: grand + effect["A"] * (plot == "A"), sd: noise)
--- trial.csv
plot,yield
A,5.1
A,4.9
B,6.0
"#,
    },
    Page {
        code: Code("B010"),
        title: "a setting outside its type",
        text: "The value that `--set NAME=VALUE` gives a `given` must lie in its type, as its default does. The example fails with `--set typical=-3` and works with `--set typical=4`.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive between 0 and 20
}
given typical : positive = 3
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: typical)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,4.9
B,6.0
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive between 0 and 20
}
given typical : positive = 3
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: typical)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,4.9
B,6.0
"#,
    },
    Page {
        code: Code("B011"),
        title: "a setting that the model does not have",
        text: "`--set NAME=VALUE` changes a setting that the model declares with `given`. The example fails with `--set typcal=4` and works with `--set typical=4`.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive between 0 and 20
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,4.9
B,6.0
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive between 0 and 20
}
given typical : positive = 3
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: typical)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,yield
A,5.1
A,4.9
B,6.0
"#,
    },
];
