"""Words in every language: complete, with the same places to fill in; numbers as the language writes them."""

from __future__ import annotations

import re
from collections import Counter
from collections.abc import Iterator
from fractions import Fraction
from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app import words
from app.catalogue import Catalogue, read_catalogue
from app.entry import parse_entry
from app.numerals import decimals_of, fixed, laid_out, reading
from app.section_entry import parse_section, section_text
from app.sheet.readings import legible
from app.support_entry import parse_supports, supports_entry
from app.units import (
    QUANTITIES,
    SYSTEM_NAMES,
    decimal_text,
    entry_text,
    format_value,
    utilisation_text,
)
from solver.model import SpringSupport, StopSupport, TubeSection
from tests import catalogues

PLACES = re.compile(r"\{\{?\w*\}?\}|%\(\w+\)[sr]|%[sr]")


@pytest.fixture
def german() -> Iterator[None]:
    words.use_language("de")
    yield
    words.use_language(words.SOURCE)


@pytest.fixture(params=words.LANGUAGES)
def language(request: pytest.FixtureRequest) -> Iterator[str]:
    words.use_language(request.param)
    yield request.param
    words.use_language(words.SOURCE)


def catalogue(code: str) -> Catalogue:
    return read_catalogue(words.catalogue_path(code))


@pytest.mark.parametrize("code", catalogues.TRANSLATIONS)
class TestCatalogue:
    def test_it_has_words_for_every_message_of_the_sources(self, code: str) -> None:
        missing = "\n".join(catalogues.missing(code))
        assert not missing, f"run `python -m tests.catalogues`, then translate in {code}:\n{missing}"

    def test_it_has_no_message_that_the_sources_have_not(self, code: str) -> None:
        text = words.catalogue_path(code).read_text("utf-8")
        said = "run `python -m tests.catalogues`: the catalogue is not what the sources make of it"
        assert catalogues.updated(text, catalogue(code)) == text, said

    def test_nothing_in_it_is_a_guess(self, code: str) -> None:
        assert "fuzzy" not in words.catalogue_path(code).read_text("utf-8")

    def test_the_same_places_are_filled_in(self, code: str) -> None:
        sources = catalogues.wanted()
        for key, texts in catalogue(code).messages.items():
            numbers = (sources[key].message, sources[key].many or sources[key].message)
            for number, text in zip(numbers, texts, strict=len(texts) > 1):
                assert Counter(PLACES.findall(text)) == Counter(PLACES.findall(number)), number

    def test_a_message_begins_and_ends_with_the_same_space(self, code: str) -> None:
        for (_context, message), texts in catalogue(code).messages.items():
            for text in texts:
                assert text[: -len(text.lstrip())] == message[: -len(message.lstrip())], message
                assert text[len(text.rstrip()) :] == message[len(message.rstrip()) :], message

    def test_a_letter_to_press_is_marked_where_the_source_marks_one(self, code: str) -> None:
        for (_context, message), texts in catalogue(code).messages.items():
            assert all(letters(text) == letters(message) <= 1 for text in texts), message

    def test_plurals_agree_with_gettext(self, code: str) -> None:
        head = words.catalogue_path(code).read_text("utf-8").split("\n\n", 1)[0]
        assert "Plural-Forms: nplurals=2; plural=(n != 1);" in head
        own = catalogue(code)
        assert [own.plural(count) for count in (0, 1, 2, 21)] == [1, 0, 1, 1]


def letters(text: str) -> int:
    return text.replace("&&", "").count("&")


def test_what_is_written_is_what_is_read(tmp_path: Path) -> None:
    """Quotes, backslashes, tabs, lines and blank lines survive; the reader is not the writer's own."""
    message = 'a "quoted" \\ word\tand\n\n  a second line\n'
    found = catalogues.Found(message, "", "where", "app/x.py")
    path = tmp_path / "some.po"
    path.write_text('msgid ""\nmsgstr ""\n\n' + catalogues.written(found, (message.upper(),)) + "\n", "utf-8")
    assert read_catalogue(path).text(message, "where") == message.upper()
    assert read_catalogue(path).text(message) == message


def test_a_guess_and_an_empty_text_stay_in_the_words_of_the_source(tmp_path: Path) -> None:
    path = tmp_path / "some.po"
    guess, empty = '#, fuzzy\nmsgid "joint"\nmsgstr "Gelenk"', 'msgid "load"\nmsgstr ""'
    path.write_text(f'msgid ""\nmsgstr ""\n\n{guess}\n\n{empty}\n', "utf-8")
    assert (read_catalogue(path).text("joint"), read_catalogue(path).text("load")) == ("joint", "load")


def test_messages_are_found_wherever_they_stand() -> None:
    plural = 'trn("{count} one", "{count} many", n)'
    text = f"""[f"{{tr('inside')}} {{n}}", later("table"), {plural}, trc("c", "m"), tr(x)]"""
    found = [(one.message, one.many, one.context) for one in catalogues.messages_of(text, "x.py")]
    assert found == [
        ("inside", "", ""), ("table", "", ""), ("{count} one", "{count} many", ""), ("m", "", "c"),
    ]  # fmt: skip


