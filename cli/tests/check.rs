//! `stook check` and `stook explain` from outside: what is said where, and the exit status.

#![allow(clippy::unwrap_used)]

mod run;

use run::{HONEY, Place};

#[test]
fn a_model_without_mistakes() {
    let run = Place::with_honey().stook("check honey.stook");
    assert_eq!((run.status, run.err.as_str()), (0, ""));
    insta::assert_snapshot!(run.out);
}

#[test]
fn quiet_says_nothing_of_a_model_without_mistakes() {
    let run = Place::with_honey().stook("check --quiet honey.stook");
    assert_eq!((run.status, run.out.as_str(), run.err.as_str()), (0, "", ""));
}

#[test]
fn mistakes_go_to_standard_error() {
    let place = Place::empty();
    place.write("honey.stook", &HONEY.replace("sd: residual", "sd: residul"));
    let run = place.stook("check honey.stook");
    assert_eq!((run.status, run.out.as_str()), (1, ""));
    assert!(run.err.contains("residul") && run.err.contains("residual"), "{}", run.err);
    assert!(!run.err.contains('\u{1b}'), "no terminal, no colours");
}

#[test]
fn mistakes_as_json_are_lines_on_standard_output() {
    let place = Place::empty();
    place.write(
        "honey.stook",
        &HONEY.replace("sd: residual", "sd: residul").replace("adds by_apiary", "adds by_hive"),
    );
    let run = place.stook("check honey.stook --message-format json");
    assert_eq!((run.status, run.err.as_str()), (1, ""));
    assert!(run.out.lines().count() >= 2, "{}", run.out);
    for line in run.out.lines() {
        let value: serde_json::Value = serde_json::from_str(line).unwrap();
        for key in ["code", "severity", "message", "help"] {
            assert!(value[key].is_string(), "{key} in {line}");
        }
        for key in ["line", "column", "end_line", "end_column"] {
            assert!(value["labels"][0][key].as_u64().unwrap() >= 1, "{key} in {line}");
        }
        assert_eq!(value["labels"][0]["file"], "honey.stook");
        assert!(value["labels"][0]["text"].is_string());
    }
}

#[test]
fn a_warning_does_not_change_the_exit_status() {
    let place = Place::empty();
    place.write("honey.stook", &format!("{HONEY}\nunknown idle : real follows normal(mean: 0, sd: 1)\n"));
    let run = place.stook("check honey.stook");
    assert_eq!(run.status, 0, "{}", run.err);
    assert!(run.err.contains("idle"), "{}", run.err);
    assert!(run.out.contains("1 warning"), "{}", run.out);
}

#[test]
fn a_model_file_that_is_not_there() {
    let run = Place::empty().stook("check hony.stook");
    assert_eq!(run.status, 1);
    assert!(run.err.contains("hony.stook cannot be read"), "{}", run.err);
}

#[test]
fn a_model_file_that_is_not_utf8() {
    let place = Place::empty();
    std::fs::write(place.path("honey.stook"), b"group season\n# K\xfcnstler\n").unwrap();
    let run = place.stook("check honey.stook");
    assert_eq!(run.status, 1);
    assert!(run.err.contains("line 2: the text is not UTF-8"), "{}", run.err);
}

#[test]
fn a_rung_that_is_not_there_names_the_nearest() {
    let run = Place::with_honey().stook("check honey.stook --rung apiares");
    assert_eq!(run.status, 1);
    assert!(run.err.contains("`apiaries`"), "{}", run.err);
}

#[test]
fn a_command_line_that_cannot_be_meant_has_a_status_of_its_own() {
    let place = Place::with_honey();
    for line in
        ["", "check", "fit honey.stook --table harvest", "fit honey.stook --chains 0", "mend honey.stook"]
    {
        assert_eq!(place.stook(line).status, 2, "{line}");
    }
}

#[test]
fn data_are_checked_where_the_command_line_speaks_of_them() {
    let place = Place::with_honey();
    place.write("bad.csv", "season,apiary,Honey (kg)\n2016,Heath,12.5\n2017,Heath,much\n2018,Limes,-3\n");
    assert_eq!(place.stook("check honey.stook --table harvest=harvest.csv").status, 0);
    let run = place.stook("check honey.stook --table harvest=bad.csv");
    assert_eq!(run.status, 1);
    assert!(run.err.contains("bad.csv") && run.err.contains("much") && run.err.contains('3'), "{}", run.err);
}

#[test]
fn a_setting_or_a_table_that_the_model_does_not_have() {
    let place = Place::with_honey();
    let run = place.stook("check honey.stook --set tipical=5");
    assert!(run.status == 1 && run.err.contains("typical"), "{}", run.err);
    let run = place.stook("check honey.stook --table harvst=harvest.csv");
    assert!(run.status == 1 && run.err.contains("`harvest`"), "{}", run.err);
}

#[test]
fn explain_prints_the_page_of_a_code_in_any_case() {
    let place = Place::empty();
    let run = place.stook("explain y001");
    assert_eq!(run.status, 0);
    assert!(run.out.starts_with("Y001: ") && run.out.contains("Wrong") && run.out.contains("Right"));
    assert_eq!(run.out, place.stook("explain Y001").out);
}

#[test]
fn explain_without_a_code_lists_them_all() {
    let run = Place::empty().stook("explain");
    assert_eq!(run.status, 0);
    for code in ["Y001", "B001", "P001"] {
        assert!(run.out.contains(code), "{code}");
    }
}

#[test]
fn explain_names_the_nearest_of_an_unknown_code() {
    let run = Place::empty().stook("explain Y00");
    assert_eq!((run.status, run.out.as_str()), (1, ""));
    assert!(run.err.contains("Y00"), "{}", run.err);
}

#[test]
fn a_reader_that_goes_away_is_no_error() {
    let run = Place::empty().shell("$STOOK explain | head -n 1");
    assert_eq!((run.status, run.err.as_str()), (0, ""));
}

#[cfg(target_os = "linux")]
#[test]
fn a_full_disk_behind_standard_output_is_said() {
    let run = Place::empty().shell("$STOOK explain > /dev/full");
    assert_eq!(run.status, 1);
    assert!(run.err.contains("standard output cannot be written"), "{}", run.err);
}
