//! p values of a family of tests.

use crate::test::PValue;

/// Bonferroni: every p times the number of tests.
pub fn bonferroni(p: &[PValue]) -> Vec<PValue> {
    let _ = p;
    unimplemented!()
}

/// Holm (1979): step-down Bonferroni.
pub fn holm(p: &[PValue]) -> Vec<PValue> {
    let _ = p;
    unimplemented!()
}
