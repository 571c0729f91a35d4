//! The solver: a structure made ready, and its solutions.

use nalgebra::DMatrix;
use num_complex::Complex64;

use super::check::{self, LOWEST_HZ};
use super::coupling::{Coupling, Sources};
use super::error::WireError;
use super::fill::{self, Shares};
use super::grading::Fineness;
use super::mesh::{Arm, Mesh};
use super::power::{port_power_w, segment_loss_w};
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

impl WireModel {
    /// Makes the mesh for frequencies up to `highest_hz`.
    ///
    /// # Errors
    /// Whatever [`WireError`] names.
    pub fn new(structure: Structure, highest_hz: f64) -> Result<Self, WireError> {
        check::check(&structure, highest_hz)?;
        let skeleton = Skeleton::new(&structure)?;
        Self::meshed(structure, skeleton, highest_hz, &Fineness::WORKING)
    }

    /// The same structure on a finer mesh: the difference of the answers tells the mesh's error.
    ///
    /// # Errors
    /// A mesh of too many unknowns.
    pub fn refined(&self) -> Result<Self, WireError> {
        Self::meshed(self.structure.clone(), self.skeleton.clone(), self.highest_hz, &Fineness::REFINED)
    }

    fn meshed(
        structure: Structure,
        skeleton: Skeleton,
        highest_hz: f64,
        fineness: &Fineness,
    ) -> Result<Self, WireError> {
        let mesh = Mesh::new(&structure, &skeleton, fineness, highest_hz)?;
        let shares = Shares::new(&mesh);
        let mut couplings = vec![Coupling::new(&mesh.segments, &mesh.line_of, Sources::Themselves)];
        if structure.boundary == Boundary::Mirror {
            couplings.push(Coupling::new(&mesh.segments, &mesh.line_of, Sources::Images));
        }
        Ok(Self { structure, skeleton, highest_hz, mesh, shares, couplings })
    }

    /// The structure.
    #[must_use]
    pub fn structure(&self) -> &Structure {
        &self.structure
    }

    /// Highest frequency of the mesh, Hz.
    #[must_use]
    pub fn highest_hz(&self) -> f64 {
        self.highest_hz
    }

    /// Number of unknown currents.
    #[must_use]
    pub fn unknowns(&self) -> usize {
        self.mesh.unknowns.len()
    }

    /// Segments of the mesh, in the order of [`WireModel::end_currents`].
    #[must_use]
    pub fn segments(&self) -> &[Segment] {
        &self.mesh.segments
    }

    /// Index of the wire that each segment belongs to.
    #[must_use]
    pub fn wire_of_segment(&self) -> &[usize] {
        &self.mesh.wire_of
    }

    /// Index of the port whose gap each segment lies in.
    #[must_use]
    pub fn port_of_segment(&self) -> &[Option<usize>] {
        &self.mesh.port_of
    }

    /// Solution at one frequency.
    ///
    /// # Errors
    /// A frequency outside the mesh's range; equations without a usable solution.
    pub fn solve(&self, frequency_hz: f64) -> Result<Solution, WireError> {
        if !(LOWEST_HZ..=self.highest_hz * (1.0 + 1e-9)).contains(&frequency_hz) {
            let (lowest_hz, highest_hz) = (LOWEST_HZ, self.highest_hz);
            return Err(WireError::FrequencyOutOfRange { frequency_hz, lowest_hz, highest_hz });
        }
        let matrix =
            fill::matrix(&self.mesh, &self.shares, &self.couplings, &self.structure.wires, frequency_hz);
        let n = matrix.order;
        let dense = DMatrix::from_fn(n, n, |row, column| matrix.at(row, column));
        let drive = self.drive(frequency_hz);
        let coefficients_a_per_v =
            dense.lu().solve(&drive).ok_or(WireError::Singular { frequency_hz, residual: 1.0 })?;
        let port_admittance_s = drive.transpose() * &coefficients_a_per_v;
        Ok(Solution { frequency_hz, port_admittance_s, coefficients_a_per_v })
    }

    /// Volts along the wire that each unknown sees per volt of each port.
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

    /// Currents at the ends of all segments, A peak, for given peak voltages of the ports.
    ///
    /// `coefficients_a_per_v` is that of a [`Solution`] or one interpolated between solutions.
    #[must_use]
    pub fn end_currents(
        &self,
        coefficients_a_per_v: &DMatrix<Complex64>,
        port_voltages_v: &[Complex64],
    ) -> Vec<EndCurrents> {
        let mut currents = vec![EndCurrents::default(); self.mesh.segments.len()];
        for (index, unknown) in self.mesh.unknowns.iter().enumerate() {
            let row = coefficients_a_per_v.row(index);
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

    /// Power lost in the metal of each segment, W.
    #[must_use]
    pub fn wire_loss_w(&self, currents: &[EndCurrents], frequency_hz: f64) -> Vec<f64> {
        let resistance_ohm_per_m: Vec<f64> = self
            .structure
            .wires
            .iter()
            .map(|wire| wire.material.series_impedance_ohm_per_m(wire.radius_m, frequency_hz).re)
            .collect();
        self.mesh
            .segments
            .iter()
            .zip(currents)
            .zip(&self.mesh.wire_of)
            .map(|((segment, currents), &wire)| {
                segment_loss_w(segment, currents, resistance_ohm_per_m[wire], frequency_hz)
            })
            .collect()
    }
}

/// Solution at one frequency.
#[derive(Clone, Debug, PartialEq)]
pub struct Solution {
    /// Frequency, Hz.
    pub frequency_hz: f64,
    /// Admittances between the ports, S: current into port i for one volt at port j, the others shorted.
    pub port_admittance_s: DMatrix<Complex64>,
    /// Currents of the unknowns (rows), A per volt of each port (columns); [`WireModel::end_currents`] gives them
    /// their places.
    pub coefficients_a_per_v: DMatrix<Complex64>,
}

impl Solution {
    /// Power into each port, W, for peak voltages: positive where power enters the wires.
    #[must_use]
    pub fn port_powers_w(&self, port_voltages_v: &[Complex64]) -> Vec<f64> {
        let current = |port: usize| -> Complex64 {
            self.port_admittance_s.row(port).iter().zip(port_voltages_v).map(|(y, v)| y * v).sum()
        };
        port_voltages_v.iter().enumerate().map(|(port, &v)| port_power_w(v, current(port))).collect()
    }
}

/// How far the answers of a mesh are from those of a refined one: the largest |ΔY| over the largest |Y|.
#[must_use]
pub fn mesh_error(working: &Solution, refined: &Solution) -> f64 {
    let largest = |matrix: &DMatrix<Complex64>| matrix.iter().map(|y| y.norm()).fold(0.0, f64::max);
    largest(&(&working.port_admittance_s - &refined.port_admittance_s))
        / largest(&refined.port_admittance_s).max(f64::MIN_POSITIVE)
}
