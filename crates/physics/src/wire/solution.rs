//! The solver: a structure made ready, and its solutions.

use nalgebra::DMatrix;
use num_complex::Complex64;

use super::coupling::{Coupling, Sources};
use super::error::WireError;
use super::fill::{self, Shares};
use super::grading::Fineness;
use super::mesh::{Arm, Mesh};
use super::segment::{EndCurrents, Segment};
use super::skeleton::{End, Skeleton};
use super::structure::{Boundary, Structure};
use crate::constants::wave_number_rad_per_m;

/// A structure with its mesh and everything about it that does not depend on frequency.
#[derive(Clone, Debug)]
pub struct WireModel {
    structure: Structure,
    skeleton: Skeleton,
    highest_hz: f64,
    mesh: Mesh,
    shares: Shares,
    couplings: Vec<Coupling>,
}

/// What a port drives at each unknown, V per V.
impl WireModel {
    /// Makes the mesh for frequencies up to `highest_hz`.
    ///
    /// # Errors
    /// Whatever [`WireError`] names.
    pub fn new(structure: Structure, highest_hz: f64) -> Result<Self, WireError> {
        Self::with_fineness(structure, highest_hz, &Fineness::WORKING)
    }

    pub(super) fn with_fineness(
        structure: Structure,
        highest_hz: f64,
        fineness: &Fineness,
    ) -> Result<Self, WireError> {
        let skeleton = Skeleton::new(&structure)?;
        let mesh = Mesh::new(&structure, &skeleton, fineness, highest_hz)?;
        let shares = Shares::new(&mesh);
        let mut couplings = vec![Coupling::new(&mesh.segments, &mesh.line_of, Sources::Themselves)];
        if structure.boundary == Boundary::Mirror {
            couplings.push(Coupling::new(&mesh.segments, &mesh.line_of, Sources::Images));
        }
        Ok(Self { structure, skeleton, highest_hz, mesh, shares, couplings })
    }

    /// Number of unknown currents.
    #[must_use]
    pub fn unknowns(&self) -> usize {
        self.mesh.unknowns.len()
    }

    /// Segments of the mesh, in the order of [`Solution::end_currents`].
    #[must_use]
    pub fn segments(&self) -> &[Segment] {
        &self.mesh.segments
    }

    /// Solution at one frequency.
    ///
    /// # Errors
    /// A frequency outside the mesh's range.
    pub fn solve(&self, frequency_hz: f64) -> Result<Solution, WireError> {
        let matrix =
            fill::matrix(&self.mesh, &self.shares, &self.couplings, &self.structure.wires, frequency_hz);
        let n = matrix.order;
        let dense = DMatrix::from_fn(n, n, |row, column| matrix.at(row, column));
        let drive = self.drive(frequency_hz);
        let currents = dense
            .lu()
            .solve(&drive)
            .ok_or(WireError::Singular { frequency_hz, residual: 1.0 })?;
        let port_admittance_s = drive.transpose() * &currents;
        Ok(Solution { frequency_hz, port_admittance_s, coefficients: currents })
    }

    fn drive(&self, frequency_hz: f64) -> DMatrix<Complex64> {
        let k = wave_number_rad_per_m(frequency_hz);
        let mut drive = DMatrix::zeros(self.mesh.unknowns.len(), self.structure.ports.len());
        for (index, unknown) in self.mesh.unknowns.iter().enumerate() {
            for &Arm { segment, sign, .. } in unknown.arms.iter().flatten() {
                if let Some(port) = self.mesh.port_of[segment] {
                    // 1/gap·∫sin ks/sin kL ds = tan(kL/2)/(k·gap)
                    let half = 0.5 * k * self.mesh.segments[segment].length_m();
                    drive[(index, port)] += sign * half.tan() / (k * self.structure.ports[port].gap_m);
                }
            }
        }
        drive
    }

    /// Currents at the ends of all segments for given port voltages, peak.
    #[must_use]
    pub fn end_currents(&self, solution: &Solution, port_voltages_v: &[Complex64]) -> Vec<EndCurrents> {
        let mut currents = vec![EndCurrents::default(); self.mesh.segments.len()];
        for (index, unknown) in self.mesh.unknowns.iter().enumerate() {
            let row = solution.coefficients.row(index);
            let ampere: Complex64 = row.iter().zip(port_voltages_v).map(|(i, v)| i * v).sum();
            for &Arm { segment, end, sign } in unknown.arms.iter().flatten() {
                match end {
                    End::From => currents[segment].from_a += sign * ampere,
                    End::To => currents[segment].to_a += sign * ampere,
                }
            }
        }
        currents
    }
}

/// Solution at one frequency.
#[derive(Clone, Debug)]
pub struct Solution {
    /// Frequency, Hz.
    pub frequency_hz: f64,
    /// Admittances between the ports, S: current into port i for one volt at port j, the others shorted.
    pub port_admittance_s: DMatrix<Complex64>,
    /// Unknown currents, A per volt of each port.
    pub(super) coefficients: DMatrix<Complex64>,
}
