//! E and H above soil.
//!
//! The wires' own field in closed form, and that of what the soil gives back from its potentials: E = −jωA − ∇Φ,
//! H = (1/µ₀)·∇×A. They are told by four functions of the horizontal distance ρ and the sum ζ of both heights
//! ([`crate::earth`]), of which the images in static fields are differentiated as they stand and the smooth rest by
//! differences.

use std::f64::consts::{PI, TAU};

use num_complex::Complex64;

use super::near::{NearField, NearFieldSource};
use super::space::Vec3;
use crate::constants::{SPEED_OF_LIGHT_M_PER_S, VACUUM_IMPEDANCE_OHM, VACUUM_PERMITTIVITY_F_PER_M};
use crate::earth::{GroundKernels, HalfSpace, Reach, StaticWeights};
use crate::wire::{EndCurrents, PointSource, Segment, point_sources};

/// Where fields are wanted: a box, edges along the axes, above the soil.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Region {
    /// Corner of the least coordinates, m.
    pub low_m: [f64; 3],
    /// Corner of the greatest, m.
    pub high_m: [f64; 3],
}

/// The currents of a structure above soil at one frequency, ready for near fields.
///
/// Error 0.25 % of the field at most (measured against the reference cases and against the integrals), for wires and points
/// within the reach of the soil's tables; farther points are right, and slow. Nearer than 0.002 wavelengths to the foot
/// of a wire that stands on the soil the field is indicative: the current enters the soil at a point.
pub struct NearFieldOverSoil<'a> {
    own: NearFieldSource,
    sources: Vec<PointSource>,
    earth: &'a HalfSpace,
}

impl Region {
    /// What an earth must reach for the fields of wires in the region: to make it ready by [`HalfSpace::for_wires`].
    #[must_use]
    pub fn reach(&self, segments: &[Segment]) -> Reach {
        let ends = |axis: usize| {
            let places = segments.iter().flat_map(|segment| [segment.from_m[axis], segment.to_m[axis]]);
            places.fold([f64::INFINITY, f64::NEG_INFINITY], |[low, high], x| [low.min(x), high.max(x)])
        };
        let [x, y, z] = [0, 1, 2].map(ends);
        let across = |axis: usize, [low, high]: [f64; 2]| {
            (self.high_m[axis] - low).abs().max((high - self.low_m[axis]).abs())
        };
        let rho_m = across(0, x).hypot(across(1, y));
        let (lowest_m, highest_m) = (self.low_m[2].max(0.0) + z[0], self.high_m[2] + z[1]);
        // With room for differences
        let room = 2.0 * STEP;
        Reach {
            rho_max_m: rho_m + room * rho_m.hypot(highest_m),
            zeta_min_m: lowest_m * (1.0 - 2.0 * STEP_OF_ZETA),
            zeta_max_m: highest_m + room * rho_m.hypot(highest_m),
        }
    }
}

impl<'a> NearFieldOverSoil<'a> {
    /// The source for currents at the ends of segments (A peak), [`super::smoothed`] to the least distance from wires and
    /// ground.
    ///
    /// The earth may be ready for any reach; that of [`Region::reach`] makes fields within the region quick.
    #[must_use]
    pub fn new(segments: &[Segment], currents: &[EndCurrents], earth: &'a HalfSpace) -> Self {
        let k = earth.wave_number_rad_per_m();
        let own = NearFieldSource::in_free_space(segments, currents, k);
        let sources = point_sources(segments, currents, k * SPEED_OF_LIGHT_M_PER_S / TAU);
        Self { own, sources, earth }
    }

    /// The field at a point, m; none below the soil's surface, on which it is that of the air side.
    ///
    /// As [`NearFieldSource::field`] else.
    #[must_use]
    pub fn field(&self, at_m: [f64; 3]) -> NearField {
        if at_m[2] < 0.0 {
            return NearField::default();
        }
        let mut field = self.own.field(at_m);
        let steps = Steps::new(self.earth);
        for sources in self.sources.chunks(TOGETHER) {
            let kernels = |rho_m: &[f64], zeta_m: &[f64], rest: &mut [GroundKernels]| {
                self.earth.remainders(rho_m, zeta_m, rest);
            };
            add_reflected(&mut field, at_m, sources, &steps, kernels);
        }
        field
    }
}

