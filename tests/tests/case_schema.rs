//! The JSON Schema that editors use is the one the program has.
//!
//! Remade by `REMAKE_REFERENCE=1 cargo test -p tautring-tests --test case_schema`.

use std::fs;
use std::path::Path;

#[test]
fn committed_schema_is_current() {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("../report/schema/case.schema.json");
    let current = tautring_report::case::schema_text();
    if std::env::var_os("REMAKE_REFERENCE").is_some() {
        fs::write(&path, &current).expect("the schema can be written");
    }
    let committed = fs::read_to_string(&path).unwrap_or_default();
    assert!(
        committed == current,
        "report/schema/case.schema.json is out of date; its header tells how to remake it: tests/tests/case_schema.rs"
    );
}
