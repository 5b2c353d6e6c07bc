#!/usr/bin/env python3
"""Solves the demo scenes a second way and asks whether their known truth lies inside the answer.

Python's standard library only, and none of the project's code: plain Gauss-Newton least squares with
joints as very stiff observations. Run: python3 test/demo-scenes/check_truth.py [evidence-samples]
It ends with status 1 when a scene is badly conditioned or the truth lies outside more often than chance.
"""

import csv
import json
import math
import pathlib
import sys

STIFF = 1e-6  # standard deviation that stands for an exact joint, m or m/s


def solve_normal(rows, size):
    """Least squares of (coefficients, misclosure, sigma) rows: step, covariance, chi squared."""
    normal = [[0.0] * size for _ in range(size)]
    right = [0.0] * size
    chi = 0.0
    for coefficients, misclosure, sigma in rows:
        weight = 1.0 / (sigma * sigma)
        chi += weight * misclosure * misclosure
        for i, a in coefficients.items():
            right[i] += weight * a * misclosure
            for j, b in coefficients.items():
                normal[i][j] += weight * a * b
    inverse = invert(normal)
    step = [sum(inverse[i][j] * right[j] for j in range(size)) for i in range(size)]
    return step, inverse, chi


def invert(matrix):
    size = len(matrix)
    work = [row[:] + [1.0 if i == j else 0.0 for j in range(size)] for i, row in enumerate(matrix)]
    for column in range(size):
        pivot = max(range(column, size), key=lambda r: abs(work[r][column]))
        if abs(work[pivot][column]) < 1e-12:
            raise ArithmeticError("singular: the evidence does not fix the motion")
        work[column], work[pivot] = work[pivot], work[column]
        scale = work[column][column]
        work[column] = [value / scale for value in work[column]]
        for row in range(size):
            if row != column and work[row][column] != 0.0:
                factor = work[row][column]
                work[row] = [a - factor * b for a, b in zip(work[row], work[column])]
    return [row[size:] for row in work]


def turn(vector, angle):
    c, s = math.cos(angle), math.sin(angle)
    return c * vector[0] - s * vector[1], s * vector[0] + c * vector[1]


def wrapped(angle):
    return (angle + math.pi) % (2 * math.pi) - math.pi


class Scene:
    def __init__(self, folder):
        self.name = folder.name
        self.scene = json.loads((folder / "scene.json").read_text())
        self.truth = json.loads((folder / "truth.json").read_text())
        survey = self.scene["survey"]
        unit = {"m": 1.0, "mm": 0.001}[survey["lengthUnit"]]
        names = survey["columns"]
        self.points = {}
        with open(folder / survey["file"], newline="") as file:
            for row in csv.DictReader(file):
                at = (float(row[names["x"]]) * unit, float(row[names["y"]]) * unit)
                self.points[row[names["id"]]] = (at, float(row[names["sigmaX"]]) * 0.001)
        reconstruction = self.scene["reconstruction"]
        self.bodies = [body["id"] for body in reconstruction["bodies"]]
        self.parts = {
            (body["id"], name): point
            for body in reconstruction["bodies"]
            for name, point in body["points"].items()
        }
        self.joints = reconstruction["joints"]
        self.stations = reconstruction["stations"]

    def index(self, body):
        return 3 * self.bodies.index(body)

    def joints_at(self, station):
        return [j for j in self.joints if "stations" not in j or station["id"] in j["stations"]]

    def true_body(self, station, body):
        moment = next(s for s in self.truth["stations"] if s["id"] == station["id"])
        return moment[body] if body in moment else moment


def place_rows(scene, state, body, point, axis):
    """Coefficients and value of one coordinate of a body point, by the body's pose."""
    k = scene.index(body)
    rx, ry = turn(scene.parts[(body, point)]["at"], state[k + 2])
    if axis == 0:
        return {k: 1.0, k + 2: -ry}, state[k] + rx
    return {k + 1: 1.0, k + 2: rx}, state[k + 1] + ry


def difference(first, second):
    coefficients = dict(first)
    for i, value in second.items():
        coefficients[i] = coefficients.get(i, 0.0) - value
    return coefficients


def fit_pose(scene, station):
    size = 3 * len(scene.bodies)
    state = [0.0] * size
    for body in scene.bodies:  # a rough start, as a person would set the outline on the plan
        pose = scene.true_body(station, body)["pose"]
        k = scene.index(body)
        state[k : k + 3] = [pose["x"] + 0.3, pose["y"] - 0.2, pose["heading"] + 0.15]
    for _ in range(30):
        rows = []
        for mark in station["marks"]:
            at, sigma = scene.points[mark["survey"]]
            own = scene.parts[(mark["body"], mark["point"])]["sigma"]
            spread = math.hypot(sigma, max(own))
            for axis in (0, 1):
                row, value = place_rows(scene, state, mark["body"], mark["point"], axis)
                rows.append((row, at[axis] - value, spread))
        for joint in scene.joints_at(station):
            a = joint["a"]
            if joint["kind"] == "pin":
                for axis in (0, 1):
                    row, value = place_rows(scene, state, a["body"], a["point"], axis)
                    if joint.get("ground"):
                        rows.append((row, joint["at"][axis] - value, joint["sigma"]))
                    else:
                        b = joint["b"]
                        other, there = place_rows(scene, state, b["body"], b["point"], axis)
                        rows.append((difference(row, other), there - value, STIFF))
            elif joint["kind"] == "guide":
                row, value = place_rows(scene, state, a["body"], a["point"], 0)
                rows.append((row, joint["at"][0] - value, joint["sigma"]))
        step, covariance, chi = solve_normal(rows, size)
        state = [value + change for value, change in zip(state, step)]
        if max(abs(change) for change in step) < 1e-10:
            break
    return state, covariance, chi, len(rows) - size


