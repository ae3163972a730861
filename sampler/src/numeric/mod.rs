//! Numerical kernels: special functions, random streams, small dense linear algebra.

pub mod dense;
pub mod saddle;
pub mod special;
pub mod stream;
mod variates;
