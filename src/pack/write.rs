//! Writing a pack as a whole or not at all.
//!
//! The new pack is made in a folder beside its place and changes places with the earlier one in a
//! single step. Files in the folder that the program did not write go along as they are.

use std::fs;
use std::io;
use std::path::{Component, Path, PathBuf};

use tempfile::TempDir;

use super::error::Doing;
use super::manifest::{FILE_NAME, Manifest, sha256};
use super::{Pack, PackError};

/// Writes `pack` into the folder `out`, in place of an earlier pack of the same design, whose
/// manifest is given back.
///
/// # Errors
/// When `out` is not a place for it, or the disk refuses. The folder is then as it was.
pub fn write(pack: &Pack, out: &Path) -> Result<Option<Manifest>, PackError> {
    let place = Place::of(out)?;
    match write_to(pack, &place) {
        // Another run has put a pack where there was none a moment ago.
        Err(PackError::Disk { source, .. }) if source.kind() == io::ErrorKind::DirectoryNotEmpty => {
            write_to(pack, &place)
        }
        other => other,
    }
}

fn write_to(pack: &Pack, place: &Place) -> Result<Option<Manifest>, PackError> {
    let earlier = place.earlier_pack(pack)?;

    let in_parent = |e| disk(Doing::Writing, &place.parent, e);
    fs::create_dir_all(&place.parent).map_err(in_parent)?;
    remove_abandoned(&place.parent);
    let (staging, _in_use) = staging(&place.parent).map_err(in_parent)?;
    let fresh = staging.path().join("pack");
    write_files(pack, &fresh)?;
    if let Some(earlier) = &earlier {
        keep_the_users_files(&place.folder, earlier, &fresh)?;
    }
    exchange(&fresh, &place.folder, staging.path()).map_err(|e| disk(Doing::Writing, &place.folder, e))?;
    Ok(earlier)
}

/// How the name of a folder begins in which a pack is made.
const STAGING: &str = ".plankform-";
/// Where in it the earlier pack lies while the two change places in two steps.
const EARLIER: &str = "earlier";

/// A folder to make a pack in. It is removed when it goes out of scope, whatever happens before, and
/// locked for as long as the file beside it is open.
fn staging(parent: &Path) -> io::Result<(TempDir, Option<fs::File>)> {
    loop {
        let folder = tempfile::Builder::new().prefix(STAGING).tempdir_in(parent)?;
        // A file system without locks has no abandoned folders removed either.
        let lock = fs::File::open(folder.path()).ok().filter(|file| file.lock().is_ok());
        // Another run may have taken it for an abandoned one before it was locked.
        if folder.path().exists() {
            return Ok((folder, lock));
        }
    }
}

/// Removes the folders that runs have left which were killed: nobody locks them. Whatever goes wrong
/// here concerns no pack.
fn remove_abandoned(parent: &Path) {
    let Ok(entries) = fs::read_dir(parent) else { return };
    let ours = |entry: &fs::DirEntry| {
        entry.file_name().to_string_lossy().starts_with(STAGING)
            && entry.file_type().is_ok_and(|kind| kind.is_dir())
    };
    for entry in entries.flatten().filter(ours) {
        let lock = fs::File::open(entry.path()).ok().filter(|folder| folder.try_lock().is_ok());
        // The only copy of a pack may lie there when the two steps of `exchange` were cut short.
        if lock.is_some() && !entry.path().join(EARLIER).exists() {
            let _ = fs::remove_dir_all(entry.path());
        }
    }
}

fn disk(doing: Doing, path: &Path, source: io::Error) -> PackError {
    PackError::Disk { doing, path: path.to_owned(), source: without_path(&source) }
}

/// The system's reason alone: libraries add the name of a temporary file, which tells a user nothing.
fn without_path(error: &io::Error) -> io::Error {
    io::Error::from(error.kind())
}

/// Where the pack goes.
struct Place {
    folder: PathBuf,
    parent: PathBuf,
}

impl Place {
    fn of(out: &Path) -> Result<Self, PackError> {
        let here = std::env::current_dir().map_err(|e| disk(Doing::Reading, Path::new("."), e))?;
        // A link to a folder is followed, so that the folder is replaced and not the link.
        let folder = match out.canonicalize() {
            Ok(existing) => existing,
            Err(_) => without_dots(&here.join(out)),
        };
        if folder.exists() && !folder.is_dir() {
            return Err(PackError::NotAFolder { path: out.to_owned() });
        }
        if here.starts_with(&folder) {
            return Err(PackError::WorkingFolder { path: out.to_owned() });
        }
        let parent = folder.parent().unwrap_or(Path::new("/")).to_owned();
        if let Some(file) = parent.ancestors().find(|a| a.exists()).filter(|a| !a.is_dir()) {
            return Err(PackError::NotAFolder { path: file.to_owned() });
        }
        Ok(Self { folder, parent })
    }

