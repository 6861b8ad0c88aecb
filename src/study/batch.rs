//! Evaluating many cavities: eight at a time, in chunks.
//!
//! The widest vector instructions that the processor has are chosen at run time. They do not change
//! a byte: no operation is ever contracted with another.

use pulp::{Arch, Simd, WithSimd};

use crate::analysis::measures::{Evaluator, Workspace};
use crate::analysis::spectrum;
use crate::cavity::{Cavity, Measure, Slot};
use crate::numeric::{LANES, LaneMask, Lanes, Real};
use crate::optics::PerPlane;

/// Samples in a chunk, a whole number of blocks: what is known of them stays in the fastest memory.
pub const CHUNK: usize = 256;
/// Blocks of eight in a chunk.
pub const BLOCKS: usize = CHUNK / LANES;

/// Which vector instructions to use.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Instructions {
    /// The widest that the processor has.
    Widest,
    /// Those that every processor of its family has.
    Plain,
}

/// A cavity prepared for many evaluations of some measures against some of its numbers.
#[derive(Clone, Debug)]
pub struct Batch<'c> {
    evaluator: Evaluator<'c>,
    cavity: &'c Cavity,
    varied: Vec<Slot>,
    nominal: Vec<Lanes>,
    is_tied: bool,
    instructions: Instructions,
}

/// What is known of one chunk.
#[derive(Clone, Debug)]
pub struct Chunk {
    /// Values of the varied numbers, all of them for one block after the other.
    pub inputs: Vec<Lanes>,
    /// Values of the measures in SI units, likewise.
    pub values: Vec<Lanes>,
    /// Whether each of them exists.
    pub exists: Vec<LaneMask>,
    /// For each block, whether both planes hold a mode.
    pub stable: Vec<LaneMask>,
    /// For each block, the spacings of transverse modes in free spectral ranges.
    pub spacings: Vec<PerPlane<Lanes>>,
    numbers: Vec<Lanes>,
    workspace: Workspace<Lanes>,
}

impl<'c> Batch<'c> {
    /// Prepares a cavity; `varied` are the only numbers that differ from their nominal values, with
    /// what is tied to them.
    pub fn new(cavity: &'c Cavity, measures: Vec<Measure>, varied: Vec<Slot>) -> Self {
        let nominal = cavity.book().nominal();
        Batch {
            evaluator: Evaluator::new(cavity, measures).varying(&varied),
            cavity,
            varied,
            nominal: nominal.into_iter().map(Lanes::constant).collect(),
            is_tied: !cavity.book().ties().is_empty(),
            instructions: Instructions::Widest,
        }
    }

    /// The same with a choice of instructions.
    pub fn with(self, instructions: Instructions) -> Self {
        Batch {
            instructions,
            ..self
        }
    }

    /// The cavity.
    pub fn cavity(&self) -> &'c Cavity {
        self.cavity
    }

    /// The varied numbers, in the order of the inputs.
    pub fn varied(&self) -> &[Slot] {
        &self.varied
    }

    /// The measures, in the order of the values.
    pub fn measures(&self) -> &[Measure] {
        self.evaluator.measures()
    }

    /// Memory for a chunk.
    pub fn chunk(&self) -> Chunk {
        let measures = self.measures().len();
        Chunk {
            inputs: vec![Lanes::constant(0.0); BLOCKS * self.varied.len()],
            values: vec![Lanes::constant(0.0); BLOCKS * measures],
            exists: vec![Lanes::always(false); BLOCKS * measures],
            stable: vec![Lanes::always(false); BLOCKS],
            spacings: vec![PerPlane::both(Lanes::constant(0.0)); BLOCKS],
            numbers: self.nominal.clone(),
            workspace: Workspace::default(),
        }
    }

    /// Evaluates the first `blocks` blocks of a chunk, whose inputs have been filled in.
    pub fn evaluate(&self, chunk: &mut Chunk, blocks: usize) {
        let run = Run {
            batch: self,
            chunk,
            blocks,
        };
        match self.instructions {
            Instructions::Widest => Arch::new().dispatch(run),
            Instructions::Plain => run.with_simd(pulp::Scalar),
        }
    }
}

/// The loop over blocks, compiled once for each set of instructions.
struct Run<'a, 'c> {
    batch: &'a Batch<'c>,
    chunk: &'a mut Chunk,
    blocks: usize,
}

impl WithSimd for Run<'_, '_> {
    type Output = ();

    #[inline(always)]
    fn with_simd<S: Simd>(self, _: S) {
        let Run {
            batch,
            chunk,
            blocks,
        } = self;
        let inputs = batch.varied.len();
        let outputs = batch.measures().len();
        for block in 0..blocks {
            let given = &chunk.inputs[block * inputs..(block + 1) * inputs];
            for (slot, value) in batch.varied.iter().zip(given) {
                chunk.numbers[slot.index()] = *value;
            }
            if batch.is_tied {
                batch.cavity.book().follow_ties(&mut chunk.numbers);
            }
            let values = &mut chunk.values[block * outputs..(block + 1) * outputs];
            let exists = &mut chunk.exists[block * outputs..(block + 1) * outputs];
            let modes = batch.evaluator.evaluate(
                &chunk.numbers,
                &mut chunk.workspace,
                |index, value, does_exist| {
                    values[index] = value;
                    exists[index] = does_exist;
                },
            );
            chunk.stable[block] = modes.tangential.stable & modes.sagittal.stable;
            chunk.spacings[block] = spectrum::spacings(batch.cavity, &modes);
        }
    }
}
