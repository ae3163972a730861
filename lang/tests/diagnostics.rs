//! Diagnostics as their reader sees them: one small model for each, its rendered text beside it.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

use stook_lang::check::check_source;
use stook_lang::problem::render;
use stook_lang::span::{Source, Sources};

#[test]
fn the_messages_of_every_small_model() {
    insta::glob!("models/diagnostics/*.stook", |path| {
        let name = path.file_name().unwrap().to_string_lossy().into_owned();
        let mut sources = Sources::default();
        let file = sources.add(Source::new(name, std::fs::read_to_string(path).unwrap()));
        let (_, problems) = check_source(&sources, file);
        insta::with_settings!({ omit_expression => true, prepend_module_to_snapshot => false }, {
            insta::assert_snapshot!(render(&problems.reports(), &sources, false));
        });
    });
}
