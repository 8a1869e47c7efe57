"""Bad models, one fault each: what is changed in a good one, the line that is to blame, and what must be said of it."""

from __future__ import annotations

from dataclasses import dataclass

from tests.endtoend.models import CASES, CLAMP, FRAME, GUIDED, REQUIREMENTS


@dataclass(frozen=True)
class Bad:
    """A model with a fault.

    name    what is wrong, in a few words
    text    the model
    blamed  the line of it that the message must name, as it stands there; "" if no line is to blame
    says    the rest of the message: item, what is wrong, what would be right
    """

    name: str
    text: str
    blamed: str
    says: str

    @property
    def line(self) -> int:
        lines = self.text.splitlines()
        assert lines.count(self.blamed) == 1, f"{self.blamed!r} stands there {lines.count(self.blamed)} times"
        return lines.index(self.blamed) + 1


def _changed(name: str, old: str, new: str, says: str, blamed: str | None = None, model: str = CLAMP) -> Bad:
    assert model.count(old) == 1, f"{old!r} stands there {model.count(old)} times"
    return Bad(name, model.replace(old, new), new if blamed is None else blamed, says)


BAD = [
    _changed(
        "unknown key",
        'square_to = ["grip", "A"]',
        'squareto = ["grip", "A"]',
        "effort.squareto: unknown key 'squareto'; did you mean 'square_to'?",
    ),
    _changed(
        "unknown table", "[stroke]", "[strokes]", "strokes: unknown key 'strokes'; did you mean 'stroke' or 'ropes'?"
    ),
    _changed(
        "wrong kind of unit",
        "size = 500",
        'size = "500 mm"',
        "load.size: 500 mm is a length; a force is wanted (e.g. 12 N)",
    ),
    _changed("unknown unit", "size = 500", 'size = "500 Nw"', "load.size: unknown unit 'Nw'; did you mean 'N'?"),
    _changed(
        "unknown point",
        'strut = ["B", "C"]',
        'strut = ["B", "c"]',
        "members.strut.points: unknown point 'c'; did you mean 'C'?",
    ),
    _changed(
        "unknown member",
        'turn = "handle"',
        'turn = "hand"',
        "stroke.turn: unknown member 'hand'; did you mean 'handle'?",
    ),
    _changed(
        "member without points",
        'strut = ["B", "C"]',
        "strut = []",
        'members.strut: it has no points; the points it carries are wanted: strut = ["A", "B"]',
    ),
    _changed(
        "force at a point off its member",
        'at = "grip"',
        'at = "grip"\non = "arm"',
        "effort.on: arm does not carry grip; handle is wanted, or name grip in arm",
        blamed='on = "arm"',
    ),
    _changed(
        "centre off its member",
        'strut = ["B", "C"]',
        'strut = { points = ["B", "C"], mass = 1, centre = "D" }',
        "members.strut.centre: D is a point of ground and arm, not of strut; "
        "take a point that strut or no member carries",
    ),
    _changed(
        "arcs that do not meet",
        "strut_length = 100",
        "strut_length = 20",
        "points.C.meets: the arcs about B and D do not meet: "
        "the centres are 126.5 mm apart, the radii together reach 70 mm",
        blamed='C = { meets = [["B", "strut_length"], ["D", "leg"]], side = "left" }',
    ),
    _changed(
        "no effort",
        '[effort]\nat = "grip"\nsquare_to = ["grip", "A"]\n',
        "",
        "stroke: nothing drives it: the model has no effort; give it an [effort] without a size",
        blamed="[stroke]",
    ),
    _changed(
        "two unknowns",
        "size = 500\n",
        "",
        "load: neither effort nor load has a size; leave out one of the two sizes, not both",
        blamed="[load]",
    ),
    _changed(
        "no unknown",
        'at = "grip"',
        'at = "grip"\nsize = 90',
        "effort: effort and load both have a size; leave one of them out: it is what is asked for",
        blamed="[effort]",
    ),
    _changed(
        "over-constrained",
        "[effort]",
        '[slots.level]\npoint = "B"\nof = "handle"\nalong = 120\n\n[effort]',
        "members: held 1 time more than needed, among joints A, level; "
        "turn one of these pins into a slot along the line, or leave one joint out",
        blamed="[members]",
    ),
    _changed(
        "under-constrained",
        'ground = ["A", "D"]',
        'ground = ["A"]',
        "members.handle: 3 degrees of freedom, of which the stroke takes one: handle, strut, arm can move; "
        "hold them by 2 more: a slot, gear or rack holds 1, a pin or slide 2, a weld 3; or name in 'free' what settles"
        " where it balances",
        blamed='handle = ["A", "B", "grip"]',
    ),
    _changed(
        "a frame that can move",
        'ground = ["A", "B"]',
        'ground = ["A"]',
        "members.bar: 2 degrees of freedom: bar, tie can move; "
        "hold them by 2 more: a slot, gear or rack holds 1, a pin or slide 2, a weld 3; or name in 'free' what settles"
        " where it balances",
        blamed='bar = ["A", "C"]',
        model=FRAME,
    ),
    _changed(
        "a slot that does not hold as drawn",
        "[slides.ways]",
        '[slots.rail]\npoint = "B"\nalong = ["C", "E"]\non = "ram"\n\n[slides.ways]',
        "slots.rail: it does not hold as drawn, by 50 mm; draw its point on its line",
        blamed="[slots.rail]",
        model=GUIDED.replace("[members]", "E = [80, 90]\n\n[members]").replace('"C", "T"]', '"C", "T", "E"]'),
    ),
    _changed(
        "drawn straight",
        "B = [0, 300]",
        "B = [800, 0]",
        "points: the drawing pose is a special one: joints A, B, C line up there and leave 1 degree of freedom; "
        "draw it a little off that pose",
        blamed="[points]",
        model=FRAME,
    ),
    _changed(
        "stroke out of reach",
        "from = 130",
        "from = 175",
        "stroke.from: 175 deg cannot be reached: the limit of motion is 164.6 deg, where strut and arm stand in line "
        'at C; begin the stroke before it, or write "upper limit"',
    ),
    _changed(
        "drawn at a dead point of the drive",
        "B = [30, 40]",
        "B = [40, 40]",
        "stroke.travel: cannot be driven from the drawing pose, which is a dead point of this coordinate; "
        "step another coordinate, or draw the mechanism off the dead point",
        blamed='travel = "ways"',
        model=GUIDED.replace("A = [0, 0]", "A = [0, 40]"),
    ),
    _changed(
        "not a number",
        "crank = 40",
        "crank = nan",
        "dimensions.crank: nan is no number; a length is wanted (e.g. 12 mm)",
    ),
    _changed("without end", "size = 500", "size = inf", "load.size: inf is no number; a force is wanted (e.g. 12 N)"),
    _changed(
        "a member of no length",
        "strut_length = 100",
        "strut_length = 0",
        "points.C.meets: 0 mm cannot stand here; more than nothing is wanted",
        blamed='C = { meets = [["B", "strut_length"], ["D", "leg"]], side = "left" }',
    ),
    _changed(
        "two points at one place",
        "T = [120, 40]",
        "T = [80, 40]",
        "members.ram.points: C and T are drawn at one place; a line needs two places",
        blamed='ram = ["C", "T"]',
        model=GUIDED,
    ),
    _changed(
        "formulas in a circle",
        "crank = 40",
        'crank = "leg - 10 mm"\nbore = "2*hub"\nhub = "bore/2"',
        "dimensions.bore: hangs on itself: bore -> hub -> bore; give one of them a size",
        blamed='bore = "2*hub"',
    ),
    _changed(
        "points in a circle",
        'A = [0, "leg"]',
        'A = { on = ["B", "D"], distance = 10 }',
        "points.A: hangs on itself: A -> B -> A; place one of them otherwise",
    ),
    _changed(
        "formula of two kinds",
        "crank = 40",
        'crank = "leg + 5 N"',
        "dimensions.crank: a force cannot be added to a length in 'leg + 5 N'; both must be of one kind",
    ),
    _changed(
        "far too many poses",
        "poses = 21",
        "poses = 10000000",
        "stroke.poses: 10000000 cannot stand here; a whole number from 2 to 100000 is wanted",
    ),
    _changed(
        "stroke of a line that is not there",
        'travel = "ways"',
        'travel = "way"',
        "stroke.travel: unknown slot, slide or track 'way'; did you mean 'ways'?",
        model=GUIDED,
    ),
    _changed(
        "requirement of something unknown",
        "effort <= 200 N",
        "efort <= 200 N",
        "requirements.hand: unknown quantity 'efort' in 'efort <= 200 N'; did you mean 'effort' or 'tare effort'?",
        blamed='hand = "efort <= 200 N"',
        model=CLAMP + REQUIREMENTS,
    ),
    _changed(
        "requirement of another kind",
        "1 kN",
        "1 m",
        "requirements.pin: 1 m is a length; a force is wanted (e.g. 12 N)",
        blamed='pin = "force at D <= 1 m"',
        model=CLAMP + REQUIREMENTS,
    ),
    _changed(
        "requirement outside the stroke",
        "200 N",
        "200 N at 140 deg",
        "requirements.hand: 140 deg is outside the stroke, which goes from 130 deg to 110 deg; "
        "name a pose between its ends, or make the stroke longer",
        blamed='hand = "effort <= 200 N at 140 deg"',
        model=CLAMP + REQUIREMENTS,
    ),
    _changed(
        "tension in a bent member",
        "force at D <=",
        "tension in arm <=",
        "requirements.pin: arm is no two-force member: it is not loaded at two pins only; "
        'name the force of its joint: "force at PIN on arm"',
        blamed='pin = "tension in arm <= 1 kN"',
        model=CLAMP + REQUIREMENTS,
    ),
    _changed(
        "factor on a load that is not there",
        "{ load = 1.5 }",
        "{ laod = 1.5 }",
        "cases.heavy.scale: unknown load 'laod'; did you mean 'load'?",
        blamed="scale = { laod = 1.5 }",
        model=CLAMP + CASES,
    ),
    _changed(
        "a list left open",
        'ground = ["A", "D"]',
        'ground = ["A", "D"',
        "not TOML: unclosed array",
        blamed='handle = ["A", "B", "grip"]',
    ),
    _changed("a key twice", "leg = 50", "leg = 50\nleg = 55", "not TOML: cannot overwrite a value", blamed="leg = 55"),
    Bad(
        "only the ground",
        '[points]\nA = [0, 0]\n\n[members]\nground = ["A"]\n',
        "[members]",
        "members: there is no member but the ground; at least one is wanted",
    ),
    Bad(
        "gears that do not touch",
        CLAMP + '\n[gears.mesh]\nmembers = ["handle", "arm"]\ncentres = ["A", "D"]\nradii = [20, 30]\n',
        'centres = ["A", "D"]',
        "gears.mesh.centres: the gears do not touch: A and D are drawn 148.7 mm apart; "
        "50 mm is wanted, the sum of the pitch radii",
    ),
    Bad(
        "a pinion off its rack",
        CLAMP + '\n[points.low]\nx = 0\ny = 0\n[racks.rack]\npinion = "handle"\n'
        'centre = "A"\nradius = 20\nalong = ["D", "low"]\n',
        'centre = "A"',
        "racks.rack.centre: the pinion does not touch the rack: A is drawn 50 mm from it; "
        "20 mm is wanted, the pitch radius",
    ),
]
