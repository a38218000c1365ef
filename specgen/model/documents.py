"""The documents that a designer writes, each with its model, and how a model's value stands in one."""

from collections.abc import Mapping
from typing import Literal

from pydantic import BaseModel

from specgen.model.devices import Devices
from specgen.model.loop import Loop
from specgen.model.panel import Panel

DocumentKind = Literal["loop", "panel", "devices"]
DOCUMENTS: Mapping[DocumentKind, tuple[type[BaseModel], str]] = {
    "loop": (Loop, "A control loop"),
    "panel": (Panel, "The panel of the loops"),
    "devices": (Devices, "The shop's approved devices"),
}
SET_BY_READER = ("unit", "difference_unit")


def written(value: object) -> object:
    """Return a model's value as it would be written in a file.

    Examples
    --------
    >>> from specgen.core.quantity import Quantity
    >>> written(Quantity(0.25, "25 percent")), written(True), written((1, 2))
    ('25 percent', 'yes', [1, 2])
    """
    if isinstance(value, BaseModel):
        given = {f.alias or name: getattr(value, name) for name, f in type(value).model_fields.items()}
        return {name: written(held) for name, held in given.items() if held is not None}
    if isinstance(value, tuple):
        return [written(item) for item in value]
    if isinstance(value, bool):
        return "yes" if value else "no"
    return getattr(value, "text", None) or value
