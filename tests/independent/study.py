"""The published study of tests/data/grr_aiag.csv analysed outside Rust, by least squares on dummy columns.

    python3 tests/independent/study.py

Sums of squares come from residuals of nested models, not from the formulas the crate uses. Prints 12 digits.
"""
import csv
import pathlib

import numpy as np

here = pathlib.Path(__file__).parent.parent / "data" / "grr_aiag.csv"
rows = [row for row in csv.DictReader(line for line in here.open() if not line.startswith("#"))]
y = np.array([float(row["y"]) for row in rows])
dummies = lambda labels: np.array([[float(label == name) for name in sorted(set(labels))] for label in labels])
part = dummies([row["part"] for row in rows])
operator = dummies([row["operator"] for row in rows])
cell = dummies([row["part"] + "/" + row["operator"] for row in rows])
one = np.ones((len(y), 1))


def left(*columns):
    """Residual sum of squares of the model with these columns."""
    design = np.hstack((one,) + columns)
    fitted = design @ np.linalg.lstsq(design, y, rcond=None)[0]
    return float(np.sum((y - fitted) ** 2))


p, o, t = part.shape[1], operator.shape[1], len(y) // cell.shape[1]
sums = {
    "part": left(operator) - left(operator, part),
    "operator": left(part) - left(part, operator),
    "interaction": left(part, operator) - left(cell),
    "error": left(cell),
    "total": left(),
}
dof = {"part": p - 1, "operator": o - 1, "interaction": (p - 1) * (o - 1), "error": p * o * (t - 1)}
mean = {name: sums[name] / dof[name] for name in dof}
for name, value in sums.items():
    print(f"sum {name} {value:.12g}")
pool = (sums["interaction"] + sums["error"]) / (dof["interaction"] + dof["error"])
print(f"pooled repeatability {pool:.12g}")
print(f"pooled operator {(mean['operator'] - pool) / (p * t):.12g}")
print(f"pooled part {(mean['part'] - pool) / (o * t):.12g}")
print(f"full repeatability {mean['error']:.12g}")
print(f"full interaction {(mean['interaction'] - mean['error']) / t:.12g}")
print(f"full operator {(mean['operator'] - mean['interaction']) / (p * t):.12g}")
print(f"full part {(mean['part'] - mean['interaction']) / (o * t):.12g}")
