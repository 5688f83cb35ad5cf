"""A language of brackets: what went through the catalogue stands in ‹›, so that a word that did not is seen.

Each piece of a message between its places is wrapped by itself, and what is filled in stands outside: a word
that is filled in without having been translated is found as well.
"""

from __future__ import annotations

import re
from collections.abc import Iterator
from contextlib import contextmanager
from typing import Final

import msgspec.structs
import pytest

from app import words
from app.catalogue import Catalogue
from solver.model import Project
from tests.catalogues import wanted

_PLACE: Final = re.compile(r"(\{\{?\w*\}?\}|%\(\w+\)[sr]|%[sr])")
_WRAPPED: Final = re.compile(r"‹[^‹›]*›")
_CUT: Final = re.compile(r"‹[^‹›]*$|^[^‹›]*›")  # where a line was broken or had no room for all
_TAG: Final = re.compile(r"<[^<>]*>")
_WORD: Final = re.compile(r"[A-Za-zÀ-ž]{3,}")


class Brackets(Catalogue):
    """Every message in its own words, wrapped; one that no catalogue would hold stays as it is."""

    def text(self, message: str, context: str = "") -> str:
        """The message, each of its pieces in brackets."""
        return wrapped(message) if (context, message) in wanted() else message

    def counted(self, one: str, many: str, count: int) -> str:
        """The message for so many things, the same way."""
        return self.text(one) if count == 1 else wrapped(many)


def wrapped(message: str) -> str:
    """A message with all but its places in brackets."""
    pieces = _PLACE.split(message)
    return "".join(piece if odd % 2 or not piece else f"‹{piece}›" for odd, piece in enumerate(pieces))


@contextmanager
def brackets() -> Iterator[None]:
    """Speak in brackets for a while."""
    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(words, "_catalogue", Brackets())
        yield


def bare(text: str, known: frozenset[str]) -> list[str]:
    """The words of a text that stand in no brackets and are not known."""
    text = _TAG.sub(" ", text.replace("&", ""))
    while (shorter := _WRAPPED.sub(" ", text)) != text:
        text = shorter
    text = _CUT.sub("", text)
    return [word for word in _WORD.findall(text) if word.casefold() not in known]


def words_of(project: Project) -> frozenset[str]:
    """The words that the user wrote into a project, in lower case."""
    names = [project.title, project.notes, *msgspec.structs.astuple(project.sheet)]
    names += [named.name for named in (*project.materials, *project.load_cases, *project.combinations)]
    names += [marked.mark for marked in (*project.segments, *project.joints)]
    names += [waiver.reason for waiver in project.limits.waived]
    names += [part.mark for companion in project.companions for part in (companion, *companion.segments)]
    return frozenset(word.casefold() for word in _WORD.findall(" ".join(names)))
