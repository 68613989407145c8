//! Time per leg on this PC and the ratio to the textbook form on libm: a table in some seconds. The least of many
//! rounds is taken, which other work on the machine disturbs least; `cargo bench` has the statistics.

use benches::contenders::{YARDSTICK, contenders};
use benches::legs::Shape;
use benches::targets;
use std::time::{Duration, Instant};

/// How long each contender is timed.
const FOR_EACH: Duration = Duration::from_millis(300);

/// Nanoseconds per leg: the least of the rounds.
fn nanoseconds(run: impl Fn()) -> f64 {
    let (start, mut least) = (Instant::now(), Duration::MAX);
    while start.elapsed() < FOR_EACH {
        let round = Instant::now();
        run();
        least = least.min(round.elapsed());
    }
    least.as_secs_f64() * 1e9 / targets::COUNT as f64
}

fn main() {
    println!("{:<9} {:<28} {:>8} {:>8}", "leg", "contender", "ns/leg", "ratio");
    for shape in Shape::ALL {
        let times: Vec<(String, f64)> = contenders(shape)
            .iter()
            .map(|contender| (contender.name().to_owned(), nanoseconds(|| contender.run())))
            .collect();
        let yardstick = times.iter().find(|(name, _)| name == YARDSTICK).map_or(f64::NAN, |(_, time)| *time);
        for (name, time) in times {
            println!("{:<9} {name:<28} {time:>8.1} {:>8.2}", shape.name(), time / yardstick);
        }
    }
}
