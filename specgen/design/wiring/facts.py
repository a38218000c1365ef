"""What the circuits of a loop are drawn up from: its decision, its place on the supply, its safety, in one view."""

from dataclasses import dataclass

from specgen.design.designation import designation
from specgen.design.interlocks import Interlock
from specgen.design.panel.fitted import FUSE
from specgen.design.panel.limiter_switch import IN_THE_PANEL
from specgen.design.panel.lines import lines_of
from specgen.design.panel.schedules import load_letter
from specgen.design.panel.types import Placed
from specgen.design.types import DecidedLoop
from specgen.design.wiring.types import Rail
from specgen.model.loop import Loop
from specgen.model.panel import Panel
from specgen.rules.base import Case
from specgen.sizing.candidate import Unsized
from specgen.sizing.connection import connect, connect_coil
from specgen.sizing.device import DeviceChoice
from specgen.sizing.feeder import Branch, Feeder

HIGHEST_ALTERNATING, HIGHEST_DIRECT = 50.0, 120.0  # V, of extra-low voltage


@dataclass(frozen=True, slots=True)
class Facts:
    """One decided loop with its place and the switching device of its safety chain."""

    decided: DecidedLoop
    panel: Panel
    placed: Placed | None
    switch: DeviceChoice | None

    @property
    def loop(self) -> Loop:
        """Return the loop as declared."""
        return self.decided.loop

    @property
    def case(self) -> Case:
        """Return the chosen candidate's case."""
        return self.decided.decision.chosen.case

    @property
    def kind(self) -> str:
        """Return the kind of the chosen device."""
        return self.case.candidate.device

    @property
    def device(self) -> DeviceChoice | None:
        """Return the device, None where none is sized."""
        return None if isinstance(self.case.device, Unsized) else self.case.device

    @property
    def unsized(self) -> str:
        """Return why no device is sized, empty where one is."""
        return self.case.device.because if isinstance(self.case.device, Unsized) else ""

    @property
    def feeder(self) -> Feeder | None:
        """Return what feeds the element, None where nothing does or it is not sized."""
        return self.case.feeder if isinstance(self.case.feeder, Feeder) else None

    @property
    def branches(self) -> tuple[Branch, ...]:
        """Return the protected circuits."""
        return self.feeder.branches if self.feeder else ()

    @property
    def load(self) -> str:
        """Return the letter of the element."""
        return load_letter(self.decided)

    @property
    def chain(self) -> tuple[Interlock, ...]:
        """Return the interlock chain."""
        return self.decided.safety.chain if self.decided.safety else ()

    @property
    def chain_end(self) -> str:
        """Return the product from which the chain takes the supply, empty without a chain."""
        ends = self.chain[0].acts_on if self.chain else ()
        return ends[0].rpartition("-")[2] if ends else ""

    @property
    def switches_in_panel(self) -> bool:
        """Tell whether the chain has a contactor of its own in the supply of the load."""
        return self.decided.safety is not None and self.decided.safety.switch in IN_THE_PANEL

    @property
    def own_relay(self) -> bool:
        """Tell whether the controller's own relay switches the load; one that is not sized is drawn as a relay with a coil."""
        if self.kind not in ("relay", "relay_pair") or self.device is None:
            return False
        return not any(contact.role == "load" for contact in self.device.chain)

    @property
    def interposing(self) -> tuple[str, ...]:
        """Return the names of the relays between the controller and the device's coil."""
        return tuple(contact.name for contact in self.device.chain if contact.role == "interposing") if self.device else ()

    @property
    def by_logic(self) -> bool:
        """Tell whether a logic output drives the device's input itself."""
        return self.kind == "ssr" and (self.device is None or self.device.controller_output == "logic")

    @property
    def on_control(self) -> bool:
        """Tell whether the load stands on the control supply."""
        if self.feeder is not None:
            return self.feeder.load.connection.way == "control"
        return self.place[:1] == (self.control_names[0],)

    @property
    def touchable(self) -> bool:
        """Tell whether the control supply lies above extra-low voltage: 50 V a.c., 120 V d.c. (IEC 61140, from memory)."""
        supply = self.panel.control_supply
        return float(supply.voltage) > (HIGHEST_DIRECT if supply.kind == "dc" else HIGHEST_ALTERNATING)

    @property
    def earthed(self) -> bool:
        """Tell whether the load takes protective earth."""
        return not self.on_control or self.touchable

    @property
    def control_names(self) -> tuple[str, str]:
        """Return the two potentials of the control supply."""
        supply = self.panel.control_supply
        volts = f"{float(supply.voltage):g} V"
        return (f"+{volts}", "0 V") if supply.kind == "dc" else (f"{volts} a.c.", "0 V")

    @property
    def place(self) -> tuple[str, ...]:
        """Return the conductors that feed the load; where it is not placed, those that its name-plate asks for."""
        if self.placed is not None:
            return self.placed.place
        if self.feeder is not None and self.feeder.load.connection.way == "control":
            return self.control_names
        element, supply = self.loop.element, self.panel.supply
        lines = lines_of(supply)
        phases = getattr(element, "phases", None)
        given = (getattr(element, name, None) for name in ("voltage", "motor_voltage", "control_voltage"))
        voltage = next((voltage for voltage in given if voltage is not None), None)
        if voltage is not None and phases is None:
            found = connect_coil(float(voltage), supply, self.panel.control_supply)
        elif voltage is not None and phases is not None:
            found = connect(float(voltage), phases, supply)
        else:
            found = Unsized("nothing is declared")
        if not isinstance(found, Unsized):
            if found.way == "control":
                return self.control_names
            return lines.places(found.way)[0]
        return lines.lines if phases == 3 else (*lines.lines[:1], "N")  # noqa: PLR2004  three phases

    def of_panel(self, product: str) -> str:
        """Return the designation of something the loops share."""
        return designation(self.panel.panel.reference, product)

    def rail(self, conductor: str) -> Rail:
        """Return the panel's own conductor by its name."""
        plus, minus = self.control_names
        pins = ("+", "−") if self.panel.control_supply.kind == "dc" else ("1", "2")
        if conductor in (plus, minus):
            return Rail(conductor, f"{self.of_panel('T1')}:{pins[0] if conductor == plus else pins[1]}")
        if conductor in ("N", "PE"):
            return Rail(conductor, f"{self.of_panel('X0')}:{conductor}")
        return Rail(conductor, f"{self.of_panel('F1')}:{conductor}")

    def own(self, product: str) -> str:
        """Return the designation of one of the loop's own elements."""
        return designation(self.decided.tag, product)

    def control(self, *, bus: bool = False) -> Rail:
        """Return the loop's protected control potential."""
        return Rail(f"{self.control_names[0]} behind -{FUSE}", f"{self.own(FUSE)}:2", bus)

    def ground(self, *, bus: bool = False) -> Rail:
        """Return what the control circuits go back to."""
        minus = self.rail(self.control_names[1])
        return Rail(minus.potential, minus.source, bus)
