"""The circuits of every loop, and the terminals and conductors that follow from them."""

from specgen.design.wiring.types import Wiring
from specgen.design.wiring.wiring_of import wiring_of, wirings_of

__all__ = ["Wiring", "wiring_of", "wirings_of"]