/// Sources at a time: with their differences as many points as the tables take together.
const TOGETHER: usize = 7;
/// Places at which the functions of one source are asked for: itself, and two on each side, each way.
const PLACES: usize = 9;

/// Steps of differences: of the distance, of the sum of heights, and of a radian in the soil.
///
/// The error of differences of fourth order is 4·(h/R)⁴ for 1/R and (kh)⁴/30 for a wave; they raise an error of the tables,
/// times R, by 1.5·R/h.
const STEP: f64 = 0.06;
const STEP_OF_ZETA: f64 = 0.2;
const STEP_RAD: f64 = 0.5;
/// Wave number in the soil, over that in air, beyond which its waves die away before a step would miss them.
const DENSEST: f64 = 10.0;
/// Least ζ, in 1/k0, of a table's rest with its differences.
const LEAST_ZETA: f64 = 0.0063 / (1.0 - 2.0 * STEP_OF_ZETA);

/// What fixes the places of differences.
struct Steps {
    k: f64,
    weights: StaticWeights,
    longest_m: f64,
    least_zeta_m: f64,
}

impl Steps {
    fn new(earth: &HalfSpace) -> Self {
        let k = earth.wave_number_rad_per_m();
        let densest = earth.permittivity().sqrt().norm().min(DENSEST);
        let weights = earth.static_weights();
        Self { k, weights, longest_m: STEP_RAD / (k * densest), least_zeta_m: LEAST_ZETA / k }
    }
}

/// A point seen from a source.
#[derive(Clone, Copy, Default)]
struct Place {
    rho_m: f64,
    zeta_m: f64,
    /// From the source to the point, level.
    outward: [f64; 2],
    /// Steps of ρ and ζ, m.
    step_m: [f64; 2],
}

impl Place {
    fn new(at_m: Vec3, source_m: Vec3, steps: &Steps) -> Self {
        let apart = [at_m[0] - source_m[0], at_m[1] - source_m[1]];
        let rho_m = apart[0].hypot(apart[1]);
        let zeta_m = at_m[2] + source_m[2];
        // Straight above each other any direction will do.
        let outward = if rho_m > 0.0 { apart.map(|d| d / rho_m) } else { [1.0, 0.0] };
        let smooth_zeta_m = zeta_m.max(steps.least_zeta_m);
        let step_m = (STEP * rho_m.hypot(smooth_zeta_m)).min(steps.longest_m);
        Self { rho_m, zeta_m, outward, step_m: [step_m, step_m.min(STEP_OF_ZETA * smooth_zeta_m)] }
    }

    /// Places of the smooth rest: ρ (below nothing on the other side), ζ.
    fn around(&self, steps: &Steps) -> [[f64; 2]; PLACES] {
        let (rho, zeta) = (self.rho_m, self.zeta_m.max(steps.least_zeta_m));
        let [h, g] = self.step_m;
        [
            [rho, zeta],
            [rho - 2.0 * h, zeta],
            [rho - h, zeta],
            [rho + h, zeta],
            [rho + 2.0 * h, zeta],
            [rho, zeta - 2.0 * g],
            [rho, zeta - g],
            [rho, zeta + g],
            [rho, zeta + 2.0 * g],
        ]
    }
}

/// The functions at a place, 1/m, with their slopes.
struct Slopes {
    value: GroundKernels,
    over_rho: GroundKernels,
    over_zeta: GroundKernels,
    /// S_w/ρ
    cross_over_rho: Complex64,
}

