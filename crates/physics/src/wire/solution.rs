//! The solver: a structure made ready, and its solutions.

use std::f64::consts::TAU;

use nalgebra::DMatrix;
use num_complex::Complex64;

use super::check::{self, LOWEST_HZ};
use super::coupling::{Coupling, Sources};
use super::error::WireError;
use super::fill::Terms;
use super::grading::Fineness;
use super::mesh::{Arm, Mesh};
use super::panels::Panels;
use super::power::{port_power_w, segment_loss_w};
use super::reflection::{Reflection, add_reflection};
use super::segment::{EndCurrents, Segment};
use super::shapes::Overlaps;
use super::shares::Shares;
use super::skeleton::{End, Skeleton};
use super::structure::{Boundary, Structure, WireShape};
use crate::constants::{SPEED_OF_LIGHT_M_PER_S, VACUUM_IMPEDANCE_OHM, wave_number_rad_per_m};
use crate::earth::{HalfSpace, Reach};

/// A structure with its mesh and everything about it that does not depend on frequency.
#[derive(Clone, Debug)]
pub struct WireModel {
    structure: Structure,
    skeleton: Skeleton,
    highest_hz: f64,
    pub(super) mesh: Mesh,
    pub(super) shares: Shares,
    pub(super) couplings: Vec<Coupling>,
    /// Over soil.
    panels: Option<Panels>,
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
        let wavelength_m = SPEED_OF_LIGHT_M_PER_S / highest_hz;
        let panels = matches!(structure.boundary, Boundary::Soil(_))
            .then(|| Panels::new(&mesh.segments, wavelength_m));
        Ok(Self { structure, skeleton, highest_hz, mesh, shares, couplings, panels })
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

    /// Where kernels of the earth below are told.
    pub(super) fn panels(&self) -> Option<&Panels> {
        self.panels.as_ref()
    }

    /// Solution at one frequency.
    ///
    /// # Errors
    /// A frequency outside the mesh's range; equations without a usable solution.
    pub fn solve(&self, frequency_hz: f64) -> Result<Solution, WireError> {
        match (self.structure.boundary, self.reach()) {
            (Boundary::Soil(soil), Some(reach)) => {
                self.solve_with(frequency_hz, Some(&HalfSpace::for_wires(&soil, frequency_hz, &reach)?))
            }
            _ => self.solve_with(frequency_hz, None),
        }
    }

    /// Distances that kernels of the soil below are needed for; `None` over no soil.
    #[must_use]
    pub fn reach(&self) -> Option<Reach> {
        self.panels.as_ref().map(Panels::reach)
    }

    /// Solution at one frequency over soil whose kernels have been made ready, within [`WireModel::reach`].
    ///
    /// # Errors
    /// As [`WireModel::solve`].
    pub fn solve_over(&self, frequency_hz: f64, reflection: &dyn Reflection) -> Result<Solution, WireError> {
        self.solve_with(frequency_hz, Some(reflection))
    }

    fn solve_with(
        &self,
        frequency_hz: f64,
        reflection: Option<&dyn Reflection>,
    ) -> Result<Solution, WireError> {
        if !(LOWEST_HZ..=self.highest_hz * (1.0 + 1e-9)).contains(&frequency_hz) {
            let (lowest_hz, highest_hz) = (LOWEST_HZ, self.highest_hz);
            return Err(WireError::FrequencyOutOfRange { frequency_hz, lowest_hz, highest_hz });
        }
        let k = wave_number_rad_per_m(frequency_hz);
        // Everything over jkη/4π
        let scale_s = Complex64::new(0.0, -2.0 * TAU / (k * VACUUM_IMPEDANCE_OHM));
        let own = self.own_impedances(scale_s, frequency_hz);
        let terms =
            Terms { mesh: &self.mesh, shares: &self.shares, couplings: &self.couplings, own: &own, k };
        let mut matrix = terms.matrix();
        if let (Some(panels), Some(reflection)) = (&self.panels, reflection) {
            add_reflection(&mut matrix, &self.mesh, panels, k, reflection);
        }
        let drive = self.drive(k);
        let (solution, residual) =
            matrix.solve(&drive).ok_or(WireError::Singular { frequency_hz, residual: f64::INFINITY })?;
        if residual.is_nan() || residual > LARGEST_RESIDUAL {
            return Err(WireError::Singular { frequency_hz, residual });
        }
        let coefficients_a_per_v = solution * scale_s;
        let port_admittance_s = drive.map(Complex64::from).tr_mul(&coefficients_a_per_v);
        Ok(Solution { frequency_hz, port_admittance_s, coefficients_a_per_v })
    }

    /// Metal and cover of each segment, times `scale_s`: at each end, and between its ends.
    fn own_impedances(&self, scale_s: Complex64, frequency_hz: f64) -> Vec<[Complex64; 2]> {
        let k = wave_number_rad_per_m(frequency_hz);
        let per_wire: Vec<[Complex64; 2]> = self
            .structure
            .wires
            .iter()
            .map(|WireShape { material, radius_m, .. }| {
                let series = material.series_impedance_ohm_per_m(*radius_m, frequency_hz);
                // −δ/(jω) on the charges
                let cover = material.insulation.map_or(0.0, |cover| cover.elastance_m_per_f(*radius_m));
                [series * scale_s, Complex64::new(0.0, cover / (TAU * frequency_hz)) * scale_s]
            })
            .collect();
        let own = |(segment, &wire): (&Segment, &usize)| {
            let length_m = segment.length_m();
            let [metal, cover] = per_wire[wire];
            let overlaps = Overlaps::new(k, length_m);
            std::array::from_fn(|index| {
                metal * overlaps.current_m[index] + cover * overlaps.slope_per_m[index]
            })
        };
        self.mesh.segments.iter().zip(&self.mesh.wire_of).map(own).collect()
    }

    /// Volts along the wire that each unknown sees per volt of each port.
    pub(super) fn drive(&self, k: f64) -> DMatrix<f64> {
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

/// Largest part of a port's voltage that a solution may leave unexplained.
const LARGEST_RESIDUAL: f64 = 1e-6;

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
