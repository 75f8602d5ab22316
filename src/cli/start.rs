//! `thawline start`: the demo scenarios and their invented data, ready to run.

use super::arguments::Shared;
use super::done::{Done, NoMore};
use super::failure::Failure;
use super::output;
use std::fs;
use std::path::Path;

/// Runs the command. Files that stand there already are left as they are, unless `--force` is given.
pub(super) fn run(folder: &Path, shared: &Shared) -> Result<(), Failure> {
    let failed = |path: &Path, error: std::io::Error| {
        Failure::FileSystem(format!("cannot write {}: {error}", path.display()))
    };
    let files = crate::demo::files().map_err(|open| Failure::Ours(open.to_string()))?;
    let differs = |path: &Path, content: &str| fs::read(path).is_ok_and(|there| there != content.as_bytes());
    if let Some((name, _)) = files.iter().find(|(name, content)| differs(&folder.join(name), content))
        && !shared.force
    {
        return Err(Failure::FileSystem(format!(
            "{} is there already and differs from the demo's; nothing was written. Choose another folder, or replace \
             it with --force",
            folder.join(name).display()
        )));
    }
    for (name, content) in &files {
        let path = folder.join(name);
        let parent = path.parent().unwrap_or(folder);
        fs::create_dir_all(parent).map_err(|error| failed(parent, error))?;
        fs::write(&path, content).map_err(|error| failed(&path, error))?;
    }
    if shared.json {
        let names = files.iter().map(|(name, _)| &**name).collect();
        return output::print_json(&Done::new("start", None, folder, names, NoMore {}));
    }
    if !shared.quiet {
        output::complain(&format!(
            "wrote {} files into {}; next: thawline study scenarios/alder-fork.toml there\n",
            files.len(),
            folder.display()
        ));
    }
    Ok(())
}
