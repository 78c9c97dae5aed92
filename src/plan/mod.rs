//! The job plan: YAML nodes with places in, typed values with places out.

pub mod step;
