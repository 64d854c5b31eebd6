#!/usr/bin/env python3
"""The march against a boundary-value integration by scipy, with strongly variable viscosity.

An oil whose viscosity falls twenty-fold flows in the tubes, a liquid with constant
properties around them, so that the shell film is one number and the tube film is
evaluated here from the published equations (Gnielinski 1976 and 2013), with the wall
temperature found at every place. Usage: march_reference.py PROGRAM
"""
import json
import math
import subprocess
import sys

import numpy as np
from scipy.integrate import solve_bvp
from scipy.optimize import brentq

TOLERANCE = 1e-4

CASE = """
dutygauge: 1
title: a viscous oil against a constant liquid
exchanger:
  tema: BEM
  shell: {{inside_diameter: 489 mm}}
  tubes: {{count: 200, passes: {passes}, outside_diameter: 19.05 mm, wall: 2.11 mm, length: 6 m, tubesheet_thickness: 50 mm,
    pitch: 25.4 mm, layout: 30, conductivity: 50 W/m.K, roughness: 1.5 um}}
  baffles: {{style: single_segmental, cut: 25 %, spacing: 200 mm}}
  clearances: {{tube_to_baffle: 0.8 mm, shell_to_baffle: 4.8 mm, bundle_to_shell: 13 mm}}
streams:
  shell_side:
    name: liquid
    fluid: {{constant: {{density: 950 kg/m3, heat_capacity: 3500 J/kg.K, conductivity: 0.4 W/m.K, viscosity: 1 mPa.s, phase: liquid}}}}
    flow: {shell_flow} kg/s
    inlet: {{temperature: 20 degC, pressure: 5 bara}}
    fouling: 0 m2.K/W
  tube_side:
    name: oil
    fluid:
      two_point: {{phase: liquid, at: 10 -> 130 degC, density: 860 -> 860 kg/m3, heat_capacity: 2100 -> 2100 J/kg.K,
        conductivity: 0.13 -> 0.13 W/m.K, viscosity: {thick} -> {thin} mPa.s}}
    flow: {tube_flow} kg/s
    inlet: {{temperature: 120 degC, pressure: 5 bara}}
    fouling: 0 m2.K/W
"""

D_O, D_I, LENGTH, K_WALL = 0.01905, 0.01905 - 2 * 0.00211, 6.0 - 2 * 0.05, 50.0
CP_T, K_T, CP_S = 2100.0, 0.13, 3500.0
T_TUBE_IN, T_SHELL_IN = 393.15, 293.15


def film_in_tube(mass_flux, viscosity, viscosity_at_wall):
    re, pr, d_l = mass_flux * D_I / viscosity, viscosity * CP_T / K_T, D_I / LENGTH

    def laminar(re_):
        gz = re_ * pr * d_l
        return (3.66**3 + 0.7**3 + (1.615 * gz ** (1 / 3) - 0.7) ** 3
                + ((2 / (1 + 22 * pr)) ** (1 / 6) * gz**0.5) ** 3) ** (1 / 3)

    def turbulent(re_):
        xi8 = (1.8 * math.log10(re_) - 1.5) ** -2 / 8
        return xi8 * (re_ - 1000) * pr / (1 + 12.7 * xi8**0.5 * (pr ** (2 / 3) - 1)) * (1 + d_l ** (2 / 3))

    if re <= 2300:
        nu = laminar(re)
    elif re >= 4000:
        nu = turbulent(re)
    else:
        g = (re - 2300) / 1700
        nu = (1 - g) * laminar(2300) + g * turbulent(4000)
    return nu * (viscosity / viscosity_at_wall) ** 0.11 * K_T / D_I


class Oil:
    def __init__(self, thick, thin):
        self.a = math.log(thick / thin) / (1 / 283.15 - 1 / 403.15)
        self.b = math.log(thick) - self.a / 283.15

    def viscosity(self, t):
        return 1e-3 * math.exp(self.b + self.a / min(max(t, 283.15), 403.15))


