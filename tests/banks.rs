//! Banks on the desktop: the reference against the parts that a bank stands for, the kernel's
//! arithmetics against the reference, and the states that an envelope covers.

#[path = "banks/arithmetics.rs"]
mod arithmetics;
#[path = "banks/case.rs"]
mod case;
#[path = "banks/envelope.rs"]
mod envelope;
#[path = "banks/parts.rs"]
mod parts;
