//! Results as bytes, one format per file; computes nothing and opens no file.
