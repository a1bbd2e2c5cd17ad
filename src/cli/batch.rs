//! Many files: which of them, how many at once, and their results in one order.

use crate::cli::{
    chain::Watch,
    console::{Console, Outcome, Trouble},
    field,
};
use clap::Args;
use std::{
    collections::BTreeMap,
    path::{Path, PathBuf},
    sync::{
        atomic::{AtomicUsize, Ordering},
        mpsc,
    },
};

/// Stack of a thread that works on joints, bytes: that of a main thread.
const STACK: usize = 8 << 20;

/// How a command goes through many files.
#[derive(Clone, Debug, Args)]
pub struct Batch {
    /// Cores to use, each for a joint of its own; without it one joint after the other on all cores
    #[arg(long, value_name = "N", value_parser = clap::value_parser!(u16).range(1..=1024))]
    jobs: Option<u16>,
    /// Take the K-th of N parts of the files: every N-th in the order of their sorted paths
    #[arg(long, value_name = "K/N", value_parser = shard)]
    shard: Option<Shard>,
}

/// One of several equal parts of a list.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Shard {
    /// Which, from 1.
    pub part: usize,
    /// Of how many.
    pub of: usize,
}

/// A part of the files: `2/5`.
fn shard(text: &str) -> Result<Shard, String> {
    let parsed = text.split_once('/').and_then(|(part, of)| {
        Some(Shard {
            part: part.trim().parse().ok()?,
            of: of.trim().parse().ok()?,
        })
    });
    match parsed {
        Some(shard) if shard.part >= 1 && shard.part <= shard.of => Ok(shard),
        _ => Err("write which part of how many, the first being 1: --shard 2/5".to_owned()),
    }
}

/// Work on one file: its place in the batch, its path, and where to tell what is found.
pub type Work<'a> = dyn Fn(usize, &Path, &mut Console) -> Result<Outcome, Trouble> + Sync + 'a;

impl Batch {
    /// The part asked for.
    pub fn part(&self) -> Option<Shard> {
        self.shard
    }

    /// The files of the part asked for, in the order in which they are told: as given, or sorted
    /// where a part is asked for.
    pub fn files(&self, all: &[PathBuf]) -> Vec<PathBuf> {
        let Some(Shard { part, of }) = self.shard else {
            return all.to_vec();
        };
        let mut sorted = all.to_vec();
        sorted.sort();
        sorted.into_iter().skip(part - 1).step_by(of).collect()
    }

    /// Who is told of progress: nobody where several joints would speak at once.
    pub fn watch(&self) -> Watch {
        match self.jobs {
            None => field::watch(),
            Some(_) => Watch::none(),
        }
    }

    /// Works through the files, also after one at fault; what they tell comes in their order.
    pub fn run(
        &self,
        files: &[PathBuf],
        console: &mut Console,
        work: &Work,
    ) -> Result<Outcome, Trouble> {
        let outcomes = match self.jobs {
            None => one_by_one(files, console, work)?,
            Some(jobs) => at_once(files, (usize::from(jobs), console), work)?,
        };
        Ok(Outcome::of_batch(&outcomes))
    }
}

fn one_by_one(
    files: &[PathBuf],
    console: &mut Console,
    work: &Work,
) -> Result<Vec<Outcome>, Trouble> {
    let mut outcomes = Vec::with_capacity(files.len());
    for (index, path) in files.iter().enumerate() {
        let done = work(index, path, console);
        match settled(done, console) {
            Ok(outcome) => outcomes.push(outcome),
            Err(trouble) => return cut_short(outcomes, Outcome::Done, trouble),
        }
    }
    Ok(outcomes)
}

/// What the files came to up to the `last`, where nobody reads any further.
fn cut_short(
    mut outcomes: Vec<Outcome>,
    last: Outcome,
    trouble: Trouble,
) -> Result<Vec<Outcome>, Trouble> {
    if trouble.is_closed_pipe() {
        outcomes.push(last);
        Ok(outcomes)
    } else {
        Err(trouble)
    }
}

/// What became of a file; only an output that takes no more ends the batch.
fn settled(done: Result<Outcome, Trouble>, console: &mut Console) -> Result<Outcome, Trouble> {
    match done {
        Ok(outcome) => Ok(outcome),
        Err(Trouble::Output(fault)) => Err(Trouble::Output(fault)),
        Err(trouble) => {
            console.trouble(&trouble);
            Ok(trouble.outcome())
        }
    }
}

