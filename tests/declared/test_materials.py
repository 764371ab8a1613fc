"""The material catalogue against the published tables it was taken from, and its own order."""

from __future__ import annotations

import shutil

import pytest

from auditor.declared import materials
from auditor.declared.material_files import GROUPS, PROVENANCES, Entry, Figure
from auditor.errors import DeclarationError
from tests.declared.published import by_id, rows

TABLES = {(row["source"], row["row"]): row for row in rows("material_kienzle.csv")}
PAIRS = {row["source"]: row for row in rows("material_pairs.csv")}
POINTS = {row["source"]: row for row in rows("material_points.csv")}
ENTRIES = materials.entries()
WITH_PAIR = [item for item in ENTRIES if item.material.kc11 is not None]


def name_of(item: object) -> str:
    return item.material.name if isinstance(item, Entry) else ""


def figure(item: Entry, key: str) -> Figure:
    (found,) = [figure for figure in item.figures if figure.key == key]
    return found


def number(text: str) -> float | None:
    return float(text) if text else None


# ---- the figures


@pytest.mark.parametrize("item", WITH_PAIR, ids=name_of)
def test_force_pair_is_that_of_the_published_row(item):
    pair = figure(item, "kc11")
    row = TABLES[pair.source, pair.row]
    assert pair.provenance == row["provenance"] == item.material.provenance
    assert figure(item, "mc").row == pair.row  # kc11 and mc never from different sources
    material = item.material
    assert (material.kc11, material.mc) == (float(row["kc11_N_mm2"]), float(row["mc"]))
    assert (material.kf11, material.mf) == (number(row["kf11_N_mm2"]), number(row["mf"]))
    assert (material.kp11, material.mp) == (number(row["kp11_N_mm2"]), number(row["mp"]))
    if row["tensile_strength_MPa"]:
        assert material.tensile_strength == float(row["tensile_strength_MPa"])


def test_every_published_row_is_used():
    used = {(part.source, part.row) for item in ENTRIES for part in (*item.figures, *item.others)}
    assert set(TABLES) <= used


@pytest.mark.parametrize("row", rows("material_force_checks.csv"), ids=by_id)
def test_published_forces_follow_from_the_catalogue(row):
    """Printed specific forces and forces per mm of width, each from the pair the catalogue holds for that row."""
    h, expected = float(row["h_mm"]), float(row["expected"])
    if row["figure"] == "kc":
        forces = {pair[0] * h ** -pair[1] for pair in pairs_of(row["row"])}
    else:
        letter = row["figure"][1]
        (item,) = [item for item in WITH_PAIR if is_carbide_row(item, row["row"])]
        k, m = getattr(item.material, f"k{letter}11"), getattr(item.material, f"m{letter}")
        forces = {k * h ** (1.0 - m)}
    assert min(abs(force / expected - 1.0) for force in forces) <= float(row["tolerance_percent"]) / 100.0


def pairs_of(row: str) -> set[tuple[float, float]]:
    own = {(item.material.kc11, item.material.mc) for item in WITH_PAIR if figure(item, "kc11").row == row}
    others = {(other.kc11, other.mc) for item in ENTRIES for other in item.others if other.row == row}
    return own | others


def is_carbide_row(item: Entry, row: str) -> bool:
    return item.material.kf11 is not None and figure(item, "kc11").row == row


@pytest.mark.parametrize("item", [item for item in ENTRIES if item.others], ids=name_of)
def test_disagreements_are_as_large_as_written(item):
    for other in item.others:
        if other.row is not None:
            row = TABLES[other.source, other.row]
        else:
            row = PAIRS.get(other.source) or POINTS[other.source]
        assert other.provenance == row["provenance"]
        if "kc11_N_mm2" in row:
            assert (other.kc11, other.mc, other.thickness) == (float(row["kc11_N_mm2"]), float(row["mc"]), 0.2)
            theirs = float(row["kc11_N_mm2"]) * 0.2 ** -float(row["mc"])
        else:
            theirs = float(row["kc_N_mm2"])
            assert (other.kc, other.thickness) == (theirs, float(row["at_mm"]))
        ours = item.material.kc11 * other.thickness**-item.material.mc
        assert other.difference == pytest.approx(theirs / ours - 1.0, abs=0.0051)  # written to whole percent


