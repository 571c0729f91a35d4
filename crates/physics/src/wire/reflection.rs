//! What a boundary gives back of the wires' currents and charges, as kernels beside the free-space one.
//!
//! The matrix is made of mixed potentials: the vector potential of currents tested by currents, the scalar potential of
//! charges tested by charges. Anything that adds to the two potentials and varies no faster along the wires than an image
//! two heights away enters here: the kernels of a lossy half-space, for one (Michalski & Zheng, IEEE Trans. AP-38, 1990,
//! formulation C, keeps one scalar potential for all directions of current; from memory).

use num_complex::Complex64;
use pulp::{Arch, Simd, WithSimd};

use super::lanes::{Lanes, PAD, padded};
use super::mesh::Mesh;
use super::panels::{MOST_NODES, Panels, Span};
use super::shapes::Shapes;
use super::skeleton::End;
use super::symmetric::Symmetric;

/// A point of a wire's axis and the direction of its current.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Element {
    /// Position, m.
    pub position_m: [f64; 3],
    /// Unit vector along the wire.
    pub direction: [f64; 3],
}

/// Kernels between two elements, 1/m: what stands beside e^(−jkR)/R of free space.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Kernel {
    /// Vector potential of the source's current along the test's direction, the angle between them included.
    pub current: Complex64,
    /// Scalar potential of the source's charge.
    pub charge: Complex64,
}

/// A boundary at one frequency.
///
/// Kernels must be reciprocal: the same with test and source exchanged. They are asked for at nodes so near to each other
/// that an image two heights away is smooth between them.
pub trait Reflection {
    /// Fills in the kernels of one test with all sources; both slices have the same length.
    fn kernels(&self, test: &Element, sources: &[Element], kernels: &mut [Kernel]);
}

/// Adds to a matrix what a boundary gives back: X·K·Xᵀ, with X what each unknown is at the nodes and K the kernels
/// between them.
pub(super) fn add_reflection(
    matrix: &mut Symmetric,
    mesh: &Mesh,
    panels: &Panels,
    k: f64,
    reflection: &dyn Reflection,
) {
    let kernels = NodeKernels::new(panels, reflection);
    let patches = Patches::new(mesh, panels, k);
    let products = Products::new(&kernels, &patches);
    Arch::new().dispatch(Add { matrix, patches: &patches, products: &products });
}

/// Kernels between all nodes: rows of both triangles, padded; current's real and imaginary part, then charge's.
struct NodeKernels {
    width: usize,
    parts: [Vec<f64>; 4],
}

impl NodeKernels {
    fn new(panels: &Panels, reflection: &dyn Reflection) -> Self {
        let nodes = &panels.nodes;
        let width = padded(nodes.len());
        let mut parts: [Vec<f64>; 4] = std::array::from_fn(|_| vec![0.0; width * nodes.len()]);
        let mut row_kernels = vec![Kernel::default(); nodes.len()];
        for (row, test) in nodes.iter().enumerate() {
            let kernels = &mut row_kernels[..=row];
            reflection.kernels(test, &nodes[..=row], kernels);
            for (column, Kernel { current, charge }) in kernels.iter().enumerate() {
                for (part, value) in parts.iter_mut().zip([current.re, current.im, charge.re, charge.im]) {
                    part[width * row + column] = value;
                    part[width * column + row] = value;
                }
            }
        }
        Self { width, parts }
    }
}

/// Unknowns at the nodes of panels.
struct Patches {
    /// Those of each unknown, after one another.
    patches: Vec<Patch>,
    /// Where those of each unknown begin; one more for the end.
    begins: Vec<usize>,
}

/// An unknown at the nodes of one panel: of its current and of its k⁻¹·dI/ds.
#[derive(Clone, Copy)]
struct Patch {
    first_node: usize,
    nodes: usize,
    current_m: [f64; MOST_NODES],
    slope_m: [f64; MOST_NODES],
}

impl Patches {
    fn new(mesh: &Mesh, panels: &Panels, k: f64) -> Self {
        let shapes: Vec<Shapes> =
            mesh.segments.iter().map(|segment| Shapes::new(k, segment.length_m())).collect();
        let mut patches: Vec<Patch> = Vec::with_capacity(2 * mesh.unknowns.len());
        let mut begins = vec![0];
        for unknown in &mesh.unknowns {
            let begin = patches.len();
            for arm in unknown.arms.iter().flatten() {
                let end = usize::from(arm.end == End::To);
                for span in panels.spans(arm.segment) {
                    let weights = span.weights(&shapes[arm.segment]);
                    let patch = patch_of(&mut patches, begin, span);
                    for node in 0..span.nodes {
                        patch.current_m[node] += arm.sign * weights.current_m[end][node];
                        patch.slope_m[node] += arm.sign * weights.slope_m[end][node];
                    }
                }
            }
            begins.push(patches.len());
        }
        Self { patches, begins }
    }

