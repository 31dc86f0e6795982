//! The command line `gudgeon`.
//!
//! See the commands below.

fn main() {
    evcxr::runtime_hook();
}
