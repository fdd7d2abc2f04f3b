"""The baseline of the bench: the same fits, plots and table with general-purpose libraries.

python3 same_job.py LOT_FOLDER OUT_FOLDER
"""
import json
import pathlib
import sys

import matplotlib

matplotlib.use("Agg")
import matplotlib.pyplot as plt
import pandas as pd
from scipy import stats

lot, out = pathlib.Path(sys.argv[1]), pathlib.Path(sys.argv[2])
out.mkdir(parents=True, exist_ok=True)
rows, curves = [], []
for path in sorted(lot.glob("**/*.csv")):
    table = pd.read_csv(path)
    load = table[next(name for name in table if name.lower().startswith("load"))]
    length = table[next(name for name in table if name.lower().startswith("length"))]
    peak = length.idxmin()
    f, s = load[: peak + 1], length[0] - length[: peak + 1]
    full = f.max()
    window = (f >= 0.3 * full) & (f <= 0.7 * full)
    fit = stats.linregress(s[window], f[window])
    residual = f[window] - fit.intercept - fit.slope * s[window]
    robust = stats.theilslopes(f[window][:: max(1, window.sum() // 200)], s[window][:: max(1, window.sum() // 200)])
    rows.append(dict(spring=path.stem, rate=fit.slope, u=fit.stderr, residual_sd=residual.std(ddof=2), robust=robust[0]))
    curves.append((s, f, s[window], residual))
table = pd.DataFrame(rows)
table.to_html(out / "report.html")
(out / "result.json").write_text(json.dumps(rows))
fig, axes = plt.subplots(3, 1, figsize=(8.3, 11.7))
for s, f, w, residual in curves:
    axes[0].plot(s, f, lw=0.5)
    axes[1].plot(w, residual, lw=0.5)
axes[2].errorbar(range(len(table)), table.rate, yerr=2 * table.u, fmt="o")
fig.savefig(out / "report.pdf")
fig.savefig(out / "report.svg")
