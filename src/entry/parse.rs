//! From tokens to a program.

use super::Diagnostic;
use super::program::Program;
use super::token::Tokens;

pub(super) fn compile(_text: &str, _tokens: &Tokens) -> Result<Program, Diagnostic> {
    Ok(Program::literal())
}
