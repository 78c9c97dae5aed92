//! The signatures: each stands directly behind the line it signs, belongs to the person that line
//! names, was made with a key of theirs that was valid then, and fits the exact bytes.
//! It says whose key signed, never who pressed it.

use std::collections::{BTreeMap, BTreeSet};

use rayon::iter::{IntoParallelIterator, ParallelIterator};

use super::chain::{Bad, Standing};
use super::opening::Roster;
use super::public_key::PublicKey;
use super::signature::Blob;
use super::signers::Signer;

/// Whose keys count: crew id to fingerprints, each with the time it is valid.
#[derive(Debug, Clone, Default)]
pub struct Keys(BTreeMap<String, Vec<(String, Option<Signer>)>>);

impl Keys {
    /// The keys the record itself names.
    pub fn of_roster(roster: &Roster) -> Self {
        let with_key = |(id, person): (&String, &super::opening::Person)| {
            let fingerprint = person.fingerprint.clone()?;
            Some((id.clone(), vec![(fingerprint, None)]))
        };
        Self(roster.people.iter().filter_map(with_key).collect())
    }

    /// The keys of a crew list from outside.
    pub fn of_crew(crew: &[Signer]) -> Self {
        let mut keys: BTreeMap<String, Vec<_>> = BTreeMap::new();
        for signer in crew {
            let entry = (signer.key.fingerprint(), Some(signer.clone()));
            keys.entry(signer.id.clone()).or_default().push(entry);
        }
        Self(keys)
    }

    /// Whether a person has a key.
    pub fn has(&self, id: &str) -> bool {
        self.0.contains_key(id)
    }

    /// Everyone with a key.
    pub fn people(&self) -> impl Iterator<Item = &str> {
        self.0.keys().map(String::as_str)
    }

    /// Whether a person has a key with this fingerprint.
    pub fn has_fingerprint(&self, id: &str, fingerprint: &str) -> bool {
        self.0
            .get(id)
            .is_some_and(|keys| keys.iter().any(|(known, _)| known == fingerprint))
    }

    fn judge(&self, id: &str, key: &PublicKey, utc_ms: i64) -> Result<(), Stranger> {
        let fingerprint = key.fingerprint();
        let known = self.0.get(id).ok_or(Stranger::Person)?;
        let mut known = known
            .iter()
            .filter(|(known, _)| *known == fingerprint)
            .peekable();
        if known.peek().is_none() {
            return Err(Stranger::Key(fingerprint));
        }
        let valid = |signer: &Option<Signer>| signer.as_ref().is_none_or(|s| s.valid_at(utc_ms));
        if known.any(|(_, signer)| valid(signer)) {
            Ok(())
        } else {
            Err(Stranger::Time)
        }
    }
}

enum Stranger {
    Person,
    Key(String),
    Time,
}

/// What the signatures came to.
#[derive(Debug, Clone, Default)]
pub struct Sealed {
    /// The place of each well-signed entry among the lines, and the signer.
    pub signed: BTreeMap<usize, String>,
    /// Signature lines that do not hold.
    pub bad: Vec<Bad>,
    /// Fingerprints of keys the crew list does not hold for that person.
    pub unknown_keys: BTreeSet<String>,
}

/// Checks every signature line.
pub fn check(bytes: &[u8], lines: &[Standing], keys: &Keys) -> Sealed {
    let sigs = |n: &usize| {
        lines[*n]
            .line
            .as_ref()
            .is_some_and(|line| line.sig.is_some())
    };
    let places: Vec<usize> = (0..lines.len()).filter(sigs).collect();
    let checked: Vec<_> = places
        .into_par_iter()
        .map(|n| (n, check_one(bytes, lines, keys, n)))
        .collect();
    let mut sealed = Sealed::default();
    for (n, outcome) in checked {
        match outcome {
            Ok(who) => {
                sealed.signed.insert(n - 1, who);
            }
            Err(fault) => {
                sealed.unknown_keys.extend(fault.unknown);
                sealed.bad.push(Bad {
                    entry: fault.entry,
                    why: fault.why,
                });
            }
        }
    }
    sealed
}

struct Fault {
    entry: u64,
    why: String,
    unknown: Option<String>,
}

fn check_one(bytes: &[u8], lines: &[Standing], keys: &Keys, n: usize) -> Result<String, Fault> {
    let standing = &lines[n];
    let fault = |why: String| Fault {
        entry: standing.entry,
        why,
        unknown: None,
    };
    let Some(sig) = standing.line.as_ref().and_then(|line| line.sig.as_ref()) else {
        return Err(fault("it is no signature".to_owned()));
    };
    let before = n.checked_sub(1).map(|before| &lines[before]);
    let Some(before) = before
        .filter(|before| before.entry == sig.signs && before.range.end == standing.range.start)
    else {
        return Err(fault(format!(
            "it signs entry {}, which is not the line before it",
            sig.signs
        )));
    };
    let Some((entry, stamp)) = before
        .line
        .as_ref()
        .and_then(|line| Some((line, line.stamp?)))
    else {
        return Err(fault("it signs a line that is no entry".to_owned()));
    };
    if entry.signer() != Some(Some(sig.who.as_str())) {
        return Err(fault(format!(
            "entry {} does not name {} as its signer",
            sig.signs, sig.who
        )));
    }
    let blob = Blob::read(&sig.sig).map_err(|why| fault(why.to_string()))?;
    match keys.judge(&sig.who, &blob.key, stamp.utc_ms) {
        Ok(()) => {}
        Err(Stranger::Person) => {
            return Err(Fault {
                unknown: Some(blob.key.fingerprint()),
                ..fault(format!("{} has no key on the crew list", sig.who))
            });
        }
        Err(Stranger::Key(key)) => {
            let why = format!("the key {key} is not {}'s on the crew list", sig.who);
            return Err(Fault {
                unknown: Some(key),
                ..fault(why)
            });
        }
        Err(Stranger::Time) => {
            return Err(fault(format!(
                "the key of {} was not valid at {}",
                sig.who,
                stamp.utc()
            )));
        }
    }
    match blob.check(&bytes[before.range.clone()]) {
        Ok(()) => Ok(sig.who.clone()),
        Err(why) => Err(misfit(lines, n, &why.to_string())),
    }
}

/// Names the entry or its signature, whichever the chain behind them speaks against.
fn misfit(lines: &[Standing], n: usize, why: &str) -> Fault {
    let (signed, sig) = (&lines[n - 1], &lines[n]);
    let last = n + 1 == lines.len();
    let entry = if last || (sig.disowned && !signed.disowned) {
        sig.entry
    } else {
        signed.entry
    };
    let why = format!(
        "{why}: entry {} or its signature in entry {} was changed after it was signed",
        signed.entry, sig.entry
    );
    Fault {
        entry,
        why,
        unknown: None,
    }
}
