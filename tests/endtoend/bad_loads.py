"""Bad springs, gas springs, cylinders, screws and tables, one fault each: a load added to a good model, the line that
is to blame, and what must be said of it."""

from __future__ import annotations

from tests.endtoend.bad_models import Bad
from tests.endtoend.models import CLAMP

SPRING = 'spring = ["A", "tip"]\nrate = 2\nfree_length = 100'
GAS = 'gas_spring = ["A", "tip"]\nforce = 400\nlength = 300\nstroke = 150\nrise = 1.3'
TABLE = 'force_over = ["A", "tip"]\ntable = [[100, 5], [200, 9]]'
CYLINDER = 'cylinder = ["A", "tip"]\nbore = 40\nrod = 20\npressure = 60'
SCREW = 'screw = ["A", "tip"]\ndiameter = 20\nlead = 4\nfriction = 0.15\nsize = 100'
TORSION = 'torsion_spring = "arm"\nrate = 0.1\nfree_angle = 0'


def _bad(name: str, load: str, old: str, new: str, says: str, blamed: str | None = None) -> Bad:
    assert load.count(old) == 1, f"{old!r} stands there {load.count(old)} times"
    text = f"{CLAMP}\n[loads.extra]\n{load.replace(old, new)}\n"
    return Bad(name, text, new if blamed is None else blamed, f"loads.extra{says}")


