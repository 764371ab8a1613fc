"""Whatever stands in the comments: the draft is TOML, and what it leaves open is what is refused."""

from __future__ import annotations

import tomllib
from pathlib import Path

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from auditor.draft import draft_job, open_faults

WORDS = """
MATERIAL STOCK BAR BRUT ROHTEIL DIA OD ID X L LG JAWS BORED STICK OUT CHUCK COLLET T1 T2 T01 TOOL 1 CNMG 120408
CNMG432 PCLNR 2525 M12 S20S-SCLCR 09 DRILL GROOVE THREAD BORE PARTING HEX 6KT R0.8 .031 TNR 80* 90 DEG 55 W .125W
C45 6061 AL 1.4301 304 SS BRASS M10 TAP HSS LH 1/2 1-1/2 0 0.0 1/0 99999999999 12,5 MM IN " ° Ø ß \\ ' # = : - + /
FACE ROUGH FINISH STOP"""
SIGNS = st.text(st.characters(exclude_categories=("Cc", "Cs")), max_size=3)
COMMENTS = st.lists(st.one_of(st.sampled_from(WORDS.split()), SIGNS), max_size=8).map(" ".join)


@pytest.fixture(scope="module")
def folder(tmp_path_factory: pytest.TempPathFactory) -> Path:
    path = tmp_path_factory.mktemp("any")
    (path / "shop.toml").write_text("", encoding="utf-8")
    return path


@settings(max_examples=60, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(st.lists(COMMENTS, min_size=1, max_size=5))
def test_any_comments(folder: Path, comments: list[str]) -> None:
    heads = "".join(f"({' '.join(comment.replace('(', '').replace(')', '').split())})\n" for comment in comments)
    program = folder / "any.nc"
    program.write_bytes(
        (heads + "G21\nT0101\nG97 S900 M3\nG0 X50. Z2.\nG1 Z-20. F0.2\nX56.\nG0 X90. Z50.\nT0202\nG0 X0. Z2.\n"
         "G1 Z-15. F0.1\nG0 Z2.\nM30\n").encode("utf-8", "replace"))
    target = folder / "any.job.toml"
    draft = draft_job(program, target)
    tomllib.loads(draft.text())
    faults = open_faults(draft.text(), program, target)
    assert sorted(str(fault.key) for fault in faults) == sorted(draft.open)
