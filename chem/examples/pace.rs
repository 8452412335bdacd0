//! Times the steps of reading and labelling inside one process, on one core; served by `tests/speed`.
//!
//! `pace FILE.sdf` prints seconds for splitting the file into records, for reading them, and for reading and
//! labelling them, each the median of five, then the slowest records. `pace FILE.sdf each` prints for every
//! record its milliseconds, how many of its places carry a letter, and how many are not decided.
#![allow(
    clippy::print_stdout,
    clippy::print_stderr,
    reason = "a tool whose output is its purpose"
)]

use chem::format::sdf::{RawRecord, Reader};
use chem::format::text;
use chem::pipeline;
use chem::solve::require::Requirement;
use std::time::Instant;

fn main() -> std::process::ExitCode {
    let mut args = std::env::args().skip(1);
    let Some(bytes) = args.next().and_then(|path| std::fs::read(path).ok()) else {
        eprintln!("pace FILE.sdf: a file that can be read");
        return std::process::ExitCode::from(2);
    };
    if args.next().as_deref() == Some("each") {
        each(&bytes);
        return std::process::ExitCode::SUCCESS;
    }
    let seconds = median(|| {
        split(&bytes, |record| {
            std::hint::black_box(record);
        })
    });
    let mut pieces: Vec<Vec<u8>> = Vec::new();
    split(&bytes, |record| pieces.push(record.to_vec()));
    let labels = median(|| pieces.iter().filter(|p| labelled(p)).count());
    let reading = median(|| pieces.iter().filter(|p| read(p).is_some()).count());
    println!("records {}", pieces.len());
    println!("split {seconds:.6}");
    println!("read {reading:.6}");
    println!("labels {labels:.6}");
    let mut slow: Vec<(f64, String)> = pieces
        .iter()
        .map(|p| {
            let start = Instant::now();
            labelled(p);
            (start.elapsed().as_secs_f64(), title(p))
        })
        .collect();
    slow.sort_by(|a, b| b.0.total_cmp(&a.0));
    for (seconds, title) in slow.iter().take(5) {
        println!("slow {seconds:.6} {title}");
    }
    std::process::ExitCode::SUCCESS
}

/// One line for each record.
fn each(bytes: &[u8]) {
    split(bytes, |bytes| {
        let start = Instant::now();
        let Some(record) = read(bytes) else {
            println!("{}\tcannot be read", title(bytes));
            return;
        };
        let report = pipeline::report(&record.drawing, &Requirement::default());
        let milliseconds = 1000.0 * start.elapsed().as_secs_f64();
        let carried = report.places.iter().filter(|p| p.carries.is_some());
        let undecided = report
            .places
            .iter()
            .filter(|p| p.note.contains("not decided"));
        let notes: Vec<&str> = undecided.clone().map(|p| p.note.as_str()).take(1).collect();
        println!(
            "{}\t{milliseconds:.1} ms\t{} carried\t{} not decided\t{}",
            title(bytes),
            carried.count(),
            undecided.count(),
            notes.join("")
        );
    });
}

/// First line of a record.
fn title(bytes: &[u8]) -> String {
    let line = bytes.split(|b| matches!(b, b'\n' | b'\r')).next();
    String::from_utf8_lossy(line.unwrap_or_default()).into_owned()
}

fn read(bytes: &[u8]) -> Option<chem::format::Record> {
    let (text, _) = text::decode(bytes, 1).ok()?;
    RawRecord::new(&text, 1, 1).read().ok()
}

fn labelled(bytes: &[u8]) -> bool {
    read(bytes).is_some_and(|r| {
        let carried = pipeline::carried(&r.drawing);
        !std::hint::black_box(carried).labels.is_empty()
    })
}

/// Median of five runs, in seconds.
fn median(mut run: impl FnMut() -> usize) -> f64 {
    let mut seconds = [0.0; 5];
    for second in &mut seconds {
        let start = Instant::now();
        std::hint::black_box(run());
        *second = start.elapsed().as_secs_f64();
    }
    seconds.sort_by(f64::total_cmp);
    seconds[2]
}

/// Hands each record's bytes to `take`; their number.
fn split(bytes: &[u8], mut take: impl FnMut(&[u8])) -> usize {
    let mut reader = Reader::new(bytes);
    let mut count = 0;
    while let Ok(Some(chunk)) = reader.next_chunk() {
        take(chunk.bytes);
        count += 1;
    }
    count
}
