#!/usr/bin/env python3
"""Recomputes a sample's figures by the project's definitions, sharing no code with the crate.

Run by hand:  python3 tests/independent/recompute.py [samples/accepted] > tests/independent/accepted.txt
Needs numpy and pandas. Reads the lot, drawing and rig files, the exports and the findings.

Where the definitions leave a choice, the choice made here is marked CHOICE; where the crate documents its own, it is that one.
"""
import glob
import re
import sys
import tomllib
from pathlib import Path

import numpy as np
import pandas as pd

# Exact by definition: inch, pound-force (0.45359237 kg * 9.80665 m/s2), kilogram-force.
MM = {"mm": 1.0, "cm": 10.0, "m": 1000.0, "in": 25.4}
NEWTON = {"N": 1.0, "kN": 1000.0, "lbf": 0.45359237 * 9.80665, "kgf": 9.80665}
# MPa. EN 13906-1 table of material values.
SHEAR = {"EN 10270-1 SH": 81500.0}

# Level II code letters and single normal plans (MIL-STD-105E tables I and II-A; ISO 2859-1 the same).
LETTER = [(90, "E"), (150, "F"), (280, "G")]
PLAN = {("E", 4.0): (13, 1, 2), ("F", 2.5): (20, 1, 2), ("G", 1.5): (32, 1, 2), ("G", 2.5): (32, 2, 3)}


def nominal(value):
    """Nominal of a limit or a bare number."""
    return value["nominal"] if isinstance(value, dict) else value


def in_file_units(table):
    """The rig's own figures in mm and N: (mm per unit, N per unit)."""
    return (25.4, NEWTON["lbf"]) if table.get("units", "mm-N") == "in-lbf" else (1.0, 1.0)


# --- theory -----------------------------------------------------------------------------------

def geometry(spring):
    """Wire, mean coil diameter, active and total coils, G of one member, all nominal."""
    d = nominal(spring["wire_diameter"])
    if "mean_diameter" in spring:
        coil = nominal(spring["mean_diameter"])
    elif "outside_diameter" in spring:
        coil = nominal(spring["outside_diameter"]) - d
    else:
        coil = nominal(spring["inside_diameter"]) + d
    shear = spring.get("shear_modulus") or SHEAR[spring["material"]]
    return d, coil, nominal(spring["active_coils"]), nominal(spring["total_coils"]), shear


def theory(drawing):
    """Rate, Lc, Sa, Ln per member; the set's rate and Ln. All members here are closed and ground."""
    members = []
    for spring in drawing["spring"]:
        d, coil, n, nt, shear = geometry(spring)
        rate = shear * d**4 / (8 * coil**3 * n)
        solid = nt * d  # EN 13906-1, closed and ground. CHOICE: nominal d, not the largest d
        clearance = n * (0.0015 * coil**2 / d + 0.1 * d)  # EN 13906-1, cold coiled
        members.append(dict(name=spring["name"], d=d, D=coil, n=n, rate=rate, Lc=solid,
                            Sa=clearance, Ln=solid + clearance, L0=nominal(spring["free_length"])))
    return members


def stresses(member, load):
    """Uncorrected, with the static factor 1 + 1/(2w), with EN 13906-1's k, with Wahl's; MPa."""
    w = member["D"] / member["d"]
    tau = 8 * load * member["D"] / (np.pi * member["d"] ** 3)
    return (tau, tau * (1 + 0.5 / w), tau * (w + 0.5) / (w - 0.75),
            tau * ((4 * w - 1) / (4 * w - 4) + 0.615 / w))


# --- one export -------------------------------------------------------------------------------

def read(path, rig):
    """Yields (specimen, load as read in N, travel as read in mm) of every specimen of a file."""
    e = rig["export"]
    first = max(e["header_line"], e.get("units_line", 0))
    encoding = e.get("encoding", "utf-8")
    head = pd.read_csv(path, sep=e["delimiter"], encoding=encoding, header=None, dtype=str,
                       skiprows=e["header_line"] - 1, nrows=1, skip_blank_lines=False)
    # As text, then by Python's own conversion, which rounds correctly; pandas' need not.
    table = pd.read_csv(path, sep=e["delimiter"], encoding=encoding, header=None, dtype=str,
                        skiprows=first, names=list(head.iloc[0]), skip_blank_lines=False)

    def numbers(column):
        return np.array([float(cell.replace(e["decimal"], ".")) for cell in table[column]])

    sign = -1.0 if e["load"]["pushing"] == "negative" else 1.0
    load = numbers(e["load"]["column"]) * sign * NEWTON[e["load"]["unit"]]
    travel = numbers(e["travel"]["column"]) * MM[e["travel"]["unit"]]
    source = e["spring"]
    names = table[source["column"]].astype(str).to_numpy() if "column" in source \
        else np.full(len(table), Path(path).stem)
    for name in dict.fromkeys(names):
        yield name, load[names == name], travel[names == name]


