"""The JSON Schema of job and shop file: the same keys, words and required ones as the reader has."""

from __future__ import annotations

import json
import re

import pytest

from auditor.declared.schemas import job_schema, shop_schema
from auditor.declared.units import EXAMPLE

# The keys promised to users, written down from the promise and not from the code.
PROMISED = {
    "MachineTable": "speed_limit power base_speed peak_power peak_time power_curve efficiency thrust rapid turret "
    "tool_change home second_home machine_zero",
    "WorkholdingTable": "kind stick_out speed_limit grip_force grip_diameter jaws jaw_mass jaw_radius friction tail "
    "tail_guided tailstock",
    "WorkpieceTable": "material diameter profile length face bore skin diameter_spread section interrupted "
    "diameter_tolerance roughness finished finished_bore",
    "ControlTable": "system units x_words whole_numbers increment block_skip arcs",
    "MaterialTable": "group kc11 mc reference_rake kn11 mn scatter source tensile_strength hardness modulus density "
    "chips built_up_edge",
    "TurningTool": "kind insert holder nose_radius cutting_edge_angle included_angle clearance_angle pocket_rake "
    "pocket_inclination face_rake land_width land_rake edge_radius breaker_feed breaker_depth substrate speed taylor "
    "force_limit overhang bar_diameter shank_height shank_width bar_material hand insert_faces centre_height tip",
    "PartingTool": "width nose_radius",
    "DrillingTool": "point_angle diameter flutes",
    "ModelTable": "speed_correction operation_factor wear_factor",
    "AcceptedTable": "check line tool reason until",
}


@pytest.fixture(scope="module")
def job() -> dict:  # type: ignore[type-arg]
    return job_schema()


@pytest.mark.parametrize("table", PROMISED)
def test_promised_keys_are_there_and_nothing_else_is_let_in(job: dict, table: str) -> None:  # type: ignore[type-arg]
    found = job["$defs"][table]
    assert set(PROMISED[table].split()) <= set(found["properties"])
    assert found["additionalProperties"] is False


def test_top_keys(job: dict) -> None:  # type: ignore[type-arg]
    expected = "program batch unattended control machine workholding workpiece tools limits model accepted"
    assert set(job["properties"]) == set(expected.split())
    assert set(job["required"]) == {"machine", "workholding", "workpiece"}
    assert "material" in job["$defs"]["WorkpieceTable"]["required"]


def test_a_name_may_stand_for_a_table(job: dict) -> None:  # type: ignore[type-arg]
    for key in ("control", "machine", "workholding"):
        assert {"type": "string"}.items() <= job["properties"][key]["anyOf"][0].items()
    assert job["properties"]["tools"]["additionalProperties"]["anyOf"][0]["type"] == "string"


def test_both_are_json_without_null_and_with_every_reference_kept(job: dict) -> None:  # type: ignore[type-arg]
    for schema in (job, shop_schema()):
        text = json.dumps(schema, allow_nan=False)
        assert '"null"' not in text
        assert set(re.findall(r'"#/\$defs/(\w+)"', text)) <= set(schema["$defs"])


def test_quantity_patterns_take_what_the_reader_takes(job: dict) -> None:  # type: ignore[type-arg]
    pattern = job["$defs"]["MachineTable"]["properties"]["power"]["pattern"]
    assert all(re.search(pattern, text) for text in EXAMPLE.values())
    assert not any(re.search(pattern, text) for text in ("15", "1,5 mm", "9**9**9 mm", "9.5 mm + 2 mm", "15mm"))


def test_shop_sections() -> None:
    assert set(shop_schema()["properties"]) == {"machines", "workholdings", "materials", "tools", "controls"}
