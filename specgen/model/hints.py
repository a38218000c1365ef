"""Hints for problems of the models: the nearest known word, the keys of a section, an example of a missing field."""

import difflib
from collections.abc import Sequence

from pydantic import BaseModel

from specgen.core.diagnostic import Path


def nearest(name: str, known: Sequence[str], otherwise: str) -> str:
    """Ask for the known word that a name is nearest to, or list them all."""
    alike = {_plain(word): word for word in known}
    found = difflib.get_close_matches(_plain(name), list(alike), n=1, cutoff=0.6)
    if found:
        return f"did you mean {alike[found[0]]}?"
    return otherwise + ", ".join(known) if known else ""


def _plain(word: str) -> str:
    return word.lower().replace(" ", "_").replace("-", "_")


def _annotation_at(model: type[BaseModel], path: Path, data: object) -> object:
    """Return what a section is declared to be: a model, or a union of models."""
    here: object = model
    value: object = data
    for step in path:
        if not isinstance(step, int):
            at = _member(here, value)
            field = next((f for n, f in at.model_fields.items() if step in (n, f.alias)), None) if at else None
            here = field.annotation if field else None
        value = value[step] if has(value, step) else None  # type: ignore[index]  # has looked
    return here if path else model


def _model_at(model: type[BaseModel], path: Path, data: object) -> type[BaseModel] | None:
    """Return the model of a section, following unions by the section's own kind."""
    value: object = data
    for step in path:
        value = value[step] if has(value, step) else None  # type: ignore[index]  # has looked
    return _member(_annotation_at(model, path, data), value)


def has(value: object, step: str | int) -> bool:
    """Tell whether a section or list holds a step of a path."""
    if isinstance(value, dict):
        return step in value
    return isinstance(value, list) and isinstance(step, int) and step < len(value)


def _member(annotation: object, value: object) -> type[BaseModel] | None:
    models = _models_in(annotation)
    if len(models) < 2:  # noqa: PLR2004  one model needs no choice
        return models[0] if models else None
    kind = value.get("kind") if isinstance(value, dict) else None
    for candidate in models:
        field = candidate.model_fields.get("kind")
        if field is not None and kind in getattr(field.annotation, "__args__", ()):
            return candidate
    return None


def _models_in(annotation: object) -> list[type[BaseModel]]:
    if isinstance(annotation, type) and issubclass(annotation, BaseModel):
        return [annotation]
    found: list[type[BaseModel]] = []
    for part in getattr(annotation, "__args__", ()):
        found += _models_in(part)
    return found


def known_keys(model: type[BaseModel], path: Path, data: object) -> list[str]:
    """Return the keys that may stand in a section."""
    at = _model_at(model, path, data)
    hidden = ("unit", "difference_unit") if at is model else ()
    return [f.alias or name for name, f in at.model_fields.items() if name not in hidden] if at else []


def keys_hint(model: type[BaseModel], path: Path, data: object) -> str:
    """Say which keys a section must have, or may have where none is required."""
    at = _model_at(model, path, data)
    return _keys_of(at) if at else ""


def missing_hint(model: type[BaseModel], path: Path, data: object) -> str:
    """Give an example of a missing field, the words that may stand there, or what the section holds."""
    at = _model_at(model, path[:-1], data)
    if at is None:
        kinds = _kinds(_annotation_at(model, path[:-1], data))
        return f"one of: {', '.join(kinds)}" if kinds and path[-1] == "kind" else ""
    field = next((f for n, f in at.model_fields.items() if path[-1] in (n, f.alias)), None)
    if field is None:
        return ""
    for part in field.metadata:
        example = getattr(part, "example", None)
        if callable(example):
            return f"for example {path[-1]}: {example({})}"
    words = [w for w in getattr(field.annotation, "__args__", ()) if isinstance(w, str)]
    if words:
        return f"one of: {', '.join(words)}"
    models = _models_in(field.annotation)
    return _keys_of(models[0]) if len(models) == 1 else "it needs kind" if models else ""


def _keys_of(model: type[BaseModel]) -> str:
    known = {f.alias or name: f.is_required() for name, f in model.model_fields.items()}
    required = [name for name, needed in known.items() if needed]
    return f"it needs {', '.join(required)}" if required else f"known here: {', '.join(known)}"


def _kinds(annotation: object) -> list[str]:
    fields = [m.model_fields["kind"] for m in _models_in(annotation) if "kind" in m.model_fields]
    return [kind for field in fields for kind in getattr(field.annotation, "__args__", ())]
