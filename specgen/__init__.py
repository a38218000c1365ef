"""Decides the control loops of a panel and writes the design dossier."""

from pathlib import Path
from types import SimpleNamespace

__version__ = "0.1.0"


def _templates() -> Path:
    packaged = Path(__file__).parent / "site_templates"
    return packaged if packaged.is_dir() else Path(__file__).parent.parent / "site_templates"


# MkDocs reads nothing but __file__ of what the theme's entry point names; hatchling's
# force-include has no effect in an editable install, hence the second place.
theme_ref = SimpleNamespace(__file__=str(_templates() / "main.html"))
