"""The hold-out joints, stated as plain tables (mm, N, N mm, MPa).

`build(tools)` yields them one by one.  `tools.fold_load(runs, law, share)` returns a load inside a fold of the group's
map from motions to wrenches (several states); `tools.centre_load(runs, law, centre)` the load carried by a rotation about
a chosen centre.  Random numbers come from numpy's PCG64 with SEED; every number is rounded before use.
"""

import math

import numpy as np

SEED = 20260611
LK, POLY, BPK, PLASTIC = "lesik-kennedy", "lesik-kennedy-polynomial", "butler-pal-kulak", "rigid-plastic"


def line(x0, y0, x1, y1, leg=6.0, strength=490.0, sides=1):
    ends = [[round(float(v), 3) for v in end] for end in ((x0, y0), (x1, y1))]
    return {"from": ends[0], "to": ends[1], "leg": leg, "strength": strength, "sides": sides}


def arc(x, y, radius, start, sweep, leg=6.0, strength=490.0, sides=1):
    return {"centre": [round(float(x), 3), round(float(y), 3)], "radius": round(float(radius), 3), "start_deg": float(start),
            "sweep_deg": float(sweep), "leg": leg, "strength": strength, "sides": sides}


def load(x, y, fx, fy, moment=0.0):
    at, force = [round(float(x), 3), round(float(y), 3)], [round(float(fx), 6), round(float(fy), 6)]
    return {"at": at, "force": force, "moment": round(float(moment), 6)}


def tilted(x, y, size, degrees, moment=0.0):
    """Force of a given size, its angle measured from +y toward +x."""
    a = math.radians(degrees)
    return load(x, y, size * math.sin(a), size * math.cos(a), moment)


def case(name, runs, loading, law=LK, peak=False, elements=None):
    head = {"name": name, "law": law}
    if elements:
        head["elements"] = elements
    return {**head, **loading, "runs": runs, "want_peak": peak}


def two_lines(length=100.0, apart=150.0, leg=6.0, strength=490.0):
    h, d = length / 2, apart / 2
    return [line(-d, -h, -d, h, leg, strength), line(d, -h, d, h, leg, strength)]


def c_shape(width, height, leg=6.0, strength=490.0):
    return [line(width, 0, 0, 0, leg, strength), line(0, 0, 0, height, leg, strength),
            line(0, height, width, height, leg, strength)]


def l_shape(width, height, leg=6.0, strength=490.0):
    return [line(0, 0, 0, height, leg, strength), line(0, 0, width, 0, leg, strength)]


def box(width, height, leg=6.0, strength=490.0):
    corners = [(0, 0), (width, 0), (width, height), (0, height), (0, 0)]
    return [line(*a, *b, leg, strength) for a, b in zip(corners, corners[1:])]


def random_runs(rng, count, legs=(3.0, 4.0, 5.0, 6.0, 8.0, 10.0, 12.0), strengths=(430.0, 490.0, 550.0), arcs=0):
    """Straight runs of 20 to 200 mm at random places and turns, then `arcs` arcs; mixed legs and fillers."""
    runs = []
    for _ in range(count):
        x, y = rng.uniform(-150, 150, 2)
        length, turn = rng.uniform(20, 200), rng.uniform(0, math.pi)
        dx, dy = length / 2 * math.cos(turn), length / 2 * math.sin(turn)
        runs.append(line(x - dx, y - dy, x + dx, y + dy, float(rng.choice(legs)), float(rng.choice(strengths))))
    for _ in range(arcs):
        x, y = rng.uniform(-100, 100, 2)
        runs.append(arc(x, y, rng.uniform(15, 80), round(rng.uniform(0, 360), 1), round(rng.uniform(30, 330), 1),
                        float(rng.choice(legs)), float(rng.choice(strengths))))
    return runs


def random_load(rng, reach=300.0):
    x, y = rng.uniform(-reach, reach, 2)
    return tilted(x, y, 1000.0, rng.uniform(0, 360), float(rng.uniform(-5e4, 5e4)))


