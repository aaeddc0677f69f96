"""Writes ../cases/settled-state.json: both fixed points of du/dtau = a - b u - exp(-u) by Lambert's W at 60 digits.

An independent program: it shares nothing with lib/engine. Needs mpmath. Run: python3 settled-state.py
"""
import json
import pathlib
import random

import mpmath as mp

mp.mp.dps = 60
random.seed(20270301)


def row(c: float, b: mp.mpf, d: mp.mpf) -> dict[str, str]:
    a = 1 + mp.mpf(c)
    argument = -mp.exp(-a / b) / b
    stable = a / b + mp.lambertw(argument, 0).real
    other = a / b + mp.lambertw(argument, -1).real
    for u in (stable, other):
        assert abs(a - b * u - mp.exp(-u)) < mp.mpf(10) ** -30 * (1 + abs(u)) * (1 + b)
    if c == 0:
        # Where a = 1 one of the two is 0 exactly; Lambert's W gives it to rounding only.
        stable, other = (stable, mp.mpf(0)) if b < 1 else (mp.mpf(0), other)
    text = lambda x, digits=25: mp.nstr(x, digits)
    return {"excess": text(mp.mpf(c), 17), "thresholdRatio": text(b), "margin": text(d), "stable": text(stable), "other": text(other)}


def rows(count: int):
    for k in range(count):
        c = 0.0 if k % 7 == 0 else 10 ** random.uniform(-14, 1)
        if k % 3 == 0:  # near the threshold: the margin 1 - b is the double that is given
            d = mp.mpf(random.choice((-1, 1)) * 10 ** random.uniform(-13, -0.5))
            yield row(c, 1 - d, d)
        else:
            b = mp.mpf(10 ** random.uniform(-3, 3))
            yield row(c, b, 1 - b)
    for d in ("1e-12", "-1e-12"):
        for c in (0.0, 1e-12, 1e-6, 1.0, 10.0):
            yield row(c, 1 - mp.mpf(d), mp.mpf(d))


document = {
    "topic": "fixed points of du/dtau = a - b u - exp(-u)",
    "source": {
        "citation": "u = a/b + W(-exp(-a/b)/b), W Lambert's function, branches 0 and -1",
        "kind": f"computed with reference library (mpmath {mp.__version__})",
        "verified": "computed",
    },
    "tolerance": {"relative": 1e-13},
    "rows": list(rows(390)),
}
lines = ",\n".join("  " + json.dumps(r) for r in document.pop("rows"))
head = json.dumps(document, indent=1)[:-2]
path = pathlib.Path(__file__).parent.parent / "cases" / "settled-state.json"
path.write_text(f'{head},\n "rows": [\n{lines}\n ]\n}}\n')
