"""Records what the open library pythermalcomfort says over a grid of inputs.

Run by hand, with the version that is named in the file it writes:

    pip install pythermalcomfort==4.8.1
    python tests/published/data/heat_strain_library.py

It writes heat_strain_library.json beside itself; the checks read that file and
never this script. The library is MIT-licensed and general-purpose.
"""

import importlib.metadata
import itertools
import json
import math
import pathlib

from pythermalcomfort.environment import mean_radiant_tmp
from pythermalcomfort.models import phs, wbgt
from pythermalcomfort.psychrometrics import p_sat

MET = 58.15


def digits(value, places):
    return round(float(value), places)


def finite(value, places):
    return None if math.isnan(value) else digits(value, places)


def strain():
    rows = []
    grid = itertools.product(
        ("7933-2004", "7933-2023"),
        ((40, 0, 34), (35, 20, 45), (25, 45, 50), (30, 60, 30), (45, 5, 20)),
        (0.1, 0.4, 2.0),
        ((120, "sitting"), (165, "standing"), (240, "crouching")),
        ((0.3, 0.0, 0.2), (0.6, 0.0, 0.2), (0.9, 0.4, 0.15)),
    )
    for index, (model, (ta, over, rh), v, (rate, posture), (clo, share, emissivity)) in enumerate(grid):
        accl = 100 if index % 2 == 0 else 0
        walking = {} if index % 5 else {"walk_sp": 0.8, "theta": 60}
        # The library's f_r is an emissivity in 2004 and a reflectance in 2023.
        f_r = emissivity if model == "7933-2004" else 1 - emissivity
        found = phs(
            tdb=ta, tr=ta + over, v=v, rh=rh, met=rate / MET, clo=clo, posture=posture,
            model=model, acclimatized=accl, duration=480, a_p=share, f_r=f_r,
            round_output=False, limit_inputs=True, **walking,
        )
        if math.isnan(found.t_re):
            continue
        pressure = (
            p_sat(ta) / 1000 if model == "7933-2004" else 0.6105 * math.exp(17.27 * ta / (ta + 237.3))
        ) * rh / 100
        rows.append({
            "edition": int(model[-4:]), "ta": ta, "tr": ta + over, "pa_kPa": digits(pressure, 9), "v": v,
            "M": rate, "posture": posture, "clo": clo, "share": share, "emissivity": emissivity,
            "acclimatised": accl == 100, "walk": walking.get("walk_sp"), "theta_deg": walking.get("theta"),
            "tre": digits(found.t_re, 4), "tcr": digits(found.t_cr, 4), "tsk": digits(found.t_sk, 4),
            "water_g": digits(found.sweat_loss_g, 2), "Dtre": int(found.d_lim_t_re),
            "D50": int(found.d_lim_loss_50), "D95": int(found.d_lim_loss_95),
        })
    return rows


def main():
    # NaN, written as null: no surroundings hold a globe so cold in that air.
    radiant = [
        {"tg": tg, "ta": ta, "v": v, "D": d,
         "tr": finite(mean_radiant_tmp(tg, ta, v, d, 0.95, standard="ISO"), 6)}
        for tg, ta, v, d in itertools.product((25, 40, 60), (20, 30, 45), (0.05, 0.3, 1.5), (0.05, 0.15))
    ]
    index = [
        {"tnw": tnw, "tg": tg, "ta": ta,
         "indoors": digits(wbgt(tnw, tg, round_output=False).wbgt, 6),
         "in_sun": digits(wbgt(tnw, tg, ta, with_solar_load=True, round_output=False).wbgt, 6)}
        for tnw, tg, ta in ((18, 25, 22), (25, 32, 20), (22, 60, 30), (30, 45, 40), (28.5, 75.5, 38.5))
    ]
    saturation = [{"t": t, "Pa": digits(p_sat(t), 4)} for t in (-20, -5, 0, 5, 15, 25, 35, 50, 75, 100)]
    text = json.dumps({
        "made": "tests/published/data/heat_strain_library.py",
        "library": "pythermalcomfort", "version": importlib.metadata.version("pythermalcomfort"),
        "strain": strain(), "mean_radiant": radiant, "wbgt": index, "saturation": saturation,
    }, indent=None, separators=(",", ":"))
    for mark in ("{\"edition\"", "{\"tg\"", "{\"tnw\"", "{\"t\":"):
        text = text.replace(mark, "\n" + mark)
    pathlib.Path(__file__).with_suffix(".json").write_text(text + "\n", encoding="utf-8")


main()