    fn unknowns(&self) -> usize {
        self.begins.len() - 1
    }

    fn of(&self, unknown: usize) -> &[Patch] {
        &self.patches[self.begins[unknown]..self.begins[unknown + 1]]
    }
}

/// The patch of a span's panel among those from `begin` on.
fn patch_of<'a>(patches: &'a mut Vec<Patch>, begin: usize, span: &Span) -> &'a mut Patch {
    let found = patches[begin..].iter().position(|patch| patch.first_node == span.first_node);
    let index = found.map_or(patches.len(), |found| begin + found);
    if found.is_none() {
        let (first_node, nodes) = (span.first_node, span.nodes);
        patches.push(Patch { first_node, nodes, current_m: [0.0; MOST_NODES], slope_m: [0.0; MOST_NODES] });
    }
    &mut patches[index]
}

/// K·Xᵀ: a row for each node, a column for each unknown, padded; parts as in [`NodeKernels`].
struct Products {
    width: usize,
    parts: [Vec<f64>; 4],
}

impl Products {
    fn new(kernels: &NodeKernels, patches: &Patches) -> Self {
        let unknowns = patches.unknowns();
        let nodes = kernels.parts[0].len() / kernels.width.max(1);
        let width = padded(unknowns);
        let mut products = Self { width, parts: std::array::from_fn(|_| vec![0.0; width * nodes]) };
        Arch::new().dispatch(Multiply { kernels, patches, products: &mut products });
        products
    }
}

struct Multiply<'a> {
    kernels: &'a NodeKernels,
    patches: &'a Patches,
    products: &'a mut Products,
}

impl WithSimd for Multiply<'_> {
    type Output = ();

    #[inline(always)]
    fn with_simd<S: Simd>(self, simd: S) {
        let Self { kernels, patches, products } = self;
        let nodes = kernels.parts[0].len() / kernels.width.max(1);
        let mut sum = vec![0.0; kernels.width];
        for part in 0..4 {
            for unknown in 0..patches.unknowns() {
                sum.fill(0.0);
                for patch in patches.of(unknown) {
                    let weights = if part < 2 { &patch.current_m } else { &patch.slope_m };
                    let rows =
                        kernels.parts[part][kernels.width * patch.first_node..].chunks_exact(kernels.width);
                    for (row, weight) in rows.zip(&weights[..patch.nodes]) {
                        add_scaled(simd, &mut sum, row, *weight);
                    }
                }
                for (node, value) in sum[..nodes].iter().enumerate() {
                    products.parts[part][products.width * node + unknown] = *value;
                }
            }
        }
    }
}

/// sum ← sum + weight·row
#[inline(always)]
fn add_scaled<S: Simd>(simd: S, sum: &mut [f64], row: &[f64], weight: f64) {
    let (sum, _) = S::as_mut_simd_f64s(sum);
    let (row, _) = S::as_simd_f64s(row);
    let weight = Lanes::splat(simd, weight);
    for (sum, row) in sum.iter_mut().zip(row) {
        *sum = Lanes::new(simd, *row).times_plus(weight, Lanes::new(simd, *sum)).value;
    }
}

struct Add<'a> {
    matrix: &'a mut Symmetric,
    patches: &'a Patches,
    products: &'a Products,
}

impl WithSimd for Add<'_> {
    type Output = ();

    #[inline(always)]
    fn with_simd<S: Simd>(self, simd: S) {
        let Self { matrix, patches, products } = self;
        for unknown in 0..patches.unknowns() {
            let length = padded(unknown + 1);
            let at = matrix.index(unknown, 0);
            for patch in patches.of(unknown) {
                for node in 0..patch.nodes {
                    let begin = products.width * (patch.first_node + node);
                    let row = |part: usize| &products.parts[part][begin..begin + length];
                    let (current, slope) = (patch.current_m[node], -patch.slope_m[node]);
                    let (re, im) = (&mut matrix.re[at..at + length], &mut matrix.im[at..at + length]);
                    add_both(simd, re, [row(0), row(2)], [current, slope]);
                    add_both(simd, im, [row(1), row(3)], [current, slope]);
                }
            }
        }
    }
}