def turns(travel):
    """Stroke bounds as (first, last + 1), split where the indicated travel turns back.

    CHOICE: every change of direction of the travel as read is a reversal (the samples have no
    jitter); readings that stand still belong to the stroke before them.
    """
    direction, bounds, start = 0.0, [], 0
    for i, step in enumerate(np.diff(travel)):
        if step == 0:
            continue
        if direction and np.sign(step) != direction:
            bounds.append((start, i + 1))
            start = i  # the turning point belongs to both strokes
        direction = np.sign(step)
    bounds.append((start, len(travel)))
    return bounds


def averaged(s, f):
    """Readings at one and the same travel become their mean, so that a dwell weighs once."""
    frame = pd.DataFrame({"s": s, "f": f})
    same = (frame["s"].diff() != 0).cumsum()
    mean = frame.groupby(same).mean()
    return mean["s"].to_numpy(), mean["f"].to_numpy()


def contact(s, f, at):
    """Travel of first touch: the line through the first loads on the spring, taken back to zero.

    CHOICE (documented at `contact::find`): the line goes through the readings after the last one below F_c, up to 3 F_c and
    at least three.
    """
    risen = int(np.argmax(f >= 3 * at))
    first = int(np.flatnonzero(f[:risen] < at)[-1]) + 1
    count = max(int(np.argmax(f[first:] > 3 * at)), 3)
    x, y = s[first:first + count], f[first:first + count]
    slope = ((x - x.mean()) * (y - y.mean())).sum() / ((x - x.mean()) ** 2).sum()
    return x.mean() - y.mean() / slope


def smoothed(values):
    """Means over five neighbours; near the ends over as many as there are on either side."""
    n = len(values)
    reach = np.minimum(2, np.minimum(np.arange(n), n - 1 - np.arange(n)))
    return np.array([values[i - r:i + r + 1].mean() for i, r in enumerate(reach)])


def crossing(s, f, level):
    """Travel where the load first reaches a level; None if it never does.

    CHOICE (documented at `Path::crossing`): smoothed = travel and load averaged over five readings; monotone = from the
    highest smoothed load before; then linear.
    """
    s, f = smoothed(s), smoothed(f)
    i = int(np.argmax(f >= level))
    if i == 0:
        return None
    k = int(np.argmax(f[:i]))
    return s[k] + (level - f[k]) / (f[i] - f[k]) * (s[i] - s[k])


def load_at(s, f, at):
    """Load at a travel.

    CHOICE (documented at `load::local`): the least-squares line through the readings within 1 % of the stroke's travel
    on either side, where there are at least five and on both sides; else linear between the two neighbours.
    """
    near = abs(s - at) <= 0.01 * (s[-1] - s[0])
    if near.sum() >= 5 and (s[near] <= at).any() and (s[near] > at).any():
        slope = np.polyfit(s[near] - at, f[near], 1)
        return float(slope[1])
    return float(np.interp(at, s, f))


def rise(s, f, touch):
    """Travel where the rise to solid begins; None if it was not reached.

    CHOICE (documented at `solid::rise`): a tangent is taken over 1/200 of the travel from contact to the end, from a
    reading to the last one that is nearer than that or, if farther apart, the next; the rise begins in the middle of the first tangent from
    which on every one is above 5 times the median slope over 20 pieces of the stroke.
    """
    start = contact(s, f, touch)
    step, slopes = (s[-1] - start) / 20, []
    ahead = [i for i in range(len(s)) if s[i] >= start]
    last = ahead[0]
    for i in ahead[1:]:
        if s[i] - s[last] >= step:
            slopes.append((f[i] - f[last]) / (s[i] - s[last]))
            last = i
    rate, over = float(np.median(slopes)), (s[-1] - start) / 200
    begin, k = None, len(s) - 1
    for i in range(len(s) - 2, -1, -1):
        while k > i + 1 and s[k - 1] - s[i] >= over:
            k -= 1
        if f[k] - f[i] <= 5 * rate * max(s[k] - s[i], over):
            if begin is None and s[k] - s[i] < over:
                continue
            break
        begin = (s[i] + s[k]) / 2
    return begin


