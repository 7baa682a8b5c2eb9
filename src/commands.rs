//! One file per command, the only callers of files.
