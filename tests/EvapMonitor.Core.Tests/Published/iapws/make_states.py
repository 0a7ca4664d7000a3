#!/usr/bin/env python3
"""Writes steam_states.csv: random states of water and steam, computed by the independent library `iapws`.

Usage: python3 make_states.py > steam_states.csv
"""
import random

import iapws
from iapws import iapws97

ROWS = 2000
rng = random.Random(19970012)


def row(region, pressure, temperature, state):
    return ",".join([region] + [repr(x) for x in (
        pressure * 1e6, temperature, state["v"], state["h"] * 1e3, state["s"] * 1e3, state["cp"] * 1e3)])


print(f"# iapws {iapws.__version__}, random state 19970012; Pa, K, m3/kg, J/kg, J/(kg K), J/(kg K)")
print("region,pressure,temperature,volume,enthalpy,entropy,heat_capacity")
for k in range(ROWS):
    kind = ("liquid", "vapour", "saturated-liquid", "saturated-vapour")[k % 4]
    if kind == "liquid":
        temperature = rng.uniform(273.15, 623.15)
        lowest = iapws97._PSat_T(temperature)
        pressure = lowest * (100 / lowest) ** rng.random()
        print(row(kind, pressure, temperature, iapws97._Region1(temperature, pressure)))
    elif kind == "vapour":
        temperature = rng.uniform(273.15, 1073.15)
        highest = (iapws97._PSat_T(temperature) if temperature <= 623.15
                   else iapws97._P23_T(temperature) if temperature <= 863.15 else 100)
        pressure = 1e-4 * (highest / 1e-4) ** rng.random()
        print(row(kind, pressure, temperature, iapws97._Region2(temperature, pressure)))
    else:
        # Drawn by pressure, so that region 4 is asked for the temperature as a plant's gauge does.
        pressure = 611.213e-6 * (16.529 / 611.213e-6) ** rng.random()
        temperature = iapws97._TSat_P(pressure)
        equation = iapws97._Region1 if kind == "saturated-liquid" else iapws97._Region2
        print(row(kind, pressure, temperature, equation(temperature, pressure)))