@pytest.mark.parametrize(
    ("environment", "code"),
    [
        ({"LANG": "de_DE.UTF-8"}, "de"),
        ({"LANG": "de"}, "de"),
        ({"LANG": "en_GB.UTF-8"}, "en"),
        ({"LANG": "C.UTF-8"}, "en"),
        ({"LANG": "fr_FR.UTF-8"}, "en"),
        ({"LANG": "en_US.UTF-8", "LC_MESSAGES": "de_AT.UTF-8"}, "de"),
        ({"LANG": "de_DE", "LC_ALL": "POSIX"}, "en"),
        ({"LC_ALL": "C", "LANGUAGE": "de"}, "de"),
        ({"LANGUAGE": "fr:de:en"}, "de"),
        ({"LANGUAGE": "", "LANG": "de_CH.utf8"}, "de"),
    ],
)
def test_the_system_says_the_language(environment: dict[str, str], code: str) -> None:
    assert words.system_language(environment) == code


@pytest.mark.parametrize(("name", "code"), [("German_Germany", "de"), ("de_DE", "de"), (None, "en")])
def test_a_system_without_variables_is_asked(monkeypatch: pytest.MonkeyPatch, name: str, code: str) -> None:
    monkeypatch.setattr("locale.getlocale", lambda: (name, "UTF-8"))
    assert words.system_language({}) == code


@pytest.mark.usefixtures("german")
def test_numbers_for_eyes_have_the_comma() -> None:
    assert reading(-12345.6, 7) == "−12\u202f345,60"
    assert reading(2.5e-11, 2) == "2,5·10⁻¹¹"
    assert fixed(0.5, 2) == "0,50"
    assert laid_out("-1234567.891") == "−1\u202f234\u202f567,891"
    assert utilisation_text(1.0004, "fail") == "1,0004"
    assert format_value(0.0125, "size", "mm-N-MPa", with_unit=True) == "12,50 mm"
    assert legible("⌀12,3456789012→⌀40,5") == "⌀12,3456789→⌀40,5"
    assert decimals_of("1,0004") == 4


@pytest.mark.usefixtures("german")
def test_numbers_to_compute_with_keep_the_point() -> None:
    assert decimal_text(0.0125, "size", "mm-N-MPa") == "12.5"
    assert entry_text(0.0125, "size", "mm-N-MPa") == "12,5"


@given(
    st.floats(-1e12, 1e12).filter(lambda value: value == 0 or abs(value) > 1e-12),
    st.sampled_from(QUANTITIES),
    st.sampled_from(SYSTEM_NAMES),
    st.sampled_from(tuple(words.LANGUAGES)),
)
def test_what_is_shown_to_edit_typed_back_is_the_same_number(value, quantity, system, code) -> None:
    words.use_language(code)
    try:
        assert parse_entry(entry_text(value, quantity, system), quantity, system) == value
    finally:
        words.use_language(words.SOURCE)


@given(
    st.floats(1e-3, 10.0), st.floats(0.01, 0.99), st.sampled_from(SYSTEM_NAMES),
    st.sampled_from(tuple(words.LANGUAGES)),
)  # fmt: skip
def test_sections_and_supports_typed_back_are_the_same(size, share, system, code) -> None:
    words.use_language(code)
    try:
        tube = TubeSection(outer=size, inner=size * share)
        assert parse_section(section_text(tube, system), system) == tube
        for support in (
            SpringSupport(stiffness=size * 1e6),
            StopSupport(side="plus", clearance=size, stiffness=share * 1e6),
        ):
            assert parse_supports(supports_entry((support,), system), system) == (support,)
    finally:
        words.use_language(words.SOURCE)


@pytest.mark.parametrize("typed", ["1.500", "1,500"])
def test_thousands_are_never_meant(typed: str, language: str) -> None:
    assert parse_entry(typed, "length", "m-kN-MPa") == float(Fraction(3, 2))


@pytest.mark.usefixtures("german")
def test_the_trade_s_words_are_read_in_either_language() -> None:
    system = "mm-N-MPa"
    assert parse_supports("Feder 600 kN/mm", system) == parse_supports("spring 600 kN/mm", system)
    assert parse_supports("anschlag + 0,5 mm", system) == parse_supports("stop + 0.5 mm", system)
    assert parse_supports("fest und Anschlag ± 0,5", system) == parse_supports("fixed and stop ± 0.5", system)
    assert parse_section("d60 Bohrung 50", system) == parse_section("d60 bore 50", system)


def test_no_message_stands_twice_in_a_catalogue() -> None:
    text = words.catalogue_path("de").read_text("utf-8")
    keys = re.findall(r'(?:msgctxt (".*")\n)?msgid ((?:".*"\n)+)', text)
    assert [key for key, count in Counter(keys).items() if count > 1] == []
