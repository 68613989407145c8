//! Linker scripts: `link.x` is the runtime's (it includes the board's memory.x), `defmt.x` is defmt's.

fn main() {
    println!("cargo::rerun-if-changed=build.rs");
    if std::env::var("CARGO_CFG_TARGET_OS").as_deref() == Ok("none") {
        for argument in ["-Tlink.x", "-Tdefmt.x", "--nmagic"] {
            println!("cargo::rustc-link-arg-bins={argument}");
        }
    }
}
