"""Solves the demo junctions with a general-purpose finite-element library, apart from the tool.

    python solve_sections.py [FILE.yaml ...]

Needs numpy, scipy, scikit-fem, pyyaml. Without files it takes every file of junctions/ and benches/sections/ and writes
results.json beside itself (some twelve minutes on two busy cores); with files it only prints. Biquadratic elements on three
nested grids, graded towards every line of the drawing.

The coupling coefficient of two airs i and j is minus the mixed energy of the two unit solutions,
    L_ij = -( sum of lambda grad u_i . grad u_j + sum of h (u_i - [air is i]) (u_j - [air is j]) ),
whose error is of second order in the error of the solution. With two airs it is the energy itself, never below the exact
value, so each finer grid comes nearer from above.
"""
import json
import sys
import time
from pathlib import Path

import numpy as np
import scipy
import skfem
from scipy.sparse.linalg import splu
from skfem import (Basis, BilinearForm, ElementLineP1, ElementQuad0, ElementQuad1, ElementQuad2, FacetBasis, Functional, LinearForm,
                   MeshQuad, asm)
from skfem.helpers import dot, grad
from skfem.mapping import MappingIsoparametric

import section as drawing

HERE = Path(__file__).resolve().parent
ROOT = HERE.parent.parent
LEVELS = 3
FIRST_CELL = 1e-3  # m, beside each line on the coarsest grid; doubling away from it


def interval(low, high, level):
    """Grid lines between two lines of the drawing: cells double from both ends towards the middle; each level halves
    every cell, and twice more those at the ends, where corners make the solution steep."""
    half, cell, marks = (high - low) / 2, FIRST_CELL, [0.0]
    while marks[-1] + 1.5 * cell < half:
        marks.append(marks[-1] + cell)
        cell *= 2
    lines = np.array([low + m for m in marks] + [(low + high) / 2] + [high - m for m in reversed(marks)])
    for _ in range(level):
        lines = np.sort(np.append(lines, (lines[1:] + lines[:-1]) / 2))
        for _ in range(2):
            lines = np.insert(lines, [1, -1], [(lines[0] + lines[1]) / 2, (lines[-2] + lines[-1]) / 2])
    return lines


def grid_lines(lines, level):
    return np.unique(np.concatenate([interval(a, b, level) for a, b in zip(lines, lines[1:])]))


class Mapping(MappingIsoparametric):
    """The library's own, but content with 1e-8 when it finds a point's place in its cell: cells of 0.02 mm on a sheet of
    metres do not allow the 1e-12 it asks for."""

    def invF(self, x, tind=None):
        return super().invF(x, tind, newton_tol=1e-8)


class Solver:
    """The section's solid on one grid."""

    def __init__(self, section, level):
        self.section = section
        mesh = MeshQuad.init_tensor(grid_lines(section.x, level), grid_lines(section.y, level))
        column, row = self.fields(mesh.p[:, mesh.t].mean(1))
        mesh = mesh.restrict(np.nonzero(section.conductivity[column, row] > 0)[0])
        self.column, self.row = self.fields(mesh.p[:, mesh.t].mean(1))
        self.mapping = Mapping(mesh, ElementQuad1(), ElementLineP1())
        self.basis = Basis(mesh, ElementQuad2(), self.mapping)
        self.conductivity = self.basis.with_element(ElementQuad0()).interpolate(section.conductivity[self.column, self.row])
        self.conduction = asm(BilinearForm(lambda u, v, w: w.k * dot(grad(u), grad(v))), self.basis, k=self.conductivity)
        self.find_surfaces(mesh)

    def fields(self, points):
        return [np.searchsorted(lines, p) - 1 for lines, p in zip((self.section.x, self.section.y), points)]

    def find_surfaces(self, mesh):
        """Facets grouped by (resistance, moisture resistance, environment, class)."""
        shape, groups, known = self.section.environment.shape, {}, {}
        boundary = mesh.boundary_facets()
        cells = mesh.f2t[0, boundary]
        outwards = np.sign(np.round(mesh.p[:, mesh.facets[:, boundary]].mean(1) - mesh.p[:, mesh.t[:, cells]].mean(1), 12)).astype(int)
        for facet, cell, side in zip(boundary, cells, map(tuple, outwards.T)):
            place = int(self.column[cell]), int(self.row[cell]), side
            if place not in known:
                i, j = place[0] + side[0], place[1] + side[1]
                air = 0 <= i < shape[0] and 0 <= j < shape[1] and self.section.environment[i, j] >= 0
                known[place] = (*drawing.resistances(self.section, *place), self.section.surface_class[place[:2]]) if air else None
            if known[place]:
                groups.setdefault(known[place], []).append(facet)
        self.surfaces = [(*key, FacetBasis(mesh, ElementQuad2(), self.mapping, facets=np.array(f)))
                         for key, f in sorted(groups.items())]

    def solve(self, run, vectors):
        """Nodal values for each vector of air temperatures; run 0 is the heat-flow run, 1 the moisture run."""
        matrix, loads = self.conduction, np.zeros((self.basis.N, len(self.section.airs)))
        for *resistance, index, _, basis in self.surfaces:
            h = 1 / resistance[run]
            matrix = matrix + h * asm(BilinearForm(lambda u, v, w: u * v), basis)
            loads[:, self.section.environments[index]["air"]] += h * asm(LinearForm(lambda v, w: v), basis)
        factors = splu(matrix.tocsc(), permc_spec="MMD_AT_PLUS_A", diag_pivot_thresh=0.0, options={"SymmetricMode": True})
        loads = loads @ np.array(vectors, float).T
        values = factors.solve(loads)
        values += factors.solve(loads - matrix @ values)  # one step of iterative refinement
        return values.T

    def energy(self, first, second, i, j):
        """Mixed energy of the unit solutions of airs i and j, in the heat-flow run."""
        form = Functional(lambda w: w.k * dot(grad(w.a), grad(w.b)))
        total = asm(form, self.basis, k=self.conductivity, a=self.basis.interpolate(first), b=self.basis.interpolate(second))
        for resistance, _, index, _, basis in self.surfaces:
            air = self.section.environments[index]["air"]
            form = Functional(lambda w: (w.a - float(air == i)) * (w.b - float(air == j)) / resistance)
            total += asm(form, basis, a=basis.interpolate(first), b=basis.interpolate(second))
        return float(total)

    def lowest(self, temperatures):
        """The coldest node of each internal air and surface class: (temperature, x, y)."""
        coldest = {}
        for _, _, index, surface_class, basis in self.surfaces:
            environment = self.section.environments[index]
            if environment["kind"] == "internal":
                nodes = basis.get_dofs(basis.find).all()
                node = nodes[np.argmin(temperatures[nodes])]
                found = (float(temperatures[node]), *(float(c) for c in self.basis.doflocs[:, node]))
                key = f"{self.section.airs[environment['air']]}, {surface_class}"
                coldest[key] = min(coldest.get(key, found), found)
        return coldest


