//! Distributions: tails on the log scale, limits of noncentrality.
