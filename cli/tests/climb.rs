//! `stook climb` from outside.

#![allow(clippy::unwrap_used)]

mod run;

use run::{HONEY, Place, cells};

const LADDER: &str = "rung,converged,dic,p_dic,waic,p_waic,waic_se,waic_difference,waic_difference_se,";

#[test]
fn a_climb_sets_its_rungs_side_by_side() {
    let place = Place::with_honey();
    let run = place.stook("climb honey.stook");
    assert_eq!((run.status, run.err.as_str()), (0, ""), "{}", run.out);
    let names = ["apiaries", "both", "ladder.csv", "plain", "seasons", "sources.csv"];
    assert_eq!(place.names("honey-climb"), names);
    assert!(place.path("honey-climb/both/draws.parquet").is_file());
    let ladder = place.read("honey-climb/ladder.csv");
    assert!(ladder.starts_with(LADDER), "{ladder}");
    let rungs: Vec<&str> = ladder.lines().skip(1).map(|line| cells(line)[0]).collect();
    assert_eq!(rungs, ["plain", "seasons", "apiaries", "both"]);
    let dic: Vec<f64> = ladder.lines().skip(1).map(|line| cells(line)[2].parse().unwrap()).collect();
    // The lecture-room fact: real groupings lower DIC.
    assert!(dic[3] < dic[1] && dic[1] < dic[0], "{dic:?}");
    assert_eq!(place.read("honey-climb/sources.csv").lines().count(), 1 + 1 + 2 + 2 + 3);
    for text in ["rung by rung", "adding by_season to plain", "lowest WAIC"] {
        assert!(run.out.contains(text), "{text} in\n{}", run.out);
    }
}

#[test]
fn a_climb_stops_at_the_first_rung_that_does_not_converge() {
    let place = Place::with_honey();
    let run = place.stook("climb honey.stook --warmup 0 --draws 20");
    assert_eq!((run.status, run.err.as_str()), (3, ""));
    assert!(run.out.starts_with("STOPPED AT RUNG "), "{}", run.out);
    let ladder = place.read("honey-climb/ladder.csv");
    let last = cells(ladder.lines().last().unwrap());
    assert_eq!(last[1], "false");
    let quiet = place.stook("climb honey.stook --warmup 0 --draws 20 --quiet");
    assert_eq!((quiet.status, quiet.out.as_str()), (3, ""));
    assert!(quiet.err.contains("stopped at rung"), "{}", quiet.err);
}

#[test]
fn a_climb_can_end_at_a_rung() {
    let place = Place::with_honey();
    place.stook("climb honey.stook --rung seasons --draws 500");
    assert_eq!(place.names("honey-climb"), ["ladder.csv", "plain", "seasons", "sources.csv"]);
}

#[test]
fn a_model_without_a_ladder_cannot_be_climbed() {
    let place = Place::with_honey();
    let at = HONEY.find("ladder {").unwrap();
    place.write("honey.stook", &HONEY[..at]);
    let run = place.stook("climb honey.stook");
    assert_eq!((run.status, run.out.as_str()), (1, ""));
    assert!(run.err.contains("no ladder"), "{}", run.err);
    assert_eq!(place.names("."), ["harvest.csv", "honey.stook"]);
}