@pytest.mark.parametrize("row", rows("material_disagreements.csv"), ids=by_id)
def test_known_disagreements_are_shown(row):
    item = materials.entry(row["material"])
    h, own, theirs = float(row["h_mm"]), float(row["own_kc_N_mm2"]), float(row["other_kc_N_mm2"])
    assert item.material.kc11 * h**-item.material.mc == pytest.approx(own, abs=0.5)
    at_h = [other for other in item.others if other.thickness == h]
    (other,) = [other for other in at_h if abs(other.kc - theirs) <= 1.0]  # whole N, one of them rounded upward
    if row["apart_percent"]:
        assert f"{row['apart_percent']} % more" in str(other)


@pytest.mark.parametrize("row", rows("material_moduli.csv"), ids=by_id)
def test_moduli_lie_in_the_handbook_range(row):
    for name in row["members"].split(";"):
        assert float(row["low_GPa"]) <= materials.find(name).modulus / 1000.0 <= float(row["high_GPa"]), name


def test_plastics_have_no_force_pair():
    """No published Kienzle pair for a thermoplastic is known: forces stay open."""
    plastics = [item.material for item in ENTRIES if item.material.group == "O"]
    assert {"POM-C", "PA6", "PEEK", "PVC", "PTFE"} <= {material.name for material in plastics}
    assert all(material.kc11 is None and material.mc is None for material in plastics)


@pytest.mark.parametrize("item", WITH_PAIR, ids=name_of)
def test_scatter_and_reference_rake_follow_the_kind_of_source(item):
    """25 % for a listed material, 40 % for a value of a group; +6 deg steel and +2 deg cast iron in the tables."""
    pair = figure(item, "kc11")
    unsure = pair.source.startswith("value for a group") or TABLES[pair.source, pair.row]["remark"]
    assert item.material.scatter == (0.40 if unsure else 0.25)
    if item.material.group in "PK":
        assert item.material.reference_rake == {"P": 6.0, "K": 2.0}[item.material.group]


def test_every_group_of_iso_513_is_there():
    assert {item.material.group for item in ENTRIES} == set(GROUPS)
    assert len(ENTRIES) >= 60


@pytest.mark.parametrize("item", ENTRIES, ids=name_of)
def test_every_figure_has_a_source(item):
    assert {"modulus", "density", "chips"} <= {figure.key for figure in item.figures}
    for part in (*item.figures, *item.others):
        assert part.source.strip()
        assert part.provenance in PROVENANCES


# ---- names


@pytest.mark.parametrize(
    ("asked", "name"),  # EN 10027-2 numbers, former names and AISI neighbours, from memory
    [
        ("C45", "C45"), (" c 45 ", "C45"), ("ck45", "C45"), ("1.0503", "C45"), ("AISI 1045", "C45"), ("1045", "C45"),
        ("SAE 1045", "C45"), ("42crmo4", "42CrMo4"), ("1.7225", "42CrMo4"), ("4140", "42CrMo4"),
        ("1.4301", "X5CrNi18-10"), ("304", "X5CrNi18-10"), ("X5 CrNi 18 10", "X5CrNi18-10"), ("GG-25", "EN-GJL-250"),
        ("GJL 250", "EN-GJL-250"), ("Ti6Al4V", "Ti-6Al-4V"), ("6061-T6", "EN AW-6061"), ("Ms58", "CuZn39Pb3"),
        ("pom", "POM-C"), ("100Cr6 hardened", "100Cr6 60 HRC"), ("12L14", "11SMnPb30"),
    ],
)  # fmt: skip
def test_names_and_other_names(asked, name):
    assert materials.find(asked).name == name


@pytest.mark.parametrize("asked", ["", "   ", "-", "unobtainium", "source", "from memory", "§", "C4"])
def test_an_unknown_name_is_none(asked):
    assert materials.find(asked) is None
    assert materials.entry(asked) is None