def velocity_row(scene, poses, body, point):
    k = scene.index(body)
    rx, ry = turn(scene.parts[(body, point)]["at"], poses[k + 2])
    return {k: 1.0, k + 2: -ry}, {k + 1: 1.0, k + 2: rx}


def along(direction, row):
    x, y = row
    total = {i: direction[0] * value for i, value in x.items()}
    for i, value in y.items():
        total[i] = total.get(i, 0.0) + direction[1] * value
    return total


def apply(row, state):
    return sum(value * state[i] for i, value in row.items())


def joint_rows(scene, station, poses, right):
    """Velocity (or acceleration) rows of the joints; right(joint) gives their right-hand sides."""
    for joint in scene.joints_at(station):
        a = velocity_row(scene, poses, joint["a"]["body"], joint["a"]["point"])
        values = right(joint)
        if joint["kind"] == "pin":
            b = ({}, {})
            if not joint.get("ground"):
                b = velocity_row(scene, poses, joint["b"]["body"], joint["b"]["point"])
            for axis in (0, 1):
                yield difference(a[axis], b[axis]), values[axis]
        elif joint["kind"] == "guide":
            normal = turn((0.0, 1.0), joint["direction"])
            yield along(normal, a), values[0]
        elif joint["kind"] == "wheel":
            heading = poses[scene.index(joint["a"]["body"]) + 2] + joint["steer"]
            yield along(turn((0.0, 1.0), heading), a), values[0]


def fit_velocity(scene, station, poses):
    size = 3 * len(scene.bodies)
    knowns = station["knowns"] + station["tangents"]
    speeds = [known["magnitude"] for known in knowns if "magnitude" in known]
    state = [0.0] * size
    if speeds:
        for body in scene.bodies:
            moving = [k for k in station["tangents"] if k["at"]["body"] == body]
            heading = moving[0]["direction"] if moving else poses[scene.index(body) + 2]
            k = scene.index(body)
            state[k : k + 2] = [speeds[0] * math.cos(heading), speeds[0] * math.sin(heading)]
    for _ in range(40):
        rows = []
        for row, value in joint_rows(scene, station, poses, lambda joint: (0.0, 0.0)):
            rows.append((row, value - apply(row, state), STIFF))
        for known in knowns:
            if known["quantity"] == "angular-velocity":
                row = {scene.index(known["body"]) + 2: 1.0}
                rows.append((row, known["value"] - apply(row, state), known["sigma"]))
            if known["quantity"] != "velocity":
                continue
            row = velocity_row(scene, poses, known["at"]["body"], known["at"]["point"])
            now = (apply(row[0], state), apply(row[1], state))
            size_now = max(math.hypot(*now), 0.05)
            if "magnitude" in known:
                unit = (now[0] / size_now, now[1] / size_now)
                rows.append((along(unit, row), known["magnitude"] - size_now, known["sigma"]["magnitude"]))
            if "direction" in known:
                normal = turn((0.0, 1.0), known["direction"])
                spread = max(size_now * known["sigma"]["direction"], 0.001)
                rows.append((along(normal, row), -apply(along(normal, row), state), spread))
        step, covariance, chi = solve_normal(rows, size)
        state = [value + change for value, change in zip(state, step)]
        if max(abs(change) for change in step) < 1e-9:
            break
    return state, covariance, chi, len(rows) - size


def fit_acceleration(scene, station, poses, velocities):
    """Only where the knowns settle it (the press)."""
    size = 3 * len(scene.bodies)

    def centripetal(end):
        k = scene.index(end["body"])
        rx, ry = turn(scene.parts[(end["body"], end["point"])]["at"], poses[k + 2])
        return velocities[k + 2] ** 2 * rx, velocities[k + 2] ** 2 * ry

    def right(joint):
        a = centripetal(joint["a"])
        b = centripetal(joint["b"]) if "b" in joint else (0.0, 0.0)
        if joint["kind"] == "guide":
            normal = turn((0.0, 1.0), joint["direction"])
            return (normal[0] * a[0] + normal[1] * a[1],)
        return a[0] - b[0], a[1] - b[1]

    rows = [(row, value, STIFF) for row, value in joint_rows(scene, station, poses, right)]
    for known in station["knowns"]:
        if known["quantity"] == "angular-acceleration":
            rows.append(({scene.index(known["body"]) + 2: 1.0}, known["value"], known["sigma"]))
    step, covariance, _ = solve_normal(rows, size)
    return step, covariance


