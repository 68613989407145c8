//! Time per leg on this PC: foot to three joint angles with their outcome, and on to three ticks, against the textbook
//! form on general-purpose libraries; same targets, same run. Throughput is in legs.
//!
//! `cargo bench -p benches`, or in less than a minute `cargo bench -p benches -- --quick`.

use benches::contenders::contenders;
use benches::legs::Shape;
use benches::targets;
use criterion::{Criterion, Throughput, criterion_group, criterion_main};

fn leg_time(criterion: &mut Criterion) {
    for shape in Shape::ALL {
        let mut group = criterion.benchmark_group(shape.name());
        group.throughput(Throughput::Elements(targets::COUNT as u64));
        for contender in contenders(shape) {
            group.bench_function(contender.name(), |bencher| bencher.iter(|| contender.run()));
        }
        group.finish();
    }
}

criterion_group!(legs, leg_time);
criterion_main!(legs);