    /// The manifest of the pack that stands there, checked to be ours and unchanged; `None` when
    /// there is nothing.
    fn earlier_pack(&self, pack: &Pack) -> Result<Option<Manifest>, PackError> {
        if !self.folder.exists() {
            return Ok(None);
        }
        let reading = |e| disk(Doing::Reading, &self.folder, e);
        if fs::read_dir(&self.folder).map_err(reading)?.next().is_none() {
            return Ok(None);
        }
        let earlier = fs::read_to_string(self.folder.join(FILE_NAME))
            .ok()
            .and_then(|text| serde_json::from_str::<Manifest>(&text).ok())
            .filter(|manifest| manifest.design == pack.manifest.design)
            .filter(|manifest| manifest.files.iter().all(|file| stays_inside(&file.path)))
            .ok_or_else(|| PackError::NotOurs {
                path: self.folder.clone(),
                design: pack.manifest.design.clone(),
            })?;
        for file in &earlier.files {
            let path = self.folder.join(&file.path);
            // A file that is gone is no loss; one that was worked on is.
            match fs::read(&path) {
                Ok(bytes) if sha256(&bytes) != file.sha256 => return Err(PackError::Changed { path }),
                Ok(_) => {}
                Err(e) if e.kind() == io::ErrorKind::NotFound => {}
                Err(e) => return Err(disk(Doing::Reading, &path, e)),
            }
        }
        Ok(Some(earlier))
    }
}

/// A path without `.` and `..`, by its words alone, for a place that does not exist yet.
fn without_dots(path: &Path) -> PathBuf {
    path.components().fold(PathBuf::new(), |mut plain, part| {
        match part {
            Component::CurDir => {}
            Component::ParentDir => {
                plain.pop();
            }
            part => plain.push(part),
        }
        plain
    })
}

fn stays_inside(path: &str) -> bool {
    !path.is_empty() && Path::new(path).components().all(|part| matches!(part, Component::Normal(_)))
}

fn write_files(pack: &Pack, folder: &Path) -> Result<(), PackError> {
    let put = |path: PathBuf, bytes: &[u8]| {
        let made = path.parent().map_or(Ok(()), fs::create_dir_all);
        made.and_then(|()| fs::write(&path, bytes)).map_err(|e| disk(Doing::Writing, &path, e))
    };
    for file in &pack.files {
        put(folder.join(&file.path), &file.bytes)?;
    }
    let manifest = serde_json::to_string_pretty(&pack.manifest)
        .map_err(|e| disk(Doing::Writing, &folder.join(FILE_NAME), e.into()))?;
    put(folder.join(FILE_NAME), format!("{manifest}\n").as_bytes())
}

/// Links what the earlier pack did not write into the new one: the same files, not copies.
fn keep_the_users_files(folder: &Path, earlier: &Manifest, fresh: &Path) -> Result<(), PackError> {
    let ours = |path: &Path| {
        path == Path::new(FILE_NAME) || earlier.files.iter().any(|file| Path::new(&file.path) == path)
    };
    let mut pending = vec![PathBuf::new()];
    while let Some(inside) = pending.pop() {
        let here = folder.join(&inside);
        let reading = |e| disk(Doing::Reading, &here, e);
        for entry in fs::read_dir(&here).map_err(reading)? {
            let entry = entry.map_err(reading)?;
            let path = inside.join(entry.file_name());
            let (from, to) = (entry.path(), fresh.join(&path));
            if entry.file_type().map_err(reading)?.is_dir() {
                let held_ours = earlier.files.iter().any(|file| Path::new(&file.path).starts_with(&path));
                if !held_ours {
                    fs::create_dir_all(&to).map_err(|e| disk(Doing::Writing, &to, e))?;
                }
                pending.push(path);
            } else if !ours(&path) {
                if to.exists() {
                    return Err(PackError::InTheWay { path: from });
                }
                let made = to.parent().map_or(Ok(()), fs::create_dir_all);
                made.and_then(|()| fs::hard_link(&from, &to)).map_err(|e| disk(Doing::Writing, &to, e))?;
            }
        }
    }
    Ok(())
}

/// Puts `fresh` in the place of `folder`; what stood there ends up inside `aside`.
fn exchange(fresh: &Path, folder: &Path, aside: &Path) -> io::Result<()> {
    if !folder.exists() {
        return fs::rename(fresh, folder);
    }
    #[cfg(any(target_os = "linux", target_os = "macos"))]
    {
        use rustix::fs::{CWD, RenameFlags, renameat_with};
        use rustix::io::Errno;
        match renameat_with(CWD, fresh, CWD, folder, RenameFlags::EXCHANGE) {
            Ok(()) => return Ok(()),
            // A file system that cannot exchange: the two steps below do, with a moment between.
            Err(Errno::INVAL | Errno::NOSYS | Errno::NOTSUP) => {}
            Err(error) => return Err(error.into()),
        }
    }
    let old = aside.join(EARLIER);
    fs::rename(folder, &old)?;
    fs::rename(fresh, folder).inspect_err(|_| {
        // Best effort: without it the earlier pack would be lost with the staging folder.
        let _ = fs::rename(&old, folder);
    })
}