HEAD = "[loads.extra]"
BAD_LOADS = [
    _bad("negative rate", SPRING, "rate = 2", "rate = -2",
         ".rate: -2 N/mm cannot stand here; more than nothing is wanted"),
    _bad("no rate", SPRING, "rate = 2\n", "",
         ": 'rate' is missing; force for each length it is stretched or pressed", HEAD),
    _bad("free length and preload", SPRING, "free_length = 100", "free_length = 100\npreload = 5",
         ": more than one of 'free_length', 'preload' is given; exactly one is needed", HEAD),
    _bad("neither free length nor preload", SPRING, "\nfree_length = 100", "",
         ": none of 'free_length', 'preload' is given; exactly one is needed", HEAD),
    _bad("a rate of another kind", SPRING, "rate = 2", 'rate = "2 N"',
         ".rate: 2 N is a force; a stiffness is wanted (e.g. 12 N/mm)"),
    _bad("an unknown unit", SPRING, "rate = 2", 'rate = "2 Nw/mm"',
         ".rate: unknown unit 'Nw'; did you mean 'N'?"),
    _bad("spring drawn beyond its length", SPRING, "free_length = 100", "preload = -20\nlongest = 90",
         ".preload: drawn 217.6 mm long, longer than its longest, 90 mm; "
         "a preload is told at a length that the spring can have", "preload = -20"),
    _bad("a preload against the way it acts", SPRING, "free_length = 100", 'preload = 20\nacts = "tension"',
         ".preload: a preload of 20 N in a spring that acts in tension only; minus draws together", "preload = 20"),
    _bad("lengths in the wrong order", SPRING, "free_length = 100", "free_length = 100\nshortest = 80\nlongest = 70",
         ".longest: 70 mm, not longer than the shortest, 80 mm; a longer one is wanted", "longest = 70"),
    _bad("free length below the shortest", SPRING, "free_length = 100", "free_length = 100\nshortest = 120",
         ".shortest: 120 mm, but without force it is 100 mm long; a shorter one is wanted", "shortest = 120"),
    _bad("a spring on one member", SPRING, '["A", "tip"]', '["D", "tip"]\non = ["arm", "arm"]',
         ": both points are on arm: it does nothing; points of two members are wanted", HEAD),
    _bad("a spring from a point to itself", SPRING, '["A", "tip"]', '["A", "A"]',
         ".spring: A to A is no line; two points are wanted", 'spring = ["A", "A"]'),
    _bad("a torsion spring on one member", TORSION, "rate", 'against = "arm"\nrate',
         ": a torsion spring of arm on itself does nothing; two members are wanted", HEAD),
    _bad("a rate for each angle of another kind", TORSION, "rate = 0.1", 'rate = "2 N/mm"',
         ".rate: 2 N/mm is a stiffness; a torsion stiffness is wanted (e.g. 12 N*m/deg)"),
    _bad("a rise below one", GAS, "rise = 1.3", "rise = 0.9",
         ".rise: 0.9 cannot stand here; 1 or more is wanted, usually 1.2 to 1.4"),
    _bad("rise and volume", GAS, "rise = 1.3", "rise = 1.3\nvolume = 80",
         ": more than one of 'rise', 'volume' is given; exactly one is needed", HEAD),
    _bad("volume without a rod", GAS, "rise = 1.3", "volume = 80",
         ".rod: it is missing; the diameter of the rod is wanted beside 'volume'", HEAD),
    _bad("a rod that nothing asks for", GAS, "rise = 1.3", "rise = 1.3\nrod = 10",
         ".rod: it goes with 'volume' only; leave it out: 'rise' tells all of the gas", "rod = 10"),
    _bad("a rod that leaves no room for gas", GAS, "rise = 1.3", "rod = 20\nvolume = 40",
         ".volume: the rod fully in takes more room than there is; a larger volume is wanted", "volume = 40"),
    _bad("a stroke longer than the whole", GAS, "stroke = 150", "stroke = 310",
         ".stroke: 310 mm, not less than its length, 300 mm; less is wanted: rod and tube keep their length"),
    _bad("a temperature with a unit of length", GAS, "rise = 1.3", 'rise = 1.3\ntemperature = "20 mm"',
         ".temperature: '20 mm' is no temperature; a number with its scale is wanted: degC, degF or K (e.g. 20 degC)",
         'temperature = "20 mm"'),
    _bad("a table that does not rise", TABLE, "[200, 9]", "[90, 9]",
         ".table: row 2 is at 90 mm, not beyond the row before it, at 100 mm; rows by rising length are wanted",
         "table = [[100, 5], [90, 9]]"),
    _bad("a table of one row", TABLE, ", [200, 9]", "",
         ".table: a table of 1 row; two or more rows of length and force are wanted, e.g. [[10, 200], [20, 350]]",
         "table = [[100, 5]]"),
    _bad("a table of three columns", TABLE, "[200, 9]", "[200, 9, 1]",
         ".table: a list of another form; rows of length and force are wanted, e.g. [[10, 200], [20, 350]]",
         "table = [[100, 5], [200, 9, 1]]"),
    _bad("a table of another kind", TABLE, "[200, 9]", '["2 N", 9]',
         ".table: 2 N is a force; a length is wanted (e.g. 12 mm)", 'table = [[100, 5], ["2 N", 9]]'),
    _bad("a formula of another kind", TABLE, "table = [[100, 5], [200, 9]]", 'formula = "2*length"',
         ".formula: 2*length is a length; a force is wanted (e.g. 12 N)"),
    _bad("a formula over what is not there", TABLE, "table = [[100, 5], [200, 9]]", 'formula = "2 N/mm*lenght"',
         ".formula: unknown name 'lenght' in '2 N/mm*lenght'; did you mean 'length' or 'leg'?"),
    _bad("a rod as thick as the bore", CYLINDER, "rod = 20", "rod = 40",
         ".rod: 40 mm, not thinner than the bore, 40 mm; a thinner rod is wanted"),
    _bad("a drawing cylinder without a rod", CYLINDER, "rod = 20", 'acts = "pull"',
         ".rod: it is missing; a cylinder that draws needs the diameter of its rod", HEAD),
    _bad("two unknowns, one of them a pressure", CYLINDER, "\npressure = 60", "",
         ": 'pressure' is missing; only the size of the effort or of the load may be left out", HEAD),
    _bad("a pressure below nothing", CYLINDER, "pressure = 60", "pressure = -1",
         ".pressure: -1 bar cannot stand here; nothing or more is wanted"),
    _bad("a seal that helps", GAS, "rise = 1.3", "rise = 1.3\nseal_friction = -5",
         ".seal_friction: -5 N cannot stand here; nothing or more is wanted", "seal_friction = -5"),
    _bad("a seal of a cylinder that helps", CYLINDER, "rod = 20", "rod = 20\nseal_friction = -5",
         ".seal_friction: -5 N cannot stand here; nothing or more is wanted", "seal_friction = -5"),
    _bad("a screw that nothing turns", SCREW, "friction = 0.15", "friction = 16",
         ".friction: with this lead no torque however large turns the screw; less is wanted"),
    Bad("a quantity that a load does not tell",
        f'{CLAMP}\n[loads.extra]\n{SPRING}\n\n[requirements]\nx = "pressure of extra <= 3 bar"\n',
        'x = "pressure of extra <= 3 bar"', "requirements.x: 'extra' tells no pressure; it tells force, length"),
    Bad("a quantity of a load that is not there",
        f'{CLAMP}\n[loads.extra]\n{SPRING}\n\n[requirements]\nx = "length of extr <= 3 mm"\n',
        'x = "length of extr <= 3 mm"', "requirements.x: unknown load 'extr'; did you mean 'extra'?"),
    Bad("a quantity of a plain force",
        f'{CLAMP}\n[requirements]\nx = "length of load <= 3 mm"\n',
        'x = "length of load <= 3 mm"',
        "requirements.x: 'load' tells no length; a spring, a cylinder or the like does"),
]  # fmt: skip
