#!/usr/bin/env python3
"""The model problem solved by an independent finite-element library; see README.md beside this file.

Lengths in mm, A in T mm, mu0 H in tesla. Each value is computed on two meshes in two orders; the stated uncertainty is
the largest difference between the best run and the two next to it.
"""
import argparse
import json
import math
import platform
import sys

import dolfinx
import gmsh
import numpy as np
import ufl
from dolfinx import fem, geometry
from dolfinx.io import gmshio
from mpi4py import MPI
from petsc4py import PETSc

MU0 = 4e-7 * math.pi  # T m/A, as the problem states
JS, MU_INITIAL = 2.15, 2000.0
ALPHA = JS / (MU_INITIAL - 1.0)
NI = 1500.0
BEAM = (0.0, 3.6)
IRON_PLACES = [(0.0, 2.5), (62.5, 4.0)]
IRON, AIR, COIL_PLUS, COIL_MINUS = 1, 2, 3, 4


def draw(fineness, geometry_order):
    """Meshes the section; sizes shrink with fineness. Returns mesh and cell tags."""
    gmsh.initialize()
    gmsh.option.setNumber("General.Terminal", 0)
    gmsh.model.add("P")
    geo = gmsh.model.occ
    point = lambda y, z: geo.addPoint(y, z, 0.0)

    def polygon(places, close=True):
        points = [point(*p) for p in places]
        return points, [geo.addLine(a, b) for a, b in zip(points, points[1:] + points[:1])]

    def face(lines, holes=()):
        loops = [geo.addCurveLoop(lines)] + [geo.addCurveLoop(h) for h in holes]
        return geo.addPlaneSurface(loops)

    t = 3.0 / math.sqrt(2.0)
    centre = math.sqrt(3.6**2 - 9.0)
    half, land = 3.6 * math.sin(math.pi / 3), centre + 3.6 * math.cos(math.pi / 3)
    _, box = polygon([(-250, -246), (250, -246), (250, 254), (-250, 254)])
    outer_points, outer = polygon([(-75, -66), (75, -66), (75, 74), (-75, 74)])
    corner = [point(*p) for p in [
        (-50, 49), (-50, -41), (-15, -41), (-15, 2 * t - 15), (-t, t),
        (t, t), (15, 2 * t - 15), (15, -41), (50, -41), (50, 49), (15, 49), (15, land + 10.5), (4.5, land), (half, land),
        (-half, land), (-4.5, land), (-15, land + 10.5), (-15, 49)]]
    nose = geo.addCircleArc(corner[4], point(0, 0), corner[5])
    apex = point(0, centre + 3.6)
    middle = point(0, centre)
    hollow = [geo.addCircleArc(corner[13], middle, apex), geo.addCircleArc(apex, middle, corner[14])]
    window = [geo.addLine(corner[i], corner[i + 1]) for i in range(4)] + [nose]
    window += [geo.addLine(corner[i], corner[i + 1]) for i in range(5, 13)] + hollow
    window += [geo.addLine(corner[i], corner[i + 1]) for i in range(14, 17)] + [geo.addLine(corner[17], corner[0])]
    coils, coil_lines, coil_points = [], [], []
    for y in (18, -44):
        for z in (-38, 22):
            points, lines = polygon([(y, z), (y + 26, z), (y + 26, z + 24), (y, z + 24)])
            coil_points += points
            coil_lines.append(lines)
            coils.append((face(lines), COIL_MINUS if y > 0 else COIL_PLUS))
    iron = face(outer, [window])
    inside = face(window, coil_lines)
    outside = face(box, [outer])
    geo.synchronize()
    for tag, faces in ((IRON, [iron]), (AIR, [inside, outside]), (COIL_PLUS, [s for s, c in coils if c == COIL_PLUS]),
                       (COIL_MINUS, [s for s, c in coils if c == COIL_MINUS])):
        gmsh.model.addPhysicalGroup(2, faces, tag)

    field = gmsh.model.mesh.field
    sizes = []

    def graded(smallest, growth, points=(), curves=()):
        distance = field.add("Distance")
        if points:
            field.setNumbers(distance, "NodesList", points)
        if curves:
            field.setNumbers(distance, "EdgesList", curves)
            field.setNumber(distance, "NNodesByEdge", 400)
        size = field.add("MathEval")
        field.setString(size, "F", f"{fineness}*({smallest}+{growth}*F{distance})")
        sizes.append(size)

    beam = point(*BEAM)
    geo.synchronize()
    lips = [corner[i] for i in (4, 5, 12, 13, 14, 15)]
    graded(0.0004, 0.35, points=lips)
    graded(0.004, 0.35, points=[c for c in corner if c not in lips] + outer_points)
    graded(0.3, 0.35, points=coil_points)
    graded(0.22, 0.3, points=[beam])
    graded(0.3, 0.3, curves=[nose] + hollow)
    smallest = field.add("Min")
    field.setNumbers(smallest, "FieldsList", sizes)
    field.setAsBackgroundMesh(smallest)
    for name in ("Mesh.MeshSizeFromPoints", "Mesh.MeshSizeFromCurvature", "Mesh.MeshSizeExtendFromBoundary"):
        gmsh.option.setNumber(name, 0)
    gmsh.option.setNumber("Mesh.MeshSizeMax", 30 * fineness)
    gmsh.model.mesh.generate(2)
    gmsh.model.mesh.setOrder(geometry_order)
    mesh, cells, _ = gmshio.model_to_mesh(gmsh.model, MPI.COMM_SELF, 0, gdim=2)
    gmsh.finalize()
    return mesh, cells


