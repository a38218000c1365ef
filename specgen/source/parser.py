"""The YAML parser that is installed: libyaml's, or PyYAML's own where libyaml is missing."""

from collections.abc import Callable
from typing import Protocol

import yaml
from yaml.events import Event


class EventSource(Protocol):
    """A YAML parser, compiled or not."""

    def get_event(self) -> Event | None:
        """Return the next event."""


class PlainParser(yaml.reader.Reader, yaml.scanner.Scanner, yaml.parser.Parser):
    """PyYAML's own parser, for an installation that came without libyaml."""

    def __init__(self, text: str) -> None:
        yaml.reader.Reader.__init__(self, text)
        yaml.scanner.Scanner.__init__(self)
        yaml.parser.Parser.__init__(self)


try:
    from yaml._yaml import CParser
except ImportError:  # pragma: no cover - an installation without libyaml; tests set parser_for to the same
    parser_for: Callable[[str], EventSource] = PlainParser
else:
    parser_for = CParser
