"""Finds words on a page of help: all of them in any order, in one paragraph, else under one heading."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from typing import NamedTuple

from PySide6.QtGui import QTextDocument


class Hit(NamedTuple):
    """From the first to the last of the words, as positions in the document."""

    begin: int
    end: int


class _Passage(NamedTuple):
    begin: int
    text: str


def hits(document: QTextDocument, words: Sequence[str], *, under_heading: bool = False) -> list[Hit]:
    """Where the words stand together, in order; a single word is found as often as it stands there."""
    passages = _sections(document) if under_heading else _paragraphs(document)
    return [hit for passage in passages for hit in _hits_in(passage, [word.lower() for word in words])]


def _paragraphs(document: QTextDocument) -> Iterator[_Passage]:
    block = document.begin()
    while block.isValid():
        yield _Passage(block.position(), block.text().lower())
        block = block.next()


def _sections(document: QTextDocument) -> Iterator[_Passage]:
    """From each heading to the next one."""
    begin, texts = 0, list[str]()
    block = document.begin()
    while block.isValid():
        if block.blockFormat().headingLevel() and texts:
            yield _Passage(begin, "\n".join(texts))
            begin, texts = block.position(), []
        texts.append(block.text().lower())
        block = block.next()
    yield _Passage(begin, "\n".join(texts))


def _hits_in(passage: _Passage, words: Sequence[str]) -> Iterator[Hit]:
    text, begin = passage.text, passage.begin
    places = [text.find(word) for word in words]
    if not places or min(places) < 0:
        return
    if len(words) > 1:
        last = max(place + len(word) for place, word in zip(places, words, strict=True))
        yield Hit(begin + min(places), begin + last)
        return
    at = places[0]
    while at >= 0:
        yield Hit(begin + at, begin + at + len(words[0]))
        at = text.find(words[0], at + len(words[0]))
