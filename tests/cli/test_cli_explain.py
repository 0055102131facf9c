"""`tussock explain`: every word of the language, of the trade and of the diagnostics has a page."""

import re
import unicodedata

import pytest


@pytest.mark.parametrize(
    ("word", "heading", "says"),
    [
        ("compare", "# compare", "Defines a comparison"),
        ("omnibus", "# omnibus", "The four criteria with their"),
        ("pillai", "# Pillai's trace (V)", "squared canonical correlations"),
        ("structure", "# Structure coefficient", "The correlation, within groups"),
        ("unknown-path", "# unknown-path", "does not lead to a value"),
        ("zscore", "# zscore", "in standard deviations"),
        ("ferry", "# ferry", "invented data"),
    ],
    ids=["verb", "view", "term", "key", "rule", "function", "sample"],
)
def test_a_word_has_a_page(folder, word, heading, says):
    ran = folder.tussock("explain", word)
    assert (ran.code, ran.err) == (0, "")
    assert ran.out.startswith(f"{heading}\n\n")
    assert says in ran.out
    assert ran.out.endswith("\n") and not ran.out.endswith("\n\n")


def test_a_clause_is_explained_with_the_verb_that_it_belongs_to(folder):
    ran = folder.tussock("explain", "across")
    assert ran.code == 0
    assert "across FACTOR" in ran.out and "`compare`" in ran.out


def test_a_word_with_two_meanings_gets_both_pages(folder):
    """`mean` is a term of the trade and a function."""
    out = folder.tussock("explain", "mean").out
    assert len(re.findall(r"^# ", out, flags=re.MULTILINE)) == 2


@pytest.mark.parametrize(
    ("word", "hint"),
    [
        ("omnibuss", "did you mean omnibus?"),
        ("structur", "did you mean structure or structure-coefficient?"),
        ("xyzzyq", "`tussock explain` lists the words that have one"),
    ],
)
def test_an_unknown_word_is_answered_with_the_nearest_ones(folder, word, hint):
    ran = folder.tussock("explain", word)
    assert (ran.code, ran.out) == (1, "")
    assert ran.err == f"tussock: there is no page for `{word}`: {hint}\n"


def words(folder):
    listed = folder.tussock("explain")
    assert (listed.code, listed.err) == (0, "")
    return listed.out.splitlines()


def test_without_a_word_all_of_them_are_listed_with_a_summary(folder):
    lines = words(folder)
    assert len(lines) > 80
    for line in lines:
        name, summary = line.split(maxsplit=1)
        assert len(summary) > 10
    names = [line.split()[0] for line in lines]
    for verb in ("policy", "read", "admit", "derive", "levels", "label", "compare", "show", "write", "pin"):
        assert verb in names


def test_every_word_that_is_listed_has_a_page_and_every_rule_that_is_told_is_listed(folder):
    names = {line.split()[0] for line in words(folder)}
    for name in sorted(names):
        ran = folder.tussock("explain", name)
        assert ran.code == 0 and ran.out.startswith("# "), name
        assert not any(unicodedata.category(sign) == "Cc" for sign in ran.out.replace("\n", ""))
    told = {
        "moved-pin",
        "unreadable-file",
        "text-in-numeric-column",
        "empty-group",
        "single-group",
        "constant-outcome",
        "constant-within-groups",
        "dependent-outcomes",
        "too-many-outcomes",
        "unlisted-level",
        "single-row-groups",
        "small-group",
    }
    assert told <= names