def solve_file(path):
    section = drawing.read(path)
    count, levels = len(section.airs), []
    for level in range(LEVELS):
        solver = Solver(section, level)
        unit = solver.solve(0, np.eye(count))
        energies = np.array([[solver.energy(unit[i], unit[j], i, j) for j in range(count)] for i in range(count)])
        lowest = solver.lowest(solver.solve(1, [section.temperatures])[0])
        levels.append((energies, lowest, solver.basis.N))
    couplings = {}
    warmth = {e["air"]: (drawing.WARMTH[e["kind"]], e["temperature"]) for e in section.environments}
    order = sorted(range(count), key=warmth.get, reverse=True)
    for place, i in enumerate(order):
        for j in order[place + 1:]:
            couplings[f"{section.airs[i]} | {section.airs[j]}"] = summary([-e[i, j] for e, _, _ in levels])
    energies, lowest, nodes = levels[-1]
    return {
        "l2d": couplings,
        "upper": {air: round(float(energies[i, i]), 7) for i, air in enumerate(section.airs)},
        "lowest_inside": {key: {"temperature": round(t, 4), "change": round(t - levels[-2][1][key][0], 5), "x": round(x, 6), "y": round(y, 6)}
                          for key, (t, x, y) in lowest.items()},
        "nodes": int(nodes),
    }


def summary(values):
    """The limit of three values by a geometric sequence, and as its error the larger of the last step and the step beyond."""
    first, second = values[-3] - values[-2], values[-2] - values[-1]
    ratio = first / second if second else np.inf
    beyond = second / (ratio - 1) if ratio > 1.5 else second
    return {"value": round(values[-1] - beyond, 7), "finest": round(values[-1], 7), "estimated_error": float(f"{max(abs(second), abs(beyond)):.1e}"),
            "grids": [round(v, 7) for v in values]}


if __name__ == "__main__":
    given = [Path(p) for p in sys.argv[1:]]
    results = {}
    for path in given or sorted(ROOT.glob("junctions/*.yaml")) + sorted(ROOT.glob("benches/sections/*.yaml")):
        start = time.perf_counter()
        name = path.resolve().relative_to(ROOT).as_posix() if path.resolve().is_relative_to(ROOT) else path.name
        results[name] = solve_file(path)
        print(f"{name}  {time.perf_counter() - start:.1f} s")
        print(json.dumps(results[name], indent=2), flush=True)
    if not given:
        versions = {"python": sys.version.split()[0], "numpy": np.__version__, "scipy": scipy.__version__, "scikit-fem": skfem.__version__}
        text = json.dumps({"units": "W/(m K), degrees C, m", "versions": versions, "sections": results}, indent=2)
        (HERE / "results.json").write_text(text + "\n", encoding="utf-8")
