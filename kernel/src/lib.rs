//! Chains of two-ports in block fixed point.
#![no_std]
#![forbid(unsafe_code)]
