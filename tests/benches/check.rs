//! How long the checker takes for long model files. Goal: 2,000 lines in less than 50 ms.
//!
//! Two shapes: many small models side by side, and one table whose lets build on each other, each on the one before.

mod common;

use std::fmt::Write;

fn main() {
    println!("stook_lang::check::check_text, best of 5; goal: 2,000 lines in less than 50 ms\n");
    println!("| shape | lines | ms | microseconds a line |\n| --- | --- | --- | --- |");
    for (shape, write) in [("side by side", side_by_side as fn(usize) -> String), ("each on the last", chain)]
    {
        for lines in [2_000, 20_000] {
            let text = write(lines);
            let lines = text.lines().count();
            common::model(&text);
            let seconds = common::fastest(5, || {
                std::hint::black_box(stook_lang::check::check_text(std::hint::black_box(&text)));
            });
            let each = seconds * 1e6 / lines as f64;
            println!("| {shape} | {lines} | {:.1} | {each:.2} |", seconds * 1e3);
        }
    }
}

/// Models of 16 lines each: a group, a table, a slope and an effect, a response.
fn side_by_side(lines: usize) -> String {
    let mut text = String::new();
    for k in 0..lines / 16 {
        let _ = write!(
            text,
            "# Part {k}.\n\
             group plot{k}\n\
             table t{k} from \"t{k}.csv\" {{\n    plot{k}\n    x{k} : real\n    y{k} : real\n}}\n\n\
             unknown mu{k} : real follows normal(mean: 0, sd: 10)\n\
             unknown slope{k} : real follows normal(mean: 0, sd: 1)\n\
             unknown noise{k} : positive follows half_normal(sd: 1)\n\
             unknown spread{k} : positive follows half_normal(sd: 1)\n\
             unknown effect{k} : real per plot{k} follows normal(mean: 0, sd: spread{k})\n\
             let m{k} = mu{k} + effect{k} + slope{k} * (x{k} - 1.5)\n\n\
             response y{k} follows normal(mean: m{k}, sd: noise{k})\n"
        );
    }
    text
}

/// One table; every second line is a let that adds an unknown to the let before.
fn chain(lines: usize) -> String {
    let mut text = "group plot\ntable t from \"t.csv\" {\n    plot\n    x : real\n    y : real\n}\n\
                    unknown noise : positive follows half_normal(sd: 1)\nlet m0 = 0 * x\n"
        .to_string();
    let steps = (lines - 9) / 2;
    for k in 1..=steps {
        let _ = writeln!(text, "unknown b{k} : real per plot follows normal(mean: 0, sd: 1)");
        let _ = writeln!(text, "let m{k} = m{} + b{k} * x", k - 1);
    }
    let _ = writeln!(text, "response y follows normal(mean: m{steps}, sd: noise)");
    text
}