def carried(function, state, covariance, own):
    """Own covariance plus what the uncertainty of `state` carries into function(state)."""
    base = function(state)
    slopes = []
    for k in range(len(state)):
        nudge = 1e-5
        moved = function(state[:k] + [state[k] + nudge] + state[k + 1 :])
        slopes.append([(b - a) / nudge for a, b in zip(base, moved)])
    size, inner = range(len(base)), range(len(state))
    spread = [[sum(covariance[p][q] * slopes[q][j] for q in inner) for j in size] for p in inner]
    return [
        [own[i][j] + sum(slopes[p][i] * spread[p][j] for p in inner) for j in size] for i in size
    ]


def condition(covariance, scales):
    """Largest over smallest scaled standard deviation: how unevenly the evidence holds the answer."""
    spreads = [math.sqrt(covariance[i][i]) / scales[i] for i in range(len(scales))]
    held = [spread for spread in spreads if spread > 1e-5]
    return max(held) / min(held)


def compare(label, value, truth, variance, angle=False):
    error = wrapped(value - truth) if angle else value - truth
    sigma = math.sqrt(variance)
    if sigma < 2e-5 and abs(error) < 1e-4:
        return None  # held by a joint, nothing to compare
    return label, value, sigma, error / sigma


def report(scene):
    ratios = []
    fine = True
    print(f"{scene.name}")
    for station in scene.stations:
        poses, covariance, chi, spare = fit_pose(scene, station)
        lines = []
        for body in scene.bodies:
            k = scene.index(body)
            truth = scene.true_body(station, body)["pose"]
            for i, key in enumerate(("x", "y", "heading")):
                value, variance = poses[k + i], covariance[k + i][k + i]
                lines.append(compare(f"{body} {key}", value, truth[key], variance, key == "heading"))
        reach = [1.0, 1.0, 1.0] * len(scene.bodies)
        evenness = condition(covariance, reach)
        text = f"  {station['id']} pose chi2 {chi:5.1f} / {spare:2d}, spread ratio {evenness:4.1f}"
        fine = fine and evenness < 30
        kinds = {known["quantity"] for known in station["knowns"]}
        if kinds & {"velocity", "angular-velocity"}:
            held = covariance
            velocities, own, chi, spare = fit_velocity(scene, station, poses)
            refit = lambda moved: fit_velocity(scene, station, moved)[0]
            covariance = carried(refit, poses, held, own)
            worst = max(math.sqrt(covariance[k][k]) for k in range(2, len(poses), 3))
            fine = fine and worst < 0.5
            text += f" | velocity chi2 {chi:5.1f} / {spare}, worst omega +- {worst:.3f} rad/s"
            compare_motion(scene, station, velocities, covariance, "velocity", "omega", lines)
            if "angular-acceleration" in kinds:
                result, own = fit_acceleration(scene, station, poses, velocities)
                by_speed = lambda moved: fit_acceleration(scene, station, poses, moved)[0]
                by_pose = lambda moved: fit_acceleration(scene, station, moved, refit(moved))[0]
                own = carried(by_speed, velocities, fit_velocity(scene, station, poses)[1], own)
                spread = carried(by_pose, poses, held, own)
                compare_motion(scene, station, result, spread, "acceleration", "alpha", lines)
        for check in station["checks"]:
            k = scene.index(check["body"]) + 2
            both = math.hypot(check["sigma"], math.sqrt(covariance[k][k]))
            text += f" | yaw rate against the recorder {(velocities[k] - check['value']) / both:+.1f} sigma"
        print(text)
        for line in filter(None, lines):
            label, value, sigma, ratio = line
            ratios.append(ratio)
            note = "   outside 95 %" if abs(ratio) > 1.96 else ""
            print(f"     {label:24s} {value:10.4f} +- {sigma:8.4f}   truth {ratio:+5.2f} sigma away{note}")
    inside = sum(abs(ratio) <= 1.96 for ratio in ratios)
    print(f"  inside 95 %: {inside} of {len(ratios)}; largest {max(map(abs, ratios)):.2f} sigma\n")
    return fine and inside >= 0.87 * len(ratios) and max(map(abs, ratios)) < 4


def compare_motion(scene, station, state, covariance, linear, angular, lines):
    for body in scene.bodies:
        k = scene.index(body)
        truth = scene.true_body(station, body)
        values = [truth[linear][0], truth[linear][1], truth[angular]]
        for i, name in enumerate((f"{linear} x", f"{linear} y", angular)):
            lines.append(compare(f"{body} {name}", state[k + i], values[i], covariance[k + i][k + i]))


if __name__ == "__main__":
    here = pathlib.Path(__file__).resolve().parent.parent.parent / "evidence-samples"
    root = pathlib.Path(sys.argv[1]) if len(sys.argv) > 1 else here
    results = [report(Scene(root / name)) for name in ("spin-on-a-bend", "jack-knife", "press")]
    sys.exit(0 if all(results) else 1)
