//! Speed of the evaluator with the demo station: all bands, 101 frequencies each.
//!
//! The sketch runs on one core; the full model solves its frequencies on all of them (`RAYON_NUM_THREADS=1` for one).

use std::hint::black_box;

use criterion::{BatchSize, Criterion, criterion_group, criterion_main};
use station::evaluate::Evaluator;
use station::file;
use station::plan::{Link, Plan};

fn demo() -> Plan {
    file::from_text(include_str!("../../../demo-projects/saltmarsh-relief-post.ron"))
        .expect("the demo is a plan")
}

/// Everything of the sketch, from an empty evaluator.
fn sketch(c: &mut Criterion) {
    let plan = demo();
    c.bench_function("demo, sketch, everything anew", |b| {
        b.iter_batched(
            Evaluator::new,
            |mut evaluator| black_box(evaluator.sketch(&plan, 1)),
            BatchSize::SmallInput,
        );
    });
}

/// The full model under the hand: the wire's end moves, or a line's length.
fn full(c: &mut Criterion) {
    let plan = demo();
    let mut group = c.benchmark_group("demo, full model");
    group.bench_function("wire's end moved", |b| {
        let mut evaluator = Evaluator::new();
        let mut moved = plan.clone();
        let mut step = 0.0;
        b.iter(|| {
            step += 0.1;
            moved.wires[0].cut_length_m = 38.0 + step % 4.0;
            black_box(evaluator.evaluate(&moved, 1))
        });
    });
    group.bench_function("line's length changed", |b| {
        let mut evaluator = Evaluator::new();
        let mut moved = plan.clone();
        let mut step = 0.0;
        b.iter(|| {
            step += 0.1;
            if let Link::Line(piece) = &mut moved.feeds[0].links[0] {
                piece.length_m = 14.0 + step % 4.0;
            }
            black_box(evaluator.evaluate(&moved, 1))
        });
    });
    group.finish();
}

criterion_group!(benches, sketch, full);
criterion_main!(benches);