def overall(oil, mass_flux, shell_film, t, s):
    """U on the outside, with the wetted wall of the oil found by a bracketed root."""
    beyond = D_O * math.log(D_O / D_I) / (2 * K_WALL) + 1 / shell_film
    mu = oil.viscosity(t)

    def u_at(wall):
        return 1 / (D_O / D_I / film_in_tube(mass_flux, mu, oil.viscosity(wall)) + beyond)

    def miss(wall):
        inner = film_in_tube(mass_flux, mu, oil.viscosity(wall))
        return wall - (t + u_at(wall) * (s - t) * D_O / D_I / inner)

    low, high = min(t, s), max(t, s)
    return u_at(brentq(miss, low - 1e-9, high + 1e-9, xtol=1e-10)) if high - low > 1e-9 else u_at(t)


def duty_by_scipy(passes, oil, tube_flow, shell_flow, shell_film):
    tubes = 200 // passes
    mass_flux = tube_flow / (tubes * math.pi / 4 * D_I**2)
    area = math.pi * D_O * LENGTH * tubes  # of one pass
    c_t, c_s = tube_flow * CP_T, shell_flow * CP_S
    # x runs along the shell stream; the first pass runs against it.
    directions = [-1 if k % 2 == 0 else 1 for k in range(passes)]

    def slopes(x, y):
        out = np.empty_like(y)
        for i in range(y.shape[1]):
            s, heat = y[0, i], 0.0
            for k in range(passes):
                q = overall(oil, mass_flux, shell_film, y[1 + k, i], s) * area * (s - y[1 + k, i])
                out[1 + k, i] = directions[k] * q / c_t
                heat += q
            out[0, i] = -heat / c_s
        return out

    def ends(start, end):
        conditions = [start[0] - T_SHELL_IN, end[1] - T_TUBE_IN]
        if passes == 2:
            conditions.append(start[1] - start[2])
        return np.array(conditions)

    x = np.linspace(0, 1, 41)
    first = np.vstack([np.linspace(T_SHELL_IN, T_SHELL_IN + 20, 41)]
                      + [np.linspace(T_TUBE_IN - 30, T_TUBE_IN - 5, 41)] * passes)
    solution = solve_bvp(slopes, ends, x, first, tol=1e-7, max_nodes=4000)
    assert solution.success, solution.message
    return c_s * (solution.y[0, -1] - T_SHELL_IN)


def rated(program, text):
    run = subprocess.run([program, "rate", "--json", "-"], input=text, capture_output=True, text=True)
    return json.loads(run.stdout)


def main():
    program = sys.argv[1]
    worst = 0.0
    for passes, thick, thin, tube_flow, shell_flow in ((1, 400, 8, 12, 8), (1, 60, 1.2, 30, 10),
                                                       (2, 400, 8, 12, 8), (2, 60, 1.2, 20, 10)):
        text = CASE.format(passes=passes, thick=thick, thin=thin, tube_flow=tube_flow, shell_flow=shell_flow)
        result = rated(program, text)
        # The shell film is one constant; a march reports the film the whole unit shows.
        shell_film = rated(program, text + "methods: {solution: mean}\n")["shell_side"]["film_W_m2K"]
        march = result["solutions"]["march"]["duty_W"]
        reference = duty_by_scipy(passes, Oil(thick, thin), tube_flow, shell_flow, shell_film)
        difference = march / reference - 1
        mean = result["solutions"]["mean"]["duty_W"] / reference - 1
        print(f"{passes} pass(es), {thick} -> {thin} mPa.s: march {march:.1f} W, scipy {reference:.1f} W, "
              f"{difference:+.2e} (mean properties {mean:+.2e})")
        worst = max(worst, abs(difference))
    if worst > TOLERANCE:
        sys.exit(f"the march misses the reference by {worst:.2e}, more than {TOLERANCE}")


main()
