//! The peak of this process's memory and its processor time, as the kernel counts them. A counting
//! allocator would need `unsafe`, which this project forbids; the kernel's mark can be set back
//! before each input.

use std::fs;
use std::time::Duration;

/// What a work gives, and by how many bytes the process grew while it worked.
pub fn peak_of<T>(work: impl FnOnce() -> T) -> (T, u64) {
    // 5 sets the high-water mark back to what is resident now (proc(5), clear_refs).
    fs::write("/proc/self/clear_refs", "5").expect("the high-water mark can be set back");
    let before = bytes("VmRSS:");
    let given = work();
    (given, bytes("VmHWM:").saturating_sub(before))
}

/// Processor time of this process so far. On a machine with other work it says how long an input
/// takes; a clock on the wall would say how busy the machine is.
pub fn processor_time() -> Duration {
    /// A tick of the kernel's account (USER_HZ, 100 on every Linux).
    const TICK: Duration = Duration::from_millis(10);
    let stat = fs::read_to_string("/proc/self/stat").expect("the process's account");
    // The name in brackets may hold blanks; utime and stime are the 12th and 13th words after it.
    let after = stat.rsplit_once(')').map_or("", |(_, after)| after);
    let words: Vec<&str> = after.split_whitespace().collect();
    let ticks = |at: usize| words[at].parse::<u32>().expect("a number of ticks");
    TICK * (ticks(11) + ticks(12))
}

fn bytes(name: &str) -> u64 {
    let status = fs::read_to_string("/proc/self/status").expect("the process's status");
    let line = status.lines().find_map(|line| line.strip_prefix(name)).expect("a line of memory");
    let kilobytes: u64 =
        line.trim().trim_end_matches("kB").trim().parse().expect("a number of kilobytes");
    kilobytes * 1024
}
