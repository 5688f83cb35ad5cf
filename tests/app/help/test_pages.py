"""The pages of help: complete in every language, alike in their build, and without a dead link."""

from __future__ import annotations

import re

import pytest

from app.help.example import example
from app.help.markup import LINK, PICTURE, filled, headings, marks
from app.help.pages import FALLBACK, KEYS, PAGES, languages, page_path, read_page
from app.words import use_language
from solver.solve import solve
from tests.test_house_rules import sources

WRITTEN = [page for page, _title in PAGES if page != KEYS]
EVERY_PAGE = pytest.mark.parametrize(
    ("language", "page"), [(language, page) for language in languages() for page in WRITTEN]
)


def text_of(page: str, language: str) -> str:
    return page_path(page, language).read_text("utf-8")


def test_there_is_english_and_german():
    assert set(languages()) >= {"en", "de"}


@EVERY_PAGE
def test_every_page_is_there_with_the_headings_of_the_english_one(language: str, page: str):
    assert headings(text_of(page, language)) == headings(text_of(page, FALLBACK))


@EVERY_PAGE
def test_every_page_has_the_pictures_and_the_rows_of_the_english_one(language: str, page: str):
    own, english = text_of(page, language), text_of(page, FALLBACK)
    assert [target for _alt, target in PICTURE.findall(own)] == [t for _alt, t in PICTURE.findall(english)]
    assert own.count("\n|") == english.count("\n|")
    assert own.count("\n- ") == english.count("\n- ")


@EVERY_PAGE
def test_every_page_names_the_same_keys_menus_and_words(language: str, page: str):
    assert sorted(marks(text_of(page, language))) == sorted(marks(text_of(page, FALLBACK)))


@EVERY_PAGE
def test_every_picture_says_in_words_what_it_shows(language: str, page: str):
    for alt, _target in PICTURE.findall(text_of(page, language)):
        assert len(alt.split()) >= 6, alt


@EVERY_PAGE
def test_no_link_is_dead(language: str, page: str):
    for target in LINK.findall(text_of(page, language)):
        path, _, heading = target.partition("#")
        name = path.removesuffix(".md") or page
        assert name in dict(PAGES), target
        if heading:
            assert heading in {anchor for _level, anchor in headings(text_of(name, language))}, target


@EVERY_PAGE
def test_words_quoted_from_the_window_are_words_of_it(language: str, page: str):
    source = "\n".join(path.read_text("utf-8") for path in sources())
    for kind, word in marks(text_of(page, language)):
        assert kind != "word" or re.search(rf'\b(tr|later)\(\s*"{re.escape(word)}"', source), word


@EVERY_PAGE
def test_no_brace_is_left_that_fills_in_nothing(language: str, page: str):
    plain = dict.fromkeys(("key", "menu", "word"), lambda _name: "-")
    assert not re.search(r"[{}]", filled(text_of(page, language), plain).text)


def test_a_page_is_read_in_the_language_in_use_and_else_in_english():
    try:
        use_language("de")
        assert read_page("limits").startswith("# Grenzen")
    finally:
        use_language("en")
    assert read_page("limits").startswith("# Limits")
    with pytest.raises(KeyError):
        read_page("nothing")


def test_a_mark_that_names_nothing_is_an_error():
    def none_such(name: str) -> str:
        raise KeyError(name)

    with pytest.raises(KeyError):
        filled("Press {key:nothing}.", {"key": none_such})


def test_names_of_headings_lead_to_them_and_are_not_shown():
    shown = filled("# One\n\n## Two {#two}\n\n### Three {#three}\n", {})
    assert shown.text == "# One\n\n## Two\n\n### Three\n"
    assert dict(shown.anchors) == {"two": 1, "three": 2}


def test_the_member_of_the_pictures_shows_what_the_pages_tell_of():
    results = solve(example())
    worst = max(check.utilisation or 0.0 for check in results.checks)
    assert 1.0 < worst < 1.2, "one check fails, so that the picture has a failing one"
