//! The C ABI: the only unsafe code of the library.
//!
//! Each entry point checks pointers and shapes, calls one function of a family and makes a status of its answer. The
//! files named like families hold the entry points; `guard`, `arrays`, `text`, `molecules` and `handles` hold what they
//! share. The header is written from these files by build.rs, so their comments are the header's.
#![allow(unsafe_code, non_snake_case, non_camel_case_types)]
#![allow(clippy::too_many_arguments)]

mod arrays;
mod guard;
mod handles;
mod molecules;
mod text;

pub mod about;
pub mod bonds;
pub mod charges;
pub mod elements;
pub mod library;
pub mod moments;
pub mod settings;
pub mod table;
pub mod tabulation;
