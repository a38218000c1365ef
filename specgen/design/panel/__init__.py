"""The panel: phases, demand, incomer, schedules and the findings of its own rules."""

from specgen.design.panel.panel_of import panel_of
from specgen.design.panel.types import PanelDesign

__all__ = ["PanelDesign", "panel_of"]
