"""Packaged tables: every row is checked, and a broken one is refused."""

import pytest

from specgen.catalogue.table import STANDINGS, CatalogueError, catalogue_digest, read_rows, table, table_names

GOOD = "- {id: a/1, x: 3 A, source: common practice, standing: common practice}"


@pytest.mark.parametrize(
    ("text", "words"),
    [
        (GOOD.replace("a/1", "b/1"), "its id starts with a/"),
        (GOOD + "\n" + GOOD, "written twice"),
        (GOOD.replace("source: common practice, ", ""), "has no source"),
        (GOOD.replace(", standing: common practice", ""), "has no standing"),
        (GOOD.replace("standing: common practice", "standing: sure"), "is none of"),
        (GOOD.replace("source: common practice", "source: IEC 60751 table 3"), "without an edition"),
        (GOOD.replace("x: 3 A, ", ""), "holds nothing"),
        (GOOD.replace("x: 3 A", "x: 3 A, x: 4 A"), "Y108"),
        ("x: 1", "not a list"),
        ("- plain", "not a row"),
        ("", "Y105"),
    ],
)
def test_broken_rows_are_refused(text, words):
    with pytest.raises(CatalogueError, match=words):
        read_rows(text, "a")


def test_every_packaged_table_is_sound():
    ids = [row.id for name in table_names() for row in table(name)]
    assert len(ids) == len(set(ids))
    for name in table_names():
        for row in table(name):
            assert row.standing in STANDINGS
            assert row.cited


def test_a_table_that_is_not_there():
    with pytest.raises(CatalogueError, match="no table"):
        table("nothing")


def test_digest_changes_with_the_content(monkeypatch, tmp_path):
    before = catalogue_digest()
    (tmp_path / "data").mkdir()
    (tmp_path / "data" / "a.yml").write_text(GOOD)
    monkeypatch.setattr("specgen.catalogue.table.files", lambda _package: tmp_path)
    for cached in (table_names, catalogue_digest):
        cached.cache_clear()
    try:
        first = catalogue_digest()
        (tmp_path / "data" / "a.yml").write_text(GOOD.replace("3 A", "4 A"))
        catalogue_digest.cache_clear()
        assert len({before, first, catalogue_digest()}) == 3
    finally:
        monkeypatch.undo()
        for cached in (table_names, catalogue_digest):
            cached.cache_clear()
    assert catalogue_digest() == before
