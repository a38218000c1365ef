"""The reader's guide: how a reviewer, a purchaser and an installer use the dossier, and what its signs mean."""

from specgen.view.cells import says, verdict_mark, word
from specgen.view.dossier import Dossier
from specgen.view.frame import PAGE_ROWS, Place, frame
from specgen.view.shapes import Cell, Column, Item, List, PageView, Row, Section, Span, Table
from specgen.view.words import OUTCOMES, VERDICT_SAYS, capital, with_stop

# what each reader does, step by step; a step is left out where the dossier has no such page
_STEPS: tuple[tuple[str, str, tuple[tuple[str, str], ...]], ...] = (
    (
        "reviewer",
        "Reviewer",
        (
            ("Start with what is held or open: the overview names each with the rule or the missing input.", "index.html"),
            ("Read a sheet's Decision as an argument: each ground has a rule, this loop's numbers and lines of the Basis.", "loops.html"),
            ("Challenge the inputs that How firm puts first: there a small error changes the decision.", "firmness.html"),
            ("Go through what was taken for granted, and through every rule that is overridden with its reason.", "assumptions.html"),
            ("Look up what a rule asks, and why, before disputing it.", "rule-book.html"),
        ),
    ),
    (
        "purchaser",
        "Purchaser and panel builder",
        (
            ("Order from the schedule of parts; what is marked typical the maker's value replaces first.", "parts.html"),
            ("Wire by the schedules of outputs, conductors and terminals: they and the drawings come from the same data.", "outputs.html"),
            ("Keep a limiter, its sensor and its switch apart from the loop's own: other terminals, other cables.", "cautions.html"),
        ),
    ),
    (
        "installer",
        "Installer and commissioning technician",
        (
            ("Read the cautions of the loop before its cover is opened.", "cautions.html"),
            ("Work through the site checks in order; note every reading, the good ones too.", "site-checks.html"),
            ("Where a first run differs from the prediction the sheet says what that means and which setting to change.", "loops.html"),
            ("Correct the plant in the loop file by what was measured, and decide again.", "loops.html"),
            ("Hand back readings and settings as left: the next revision is decided with them.", "site-checks.html"),
        ),
    ),
)  # fmt: skip
_LETTERS = (
    (
        "-B",
        "sensor: B1 the loop's, B2 the limiter's, B3 the alarm's, B4 to B6 proofs of air, level, flow, B7 the high-pressure cut-out",
    ),
    ("-E, -M", "element: heater or burner; motor or actuator of a valve"),
    ("-F", "protection of the circuit; F2 is always the limiter"),
    ("-K", "relay; K9 a burner's certified control"),
    ("-P, -S", "lamp or horn; hand switch, S2 the limiter's reset"),
    ("-Q", "switching device: Q1 the loop's, Q2 what the limiter and the chain open"),
    ("-R", "suppressor across a coil"),
    ("-T", "power supply"),
    ("-W, -X", "cable; terminals"),
)
_READING = (
    "Numbers carry as many digits as the tolerance can use; a prediction is never rounded back to a limit that it passes.",
    "Predictions are worst cases over every declared range; the case that gave a figure stands beside it.",
    "A margin of 1 sits on its limit; more is on the good side.",
    "From memory, typical and common practice mark figures that nobody has held against a standard or data sheet yet.",
    "A dash means that a figure does not apply; it never stands for zero.",
)


def guide_page(dossier: Dossier, place: Place) -> PageView:
    """Build the page."""
    there = {row.path: row.title for row in PAGE_ROWS}
    sections = [
        Section(str(number), anchor, title, (List(_steps(place, there, steps), numbered=True),))
        for number, (anchor, title, steps) in enumerate(_STEPS, 1)
    ]
    verdicts = tuple(Row((Cell("", mark=verdict_mark(name)), word(with_stop(capital(said))))) for name, said in VERDICT_SAYS.items())
    outcomes = tuple(Row((word(name), word(said))) for name, said in _OUTCOMES.items())
    letters = tuple(Row((word(letter), word(said))) for letter, said in _LETTERS)
    sections += [
        Section("4", "verdicts", "Verdicts and outcomes", (
            Table("Verdict of a loop", (Column("Verdict"), Column("Means")), verdicts),
            Table("Outcome of a rule", (Column("Outcome"), Column("Means")), outcomes),
        )),
        Section("5", "designations", "Designations", (
            Table("After IEC 81346: =TIC101-Q1 is device Q1 of loop TIC-101", (Column("Letter"), Column("Stands for")), letters),
        )),
        Section("6", "numbers", "How to read the numbers", (List(tuple(Item(says(text)) for text in _READING)),)),
    ]  # fmt: skip
    return frame(dossier, place, "Guide", tuple(sections), kicker="How a reviewer, a purchaser and an installer use this dossier")


_OUTCOMES = {
    OUTCOMES["holds"]: "asked, and the loop keeps it",
    OUTCOMES["broken"]: "asked, and the loop does not keep it; a must holds the loop, a should makes it deviate",
    OUTCOMES["overridden"]: "a should that the designer set aside, with the reason in the register of deviations",
    OUTCOMES["unanswered"]: "an input is missing; the sheet names it and how to get it",
    OUTCOMES["does_not_apply"]: "not asked of this kind of loop",
}


def _steps(place: Place, there: dict[str, str], steps: tuple[tuple[str, str], ...]) -> tuple[Item, ...]:
    return tuple(Item((Span(f"{text} "), Span(there[path], place.to(path)))) for text, path in steps if path in there)
