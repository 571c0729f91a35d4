//! How long a sheet takes: layout, PDF, SVG, picture. The target for the PDF is 300 ms, the aim 100 ms.

#![allow(clippy::unwrap_used)] // A panic is the failure.

#[path = "../tests/support/mod.rs"]
mod support;

use std::hint::black_box;

use criterion::{Criterion, criterion_group, criterion_main};
use sheet::{Paper, SheetRequest, lay_out, pdf_for, png, svg};
use station::units::Units;

fn sheets(criterion: &mut Criterion) {
    let request = SheetRequest { paper: Paper::A4, units: Units::Metres, date: support::DATE };
    for (name, plan) in [
        ("12 bands", support::relief_post()),
        ("12 bands, three wires, loads", support::traps_and_arms()),
        ("30 bands", support::long_list()),
    ] {
        let station = support::station(name, plan);
        let (plan, report) = (&station.plan, &station.report);
        criterion.bench_function(&format!("layout, {name}"), |b| {
            b.iter(|| lay_out(black_box(plan), report, &request).unwrap());
        });
        criterion.bench_function(&format!("PDF, {name}"), |b| {
            b.iter(|| pdf_for(black_box(plan), report, &request).unwrap());
        });
    }
    let station = support::station("12 bands", support::relief_post());
    let pages = lay_out(&station.plan, &station.report, &request).unwrap();
    criterion.bench_function("SVG of one page", |b| b.iter(|| svg::write(black_box(&pages[0]))));
    criterion.bench_function("picture of one page, 150 dots per inch", |b| {
        b.iter(|| png::write(black_box(&pages[0]), 150.0).unwrap());
    });
}

criterion_group! {
    name = benches;
    config = Criterion::default().sample_size(20);
    targets = sheets
}
criterion_main!(benches);
