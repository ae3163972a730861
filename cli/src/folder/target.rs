//! Where results go: which folder, whether it may be replaced, and how it gets its name only when it is complete.

use std::fs;
use std::path::{Path, PathBuf};

use super::unwritable;
use crate::report::Failure;

/// The files that stook writes into its folders, tables of `simulate` left out.
const OWN_FILES: [&str; 7] =
    ["summary.csv", "draws.parquet", "run.json", "sources.csv", "groups.csv", "ladder.csv", "truth.csv"];
/// What file managers leave behind in a folder that someone looked at.
const LEFT_BY_FILE_MANAGERS: [&str; 3] = [".DS_Store", "Thumbs.db", "desktop.ini"];

/// A folder that results may be written to.
#[derive(Clone, Debug)]
pub(crate) struct Target {
    folder: PathBuf,
}

/// A folder that is being written.
#[derive(Debug)]
pub(crate) struct Staging {
    temporary: PathBuf,
    folder: PathBuf,
    finished: bool,
}

impl Target {
    /// The folder asked for, or the one named after the model file in the working folder. It must not exist, be empty,
    /// or be an earlier one of stook's with nothing else in it; and it must be possible to write beside it.
    pub(crate) fn choose(out: Option<&Path>, model: &Path, what: &str) -> Result<Target, Failure> {
        let folder = match out {
            Some(out) => out.to_path_buf(),
            None => {
                let stem = model.file_stem().map_or("model".into(), |stem| stem.to_string_lossy());
                PathBuf::from(format!("{stem}-{what}"))
            }
        };
        let refuse = |why: String| {
            Err(Failure::new(
                format!("{} is not replaced: {why}", folder.display()),
                "move it, or choose another folder with --out",
            ))
        };
        match fs::symlink_metadata(&folder) {
            Ok(found) if !found.is_dir() => return refuse("it is no folder".into()),
            Ok(_) => match stranger(&folder) {
                Ok(None) => {}
                Ok(Some(why)) => return refuse(why),
                Err(error) => return refuse(format!("it cannot be read: {error}")),
            },
            Err(_) => {}
        }
        let target = Target { folder };
        // Found out now, and not after hours of sampling.
        drop(target.begin()?);
        Ok(target)
    }

    /// The final folder.
    pub(crate) fn folder(&self) -> &Path {
        &self.folder
    }

    /// Makes the folder that is written to.
    pub(crate) fn begin(&self) -> Result<Staging, Failure> {
        let name = self.folder.file_name().ok_or_else(|| {
            Failure::new(
                format!("{} has no name of its own", self.folder.display()),
                "name a folder with --out",
            )
        })?;
        let parent = match self.folder.parent() {
            Some(parent) if !parent.as_os_str().is_empty() => parent.to_path_buf(),
            _ => PathBuf::from("."),
        };
        fs::create_dir_all(&parent).map_err(|error| unwritable(&parent, &error))?;
        remove_leftovers(&parent, &name.to_string_lossy());
        let temporary = parent.join(format!(".{}.{}.part", name.to_string_lossy(), std::process::id()));
        fs::create_dir(&temporary).map_err(|error| unwritable(&self.folder, &error))?;
        Ok(Staging { temporary, folder: self.folder.clone(), finished: false })
    }
}

impl Staging {
    /// The folder to write into.
    pub(crate) fn path(&self) -> &Path {
        &self.temporary
    }

    /// Makes a folder inside.
    pub(crate) fn inside(&self, name: &str) -> Result<PathBuf, Failure> {
        let path = self.temporary.join(name);
        fs::create_dir(&path).map_err(|error| unwritable(&path, &error))?;
        Ok(path)
    }

    /// Gives the folder its final name, in the place of an earlier one.
    pub(crate) fn finish(mut self) -> Result<(), Failure> {
        let fail = |error: std::io::Error| unwritable(&self.folder, &error);
        let earlier = self.temporary.with_extension("earlier");
        let replaces = self.folder.exists();
        if replaces {
            fs::rename(&self.folder, &earlier).map_err(fail)?;
        }
        if let Err(error) = fs::rename(&self.temporary, &self.folder) {
            if replaces {
                let _ = fs::rename(&earlier, &self.folder);
            }
            return Err(fail(error));
        }
        self.finished = true;
        if replaces {
            fs::remove_dir_all(&earlier).map_err(|error| {
                Failure::new(
                    format!("the earlier results, now {}, cannot be removed: {error}", earlier.display()),
                    "remove that folder by hand; the new results are complete",
                )
            })?;
        }
        Ok(())
    }
}

impl Drop for Staging {
    fn drop(&mut self) {
        if !self.finished {
            let _ = fs::remove_dir_all(&self.temporary);
        }
    }
}

/// Removes what killed runs left of the same folder, where the system tells which runs are still there.
fn remove_leftovers(parent: &Path, name: &str) {
    let processes = Path::new("/proc");
    if !processes.join("self").exists() {
        return;
    }
    for entry in fs::read_dir(parent).into_iter().flatten().flatten() {
        let found = entry.file_name().to_string_lossy().into_owned();
        let inner = found.strip_prefix(&format!(".{name}.")).and_then(|rest| rest.strip_suffix(".part"));
        let Some(process) = inner.and_then(|process| process.parse::<u32>().ok()) else { continue };
        if !processes.join(process.to_string()).exists() {
            let _ = fs::remove_dir_all(entry.path());
        }
    }
}

