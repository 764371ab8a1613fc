"""The JSON Schema of job and shop file, for editors; made from the tables the reader uses."""

from __future__ import annotations

from typing import Any

from pydantic import Field
from pydantic.json_schema import JsonSchemaValue

from auditor.declared import tables, units
from auditor.declared.fields import Table
from auditor.declared.tool_tables import ToolTable

_DIALECT = "https://json-schema.org/draft/2020-12/schema"
_NAME = {"type": "string", "description": "the name of an entry in the nearest shop.toml"}


class _JobFile(tables.JobHead):
    """PART.job.toml"""

    control: tables.ControlTable | None = None
    machine: tables.MachineTable
    workholding: tables.WorkholdingTable
    workpiece: tables.WorkpieceTable
    tools: dict[str, ToolTable] = Field(default_factory=dict)
    limits: dict[str, float | str] = Field(default_factory=dict)
    model: tables.ModelTable | None = None
    accepted: list[tables.AcceptedTable] = Field(default_factory=list)


class _ShopFile(Table):
    """shop.toml"""

    machines: dict[str, tables.MachineTable] = Field(default_factory=dict)
    workholdings: dict[str, tables.WorkholdingTable] = Field(default_factory=dict)
    materials: dict[str, tables.MaterialTable] = Field(default_factory=dict)
    tools: dict[str, ToolTable] = Field(default_factory=dict)
    controls: dict[str, tables.ControlTable] = Field(default_factory=dict)


def job_schema() -> JsonSchemaValue:
    """The JSON Schema of a job file: a name of a shop entry may stand where a table may."""
    schema = _tidy(_JobFile.model_json_schema())
    properties = schema["properties"]
    for key in ("control", "machine", "workholding"):
        properties[key] = {"anyOf": [_NAME, properties[key]]}
    properties["tools"]["additionalProperties"] = {"anyOf": [_NAME, properties["tools"]["additionalProperties"]]}
    properties["tools"]["propertyNames"] = {"pattern": "^[1-9][0-9]{0,3}$"}
    quantity = {"type": "string", "pattern": units.PATTERN}
    properties["limits"]["additionalProperties"] = {"anyOf": [{"type": "number", "minimum": 0}, quantity]}
    workpiece = schema["$defs"]["WorkpieceTable"]
    named = {"type": "string", "description": "the name of a material in shop.toml or in the catalogue"}
    workpiece["properties"]["material"] = {"anyOf": [named, {"$ref": "#/$defs/MaterialTable"}]}
    workpiece["required"] = sorted({*workpiece.get("required", ()), "material"})
    return {"$schema": _DIALECT, **schema, "title": "turnaudit job file"}


def shop_schema() -> JsonSchemaValue:
    """The JSON Schema of a shop file."""
    return {"$schema": _DIALECT, **_tidy(_ShopFile.model_json_schema()), "title": "turnaudit shop file"}


def _tidy(schema: Any) -> Any:
    """Without the null that TOML has not, and without titles that only repeat the key."""
    if isinstance(schema, list):
        return [_tidy(part) for part in schema]
    if not isinstance(schema, dict):
        return schema
    choices = [part for part in schema.get("anyOf", ()) if part != {"type": "null"}]
    if len(choices) == 1:
        kept = {key: part for key, part in schema.items() if key not in ("anyOf", "default", "title")}
        return _tidy({**choices[0], **kept})
    return {
        key: {name: _tidy(part) for name, part in value.items()} if key in ("properties", "$defs") else _tidy(value)
        for key, value in schema.items()
        if not (key == "title" and isinstance(value, str)) and (key, value) != ("default", None)
    }
