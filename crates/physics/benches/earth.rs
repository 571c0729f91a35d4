//! Speed of an earth: preparing it for a soil and a frequency, and reading it for all pairs of points of a wire.

use std::hint::black_box;

use criterion::{BenchmarkId, Criterion, criterion_group, criterion_main};
use physics::earth::{GroundKernels, HalfSpace, Reach, Soil, exact_kernels};
use physics::wire::{Element, Kernel, Reflection};

const FARMLAND: Soil = Soil { relative_permittivity: 13.0, conductivity_s_per_m: 0.005 };
const LAKE: Soil = Soil { relative_permittivity: 80.0, conductivity_s_per_m: 0.001 };
const DESERT: Soil = Soil { relative_permittivity: 3.0, conductivity_s_per_m: 0.0001 };

/// Gauss points of an inverted V of 40 m with an apex of 14 m and ends at 4 m.
fn elements() -> Vec<Element> {
    const COUNT: usize = 162;
    let point = |index: usize| {
        let x = (index as f64 + 0.5) / (0.5 * COUNT as f64) - 1.0;
        let slope = if x < 0.0 { 0.5 } else { -0.5 };
        Element { position_m: [17.32 * x, 0.0, 14.0 - 10.0 * x.abs()], direction: [0.866, 0.0, slope] }
    };
    (0..COUNT).map(point).collect()
}

fn earth(criterion: &mut Criterion) {
    let inverted_v = Reach { rho_max_m: 34.7, zeta_min_m: 8.0, zeta_max_m: 28.0 };
    let low = Reach { rho_max_m: 40.0, zeta_min_m: 1.0, zeta_max_m: 1.0 };
    let mut group = criterion.benchmark_group("prepare");
    for (name, soil, reach, frequency_hz) in [
        ("inverted V, farmland, 3.6 MHz", FARMLAND, inverted_v, 3.6e6),
        ("inverted V, farmland, 14 MHz", FARMLAND, inverted_v, 14e6),
        ("inverted V, farmland, 29 MHz", FARMLAND, inverted_v, 29e6),
        ("inverted V, lake, 14 MHz", LAKE, inverted_v, 14e6),
        ("low wire, farmland, 14 MHz", FARMLAND, low, 14e6),
        ("low wire, lake, 29 MHz", LAKE, low, 29e6),
        ("low wire, desert, 29 MHz", DESERT, low, 29e6),
    ] {
        group.bench_function(BenchmarkId::from_parameter(name), |bencher| {
            bencher
                .iter(|| HalfSpace::new(black_box(&soil), frequency_hz, &reach).expect("within the range"));
        });
    }
    group.finish();
    let elements = elements();
    for (name, soil) in [("farmland", FARMLAND), ("desert", DESERT)] {
        let earth = HalfSpace::new(&soil, 14e6, &inverted_v).expect("within the range");
        let mut kernels = vec![Kernel::default(); elements.len()];
        criterion.bench_function(&format!("13,203 pairs of elements, {name}"), |bencher| {
            bencher.iter(|| {
                for (row, test) in elements.iter().enumerate() {
                    let sources = &elements[..=row];
                    Reflection::kernels(&earth, test, sources, &mut kernels[..=row]);
                }
                black_box(&mut kernels);
            });
        });
        let places: Vec<(f64, f64)> =
            (0..4096).map(|i| (f64::from(i % 61) * 0.5, 8.5 + f64::from(i % 17))).collect();
        let (rho_m, zeta_m): (Vec<f64>, Vec<f64>) = places.into_iter().unzip();
        let mut ground = vec![GroundKernels::default(); rho_m.len()];
        criterion.bench_function(&format!("4,096 places, {name}"), |bencher| {
            bencher.iter(|| earth.kernels(black_box(&rho_m), &zeta_m, &mut ground));
        });
    }
    let epsilon = FARMLAND.complex_permittivity(14e6).expect("a soil");
    criterion.bench_function("one place by quadrature", |bencher| {
        bencher.iter(|| exact_kernels(black_box(epsilon), 3.0, 2.0));
    });
}

criterion_group!(benches, earth);
criterion_main!(benches);
