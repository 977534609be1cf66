//! The publications that the table draws on.

pub(super) const POZAR: &str = "D. M. Pozar, Microwave Engineering, 4th ed., Wiley 2012";
pub(super) const MATTHAEI: &str = "G. L. Matthaei, L. Young, E. M. T. Jones, Microwave Filters, \
     Impedance-Matching Networks, and Coupling Structures, McGraw-Hill 1964";
pub(super) const BOWICK: &str =
    "C. Bowick, RF Circuit Design, Sams 1982 / 2nd ed. Newnes 2008, ch. 4";
pub(super) const SADIKU: &str =
    "M. N. O. Sadiku, Elements of Electromagnetics, 3rd-6th ed., Oxford, ch. 11";
pub(super) const ULABY: &str =
    "F. T. Ulaby and U. Ravaioli, Fundamentals of Applied Electromagnetics, 7th ed.";
pub(super) const FRICKEY: &str = "D. A. Frickey, Conversions between S, Z, Y, h, ABCD and T \
     parameters which are valid for complex source and load impedances, IEEE Trans. MTT 42(2), \
     Feb. 1994, 205-211";
pub(super) const ANTENNA_BOOK: &str = "The ARRL Antenna Book, 20th ed. (2003), ch. 24";
pub(super) const GENERAL_MANUAL: &str = "ARRL General Class License Manual, ch. 6";
pub(super) const HANDBOOK: &str = "The ARRL Handbook, ch. Transmission Lines";
pub(super) const REFERENCE_DATA: &str = "Reference Data for Engineers, 9th ed.";
pub(super) const KUPHALDT: &str = "T. R. Kuphaldt, Lessons in Electric Circuits, Vol. III";
/// Theory that any text on networks or lines derives.
pub(super) const THEORY: &str = "network and line theory, any text";
