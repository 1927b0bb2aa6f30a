//! The farglow program.

use std::io::{self, Write};
use std::process::ExitCode;

fn main() -> ExitCode {
    let mut out = io::BufWriter::new(io::stdout().lock());
    let code = farglow::command::run(std::env::args_os(), &mut out, &mut io::stderr().lock());
    match out.flush() {
        Err(error) if error.kind() != io::ErrorKind::BrokenPipe => {
            eprintln!("farglow: cannot write what was worked out: {error}");
            ExitCode::from(2)
        }
        _ => code,
    }
}