def line(s, f):
    """Least squares of F on s: slope, its standard error, residual SD, largest |residual|, points."""
    ds, df = s - s.mean(), f - f.mean()
    slope = (ds * df).sum() / (ds**2).sum()
    residual = df - slope * ds
    sd = np.sqrt((residual**2).sum() / (len(s) - 2))
    return slope, sd / np.sqrt((ds**2).sum()), sd, np.abs(residual).max(), len(s)


def work(s, f, low, high):
    """Area under readings between two travels, trapezia, ends linear between readings."""
    order = np.argsort(s)
    s, f = s[order], f[order]
    inside = (s > low) & (s < high)
    xs = np.concatenate([[low], s[inside], [high]])
    return np.trapezoid(np.interp(xs, s, f), xs)


def curve(load, travel, rig):
    """Corrected strokes of one specimen, each as (s rising with compression, F net); length = base - s."""
    mm, newton = in_file_units(rig)
    compliance = rig["frame"]["compliance"]["value"] * mm / newton
    touch = rig["contact"]["load"] * newton
    kind, zero = rig["export"]["travel"]["means"], rig["travel"].get("zeroed_at_load", 0.0) * newton
    # F is net of the empty platens. CHOICE (documented at `correct::empty_readings`): the mean of the readings before
    # the load stands F_c above the first one that lie more than F_c's travel before the place where the first rise,
    # drawn from there to 6 F_c, starts.
    indicated = travel if kind == "deflection" else -(
        travel if kind == "length" else np.abs(travel - rig["export"]["travel"]["at_zero_gap"]))
    above = load - load[0] > touch
    i = int(np.argmax(above))
    k = min(i + max(int(np.argmax(load[i:] - load[0] > 6 * touch)), 2), len(load) - 1)
    slope = (load[k] - load[i]) / (indicated[k] - indicated[i])
    clear = indicated[i] - (load[i] - load[0]) / slope - touch / slope
    net = load - load[:i][indicated[:i] < clear].mean()
    if kind == "deflection":
        s = travel - compliance * net
        base = None
    else:
        gap = travel if kind == "length" else np.abs(travel - rig["export"]["travel"]["at_zero_gap"])
        s = -(gap + compliance * (net - zero))
        base = 0.0  # length = base - s
    strokes = []
    for k, (a, b) in enumerate(turns(travel if kind == "deflection" else -gap)):
        strokes.append((k % 2 == 0, *averaged(s[a:b], net[a:b])))
    return strokes, base, touch


def figures(load, travel, rig, lot, drawing, window, gauge):
    """Every figure of one specimen."""
    strokes, base, touch = curve(load, travel, rig)
    downs = [(s, f) for down, s, f in strokes if down]
    ups = [(s, f) for down, s, f in strokes if not down]
    recorded = lot.get("conditions", {}).get("presetting_recorded", 0)
    first, last = downs[recorded], downs[-1]
    s0_first, s0_last = contact(*first, touch), contact(*last, touch)
    if base is None and gauge is not None:
        # Deflection: the spring's own L0 stands at its contact. CHOICE: contact of the first
        # loading stroke after presetting.
        base = gauge + s0_first
    out = {"free_length": gauge if gauge is not None else base - s0_first}
    out["contact_length"] = base - s0_first
    out["set"] = s0_last - s0_first
    s, f = last
    low, high = window(s, f, base, s0_last)
    inside = (s >= low) & (s <= high)
    out["rate"], out["rate_se"], out["residual_sd"], out["largest_residual"], out["points"] = line(s[inside], f[inside])
    out["window_from"], out["window_to"] = base - low, base - high
    for requirement in drawing["requirements"]["load"]:
        at = requirement["at_length"]
        out[f"load_{at:g}"] = load_at(s, f, base - at)
    # CHOICE (documented at `loops::hysteresis`): the last full cycle; common travel = from the contact of its loading
    # stroke to the shorter of both strokes' largest travel, and before any rise to solid.
    solid = rise(s, f, touch)
    end = min(s.max(), ups[-1][0].max())
    if solid is not None:
        end = min(end, solid)
    begin = max(s0_last, s.min(), ups[-1][0].min())
    loading, unloading = work(s, f, begin, end), work(*ups[-1], begin, end)
    out["hysteresis"] = 100 * (loading - unloading) / loading
    out["solid_length"] = base - solid if solid is not None else np.nan
    return out


