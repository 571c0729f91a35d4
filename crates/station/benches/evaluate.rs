//! Speed of the evaluator with the demo station: all bands, 101 frequencies each, one core.

use std::hint::black_box;

use criterion::{BatchSize, Criterion, criterion_group, criterion_main};
use station::evaluate::Evaluator;
use station::file;
use station::plan::{Link, Plan};

fn demo() -> Plan {
    file::from_text(include_str!("../../../demo-projects/saltmarsh-relief-post.ron"))
        .expect("the demo is a plan")
}

fn bench(c: &mut Criterion) {
    let plan = demo();
    let mut group = c.benchmark_group("evaluate demo");
    group.bench_function("everything anew", |b| {
        b.iter_batched(
            Evaluator::new,
            |mut evaluator| black_box(evaluator.evaluate(&plan, 1)),
            BatchSize::SmallInput,
        );
    });
    group.bench_function("wire moved", |b| {
        let mut evaluator = Evaluator::new();
        let mut moved = plan.clone();
        let mut step = 0.0;
        b.iter(|| {
            step += 1e-4;
            moved.wires[0].cut_length_m = 38.0 + step % 4.0;
            black_box(evaluator.evaluate(&moved, 1))
        });
    });
    group.bench_function("line length changed", |b| {
        let mut evaluator = Evaluator::new();
        let mut moved = plan.clone();
        let mut step = 0.0;
        b.iter(|| {
            step += 1e-4;
            if let Link::Line(piece) = &mut moved.feeds[0].links[0] {
                piece.length_m = 14.0 + step % 4.0;
            }
            black_box(evaluator.evaluate(&moved, 1))
        });
    });
    group.finish();
}

criterion_group!(benches, bench);
criterion_main!(benches);
