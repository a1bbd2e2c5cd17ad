//! Results as text, JSON and tables.
