"""Ideal gases: volume and amount.

The ideal law is right to about 1 % for the gases a teaching laboratory gives off (carbon dioxide,
hydrogen, oxygen, nitrogen) near 1 bar and 20 °C; readers are shown such figures as estimates.
"""

from __future__ import annotations

#: Molar gas constant, J/(mol K). Exact since the SI of 2019: the product of the Avogadro and
#: Boltzmann constants, 8.31446261815324; rounded here as it is usually printed.
GAS_CONSTANT = 8.314462618


def gas_volume(*, amount: float, temperature: float, pressure: float) -> float:
    """Work out the volume that a gas takes up.

    Args:
        amount: Amount of gas, mol, >= 0.
        temperature: Thermodynamic temperature, K, > 0.
        pressure: Pressure of this gas, Pa, > 0.

    Returns:
        Volume, m3.

    Raises:
        ValueError: An argument out of its range.

    Source:
        The ideal gas law, V = nRT/p.
    """
    if amount < 0:
        raise ValueError(f"an amount of {amount} mol")
    _check(temperature, pressure)
    return amount * GAS_CONSTANT * temperature / pressure


def gas_amount(*, volume: float, temperature: float, pressure: float) -> float:
    """Work out the amount of a gas from the volume that it takes up.

    Args:
        volume: Volume, m3, >= 0.
        temperature: Thermodynamic temperature, K, > 0.
        pressure: Pressure of this gas, Pa, > 0; over water, less the pressure of water vapour.

    Returns:
        Amount of gas, mol.

    Raises:
        ValueError: An argument out of its range.

    Source:
        The ideal gas law, n = pV/(RT).
    """
    if volume < 0:
        raise ValueError(f"a volume of {volume} m3")
    _check(temperature, pressure)
    return pressure * volume / (GAS_CONSTANT * temperature)


def _check(temperature: float, pressure: float) -> None:
    if temperature <= 0:
        raise ValueError(f"a temperature of {temperature} K")
    if pressure <= 0:
        raise ValueError(f"a pressure of {pressure} Pa")
