//! Shared helpers of the tests that look at Layshaft as a whole.
