//! How a run is asked for, and how it is watched.

/// How long to run and from which seed.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Options {
    /// The seed: the draws depend on it, the model and the data alone.
    pub seed: u64,
    /// Chains.
    pub chains: usize,
    /// Sweeps of each chain before draws are kept.
    pub warmup: usize,
    /// Kept draws of each chain.
    pub draws: usize,
    /// Threads that chains are shared among.
    pub threads: usize,
}

impl Default for Options {
    fn default() -> Options {
        Options { seed: 1, chains: 4, warmup: 1000, draws: 2500, threads: 2 }
    }
}

/// What a run is doing.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Phase {
    /// Sweeps that are not kept.
    Warmup,
    /// Sweeps that are kept.
    Draws,
}

/// How far one chain has come.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Progress {
    /// The chain, from 0.
    pub chain: usize,
    /// What it is doing.
    pub phase: Phase,
    /// Sweeps done in this phase.
    pub done: usize,
    /// Sweeps of this phase.
    pub of: usize,
}

/// Is told how far the chains have come, from their threads, some times a second at most.
pub trait Watch: Sync {
    /// One chain has come so far.
    fn progress(&self, progress: Progress);
}
