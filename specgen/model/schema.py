"""JSON Schemas of the input documents, for editors, from the models themselves."""

from typing import Any

from pydantic.json_schema import GenerateJsonSchema

from specgen.model.documents import DOCUMENTS, SET_BY_READER, DocumentKind, written
from specgen.model.loops import TAG
from specgen.model.reference import FieldRow, as_markdown, field_reference

DIALECT = "https://json-schema.org/draft/2020-12/schema"
# an editor reads `off` as a truth value and `3` as a number before the schema sees them
_AS_TRUTH = {"yes": True, "on": True, "no": False, "off": False}

Schema = dict[str, Any]


class _Generator(GenerateJsonSchema):
    """Pydantic's generator, with defaults in their written form."""

    def encode_default(self, dft: object) -> object:
        """Return a default as it would be written."""
        return written(dft)


def json_schema(document: DocumentKind = "loop") -> Schema:
    """Return the JSON Schema (2020-12) of one input document.

    Parameters
    ----------
    document : {"loop", "panel", "devices"}
        Which document: one loop of a loop file, panel.yml or devices.yml.

    Returns
    -------
    dict
        The schema, ready for ``json.dumps``. A loop with ``same_as`` may leave out whatever the other loop says.

    Examples
    --------
    >>> json_schema("panel")["required"]
    ['panel', 'supply', 'enclosure']
    """
    model, title = DOCUMENTS[document]
    schema = model.model_json_schema(schema_generator=_Generator)
    defs: Schema = schema.pop("$defs", {})
    for name, short in (("Tolerance", "difference_of_value"), ("SuddenLoad", None)):
        if name in defs:
            _allow_text(defs, name, short)
    if document == "loop":
        schema = _loop(schema, defs)
    whole = {"$schema": DIALECT, "title": title, **{k: v for k, v in schema.items() if k not in ("title", "description")}, "$defs": defs}
    readable = _readable(whole)
    assert isinstance(readable, dict)  # noqa: S101  a section stays a section
    return readable


def _allow_text(defs: Schema, name: str, dimension: str | None) -> None:
    """Let one quantity stand for the whole section: a tolerance for both sides, a sudden load by its unit."""
    section = defs[name]
    fields = section["properties"]
    if dimension is not None:
        text = dict(next(iter(fields.values())))
        section["required"] = list(fields)
    else:
        shapes = [next(s for s in f["anyOf"] if s.get("type") == "string") for f in fields.values()]
        text = {**shapes[0], "description": "; or ".join(s["description"] for s in shapes), "examples": [s["examples"][0] for s in shapes]}
    text.pop("title", None)
    defs[name] = {"anyOf": [text, {k: v for k, v in section.items() if k != "description"}], "description": section.get("description", "")}


def _loop(schema: Schema, defs: Schema) -> Schema:
    """Split the loop into one that stands alone and one that starts from another's fields."""
    fields = {name: field for name, field in schema["properties"].items() if name not in SET_BY_READER}
    fields["tag"] = {"type": "string", "pattern": f"^{TAG.pattern.removesuffix(chr(92) + 'Z')}$",
                     "description": "ISA-5.1 style name; becomes a file name", "examples": ["TIC-101"]}
    fields["area"] = {"type": "string", "description": "groups loops in the dossier; the file's name where absent"}
    same_as = {"type": "string", "description": "tag of the loop whose fields are the starting point", "examples": ["TIC-101"]}
    required = [name for name in schema["required"] if name not in (*SET_BY_READER, "area")]
    alone = {"type": "object", "additionalProperties": False, "properties": fields, "required": required}
    over = {name: _partial(field, defs) for name, field in fields.items()}
    defs.pop("Unit", None)
    defs["LoopAlone"] = alone
    defs["LoopFromAnother"] = {"type": "object", "additionalProperties": False, "properties": {"same_as": same_as, **over},
                               "required": ["tag", "service", "same_as"]}
    return {"type": "object", "if": {"required": ["same_as"]}, "then": {"$ref": "#/$defs/LoopFromAnother"},
            "else": {"$ref": "#/$defs/LoopAlone"}}


def _partial(schema: object, defs: Schema) -> object:
    """Copy a schema with nothing required, since the other loop may say it; lists are replaced whole, so their items stay."""
    if isinstance(schema, list):
        return [_partial(item, defs) for item in schema]
    if not isinstance(schema, dict):
        return schema
    if "$ref" in schema:
        return _partial(defs[schema["$ref"].rsplit("/", 1)[-1]], defs)
    # without a kind the member of a union is not known: any that fits will do
    made = {("anyOf" if key == "oneOf" else key): value if key == "items" else _partial(value, defs)
            for key, value in schema.items() if key not in ("required", "discriminator", "default")}
    if isinstance(schema.get("properties"), dict):
        made["properties"] = {name: _partial(field, defs) for name, field in schema["properties"].items()}
    return made


def _readable(schema: object) -> object:
    """Accept what an editor's YAML reader makes of plain words and numbers, and drop what says nothing to a person."""
    if isinstance(schema, list):
        return [_readable(item) for item in schema]
    if not isinstance(schema, dict):
        return schema
    made: Schema = {key: _readable(value) for key, value in schema.items() if not _idle(key, value, schema)}
    options = [option for option in made.get("anyOf", ()) if option != {"type": "null"}]
    if len(options) == 1:  # an optional field is left out, never written as nothing
        made = {**options[0], **{key: value for key, value in made.items() if key != "anyOf"}}
    if "const" in made:
        made["enum"] = [made.pop("const")]
    words = made.get("enum")
    if isinstance(words, list):
        made.pop("type", None)
        truths = dict.fromkeys(_AS_TRUTH[word] for word in words if word in _AS_TRUTH)
        made["enum"] = [*words, *truths, *(int(word) for word in words if isinstance(word, str) and word.isdigit())]
    return made


def _idle(key: str, value: object, schema: Schema) -> bool:
    repeats = key == "title" and isinstance(value, str) and "$schema" not in schema
    return repeats or key == "discriminator" or (key == "default" and value in (None, {}, []))


__all__ = ["FieldRow", "Schema", "as_markdown", "field_reference", "json_schema"]
