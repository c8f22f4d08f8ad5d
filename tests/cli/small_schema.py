"""A validator for the few JSON Schema words our result schema uses; an unknown word is an error."""

from __future__ import annotations

_TYPES = {
    "object": lambda v: isinstance(v, dict),
    "array": lambda v: isinstance(v, list),
    "string": lambda v: isinstance(v, str),
    "number": lambda v: isinstance(v, (int, float)) and not isinstance(v, bool),
    "null": lambda v: v is None,
}
_SAYS_NOTHING = {"$schema", "$id", "$defs", "title", "description"}
_WORDS = {"type", "enum", "const", "anyOf", "$ref", "properties", "required", "additionalProperties", "items"}


def faults(value, schema, root, path="$") -> list[str]:
    """Every place where the value breaks the schema."""
    strange = set(schema) - _WORDS - _SAYS_NOTHING
    assert not strange, f"{path}: this validator does not know {sorted(strange)}"
    if "$ref" in schema:
        return faults(value, root["$defs"][schema["$ref"].rsplit("/", 1)[1]], root, path)
    if "anyOf" in schema and all(faults(value, choice, root, path) for choice in schema["anyOf"]):
        return [f"{path}: none of the choices fits"]
    types = schema.get("type", [])
    types = [types] if isinstance(types, str) else types
    if types and not any(_TYPES[name](value) for name in types):
        return [f"{path}: {value!r} is not {' or '.join(types)}"]
    if "enum" in schema and value not in schema["enum"]:
        return [f"{path}: {value!r} is not one of {schema['enum']}"]
    if "const" in schema and value != schema["const"]:
        return [f"{path}: {value!r} is not {schema['const']!r}"]
    return _inside(value, schema, root, path)


def _inside(value, schema, root, path) -> list[str]:
    found = []
    if isinstance(value, dict):
        known = schema.get("properties", {})
        found += [f"{path}: {name} is missing" for name in schema.get("required", []) if name not in value]
        for name, item in value.items():
            more = schema.get("additionalProperties", True)
            rule = known.get(name, more)
            if rule is False:
                found.append(f"{path}: {name} is not in the schema")
            elif isinstance(rule, dict):
                found += faults(item, rule, root, f"{path}.{name}")
    if isinstance(value, list) and "items" in schema:
        for i, item in enumerate(value):
            found += faults(item, schema["items"], root, f"{path}[{i}]")
    return found