/// Why a folder is not one of stook's with nothing else in it; `None` if it is one, or empty.
fn stranger(folder: &Path) -> std::io::Result<Option<String>> {
    let mut names = vec![];
    for entry in fs::read_dir(folder)? {
        let entry = entry?;
        names.push((entry.file_name().to_string_lossy().into_owned(), entry.file_type()?.is_dir()));
    }
    names.retain(|(name, _)| !LEFT_BY_FILE_MANAGERS.contains(&name.as_str()));
    names.sort();
    if names.is_empty() {
        return Ok(None);
    }
    if !names.iter().any(|(name, _)| name == "run.json" || name == "ladder.csv") {
        return Ok(Some("it is no folder of results of stook".into()));
    }
    let tables = simulated_tables(&folder.join("run.json"));
    for (name, is_folder) in names {
        let own = if is_folder {
            folder.join(&name).join("run.json").is_file() && stranger(&folder.join(&name))?.is_none()
        } else {
            OWN_FILES.contains(&name.as_str()) || tables.contains(&name)
        };
        if !own {
            return Ok(Some(format!("it holds `{name}`, which stook did not write")));
        }
    }
    Ok(None)
}

/// The tables that a `run.json` of `simulate` says it wrote.
fn simulated_tables(path: &Path) -> Vec<String> {
    let text = fs::read_to_string(path).unwrap_or_default();
    let value: serde_json::Value = serde_json::from_str(&text).unwrap_or_default();
    let list = value.get("tables_written").and_then(|list| list.as_array());
    list.into_iter().flatten().filter_map(|name| name.as_str().map(str::to_string)).collect()
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    fn results(folder: &Path) {
        fs::create_dir_all(folder).unwrap();
        fs::write(folder.join("run.json"), "{}").unwrap();
        fs::write(folder.join("summary.csv"), "old").unwrap();
    }

    fn target(folder: &Path) -> Result<Target, Failure> {
        Target::choose(Some(folder), Path::new("m.stook"), "fit")
    }

    #[test]
    fn earlier_results_are_replaced_at_the_end_and_not_before() {
        let place = tempfile::tempdir().unwrap();
        let folder = place.path().join("out");
        results(&folder);
        let staging = target(&folder).unwrap().begin().unwrap();
        fs::write(staging.path().join("summary.csv"), "new").unwrap();
        assert_eq!(fs::read_to_string(folder.join("summary.csv")).unwrap(), "old");
        staging.finish().unwrap();
        assert_eq!(fs::read_to_string(folder.join("summary.csv")).unwrap(), "new");
        assert!(!folder.join("run.json").exists());
        assert_eq!(fs::read_dir(place.path()).unwrap().count(), 1);
    }

    #[test]
    fn a_run_that_fails_leaves_the_earlier_results_and_nothing_else() {
        let place = tempfile::tempdir().unwrap();
        let folder = place.path().join("out");
        results(&folder);
        let staging = target(&folder).unwrap().begin().unwrap();
        fs::write(staging.path().join("summary.csv"), "new").unwrap();
        drop(staging);
        assert_eq!(fs::read_to_string(folder.join("summary.csv")).unwrap(), "old");
        assert_eq!(fs::read_dir(place.path()).unwrap().count(), 1);
    }

    #[cfg(target_os = "linux")]
    #[test]
    fn what_a_killed_run_left_is_removed_and_what_a_running_one_writes_is_not() {
        let place = tempfile::tempdir().unwrap();
        // Process 1 is always there; numbers end at 4,194,304.
        for name in [".out.4999999.part", ".out.1.part", ".other.4999999.part"] {
            fs::create_dir(place.path().join(name)).unwrap();
        }
        target(&place.path().join("out")).unwrap();
        assert!(!place.path().join(".out.4999999.part").exists());
        assert!(place.path().join(".out.1.part").exists());
        assert!(place.path().join(".other.4999999.part").exists());
    }

    #[test]
    fn a_folder_with_anything_else_in_it_is_refused() {
        let place = tempfile::tempdir().unwrap();
        let notes = place.path().join("notes");
        fs::create_dir(&notes).unwrap();
        fs::write(notes.join("diary.txt"), "").unwrap();
        assert!(target(&notes).unwrap_err().message.contains("no folder of results"));
        let mixed = place.path().join("mixed");
        results(&mixed);
        fs::write(mixed.join("diary.txt"), "").unwrap();
        assert!(target(&mixed).unwrap_err().message.contains("diary.txt"));
        let below = place.path().join("below");
        results(&below);
        fs::create_dir(below.join("plots")).unwrap();
        assert!(target(&below).unwrap_err().message.contains("plots"));
    }

    #[test]
    fn a_file_is_not_replaced() {
        let place = tempfile::tempdir().unwrap();
        let file = place.path().join("file");
        fs::write(&file, "").unwrap();
        assert!(target(&file).unwrap_err().message.contains("no folder"));
    }

    #[test]
    fn an_empty_folder_and_a_missing_parent_will_do() {
        let place = tempfile::tempdir().unwrap();
        target(place.path()).unwrap();
        let deep = place.path().join("a/b");
        target(&deep).unwrap().begin().unwrap().finish().unwrap();
        assert!(deep.is_dir());
    }
}
