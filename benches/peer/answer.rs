//! What a Python peer finds: one job in, one JSON object out, on one thread.

use std::{
    io::Write,
    process::{Command, Stdio},
};

use serde_json::Value;

/// Runs a script of `benches/peer` on a job.
pub fn answer(python: &str, script: &str, job: &Value) -> Value {
    let mut child = Command::new(python)
        .arg(format!("benches/peer/{script}"))
        .env("OMP_NUM_THREADS", "1")
        .env("OPENBLAS_NUM_THREADS", "1")
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .spawn()
        .expect("the peer starts");
    child
        .stdin
        .take()
        .expect("standard input is piped")
        .write_all(job.to_string().as_bytes())
        .expect("the peer reads");
    let output = child.wait_with_output().expect("the peer ends");
    assert!(output.status.success(), "the peer failed");
    serde_json::from_slice(&output.stdout).expect("JSON")
}

/// The times of its runs, s, shortest first.
pub fn seconds(answer: &Value) -> Vec<f64> {
    let listed = answer["seconds"].as_array().expect("a list");
    let mut seconds: Vec<f64> = listed
        .iter()
        .map(|value| value.as_f64().expect("a number"))
        .collect();
    seconds.sort_by(f64::total_cmp);
    seconds
}