def build(tools):
    rng = np.random.default_rng(SEED)

    # Plain shapes.
    yield case("line-transverse-offset", [line(0, 0, 0, 120)], load(180, 20, 0, 1000), peak=True)
    yield case("two-lines-10deg-e0", two_lines(), tilted(0, 0, 1000, 10), peak=True)
    yield case("two-lines-10deg-e0.5", two_lines(), tilted(0, 0, 1000, 10, 500), peak=True)
    yield case("two-lines-10deg-e2", two_lines(), tilted(0, 0, 1000, 10, 2000), peak=True)
    yield case("two-lines-10deg-e5", two_lines(), tilted(0, 0, 1000, 10, 5000), peak=True)
    yield case("two-lines-eccentric", two_lines(160, 90, 8.0), load(210, 15, 120, -950), peak=True)
    yield case("c-shape-1", c_shape(80, 160), load(260, 80, 0, -1000), peak=True)
    yield case("c-shape-through-centroid", c_shape(80, 160), load(20, 80, 0, -1000), peak=True)
    yield case("c-shape-inclined", c_shape(120, 150, 8.0), tilted(-40, 210, 1000, 75))
    yield case("l-shape-1", l_shape(90, 150), load(200, 30, 0, -1000), peak=True)
    yield case("l-shape-mixed", [line(0, 0, 0, 150, 5.0, 430.0), line(0, 0, 90, 0, 10.0, 550.0)],
               load(-120, 40, 300, 900, 12000))
    yield case("box-1", box(100, 180, 5.0), load(250, 60, -250, -1000))
    yield case("ring-1", [arc(0, 0, 40, 0, 360)], load(150, 0, 0, -1000), peak=True)
    yield case("arc-and-lines-slot", [line(-60, 25, 60, 25), line(-60, -25, 60, -25), arc(60, 0, 25, -90, 180)],
               load(170, 12, 80, -1000))
    yield case("random-3", random_runs(rng, 3), random_load(rng), peak=True)

    # Pure moments, loads through the centroid, loads far away.
    yield case("line-pure-moment", [line(0, 0, 100, 40)], load(0, 0, 0, 0, 1e6))
    yield case("c-shape-pure-moment", c_shape(70, 140, 5.0), load(0, 0, 0, 0, -1e6))
    yield case("box-pure-moment", box(120, 80), load(35, -12, 0, 0, 1e6))
    yield case("ring-pure-moment", [arc(10, 5, 55, 0, 360)], load(0, 0, 0, 0, 1e6))
    yield case("ring-through-centre", [arc(10, 5, 55, 30, 360, 8.0)], load(10, 5, 600, 800))
    yield case("line-through-centroid-along", [line(0, 0, 0, 100)], load(0, 50, 0, 1000))
    yield case("line-through-centroid-across", [line(0, 0, 0, 100)], load(0, 50, 1000, 0))
    yield case("box-through-centroid", box(100, 140), load(50, 70, 900, 500))
    yield case("l-shape-far", l_shape(90, 150), load(150000, 20, 0, -10))
    yield case("line-far", [line(-50, 0, 50, 0)], load(100000, 0, 0, 10), peak=True)
    yield case("random-far", random_runs(rng, 4), load(-90000, 120000, 7, -5))

    # Loads inside folds: several states.
    yield case("line-fold", [line(0, 0, 0, 100)], tools.fold_load([line(0, 0, 0, 100)], LK, 0), peak=True)
    yield case("line-fold-edge", [line(0, 0, 130, 60, 8.0)], tools.fold_load([line(0, 0, 130, 60, 8.0)], LK, 0.7))
    pair = tools.folded(lambda: two_lines(100.0, round(rng.uniform(60, 300)), 8.0), LK, 4)
    yield case("two-lines-fold", pair, tools.fold_load(pair, LK, 0.3), peak=True)
    bent = tools.folded(lambda: l_shape(round(rng.uniform(20, 200)), 150.0), LK, 4)
    yield case("l-shape-fold", bent, tools.fold_load(bent, LK, 0), peak=True)
    for index in range(1, 7):
        runs = tools.folded(lambda: random_runs(rng, int(rng.integers(3, 7))), LK)
        yield case(f"random-fold-{index}", runs, tools.fold_load(runs, LK, 0.1 * index))
    runs = tools.folded(lambda: random_runs(rng, 2, arcs=1), LK)
    yield case("arc-fold", runs, tools.fold_load(runs, LK, 0.2))

    # Five states, and pairs that lie close together across a change of the rupturing end.
    yield case("five-states-1", [line(-95.104, -115.528, 1.381, -115.528, 12.0), line(170.715, 281.465, 278.216, 281.465,
               5.0)], load(0, 0, 982.836456, -184.478999, -494.811139), peak=True)
    yield case("five-states-2", [line(131.793, -267.544, 216.108, -267.544, 3.0), line(-199.285, 215.185, -144.075,
               215.185, 5.0), line(147.188, 279.139, 272.165, 279.139, 3.0), line(62.783, -269.198, 184.368, -268.543,
               5.0)], load(0, 0, 990.580525, -136.931457, 36556.814788))
    yield case("five-states-3", [line(271.778, -258.01, 323.65, -256.665, 8.0), line(-5.283, 277.818, 72.952, 276.466,
               12.0), line(93.688, -98.711, 233.9, -98.711, 3.0)],
               load(0, 0, 998.969707, -45.381989, -51123.619527))
    yield case("close-pair-1", [line(118.621, 281.641, 216.257, 284.347, 3.0), line(-127.177, -13.381, -8.554, -14.696,
               8.0)], load(0, 0, 964.807262, -262.95807, -34733.715995))
    yield case("close-pair-2", [line(17.067, -277.835, 90.043, -277.835, 8.0), line(-219.232, -298.635, -147.706,
               -298.635, 12.0), line(-30.149, 245.806, 93.923, 245.806, 5.0), line(-264.06, -3.281, -192.665, 1.954,
               12.0)], load(0, 0, 995.35892, 96.232114, 99700.881824))

    # The instantaneous centre on or very near a weld.
    yield case("line-centre-on-weld", [line(-60, 0, 60, 0)], load(20, 0, 0, 1000))
    near = [line(-60, 0, 60, 0), line(-60, 50, 40, 80, 4.0)]
    yield case("centre-near-line-1e-3", near, tools.centre_load(near, LK, (21.3, 0.001)))
    yield case("centre-near-end", near, tools.centre_load(near, LK, (60.0005, 0.0002)))
    bow = [arc(0, 0, 50, 20, 200, 5.0), line(-50, 0, 30, -45)]
    c, s = math.cos(math.radians(77.0)), math.sin(math.radians(77.0))
    yield case("centre-near-arc-inside", bow, tools.centre_load(bow, LK, (49.99 * c, 49.99 * s)))
    yield case("centre-near-arc-outside", bow, tools.centre_load(bow, LK, (50.0003 * c, 50.0003 * s)))

    # Mixed legs and fillers, two sides, short runs, end welds.
    def lines3(*legs):
        return [line(100 * i, -10, 100 * i, 10, leg) for i, leg in enumerate(legs)]

    yield case("three-lines-3-5-12", lines3(3.0, 5.0, 12.0), load(200, 0, 0, 1000))
    yield case("three-lines-3-12-12", lines3(3.0, 12.0, 12.0), load(200, 0, 0, 1000))
    yield case("sides-2-plate", [line(0, 0, 0, 200, 6.0, 490.0, 2)], load(150, 120, 200, -1000), peak=True)
    yield case("sides-2-mixed", [line(0, 0, 0, 150, 5.0, 490.0, 2), line(0, 150, 70, 150, 8.0, 430.0),
                                 arc(70, 120, 30, -90, 180, 4.0, 550.0, 2)], load(-80, 200, 700, -600))
    yield case("short-runs", [line(0, 0, 4, 0, 10.0), line(60, 5, 60, 9.5, 8.0), line(20, 70, 23, 73, 12.0)],
               load(90, 10, 200, 900))
    yield case("long-sides-short-end", [line(0, 0, 200, 0, 6.0), line(0, 40, 200, 40, 6.0), line(0, 0, 0, 40, 6.0)],
               load(0, 20, -1000, 0), peak=True)
    for count in (5, 6, 7, 8):
        runs = random_runs(rng, count)
        for run in runs[::3]:
            run["sides"] = 2
        yield case(f"random-{count}", runs, random_load(rng), peak=count == 5)
    yield case("random-arcs-1", random_runs(rng, 2, arcs=2), random_load(rng))
    yield case("random-arcs-2", random_runs(rng, 1, arcs=3), random_load(rng), peak=True)
    yield case("open-arc", [arc(5, -10, 70, 15, 250, 8.0)], load(-30, 140, 900, 300))

    # The polynomial law.
    yield case("poly-two-lines", two_lines(120, 100), load(140, 10, 0, -1000), POLY, peak=True)
    yield case("poly-c-shape", c_shape(60, 150, 8.0), load(190, 75, 100, -1000), POLY)
    yield case("poly-ring", [arc(0, 0, 45, 0, 360, 5.0)], load(60, 20, 0, -1000), POLY)
    yield case("poly-random", random_runs(rng, 4, arcs=1), random_load(rng), POLY)
    runs = tools.folded(lambda: random_runs(rng, 3), POLY)
    yield case("poly-fold", runs, tools.fold_load(runs, POLY, 0.2), POLY)

    # Butler-Pal-Kulak.
    yield case("bpk-two-lines", two_lines(120, 100), load(140, 10, 0, -1000), BPK, peak=True)
    yield case("bpk-l-shape", l_shape(100, 130, 8.0), load(-70, 150, 900, 400), BPK)
    yield case("bpk-arc-and-lines", [line(-40, 30, 40, 30), arc(40, 0, 30, -90, 180, 8.0)], load(90, 70, 600, -800),
               BPK)
    yield case("bpk-random", random_runs(rng, 5), random_load(rng), BPK)
    yield case("bpk-centre-on-weld", [line(-60, 0, 60, 0)], load(30, 0, 0, 1000), BPK)

    apart = two_lines(100, 300)
    yield case("bpk-fold", apart, tools.fold_load(apart, BPK, 0.3), BPK, peak=True)

    # Rigid-plastic.
    yield case("plastic-line", [line(0, 0, 0, 120)], load(50, 20, 0, 1000), PLASTIC)
    yield case("plastic-c-shape", c_shape(80, 160), load(260, 80, 0, -1000), PLASTIC)
    yield case("plastic-ring", [arc(0, 0, 40, 0, 360)], load(150, 0, 0, -1000), PLASTIC)
    yield case("plastic-random", random_runs(rng, 5, arcs=1), random_load(rng), PLASTIC)
    yield case("plastic-two-lines-near-axis", two_lines(), tilted(0, 0, 1000, 4, 1500), PLASTIC)

    yield case("plastic-fold", apart, tools.fold_load(apart, PLASTIC, 0.3), PLASTIC)
    single = [line(0, 0, 0, 100)]
    yield case("plastic-line-near-across", single, tools.fold_load(single, PLASTIC, 0.5), PLASTIC)

    # The mid-point procedure.
    yield case("elements-20-two-lines", two_lines(), load(130, 10, 60, -1000), elements=20)
    yield case("elements-7-c-shape", c_shape(83, 160), load(260, 85, 40, -1000), elements=7)
    yield case("elements-30-random", random_runs(rng, 4), random_load(rng), elements=30)
    yield case("elements-12-arcs", random_runs(rng, 2, arcs=1), random_load(rng), elements=12)
    yield case("elements-10-bpk", l_shape(77, 130), load(90, 20, 100, -1000), BPK, elements=10)
    yield case("elements-15-plastic", box(93, 140), load(150, 20, 100, -1000), PLASTIC, elements=15)
    yield case("elements-20-two-lines-10deg", two_lines(), tilted(0, 0, 1000, 10, 2000), elements=20)
