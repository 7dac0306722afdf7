//! The peak of this process's memory, as the kernel counts it. A counting allocator would need
//! `unsafe`, which this project forbids; the kernel's mark can be set back before each input.

use std::fs;

/// What a work gives, and by how many bytes the process grew while it worked.
pub fn peak_of<T>(work: impl FnOnce() -> T) -> (T, u64) {
    // 5 sets the high-water mark back to what is resident now (proc(5), clear_refs).
    fs::write("/proc/self/clear_refs", "5").expect("the high-water mark can be set back");
    let before = bytes("VmRSS:");
    let given = work();
    (given, bytes("VmHWM:").saturating_sub(before))
}

fn bytes(name: &str) -> u64 {
    let status = fs::read_to_string("/proc/self/status").expect("the process's status");
    let line = status.lines().find_map(|line| line.strip_prefix(name)).expect("a line of memory");
    let kilobytes: u64 =
        line.trim().trim_end_matches("kB").trim().parse().expect("a number of kilobytes");
    kilobytes * 1024
}
