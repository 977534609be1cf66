//! Tells the source which cores lack a 32 × 32 → 64 bit multiplication.
//!
//! The value of a product does not depend on it, only the way it is put together does.

fn main() {
    println!("cargo:rustc-check-cfg=cfg(short_products)");
    println!("cargo:rerun-if-changed=build.rs");
    println!("cargo:rerun-if-env-changed=STAGEBITS_SHORT_PRODUCTS");
    let target = std::env::var("TARGET").unwrap_or_default();
    let short = ["thumbv6m", "thumbv8m.base", "riscv32i-", "riscv32e-"];
    // The variable lets the desktop run the tests over the short-product path.
    let forced = std::env::var_os("STAGEBITS_SHORT_PRODUCTS").is_some();
    if forced || short.iter().any(|prefix| target.starts_with(prefix)) {
        println!("cargo:rustc-cfg=short_products");
    }
}