/// Every worker has a pool of its own, in which also the parallel parts of a solution run: of one
/// thread, or of more where there are fewer files than jobs, so that no more threads compute than
/// there are jobs; the thread count changes no digit.
fn at_once(
    files: &[PathBuf],
    (jobs, console): (usize, &mut Console),
    work: &Work,
) -> Result<Vec<Outcome>, Trouble> {
    let workers = jobs.min(files.len());
    let pools = (0..workers)
        .map(|index| {
            let share = jobs / workers + usize::from(index < jobs % workers);
            rayon::ThreadPoolBuilder::new()
                .num_threads(share)
                .stack_size(STACK)
                .build()
        })
        .collect::<Result<Vec<rayon::ThreadPool>, rayon::ThreadPoolBuildError>>()
        .map_err(|found| Trouble::Failure(format!("{workers} jobs cannot be started: {found}")))?;
    let next = AtomicUsize::new(0);
    std::thread::scope(|scope| {
        let (done, arriving) = mpsc::channel();
        for pool in pools {
            let (done, next) = (done.clone(), &next);
            scope.spawn(move || {
                loop {
                    let index = next.fetch_add(1, Ordering::Relaxed);
                    let Some(path) = files.get(index) else { break };
                    let told = pool.install(|| {
                        let mut kept = Console::kept();
                        let found = work(index, path, &mut kept);
                        let outcome = settled(found, &mut kept);
                        (kept, outcome)
                    });
                    // Nobody waits any more once the output takes no more.
                    if done.send((index, told)).is_err() {
                        break;
                    }
                }
            });
        }
        drop(done);
        let mut early = BTreeMap::new();
        let mut outcomes = Vec::with_capacity(files.len());
        for (index, told) in arriving {
            early.insert(index, told);
            while let Some((kept, outcome)) = early.remove(&outcomes.len()) {
                let outcome = outcome?;
                match console.give_out(kept).map_err(Trouble::from) {
                    Ok(()) => outcomes.push(outcome),
                    Err(trouble) => {
                        next.store(files.len(), Ordering::Relaxed);
                        return cut_short(outcomes, outcome, trouble);
                    }
                }
            }
        }
        Ok(outcomes)
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn batch(jobs: Option<u16>, part: Option<&str>) -> Batch {
        Batch {
            jobs,
            shard: part.map(|text| shard(text).unwrap()),
        }
    }

    #[test]
    fn parts_share_all_files_evenly_whatever_their_order() {
        let files: Vec<PathBuf> = ["d", "a", "c", "e", "b"].map(PathBuf::from).to_vec();
        let part = |text| batch(None, Some(text)).files(&files);
        assert_eq!(part("1/2"), ["a", "c", "e"].map(PathBuf::from));
        assert_eq!(part("2/2"), ["b", "d"].map(PathBuf::from));
        assert_eq!(part("6/6"), Vec::<PathBuf>::new());
        for bad in ["0/2", "3/2", "1", "a/b", "1/0", "-1/2", ""] {
            assert!(shard(bad).is_err(), "{bad}");
        }
    }

    #[test]
    fn jobs_keep_the_order_of_the_files_and_every_outcome() {
        let files: Vec<PathBuf> = (0..20).map(|k| PathBuf::from(format!("{k}"))).collect();
        let work = |index: usize, _: &Path, console: &mut Console| {
            // The first ones take longest, so that the others wait for them.
            std::thread::sleep(std::time::Duration::from_millis(
                20_u64.saturating_sub(index as u64),
            ));
            console.result(&format!("{index} "))?;
            if index == 7 {
                return Err(Trouble::Failure("seven".to_owned()));
            }
            Ok(Outcome::Done)
        };
        let told = |jobs: Option<u16>| {
            let mut console = Console::kept();
            let outcome = batch(jobs, None).run(&files, &mut console, &work);
            assert!(matches!(outcome, Ok(Outcome::Failed)));
            console.texts()
        };
        let alone = told(None);
        assert!(alone.contains("6 7 ") && alone.contains("seven"));
        for jobs in [1, 3, 64] {
            assert_eq!(told(Some(jobs)), alone);
        }
    }
}
