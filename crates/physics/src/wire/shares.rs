//! Which unknowns have a share in the current at which end of which segment.

use num_complex::Complex64;

use super::fill::{BEGINNING, Blocks, END};
use super::mesh::{Arm, Mesh};
use super::skeleton::End;
use super::symmetric::Symmetric;

/// Unknowns by the ends of segments.
#[derive(Clone, Debug)]
pub(super) struct Shares {
    /// Unknown of a run at the beginning and end of each segment; its sign is +1.
    in_runs: Vec<[Option<usize>; 2]>,
    /// Shares of the joints' unknowns, by segment.
    at_joints: Vec<JointShare>,
}

/// A joint's unknown at the end of a segment.
#[derive(Clone, Copy, Debug)]
struct JointShare {
    segment: usize,
    end: usize,
    unknown: usize,
    sign: f64,
}

impl Shares {
    pub fn new(mesh: &Mesh) -> Self {
        let of_runs: usize = mesh.runs.iter().map(|run| run.unknowns).sum();
        let mut shares = Self { in_runs: vec![[None; 2]; mesh.segments.len()], at_joints: Vec::new() };
        for (unknown, arms) in mesh.unknowns.iter().map(|unknown| unknown.arms).enumerate() {
            for &Arm { segment, end, sign } in arms.iter().flatten() {
                let end = if end == End::From { BEGINNING } else { END };
                if unknown < of_runs {
                    shares.in_runs[segment][end] = Some(unknown);
                } else {
                    shares.at_joints.push(JointShare { segment, end, unknown, sign });
                }
            }
        }
        shares.at_joints.sort_by_key(|share| share.segment);
        shares
    }

    /// Unknown of a run at an end of a segment.
    #[inline(always)]
    pub fn in_run(&self, segment: usize, end: usize) -> Option<usize> {
        self.in_runs[segment][end]
    }

    /// Adds a segment's couplings that involve the unknowns of joints.
    pub fn add_joints(&self, matrix: &mut Symmetric, mesh: &Mesh, row: usize, blocks: &Blocks) {
        let before = self.at_joints.partition_point(|share| share.segment < row);
        let own = self.at_joints[before..].iter().take_while(|share| share.segment == row);
        for share in own.clone() {
            // With the unknowns of runs up to this segment.
            for run in &mesh.runs {
                let Some(last) = row.checked_sub(run.first_segment) else { continue };
                for index in 0..run.unknowns.min(last + 1) {
                    let segment = run.first_segment + index;
                    let mut sum = blocks.at(share.end, END, segment);
                    if segment < row {
                        sum += blocks.at(share.end, BEGINNING, segment + 1);
                    }
                    matrix.add(share.unknown, run.first_unknown + index, share.sign * sum);
                }
            }
            // With joints' unknowns on this segment, each pair once, and on those before it.
            for other in own.clone().filter(|other| other.unknown <= share.unknown) {
                let value = blocks.at(share.end, other.end, row);
                matrix.add(share.unknown, other.unknown, share.sign * other.sign * value);
            }
            for other in &self.at_joints[..before] {
                // The unknown's own two arms act on each other both ways.
                let ways = if other.unknown == share.unknown { 2.0 } else { 1.0 };
                let value: Complex64 = blocks.at(share.end, other.end, other.segment);
                matrix.add(share.unknown, other.unknown, ways * share.sign * other.sign * value);
            }
        }
        for other in &self.at_joints[..before] {
            for end in [BEGINNING, END] {
                if let Some(unknown) = self.in_run(row, end) {
                    matrix.add(unknown, other.unknown, other.sign * blocks.at(end, other.end, other.segment));
                }
            }
        }
    }
}
