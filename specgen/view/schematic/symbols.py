"""Symbols of one path, as small drawings of our own after IEC 60617: upright, their connection points above and below.

Each is written for a centre at the origin: half its height, how far it reaches to the left and to the right, and its strokes as an SVG
path in relative terms that begins with where it starts. What a text inside it says stands with its place.
"""

from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class Symbol:
    """A symbol: half height, reach to the left and right, strokes, dashed strokes (starts and the rest), and a letter in it."""

    half: float
    left: float
    right: float
    strokes: tuple[tuple[float, float, str], ...]
    dashed: tuple[tuple[float, float, str], ...] = ()
    letter: tuple[float, float, str] | None = None
    pin: float = 4.0  # where the words of its connection points begin


_LEADS = ((0.0, -20.0, "v12"), (0.0, 8.0, "v12"))
_MAKE = (*_LEADS, (0.0, 8.0, "l-9 -17"))
_BREAK = (*_LEADS, (0.0, 8.0, "l6.5 -19"), (0.0, -8.0, "h8"))
_CROSS = ((-3.0, -11.0, "l6 6m0 -6l-6 6"),)
# what moves a contact stands to its left, linked by a dashed line
_BOX = ((-31.0, -6.0, "h13v12h-13z"),)
_LINK = ((-18.0, 0.0, "h13"),)
_LINK_BREAK = ((-18.0, 0.0, "h20"),)

SYMBOLS = {
    "terminal": Symbol(4, 4, 4, ((-4.0, 0.0, "a4 4 0 1 0 8 0 4 4 0 1 0-8 0"),)),
    "fuse": Symbol(20, 5, 5, ((0.0, -20.0, "v40"), (-5.0, -11.0, "h10v22h-10z")), pin=8.0),
    "breaker": Symbol(20, 9, 4, (*_MAKE, *_CROSS)),
    "motor_breaker": Symbol(26, 9, 8, ((0.0, -26.0, "v12"), (0.0, 2.0, "l-9 -17"), (-3.0, -17.0, "l6 6m0 -6l-6 6"),
                                       (0.0, 2.0, "v6h5v8h-5v10"), (-7.0, 5.0, "h15v14h-15z")), pin=11.0),
    "pole": Symbol(20, 9, 4, (*_MAKE, (0.0, -16.0, "a4 4 0 0 0 0 8"))),
    "make_contact": Symbol(20, 9, 4, _MAKE),
    "break_contact": Symbol(20, 2, 9, _BREAK),
    "output_contact": Symbol(20, 14, 9, _MAKE, ((-14.0, -14.0, "h23v28h-23z"),), pin=12.0),
    "semiconductor": Symbol(20, 11, 11, ((0.0, -20.0, "v8"), (0.0, 12.0, "v8"), (-6.0, -12.0, "h12"), (-6.0, 12.0, "h12"),
                                         (-6.0, -12.0, "v8m-4 0h8l-4 8zm-4 8h8m-4 0v8"), (6.0, 12.0, "v-8m-4 0h8l-4 -8zm-4 -8h8m-4 0v-8"))),
    "power_controller": Symbol(20, 11, 11, ((0.0, -20.0, "v8"), (0.0, 12.0, "v8"), (-6.0, -12.0, "h12"), (-6.0, 12.0, "h12"),
                                            (-6.0, -12.0, "v8m-4 0h8l-4 8zm-4 8h8m-4 0v8l-4 3"),
                                            (6.0, 12.0, "v-8m-4 0h8l-4 -8zm-4 -8h8m-4 0v-8l4 -3"))),
    "emergency_stop": Symbol(20, 30, 9, (*_BREAK, (-22.0, -7.0, "a9 9 0 0 0 0 14z")), _LINK_BREAK),
    "push_button": Symbol(20, 26, 4, (*_MAKE, (-18.0, -6.0, "h-5v12h5")), ((-23.0, 0.0, "h18"),)),
    "overload_contact": Symbol(20, 31, 9, (*_BREAK, *_BOX, (-27.0, 4.0, "v-3h4v-4h-4v-3")), _LINK_BREAK),
    "limiter_contact": Symbol(20, 31, 9, (*_BREAK, *_BOX), _LINK_BREAK, (-24.5, 3.8, "ϑ")),
    "cut_out": Symbol(20, 31, 9, (*_BREAK, *_BOX), _LINK_BREAK, (-24.5, 3.0, "p")),
    "proof": Symbol(20, 31, 4, (*_MAKE, *_BOX, (-28.0, 0.0, "h7m-2.5 -2.5l2.5 2.5l-2.5 2.5")), _LINK),
    "sensing_contact": Symbol(20, 31, 4, (*_MAKE, *_BOX), _LINK, (-24.5, 3.8, ">")),
    "coil": Symbol(18, 13, 13, ((0.0, -18.0, "v11"), (-13.0, -7.0, "h26v14h-26z"), (0.0, 7.0, "v11"))),
    "input": Symbol(18, 13, 13, ((0.0, -18.0, "v14"), (-13.0, -10.0, "h26v20h-26z"), (-4.0, -4.0, "h8l-4 7zm0 7h8"), (0.0, 3.0, "v15"))),
    "alarm": Symbol(18, 9, 9, ((0.0, -18.0, "v9"), (-9.0, 0.0, "a9 9 0 1 0 18 0a9 9 0 1 0 -18 0"),
                              (-6.4, -6.4, "l12.8 12.8m0 -12.8l-12.8 12.8"), (0.0, 9.0, "v9"))),
    "valve_coil": Symbol(18, 13, 32, ((0.0, -18.0, "v11"), (-13.0, -7.0, "h26v14h-26z"), (0.0, 7.0, "v11"), (17.0, -5.0, "v10l14 -10v10z")),
                         ((13.0, 0.0, "h11"),)),
    "box": Symbol(18, 17, 17, ((-17.0, -18.0, "h34v36h-34z"),)),
    "jumper": Symbol(4, 4, 4, ((-4.0, 0.0, "h8"),)),
    "shield": Symbol(7, 0, 0, ()),
}  # fmt: skip
ACROSS = {
    # across a coil: a bypass of the same height, drawn at its own centre
    "diode": "v5m-4.5 8h9l-4.5 -8zm0 -8h9m-4.5 8v{rest}",
    "rc": "v4m-4 0h8v6h-8zm4 6v3m-5 0h10m-10 3h10m-5 0v{rest}",
    "varistor": "v4m-4 0h8v12h-8zm4 12v{rest}",
}
