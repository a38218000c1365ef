"""The control circuits of a loop: its protected bus, the interlock chain, the coils and what drives them."""

from collections.abc import Sequence

from specgen.design.panel.fitted import FUSE, interposing_product, suppressors_fitted
from specgen.design.wiring.chain import chain_steps
from specgen.design.wiring.draft import Draft
from specgen.design.wiring.facts import Facts
from specgen.design.wiring.load import load_element
from specgen.design.wiring.power import chain_switch, suppressor, switch_element
from specgen.design.wiring.types import Joint, Path, Rail, Step

END = 80
"""The row in which every control path ends: coils, inputs and supplies stand side by side."""
AFTER = 90


def control(draft: Draft, facts: Facts) -> None:
    """Draw up the control circuit."""
    _Control(draft, facts).draw()


class _Control:
    """Gathers the paths between the loop's control bus and its return."""

    def __init__(self, draft: Draft, facts: Facts) -> None:
        self.draft, self.facts = draft, facts
        self.paths: list[Path] = []
        self.coils: dict[str, int] = {}

    def draw(self) -> None:
        """Draw up every path of the control circuit."""
        draft, facts = self.draft, self.facts
        plus = facts.rail(facts.control_names[0])
        fuse = draft.element(facts.own(FUSE), "control circuit", unknown="not sized")
        draft.leave_open(f"The rating of -{FUSE}, which protects the loop's control circuits, follows from the data of the control supply.")
        supply = draft.path([Step(fuse, "breaker", "1", "2", 0)], plus, facts.control())
        self._supply("A1", "controller", "L+", "M", "supply")
        self._chain()
        self._isolator()
        self._drives()
        self._valve_drive()
        self._limiter()
        self._locks()
        fitted = [item for item in suppressors_fitted(facts.decided, facts.switch) if item.across in self.coils]
        across = [suppressor(draft, facts, item, Joint(self.coils[item.across], END)) for item in fitted]
        draft.circuit("control", "Control", self.paths, across, supply)
        _alarm(draft, facts)

    def _add(self, steps: Sequence[Step], feed: Rail | Joint | None = None) -> int:
        back = self.facts.ground(bus=True) if steps[-1].leave else None
        self.paths.append(self.draft.path(steps, feed or self.facts.control(bus=True), back))
        return len(self.paths) - 1

    def _earth(self, product: str) -> None:
        """Say that a control supply above extra-low voltage asks for protective earth at what it feeds in the field."""
        if self.facts.touchable:
            volts = self.facts.control_names[0]
            self.draft.leave_open(f"-{product} stands in the field on {volts}: the machine's own conductor earths its exposed metal.")

    def _coil(self, product: str, before: Sequence[Step], feed: Rail | Joint | None = None, symbol: str = "coil") -> None:
        pins = ("A1", "A2")
        self.coils[product] = self._add([*before, Step(self.facts.own(product), symbol, *pins, END)], feed)

    def _supply(self, product: str, what: str, plus: str, minus: str, text: str) -> None:
        name = self.draft.element(self.facts.own(product), what)
        self._add([Step(name, "box", plus, minus, END, text=text)])

    def _chain(self) -> None:
        draft, facts = self.draft, self.facts
        end = facts.chain_end
        if not facts.chain or facts.decided.traits.burner:
            return
        if end == "Q2" and facts.switches_in_panel:
            chain_switch(draft, facts)
            self._coil("Q2", chain_steps(draft, facts, 0))
        elif end == "Q2":
            valve = draft.element(facts.own("Q2"), "safety shut-off valve")
            steps = [*chain_steps(draft, facts, 0), draft.terminal(END - 1, "below"), Step(valve, "valve_coil", "A1", "A2", END)]
            self._add([*steps, draft.terminal(AFTER, "above")])
            self._earth("Q2")
        elif end == "M1":
            self._field_box("EN" if not facts.decided.traits.valve else "L+", chain_steps(draft, facts, 0))
        elif end == "Q1" and facts.kind == "power_controller":
            name = switch_element(draft, facts)
            self._add([*chain_steps(draft, facts, 0), Step(name, "box", "EN", "M", END, text="enable")])

    def _field_box(self, pin: str, before: Sequence[Step]) -> None:
        """End a path in an input of the element, out in the field and back."""
        name = load_element(self.draft, self.facts)
        text = "enable" if pin == "EN" else "supply"
        steps = [*before, self.draft.terminal(END - 1, "below"), Step(name, "box", pin, "M", END, text=text)]
        self._add([*steps, self.draft.terminal(AFTER, "above")])
        self._earth(f"{self.facts.load}1")

    def _valve_drive(self) -> None:
        traits = self.facts.decided.traits
        if traits.valve and traits.analogue_input and self.facts.chain_end != "M1":
            self._field_box("L+", [])

    def _isolator(self) -> None:
        """Close the contactor that opens every line with the chain's own, or with the control supply."""
        if self.facts.device is None or not self.facts.device.isolator:
            return
        self.draft.element(self.facts.own("Q3"), f"isolates: {self.facts.device.isolator}")
        self._coil("Q3", [], Joint(self.coils["Q2"], END) if "Q2" in self.coils else None)

    def _drives(self) -> None:
        """Draw what drives the switching device: an output of the controller, over relays where the sizes ask for them."""
        facts = self.facts
        if facts.kind == "contactor" or (facts.kind == "ssr" and not facts.by_logic):
            switch_element(self.draft, facts)
            self._driven("Q1", "O1", "coil" if facts.kind == "contactor" else "input")
        elif facts.kind in ("relay", "relay_pair") and not facts.own_relay:
            switch_element(self.draft, facts)
            self._driven("K1", "O1", "coil")
            if facts.kind == "relay_pair":
                self._driven("K2", "O2", "coil")

    def _driven(self, product: str, output: str, symbol: str) -> None:
        draft, facts = self.draft, self.facts
        controller = draft.element(facts.own("A1"), "controller")
        first = output == "O1"
        row = 0
        steps: list[Step] = []
        if facts.chain_end == product:
            steps = chain_steps(draft, facts, 0)
            row = len(steps)
        elif facts.chain_end == "K1" and not first:
            # both relays of a pair stand behind the chain
            self._paired(product, controller, output, symbol)
            return
        contact = Step(controller, "output_contact", f"{output}.1", f"{output}.2", row)
        relays = facts.interposing if first or facts.kind == "relay_pair" else ()
        for number, name in enumerate(relays):
            between = interposing_product(facts.kind, number + (0 if first else len(relays)))
            relay = draft.element(facts.own(between), f"{name}, interposing")
            self._coil(between, [contact])
            contact = Step(relay, "make_contact", "11", "14", row)
        self._coil(product, [*steps, contact], symbol=symbol)

    def _paired(self, product: str, controller: str, output: str, symbol: str) -> None:
        # the joint lies above the first relay's own contact, behind the last contact of the chain
        own = self.paths[self.coils["K1"]]
        place = Joint(self.coils["K1"], own.steps[-2].row)
        contact = Step(controller, "output_contact", f"{output}.1", f"{output}.2", own.steps[-2].row)
        self._coil(product, [contact], place, symbol)

    def _limiter(self) -> None:
        """Draw the supply and the reset of the limiter."""
        draft, facts = self.draft, self.facts
        safety = facts.decided.safety
        if safety is None:
            return
        products = {part.product: part.what for part in safety.parts}
        if safety.limiter is not None:
            figures = (("at", safety.limiter.set, "value"),) if safety.limiter.set is not None else ()
            name = draft.element(facts.own("F2"), "limiter", *figures, unknown="" if figures else "no set value")
            self._add([Step(name, "box", "L+", "M", END, text="supply")])
            if "S2" in products:
                button = draft.element(facts.own("S2"), "reset of the limiter")
                self._add([Step(button, "push_button", "13", "14", 0), Step(name, "box", "R", "", END, text="reset")])

    def _locks(self) -> None:
        """Draw the relay whose contacts stop the loops that must never be on together with this one."""
        safety = self.facts.decided.safety
        if safety is None or not safety.pairs:
            return
        draft, facts = self.draft, self.facts
        draft.element(facts.own("K8"), f"is on with this loop: stops {', '.join(safety.pairs)}")
        if facts.kind == "contactor":
            self._coil("K8", [Step(switch_element(draft, facts), "make_contact", "13", "14", 0)])
            return
        controller = draft.element(facts.own("A1"), "controller")
        draft.leave_open("-K8 is driven by a further relay output of the controller that is on while this loop's output is.")
        self._coil("K8", [Step(controller, "output_contact", "O9.1", "O9.2", 0)])


def _alarm(draft: Draft, facts: Facts) -> None:
    """Draw the alarm that depends neither on the loop nor on its limiter."""
    alarm = facts.decided.safety.alarm if facts.decided.safety is not None else None
    if alarm is None:
        return
    figures = (("at", alarm.set, "value"),) if alarm.set is not None else ()
    sensor = draft.element(facts.own("B3"), f"independent alarm, {alarm.side}", *figures)
    lamp = draft.element(facts.own("P1"), "alarm lamp and horn")
    steps = [
        draft.terminal(0, "below"), Step(sensor, "sensing_contact", "1", "2", 1), draft.terminal(2, "above"),
        Step(lamp, "alarm", "1", "2", END),
    ]  # fmt: skip
    draft.circuit("alarm", "Alarm", [draft.path(steps, facts.control(), facts.ground())])
