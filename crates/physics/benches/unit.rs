//! Speed of the matching units' search: the setting with the least loss for 200 random impedances, per search.

use std::hint::black_box;

use criterion::{Criterion, criterion_group, criterion_main};
use num_complex::Complex64;
use physics::network::{LForm, MatchingUnit, Part, PartRating, Range, Sense, UnitProblem};

/// 200 impedances from a full wave's end to a short wire, spread by the golden ratio.
fn problems() -> Vec<UnitProblem> {
    let share = |n: u32, step: f64| (f64::from(n) * step).fract();
    (1..=200)
        .map(|n| {
            let r = 10_f64.powf(0.3 + 3.4 * share(n, 0.618_033_988_75));
            let x = 3e3 * (2.0 * share(n, 0.754_877_666_2) - 1.0);
            let frequency_hz = 1.8e6 * (30.0 / 1.8_f64).powf(share(n, 0.569_840_290_998));
            UnitProblem { frequency_hz, load_ohm: Complex64::new(r, x), target_ohm: 50.0, largest_swr: 1.5 }
        })
        .collect()
}

fn part(range: Range, q: f64) -> Part {
    Part { range, q, rating: PartRating::default() }
}

fn units(coil: Range, capacitor: Range) -> Vec<(String, MatchingUnit)> {
    let (coil, capacitor) = (part(coil, 200.0), part(capacitor, 1000.0));
    let mut units: Vec<_> =
        LForm::ALL.map(|form| (format!("{form:?}"), MatchingUnit::L { form, coil, capacitor })).into();
    let sense = Sense::CapacitorAcrossLoad;
    units.push(("balanced L".to_owned(), MatchingUnit::BalancedL { sense, each_coil: coil, capacitor }));
    let t = MatchingUnit::HighPassT { source_capacitor: capacitor, coil, load_capacitor: capacitor };
    units.push(("high-pass T".to_owned(), t));
    units
}

fn search(criterion: &mut Criterion) {
    let problems = problems();
    let variable =
        units(Range::Variable { low: 0.05e-6, high: 30e-6 }, Range::Variable { low: 10e-12, high: 1500e-12 });
    let banks = units(
        Range::Steps { first: 0.05e-6, step: 0.12e-6, count: 256 },
        Range::Steps { first: 10e-12, step: 6e-12, count: 256 },
    );
    for (kind, units) in [("variable", variable), ("banks of 256", banks)] {
        for (name, unit) in units {
            let mut next = problems.iter().cycle();
            criterion.bench_function(&format!("{kind}, {name}, one search"), |bencher| {
                bencher.iter(|| {
                    let problem = next.next().expect("a cycle has no end");
                    black_box(unit.least_loss(black_box(problem))).is_ok()
                });
            });
        }
    }
}

criterion_group!(benches, search);
criterion_main!(benches);