def froehlich(b2):
    """mu0 H over B and energy density (tesla squared) of B = h + Js h/(alpha + h), h = mu0 H."""
    b = ufl.sqrt(b2 + 1e-24)
    p = ALPHA + JS - b
    root = ufl.sqrt(p * p + 4 * ALPHA * b)
    h = ufl.conditional(ufl.gt(p, 0), 2 * ALPHA * b / (p + root), (root - p) / 2)  # no digits lost for either sign
    return h / b, h * b - (h * h / 2 + JS * (h - ALPHA * ufl.ln(1 + h / ALPHA)))


def solve(mesh, cells, order, permeability):
    """Newton with halved steps on the energy. Returns the values by name and how they were got."""
    space = fem.FunctionSpace(mesh, ("Lagrange", order))
    a, v = fem.Function(space), ufl.TestFunction(space)
    dx = ufl.Measure("dx", domain=mesh, subdomain_data=cells, metadata={"quadrature_degree": 2 * order + 4})
    area = 26.0 * 24.0
    density = MU0 * 1e3 * NI / area  # T/mm
    b2 = ufl.inner(ufl.grad(a), ufl.grad(a))
    iron_nu, iron_w = froehlich(b2) if permeability is None else (1.0 / permeability, b2 / (2 * permeability))
    flux = lambda nu, where: nu * ufl.inner(ufl.grad(a), ufl.grad(v)) * dx(where)
    residual = flux(iron_nu, IRON)
    energy = iron_w * dx(IRON)
    for where in (AIR, COIL_PLUS, COIL_MINUS):
        residual += flux(1.0, where)
        energy += b2 / 2 * dx(where)
    drive = density * (a * dx(COIL_PLUS) - a * dx(COIL_MINUS))
    residual -= density * (v * dx(COIL_PLUS) - v * dx(COIL_MINUS))
    energy -= drive
    tangent = fem.form(ufl.derivative(residual, a))
    residual, energy, drive = fem.form(residual), fem.form(energy), fem.form(drive)
    y, z = (lambda x: x[0]), (lambda x: x[1])
    rim = fem.locate_dofs_geometrical(space, lambda x: (np.abs(np.abs(y(x)) - 250) < 1e-9) | (np.abs(z(x) + 246) < 1e-9) | (np.abs(z(x) - 254) < 1e-9))
    fixed = fem.dirichletbc(PETSc.ScalarType(0), rim, space)

    solver = PETSc.KSP().create(MPI.COMM_SELF)
    solver.setType("preonly")
    solver.getPC().setType("lu")
    solver.getPC().setFactorSolverType("mumps")
    solver.setErrorIfNotConverged(True)
    PETSc.Options()["mat_mumps_icntl_14"] = 400  # room for pivoting, per cent
    solver.setFromOptions()
    history = []
    for _ in range(40):
        matrix = fem.petsc.assemble_matrix(tangent, bcs=[fixed])
        matrix.assemble()
        if not math.isfinite(matrix.norm()):
            sys.exit(f"The matrix has entries that are not numbers; |A| up to {np.abs(a.x.array).max()}, steps {history}")
        rhs = fem.petsc.assemble_vector(residual)
        fem.petsc.set_bc(rhs, [fixed], a.vector, -1.0)
        step = rhs.duplicate()
        solver.setOperators(matrix)
        solver.solve(rhs, step)
        decrement = math.sqrt(abs(rhs.dot(step)))
        history.append(decrement)
        start, before = a.x.array.copy(), fem.assemble_scalar(energy)
        share = 1.0
        while share > 1e-4:
            a.x.array[:] = start - share * step.array
            if decrement < 1e-6 or fem.assemble_scalar(energy) < before:
                break
            share /= 2
        matrix.destroy()
        if decrement < 1e-6:  # the step just taken ends at about its square
            break
    else:
        sys.exit("Newton did not converge: " + str(history))

    values = beam_values(mesh, space, a)
    values["J.A"] = fem.assemble_scalar(drive) / (MU0 * 1e3) * 1e-3  # J/m
    gradient = fem.Function(fem.VectorFunctionSpace(mesh, ("DG", order - 1)))
    gradient.interpolate(fem.Expression(ufl.grad(a), gradient.function_space.element.interpolation_points()))
    for (py, pz), g in zip(IRON_PLACES, evaluate(mesh, gradient, IRON_PLACES)):
        values[f"B at ({py:g}, {pz:g})"] = float(np.linalg.norm(g))
    return values, {"triangles": mesh.topology.index_map(2).size_local, "order": order,
                    "unknowns": space.dofmap.index_map.size_global - len(rim), "newton_steps": len(history)}


