//! The program as a user meets it at the command line: worksheets that run, and everything that can be wrong.

mod cells;
mod files;
mod installing;
mod running;
mod worksheet;
