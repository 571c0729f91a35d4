//! What the solver refuses, and why.

use crate::earth::EarthError;

/// A structure that the solver cannot take, or a frequency outside its range.
///
/// Wires and ports are numbered from 1 in the sentences, from 0 in the fields.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum WireError {
    /// A figure that is not finite or outside its range.
    #[error("{quantity} is {value}; accepted is {accepted}")]
    OutOfRange {
        /// Name of the figure, with its unit.
        quantity: &'static str,
        /// The figure given.
        value: f64,
        /// What would be accepted.
        accepted: &'static str,
    },
    /// A soil, frequency or distance that the earth's kernels are not made for.
    #[error("the earth: {0}")]
    Earth(#[from] EarthError),
    /// A wire of fewer than two vertices.
    #[error("wire {} has {vertices} vertices; a wire needs at least two", wire + 1)]
    TooFewVertices {
        /// Index of the wire.
        wire: usize,
        /// Number of vertices given.
        vertices: usize,
    },
    /// Two vertices at one point, one after the other.
    #[error(
        "wire {} has zero length from vertex {} to the next: they are {length_m} m apart, at least {shortest_m} m is accepted",
        wire + 1,
        vertex + 1
    )]
    ZeroLength {
        /// Index of the wire.
        wire: usize,
        /// Index of the stretch's first vertex.
        vertex: usize,
        /// Distance of the vertices, m.
        length_m: f64,
        /// Shortest stretch accepted, m.
        shortest_m: f64,
    },
    /// Radius too large for a stretch between two vertices.
    #[error(
        "wire {} is too thick for its stretch from vertex {}: radius {radius_m} m, at most {largest_m} m for {length_m} m",
        wire + 1,
        vertex + 1
    )]
    TooThickForStretch {
        /// Index of the wire.
        wire: usize,
        /// Index of the stretch's first vertex.
        vertex: usize,
        /// Radius, m.
        radius_m: f64,
        /// Length of the stretch, m.
        length_m: f64,
        /// Largest radius for this length, m.
        largest_m: f64,
    },
    /// Radius too large for the wavelength.
    #[error("wire {} is too thick for {frequency_hz} Hz: radius {radius_m} m, at most {largest_m} m", wire + 1)]
    TooThickForWavelength {
        /// Index of the wire.
        wire: usize,
        /// Radius, m.
        radius_m: f64,
        /// Largest radius at this frequency, m.
        largest_m: f64,
        /// Frequency, Hz.
        frequency_hz: f64,
    },
    /// Two stretches of wire that meet or nearly meet away from their ends.
    #[error(
        "wires {} and {} cross or touch without being joined: their axes come within {distance_m} m near ({}, {}, {}) m",
        wires[0] + 1,
        wires[1] + 1,
        at_m[0],
        at_m[1],
        at_m[2]
    )]
    TouchWithoutJoint {
        /// Indices of the wires.
        wires: [usize; 2],
        /// Smallest distance between the axes, m.
        distance_m: f64,
        /// Where on the first wire, m.
        at_m: [f64; 3],
    },
    /// Two stretches that leave one point in nearly the same direction.
    #[error("wires {} and {} leave their joint only {angle_deg}° apart and lie in each other", wires[0] + 1, wires[1] + 1)]
    FoldedBack {
        /// Indices of the wires.
        wires: [usize; 2],
        /// Angle between the stretches, degrees.
        angle_deg: f64,
    },
    /// A wire that reaches the mirror or goes through it.
    #[error(
        "wire {} goes into the earth or lies on it: its axis comes down to {height_m} m, at least {lowest_m} m is accepted except at an end on its surface",
        wire + 1
    )]
    ThroughMirror {
        /// Index of the wire.
        wire: usize,
        /// Lowest height of the axis, m.
        height_m: f64,
        /// Lowest height accepted, m.
        lowest_m: f64,
    },
    /// Nothing to feed: no wires, or no ports.
    #[error("there is nothing to feed: {wires} wires and {ports} ports")]
    NothingToFeed {
        /// Number of wires.
        wires: usize,
        /// Number of ports.
        ports: usize,
    },
    /// A port on a wire that does not exist.
    #[error("port {} names wire {}, but there are {wires}", port + 1, wire + 1)]
    NoSuchWire {
        /// Index of the port.
        port: usize,
        /// Index of the wire it names.
        wire: usize,
        /// Number of wires.
        wires: usize,
    },
    /// A port beyond its wire or on an open end.
    #[error(
        "port {} is on an open end of wire {}: at {arc_m} m of {length_m} m; its gap of {gap_m} m must lie within the wire",
        port + 1,
        wire + 1
    )]
    PortOnOpenEnd {
        /// Index of the port.
        port: usize,
        /// Index of the wire.
        wire: usize,
        /// Place on the wire, m.
        arc_m: f64,
        /// Length of the wire, m.
        length_m: f64,
        /// Width of the gap, m.
        gap_m: f64,
    },
    /// Two ports in one place.
    #[error("ports {} and {} overlap", ports[0] + 1, ports[1] + 1)]
    PortsOverlap {
        /// Indices of the ports.
        ports: [usize; 2],
    },
    /// More unknowns than a direct solution should meet.
    #[error("the wires need {unknowns} unknowns at {frequency_hz} Hz; at most {most} are accepted")]
    TooLarge {
        /// Unknowns of the mesh.
        unknowns: usize,
        /// Most unknowns accepted.
        most: usize,
        /// Highest frequency of the mesh, Hz.
        frequency_hz: f64,
    },
    /// A frequency above the one that the mesh was made for.
    #[error("{frequency_hz} Hz is outside the range of this mesh, {lowest_hz} to {highest_hz} Hz")]
    FrequencyOutOfRange {
        /// Frequency asked for, Hz.
        frequency_hz: f64,
        /// Lowest frequency, Hz.
        lowest_hz: f64,
        /// Frequency that the mesh was made for, Hz.
        highest_hz: f64,
    },
    /// The equations have no usable solution.
    #[error("the equations at {frequency_hz} Hz could not be solved: relative residual {residual}")]
    Singular {
        /// Frequency, Hz.
        frequency_hz: f64,
        /// Relative residual.
        residual: f64,
    },
}
