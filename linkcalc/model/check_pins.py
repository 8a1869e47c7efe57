"""What is said of single pins: pins that there are none of, and stacks that leave a plate out."""

from __future__ import annotations

from linkcalc.model.check_joints import Carried
from linkcalc.model.gather import Gather
from linkcalc.model.mechanism import Mechanism
from linkcalc.words import nearest


def check_pins(mechanism: Mechanism, gather: Gather) -> None:
    """Every [pins.NAME] is a pin, and the stack on it holds a plate of each of its members and no others."""
    carried = Carried(mechanism)
    pins = [point for point in mechanism.points if len(carried.by(point)) > 1]
    for point, pin in mechanism.pins.items():
        item = ("pins", point)
        if point not in pins:
            known = "is no pin: " + (f"only {carried.text(point)} carries it" if carried.by(point) else "of no member")
            gather.add(item, f"{point!r} {known if point in mechanism.points else 'is no point'}", nearest(point, pins))
            continue
        on_it = carried.by(point)
        for k, layer in enumerate(pin.stack, 1):
            if layer.plate not in on_it:
                gather.add((*item, "stack", str(k)), f"{layer.plate} has no plate here", nearest(layer.plate, on_it))
        lacking = [member for member in on_it if member not in {layer.plate for layer in pin.stack}]
        if pin.stack and lacking and not gather.touches(*item, "stack"):
            what = f"no plate of {' and '.join(lacking)}"
            gather.add((*item, "stack"), what, f"the pin joins {', '.join(on_it)}: each is wanted, in order across it")
