//! Tests of the engine, by the name of their truth: exact (closed form), table (printed or standard table), agree (two
//! roads to one number), law (distribution tests), always (properties).

mod agree;
mod always;
mod exact;
mod law;
mod support;
mod table;