fn add_reflected(
    field: &mut NearField,
    at_m: Vec3,
    sources: &[PointSource],
    steps: &Steps,
    rest: impl Fn(&[f64], &[f64], &mut [GroundKernels]),
) {
    let mut places = [Place::default(); TOGETHER];
    let [mut rho_m, mut zeta_m] = [[0.0; TOGETHER * PLACES]; 2];
    let mut kernels = [GroundKernels::default(); TOGETHER * PLACES];
    for (index, source) in sources.iter().enumerate() {
        places[index] = Place::new(at_m, source.element.position_m, steps);
        for (offset, [rho, zeta]) in places[index].around(steps).into_iter().enumerate() {
            let slot = index * PLACES + offset;
            (rho_m[slot], zeta_m[slot]) = (rho.abs(), zeta);
        }
    }
    let count = sources.len() * PLACES;
    rest(&rho_m[..count], &zeta_m[..count], &mut kernels[..count]);
    for ((source, place), kernels) in sources.iter().zip(&places).zip(kernels.chunks_exact(PLACES)) {
        let slopes = Slopes::new(place, kernels, steps);
        slopes.add_field(source, place, steps.k, field);
    }
}

impl Slopes {
    fn new(place: &Place, kernels: &[GroundKernels], steps: &Steps) -> Self {
        // S_w is odd in ρ, the others are even.
        let on_side = |index: usize, steps_out: f64| {
            let mut kernel = kernels[index];
            if place.rho_m + steps_out * place.step_m[0] < 0.0 {
                kernel.cross = -kernel.cross;
            }
            kernel
        };
        // f' = [8·(f₁ − f₋₁) − (f₂ − f₋₂)]/12h
        let slope = |[a, b, c, d]: [GroundKernels; 4], h: f64| ((c - b) * 8.0 - (d - a)) * (12.0 * h).recip();
        let [h, g] = place.step_m;
        let over_rho = slope([on_side(1, -2.0), on_side(2, -1.0), kernels[3], kernels[4]], h);
        let over_zeta = slope([kernels[5], kernels[6], kernels[7], kernels[8]], g);
        // On the axis S_w is its slope times ρ.
        let rest = if place.rho_m > 0.1 * h { kernels[0].cross / place.rho_m } else { over_rho.cross };
        let mut slopes = Self { value: kernels[0], over_rho, over_zeta, cross_over_rho: rest };
        slopes.add_images(place, &steps.weights, steps.k);
        slopes
    }

    /// w·g, and w·g·ρ/(R + ζ) of S_w; g = e^(−jkR)/R.
    fn add_images(&mut self, place: &Place, weights: &StaticWeights, k: f64) {
        let (rho, zeta) = (place.rho_m, place.zeta_m);
        // On a foot itself there is no field to speak of.
        let r = rho.hypot(zeta).max(1e-3);
        let g = Complex64::cis(-k * r) / r;
        // ∂g/∂R = −(1 + jkR)/R·g
        let slope = -Complex64::new(1.0, k * r) / r * g;
        let (along, up) = (slope * (rho / r), slope * (zeta / r));
        // ∂/∂ρ ρ/(R + ζ) = ζ/R/(R + ζ),   ∂/∂ζ ρ/(R + ζ) = −ρ/R/(R + ζ)
        let inverse = (r + zeta).recip();
        let bent = rho * inverse;
        let images = |smooth: Complex64, cross: Complex64| GroundKernels {
            horizontal: Complex64::ZERO,
            charge: weights.charge * smooth,
            vertical: weights.vertical * smooth,
            cross: weights.cross * cross,
        };
        self.value += images(g, g * bent);
        self.over_rho += images(along, along * bent + g * (zeta / r * inverse));
        self.over_zeta += images(up, up * bent - g * (bent / r));
        self.cross_over_rho += weights.cross * g * inverse;
    }