def evaluate(mesh, function, places):
    points = np.array([[y, z, 0.0] for y, z in places])
    tree = geometry.BoundingBoxTree(mesh, 2)
    near = geometry.compute_colliding_cells(mesh, geometry.compute_collisions(tree, points), points)
    return function.eval(points, [near.links(i)[0] for i in range(len(points))])


def beam_values(mesh, space, a):
    """Bz and dBz/dz at the beam from the Fourier coefficients of A on a circle, where A is harmonic."""
    r, count = 0.4, 256
    angle = 2 * np.pi * np.arange(count) / count
    circle = [(BEAM[0] + r * math.cos(t), BEAM[1] + r * math.sin(t)) for t in angle]
    on = evaluate(mesh, a, circle)[:, 0]
    a1 = 2 / (count * r) * np.sum(on * np.cos(angle))
    b2 = -2 / (count * r * r) * np.sum(on * np.sin(2 * angle))
    return {"Bz": float(-a1), "dBz/dz": float(2 * b2 * 1e3)}


def main():
    options = argparse.ArgumentParser(description=__doc__)
    options.add_argument("output")
    options.add_argument("--fineness", type=float, nargs=2, default=[1.2, 1.0])
    options.add_argument("--orders", type=int, nargs=2, default=[3, 4])
    chosen = options.parse_args()
    cases = []
    for name, permeability in (("saturating", None), ("linear", 1000.0)):
        runs = []
        for fineness in chosen.fineness:
            mesh, cells = draw(fineness, 3)
            for order in chosen.orders:
                values, how = solve(mesh, cells, order, permeability)
                runs.append({"fineness": fineness, **how, "values": values})
                print(name, fineness, how, values, flush=True)
        best, others = runs[-1]["values"], (runs[-2]["values"], runs[-3]["values"])
        cases.append({
            "name": name, "relative_permeability": permeability,
            "values": {q: {"value": best[q], "uncertainty": max(abs(o[q] - best[q]) for o in others)} for q in best},
            "runs": runs})
    with open(chosen.output, "w", encoding="utf-8") as file:
        json.dump({"format": "polefield-independent/1",
                   "units": {"Bz": "T", "dBz/dz": "T/m", "J.A": "J/m", "B at (y, z)": "T, place in mm"},
                   "versions": {"dolfinx": dolfinx.__version__, "petsc": ".".join(map(str, PETSc.Sys.getVersion())),
                                "gmsh": gmsh.__version__, "numpy": np.__version__, "python": platform.python_version()},
                   "cases": cases}, file, indent=1)
        file.write("\n")


if __name__ == "__main__":
    main()
