"""Every sentence about a project in one place, for window, terminal and sheet alike: data in, words out.

Words stand in tables by rule, reason and kind; nothing here computes, and nothing elsewhere words.
"""

from app.phrases.faults import fault_sentence

__all__ = ["fault_sentence"]
