//! Scatter of inputs to low, nominal and high, and what dominates.
