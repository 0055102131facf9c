//! What editors ask: completion, hover, outline, pages. Each file tests one of them, by texts with
//! the cursor at `$0` and facts that are made up.

mod completion;
mod explain;
mod facts;
mod fixture;
mod highlight;
mod hover;
mod names;
mod symbols;
mod terms;
