//! Any text is parsed without a panic, and every problem has a place inside the text.
#![no_main]

use libfuzzer_sys::fuzz_target;
use stook_lang::span::FileId;

fuzz_target!(|text: &str| {
    let (_, problems) = stook_lang::syntax::parse(text, FileId(0));
    for report in problems.reports() {
        assert!(report.labels.iter().all(|label| label.span.end as usize <= text.len()));
    }
});