    /// With a, b, c the components of the current outward, round and up:
    ///
    /// A_ρ = a·S_h − c·S_w,   A_φ = b·S_h,   A_z = c·S_z + a·S_w;   a and b turn into each other on the way round.
    fn add_field(&self, source: &PointSource, place: &Place, k: f64, field: &mut NearField) {
        let [x, y] = place.outward;
        let direction = source.element.direction;
        let (a, b, c) =
            (x * direction[0] + y * direction[1], x * direction[1] - y * direction[0], direction[2]);
        let (s, over_rho, over_zeta) = (&self.value, &self.over_rho, &self.over_zeta);
        // −jωA = −jkη/4π·K·I ds,   −∇Φ = −q/4πε₀·∇S_f
        let induced = Complex64::new(0.0, -k * VACUUM_IMPEDANCE_OHM / (4.0 * PI)) * source.current_a_m;
        let charge = -source.charge_c / (2.0 * TAU * VACUUM_PERMITTIVITY_F_PER_M);
        let e = [
            induced * (s.horizontal * a - s.cross * c) + charge * over_rho.charge,
            induced * s.horizontal * b,
            induced * (s.vertical * c + s.cross * a) + charge * over_zeta.charge,
        ];
        // H_ρ = b·(S_w/ρ − ∂S_h/∂ζ),   H_φ = a·(∂S_h/∂ζ − ∂S_w/∂ρ) − c·(∂S_w/∂ζ + ∂S_z/∂ρ),   H_z = b·∂S_h/∂ρ
        let moment = source.current_a_m / (4.0 * PI);
        let h = [
            moment * (self.cross_over_rho - over_zeta.horizontal) * b,
            moment
                * ((over_zeta.horizontal - over_rho.cross) * a - (over_zeta.cross + over_rho.vertical) * c),
            moment * over_rho.horizontal * b,
        ];
        for (sum, [outward, round, up]) in [(&mut field.e_v_per_m, e), (&mut field.h_a_per_m, h)] {
            sum[0] += outward * x - round * y;
            sum[1] += outward * y + round * x;
            sum[2] += up;
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::earth::{Soil, exact_kernels};
    use crate::wire::{Element, Material, PortPlace, Structure, WireModel, WireShape};
    use crate::{constants::VACUUM_PERMEABILITY_H_PER_M, field::smoothed, wire::Boundary};

    const FREQUENCY_HZ: f64 = 7.1e6;

    fn norm(vector: [Complex64; 3]) -> f64 {
        vector.iter().map(Complex64::norm_sqr).sum::<f64>().sqrt()
    }

    fn minus(a: [Complex64; 3], b: [Complex64; 3]) -> [Complex64; 3] {
        std::array::from_fn(|axis| a[axis] - b[axis])
    }

    /// Differences of E and of H over the second's.
    fn apart(a: &NearField, b: &NearField) -> [f64; 2] {
        [(a.e_v_per_m, b.e_v_per_m), (a.h_a_per_m, b.h_a_per_m)].map(|(a, b)| norm(minus(a, b)) / norm(b))
    }

    /// Smoothed currents of a wire over the soil, for 1 V.
    fn fed(vertices_m: &[[f64; 3]], soil: Soil) -> (Vec<Segment>, Vec<EndCurrents>) {
        let boundary = Boundary::Soil(soil);
        let vertices_m = vertices_m.to_vec();
        let wires = vec![WireShape { vertices_m, radius_m: 1e-3, material: Material::PERFECT }];
        let ports = vec![PortPlace { wire: 0, arc_m: 2.0, gap_m: 0.02 }];
        let model = WireModel::new(Structure { wires, ports, boundary }, FREQUENCY_HZ).unwrap();
        let solution = model.solve(FREQUENCY_HZ).unwrap();
        let currents = model.end_currents(&solution.coefficients_a_per_v, &[Complex64::ONE]);
        let finer = smoothed(model.segments(), &currents, boundary, FREQUENCY_HZ, 0.03);
        (finer.segments, finer.currents)
    }

    fn shapes() -> [Vec<[f64; 3]>; 4] {
        [
            vec![[-12.0, 0.0, 1.0], [12.0, 0.0, 1.0]],
            vec![[-8.0, 0.0, 3.0], [0.0, 0.0, 9.0], [7.0, 5.0, 2.0]],
            vec![[0.0, 1.0, 1.5], [9.0, 1.0, 8.0]],
            vec![[0.0, 0.0, 0.0], [0.0, 0.0, 8.0], [6.0, 0.0, 7.0]],
        ]
    }

    const POINTS: [Vec3; 5] =
        [[1.5, 0.3, 0.0], [-12.2, 0.1, 0.0], [7.3, 4.0, 1.7], [4.0, -3.0, 11.0], [20.0, 25.0, 1.7]];

    /// What soil gives back of few sources is what it gives back of every piece of the wire.
    #[test]
    fn few_sources_stand_for_the_wires() {
        let soil = Soil { relative_permittivity: 13.0, conductivity_s_per_m: 0.005 };
        for vertices_m in &shapes() {
            let (segments, currents) = fed(vertices_m, soil);
            let region = Region { low_m: [-13.0, -4.0, 0.0], high_m: [21.0, 26.0, 12.0] };
            let earth = HalfSpace::for_wires(&soil, FREQUENCY_HZ, &region.reach(&segments)).unwrap();
            let few = NearFieldOverSoil::new(&segments, &currents, &earth);
            let pieces = segments.iter().zip(&currents).map(|(segment, ends)| PointSource {
                element: Element {
                    position_m: std::array::from_fn(|axis| 0.5 * (segment.from_m[axis] + segment.to_m[axis])),
                    direction: segment.direction(),
                },
                current_a_m: 0.5 * (ends.from_a + ends.to_a) * segment.length_m(),
                charge_c: (ends.to_a - ends.from_a) * Complex64::new(0.0, (TAU * FREQUENCY_HZ).recip()),
            });
            let feet = few.sources.iter().filter(|source| source.current_a_m == Complex64::ZERO);
            let sources: Vec<PointSource> = pieces.chain(feet.copied()).collect();
            assert!(5 * few.sources.len() < sources.len(), "{} for {}", few.sources.len(), sources.len());
            let many = NearFieldOverSoil { own: few.own.clone(), sources, earth: &earth };
            for at_m in POINTS {
                let error = apart(&few.field(at_m), &many.field(at_m));
                assert!(error.iter().all(|error| *error < 1e-3), "{vertices_m:?}, {at_m:?}: {error:?}");
            }
        }
    }

    /// Tables and integrals give the same fields, over soils from sand to the sea.
    #[test]
    fn tables_give_the_fields_of_the_integrals() {
        for (relative_permittivity, conductivity_s_per_m) in
            [(3.0, 1e-4), (13.0, 0.005), (80.0, 0.001), (81.0, 5.0)]
        {
            let soil = Soil { relative_permittivity, conductivity_s_per_m };
            for (at_m, source) in pairs() {
                let reach = Reach { rho_max_m: 40.0, zeta_min_m: 0.3, zeta_max_m: 20.0 };
                let earth = HalfSpace::for_wires(&soil, FREQUENCY_HZ, &reach).unwrap();
                let (by_tables, by_integrals) =
                    (given_back(&earth, at_m, &source), exactly(&earth, at_m, &source));
                let error = apart(&by_tables, &by_integrals);
                assert!(error.iter().all(|error| *error < 3e-3), "{soil:?}, {at_m:?}: {error:?}");
            }
        }
    }

    /// ∇×E = −jωµ₀H and ∇×H = jωε₀E, although the sources are no closed circuits: each has the charges of its current.
    #[test]
    fn given_back_fields_obey_maxwell() {
        let soil = Soil { relative_permittivity: 13.0, conductivity_s_per_m: 0.005 };
        let reach = Reach { rho_max_m: 40.0, zeta_min_m: 0.3, zeta_max_m: 20.0 };
        let earth = HalfSpace::for_wires(&soil, FREQUENCY_HZ, &reach).unwrap();
        let omega = TAU * FREQUENCY_HZ;
        let (permeability, permittivity) = (
            Complex64::new(0.0, -omega * VACUUM_PERMEABILITY_H_PER_M),
            Complex64::new(0.0, omega * VACUUM_PERMITTIVITY_F_PER_M),
        );
        for (at_m, source) in pairs() {
            let dipole = dipole(&source);
            let field = |at_m: Vec3| {
                let mut sum = NearField::default();
                for source in &dipole {
                    let part = exactly(&earth, at_m, source);
                    for axis in 0..3 {
                        sum.e_v_per_m[axis] += part.e_v_per_m[axis];
                        sum.h_a_per_m[axis] += part.h_a_per_m[axis];
                    }
                }
                sum
            };
            let step_m = 0.005;
            let beside = |axis: usize, sign: f64| {
                let mut place_m = at_m;
                place_m[axis] += sign * step_m;
                field(place_m)
            };
            let sides: [[NearField; 2]; 3] =
                std::array::from_fn(|axis| [beside(axis, 1.0), beside(axis, -1.0)]);
            let curl = |pick: fn(&NearField) -> [Complex64; 3]| -> [Complex64; 3] {
                let slope = |over: usize, of: usize| {
                    (pick(&sides[over][0])[of] - pick(&sides[over][1])[of]) / (2.0 * step_m)
                };
                std::array::from_fn(|axis| {
                    let (next, last) = ((axis + 1) % 3, (axis + 2) % 3);
                    slope(next, last) - slope(last, next)
                })
            };
            let here = field(at_m);
            let (curl_e, curl_h) = (curl(|field| field.e_v_per_m), curl(|field| field.h_a_per_m));
            let (of_h, of_e) =
                (here.h_a_per_m.map(|h| h * permeability), here.e_v_per_m.map(|e| e * permittivity));
            let errors = [norm(minus(curl_e, of_h)) / norm(of_h), norm(minus(curl_h, of_e)) / norm(of_e)];
            assert!(errors.iter().all(|error| *error < 2e-3), "{at_m:?}, {source:?}: {errors:?}");
        }
    }

    /// Points and sources: level, upright, oblique; near, far, nearly straight above, on the ground.
    fn pairs() -> Vec<(Vec3, PointSource)> {
        let directions = [[1.0, 0.0, 0.0], [0.0, 0.0, 1.0], [0.48, 0.6, 0.64]];
        let places = [
            [2.5, 1.0, 1.7],
            [0.01, 0.0, 2.0],
            [0.5, 0.3, 0.0],
            [-1.0, 3.0, 0.0],
            [20.0, -9.0, 1.5],
            [9.0, 30.0, 9.0],
        ];
        let source = |direction: Vec3| PointSource {
            element: Element { position_m: [0.0, 0.0, 3.0], direction },
            current_a_m: Complex64::ONE,
            charge_c: Complex64::new(2e-8, -1e-8),
        };
        directions.into_iter().flat_map(|direction| places.map(|at_m| (at_m, source(direction)))).collect()
    }

    /// A short current with the charges at its ends.
    fn dipole(source: &PointSource) -> [PointSource; 3] {
        let length_m = 0.005;
        let end = |sign: f64| {
            let mut end = *source;
            for (place, direction) in end.element.position_m.iter_mut().zip(source.element.direction) {
                *place += 0.5 * sign * length_m * direction;
            }
            end.current_a_m = Complex64::ZERO;
            // Q = I/jω where the current ends
            end.charge_c = Complex64::new(0.0, -sign / (TAU * FREQUENCY_HZ * length_m)) * source.current_a_m;
            end
        };
        [PointSource { charge_c: Complex64::ZERO, ..*source }, end(1.0), end(-1.0)]
    }

    fn given_back(earth: &HalfSpace, at_m: Vec3, source: &PointSource) -> NearField {
        let mut field = NearField::default();
        let kernels = |rho_m: &[f64], zeta_m: &[f64], rest: &mut [GroundKernels]| {
            earth.remainders(rho_m, zeta_m, rest);
        };
        add_reflected(&mut field, at_m, std::slice::from_ref(source), &Steps::new(earth), kernels);
        field
    }

    /// By the integrals, with much smaller steps.
    fn exactly(earth: &HalfSpace, at_m: Vec3, source: &PointSource) -> NearField {
        let k = earth.wave_number_rad_per_m();
        let mut field = NearField::default();
        let kernels = |rho_m: &[f64], zeta_m: &[f64], rest: &mut [GroundKernels]| {
            for ((rho_m, zeta_m), rest) in rho_m.iter().zip(zeta_m).zip(rest) {
                let (rho, zeta) = (k * rho_m, k * zeta_m);
                let images = earth.static_weights().images(rho, zeta);
                *rest = (exact_kernels(earth.permittivity(), rho, zeta) - images) * k;
            }
        };
        let steps = Steps { longest_m: 0.01, ..Steps::new(earth) };
        add_reflected(&mut field, at_m, std::slice::from_ref(source), &steps, kernels);
        field
    }
}
