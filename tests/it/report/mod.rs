//! The report of hand-built records: wording by snapshot, every figure found again, charts that keep clear, equal bytes.

mod charts;
mod facts;
mod figures;
mod fixture;
mod lots;
mod named;
mod pages;
mod springs;