/// sum ← sum + w₁·row₁ + w₂·row₂
#[inline(always)]
fn add_both<S: Simd>(simd: S, sum: &mut [f64], [one, two]: [&[f64]; 2], [w_one, w_two]: [f64; 2]) {
    let (sum, _) = S::as_mut_simd_f64s(sum);
    let (one, _) = S::as_simd_f64s(one);
    let (two, _) = S::as_simd_f64s(two);
    let (w_one, w_two) = (Lanes::splat(simd, w_one), Lanes::splat(simd, w_two));
    for ((sum, one), two) in sum.iter_mut().zip(one).zip(two) {
        let first = Lanes::new(simd, *one).times_plus(w_one, Lanes::new(simd, *sum));
        *sum = Lanes::new(simd, *two).times_plus(w_two, first).value;
    }
}

const _: () = assert!(MOST_NODES <= PAD);

#[cfg(test)]
mod tests {
    use super::*;
    use crate::constants::wave_number_rad_per_m;
    use crate::earth::Soil;
    use crate::wire::{Boundary, Material, PortPlace, Structure, WireModel, WireShape};

    /// The mirror, told as a reflection.
    struct Image {
        k: f64,
    }

    impl Reflection for Image {
        fn kernels(&self, test: &Element, sources: &[Element], kernels: &mut [Kernel]) {
            for (source, kernel) in sources.iter().zip(kernels) {
                let ([x, y, z], [u, v, w]) = (test.position_m, source.position_m);
                let r = ((x - u).powi(2) + (y - v).powi(2) + (z + w).powi(2)).sqrt();
                let wave = Complex64::cis(-self.k * r) / r;
                let ([x, y, z], [u, v, w]) = (test.direction, source.direction);
                *kernel = Kernel { current: -(x * u + y * v - z * w) * wave, charge: -wave };
            }
        }
    }

    /// Admittance of a shape over the mirror told as a reflection, over the mirror, and in free space.
    fn admittances(vertices_m: &[[f64; 3]], frequency_hz: f64) -> [Complex64; 3] {
        let image = Image { k: wave_number_rad_per_m(frequency_hz) };
        let soil = Boundary::Soil(Soil { relative_permittivity: 1.0, conductivity_s_per_m: 0.0 });
        let model = |boundary| {
            let structure = Structure {
                wires: vec![WireShape {
                    vertices_m: vertices_m.to_vec(),
                    radius_m: 1e-3,
                    material: Material::PERFECT,
                }],
                ports: vec![PortPlace { wire: 0, arc_m: 6.0, gap_m: 0.02 }],
                boundary,
            };
            WireModel::new(structure, frequency_hz).unwrap()
        };
        let told = model(soil).solve_over(frequency_hz, &image);
        let [mirror, free] =
            [Boundary::Mirror, Boundary::FreeSpace].map(|boundary| model(boundary).solve(frequency_hz));
        [told, mirror, free].map(|solution| solution.unwrap().port_admittance_s[(0, 0)])
    }

    #[test]
    fn mirror_told_as_a_reflection_is_the_mirror() {
        // A bent wire, low level ones from 0.005 to 0.1 wavelengths, an upright and a sloping one down to a foot. The
        // lowest resonates so sharply that the quadrature of the images' own near terms shows.
        for (vertices_m, tolerance) in [
            (vec![[-8.0, 0.0, 5.0], [0.0, 0.0, 10.0], [2.0, 6.0, 4.0]], 1e-6),
            (vec![[-8.0, 0.0, 2.1], [9.0, 0.0, 2.1]], 1e-4),
            (vec![[-8.0, 0.0, 0.5], [9.0, 0.0, 0.5]], 1e-4),
            (vec![[-8.0, 0.0, 0.1], [9.0, 0.0, 0.1]], 1e-3),
            (vec![[0.0, 0.0, 0.3], [0.0, 0.0, 11.0]], 1e-4),
            (vec![[0.0, 0.0, 0.3], [7.0, 1.0, 11.0]], 1e-4),
        ] {
            let [told, expected, alone] = admittances(&vertices_m, 14e6);
            let error = (told - expected).norm() / expected.norm();
            assert!(error < tolerance, "{vertices_m:?}: {told} for {expected}");
            assert!((alone - expected).norm() > 0.01 * expected.norm(), "the mirror must matter");
        }
    }
}
