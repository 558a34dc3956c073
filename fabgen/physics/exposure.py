"""How far people stay from an array that transmits."""

import math


def public_limit_w_m2(frequency_mhz: float) -> float | None:
    """Power density the general public may be exposed to, whole body, averaged over 30 minutes.

    Args:
        frequency_mhz: above 30 MHz; below, the limits are fields, not power densities.

    Returns:
        The limit in W/m²: 2 up to 400 MHz, f/200 up to 2 GHz, 10 up to 300 GHz; None outside.

    Source: ICNIRP, Health Physics 118 (2020) 483, Table 5 (from memory).
    """
    if not 30 < frequency_mhz <= 300_000:
        return None
    if frequency_mhz <= 400:
        return 2.0
    return frequency_mhz / 200 if frequency_mhz <= 2000 else 10.0


def distance_m(radiated_w: float, limit_w_m2: float, *, reflection_factor: float = 1.0) -> float:
    """Distance in front of the array at which the power density falls to a limit.

    R = √(k P G / (4 π S)), far field.

    Args:
        radiated_w: P G, power at the feed times gain over isotropic (EIRP).
        limit_w_m2: S.
        reflection_factor: k, 1 in free space, 4 where the ground doubles the field.

    Returns:
        R in m.

    Source: FCC OET Bulletin 65, edition 97-01, 1997, equations 3 to 7 (secondary source).
    """
    return math.sqrt(reflection_factor * radiated_w / (4 * math.pi * limit_w_m2))
