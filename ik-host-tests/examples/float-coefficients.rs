//! Prints `ik-core/src/number/float/coefficients.rs`.

fn main() {
    print!("{}", ik_host_tests::minimax::float_coefficients());
}
