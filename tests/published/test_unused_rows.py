"""Rows that no law is held against stay listed with a reason, and only such rows."""

from __future__ import annotations

from tests.published.rows import TABLES, lines, read, unused


def test_every_listed_row_exists_and_has_a_reason():
    known = {name for table in TABLES for name in read(table)}
    assert set(unused()) <= known
    assert all(len(reason) > 10 for reason in unused().values())


def test_every_row_has_source_and_provenance():
    for table in TABLES:
        for line in lines(table):
            assert line["source"], line["id"]
            assert line["provenance"], line["id"]


def test_ids_are_unique():
    names = [line["id"] for table in TABLES for line in lines(table)]
    assert len(names) == len(set(names))
