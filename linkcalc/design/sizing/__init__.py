"""Sizing: published methods on SI numbers and arrays, each giving a ``Working``: what went in, each formula with its
source and result, the checks with their utilisation (1 at the limit), notes and cautions.

A value of a working is had by its symbol, ``working["tau"]``; ``working.utilisation``, ``.governs`` and ``.passes`` sum
its checks up. Where a method takes arrays (forces by case and pose) its values and utilisation are arrays alike, so
that a worst pose can be looked for; the sheet of one item is then made from the numbers of that pose.

    materials   material(name, mechanism, thickness) -> Material: the model's own first, then the table of the package
    pin         clevis_pin, sheared_pin, stacked_pin; least_diameter(check), choose_pin(check) -> Choice
    stack       pin_stack(plates, forces on the pin) -> PinStack: shear and moment along the pin, their peaks
    lug         lug: beside the hole, tearing out, pressure
    bush        bush, choose_bush, bush_life; bush_materials: bush_material(name), bush_materials(path of own list)
    rolling     mean_load, rolling_bearing, choose_bearing; bearing_list: bearings(path of own list), bearing(name)
    column      two_force_member, critical_load; ENDS: how ends may be held
    section     round_bar, tube, flat, rectangular_tube, general (SECTIONS); stressed, needed_modulus, least_size
    rope, guide, anchor   rope; guide (slots and slides); standing (a frame that just stands)

``model_pins`` reads what a model file says of a pin: its stack, material, factor.
"""
