"""The drive of fan-drive.shaft, as an engineer without the tool would script it. Prints speed and power.

`python3 fan_drive.py units` carries units with pint and finds the root with scipy; `python3 fan_drive.py plain` uses
neither: floats, bisection. Both answer the same.
"""
import sys


def with_units():
    import pint
    from scipy.optimize import brentq

    quantity = pint.UnitRegistry().Quantity
    stall, no_load = quantity(42.5, "N*m"), quantity(2980, "rpm").to("rad/s")
    reduction, efficiency = quantity(2.75, ""), quantity(0.955, "")
    factor = quantity(12, "N*m") / quantity(960, "rpm").to("rad/s") ** 2

    def balance(speed):
        speed = quantity(speed, "rad/s")
        available = stall * (1 - reduction * speed / no_load) * reduction * efficiency
        return (available - factor * speed**2).to("N*m").magnitude

    speed = quantity(brentq(balance, 0.0, (no_load / reduction).magnitude, xtol=1e-12), "rad/s")
    power = (factor * speed**3 / efficiency).to("W")
    return speed.to("rpm").magnitude, power.magnitude


def plain():
    import math

    turn = 2 * math.pi / 60
    stall, no_load, reduction, efficiency = 42.5, 2980 * turn, 2.75, 0.955
    factor = 12 / (960 * turn) ** 2
    low, high = 0.0, no_load / reduction
    for _ in range(100):
        speed = (low + high) / 2
        available = stall * (1 - reduction * speed / no_load) * reduction * efficiency
        if available > factor * speed**2:
            low = speed
        else:
            high = speed
    return speed / turn, factor * speed**3 / efficiency


if __name__ == "__main__":
    speed, power = with_units() if sys.argv[1:] == ["units"] else plain()
    print(f"{speed:.6f} rpm, {power:.6f} W")
