"""Compares hydro's water and friction with two general-purpose libraries, iapws and
fluids (Debian: python3-iapws, python3-fluids), over a grid of inputs.

usage: compare_hydro.py PROGRAM     PROGRAM prints the grid (print_hydro.c)
"""
import subprocess
import sys

from fluids.friction import Colebrook, Swamee_Jain_1976
from iapws import IAPWS95
from iapws._iapws import _Liquid
from iapws.iapws97 import _PSat_T

FAILED = []
COUNTED = {"water": 0, "water IAPWS-95": 0, "factor": 0}


def check(what, got, want, rel):
    if not abs(got - want) <= rel * abs(want):
        FAILED.append(f"{what}: got {got!r}, want {want!r}, relative {rel:g}")


def water(t, rho, mu, pv, c):
    COUNTED["water"] += 1
    at = f"at {t} K"
    same = _Liquid(t)  # the same release, SR6-08, programmed by somebody else
    check(f"density {at}", rho, same["rho"], 1e-12)
    check(f"sound speed {at}", c, same["w"], 1e-12)
    check(f"viscosity {at}", mu, same["mu"], 1e-12)
    check(f"vapour pressure {at}", pv, _PSat_T(t) * 1e6, 1e-11)
    # IAPWS-95 is another formulation; above 99 degC it is steam at 0.1 MPa.
    if 273.2 < t < 372.0 and COUNTED["water"] % 4 == 0:
        COUNTED["water IAPWS-95"] += 1
        other = IAPWS95(T=t, P=0.1)
        check(f"IAPWS-95 density {at}", rho, other.rho, 1e-5)
        check(f"IAPWS-95 sound speed {at}", c, other.w, 1e-4)
        check(f"R12-08 viscosity {at}", mu, other.mu, 1e-3)


def factor(re, rough, colebrook, swamee_jain):
    COUNTED["factor"] += 1
    at = f"at Re {re:g}, roughness ratio {rough:g}"
    check(f"Colebrook-White {at}", colebrook, Colebrook(re, rough), 1e-10)
    if rough > 0.0:  # fluids writes 5.74 as 6.97^0.9, which is 5.7402
        check(f"Swamee-Jain {at}", swamee_jain, Swamee_Jain_1976(re, rough), 1e-4)


def main():
    printed = subprocess.run([sys.argv[1]], capture_output=True, text=True, check=True)
    for line in printed.stdout.splitlines():
        word, *numbers = line.split()
        {"water": water, "factor": factor}[word](*map(float, numbers))
    for line in FAILED[:20]:
        print(line)
    print(f"{COUNTED}, {len(FAILED)} differences")
    if COUNTED["water"] < 80 or COUNTED["water IAPWS-95"] < 15 or COUNTED["factor"] < 1000:
        print("the grid is not what it was")
        return 1
    return 1 if FAILED else 0


if __name__ == "__main__":
    sys.exit(main())
