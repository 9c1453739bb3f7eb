//! Tests of the numbers, each named by its truth: exact_ (closed form), table_ (printed), agree_ (two roads to one
//! number), law_ (distribution), always_ (properties), pinned_ (our own frozen numbers).

mod paths;
mod support;
