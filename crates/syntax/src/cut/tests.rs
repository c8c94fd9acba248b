//! Tests of the cutting.
