//! A job folder read into memory: the plan with its findings, the parts, the crew's keys. It
//! never writes.

use std::collections::BTreeMap;
use std::path::{Path, PathBuf};

use thiserror::Error;

use super::files::{self, FileError};
use super::key_store::{self, KeyError};
use crate::diagnostic::SourceText;
use crate::document::LIMIT_BYTES;
use crate::parts::{BUILT_IN, Parts, PartsError};
use crate::plan::{Loaded, Plan};
use crate::record::CrewMember;

/// Why a job folder cannot be read.
#[derive(Debug, Error)]
pub enum FolderError {
    /// A file.
    #[error(transparent)]
    File(#[from] FileError),
    /// A part of an override folder.
    #[error("the parts folder: {0}")]
    Parts(#[from] PartsError),
    /// A key named in the plan.
    #[error("the key of {id}: {fault}")]
    Key {
        /// Whose.
        id: String,
        /// What is wrong.
        fault: KeyError,
    },
}

/// A plan with the text it was read from.
#[derive(Debug, Clone)]
pub struct PlanFile {
    /// Where it lies.
    pub path: PathBuf,
    /// Its exact bytes as text.
    pub source: SourceText,
    /// What was read.
    pub loaded: Loaded,
}

/// The parts of a plan: the built-in ones, with those of its override folder in their place.
///
/// # Errors
/// [`FolderError`] where a part of the folder cannot be used.
pub fn read_parts(plan: &Plan, plan_path: &Path) -> Result<Parts, FolderError> {
    let mut overrides = BTreeMap::new();
    if let Some(folder) = &plan.parts {
        let folder = beside(plan_path, &folder.value);
        for (name, _) in BUILT_IN {
            let path = folder.join(name);
            let dir = path.parent().unwrap_or(&folder);
            let file = path
                .file_name()
                .map_or(String::new(), |n| n.to_string_lossy().into_owned());
            if files::is_dir(dir) && files::names(dir)?.contains(&file) {
                overrides.insert((*name).to_owned(), files::read_text(&path, LIMIT_BYTES)?);
            }
        }
    }
    Ok(Parts::from_texts(&overrides)?)
}

/// A path named in the plan, taken from the plan's own folder.
pub fn beside(plan_path: &Path, named: &str) -> PathBuf {
    plan_path.parent().unwrap_or(Path::new("")).join(named)
}

/// The crew with their public keys.
///
/// # Errors
/// [`FolderError::Key`] where a key named in the plan cannot be used.
pub fn read_crew(plan: &Plan, plan_path: &Path) -> Result<Vec<CrewMember>, FolderError> {
    let member = |person: &crate::plan::Person| {
        let id = person.id.value.clone();
        let read = |named: &crate::plan::Spanned<String>| {
            key_store::read_public(&beside(plan_path, &named.value))
        };
        let key = person.key.as_ref().map(read).transpose();
        Ok(CrewMember {
            key: key.map_err(|fault| FolderError::Key {
                id: id.clone(),
                fault,
            })?,
            name: person.name.value.clone(),
            roles: person
                .roles
                .iter()
                .map(|r| r.value.word().to_owned())
                .collect(),
            id,
        })
    };
    plan.crew.iter().map(member).collect()
}

/// Where the private half of a person's key lies: beside the public one, without its ending.
pub fn private_key(plan: &Plan, plan_path: &Path, id: &str) -> Option<PathBuf> {
    let person = plan.crew.iter().find(|p| p.id.value == id)?;
    let named = &person.key.as_ref()?.value;
    Some(beside(
        plan_path,
        named.strip_suffix(".pub").unwrap_or(named),
    ))
}