@pytest.mark.parametrize(
    ("asked", "meant"),
    [("C46", "C45"), ("42CrMo5", "42CrMo4"), ("nickel 718", "Alloy 718"), ("X5CrNi18-11", "X5CrNi18-10")],
)
def test_suggestions(asked, meant):
    assert meant in materials.nearest(asked)


def test_suggestions_are_few_and_exist():
    assert materials.nearest("") == ()
    assert set(materials.nearest("steel")) <= set(materials.names())
    assert len(materials.nearest("steel")) <= 5


def test_names_are_unique_and_sorted_by_group():
    names = materials.names()
    assert len(set(names)) == len(names)
    groups = [GROUPS.index(item.material.group) for item in ENTRIES]
    assert groups == sorted(groups)


def test_every_name_and_other_name_finds_its_own_material():
    for item in ENTRIES:
        for name in (item.material.name, *item.aliases):
            assert materials.find(name) == item.material


# ---- the files


@pytest.fixture
def folder(tmp_path):
    shutil.copy(materials.CATALOGUE / "c45.toml", tmp_path / "c45.toml")
    return tmp_path


def change(folder, old: str, new: str, name: str = "c45.toml") -> None:
    path = folder / name
    text = path.read_text(encoding="utf-8")
    assert old in text
    path.write_text(text.replace(old, new), encoding="utf-8")


def faults_of(folder) -> str:
    with pytest.raises(DeclarationError) as caught:
        materials.read_catalogue(folder)
    return str(caught.value)


def test_a_name_used_twice_is_an_error(folder):
    shutil.copy(folder / "c45.toml", folder / "ck46.toml")
    change(folder, 'name = "C45"', 'name = "Ck46"', "ck46.toml")
    text = faults_of(folder)
    assert "ck46.toml" in text
    assert "c45.toml already" in text


@pytest.mark.parametrize(
    ("old", "new", "told"),
    [
        ('"1659 N/mm^2"', '"1659 MPa"', "kc11"),
        ('"1659 N/mm^2"', "1659", "kc11"),
        ('"1659 N/mm^2"', '"16590 N/mm^2"', "the range of metals"),
        ("mc = 0.21", "mc = 0.79", "1 - mc"),
        ("mc = 0.21\n", "", "pair"),
        ("mc = 0.21", 'mc = "0.21"', "number expected"),
        ('group = "P"', 'group = "Q"', "group"),
        ('name = "C45"', 'name = "C46"', "named otherwise"),
        ('name = "C45"', "", "name"),
        ('density = "7.85 g/cm^3"\n', "", "density"),
        ('density = "7.85 g/cm^3"', 'density = "7.85 g/cm^3"\nweight = 3', "unknown key"),
        ('figures = ["scatter"]', "figures = []", "no [[sources]] names this figure"),
        ('figures = ["scatter"]', 'figures = ["scatter", "mn"]', "does not have"),
        ('figures = ["scatter"]', 'figures = ["scatter", "mc"]', "two [[sources]]"),
        ('provenance = "confirmed"', 'provenance = "hearsay"', "provenance"),
        ('["15 m/min", "80 m/min"]', '["80 m/min", "15 m/min"]', "built_up_edge"),
        ('at = "0.2 mm"\n', "", "disagreements"),
        ('group = "P"', 'group = "P"\nwork_hardening = "no"', "work_hardening"),
        ("[[disagreements]]", "[[weights]]", "unknown key"),
        ('name = "C45"', "name = ", "c45.toml"),
    ],
)
def test_a_faulty_file_says_what_is_wrong(folder, old, new, told):
    change(folder, old, new)
    text = faults_of(folder)
    assert "c45.toml" in text
    assert told in text


def test_all_faults_of_a_file_are_told_at_once(folder):
    change(folder, '"1659 N/mm^2"', '"1659"')
    change(folder, 'chips = "long"', 'chips = "curly"')
    text = faults_of(folder)
    assert "kc11" in text
    assert "chips" in text


def test_sources_that_are_no_tables(folder):
    text = (folder / "c45.toml").read_text(encoding="utf-8").partition("[[sources]]")[0]
    (folder / "c45.toml").write_text(text + "sources = 3\n", encoding="utf-8")
    assert "tables expected" in faults_of(folder)