def main(folder):
    lot = tomllib.loads((folder / "lot.toml").read_text())
    drawing = tomllib.loads((folder / lot["drawing"]).read_text())
    rig = tomllib.loads((folder / lot["rig"]).read_text())
    members = theory(drawing)
    limit = drawing["requirements"]["rate"]
    free = members[0]["L0"]
    smallest = max(m["Ln"] for m in members)
    theory_rate = sum(m["rate"] for m in members)
    terms = drawing["rate_test"]
    # CHOICE: "nominal R" is the nominal of the drawing's rate requirement, not theory.
    full = terms.get("full_load", limit["nominal"] * (free - smallest))

    print(f"theory of {drawing['drawing']['number']}")
    lengths = [r["at_length"] for r in drawing["requirements"]["load"]]
    for m in members:
        print(f"  {m['name']}: w {m['D'] / m['d']:.12g}  R {m['rate']:.12g} N/mm  Lc {m['Lc']:.12g} mm"
              f"  Sa {m['Sa']:.12g} mm  Ln {m['Ln']:.12g} mm")
        for at in [*lengths, smallest, m["Lc"]]:
            load = m["rate"] * (m["L0"] - at)
            print(f"    at {at:.12g} mm: {load:.12g} N; stress uncorrected, static, dynamic, Wahl: "
                  + "  ".join(f"{v:.12g}" for v in stresses(m, load)) + " MPa")
    print(f"  rate of all members {theory_rate:.12g} N/mm; from the drawing's rate: Fn {full:.12g} N"
          f"; by theory: {theory_rate * (free - smallest):.12g} N")
    w = terms["window"]
    print(f"  window {w['from']} to {w['to']} of {w['of']}"
          + (f": {0.3 * full:.12g} to {0.7 * full:.12g} N" if w["of"] == "full load" else ""))

    def window(s, f, base, s0):
        if w["of"] == "length":
            return base - w["from"], base - w["to"]
        shares = [float(w[end].rstrip(" %")) / 100 for end in ("from", "to")]
        if w["of"] == "full load":
            return tuple(crossing(s, f, share * full) for share in shares)
        # CHOICE: of the deflection from the nominal L0 to Ln, laid off from contact.
        return tuple(s0 + share * (free - smallest) for share in shares)

    plan = drawing["acceptance"]["plan"]
    if plan["by"] == "attributes":
        letter = next(name for most, name in LETTER if lot["lot"]["size"] <= most)
        aqls = plan["aql"] if isinstance(plan["aql"], dict) else {"all": plan["aql"]}
        for name, aql in aqls.items():
            n, accept, reject = PLAN[letter, aql]
            print(f"  plan {name}: lot of {lot['lot']['size']}, letter {letter}, AQL {aql}: n {n}, Ac {accept}, Re {reject}")
    else:
        print(f"  plan: every spring, lot of {lot['lot']['size']}")

    gauges = {}
    if "findings" in lot:
        table = pd.read_csv(folder / lot["findings"], skiprows=[1], dtype={"spring": str})
        gauges = {r["spring"]: r["free_length"] for _, r in table.iterrows() if pd.notna(r.get("free_length"))}
    found = {}
    for pattern in lot["exports"]:
        for path in sorted(glob.glob(str(folder / pattern))):
            for name, load, travel in read(path, rig):
                found[name] = figures(load, travel, rig, lot, drawing, window, gauges.get(name))
    table = pd.DataFrame(found).T
    table = table.loc[sorted(table.index, key=lambda n: [int(p) if p.isdigit() else p for p in re.split(r"(\d+)", n)])]
    print(f"\nsprings ({len(table)}); N, mm, %")
    with pd.option_context("display.width", 400, "display.max_columns", None, "display.float_format", "{:.12g}".format):
        for group in np.array_split(np.array(table.columns), -(-len(table.columns) // 6)):
            print(table[list(group)].to_string(), end="\n\n")
        print("mean and SD over the springs")
        print(table.agg(["mean", "std"]).T.to_string())
    return table


if __name__ == "__main__":
    main(Path(sys.argv[1] if len(sys.argv) > 1 else "samples/accepted"))
