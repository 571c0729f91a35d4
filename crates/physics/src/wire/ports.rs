//! Loads attached to the ports after the wires are solved.

use nalgebra::DMatrix;
use num_complex::Complex64;

use super::error::WireError;
use super::load::Termination;

/// A port's part in a loaded structure.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum PortUse {
    /// Something is fed here; its voltage is given.
    Fed,
    /// Closed with a load.
    Closed(Termination),
}

/// An N-port whose loads are attached.
#[derive(Clone, Debug, PartialEq)]
pub struct Loaded {
    /// Admittances between the fed ports, S, in the order of their indices.
    pub admittance_s: DMatrix<Complex64>,
    /// Voltages of all ports (rows) per volt at each fed port (columns).
    pub voltage_ratio: DMatrix<Complex64>,
}

/// Attaches loads: the fed ports remain.
///
/// `admittance_s` is the N-port of [`super::Solution::port_admittance_s`] or one interpolated between solutions.
///
/// # Errors
/// Loads that resonate without loss against the wires, so that a voltage would be infinite.
///
/// # Panics
/// If there are not as many uses as ports.
pub fn attach(
    admittance_s: &DMatrix<Complex64>,
    uses: &[PortUse],
    frequency_hz: f64,
) -> Result<Loaded, WireError> {
    let ports = admittance_s.nrows();
    assert_eq!(ports, uses.len(), "one use per port");
    let fed: Vec<usize> = (0..ports).filter(|&port| uses[port] == PortUse::Fed).collect();
    // Each port is one row of  α·V + β·I = fed voltage  with  I = Y·V:
    // fed  V = V₀,   closed with Z  V + Z·I = 0,   open  I = 0.  Rows are scaled to size one.
    let mut equations = DMatrix::zeros(ports, ports);
    let mut drive = DMatrix::zeros(ports, fed.len());
    let scale_s = admittance_s.iter().map(|y| y.norm()).fold(f64::MIN_POSITIVE, f64::max);
    for (port, port_use) in uses.iter().enumerate() {
        let (alpha, beta) = match port_use {
            PortUse::Fed => (Complex64::ONE, Complex64::ZERO),
            PortUse::Closed(Termination::Impedance(ohm)) => {
                let size = 1.0 + ohm.norm() * scale_s;
                (Complex64::from(size.recip()), ohm / size)
            }
            PortUse::Closed(Termination::Open) => (Complex64::ZERO, Complex64::from(scale_s.recip())),
        };
        for other in 0..ports {
            equations[(port, other)] = beta * admittance_s[(port, other)];
        }
        equations[(port, port)] += alpha;
    }
    for (column, &port) in fed.iter().enumerate() {
        drive[(port, column)] = Complex64::ONE;
    }
    let voltage_ratio =
        equations.lu().solve(&drive).ok_or(WireError::Singular { frequency_hz, residual: 1.0 })?;
    let all = admittance_s * &voltage_ratio;
    let admittance_s = DMatrix::from_fn(fed.len(), fed.len(), |row, column| all[(fed[row], column)]);
    Ok(Loaded { admittance_s, voltage_ratio })
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Two ports with a series impedance between them and one to ground each.
    fn pi(a: Complex64, series: Complex64, b: Complex64) -> DMatrix<Complex64> {
        let (ya, ys, yb) = (a.inv(), series.inv(), b.inv());
        DMatrix::from_row_slice(2, 2, &[ya + ys, -ys, -ys, yb + ys])
    }

    #[test]
    fn loads_do_what_circuit_theory_says() {
        let (a, series, b) =
            (Complex64::new(50.0, 10.0), Complex64::new(5.0, 80.0), Complex64::new(30.0, -40.0));
        let y = pi(a, series, b);
        let parallel = |x: Complex64, y: Complex64| (x.inv() + y.inv()).inv();
        let load = Complex64::new(20.0, 100.0);
        for (termination, far) in [
            (Termination::Impedance(load), parallel(b, load)),
            (Termination::SHORT, Complex64::ZERO),
            (Termination::Open, b),
        ] {
            let loaded = attach(&y, &[PortUse::Fed, PortUse::Closed(termination)], 1e6).unwrap();
            let expected = parallel(a, series + far);
            assert!((loaded.admittance_s[(0, 0)].inv() - expected).norm() < 1e-12 * expected.norm());
            let ratio = far / (far + series);
            assert!((loaded.voltage_ratio[(1, 0)] - ratio).norm() < 1e-12);
        }
    }
}
