//! `stook fit`, `plan` and `simulate` from outside: the screen, the folder, the exit status.

#![allow(clippy::unwrap_used)]

mod run;

use run::{HARVEST, HONEY, Place, cells};

const SUMMARY: &str = "quantity,labels,mean,mean_mcse,sd,q2_5,q25,q50,q75,q97_5,split_rhat,bulk_ess,tail_ess";
const SOURCES: &str =
    "rung,response,source,sd,sd_q2_5,sd_q97_5,share,share_q2_5,share_q97_5,finite_sd,p_largest";

#[test]
fn a_fit_writes_its_folder_and_shows_its_screen() {
    let place = Place::with_honey();
    let run = place.stook("fit honey.stook");
    assert_eq!((run.status, run.err.as_str()), (0, ""), "{}", run.out);
    assert_eq!(place.names("."), ["harvest.csv", "honey-fit", "honey.stook"]);
    let names = ["draws.parquet", "groups.csv", "run.json", "sources.csv", "summary.csv"];
    assert_eq!(place.names("honey-fit"), names);
    let summary = place.read("honey-fit/summary.csv");
    assert_eq!(summary.lines().next(), Some(SUMMARY));
    // 4 scalars, 8 + 5 effects, 8 derived means, 4 missing readings.
    assert_eq!(summary.lines().count(), 1 + 4 + 13 + 8 + 4);
    assert_eq!(place.read("honey-fit/sources.csv").lines().next(), Some(SOURCES));
    for text in ["grand (kg)", "season_dev", "largest", "honey by season", "Checked:", "honey-fit"] {
        assert!(run.out.contains(text), "{text} in\n{}", run.out);
    }
    assert!(!run.out.contains('\u{1b}'));
}

#[test]
fn run_json_says_what_was_run() {
    let place = Place::with_honey();
    place.stook(
        "fit honey.stook --draws 500 --warmup 200 --chains 2 --set typical=8 --seed 5 --out results/one",
    );
    let value: serde_json::Value = serde_json::from_str(&place.read("results/one/run.json")).unwrap();
    let sum = place.shell("sha256sum honey.stook harvest.csv").out;
    let hashes: Vec<&str> = sum.lines().map(|line| &line[..64]).collect();
    assert_eq!(value["model"]["sha256"], hashes[0]);
    assert_eq!(value["data"][0]["sha256"], hashes[1]);
    assert_eq!(value["seed"], 5);
    assert_eq!(value["settings"]["typical"], 8.0);
    assert_eq!((&value["options"]["draws"], &value["options"]["chains"]), (&500.into(), &2.into()));
    assert!(value["convergence"]["converged"].is_boolean());
    for phase in ["read", "bind", "plan", "warmup", "draws", "summary"] {
        for clock in ["wall", "cpu"] {
            assert!(value["seconds"][phase][clock].as_f64().unwrap() >= 0.0, "{phase} {clock}");
        }
    }
}

#[test]
fn the_same_seed_gives_the_same_bytes_with_any_number_of_threads() {
    let place = Place::with_honey();
    for (threads, folder) in [(1, "a"), (2, "b"), (4, "c")] {
        place.stook(&format!("fit honey.stook --quiet --draws 300 --threads {threads} --out {folder}"));
    }
    for file in ["draws.parquet", "summary.csv", "sources.csv", "groups.csv"] {
        let [a, b, c] = ["a", "b", "c"].map(|folder| std::fs::read(place.path(folder).join(file)).unwrap());
        assert!(a == b && b == c, "{file}");
    }
    place.stook("fit honey.stook --quiet --draws 300 --seed 2 --out d");
    assert_ne!(place.read("a/summary.csv"), place.read("d/summary.csv"));
}

#[test]
fn a_fit_that_has_not_converged_says_so_first_and_has_its_own_status() {
    let place = Place::with_honey();
    let run = place.stook("fit honey.stook --warmup 0 --draws 20");
    assert_eq!((run.status, run.err.as_str()), (3, ""));
    assert!(run.out.starts_with("NOT CONVERGED"), "{}", run.out);
    assert!(place.path("honey-fit/summary.csv").is_file());
    let run = place.stook("fit honey.stook --warmup 0 --draws 20 --quiet");
    assert_eq!((run.status, run.out.as_str()), (3, ""));
    assert!(run.err.contains("not converged"), "{}", run.err);
    let run = place.stook("fit honey.stook --warmup 0 --draws 20 --message-format json");
    assert_eq!((run.status, run.err.as_str()), (3, ""));
    let value: serde_json::Value = serde_json::from_str(&run.out).unwrap();
    assert!(value["message"].as_str().unwrap().contains("not converged"));
}

#[test]
fn a_rung_is_fitted_alone() {
    let place = Place::with_honey();
    let run = place.stook("fit honey.stook --rung seasons --draws 1000");
    assert!(run.out.contains("rung seasons"), "{}", run.out);
    let sources = place.read("honey-fit/sources.csv");
    let rungs: Vec<&str> = sources.lines().skip(1).map(|line| cells(line)[0]).collect();
    assert_eq!(rungs, ["seasons", "seasons"]);
    assert!(!place.read("honey-fit/summary.csv").contains("apiary_dev"));
}

