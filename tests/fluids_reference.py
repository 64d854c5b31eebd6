#!/usr/bin/env python3
"""Compares `dutygauge fluid` with python3-iapws and python3-gsw over a grid.

Usage: fluids_reference.py PROGRAM. Exit status 77 (skipped) where the two
packages are missing.
"""
import json
import os
import shutil
import subprocess
import sys

SKIPPED = 77
try:
    import gsw
    from iapws import IAPWS97
except ImportError:
    # The packages belong to the system's own Python, which need not be the first on the path.
    system = shutil.which("python3", path=os.defpath)
    if system is None or os.environ.get("DUTYGAUGE_REFERENCE_TRIED"):
        print("skipped: no iapws and gsw")
        sys.exit(SKIPPED)
    os.environ["DUTYGAUGE_REFERENCE_TRIED"] = "1"
    os.execv(system, [system] + sys.argv)

WATER = [(t, p) for p in (2e3, 1e5, 1e6, 8e6, 5e7)
         for t in (274.0, 300.0, 350.0, 420.0, 500.0, 580.0, 620.0, 700.0, 900.0, 1070.0)]
SEA = [(s, t) for s in (5, 20, 35, 60, 80, 120) for t in (274.15, 283.15, 293.15, 303.15, 312.15)]


def ask(program, spec, temperature, pressure):
    at = f"temperature={temperature!r} K, pressure={pressure!r} Pa"
    run = subprocess.run([program, "fluid", spec, "--at", at, "--json"], capture_output=True, text=True)
    if run.returncode != 0:
        raise SystemExit(f"{spec} at {at}: status {run.returncode}\n{run.stderr}")
    return json.loads(run.stdout)


def compare(where, ours, reference, tolerance):
    return [f"{where}: {key} {ours[key]:.9g}, reference {value:.9g} ({ours[key] / value - 1:+.2e})"
            for key, value in reference.items()
            if not abs(ours[key] / value - 1) <= tolerance.get(key, tolerance.get("", 0))]


def water(program):
    """The same formulation by another program: what is left is rounding."""
    faults = []
    for t, p in WATER:
        state = IAPWS97(T=t, P=p * 1e-6)
        if state.region not in (1, 2):
            continue
        reference = {"density_kg_m3": state.rho, "heat_capacity_J_kgK": state.cp * 1e3,
                     "conductivity_W_mK": state.k, "viscosity_Pa_s": state.mu, "enthalpy_J_kg": state.h * 1e3}
        faults += compare(f"water {t} K {p} Pa", ask(program, "water", t, p), reference, {"": 1e-6})
    return faults


def seawater(program):
    """TEOS-10 within its own range, below 40 degC; the tolerances are the stated bands of both."""
    faults = []
    for s, t in SEA:
        reference = {"density_kg_m3": gsw.rho_t_exact(s, t - 273.15, 0.0),
                     "heat_capacity_J_kgK": gsw.cp_t_exact(s, t - 273.15, 0.0)}
        band = {"density_kg_m3": 0.001, "heat_capacity_J_kgK": 0.003 if s <= 80 else 0.005}
        faults += compare(f"seawater {s} g/kg {t} K", ask(program, f"{{seawater: {{salinity: {s} g/kg}}}}", t, 101325.0),
                          reference, band)
    return faults


def main():
    program = sys.argv[1]
    faults = water(program) + seawater(program)
    print("\n".join(faults) or f"{len(WATER)} states of water and {len(SEA)} of sea water agree")
    return bool(faults)


sys.exit(main())
