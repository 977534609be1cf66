//! What firmware in fixed point does not hold, shown on the very program whose words are compared:
//! it decodes images, resolves chains, walks and reads out, for both word lengths.

use std::collections::BTreeSet;

#[path = "common/emulator.rs"]
mod emulator;

use emulator::{CORES, Core, Failure, Unwanted, symbols, unwanted};

/// Arguments of cargo for each profile that firmware is built with.
const PROFILES: [&[&str]; 2] = [&["--profile", "release"], &["--profile", "small"]];
/// Feature with which an image that holds a branch that can panic does not link.
const PROOF: &[&str] = &["prove-no-panic"];

fn everywhere() -> impl Iterator<Item = (&'static Core, &'static [&'static str])> {
    CORES.iter().flat_map(|core| PROFILES.map(|it| (core, it)))
}

#[test]
fn kernel_cannot_panic() -> Result<(), Failure> {
    for (core, profile) in everywhere() {
        emulator::build(core, "words", PROOF, profile)?;
    }
    Ok(())
}

#[test]
fn image_that_can_panic_does_not_link() {
    for (core, profile) in everywhere() {
        let failure = emulator::build(core, "unsuited", PROOF, profile).expect_err("it can panic");
        assert!(
            failure.0.contains("a_branch_that_can_panic_is_left"),
            "{failure:?}"
        );
    }
}

/// Cores with a floating-point unit need no routine for it; that the same source needs none on the
/// others shows that it has no floating point.
#[test]
fn kernel_holds_no_panic_no_float_and_no_heap() -> Result<(), Failure> {
    for (core, profile) in everywhere() {
        let symbols = symbols(&emulator::build(core, "words", &[], profile)?)?;
        assert!(
            symbols.iter().any(|name| name.contains("stagebits")),
            "{}, {profile:?}: names are missing: {symbols:?}",
            core.name
        );
        let unwanted: Vec<_> = symbols
            .iter()
            .filter(|name| unwanted(name).is_some())
            .collect();
        assert!(
            unwanted.is_empty(),
            "{}, {profile:?}: {unwanted:?}",
            core.name
        );
    }
    Ok(())
}

#[test]
fn panic_float_and_heap_are_found_where_they_are() -> Result<(), Failure> {
    let all = BTreeSet::from([Unwanted::Panic, Unwanted::Float, Unwanted::Heap]);
    for (core, profile) in everywhere() {
        let symbols = symbols(&emulator::build(core, "unsuited", &[], profile)?)?;
        let found: BTreeSet<_> = symbols.iter().filter_map(|name| unwanted(name)).collect();
        assert_eq!(found, all, "{}, {profile:?}: {symbols:?}", core.name);
    }
    Ok(())
}

/// Names of Arm's run-time ABI (IHI 0043) and of libgcc's manual ("The GCC low-level runtime
/// library"), from memory.
#[test]
fn routines_of_integers_and_of_floats_are_told_apart() {
    let floats = "__aeabi_dadd __aeabi_drsub __aeabi_dcmpeq __aeabi_cdrcmple __aeabi_d2iz __aeabi_d2ulz \
                  __aeabi_d2f __aeabi_fmul __aeabi_fdiv __aeabi_cfcmpeq __aeabi_f2uiz __aeabi_f2d \
                  __aeabi_f2h __aeabi_h2f __aeabi_i2d __aeabi_ui2f __aeabi_l2f __aeabi_ul2d \
                  __addsf3 __subdf3 __mulsf3 __divtf3 __negdf2 __cmpsf2 __unorddf2 __gedf2 \
                  __extendsfdf2 __truncdfsf2 __fixsfsi __fixunsdfdi __floatsidf __floatundisf \
                  __powidf2 compiler_builtins::float::div::__divdf3 libm::math::sqrt::sqrt";
    for name in floats.split_whitespace() {
        assert_eq!(unwanted(name), Some(Unwanted::Float), "{name}");
    }
    let wanted = "__aeabi_idiv __aeabi_uidivmod __aeabi_idiv0 __aeabi_ldivmod __aeabi_uldivmod \
                  __aeabi_ldiv0 __aeabi_lmul __aeabi_llsl __aeabi_lasr __aeabi_lcmp __aeabi_ulcmp \
                  __aeabi_memcpy4 __aeabi_memclr8 __aeabi_memset __aeabi_read_tp __aeabi_uread4 \
                  __muldi3 __divsi3 __udivdi3 __umodsi3 __divmodsi4 __udivmoddi4 __ashldi3 \
                  __lshrdi3 __negdi2 __cmpdi2 __clzsi2 __ctzdi2 __popcountsi2 __bswapsi2 memcpy \
                  compiler_builtins::int::mul::__muldi3 __pre_init main DefaultHandler";
    for name in wanted.split_whitespace() {
        assert_eq!(unwanted(name), None, "{name}");
    }
    for (name, kind) in [
        ("core::panicking::panic_bounds_check", Unwanted::Panic),
        ("__rustc::rust_begin_unwind", Unwanted::Panic),
        ("rust_begin_unwind", Unwanted::Panic),
        ("alloc::raw_vec::capacity_overflow", Unwanted::Heap),
        ("<alloc::vec::Vec<u8>>::push", Unwanted::Heap),
        ("__rustc::__rust_alloc", Unwanted::Heap),
        ("malloc", Unwanted::Heap),
    ] {
        assert_eq!(unwanted(name), Some(kind), "{name}");
    }
    assert_eq!(unwanted("core::alloc::layout::Layout::array"), None);
}
