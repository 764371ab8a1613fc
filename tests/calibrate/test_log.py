"""Logs as meters and spreadsheets write them, and what is wrong with them in words."""

from __future__ import annotations

from pathlib import Path

import pytest

from auditor.calibrate import read_log
from auditor.errors import UsageError


def log(folder: Path, text: str, encoding: str = "utf-8") -> Path:
    path = folder / "log.csv"
    path.write_bytes(text.encode(encoding))
    return path


@pytest.mark.parametrize(
    "text",
    [
        "line,power_kW\n12,3.5\n14,4\n",
        "# from the meter\nLine;Power_kW;remark\n12;3,5;ä\n14;4,0;\n",
        "line\tpower_kW\r\n12\t3,5\r\n14\t4\r\n",
        "\ufeffpower_kw,line\n3.5,12\n4,14\n",
        '"line","power_kW"\n"12","3.5"\n"14","4.0"\n',
    ],
)
@pytest.mark.parametrize("encoding", ["utf-8", "latin-1"])
def test_forms(tmp_path: Path, text: str, encoding: str) -> None:
    if encoding == "latin-1" and text.startswith("\ufeff"):
        return
    found = read_log(log(tmp_path, text, encoding))
    assert (found.place, found.quantity) == ("line", "power_kW")
    assert found.where.tolist() == [12.0, 14.0]
    assert found.reading.tolist() == [3.5, 4.0]


def test_n_words_percent_signs_and_gaps(tmp_path: Path) -> None:
    found = read_log(log(tmp_path, "block,load_percent\nN70,45 %\nN80,\n90,50\n"))
    assert (found.where.tolist(), found.reading.tolist(), found.empty) == ([70.0, 90.0], [45.0, 50.0], 1)


def test_a_line_is_believed_before_a_time(tmp_path: Path) -> None:
    assert read_log(log(tmp_path, "time_s,line,rated_percent\n0.5,12,40\n")).place == "line"


@pytest.mark.parametrize(
    ("text", "said"),
    [
        ("", "column names"),
        ("line,power_kW\n", "column names"),
        ("when,power_kW\n1,2\n", "time_s, line or block"),
        ("line,load\n1,2\n", "one of power_kW, load_percent, rated_percent"),
        ("line,power_kW,load_percent\n1,2,3\n", "one column"),
        ("line,power_kW\n1,2\n2,much\n", r"log\.csv:3: not numbers; found 2,much"),
        ("line,power_kW\n,2\n", "not numbers"),
        ("line,power_kW\n1,nan\n", "not numbers"),
    ],
)
def test_what_is_wrong_is_said(tmp_path: Path, text: str, said: str) -> None:
    with pytest.raises(UsageError, match=said):
        read_log(log(tmp_path, text))


def test_a_missing_file_is_said(tmp_path: Path) -> None:
    with pytest.raises(UsageError, match="cannot be read"):
        read_log(tmp_path / "none.csv")
