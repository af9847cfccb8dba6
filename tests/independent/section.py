"""A small reader of junction files: the drawing painted onto its own lines, and the surface rule of every face.

Written from the description of the format, apart from the tool: it shares no code with it and checks nothing.
Lengths are metres after reading. Only horizontal and vertical edges are read.
"""
from dataclasses import dataclass

import numpy as np
import yaml

METRES = {"mm": 1e-3, "cm": 1e-2, "m": 1.0, "in": 0.0254}
WARMTH = {"external": 0, "unheated": 1, "internal": 2}
ISO_6946 = {"up": 0.10, "horizontal": 0.13, "down": 0.17}
ISO_13788 = {"opaque": 0.25, "frame": 0.13, "glazing": 0.13}


@dataclass
class Section:
    """Fields are indexed [column, row]; `environment` is -1 and `conductivity` 0 where there is no air or no solid."""

    plane: str
    environments: list  # one dict each: air (index in airs), kind, temperature, overrides
    airs: list  # names
    temperatures: list  # of the airs
    x: np.ndarray
    y: np.ndarray
    conductivity: np.ndarray
    environment: np.ndarray
    surface_class: np.ndarray


def read(path):
    with open(path, encoding="utf-8") as file:
        document = yaml.safe_load(file)
    unit = METRES[document.get("unit", "mm")]
    parameters = {}

    def number(value):
        return float(eval(str(value), {"__builtins__": {}}, parameters))

    def length(value):
        return round(number(value) * unit, 12)

    for name, value in (document.get("parameters") or {}).items():
        parameters[name] = number(value)
    conductivities = {name: number(entry["conductivity"]) for name, entry in document["materials"].items()}
    airs, temperatures, environments = [], [], []
    names = list(document["environments"])
    for name, entry in document["environments"].items():
        own = document["environments"][entry.get("same_as", name)]
        if "same_as" not in entry:
            airs.append(name)
            temperatures.append(number(own["temperature"]))
        environments.append(
            {"air": airs.index(entry.get("same_as", name)), "kind": own["kind"], "temperature": number(own["temperature"]),
             "surface_resistance": entry.get("surface_resistance"), "moisture_resistance": entry.get("moisture_resistance")})

    regions = []  # (corner points, fill, class), a layer each
    for item in document["section"]:
        surface_class = item.get("surface", "opaque")
        if "buildup" in item:
            for points, conductivity in layers(item, document["buildups"][item["buildup"]], conductivities, length, number):
                regions.append((points, ("solid", conductivity), surface_class))
            continue
        if "outline" in item:
            points = [(length(x), length(y)) for x, y in item["outline"]]
        else:
            points = box(*sorted(map(length, item["x"])), *sorted(map(length, item["y"])))
        if "environment" in item:
            fill = ("air", names.index(item["environment"]))
        elif "void" in item:
            fill = ("void",)
        elif "spaced" in item:
            # bars run along the longer side of their box; across it they fill area / (spacing x shorter side)
            width, height = np.ptp(points, axis=0)
            bar, spacing = number(item["spaced"]["area"]) * unit**2, length(item["spaced"]["spacing"])
            fill = ("bars", conductivities[item["material"]], bar / (spacing * min(width, height)))
        else:
            fill = ("solid", conductivities[item["material"]])
        regions.append((points, fill, surface_class))
    return paint(document["plane"], environments, airs, temperatures, regions)


def box(left, right, bottom, top):
    return [(left, bottom), (right, bottom), (right, top), (left, top)]


def layers(item, buildup, conductivities, length, number):
    """Yields corner points and conductivity of each layer, laid one after another from the given position."""
    across, along = ("x", "y") if item["towards"] in ("left", "right") else ("y", "x")
    sign = 1 if item["towards"] in ("right", "up") else -1
    position, (low, high) = length(item[across]), sorted(map(length, item[along]))
    for layer in buildup:
        (material, value), = layer.items()
        entry = value if isinstance(value, dict) else {"thickness": value}
        thickness = length(entry["thickness"])
        if thickness == 0:
            continue
        conductivity = thickness / number(entry["resistance"]) if "resistance" in entry else conductivities[material]
        near, far = sorted((position, round(position + sign * thickness, 12)))
        yield (box(near, far, low, high) if across == "x" else box(low, high, near, far)), conductivity
        position = round(position + sign * thickness, 12)


def paint(plane, environments, airs, temperatures, regions):
    x = np.unique([point[0] for points, *_ in regions for point in points])
    y = np.unique([point[1] for points, *_ in regions for point in points])
    px, py = np.meshgrid((x[1:] + x[:-1]) / 2, (y[1:] + y[:-1]) / 2, indexing="ij")
    conductivity, environment = np.zeros(px.shape), np.full(px.shape, -1)
    surface_class = np.full(px.shape, "opaque", dtype=object)
    for points, fill, region_class in regions:
        inside = np.zeros(px.shape, bool)  # an upright edge to the right of a point changes inside and outside
        for (x0, y0), (x1, y1) in zip(points, points[1:] + points[:1]):
            if x0 == x1:
                inside ^= (px < x0) & (py > min(y0, y1)) & (py < max(y0, y1))
        if fill[0] == "bars":
            conductivity[inside] = fill[2] * fill[1] + (1 - fill[2]) * conductivity[inside]
        else:
            conductivity[inside] = fill[1] if fill[0] == "solid" else 0
        environment[inside] = fill[1] if fill[0] == "air" else -1
        surface_class[inside] = region_class
    return Section(plane, environments, airs, temperatures, x, y, conductivity, environment, surface_class)


def resistances(section, column, row, side):
    """The surface resistances (heat-flow run, moisture run) of the solid field [column, row] towards the air on its
    `side`, given as a step (dx, dy); and the index of that air's environment."""
    index = section.environment[column + side[0], row + side[1]]
    environment = section.environments[index]
    direction = heat_direction(section, column, row, side, environment)

    def given(value, otherwise):
        if value is None:
            return otherwise
        return float(value[direction] if isinstance(value, dict) else value)

    standard = 0.04 if environment["kind"] == "external" else ISO_6946[direction]
    heat = given(environment["surface_resistance"], standard)
    damp = ISO_13788[section.surface_class[column, row]] if environment["kind"] == "internal" else heat
    if heat == 0:
        damp = 0.0
    return heat, given(environment["moisture_resistance"], damp), index


def heat_direction(section, column, row, side, environment):
    """up, horizontal or down: whither heat flows at a face, judged by the next air behind the solid."""
    if section.plane == "horizontal" or side[0] != 0:
        return "horizontal"
    while 0 <= row < len(section.y) - 1 and section.conductivity[column, row] > 0:
        row -= side[1]
    if not 0 <= row < len(section.y) - 1 or section.environment[column, row] < 0:
        return "horizontal"
    behind = section.environments[section.environment[column, row]]
    if behind["air"] == environment["air"]:
        return "horizontal"
    here, there = [(WARMTH[e["kind"]], e["temperature"]) for e in (environment, behind)]
    if here == there:
        return "horizontal"
    into_solid = here > there
    air_above = side[1] > 0
    return "down" if into_solid == air_above else "up"