#[test]
fn an_earlier_run_is_replaced_and_a_stranger_is_not() {
    let place = Place::with_honey();
    let fit = "fit honey.stook --quiet --warmup 50 --draws 50 --out out";
    place.stook(fit);
    assert_ne!(place.stook(fit).status, 1);
    place.write("out/notes.txt", "mine");
    let run = place.stook(fit);
    assert_eq!(run.status, 1);
    assert!(run.err.contains("notes.txt"), "{}", run.err);
    assert_eq!(place.read("out/notes.txt"), "mine");
}

#[cfg(target_os = "linux")]
#[test]
fn a_folder_that_cannot_be_written_is_found_out_before_sampling() {
    let run = Place::with_honey().stook("fit honey.stook --out /proc/results");
    assert_eq!((run.status, run.out.as_str()), (1, ""));
    assert!(run.err.contains("/proc/results cannot be written"), "{}", run.err);
}

#[cfg(unix)]
#[test]
fn a_disk_that_is_full_leaves_the_earlier_results_and_nothing_else() {
    let place = Place::with_honey();
    place.stook("fit honey.stook --quiet --draws 100");
    let before = place.read("honey-fit/summary.csv");
    // A file that grows beyond the limit fails as on a full disk, once the signal for it is ignored.
    let run = place.shell("trap '' XFSZ; ulimit -f 16; $STOOK fit honey.stook --seed 2");
    assert_eq!(run.status, 1);
    assert!(run.err.contains("draws.parquet cannot be written"), "{}", run.err);
    assert!(run.out.contains("Where the variation"), "what was found is shown all the same");
    assert_eq!(place.read("honey-fit/summary.csv"), before);
    assert_eq!(place.names("."), ["harvest.csv", "honey-fit", "honey.stook"]);
}

#[cfg(unix)]
#[test]
fn a_run_that_is_killed_leaves_the_earlier_results() {
    let place = Place::with_honey();
    place.stook("fit honey.stook --quiet --draws 100");
    let before = place.read("honey-fit/summary.csv");
    place.shell("$STOOK fit honey.stook --draws 500000 & sleep 0.3; kill -9 $!");
    assert_eq!(place.read("honey-fit/summary.csv"), before);
    assert_eq!(place.names("."), ["harvest.csv", "honey-fit", "honey.stook"]);
}

#[test]
fn mistakes_in_the_data_leave_no_folder() {
    let place = Place::with_honey();
    place.write("harvest.csv", &HARVEST.replacen("Honey (kg)", "Honey", 1));
    let run = place.stook("fit honey.stook");
    assert_eq!((run.status, run.out.as_str()), (1, ""));
    assert!(run.err.contains("Honey (kg)"), "{}", run.err);
    assert_eq!(place.names("."), ["harvest.csv", "honey.stook"]);
}

#[test]
fn a_gap_can_be_written_otherwise() {
    let place = Place::with_honey();
    let dashed: Vec<String> = HARVEST
        .lines()
        .map(|line| line.strip_suffix(',').map_or(line.into(), |line| format!("{line},-")))
        .collect();
    place.write("harvest.csv", &(dashed.join("\n") + "\n"));
    let fit = "fit honey.stook --quiet --warmup 50 --draws 50";
    assert_eq!(place.stook(fit).status, 1);
    assert_ne!(place.stook(&format!("{fit} --gap -")).status, 1);
}

#[test]
fn a_plan_needs_no_data_and_has_numbers_with_them() {
    let place = Place::empty();
    place.write("honey.stook", HONEY);
    let without = place.stook("plan honey.stook");
    assert_eq!((without.status, without.err.as_str()), (0, ""));
    assert!(without.out.contains("season_dev") && !without.out.contains("here about"), "{}", without.out);
    place.write("harvest.csv", HARVEST);
    let with = place.stook("plan honey.stook");
    assert_eq!(with.status, 0);
    assert!(with.out.contains("here about"), "{}", with.out);
}

#[test]
fn drawn_data_can_be_fitted() {
    let place = Place::empty();
    place.write("honey.stook", HONEY);
    let run =
        place.stook("simulate honey.stook --labels season=6 --labels apiary=4 --rows harvest=2 --seed 11");
    assert_eq!((run.status, run.err.as_str()), (0, ""), "{}", run.out);
    assert_eq!(place.names("honey-simulated"), ["harvest.csv", "run.json", "truth.csv"]);
    assert_eq!(place.read("honey-simulated/harvest.csv").lines().count(), 1 + 6 * 4 * 2);
    let truth = place.read("honey-simulated/truth.csv");
    assert_eq!(truth.lines().next(), Some("quantity,labels,value"));
    let again =
        place.stook("simulate honey.stook --labels season=6 --labels apiary=4 --rows harvest=2 --seed 11");
    assert_eq!((again.status, place.read("honey-simulated/truth.csv")), (0, truth));
    let fit = place.stook("fit honey.stook --quiet --draws 200 --table harvest=honey-simulated/harvest.csv");
    assert_ne!(fit.status, 1, "{}", fit.err);
}

#[test]
fn drawn_data_follow_a_design_that_is_there() {
    let place = Place::with_honey();
    let run = place.stook("simulate honey.stook");
    assert_eq!(run.status, 0, "{}", run.err);
    assert_eq!(place.read("honey-simulated/harvest.csv").lines().count(), HARVEST.lines().count());
}

#[test]
fn a_group_without_labels_is_asked_for() {
    let place = Place::empty();
    place.write("honey.stook", HONEY);
    let run = place.stook("simulate honey.stook");
    assert_eq!(run.status, 1);
    assert!(run.err.contains("--labels"), "{}", run.err);
}
