//! Any text is checked without a panic, and its messages can be drawn.
#![no_main]

use libfuzzer_sys::fuzz_target;
use stook_lang::problem::render;
use stook_lang::span::{Source, Sources};

fuzz_target!(|text: &str| {
    let mut sources = Sources::default();
    let file = sources.add(Source::new("fuzz.stook", text));
    let (_, problems) = stook_lang::check::check_source(&sources, file);
    render(&problems.reports(), &sources, false);
});
