"""Every sentence about a project in one place, for window, terminal and sheet alike: data in, words out.

Words stand in tables by rule, reason and kind; nothing here computes, and nothing elsewhere words.
"""

from app.phrases.checks import (
    check_sentence,
    not_made_sentence,
    reason_text,
    verdict_detail,
    verdict_line,
)
from app.phrases.errors import error_sentences
from app.phrases.faults import fault_sentence
from app.phrases.notes import caution, numerical_error_sentence

__all__ = [
    "caution",
    "check_sentence",
    "error_sentences",
    "fault_sentence",
    "not_made_sentence",
    "numerical_error_sentence",
    "reason_text",
    "verdict_detail",
    "verdict_line",
]
