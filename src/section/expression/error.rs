//! What can be wrong with an expression.

use std::ops::Range;

/// Why a text is no expression, and where.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("{message}")]
pub struct ExpressionError {
    /// Bytes of the text that it concerns.
    pub span: Range<usize>,
    /// What is wrong.
    pub message: String,
    /// What would be right, where that can be said.
    pub help: Option<String>,
}

impl ExpressionError {
    pub(super) fn new(span: Range<usize>, message: impl Into<String>) -> Self {
        Self { span, message: message.into(), help: None }
    }

    pub(super) fn help(self, help: impl Into<String>) -> Self {
        Self { help: Some(help.into()), ..self }
    }
}
