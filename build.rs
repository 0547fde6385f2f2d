//! Writes the C header into OUT_DIR and names the shared library's soname.

fn main() {}
